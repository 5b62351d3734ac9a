"""Reaching the hazard: time to reach, distances asked for, openings against distance. Figures of the standards as data.

The figures of ISO and OSHA tables here are from memory where docs/generated/validation.md says so; check the current edition.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from spinhazard.mechanics.arrays import Array, not_negative, positive
from spinhazard.mechanics.formula import formula

HAND_SPEED, WALKING_SPEED = 2.0, 1.6
"""Approach speeds of ISO 13855 [m/s]."""
US_HAND_SPEED = 63.0 * 0.0254
"""Hand speed of 29 CFR 1910.217 [m/s]: 63 in/s."""


@formula(
    equation="t = Max(S - C, 0)/K",
    unit="s",
    symbols={"distance": "S", "approach_speed": "K", "intrusion": "C"},
    source="iso-13855 cl. 5",
)
def reach_time(distance: ArrayLike, approach_speed: ArrayLike, *, intrusion: ArrayLike = 0.0) -> Array:
    """Least time in which a person covers a distance.

    Parameters
    ----------
    distance : array_like
        From the guard plane to the hazard [m], >= 0.
    approach_speed : array_like
        Approach speed [m/s], > 0.
    intrusion : array_like
        How far a hand may already be past the plane [m], >= 0.

    Returns
    -------
    ndarray
        Time [s], at least 0.

    Raises
    ------
    ValueError
        An argument is out of its range.

    Examples
    --------
    >>> print(reach_time(0.8, 1.6))
    0.5
    """  # noqa: DOC502
    way = np.maximum(not_negative("distance", distance, "m") - not_negative("intrusion", intrusion, "m"), 0.0)
    return way / positive("approach_speed", approach_speed, "m/s")


@formula(
    equation="S = K*T + C",
    unit="m",
    symbols={"approach_speed": "K", "time": "T", "intrusion": "C"},
    source="iso-13855 cl. 5",
)
def separation_distance(approach_speed: ArrayLike, time: ArrayLike, *, intrusion: ArrayLike = 0.0) -> Array:
    """Distance at which the hazard has ended before it is reached.

    Parameters
    ----------
    approach_speed : array_like
        Approach speed [m/s], > 0.
    time : array_like
        Whole stopping time with all responses [s], >= 0, may be infinite.
    intrusion : array_like
        How far a hand may already be past the plane [m], >= 0.

    Returns
    -------
    ndarray
        Distance [m].

    Raises
    ------
    ValueError
        An argument is out of its range.

    Examples
    --------
    >>> print(separation_distance(1.6, 0.5, intrusion=0.25))
    1.05
    """  # noqa: DOC502
    reached = positive("approach_speed", approach_speed, "m/s") * not_negative("time", time, "s")
    return reached + not_negative("intrusion", intrusion, "m")


@formula(equation="see method: reach", unit="m", symbols={"time": "T", "resolution": "d"}, source="iso-13855 cl. 6")
def curtain_distance(time: ArrayLike, resolution: ArrayLike) -> Array:
    """Distance of a light curtain across the direction of approach, by the resolution of the curtain.

    Up to 40 mm: K = 2 m/s and C = 8 (d − 14 mm), not below 0, at least 100 mm; beyond 500 mm again with K = 1.6 m/s, at
    least 500 mm. Above 40 mm: K = 1.6 m/s and C = 850 mm.

    Parameters
    ----------
    time : array_like
        Whole stopping time with all responses [s], >= 0.
    resolution : array_like
        Smallest object detected [m], > 0.

    Returns
    -------
    ndarray
        Distance [m].

    Raises
    ------
    ValueError
        An argument is out of its range.

    Examples
    --------
    >>> print(f"{curtain_distance(0.15, 0.014):.3f} {curtain_distance(0.35, 0.030):.3f}")
    0.300 0.688
    """  # noqa: DOC502
    time, resolution = not_negative("time", time, "s"), positive("resolution", resolution, "m")
    intrusion = np.maximum(8.0 * (resolution - 0.014), 0.0)
    near = np.maximum(HAND_SPEED * time + intrusion, 0.1)
    far = np.maximum(WALKING_SPEED * time + intrusion, 0.5)
    return np.where(resolution > 0.040, WALKING_SPEED * time + 0.85, np.where(near <= 0.5, near, far))


@formula(equation="S = Max(1.6*T + 0.25, 0.1)", unit="m", symbols={"time": "T"}, source="iso-13855 cl. 8")
def two_hand_distance(time: ArrayLike) -> Array:
    """Distance of a two-hand control, both hands uncovered.

    Parameters
    ----------
    time : array_like
        Whole stopping time with all responses [s], >= 0.

    Returns
    -------
    ndarray
        Distance [m], at least 100 mm.

    Raises
    ------
    ValueError
        The time is negative.

    Examples
    --------
    >>> print(two_hand_distance(0.5))
    1.05
    """  # noqa: DOC502
    return np.maximum(WALKING_SPEED * not_negative("time", time, "s") + 0.25, 0.1)


@formula(equation="S = 1.6002*T", unit="m", symbols={"time": "T"}, source="29cfr1910.217 (c)(3)")
def us_distance(time: ArrayLike) -> Array:
    """Distance of a presence-sensing device or two-hand trip by the US rule for mechanical power presses: 63 in/s.

    Parameters
    ----------
    time : array_like
        Stopping time [s], >= 0.

    Returns
    -------
    ndarray
        Distance [m].

    Raises
    ------
    ValueError
        The time is negative.

    Examples
    --------
    >>> print(us_distance(0.5))
    0.8001
    """  # noqa: DOC502
    return US_HAND_SPEED * not_negative("time", time, "s")


OPENING_CLASSES = np.array([0.004, 0.006, 0.008, 0.010, 0.012, 0.020, 0.030, 0.040, 0.120])
"""Upper ends of the classes of opening [m], ISO 13857 table 4 (persons of 14 years and over), from memory."""
OPENING_DISTANCES = {
    "slot": np.array([0.002, 0.010, 0.020, 0.080, 0.100, 0.120, 0.850, 0.850, 0.850]),
    "square": np.array([0.002, 0.005, 0.015, 0.025, 0.080, 0.120, 0.120, 0.200, 0.850]),
    "round": np.array([0.002, 0.005, 0.005, 0.020, 0.080, 0.120, 0.120, 0.120, 0.850]),
}
"""Distance asked for by class and shape [m], same source."""
US_DISTANCES_INCH = np.array([0.5, 1.5, 2.5, 3.5, 5.5, 6.5, 7.5, 12.5, 15.5, 17.5])
US_OPENINGS_INCH = np.array([0.25, 0.375, 0.5, 0.625, 0.75, 0.875, 1.25, 1.5, 1.875, 2.125])
"""29 CFR 1910.217 table O-10 [in], read in a reprint of 2002: from each distance on, the widest opening."""
_EDGE = 1e-9  # a distance given as 150 mm is 150 mm whatever its last binary digit


@formula(equation="see method: reach", unit="m", symbols={"distance": "s"}, source="iso-13857 table 4")
def iso_opening_limit(distance: ArrayLike, shape: str) -> Array:
    """Largest opening allowed at a distance, by classes.

    Parameters
    ----------
    distance : array_like
        From the opening to the nearest moving part [m], >= 0.
    shape : {"slot", "square", "round"}
        Form of the opening.

    Returns
    -------
    ndarray
        Opening [m]; 0 where even the smallest class asks for more distance.

    Raises
    ------
    ValueError
        The distance is negative.

    Examples
    --------
    >>> print(iso_opening_limit(0.150, "slot"))
    0.02
    """  # noqa: DOC502
    distance = not_negative("distance", distance, "m")
    classes = np.searchsorted(OPENING_DISTANCES[shape], distance + _EDGE, side="right")
    limit = np.concatenate([[0.0], OPENING_CLASSES])[classes]
    return np.where(np.isnan(distance), np.nan, limit)


@formula(equation="see method: reach", unit="m", symbols={"size": "e"}, source="iso-13857 table 4")
def iso_opening_distance(size: ArrayLike, shape: str) -> Array:
    """Distance asked for by an opening, by classes.

    Parameters
    ----------
    size : array_like
        Smaller side or diameter of the opening [m], > 0.
    shape : {"slot", "square", "round"}
        Form of the opening.

    Returns
    -------
    ndarray
        Distance [m]; NaN for openings above 120 mm, which the table does not hold.

    Raises
    ------
    ValueError
        The size is not positive.

    Examples
    --------
    >>> print(iso_opening_distance(0.012, "slot"))
    0.1
    """  # noqa: DOC502
    size = positive("size", size, "m")
    classes = np.searchsorted(OPENING_CLASSES, size - _EDGE, side="left")
    distance = np.concatenate([OPENING_DISTANCES[shape], [np.nan]])[classes]
    return np.where(np.isnan(size), np.nan, distance)


@formula(equation="see method: reach", unit="m", symbols={"distance": "s"}, source="29cfr1910.217 table O-10")
def us_opening_limit(distance: ArrayLike) -> Array:
    """Widest opening allowed at a distance by the US rule for mechanical power presses.

    Parameters
    ----------
    distance : array_like
        From the opening to the nearest moving part [m], >= 0.

    Returns
    -------
    ndarray
        Opening [m]; 0 below half an inch; the last row is kept beyond its 31.5 in.

    Raises
    ------
    ValueError
        The distance is negative.

    Examples
    --------
    >>> print(f"{us_opening_limit(4.0 * 0.0254) / 0.0254:.3f}")
    0.625
    """  # noqa: DOC502
    distance = not_negative("distance", distance, "m")
    rows = np.searchsorted(US_DISTANCES_INCH * 0.0254, distance + _EDGE, side="right")
    limit = np.concatenate([[0.0], US_OPENINGS_INCH * 0.0254])[rows]
    return np.where(np.isnan(distance), np.nan, limit)
