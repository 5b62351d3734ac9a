"""Volumes of the shapes, and mass, volume and density from each other."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from spinhazard.mechanics.arrays import Array, below, not_negative, positive
from spinhazard.mechanics.formula import formula


@formula(
    equation="V = pi*(D**2 - d**2)*t/4",
    unit="m³",
    symbols={"diameter": "D", "thickness": "t", "bore": "d"},
    source="beer-johnston-dynamics app. B",
)
def disk_volume(diameter: ArrayLike, thickness: ArrayLike, *, bore: ArrayLike = 0.0) -> Array:
    """Disk, cylinder or ring.

    Parameters
    ----------
    diameter, thickness : array_like
        Outer diameter and thickness [m], > 0.
    bore : array_like
        Inner diameter [m], below `diameter`.

    Returns
    -------
    ndarray
        Volume [m³].

    Raises
    ------
    ValueError
        A length is not positive, or the bore does not fit.

    Examples
    --------
    >>> print(f"{disk_volume(2.0, 1.0):.6f}")
    3.141593
    """  # noqa: DOC502
    outer = positive("diameter", diameter, "m")
    inner = below("bore", not_negative("bore", bore, "m"), "diameter", outer, "m")
    return np.pi * (outer - inner) * (outer + inner) * positive("thickness", thickness, "m") / 4.0


@formula(
    equation="V = pi*(D**3 - d**3)/6",
    unit="m³",
    symbols={"diameter": "D", "inner_diameter": "d"},
    source="beer-johnston-dynamics app. B",
)
def sphere_volume(diameter: ArrayLike, *, inner_diameter: ArrayLike = 0.0) -> Array:
    """Sphere, solid or hollow.

    Parameters
    ----------
    diameter : array_like
        Outer diameter [m], > 0.
    inner_diameter : array_like
        Diameter of the hollow [m], below `diameter`.

    Returns
    -------
    ndarray
        Volume [m³].

    Raises
    ------
    ValueError
        A length is not positive, or the hollow does not fit.

    Examples
    --------
    >>> print(f"{sphere_volume(2.0):.6f}")
    4.188790
    """  # noqa: DOC502
    outer = positive("diameter", diameter, "m")
    inner = below("inner_diameter", not_negative("inner_diameter", inner_diameter, "m"), "diameter", outer, "m")
    return np.pi * (outer - inner) * (outer**2 + outer * inner + inner**2) / 6.0


@formula(
    equation="V = a*l*b",
    unit="m³",
    symbols={"radial": "a", "axial": "l", "tangential": "b"},
    source="beer-johnston-dynamics app. B",
)
def plate_volume(radial: ArrayLike, axial: ArrayLike, *, tangential: ArrayLike) -> Array:
    """Rectangular plate or block.

    Parameters
    ----------
    radial, axial, tangential : array_like
        Extents [m], > 0.

    Returns
    -------
    ndarray
        Volume [m³].

    Raises
    ------
    ValueError
        An extent is not positive.

    Examples
    --------
    >>> print(plate_volume(1.0, 2.0, tangential=3.0))
    6.0
    """  # noqa: DOC502
    return positive("radial", radial, "m") * positive("axial", axial, "m") * positive("tangential", tangential, "m")


@formula(
    equation="V = pi*l*((D**2 + D*d + d**2)/3 - b**2)/4", unit="m³",
    symbols={"large_diameter": "D", "small_diameter": "d", "length": "l", "bore": "b"}, source="beer-johnston-dynamics app. B",
)  # fmt: skip
def frustum_volume(
    large_diameter: ArrayLike, small_diameter: ArrayLike, *, length: ArrayLike, bore: ArrayLike = 0.0
) -> Array:
    """Cone or frustum, solid or with a cylindrical bore.

    Parameters
    ----------
    large_diameter, small_diameter : array_like
        Diameters at the ends [m].
    length : array_like
        Length along the axis [m], > 0.
    bore : array_like
        Diameter of the hole [m], at most the small diameter.

    Returns
    -------
    ndarray
        Volume [m³].

    Raises
    ------
    ValueError
        A length is not positive, or the diameters do not fit each other.

    Examples
    --------
    >>> print(f"{frustum_volume(2.0, 0.0, length=3.0):.6f}")
    3.141593
    """
    large, small = positive("large_diameter", large_diameter, "m"), not_negative("small_diameter", small_diameter, "m")
    hole = not_negative("bore", bore, "m")
    if np.any((hole > small) & (hole > 0.0)):
        raise ValueError("bore: accepted is at most small_diameter")
    return np.pi * positive("length", length, "m") * ((large**2 + large * small + small**2) / 3.0 - hole**2) / 4.0


@formula(
    equation="V = pi**2*D*d**2/4",
    unit="m³",
    symbols={"ring_diameter": "D", "section_diameter": "d"},
    source="beer-johnston-dynamics app. B",
)
def torus_volume(ring_diameter: ArrayLike, section_diameter: ArrayLike) -> Array:
    """Ring of round section.

    Parameters
    ----------
    ring_diameter : array_like
        Diameter of the circle through the centres of the section [m], > 0.
    section_diameter : array_like
        Diameter of the section [m], > 0.

    Returns
    -------
    ndarray
        Volume [m³].

    Raises
    ------
    ValueError
        A diameter is not positive.

    Examples
    --------
    >>> print(f"{torus_volume(2.0, 0.2):.6f}")
    0.197392
    """  # noqa: DOC502
    return (
        np.pi**2
        * positive("ring_diameter", ring_diameter, "m")
        * positive("section_diameter", section_diameter, "m") ** 2
        / 4.0
    )


@formula(equation="m = rho*V", unit="kg", symbols={"density": "rho", "volume": "V"}, source="openstax-up1 §1.4")
def mass_from_density(density: ArrayLike, volume: ArrayLike) -> Array:
    """Mass of a piece from its material and size.

    Parameters
    ----------
    density : array_like
        Density [kg/m³], > 0.
    volume : array_like
        Volume [m³], > 0.

    Returns
    -------
    ndarray
        Mass [kg].

    Raises
    ------
    ValueError
        An argument is not positive.

    Examples
    --------
    >>> print(mass_from_density(7850.0, 0.002))
    15.7
    """  # noqa: DOC502
    return positive("density", density, "kg/m³") * positive("volume", volume, "m³")


@formula(equation="rho = m/V", unit="kg/m³", symbols={"mass": "m", "volume": "V"}, source="openstax-up1 §1.4")
def density_from_mass(mass: ArrayLike, volume: ArrayLike) -> Array:
    """Density that mass and size imply.

    Parameters
    ----------
    mass : array_like
        Mass [kg], > 0.
    volume : array_like
        Volume [m³], > 0.

    Returns
    -------
    ndarray
        Density [kg/m³].

    Raises
    ------
    ValueError
        An argument is not positive.

    Examples
    --------
    >>> print(density_from_mass(15.7, 0.002))
    7850.0
    """  # noqa: DOC502
    return positive("mass", mass, "kg") / positive("volume", volume, "m³")
