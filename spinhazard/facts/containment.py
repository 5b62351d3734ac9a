"""What could come off, how hard it would hit, and whether a steel guard would hold it. Screening only."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np

from spinhazard.facts.fact import Word, fact
from spinhazard.facts.shapes import optional
from spinhazard.facts.sheet import FactSheet
from spinhazard.facts.subject import Subject
from spinhazard.mechanics import fragments
from spinhazard.sampling import Samples, smallest
from spinhazard.statement.materials import materials

ROUND = ("disk", "ring")
WALLS = ("fixed", "hinged", "interlocked", "enclosure")
"""Guards with a wall that a piece could hit; a light curtain, a two-hand control and a rail have none."""
SOLID = ("fixed", "hinged", "interlocked", "enclosure")
"""Kinds of guard with a wall that could hold something."""


def _is_sector(part: Subject) -> bool:
    return bool(part.entity.fragment.kind == "sector")


def _radii(sheet: FactSheet, part: Subject) -> tuple[Samples, Samples]:
    inner = optional(sheet, part, "bore" if part.entity.shape == "disk" else "inner_diameter")
    return sheet("tip_radius", part), inner / 2.0


def _angle(sheet: FactSheet, part: Subject) -> Samples:
    fragment = part.entity.fragment
    if fragment.angle is not None:
        return sheet.draw(f"{part.path}.fragment.angle", fragment.angle)
    sheet.note("sector of greatest translational energy")
    return np.array([fragments.WORST_SECTOR_ANGLE])


@fact(per="part", unit="m", symbol="r_c", formulas=[fragments.sector_centroid_radius])
def part_fragment_radius(sheet: FactSheet, part: Subject) -> Samples | None:
    """Distance of the loose piece's centre of mass from the shaft axis."""
    fragment = part.entity.fragment
    if fragment is None:
        return None
    if fragment.radius is not None:
        return sheet.draw(f"{part.path}.fragment.radius", fragment.radius)
    if _is_sector(part) and part.entity.shape in ROUND:
        outer, inner = _radii(sheet, part)
        return sheet.apply(fragments.sector_centroid_radius, outer, inner, angle=_angle(sheet, part))
    if part.entity.shape == "point":
        return sheet.value(part, "radius")
    if part.entity.offset is not None and part.entity.shape != "stated":
        return sheet.value(part, "offset")
    return sheet.missing(f"{part.path}.fragment.radius")


@fact(per="part", unit="kg", symbol="m_f", formulas=[fragments.sector_mass])
def part_fragment_mass(sheet: FactSheet, part: Subject) -> Samples | None:
    """Mass of the loose piece: as stated, the sector's share of the disk, or one piece of the part."""
    fragment = part.entity.fragment
    if fragment is None:
        return None
    if fragment.mass is not None:
        return sheet.draw(f"{part.path}.fragment.mass", fragment.mass)
    if _is_sector(part) and part.entity.shape in ROUND:
        return sheet.apply(fragments.sector_mass, sheet("piece_mass", part), _angle(sheet, part))
    return sheet("piece_mass", part)


@fact(per="part", unit="m/s", symbol="v_f", formulas=[fragments.fragment_speed])
def part_fragment_speed(sheet: FactSheet, part: Subject) -> Samples | None:
    """Speed at which the loose piece leaves, along the tangent, in running."""
    radius = sheet.where_applies("part_fragment_radius", part)
    return None if radius is None else sheet.apply(fragments.fragment_speed, sheet("shaft_speed", part.parent), radius)


@fact(per="part", unit="J", symbol="E_f", formulas=[fragments.fragment_energy])
def part_fragment_energy(sheet: FactSheet, part: Subject) -> Samples | None:
    """Translational energy of the loose piece, in running."""
    speed, mass = sheet.where_applies("part_fragment_speed", part), sheet.where_applies("part_fragment_mass", part)
    return None if speed is None or mass is None else sheet.apply(fragments.fragment_energy, mass, speed)


@fact(per="part", unit="N", symbol="F_u", formulas=[fragments.unbalance_force])
def unbalance_force_after_loss(sheet: FactSheet, part: Subject) -> Samples | None:
    """Rotating force on the shaft after the piece is lost, in running."""
    radius, mass = sheet.where_applies("part_fragment_radius", part), sheet.where_applies("part_fragment_mass", part)
    if radius is None or mass is None:
        return None
    return sheet.apply(fragments.unbalance_force, mass, radius, speed=sheet("shaft_speed", part.parent))


@fact(per="part", unit="N", symbol="F_h")
def hold_down_capacity(sheet: FactSheet, part: Subject) -> Samples | None:
    """Sideways force that mounting and foundation can hold."""
    return None if part.entity.fragment is None else sheet.value(sheet.subjects.machine, "hold_down_capacity")


@dataclass(frozen=True)
class _Threat:
    """The part behind a guard whose loose piece carries most energy, by best estimate."""

    part: Subject
    energy: Samples


def _or_infinite(energy: float) -> float:
    """An energy that is not known may be the largest."""
    return math.inf if math.isnan(energy) else energy


def _threat(sheet: FactSheet, guard: Subject) -> _Threat | None:
    threats = []
    for name in guard.entity.covers:
        for part in sheet.subjects.parts_of(sheet.subjects.shaft(name)):
            energy = sheet.where_applies("part_fragment_energy", part)
            if energy is not None:
                threats.append(_Threat(part, energy))
    return max(threats, key=lambda threat: _or_infinite(float(threat.energy[0]))) if threats else None


@fact(per="guard", word=True)
def fragment_part(sheet: FactSheet, guard: Subject) -> Word | None:
    """Part behind the guard whose loose piece carries most energy."""
    threat = _threat(sheet, guard)
    return None if threat is None else str(threat.part.name.removeprefix("part:"))


@fact(per="guard", unit="m/s", symbol="v_f", equation="v_f = ω r_c", source="spinhazard-methods fragments")
def fragment_speed(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Speed of the most energetic piece that could come off behind the guard."""
    threat = _threat(sheet, guard)
    return None if threat is None else sheet.where_applies("part_fragment_speed", threat.part)


@fact(per="guard", unit="J", symbol="E_f", equation="E_f = ½ m_f v_f²", source="spinhazard-methods fragments")
def fragment_energy(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Energy of the most energetic piece that could come off behind the guard."""
    threat = _threat(sheet, guard)
    return None if threat is None else threat.energy


@fact(per="guard", unit="m", symbol="D_f", formulas=[fragments.equivalent_diameter])
def fragment_face(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Diameter of the smallest face of the piece that can hit the guard: as stated, else of the part's smallest face."""
    threat = _threat(sheet, guard)
    if threat is None:
        return None
    stated = threat.part.entity.fragment.face
    if stated is not None:
        return sheet.draw(f"{threat.part.path}.fragment.face", stated)
    area = _smallest_face(sheet, threat.part)
    if area is None:
        return sheet.missing(f"{threat.part.path}.fragment.face")
    return sheet.apply(fragments.equivalent_diameter, area)


def _smallest_face(sheet: FactSheet, part: Subject) -> Samples | None:
    """Area of the smallest face of a piece whose dimensions give one."""
    shape = part.entity.shape
    if shape == "plate" and part.entity.axial is not None:
        radial, axial, tangential = (sheet.value(part, side) for side in ("radial", "axial", "tangential"))
        return smallest([radial * axial, axial * tangential, radial * tangential])
    if shape in ROUND:
        thickness = "thickness" if shape == "disk" else "width"
        if getattr(part.entity, thickness) is None:
            return None
        outer, inner = _radii(sheet, part)
        return sheet.value(part, thickness) * (outer - inner)  # the radial cut, on which the piece flies edge first
    return None


@fact(per="guard", word=True)
def guard_material(sheet: FactSheet, guard: Subject) -> Word | None:
    """Material of the guard."""
    return sheet.word(guard, "material") if guard.entity.kind in WALLS else None


@fact(per="guard", word=True)
def perforation_method_applies(sheet: FactSheet, guard: Subject) -> Word | None:
    """Whether the perforation formulas, which are for steel plate, apply to the guard's material."""
    if guard.entity.kind not in WALLS:
        return None
    material = sheet.word(guard, "material")
    return materials()[material].steel if isinstance(material, str) else None


@fact(per="guard", unit="m", symbol="T", formulas=[fragments.perforation_thickness])
def perforation_thickness(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Thickness of steel plate that the most energetic piece would just perforate."""
    if guard.entity.kind not in WALLS:
        return None
    energy = sheet.where_applies("fragment_energy", guard)
    if energy is None:
        return None
    if guard.entity.material is None:
        return sheet.missing(f"{guard.path}.material")
    if not materials()[guard.entity.material].steel:
        return None
    face = sheet.where_applies("fragment_face", guard)
    return None if face is None else sheet.apply(fragments.perforation_thickness, energy, face)


@fact(per="guard", unit="m", symbol="T_d", formulas=[fragments.design_thickness])
def design_thickness(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Perforation thickness with the design factor of 1.25."""
    thickness = sheet.where_applies("perforation_thickness", guard)
    return None if thickness is None else sheet.apply(fragments.design_thickness, thickness)


@fact(per="guard", unit="m", symbol="T_g")
def guard_thickness(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Thickness of the guard's wall."""
    return sheet.value(guard, "thickness") if guard.entity.kind in WALLS else None


@fact(per="guard", symbol="T/D_f", equation="T / D_f", source="bc-top-9a")
def perforation_ratio(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Perforation thickness over the diameter of the piece's face."""
    thickness, face = sheet.where_applies("perforation_thickness", guard), sheet.where_applies("fragment_face", guard)
    return None if thickness is None or face is None else thickness / face


@fact(per="guard", word=True)
def guard_contains(sheet: FactSheet, guard: Subject) -> Word | None:
    """Whether the guard is meant to hold what could come off.

    Where it does not say so itself: no, if every shaft it covers has another guard that is; else it has to be stated.
    """
    if guard.entity.kind not in SOLID:
        return False
    if guard.entity.contains is None and all(_holds(sheet, shaft) for shaft in guard.entity.covers):
        return False
    return sheet.word(guard, "contains")


def _holds(sheet: FactSheet, shaft: str) -> bool:
    """Whether a guard of the shaft is stated to hold what could come off."""
    return any(guard.entity.contains and guard.entity.kind in SOLID for guard in _guards_of(sheet, shaft))


def _guards_of(sheet: FactSheet, shaft: str) -> list[Subject]:
    return [guard for guard in sheet.subjects.guards if shaft in guard.entity.covers]


@fact(per="shaft", word=True)
def is_contained(sheet: FactSheet, shaft: Subject) -> Word | None:
    """Whether a guard of the shaft is meant to hold what could come off."""
    if _holds(sheet, shaft.entity.id):
        return True
    silent = [
        f"{guard.path}.contains" for guard in _guards_of(sheet, shaft.entity.id)
        if guard.entity.kind in SOLID and guard.entity.contains is None
    ]  # fmt: skip
    sheet.missing(*silent)
    return None if silent else False
