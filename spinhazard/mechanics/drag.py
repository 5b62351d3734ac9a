"""Drag torque from power losses, from a measured stop, and of a disk in air."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from spinhazard.mechanics.arrays import Array, not_negative, positive
from spinhazard.mechanics.formula import formula

LAMINAR_LIMIT = 3.0e5
"""Reynolds number above which the boundary layer on a free disk is taken as turbulent (Schlichting; from memory)."""


@formula(equation="a = P/omega", unit="N m", symbols={"power": "P", "speed": "omega"}, source="openstax-up1 §10.8")
def torque_from_power(power: ArrayLike, speed: ArrayLike) -> Array:
    """Torque that takes a power at a speed.

    Parameters
    ----------
    power : array_like
        Power [W], >= 0.
    speed : array_like
        Speed at which it was read [rad/s], > 0.

    Returns
    -------
    ndarray
        Torque [N m].

    Raises
    ------
    ValueError
        The power is negative, or the speed is not positive.

    Examples
    --------
    >>> print(torque_from_power(310.0, 155.0))
    2.0
    """  # noqa: DOC502
    return not_negative("power", power, "W") / positive("speed", speed, "rad/s")


@formula(
    equation="b = P/omega**2", unit="N m s", symbols={"power": "P", "speed": "omega"}, source="spinhazard-methods drag"
)
def linear_drag_from_power(power: ArrayLike, speed: ArrayLike) -> Array:
    """Coefficient of a drag torque that grows with speed, from the power it takes at one speed.

    Parameters
    ----------
    power : array_like
        Power [W], >= 0.
    speed : array_like
        Speed at which it was read [rad/s], > 0.

    Returns
    -------
    ndarray
        Coefficient b [N m s].

    Raises
    ------
    ValueError
        The power is negative, or the speed is not positive.

    Examples
    --------
    >>> print(linear_drag_from_power(400.0, 100.0))
    0.04
    """  # noqa: DOC502
    return not_negative("power", power, "W") / positive("speed", speed, "rad/s") ** 2


@formula(
    equation="c = P/omega**3", unit="N m s²", symbols={"power": "P", "speed": "omega"}, source="spinhazard-methods drag"
)
def fan_drag_from_power(power: ArrayLike, speed: ArrayLike) -> Array:
    """Coefficient of a windage torque from the power it takes at one speed (fan law: power grows with speed cubed).

    Parameters
    ----------
    power : array_like
        Power [W], >= 0.
    speed : array_like
        Speed at which it was read [rad/s], > 0.

    Returns
    -------
    ndarray
        Coefficient c [N m s²].

    Raises
    ------
    ValueError
        The power is negative, or the speed is not positive.

    Examples
    --------
    >>> print(fan_drag_from_power(4000.0, 100.0))
    0.004
    """  # noqa: DOC502
    return not_negative("power", power, "W") / positive("speed", speed, "rad/s") ** 3


@formula(
    equation="a = J*omega/t",
    unit="N m",
    symbols={"inertia": "J", "speed": "omega", "time": "t"},
    source="spinhazard-methods drag",
)
def friction_from_stop_time(inertia: ArrayLike, speed: ArrayLike, *, time: ArrayLike) -> Array:
    """Constant torque that gives the same stopping time as a measured coast.

    Under a drag that grows with speed, speed against time is convex and lies below the straight line of a constant torque
    with the same end; and a braked stop computed with this constant torque is never shorter than the true one (Jensen's
    inequality). Both the speed at access and braked stops are therefore upper bounds.

    Parameters
    ----------
    inertia : array_like
        Moment of inertia [kg m²], > 0.
    speed : array_like
        Speed at the start [rad/s], > 0.
    time : array_like
        Measured time to standstill [s], > 0.

    Returns
    -------
    ndarray
        Torque [N m].

    Raises
    ------
    ValueError
        An argument is not positive.

    Examples
    --------
    >>> print(friction_from_stop_time(1.9, 155.0, time=95.0))
    3.1
    """  # noqa: DOC502
    return positive("inertia", inertia, "kg m²") * positive("speed", speed, "rad/s") / positive("time", time, "s")


@formula(
    equation="T = a + b*omega + c*omega**2", unit="N m",
    symbols={"speed": "omega", "constant": "a", "linear": "b", "quadratic": "c"}, source="spinhazard-methods drag",
)  # fmt: skip
def total_drag_torque(speed: ArrayLike, constant: ArrayLike, *, linear: ArrayLike, quadratic: ArrayLike) -> Array:
    """Drag torque at a speed.

    Parameters
    ----------
    speed : array_like
        Speed [rad/s], >= 0.
    constant, linear, quadratic : array_like
        Coefficients [N m], [N m s], [N m s²], >= 0.

    Returns
    -------
    ndarray
        Torque [N m].

    Raises
    ------
    ValueError
        An argument is negative.

    Examples
    --------
    >>> print(total_drag_torque(100.0, 3.0, linear=0.01, quadratic=0.001))
    14.0
    """  # noqa: DOC502
    speed = not_negative("speed", speed, "rad/s")
    return (
        not_negative("constant", constant, "N m") + not_negative("linear", linear, "N m s") * speed
        + not_negative("quadratic", quadratic, "N m s²") * speed**2
    )  # fmt: skip


@formula(
    equation="Re = rho*omega*R**2/mu",
    unit="",
    symbols={"density": "rho", "speed": "omega", "radius": "R", "viscosity": "mu"},
    source="schlichting ch. 5",
)
def reynolds_number(density: ArrayLike, speed: ArrayLike, *, radius: ArrayLike, viscosity: ArrayLike) -> Array:
    """Reynolds number of a disk turning in a fluid.

    Parameters
    ----------
    density : array_like
        Density of the fluid [kg/m³], > 0.
    speed : array_like
        Speed [rad/s], >= 0.
    radius : array_like
        Radius of the disk [m], > 0.
    viscosity : array_like
        Dynamic viscosity [Pa s], > 0.

    Returns
    -------
    ndarray
        Reynolds number.

    Raises
    ------
    ValueError
        An argument is out of its range.

    Examples
    --------
    >>> print(f"{reynolds_number(1.2, 155.0, radius=0.6, viscosity=1.81e-5):.4g}")
    3.699e+06
    """  # noqa: DOC502
    return (
        positive("density", density, "kg/m³") * not_negative("speed", speed, "rad/s") * positive("radius", radius, "m") ** 2
        / positive("viscosity", viscosity, "Pa s")
    )  # fmt: skip


@formula(
    equation="see method: drag",
    unit="N m",
    symbols={"density": "rho", "speed": "omega", "radius": "R", "viscosity": "mu"},
    source="schlichting ch. 5, 21",
)
def disk_windage_torque(density: ArrayLike, speed: ArrayLike, *, radius: ArrayLike, viscosity: ArrayLike) -> Array:
    """Torque on both faces of a smooth disk turning freely in a fluid, T = C ½ρω²R⁵ (von Kármán).

    C = 3.87 Re^-½ below and 0.146 Re^-⅕ above the laminar limit.

    Parameters
    ----------
    density, speed, radius, viscosity : array_like
        As in :func:`reynolds_number`.

    Returns
    -------
    ndarray
        Torque [N m].

    Raises
    ------
    ValueError
        An argument is out of its range.

    Examples
    --------
    >>> print(f"{disk_windage_torque(1.2, 155.0, radius=0.6, viscosity=1.81e-5):.3f}")
    7.949
    """  # noqa: DOC502
    number = reynolds_number(density, speed, radius=radius, viscosity=viscosity)
    pressure = 0.5 * np.asarray(density, dtype=np.float64) * np.asarray(speed, dtype=np.float64) ** 2
    with np.errstate(divide="ignore", invalid="ignore"):
        coefficient = np.where(number < LAMINAR_LIMIT, 3.87 * number**-0.5, 0.146 * number**-0.2)
        torque = coefficient * pressure * np.asarray(radius, dtype=np.float64) ** 5
    return np.where(number == 0.0, 0.0, torque)


@formula(
    equation="M = mu*P*d/2",
    unit="N m",
    symbols={"coefficient": "mu", "load": "P", "bore": "d"},
    source="practice rolling bearings",
)
def bearing_friction_torque(coefficient: ArrayLike, load: ArrayLike, *, bore: ArrayLike) -> Array:
    """Friction torque of a rolling bearing from its load; coefficients of 0.001 to 0.005 are usual (common practice).

    Parameters
    ----------
    coefficient : array_like
        Friction coefficient, >= 0.
    load : array_like
        Bearing load [N], >= 0.
    bore : array_like
        Bore of the bearing [m], > 0.

    Returns
    -------
    ndarray
        Torque [N m].

    Raises
    ------
    ValueError
        An argument is out of its range.

    Examples
    --------
    >>> print(bearing_friction_torque(0.002, 10000.0, bore=0.1))
    1.0
    """  # noqa: DOC502
    return (
        not_negative("coefficient", coefficient, "")
        * not_negative("load", load, "N")
        * positive("bore", bore, "m")
        / 2.0
    )
