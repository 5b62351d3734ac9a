"""Heat of a brake during a stop, and the temperature rise it causes."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from spinhazard.mechanics.arrays import Array, not_negative, positive
from spinhazard.mechanics.formula import formula


@formula(equation="Q = T*theta", unit="J", symbols={"torque": "T", "angle": "theta"}, source="openstax-up1 §10.8")
def brake_heat(torque: ArrayLike, angle: ArrayLike) -> Array:
    """Work of a constant braking torque over the angle turned, all of it heat.

    Parameters
    ----------
    torque : array_like
        Braking torque [N m], >= 0.
    angle : array_like
        Angle turned while it acts [rad], >= 0.

    Returns
    -------
    ndarray
        Heat [J].

    Raises
    ------
    ValueError
        An argument is negative.

    Examples
    --------
    >>> print(brake_heat(180.0, 100.0))
    18000.0
    """  # noqa: DOC502
    return not_negative("torque", torque, "N m") * not_negative("angle", angle, "rad")


@formula(
    equation="Q = J*(omega_0**2 - omega_1**2)/2 - W", unit="J",
    symbols={"inertia": "J", "start_speed": "omega_0", "end_speed": "omega_1", "drag_work": "W"}, source="openstax-up1 §10.8",
)  # fmt: skip
def absorbed_energy(
    inertia: ArrayLike, start_speed: ArrayLike, *, end_speed: ArrayLike, drag_work: ArrayLike = 0.0
) -> Array:
    """Energy a brake takes from a rotor between two speeds, less the work of the drag.

    Parameters
    ----------
    inertia : array_like
        Moment of inertia [kg m²], >= 0.
    start_speed, end_speed : array_like
        Speeds [rad/s], >= 0.
    drag_work : array_like
        Work of the drag over the same time [J], >= 0.

    Returns
    -------
    ndarray
        Energy [J].

    Raises
    ------
    ValueError
        An argument is negative.

    Examples
    --------
    >>> print(absorbed_energy(2.0, 10.0, end_speed=0.0, drag_work=20.0))
    80.0
    """  # noqa: DOC502
    start, end = not_negative("start_speed", start_speed, "rad/s"), not_negative("end_speed", end_speed, "rad/s")
    stored = not_negative("inertia", inertia, "kg m²") * (start - end) * (start + end) / 2.0
    return stored - not_negative("drag_work", drag_work, "J")


@formula(
    equation="Delta_T = Q/(m*c)",
    unit="K",
    symbols={"heat": "Q", "mass": "m", "specific_heat": "c"},
    source="openstax-up2 §1.4",
)
def temperature_rise(heat: ArrayLike, mass: ArrayLike, *, specific_heat: ArrayLike) -> Array:
    """Mean temperature rise of a drum or disc that keeps all the heat: an upper bound of its mean, not of its surface.

    Parameters
    ----------
    heat : array_like
        Heat [J], >= 0.
    mass : array_like
        Mass of drum or disc [kg], > 0.
    specific_heat : array_like
        Specific heat [J/(kg K)], > 0.

    Returns
    -------
    ndarray
        Temperature rise [K].

    Raises
    ------
    ValueError
        The heat is negative, or mass or specific heat is not positive.

    Examples
    --------
    >>> print(temperature_rise(49000.0, 10.0, specific_heat=490.0))
    10.0
    """  # noqa: DOC502
    capacity = positive("mass", mass, "kg") * positive("specific_heat", specific_heat, "J/(kg K)")
    return np.asarray(not_negative("heat", heat, "J") / capacity)
