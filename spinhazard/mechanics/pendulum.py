"""Measured inertia: bifilar and trifilar suspension, and a falling weight."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from spinhazard.mechanics.arrays import Array, positive
from spinhazard.mechanics.formula import formula


@formula(
    equation="J = 9.80665*m*d**2*T**2/(16*pi**2*L)", unit="kg m²",
    symbols={"mass": "m", "distance": "d", "length": "L", "period": "T"}, source="spinhazard-methods inertia",
)  # fmt: skip
def bifilar_inertia(mass: ArrayLike, distance: ArrayLike, *, length: ArrayLike, period: ArrayLike) -> Array:
    """Body hung on two parallel cords and swinging about its vertical axis, small angles.

    Parameters
    ----------
    mass : array_like
        Mass of the body [kg], > 0.
    distance : array_like
        Distance between the cords [m], > 0.
    length : array_like
        Length of the cords [m], > 0.
    period : array_like
        Time of one full swing [s], > 0.

    Returns
    -------
    ndarray
        Moment of inertia about the vertical axis midway between the cords [kg m²].

    Raises
    ------
    ValueError
        An argument is not positive.

    Examples
    --------
    >>> print(f"{bifilar_inertia(12.0, 0.4, length=1.5, period=1.8):.6f}")
    0.257547
    """  # noqa: DOC502
    swing = positive("distance", distance, "m") * positive("period", period, "s")
    return 9.80665 * positive("mass", mass, "kg") * swing**2 / (16.0 * np.pi**2 * positive("length", length, "m"))


@formula(
    equation="J = 9.80665*m*R**2*T**2/(4*pi**2*L)", unit="kg m²",
    symbols={"mass": "m", "radius": "R", "length": "L", "period": "T"}, source="spinhazard-methods inertia",
)  # fmt: skip
def trifilar_inertia(mass: ArrayLike, radius: ArrayLike, *, length: ArrayLike, period: ArrayLike) -> Array:
    """Body hung on three parallel cords on a circle about its vertical axis, small angles.

    Parameters
    ----------
    mass : array_like
        Mass of the body [kg], > 0.
    radius : array_like
        Radius of the circle of the cords [m], > 0.
    length : array_like
        Length of the cords [m], > 0.
    period : array_like
        Time of one full swing [s], > 0.

    Returns
    -------
    ndarray
        Moment of inertia about the vertical axis [kg m²].

    Raises
    ------
    ValueError
        An argument is not positive.

    Examples
    --------
    >>> print(f"{trifilar_inertia(12.0, 0.25, length=1.5, period=1.8):.6f}")
    0.402417
    """  # noqa: DOC502
    swing = positive("radius", radius, "m") * positive("period", period, "s")
    return 9.80665 * positive("mass", mass, "kg") * swing**2 / (4.0 * np.pi**2 * positive("length", length, "m"))


@formula(
    equation="J = w*r**2*(9.80665*t**2/(2*h) - 1)", unit="kg m²",
    symbols={"weight": "w", "radius": "r", "height": "h", "time": "t"}, source="spinhazard-methods inertia",
)  # fmt: skip
def falling_weight_inertia(weight: ArrayLike, radius: ArrayLike, *, height: ArrayLike, time: ArrayLike) -> Array:
    """Rotor turned from rest by a weight on a cord round its shaft; friction left out, which makes J too large.

    Parameters
    ----------
    weight : array_like
        Mass of the weight [kg], > 0.
    radius : array_like
        Radius the cord acts on [m], > 0.
    height : array_like
        Height fallen [m], > 0.
    time : array_like
        Time taken [s], > 0, longer than free fall.

    Returns
    -------
    ndarray
        Moment of inertia [kg m²].

    Raises
    ------
    ValueError
        An argument is not positive, or the fall is quicker than a free one.

    Examples
    --------
    >>> print(f"{falling_weight_inertia(2.0, 0.05, height=1.0, time=4.0):.4f}")
    0.3873
    """
    ratio = 9.80665 * positive("time", time, "s") ** 2 / (2.0 * positive("height", height, "m"))
    if np.any(ratio <= 1.0):
        raise ValueError("time: accepted is longer than free fall over this height")
    return positive("weight", weight, "kg") * positive("radius", radius, "m") ** 2 * (ratio - 1.0)
