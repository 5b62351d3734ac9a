"""Distance of a part's outermost point from the shaft axis: outer points move faster."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from spinhazard.mechanics.arrays import Array, not_negative, positive
from spinhazard.mechanics.formula import formula


@formula(
    equation="R = h + D/2", unit="m", symbols={"diameter": "D", "offset": "h"}, source="spinhazard-methods inertia"
)
def disk_tip_radius(diameter: ArrayLike, *, offset: ArrayLike = 0.0) -> Array:
    """Far side of a round piece (disk, ring, sphere, torus) whose centre is off the axis by `offset`.

    Parameters
    ----------
    diameter : array_like
        Outer diameter [m], > 0.
    offset : array_like
        Distance of its centre from the shaft axis [m], >= 0.

    Returns
    -------
    ndarray
        Distance of the outermost point [m].

    Raises
    ------
    ValueError
        A length is negative, or the diameter zero.

    Examples
    --------
    >>> print(disk_tip_radius(0.2, offset=0.5))
    0.6
    """  # noqa: DOC502
    return not_negative("offset", offset, "m") + positive("diameter", diameter, "m") / 2.0


@formula(
    equation="R = sqrt((h + a/2)**2 + (b/2)**2)", unit="m",
    symbols={"radial": "a", "tangential": "b", "offset": "h"}, source="spinhazard-methods inertia",
)  # fmt: skip
def plate_tip_radius(radial: ArrayLike, tangential: ArrayLike, *, offset: ArrayLike = 0.0) -> Array:
    """Outer corner of a plate whose centre is off the axis by `offset`.

    Parameters
    ----------
    radial, tangential : array_like
        Extents across the shaft [m], > 0.
    offset : array_like
        Distance of its centre from the shaft axis [m], >= 0.

    Returns
    -------
    ndarray
        Distance of the corner [m].

    Raises
    ------
    ValueError
        A length is negative, or an extent zero.

    Examples
    --------
    >>> print(plate_tip_radius(0.4, 0.6, offset=0.2))
    0.5
    """  # noqa: DOC502
    out = not_negative("offset", offset, "m") + positive("radial", radial, "m") / 2.0
    return np.hypot(out, positive("tangential", tangential, "m") / 2.0)


@formula(equation="R = h + L/2", unit="m", symbols={"length": "L", "offset": "h"}, source="spinhazard-methods inertia")
def radial_rod_tip_radius(length: ArrayLike, *, offset: ArrayLike = 0.0) -> Array:
    """Outer end of a rod that points away from the shaft.

    Parameters
    ----------
    length : array_like
        Length [m], > 0.
    offset : array_like
        Distance of its middle from the shaft axis [m], >= 0.

    Returns
    -------
    ndarray
        Distance of the end [m].

    Raises
    ------
    ValueError
        A length is negative or zero.

    Examples
    --------
    >>> print(radial_rod_tip_radius(1.0, offset=0.5))
    1.0
    """  # noqa: DOC502
    return not_negative("offset", offset, "m") + positive("length", length, "m") / 2.0


@formula(
    equation="R = sqrt(h**2 + (L/2)**2)",
    unit="m",
    symbols={"length": "L", "offset": "h"},
    source="spinhazard-methods inertia",
)
def tangential_rod_tip_radius(length: ArrayLike, *, offset: ArrayLike = 0.0) -> Array:
    """Ends of a rod that lies in the direction of motion.

    Parameters
    ----------
    length : array_like
        Length [m], > 0.
    offset : array_like
        Distance of its middle from the shaft axis [m], >= 0.

    Returns
    -------
    ndarray
        Distance of the ends [m].

    Raises
    ------
    ValueError
        A length is negative or zero.

    Examples
    --------
    >>> print(tangential_rod_tip_radius(0.6, offset=0.4))
    0.5
    """  # noqa: DOC502
    return np.hypot(not_negative("offset", offset, "m"), positive("length", length, "m") / 2.0)


@formula(equation="R = h + r", unit="m", symbols={"radius": "r", "offset": "h"}, source="spinhazard-methods inertia")
def point_tip_radius(radius: ArrayLike, *, offset: ArrayLike = 0.0) -> Array:
    """A small mass at a radius.

    Parameters
    ----------
    radius : array_like
        Distance from the axis [m], >= 0.
    offset : array_like
        Further distance [m], >= 0.

    Returns
    -------
    ndarray
        Distance [m].

    Raises
    ------
    ValueError
        A length is negative.

    Examples
    --------
    >>> print(point_tip_radius(0.5))
    0.5
    """  # noqa: DOC502
    return not_negative("offset", offset, "m") + not_negative("radius", radius, "m")
