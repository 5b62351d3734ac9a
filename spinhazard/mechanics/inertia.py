"""Moments of inertia of common shapes. Of ONE piece about the axis through its own centre of mass, unless said otherwise.

Lengths are diameters where the drawing gives diameters; every function broadcasts over arrays, and NaN passes through.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from spinhazard.mechanics.arrays import Array, below, not_negative, positive
from spinhazard.mechanics.formula import formula
from spinhazard.mechanics.polygon import revolved_moments


@formula(
    equation="J = m*(D**2 + d**2)/8",
    unit="kg m²",
    symbols={"mass": "m", "diameter": "D", "bore": "d"},
    source="openstax-up1 fig. 10.20",
)
def disk_inertia(mass: ArrayLike, diameter: ArrayLike, *, bore: ArrayLike = 0.0) -> Array:
    """Disk, cylinder or ring of any wall about its axis.

    Parameters
    ----------
    mass : array_like
        Mass [kg], >= 0.
    diameter : array_like
        Outer diameter [m], > 0.
    bore : array_like
        Inner diameter [m], 0 for a solid disk, below `diameter`.

    Returns
    -------
    ndarray
        Moment of inertia [kg m²].

    Raises
    ------
    ValueError
        A mass is negative, or the bore does not fit the diameter.

    Examples
    --------
    >>> print(disk_inertia(20.0, 0.4))
    0.4
    """  # noqa: DOC502  (raised by the checks of arguments)
    bore = below("bore", not_negative("bore", bore, "m"), "diameter", positive("diameter", diameter, "m"), "m")
    return not_negative("mass", mass, "kg") * (np.asarray(diameter, dtype=np.float64) ** 2 + bore**2) / 8.0


@formula(
    equation="J = m*(D**4 + D**3*d + D**2*d**2 + D*d**3 + d**4)/(10*(D**2 + D*d + d**2))",
    unit="kg m²", symbols={"mass": "m", "diameter": "D", "inner_diameter": "d"}, source="spinhazard-methods inertia",
)  # fmt: skip
def sphere_inertia(mass: ArrayLike, diameter: ArrayLike, *, inner_diameter: ArrayLike = 0.0) -> Array:
    """Sphere, solid or hollow: 2/5 m (R⁵ − r⁵)/(R³ − r³) with the factor R − r divided out, so that thin shells stay exact.

    Parameters
    ----------
    mass : array_like
        Mass [kg], >= 0.
    diameter : array_like
        Outer diameter [m], > 0.
    inner_diameter : array_like
        Diameter of the hollow [m], at most `diameter` (then a thin shell, 2/3 m R²).

    Returns
    -------
    ndarray
        Moment of inertia [kg m²].

    Raises
    ------
    ValueError
        A mass is negative, or the hollow does not fit.

    Examples
    --------
    >>> print(sphere_inertia(10.0, 2.0))
    4.0
    """
    outer, inner = positive("diameter", diameter, "m"), not_negative("inner_diameter", inner_diameter, "m")
    if np.any(inner > outer):
        raise ValueError("inner_diameter: accepted is at most diameter")
    fifth = outer**4 + outer**3 * inner + outer**2 * inner**2 + outer * inner**3 + inner**4
    third = outer**2 + outer * inner + inner**2
    return not_negative("mass", mass, "kg") * fifth / (10.0 * third)


@formula(equation="J = m*L**2/12", unit="kg m²", symbols={"mass": "m", "length": "L"}, source="openstax-up1 fig. 10.20")
def crossways_rod_inertia(mass: ArrayLike, length: ArrayLike) -> Array:
    """Slender rod about an axis across it through its middle.

    Parameters
    ----------
    mass : array_like
        Mass [kg], >= 0.
    length : array_like
        Length [m], > 0.

    Returns
    -------
    ndarray
        Moment of inertia [kg m²].

    Raises
    ------
    ValueError
        A mass is negative, or a length is not positive.

    Examples
    --------
    >>> print(crossways_rod_inertia(12.0, 2.0))
    4.0
    """  # noqa: DOC502
    return not_negative("mass", mass, "kg") * positive("length", length, "m") ** 2 / 12.0


@formula(
    equation="J = m*(a**2 + b**2)/12",
    unit="kg m²",
    symbols={"mass": "m", "radial": "a", "tangential": "b"},
    source="beer-johnston-dynamics app. B",
)
def plate_inertia(mass: ArrayLike, radial: ArrayLike, *, tangential: ArrayLike) -> Array:
    """Rectangular plate or block about the axis through its middle parallel to the shaft.

    Parameters
    ----------
    mass : array_like
        Mass [kg], >= 0.
    radial, tangential : array_like
        Extents across the shaft [m], > 0.

    Returns
    -------
    ndarray
        Moment of inertia [kg m²].

    Raises
    ------
    ValueError
        A mass is negative, or an extent is not positive.

    Examples
    --------
    >>> print(plate_inertia(12.0, 3.0, tangential=4.0))
    25.0
    """  # noqa: DOC502
    extents = positive("radial", radial, "m") ** 2 + positive("tangential", tangential, "m") ** 2
    return not_negative("mass", mass, "kg") * extents / 12.0


@formula(
    equation="J = m*((D**4 + D**3*d + D**2*d**2 + D*d**3 + d**4)/5 - b**4)/(8*((D**2 + D*d + d**2)/3 - b**2))",
    unit="kg m²", symbols={"mass": "m", "large_diameter": "D", "small_diameter": "d", "bore": "b"}, source="spinhazard-methods inertia",
)  # fmt: skip
def frustum_inertia(
    mass: ArrayLike, large_diameter: ArrayLike, *, small_diameter: ArrayLike, bore: ArrayLike = 0.0
) -> Array:
    """Cone or frustum about its axis, solid or with a cylindrical bore.

    Parameters
    ----------
    mass : array_like
        Mass [kg], >= 0.
    large_diameter, small_diameter : array_like
        Diameters at the ends [m]; 0 for the tip of a full cone.
    bore : array_like
        Diameter of the hole along the axis [m], at most the small diameter.

    Returns
    -------
    ndarray
        Moment of inertia [kg m²].

    Raises
    ------
    ValueError
        A mass is negative, or the diameters do not fit each other.

    Examples
    --------
    >>> print(frustum_inertia(10.0, 2.0, small_diameter=0.0))
    3.0
    """
    large, small = positive("large_diameter", large_diameter, "m"), not_negative("small_diameter", small_diameter, "m")
    bore = below("bore", not_negative("bore", bore, "m"), "large_diameter", large, "m")
    if np.any((bore > small) & (bore > 0.0)):
        raise ValueError("bore: accepted is at most small_diameter")
    fourth = (large**4 + large**3 * small + large**2 * small**2 + large * small**3 + small**4) / 5.0
    second = (large**2 + large * small + small**2) / 3.0
    return not_negative("mass", mass, "kg") * (fourth - bore**4) / (8.0 * (second - bore**2))


@formula(
    equation="J = m*(D**2/4 + 3*d**2/16)", unit="kg m²",
    symbols={"mass": "m", "ring_diameter": "D", "section_diameter": "d"}, source="roark app. A",
)  # fmt: skip
def torus_inertia(mass: ArrayLike, ring_diameter: ArrayLike, *, section_diameter: ArrayLike) -> Array:
    """Ring of round section about its axis of symmetry, m (R² + ¾ a²).

    Parameters
    ----------
    mass : array_like
        Mass [kg], >= 0.
    ring_diameter : array_like
        Diameter of the circle through the centres of the section [m], > 0.
    section_diameter : array_like
        Diameter of the section [m], at most `ring_diameter`.

    Returns
    -------
    ndarray
        Moment of inertia [kg m²].

    Raises
    ------
    ValueError
        A mass is negative, or the section does not fit the ring.

    Examples
    --------
    >>> print(torus_inertia(8.0, 2.0, section_diameter=0.4))
    8.24
    """
    ring, section = positive("ring_diameter", ring_diameter, "m"), positive("section_diameter", section_diameter, "m")
    if np.any(section > ring):
        raise ValueError("section_diameter: accepted is at most ring_diameter")
    return not_negative("mass", mass, "kg") * (ring**2 / 4.0 + 3.0 * section**2 / 16.0)


@formula(equation="J = m*r**2", unit="kg m²", symbols={"mass": "m", "radius": "r"}, source="openstax-up1 §10.4")
def point_inertia(mass: ArrayLike, radius: ArrayLike) -> Array:
    """Mass small against its distance from the axis, about that axis.

    Parameters
    ----------
    mass : array_like
        Mass [kg], >= 0.
    radius : array_like
        Distance from the axis [m], >= 0.

    Returns
    -------
    ndarray
        Moment of inertia [kg m²].

    Raises
    ------
    ValueError
        A mass or radius is negative.

    Examples
    --------
    >>> print(point_inertia(2.0, 3.0))
    18.0
    """  # noqa: DOC502
    return not_negative("mass", mass, "kg") * not_negative("radius", radius, "m") ** 2


@formula(
    equation="J = J_0 + m*h**2",
    unit="kg m²",
    symbols={"inertia": "J_0", "mass": "m", "offset": "h"},
    source="openstax-up1 §10.5",
)
def offset_inertia(inertia: ArrayLike, mass: ArrayLike, *, offset: ArrayLike) -> Array:
    """Parallel-axis theorem: about an axis at a distance from the centre of mass.

    Parameters
    ----------
    inertia : array_like
        About the axis through the centre of mass [kg m²], >= 0.
    mass : array_like
        Mass [kg], >= 0.
    offset : array_like
        Distance of the axes [m], >= 0.

    Returns
    -------
    ndarray
        Moment of inertia [kg m²].

    Raises
    ------
    ValueError
        An argument is negative.

    Examples
    --------
    >>> print(offset_inertia(1.0, 2.0, offset=3.0))
    19.0
    """  # noqa: DOC502
    return (
        not_negative("inertia", inertia, "kg m²")
        + not_negative("mass", mass, "kg") * not_negative("offset", offset, "m") ** 2
    )


@formula(equation="J = N*J_1", unit="kg m²", symbols={"inertia": "J_1", "count": "N"}, source="openstax-up1 §10.5")
def pattern_inertia(inertia: ArrayLike, count: ArrayLike) -> Array:
    """Identical pieces at the same distance from the shaft.

    Parameters
    ----------
    inertia : array_like
        Of one piece about the shaft [kg m²], >= 0.
    count : array_like
        Number of pieces, >= 1.

    Returns
    -------
    ndarray
        Moment of inertia of all pieces [kg m²].

    Raises
    ------
    ValueError
        The inertia is negative, or the count is not positive.

    Examples
    --------
    >>> print(pattern_inertia(0.5, 12))
    6.0
    """  # noqa: DOC502
    return not_negative("inertia", inertia, "kg m²") * positive("count", count, "")


@formula(
    equation="J_r = J*i**2", unit="kg m²", symbols={"inertia": "J", "ratio": "i"}, source="spinhazard-methods inertia"
)
def referred_inertia(inertia: ArrayLike, ratio: ArrayLike) -> Array:
    """Inertia of a geared shaft as felt at the reference shaft: equal kinetic energy at ω_shaft = i ω_reference.

    Parameters
    ----------
    inertia : array_like
        Of the geared shaft [kg m²], >= 0.
    ratio : array_like
        Its turns for one turn of the reference shaft, > 0.

    Returns
    -------
    ndarray
        Referred moment of inertia [kg m²].

    Raises
    ------
    ValueError
        The inertia is negative, or the ratio is not positive.

    Examples
    --------
    >>> print(referred_inertia(2.0, 3.0))
    18.0
    """  # noqa: DOC502
    return not_negative("inertia", inertia, "kg m²") * positive("ratio", ratio, "") ** 2


@formula(equation="J = G/4", unit="kg m²", symbols={"gd2": "G"}, source="spinhazard-methods inertia")
def inertia_from_gd2(gd2: ArrayLike) -> Array:
    """Inertia from GD² of a data sheet (weight in kgf times diameter of gyration squared, numerically kg m²).

    Parameters
    ----------
    gd2 : array_like
        GD² [kg m²], >= 0.

    Returns
    -------
    ndarray
        Moment of inertia [kg m²]; a quarter, since the diameter is twice the radius.

    Raises
    ------
    ValueError
        GD² is negative.

    Examples
    --------
    >>> print(inertia_from_gd2(7.6))
    1.9
    """  # noqa: DOC502
    return not_negative("gd2", gd2, "kg m²") / 4.0


@formula(equation="J = W", unit="kg m²", symbols={"wk2": "W"}, source="spinhazard-methods inertia")
def inertia_from_wk2(wk2: ArrayLike) -> Array:
    """Inertia from WK² or WR² of a data sheet (weight in lb times radius of gyration squared), already converted to kg m².

    Parameters
    ----------
    wk2 : array_like
        WK² [kg m²], >= 0.

    Returns
    -------
    ndarray
        Moment of inertia [kg m²]; the same number, since the radius is the radius.

    Raises
    ------
    ValueError
        WK² is negative.

    Examples
    --------
    >>> print(inertia_from_wk2(1.9))
    1.9
    """  # noqa: DOC502
    return not_negative("wk2", wk2, "kg m²")


@formula(equation="see method: inertia", unit="m³", symbols={}, source="spinhazard-methods inertia")
def revolved_volume(radii: ArrayLike, heights: ArrayLike) -> Array:
    """Volume of the body that a closed half-section sweeps about the axis, exact for straight edges.

    Parameters
    ----------
    radii, heights : array_like, shape (corners,)
        Corners in order [m]; the last is joined to the first.

    Returns
    -------
    ndarray, shape ()
        Volume [m³].

    Raises
    ------
    ValueError
        The outline crosses itself, has a negative radius, fewer than three corners, or no area.

    Examples
    --------
    >>> print(f"{revolved_volume([0.0, 0.5, 0.5, 0.0], [0.0, 0.0, 0.1, 0.1]):.6f}")
    0.078540
    """  # noqa: DOC502
    return np.asarray(revolved_moments(radii, heights)[0])


@formula(equation="see method: inertia", unit="kg m²", symbols={"mass": "m"}, source="spinhazard-methods inertia")
def revolved_inertia(mass: ArrayLike, radii: ArrayLike, *, heights: ArrayLike) -> Array:
    """Body of revolution of even density about its axis, from its closed half-section.

    Parameters
    ----------
    mass : array_like
        Mass [kg], >= 0.
    radii, heights : array_like, shape (corners,)
        Corners in order [m]; the last is joined to the first.

    Returns
    -------
    ndarray
        Moment of inertia [kg m²].

    Raises
    ------
    ValueError
        A mass is negative, or the outline is none.

    Examples
    --------
    >>> print(f"{revolved_inertia(20.0, [0.0, 0.2, 0.2, 0.0], heights=[0.0, 0.0, 0.1, 0.1]):.6f}")
    0.400000
    """  # noqa: DOC502
    volume, second = revolved_moments(radii, heights)
    return not_negative("mass", mass, "kg") * (second / volume)
