"""Mass, inertia, speed and energy of parts, shafts and the machine."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from spinhazard.facts.fact import Word, fact
from spinhazard.facts.shapes import INERTIA, TIP_RADIUS, VOLUME
from spinhazard.facts.sheet import FactSheet
from spinhazard.facts.subject import Subject
from spinhazard.mechanics import energy, pendulum, volume
from spinhazard.mechanics import inertia as moments
from spinhazard.sampling import Samples, largest
from spinhazard.statement.materials import materials


@fact(per="machine", word=True)
def machine_kind(sheet: FactSheet, machine: Subject) -> Word | None:
    """Kind of machine."""
    return sheet.word(machine, "kind")


@fact(per="part", word=True)
def part_material(sheet: FactSheet, part: Subject) -> Word | None:
    """Material of the part."""
    return None if part.entity.material is None else sheet.word(part, "material")


@fact(per="part", word=True)
def part_shape(sheet: FactSheet, part: Subject) -> Word | None:
    """Shape of the part."""
    return sheet.word(part, "shape")


@fact(per="part", unit="m³", symbol="V")
def piece_volume(sheet: FactSheet, part: Subject) -> Samples | None:
    """Volume of one piece, from its dimensions."""
    by_shape = VOLUME.get(part.entity.shape)
    return None if by_shape is None else by_shape(sheet, part)


@fact(per="part", unit="kg/m³", symbol="ρ", formulas=[volume.density_from_mass])
def density(sheet: FactSheet, part: Subject) -> Samples | None:
    """Density of the part's material: as stated, of the named material, or from mass and volume."""
    if part.entity.density is not None:
        return sheet.value(part, "density")
    if part.entity.material is not None:
        return _table(sheet, part, "density")
    return sheet.where_applies("implied_density", part)


@fact(per="part", unit="kg/m³", symbol="ρ", formulas=[volume.density_from_mass])
def implied_density(sheet: FactSheet, part: Subject) -> Samples | None:
    """Density that mass and dimensions imply."""
    if part.entity.mass is None or not sheet.is_known("piece_volume", part):
        return None
    return sheet.apply(volume.density_from_mass, sheet.value(part, "mass"), sheet("piece_volume", part))


@fact(per="part", unit="kg/m³", symbol="ρ")
def expected_density(sheet: FactSheet, part: Subject) -> Samples | None:
    """Density stated for the part, or of its material in the table."""
    if part.entity.density is not None:
        return sheet.value(part, "density")
    return _table(sheet, part, "density") if part.entity.material is not None else None


@fact(per="part", symbol="|ρ/ρ₀ − 1|", equation="|ρ/ρ₀ − 1|", source="practice")
def density_departure(sheet: FactSheet, part: Subject) -> Samples | None:
    """How far the density that mass and dimensions imply lies from the expected one."""
    implied, expected = sheet.where_applies("implied_density", part), sheet.where_applies("expected_density", part)
    return None if implied is None or expected is None else np.abs(implied / expected - 1.0)


def _table(sheet: FactSheet, part: Subject, key: str) -> Samples | None:
    """A figure of the table of materials; None where the table has none."""
    figure = getattr(materials()[part.entity.material], key)
    if figure is None:
        return None
    sheet.note(f"material {part.entity.material}: {key}")
    return np.array([figure])


@fact(per="part", unit="kg", symbol="m", formulas=[volume.mass_from_density])
def piece_mass(sheet: FactSheet, part: Subject) -> Samples:
    """Mass of one piece: as stated, or density times volume."""
    if part.entity.mass is not None:
        return sheet.value(part, "mass")
    if part.entity.shape not in VOLUME:
        return sheet.missing(f"{part.path}.mass")
    if part.entity.density is None and part.entity.material is None:
        return sheet.missing(f"{part.path}.mass", f"{part.path}.material")
    return sheet.apply(volume.mass_from_density, sheet("expected_density", part), sheet("piece_volume", part))


@fact(per="part", unit="kg", symbol="m", equation="m = N m₁", source="openstax-up1 §10.4")
def mass(sheet: FactSheet, part: Subject) -> Samples:
    """Mass of the part, all pieces together."""
    pieces: Samples = part.entity.count * sheet("piece_mass", part)
    return pieces


PIECE_FORMULAS: list[Callable[..., Samples]] = [
    moments.disk_inertia,
    moments.sphere_inertia,
    moments.crossways_rod_inertia,
    moments.plate_inertia,
    moments.frustum_inertia,
    moments.torus_inertia,
    moments.point_inertia,
    moments.revolved_inertia,
    moments.inertia_from_gd2,
    moments.inertia_from_wk2,
    pendulum.bifilar_inertia,
    pendulum.trifilar_inertia,
    pendulum.falling_weight_inertia,
]


@fact(
    per="part", unit="kg m²", symbol="J₁",
    formulas=PIECE_FORMULAS,
)  # fmt: skip
def piece_inertia(sheet: FactSheet, part: Subject) -> Samples:
    """Moment of inertia of one piece about its own axis parallel to the shaft (of a point: about the shaft)."""
    stated = part.entity
    if stated.shape != "stated":
        return INERTIA[stated.shape](sheet, part, sheet("piece_mass", part))
    if stated.gd2 is not None:
        return sheet.apply(moments.inertia_from_gd2, sheet.value(part, "gd2"))
    if stated.wk2 is not None:
        return sheet.apply(moments.inertia_from_wk2, sheet.value(part, "wk2"))
    return _measured_inertia(sheet, part) if stated.inertia is None else sheet.value(part, "inertia")


def _measured_inertia(sheet: FactSheet, part: Subject) -> Samples:
    """From a swing on cords or a falling weight."""

    def of(test: str, quantity: str) -> Samples:
        return sheet.draw(f"{part.path}.{test}.{quantity}", getattr(getattr(part.entity, test), quantity))

    if part.entity.bifilar is not None:
        mass, distance = sheet("piece_mass", part), of("bifilar", "distance")
        return sheet.apply(
            pendulum.bifilar_inertia, mass, distance, length=of("bifilar", "length"), period=of("bifilar", "period")
        )
    if part.entity.trifilar is not None:
        mass, radius = sheet("piece_mass", part), of("trifilar", "radius")
        return sheet.apply(
            pendulum.trifilar_inertia, mass, radius, length=of("trifilar", "length"), period=of("trifilar", "period")
        )
    weight, radius = of("falling_weight", "weight"), of("falling_weight", "radius")
    height, time = of("falling_weight", "height"), of("falling_weight", "time")
    return sheet.apply(pendulum.falling_weight_inertia, weight, radius, height=height, time=time)


@fact(
    per="part", unit="kg m²", symbol="J", formulas=[moments.offset_inertia, moments.pattern_inertia],
    equation="J = N (J₁ + m₁ h²)",
)  # fmt: skip
def inertia(sheet: FactSheet, part: Subject) -> Samples:
    """Moment of inertia of the part about the shaft, all pieces together (parallel-axis theorem)."""
    own = sheet("piece_inertia", part)
    if part.entity.offset is not None and part.entity.offset.value > 0.0:
        own = sheet.apply(moments.offset_inertia, own, sheet("piece_mass", part), offset=sheet.value(part, "offset"))
    return sheet.apply(moments.pattern_inertia, own, part.entity.count)


@fact(per="part", unit="m", symbol="R")
def tip_radius(sheet: FactSheet, part: Subject) -> Samples | None:
    """Distance of the part's outermost point from the shaft axis."""
    return TIP_RADIUS[part.entity.shape](sheet, part)


@fact(per="part", unit="m/s", symbol="v", formulas=[energy.tip_speed])
def tip_speed(sheet: FactSheet, part: Subject) -> Samples:
    """Speed of the part's outermost point."""
    return sheet.apply(energy.tip_speed, sheet("shaft_speed", part.parent), sheet("tip_radius", part))


@fact(per="part", unit="m/s", symbol="v_max", formulas=[energy.tip_speed])
def tip_speed_at_max_speed(sheet: FactSheet, part: Subject) -> Samples:
    """Speed of the part's outermost point at the highest attainable speed."""
    return sheet.apply(energy.tip_speed, sheet("shaft_max_speed", part.parent), sheet("tip_radius", part))


@fact(per="part", unit="J", symbol="E", formulas=[energy.rotational_energy])
def kinetic_energy(sheet: FactSheet, part: Subject) -> Samples:
    """Kinetic energy of the part."""
    return sheet.apply(energy.rotational_energy, sheet("inertia", part), sheet("shaft_speed", part.parent))


@fact(per="part", symbol="E/ΣE", equation="E / ΣE", source="openstax-up1 §10.4")
def energy_share(sheet: FactSheet, part: Subject) -> Samples:
    """Share of the machine's stored energy that is in this part."""
    return sheet("kinetic_energy", part) / sheet("stored_energy")


@fact(per="part", symbol="J/(m R²)", equation="J / (m R²)", source="spinhazard-methods inertia")
def inertia_ratio(sheet: FactSheet, part: Subject) -> Samples | None:
    """Inertia over mass times outermost radius squared; no body can exceed 1."""
    if part.entity.shape == "stated" and part.entity.mass is None:
        return None
    return sheet("inertia", part) / (sheet("mass", part) * sheet("tip_radius", part) ** 2)


@fact(per="part", unit="rad/s", symbol="ω_marked")
def marked_speed(sheet: FactSheet, part: Subject) -> Samples | None:
    """Largest speed marked on the part."""
    return None if part.entity.max_rated_speed is None else sheet.value(part, "max_rated_speed")


@fact(per="part", unit="rad/s", symbol="ω")
def part_speed(sheet: FactSheet, part: Subject) -> Samples:
    """Speed of the shaft the part is on."""
    return sheet("shaft_speed", part.parent)


@fact(per="part", unit="rad/s", symbol="ω_max")
def part_max_speed(sheet: FactSheet, part: Subject) -> Samples:
    """Highest attainable speed of the shaft the part is on."""
    return sheet("shaft_max_speed", part.parent)


@fact(per="part", unit="m/s", symbol="v_guide", source="practice")
def guide_speed(sheet: FactSheet, part: Subject) -> Samples | None:
    """Rim speed above which the trade asks for a calculation in this material."""
    return None if part.entity.material is None else _table(sheet, part, "guide_speed")


@fact(per="shaft", word=True)
def shaft_drive(sheet: FactSheet, shaft: Subject) -> Word | None:
    """What sets the speed of the shaft."""
    return sheet.word(shaft, "drive")


@fact(
    per="shaft", unit="rad/s", symbol="ω", equation="ω = i ω_driver, or as stated", source="spinhazard-methods inertia"
)
def shaft_speed(sheet: FactSheet, shaft: Subject) -> Samples:
    """Speed of the shaft in running: from the shaft it is coupled to and the ratio, or as stated."""
    if shaft.entity.driven_by is None:
        return sheet.value(shaft, "speed")
    driver = sheet.subjects.shaft(shaft.entity.driven_by)
    if shaft.entity.speed is not None and not sheet.is_known("shaft_speed", driver):
        return sheet.value(shaft, "speed")
    return sheet.value(shaft, "ratio") * sheet("shaft_speed", driver)


@fact(
    per="shaft",
    unit="rad/s",
    symbol="ω_max",
    equation="ω_max = i ω_max,driver, or as stated",
    source="spinhazard-methods inertia",
)
def shaft_max_speed(sheet: FactSheet, shaft: Subject) -> Samples:
    """Highest attainable speed of the shaft."""
    if shaft.entity.max_speed is not None or shaft.entity.driven_by is None:
        return sheet.value(shaft, "max_speed")
    return sheet.value(shaft, "ratio") * sheet("shaft_max_speed", sheet.subjects.shaft(shaft.entity.driven_by))


@fact(per="shaft", symbol="|ω_stated/ω − 1|", equation="|ω_stated / (i ω_driver) − 1|", source="practice")
def speed_departure(sheet: FactSheet, shaft: Subject) -> Samples | None:
    """How far the speed stated at a coupled shaft lies from ratio times the driving shaft's speed."""
    if shaft.entity.driven_by is None or shaft.entity.speed is None:
        return None
    driver = sheet.subjects.shaft(shaft.entity.driven_by)
    return np.abs(sheet.value(shaft, "speed") / (sheet.value(shaft, "ratio") * sheet("shaft_speed", driver)) - 1.0)


@fact(per="shaft", unit="kg m²", symbol="J", equation="J = Σ J_part", source="openstax-up1 §10.5")
def shaft_inertia(sheet: FactSheet, shaft: Subject) -> Samples:
    """Moment of inertia of everything that turns with the shaft."""
    return _total([sheet("inertia", part) for part in sheet.subjects.parts_of(shaft)])


@fact(per="shaft", unit="J", symbol="E", formulas=[energy.rotational_energy])
def shaft_energy(sheet: FactSheet, shaft: Subject) -> Samples:
    """Energy stored in one shaft and everything fixed to it."""
    return sheet.apply(energy.rotational_energy, sheet("shaft_inertia", shaft), sheet("shaft_speed", shaft))


@fact(per="shaft", unit="J", symbol="E_max", formulas=[energy.rotational_energy])
def shaft_energy_at_max_speed(sheet: FactSheet, shaft: Subject) -> Samples:
    """Energy stored in one shaft at its highest attainable speed."""
    return sheet.apply(energy.rotational_energy, sheet("shaft_inertia", shaft), sheet("shaft_max_speed", shaft))


@fact(per="shaft", unit="kg m²/s", symbol="L", formulas=[energy.angular_momentum])
def shaft_angular_momentum(sheet: FactSheet, shaft: Subject) -> Samples:
    """Angular momentum of one shaft."""
    return sheet.apply(energy.angular_momentum, sheet("shaft_inertia", shaft), sheet("shaft_speed", shaft))


@fact(per="machine", unit="J", symbol="E", equation="E = Σ ½ J ω²", source="openstax-up1 §10.4")
def stored_energy(sheet: FactSheet, _machine: Subject) -> Samples:
    """Energy stored in all turning parts in running."""
    return _total([sheet("shaft_energy", shaft) for shaft in sheet.subjects.shafts])


@fact(per="machine", unit="J", symbol="E_max", equation="E_max = Σ ½ J ω_max²", source="openstax-up1 §10.4")
def stored_energy_at_max_speed(sheet: FactSheet, _machine: Subject) -> Samples:
    """Energy stored in all turning parts at the highest attainable speed."""
    return _total([sheet("shaft_energy_at_max_speed", shaft) for shaft in sheet.subjects.shafts])


@fact(per="machine", symbol="E_max/E", equation="E_max / E", source="openstax-up1 §10.4")
def energy_growth(sheet: FactSheet, _machine: Subject) -> Samples:
    """Energy at the highest attainable speed over energy in running."""
    return sheet("stored_energy_at_max_speed") / sheet("stored_energy")


@fact(per="machine", unit="kg m²/s", symbol="L", equation="L = Σ J ω", source="openstax-up1 §11.2")
def angular_momentum(sheet: FactSheet, _machine: Subject) -> Samples:
    """Sum of the shafts' angular momenta, all taken positive (an upper bound where shafts turn opposite ways)."""
    return _total([sheet("shaft_angular_momentum", shaft) for shaft in sheet.subjects.shafts])


@fact(per="machine", unit="m/s", symbol="v", equation="v = max(v_part)", source="openstax-up1 §10.3")
def highest_tip_speed(sheet: FactSheet, _machine: Subject) -> Samples:
    """Speed of the machine's fastest point."""
    return largest([sheet("tip_speed", part) for part in sheet.subjects.parts])


@fact(per="machine", symbol="share", equation="Σ E_estimated / E", source="jcgm-100 4.3.1")
def estimated_energy_share(sheet: FactSheet, _machine: Subject) -> Samples:
    """Share of the stored energy whose inertia or speed rests on a value marked as estimated."""
    estimated = [sheet("kinetic_energy", part) for part in sheet.subjects.parts if _rests_on_estimate(sheet, part)]
    return _total([np.zeros(1), *estimated]) / sheet("stored_energy")


def _rests_on_estimate(sheet: FactSheet, part: Subject) -> bool:
    """Whether a value marked as estimated stands behind the part's inertia or its shaft's speed."""
    asked = {"kinetic_energy|" + part.name}
    seen: set[str] = set()
    while asked:
        name = asked.pop()
        seen.add(name)
        key, bar, about = name.partition("|")
        if not bar:
            if name in sheet.stated and sheet.stated[name].source_class == "estimated":
                return True
            continue
        fact = sheet.fact(key, sheet.by_name[about])
        asked |= set(fact.asked if fact is not None else ()) - seen
    return False


def _total(terms: list[Samples]) -> Samples:
    total = terms[0]
    for term in terms[1:]:
        total = total + term
    return total
