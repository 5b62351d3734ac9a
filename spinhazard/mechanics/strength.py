"""Stress from rotation in rims and disks of even thickness, and burst speed by the mean hoop stress."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from spinhazard.mechanics.arrays import Array, below, not_negative, positive
from spinhazard.mechanics.formula import formula


@formula(
    equation="sigma_t = rho*v**2", unit="Pa", symbols={"density": "rho", "speed": "v"}, source="timoshenko-som2 ch. VI"
)
def thin_rim_stress(density: ArrayLike, speed: ArrayLike) -> Array:
    """Hoop stress of a thin rim; it does not depend on the section or the radius, only on the rim speed.

    Parameters
    ----------
    density : array_like
        Density [kg/m³], > 0.
    speed : array_like
        Rim speed [m/s], >= 0.

    Returns
    -------
    ndarray
        Stress [Pa].

    Raises
    ------
    ValueError
        An argument is out of its range.

    Examples
    --------
    >>> print(thin_rim_stress(7850.0, 100.0))
    78500000.0
    """  # noqa: DOC502
    return positive("density", density, "kg/m³") * not_negative("speed", speed, "m/s") ** 2


@formula(
    equation="sigma = (3 + nu)*rho*omega**2*R**2/8", unit="Pa",
    symbols={"density": "rho", "speed": "omega", "radius": "R", "poisson": "nu"}, source="timoshenko-som2 ch. VI",
)  # fmt: skip
def solid_disk_stress(density: ArrayLike, speed: ArrayLike, *, radius: ArrayLike, poisson: ArrayLike) -> Array:
    """Largest stress of a solid disk of even thickness, at its centre.

    Parameters
    ----------
    density : array_like
        Density [kg/m³], > 0.
    speed : array_like
        Speed [rad/s], >= 0.
    radius : array_like
        Outer radius [m], > 0.
    poisson : array_like
        Poisson's ratio, >= 0.

    Returns
    -------
    ndarray
        Stress [Pa].

    Raises
    ------
    ValueError
        An argument is out of its range.

    Examples
    --------
    >>> print(f"{solid_disk_stress(7850.0, 100.0, radius=1.0, poisson=0.3):.0f}")
    32381250
    """  # noqa: DOC502
    rim = positive("radius", radius, "m") * not_negative("speed", speed, "rad/s")
    return (3.0 + not_negative("poisson", poisson, "")) * positive("density", density, "kg/m³") * rim**2 / 8.0


@formula(
    equation="sigma = rho*omega**2*((3 + nu)*R**2 + (1 - nu)*r**2)/4", unit="Pa",
    symbols={"density": "rho", "speed": "omega", "radius": "R", "bore_radius": "r", "poisson": "nu"}, source="timoshenko-som2 ch. VI",
)  # fmt: skip
def bored_disk_stress(
    density: ArrayLike, speed: ArrayLike, *, radius: ArrayLike, bore_radius: ArrayLike, poisson: ArrayLike
) -> Array:
    """Largest stress of a bored disk of even thickness, at the bore; any hole, however small, doubles that of a solid disk.

    Parameters
    ----------
    density : array_like
        Density [kg/m³], > 0.
    speed : array_like
        Speed [rad/s], >= 0.
    radius, bore_radius : array_like
        Outer and bore radius [m], bore below outer.
    poisson : array_like
        Poisson's ratio, >= 0.

    Returns
    -------
    ndarray
        Stress [Pa].

    Raises
    ------
    ValueError
        An argument is out of its range.

    Examples
    --------
    >>> print(f"{bored_disk_stress(7850.0, 100.0, radius=1.0, bore_radius=0.1, poisson=0.3):.0f}")
    64899875
    """  # noqa: DOC502
    outer = positive("radius", radius, "m")
    inner = below("bore_radius", not_negative("bore_radius", bore_radius, "m"), "radius", outer, "m")
    nu = not_negative("poisson", poisson, "")
    squares = (3.0 + nu) * outer**2 + (1.0 - nu) * inner**2
    return positive("density", density, "kg/m³") * not_negative("speed", speed, "rad/s") ** 2 * squares / 4.0


@formula(
    equation="sigma_m = rho*omega**2*(R**2 + R*r + r**2)/3", unit="Pa",
    symbols={"density": "rho", "speed": "omega", "radius": "R", "bore_radius": "r"}, source="robinson-1944",
)  # fmt: skip
def mean_hoop_stress(density: ArrayLike, speed: ArrayLike, *, radius: ArrayLike, bore_radius: ArrayLike) -> Array:
    """Hoop stress of a flat annulus, averaged over its section: the force on a diametral cut over the area of the cut.

    Parameters
    ----------
    density : array_like
        Density [kg/m³], > 0.
    speed : array_like
        Speed [rad/s], >= 0.
    radius, bore_radius : array_like
        Outer and bore radius [m], bore below outer.

    Returns
    -------
    ndarray
        Stress [Pa].

    Raises
    ------
    ValueError
        An argument is out of its range.

    Examples
    --------
    >>> print(f"{mean_hoop_stress(7850.0, 100.0, radius=1.0, bore_radius=0.0):.0f}")
    26166667
    """  # noqa: DOC502
    outer = positive("radius", radius, "m")
    inner = below("bore_radius", not_negative("bore_radius", bore_radius, "m"), "radius", outer, "m")
    squares = outer**2 + outer * inner + inner**2
    return positive("density", density, "kg/m³") * not_negative("speed", speed, "rad/s") ** 2 * squares / 3.0


@formula(
    equation="omega_b = omega*sqrt(f*sigma_u/sigma_m)", unit="rad/s",
    symbols={"speed": "omega", "strength": "sigma_u", "mean_stress": "sigma_m", "burst_factor": "f"}, source="robinson-1944",
)  # fmt: skip
def burst_speed(speed: ArrayLike, strength: ArrayLike, *, mean_stress: ArrayLike, burst_factor: ArrayLike) -> Array:
    """Speed at which the mean hoop stress reaches a share of the ultimate strength (Robinson's criterion).

    Parameters
    ----------
    speed : array_like
        Speed at which `mean_stress` holds [rad/s], > 0.
    strength : array_like
        Ultimate tensile strength [Pa], > 0.
    mean_stress : array_like
        Mean hoop stress [Pa], > 0.
    burst_factor : array_like
        Share of the strength, usually 0.75 to 1, > 0.

    Returns
    -------
    ndarray
        Burst speed [rad/s].

    Raises
    ------
    ValueError
        An argument is not positive.

    Examples
    --------
    >>> print(burst_speed(100.0, 400e6, mean_stress=75e6, burst_factor=0.75))
    200.0
    """  # noqa: DOC502
    share = (
        positive("burst_factor", burst_factor, "")
        * positive("strength", strength, "Pa")
        / positive("mean_stress", mean_stress, "Pa")
    )
    return positive("speed", speed, "rad/s") * np.sqrt(share)


@formula(
    equation="n = omega_b/omega_max",
    unit="",
    symbols={"burst_speed": "omega_b", "highest_speed": "omega_max"},
    source="robinson-1944",
)
def speed_margin(burst_speed: ArrayLike, highest_speed: ArrayLike) -> Array:
    """Burst speed over highest attainable speed.

    Parameters
    ----------
    burst_speed : array_like
        Burst speed [rad/s], > 0.
    highest_speed : array_like
        Highest attainable speed [rad/s], > 0.

    Returns
    -------
    ndarray
        Margin.

    Raises
    ------
    ValueError
        An argument is not positive.

    Examples
    --------
    >>> print(speed_margin(300.0, 150.0))
    2.0
    """  # noqa: DOC502
    return positive("burst_speed", burst_speed, "rad/s") / positive("highest_speed", highest_speed, "rad/s")
