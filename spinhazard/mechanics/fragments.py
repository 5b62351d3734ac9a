"""Pieces that come off a rotor: radius, speed, energy, unbalance left behind, and perforation of steel plate. Screening only."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from spinhazard.mechanics.arrays import Array, below, not_negative, positive
from spinhazard.mechanics.formula import formula

WORST_SECTOR_ANGLE = 2.0 * 1.1655611852072114
"""Angle of the sector that leaves with most translational energy [rad]: twice the root of tan x = 2x, 133.563°.

The energy goes with θ (sin(θ/2)/(θ/2))²; its derivative is zero where tan(θ/2) = θ."""
_FOOT_POUND = 1.3558179483314004
_INCH = 0.0254
_PSI = 6894.757293168361
DESIGN_FACTOR = 1.25


@formula(
    equation="r_c = 2*(R**2 + R*r + r**2)/(3*(R + r))*sin(theta/2)/(theta/2)", unit="m",
    symbols={"outer_radius": "R", "inner_radius": "r", "angle": "theta"}, source="spinhazard-methods fragments",
)  # fmt: skip
def sector_centroid_radius(outer_radius: ArrayLike, inner_radius: ArrayLike, *, angle: ArrayLike) -> Array:
    """Distance of a sector's centre of mass from the axis: ⅔ (R³ − r³)/(R² − r²) with the factor R − r divided out.

    Parameters
    ----------
    outer_radius, inner_radius : array_like
        Radii of disk or ring [m], inner below outer.
    angle : array_like
        Angle of the sector [rad], > 0, at most 2π.

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
    >>> print(f"{sector_centroid_radius(0.6, 0.0, angle=np.pi):.6f}")
    0.254648
    """
    outer, half = positive("outer_radius", outer_radius, "m"), positive("angle", angle, "rad") / 2.0
    if np.any(half > np.pi * (1.0 + 1e-12)):
        raise ValueError("angle: accepted is at most 2π rad")
    inner = below("inner_radius", not_negative("inner_radius", inner_radius, "m"), "outer_radius", outer, "m")
    return 2.0 / 3.0 * (outer**2 + outer * inner + inner**2) / (outer + inner) * np.sin(half) / half


@formula(
    equation="m_f = m*theta/(2*pi)",
    unit="kg",
    symbols={"mass": "m", "angle": "theta"},
    source="spinhazard-methods fragments",
)
def sector_mass(mass: ArrayLike, angle: ArrayLike) -> Array:
    """Mass of a sector of a disk or ring.

    Parameters
    ----------
    mass : array_like
        Mass of the whole [kg], >= 0.
    angle : array_like
        Angle of the sector [rad], > 0.

    Returns
    -------
    ndarray
        Mass [kg].

    Raises
    ------
    ValueError
        An argument is out of its range.

    Examples
    --------
    >>> print(sector_mass(12.0, np.pi / 2.0))
    3.0
    """  # noqa: DOC502
    return not_negative("mass", mass, "kg") * positive("angle", angle, "rad") / (2.0 * np.pi)


@formula(
    equation="v_f = omega*r_c", unit="m/s", symbols={"speed": "omega", "radius": "r_c"}, source="openstax-up1 §10.3"
)
def fragment_speed(speed: ArrayLike, radius: ArrayLike) -> Array:
    """Speed at which a loose piece leaves, along the tangent: that of its centre of mass while it was still held.

    Parameters
    ----------
    speed : array_like
        Speed of the shaft [rad/s], >= 0.
    radius : array_like
        Distance of the piece's centre of mass from the axis [m], >= 0.

    Returns
    -------
    ndarray
        Speed [m/s].

    Raises
    ------
    ValueError
        An argument is negative.

    Examples
    --------
    >>> print(fragment_speed(155.0, 0.4))
    62.0
    """  # noqa: DOC502
    return not_negative("speed", speed, "rad/s") * not_negative("radius", radius, "m")


@formula(equation="E_f = m_f*v_f**2/2", unit="J", symbols={"mass": "m_f", "speed": "v_f"}, source="openstax-up1 §7.2")
def fragment_energy(mass: ArrayLike, speed: ArrayLike) -> Array:
    """Translational energy of a loose piece.

    Parameters
    ----------
    mass : array_like
        Mass of the piece [kg], >= 0.
    speed : array_like
        Its speed [m/s], >= 0.

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
    >>> print(fragment_energy(2.0, 10.0))
    100.0
    """  # noqa: DOC502
    return not_negative("mass", mass, "kg") * not_negative("speed", speed, "m/s") ** 2 / 2.0


@formula(
    equation="F = m*r*omega**2",
    unit="N",
    symbols={"mass": "m", "radius": "r", "speed": "omega"},
    source="openstax-up1 §6.3",
)
def unbalance_force(mass: ArrayLike, radius: ArrayLike, *, speed: ArrayLike) -> Array:
    """Rotating force on the shaft after a piece is lost.

    Parameters
    ----------
    mass : array_like
        Mass of the lost piece [kg], >= 0.
    radius : array_like
        Distance of its centre of mass from the axis [m], >= 0.
    speed : array_like
        Speed [rad/s], >= 0.

    Returns
    -------
    ndarray
        Force [N].

    Raises
    ------
    ValueError
        An argument is negative.

    Examples
    --------
    >>> print(unbalance_force(2.0, 0.5, speed=100.0))
    10000.0
    """  # noqa: DOC502
    return (
        not_negative("mass", mass, "kg")
        * not_negative("radius", radius, "m")
        * not_negative("speed", speed, "rad/s") ** 2
    )


@formula(equation="D = sqrt(4*A/pi)", unit="m", symbols={"area": "A"}, source="practice perforation formulas")
def equivalent_diameter(area: ArrayLike) -> Array:
    """Diameter of the round face of the same area as the face that hits.

    Parameters
    ----------
    area : array_like
        Area of the face [m²], > 0.

    Returns
    -------
    ndarray
        Diameter [m].

    Raises
    ------
    ValueError
        The area is not positive.

    Examples
    --------
    >>> print(equivalent_diameter(np.pi))
    2.0
    """  # noqa: DOC502
    return np.sqrt(4.0 * positive("area", area, "m²") / np.pi)


_PERFORATION: float = 672.0 * _FOOT_POUND ** (2.0 / 3.0) / _INCH**2  # T[in] = E[ft lbf]^(2/3)/(672 D[in]) brought to SI


@formula(
    equation="T = E**(2/3)/(1275957.16*D)", unit="m", symbols={"energy": "E", "diameter": "D"}, source="bc-top-9a §2"
)
def perforation_thickness(energy: ArrayLike, diameter: ArrayLike) -> Array:
    """Thickness of steel plate that a piece just perforates, Ballistic Research Laboratory form.

    T = E^(2/3)/(672 D) with E in ft lbf, D and T in inches; the coefficient here is the same one in SI units.

    Parameters
    ----------
    energy : array_like
        Translational energy of the piece [J], >= 0.
    diameter : array_like
        Diameter of its smallest face [m], > 0.

    Returns
    -------
    ndarray
        Thickness [m].

    Raises
    ------
    ValueError
        An argument is out of its range.

    Examples
    --------
    >>> print(f"{perforation_thickness(1000.0, 0.05) * 1000.0:.4f}")
    1.5675
    """  # noqa: DOC502
    return not_negative("energy", energy, "J") ** (2.0 / 3.0) / (_PERFORATION * positive("diameter", diameter, "m"))


@formula(equation="T_d = 1.25*T", unit="m", symbols={"thickness": "T"}, source="bc-top-9a §2")
def design_thickness(thickness: ArrayLike) -> Array:
    """Thickness asked for: that of just-perforation times 1.25.

    Parameters
    ----------
    thickness : array_like
        Thickness that is just perforated [m], >= 0.

    Returns
    -------
    ndarray
        Thickness [m].

    Raises
    ------
    ValueError
        The thickness is negative.

    Examples
    --------
    >>> print(design_thickness(0.004))
    0.005
    """  # noqa: DOC502
    return DESIGN_FACTOR * not_negative("thickness", thickness, "m")


@formula(
    equation="see method: fragments",
    unit="m",
    symbols={"energy": "E", "diameter": "D", "strength": "S", "span": "W"},
    source="bc-top-9a §2",
)
def stanford_perforation_thickness(
    energy: ArrayLike, diameter: ArrayLike, *, strength: ArrayLike, span: ArrayLike
) -> Array:
    """Thickness of steel plate that a piece just perforates, Stanford Research Institute form.

    E/D = (S/46 500)(16 000 T² + 1 500 (W/4) T) with E in ft lbf, lengths in inches, S in psi; the positive root.

    Parameters
    ----------
    energy : array_like
        Translational energy of the piece [J], >= 0.
    diameter : array_like
        Diameter of its smallest face [m], > 0.
    strength : array_like
        Ultimate tensile strength of the plate [Pa], > 0.
    span : array_like
        Free span of the plate [m], > 0.

    Returns
    -------
    ndarray
        Thickness [m].

    Raises
    ------
    ValueError
        An argument is out of its range.

    Examples
    --------
    >>> print(f"{stanford_perforation_thickness(1000.0, 0.05, strength=58000 * 6894.757293168361, span=8 * 0.0254) * 1000.0:.4f}")
    1.8357
    """  # noqa: DOC502
    energy_foot_pound = not_negative("energy", energy, "J") / _FOOT_POUND
    diameter_inch, span_inch = positive("diameter", diameter, "m") / _INCH, positive("span", span, "m") / _INCH
    load = energy_foot_pound / diameter_inch * 46500.0 / (positive("strength", strength, "Pa") / _PSI)
    linear = 1500.0 * span_inch / 4.0
    thickness_inch = 2.0 * load / (linear + np.sqrt(linear**2 + 4.0 * 16000.0 * load))
    return thickness_inch * _INCH
