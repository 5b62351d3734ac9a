"""Energy, momentum and speed of points of a rigid body turning about a fixed axis."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from spinhazard.mechanics.arrays import Array, not_negative, positive
from spinhazard.mechanics.formula import formula


@formula(equation="E = J*omega**2/2", unit="J", symbols={"inertia": "J", "speed": "omega"}, source="openstax-up1 §10.4")
def rotational_energy(inertia: ArrayLike, speed: ArrayLike) -> Array:
    """Kinetic energy of a rigid body turning about a fixed axis.

    Parameters
    ----------
    inertia : array_like
        Moment of inertia about the axis [kg m²], >= 0.
    speed : array_like
        Angular speed [rad/s]; the sign is ignored.

    Returns
    -------
    ndarray
        Energy [J].

    Raises
    ------
    ValueError
        The inertia is negative.

    Examples
    --------
    >>> print(rotational_energy(1.9, 155.0))
    22823.75
    """  # noqa: DOC502
    return not_negative("inertia", inertia, "kg m²") * np.asarray(speed, dtype=np.float64) ** 2 / 2.0


@formula(
    equation="L = J*omega", unit="kg m²/s", symbols={"inertia": "J", "speed": "omega"}, source="openstax-up1 §11.2"
)
def angular_momentum(inertia: ArrayLike, speed: ArrayLike) -> Array:
    """Angular momentum of a rigid body about its axis.

    Parameters
    ----------
    inertia : array_like
        Moment of inertia about the axis [kg m²], >= 0.
    speed : array_like
        Angular speed [rad/s].

    Returns
    -------
    ndarray
        Angular momentum [kg m²/s].

    Raises
    ------
    ValueError
        The inertia is negative.

    Examples
    --------
    >>> print(angular_momentum(1.9, 155.0))
    294.5
    """  # noqa: DOC502
    return not_negative("inertia", inertia, "kg m²") * np.asarray(speed, dtype=np.float64)


@formula(equation="v = omega*R", unit="m/s", symbols={"speed": "omega", "radius": "R"}, source="openstax-up1 §10.3")
def tip_speed(speed: ArrayLike, radius: ArrayLike) -> Array:
    """Speed of a point of a turning body; the outermost point is the fastest.

    Parameters
    ----------
    speed : array_like
        Angular speed [rad/s].
    radius : array_like
        Distance of the point from the axis [m], >= 0.

    Returns
    -------
    ndarray
        Speed [m/s].

    Raises
    ------
    ValueError
        The radius is negative.

    Examples
    --------
    >>> print(tip_speed(155.0, 0.6))
    93.0
    """  # noqa: DOC502
    return np.asarray(speed, dtype=np.float64) * not_negative("radius", radius, "m")


@formula(
    equation="omega = sqrt(2*E/J)", unit="rad/s", symbols={"energy": "E", "inertia": "J"}, source="openstax-up1 §10.4"
)
def speed_from_energy(energy: ArrayLike, inertia: ArrayLike) -> Array:
    """Speed at which a body stores a given energy.

    Parameters
    ----------
    energy : array_like
        Energy [J], >= 0.
    inertia : array_like
        Moment of inertia [kg m²], > 0.

    Returns
    -------
    ndarray
        Angular speed [rad/s].

    Raises
    ------
    ValueError
        The energy is negative, or the inertia is not positive.

    Examples
    --------
    >>> print(speed_from_energy(10.0, 5.0))
    2.0
    """  # noqa: DOC502
    return np.sqrt(2.0 * not_negative("energy", energy, "J") / positive("inertia", inertia, "kg m²"))


@formula(
    equation="k = sqrt(J/m)", unit="m", symbols={"inertia": "J", "mass": "m"}, source="beer-johnston-dynamics app. B"
)
def gyration_radius(inertia: ArrayLike, mass: ArrayLike) -> Array:
    """Radius at which all mass would give the same inertia.

    Parameters
    ----------
    inertia : array_like
        Moment of inertia [kg m²], >= 0.
    mass : array_like
        Mass [kg], > 0.

    Returns
    -------
    ndarray
        Radius of gyration [m].

    Raises
    ------
    ValueError
        The inertia is negative, or the mass is not positive.

    Examples
    --------
    >>> print(gyration_radius(18.0, 2.0))
    3.0
    """  # noqa: DOC502
    return np.sqrt(not_negative("inertia", inertia, "kg m²") / positive("mass", mass, "kg"))
