"""Stress from rotation and the margin to bursting."""

from __future__ import annotations

import numpy as np

from spinhazard.facts.fact import fact
from spinhazard.facts.shapes import optional
from spinhazard.facts.sheet import FactSheet
from spinhazard.facts.subject import Subject
from spinhazard.mechanics import strength
from spinhazard.sampling import Samples
from spinhazard.statement.materials import materials

ROUND = ("disk", "ring")
"""Shapes that the formulas for flat disks and annuli describe."""


@fact(per="part", unit="Pa", symbol="σ_t", formulas=[strength.thin_rim_stress])
def rim_stress(sheet: FactSheet, part: Subject) -> Samples | None:
    """Hoop stress of a thin rim of this material at the part's outermost point, in running."""
    return _thin_rim(sheet, part, "tip_speed")


@fact(per="part", unit="Pa", symbol="σ_t,max", formulas=[strength.thin_rim_stress])
def rim_stress_at_max_speed(sheet: FactSheet, part: Subject) -> Samples | None:
    """Hoop stress of a thin rim of this material at the part's outermost point, at the highest attainable speed."""
    return _thin_rim(sheet, part, "tip_speed_at_max_speed")


def _thin_rim(sheet: FactSheet, part: Subject, speed: str) -> Samples | None:
    if part.entity.shape not in (*ROUND, "torus", "cone", "profile"):
        return None
    density = sheet.where_applies("density", part)
    if density is None:
        return sheet.missing(f"{part.path}.material")
    return sheet.apply(strength.thin_rim_stress, density, sheet(speed, part))


@fact(per="part", unit="Pa", symbol="σ", formulas=[strength.solid_disk_stress, strength.bored_disk_stress])
def peak_stress_at_max_speed(sheet: FactSheet, part: Subject) -> Samples | None:
    """Largest elastic stress of a disk or ring of even thickness, at the highest attainable speed."""
    if part.entity.shape not in ROUND:
        return None
    density, poisson = sheet.where_applies("density", part), _figure(sheet, part, "poisson")
    if density is None or poisson is None:
        return sheet.missing(f"{part.path}.material")
    bore = _bore_radius(sheet, part)
    speed = sheet("shaft_max_speed", part.parent)
    if bore.max() == 0.0:
        return sheet.apply(
            strength.solid_disk_stress, density, speed, radius=sheet("tip_radius", part), poisson=poisson
        )
    return sheet.apply(
        strength.bored_disk_stress, density, speed, radius=sheet("tip_radius", part), bore_radius=bore, poisson=poisson
    )


@fact(per="part", unit="Pa", symbol="σ_mean", formulas=[strength.mean_hoop_stress])
def mean_hoop_stress(sheet: FactSheet, part: Subject) -> Samples | None:
    """Mean hoop stress over the section of a disk or ring of even thickness, at the highest attainable speed."""
    if part.entity.shape not in ROUND:
        return None
    density = sheet.where_applies("density", part)
    if density is None:
        return sheet.missing(f"{part.path}.material")
    return sheet.apply(
        strength.mean_hoop_stress, density, sheet("shaft_max_speed", part.parent),
        radius=sheet("tip_radius", part), bore_radius=_bore_radius(sheet, part),
    )  # fmt: skip


def _bore_radius(sheet: FactSheet, part: Subject) -> Samples:
    return optional(sheet, part, "bore" if part.entity.shape == "disk" else "inner_diameter") / 2.0


def _figure(sheet: FactSheet, part: Subject, key: str) -> Samples | None:
    if part.entity.material is None:
        return None
    figure = getattr(materials()[part.entity.material], key)
    if figure is None:
        return None
    sheet.note(f"material {part.entity.material}: {key}")
    return np.array([figure])


@fact(per="part", unit="Pa", symbol="σ_u")
def ultimate_strength(sheet: FactSheet, part: Subject) -> Samples | None:
    """Ultimate tensile strength, as stated or of the material in the table."""
    if part.entity.shape not in ROUND:
        return None
    if part.entity.strength is not None:
        return sheet.value(part, "strength")
    figure = _figure(sheet, part, "ultimate_strength")
    return sheet.missing(f"{part.path}.strength") if figure is None else figure


@fact(per="part", unit="Pa", symbol="σ_y")
def yield_strength(sheet: FactSheet, part: Subject) -> Samples | None:
    """Yield strength of the material in the table."""
    if part.entity.shape not in ROUND:
        return None
    if part.entity.material is None:
        return sheet.missing(f"{part.path}.material")
    return _figure(sheet, part, "yield_strength")


@fact(per="part", symbol="σ/σ_y", equation="σ / σ_y", source="timoshenko-som2")
def yield_share(sheet: FactSheet, part: Subject) -> Samples | None:
    """Largest elastic stress at the highest attainable speed over yield strength."""
    limit = sheet.where_applies("yield_strength", part)
    if limit is None:  # grey iron has no yield point; there is nothing to compare and nothing missing
        return None
    stress = sheet.where_applies("peak_stress_at_max_speed", part)
    return None if stress is None else stress / limit


@fact(per="part", unit="rad/s", symbol="ω_b", formulas=[strength.burst_speed])
def burst_speed(sheet: FactSheet, part: Subject) -> Samples | None:
    """Speed at which the mean hoop stress would reach the policy's share of the ultimate strength."""
    stress = sheet.where_applies("mean_hoop_stress", part)
    limit = sheet.where_applies("ultimate_strength", part)
    if stress is None or limit is None:
        return None
    return sheet.apply(
        strength.burst_speed,
        sheet("shaft_max_speed", part.parent),
        limit,
        mean_stress=stress,
        burst_factor=sheet.policy("burst_factor"),
    )


@fact(per="part", symbol="ω_b/ω_max", formulas=[strength.speed_margin])
def burst_speed_margin(sheet: FactSheet, part: Subject) -> Samples | None:
    """Burst speed over highest attainable speed."""
    speed = sheet.where_applies("burst_speed", part)
    return None if speed is None else sheet.apply(strength.speed_margin, speed, sheet("shaft_max_speed", part.parent))
