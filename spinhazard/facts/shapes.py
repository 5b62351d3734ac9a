"""Which formula gives volume, inertia and outermost point of each shape. One piece; lengths as stated.

To add a shape: a model in statement/rotor.py, its formulas in mechanics, and one function in each of the three tables.
"""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from spinhazard.facts.sheet import FactSheet
from spinhazard.facts.subject import Subject
from spinhazard.mechanics import inertia, outline, volume
from spinhazard.mechanics.mesh import MeshMoments
from spinhazard.quantity.units import factor_to_si
from spinhazard.sampling import Samples

OfPart = Callable[[FactSheet, Subject], Samples | None]
OfPiece = Callable[[FactSheet, Subject, Samples], Samples]
ZERO: Samples = np.zeros(1)


def optional(sheet: FactSheet, part: Subject, field: str) -> Samples:
    """Samples of a length that is zero where it is left out (bore, offset, hollow).

    Parameters
    ----------
    sheet : FactSheet
        The sheet.
    part : Subject
        The part.
    field : str
        Name of the field.

    Returns
    -------
    ndarray
        Samples [m].
    """
    return ZERO if getattr(part.entity, field) is None else sheet.value(part, field)


def profile_points(part: Subject) -> tuple[Samples, Samples]:
    """Corners of a profile part.

    Parameters
    ----------
    part : Subject
        Part of shape ``profile``.

    Returns
    -------
    (ndarray, ndarray)
        Radii and heights [m], each of shape (corners,).
    """
    points = np.array(part.entity.points, dtype=np.float64) * factor_to_si(part.entity.unit, "length")
    return points[:, 0], points[:, 1]


def _disk_volume(sheet: FactSheet, part: Subject) -> Samples:
    return sheet.apply(
        volume.disk_volume,
        sheet.value(part, "diameter"),
        sheet.value(part, "thickness"),
        bore=optional(sheet, part, "bore"),
    )


def _ring_volume(sheet: FactSheet, part: Subject) -> Samples:
    return sheet.apply(
        volume.disk_volume,
        sheet.value(part, "outer_diameter"),
        sheet.value(part, "width"),
        bore=sheet.value(part, "inner_diameter"),
    )


def _sphere_volume(sheet: FactSheet, part: Subject) -> Samples:
    return sheet.apply(
        volume.sphere_volume, sheet.value(part, "diameter"), inner_diameter=optional(sheet, part, "inner_diameter")
    )


def _plate_volume(sheet: FactSheet, part: Subject) -> Samples:
    return sheet.apply(
        volume.plate_volume,
        sheet.value(part, "radial"),
        sheet.value(part, "axial"),
        tangential=sheet.value(part, "tangential"),
    )


def _cone_volume(sheet: FactSheet, part: Subject) -> Samples:
    return sheet.apply(
        volume.frustum_volume, sheet.value(part, "large_diameter"), sheet.value(part, "small_diameter"),
        length=sheet.value(part, "length"), bore=optional(sheet, part, "bore"),
    )  # fmt: skip


def _torus_volume(sheet: FactSheet, part: Subject) -> Samples:
    return sheet.apply(volume.torus_volume, sheet.value(part, "ring_diameter"), sheet.value(part, "section_diameter"))


def _profile_volume(sheet: FactSheet, part: Subject) -> Samples:
    sheet.note(f"{part.path}.points")
    radii, heights = profile_points(part)
    return np.atleast_1d(inertia.revolved_volume(radii, heights))


def _mesh(sheet: FactSheet, part: Subject) -> tuple[MeshMoments, float]:
    """Moments of a mesh part and its unit of length [m]."""
    sheet.note(f"{part.path}.file")
    return sheet.beside.meshes[part.path], factor_to_si(part.entity.unit, "length")


def _mesh_volume(sheet: FactSheet, part: Subject) -> Samples:
    moments, unit = _mesh(sheet, part)
    return np.array([moments.volume * unit**3])


VOLUME: dict[str, OfPart] = {
    "mesh": _mesh_volume,
    "disk": _disk_volume,
    "ring": _ring_volume,
    "sphere": _sphere_volume,
    "plate": _plate_volume,
    "cone": _cone_volume,
    "torus": _torus_volume,
    "profile": _profile_volume,
}
"""Shapes whose dimensions give a volume; a rod, a point and a stated inertia do not."""


def _disk_inertia(sheet: FactSheet, part: Subject, mass: Samples) -> Samples:
    return sheet.apply(inertia.disk_inertia, mass, sheet.value(part, "diameter"), bore=optional(sheet, part, "bore"))


def _ring_inertia(sheet: FactSheet, part: Subject, mass: Samples) -> Samples:
    return sheet.apply(
        inertia.disk_inertia, mass, sheet.value(part, "outer_diameter"), bore=sheet.value(part, "inner_diameter")
    )


def _sphere_inertia(sheet: FactSheet, part: Subject, mass: Samples) -> Samples:
    return sheet.apply(
        inertia.sphere_inertia,
        mass,
        sheet.value(part, "diameter"),
        inner_diameter=optional(sheet, part, "inner_diameter"),
    )


def _rod_inertia(sheet: FactSheet, part: Subject, mass: Samples) -> Samples:
    if part.entity.direction == "axial":
        return ZERO * mass  # a slender rod along the axis has no inertia about its own centre line
    return sheet.apply(inertia.crossways_rod_inertia, mass, sheet.value(part, "length"))


def _plate_inertia(sheet: FactSheet, part: Subject, mass: Samples) -> Samples:
    return sheet.apply(
        inertia.plate_inertia, mass, sheet.value(part, "radial"), tangential=sheet.value(part, "tangential")
    )


def _cone_inertia(sheet: FactSheet, part: Subject, mass: Samples) -> Samples:
    return sheet.apply(
        inertia.frustum_inertia, mass, sheet.value(part, "large_diameter"),
        small_diameter=sheet.value(part, "small_diameter"), bore=optional(sheet, part, "bore"),
    )  # fmt: skip


def _torus_inertia(sheet: FactSheet, part: Subject, mass: Samples) -> Samples:
    return sheet.apply(
        inertia.torus_inertia,
        mass,
        sheet.value(part, "ring_diameter"),
        section_diameter=sheet.value(part, "section_diameter"),
    )


def _profile_inertia(sheet: FactSheet, part: Subject, mass: Samples) -> Samples:
    sheet.note(f"{part.path}.points")
    radii, heights = profile_points(part)
    return np.atleast_1d(inertia.revolved_inertia(mass, radii, heights=heights))


def _point_inertia(sheet: FactSheet, part: Subject, mass: Samples) -> Samples:
    return sheet.apply(inertia.point_inertia, mass, sheet.value(part, "radius"))


def _mesh_inertia(sheet: FactSheet, part: Subject, mass: Samples) -> Samples:
    moments, unit = _mesh(sheet, part)
    return mass * (moments.second / moments.volume * unit**2)


INERTIA: dict[str, OfPiece] = {
    "mesh": _mesh_inertia,
    "linear": _point_inertia,
    "disk": _disk_inertia,
    "ring": _ring_inertia,
    "sphere": _sphere_inertia,
    "rod": _rod_inertia,
    "plate": _plate_inertia,
    "cone": _cone_inertia,
    "torus": _torus_inertia,
    "profile": _profile_inertia,
    "point": _point_inertia,
}
"""Shapes whose inertia follows from mass and dimensions; ``stated`` brings its own."""


def _round_tip(field: str) -> OfPart:
    def tip(sheet: FactSheet, part: Subject) -> Samples:
        return sheet.apply(outline.disk_tip_radius, sheet.value(part, field), offset=optional(sheet, part, "offset"))

    return tip


def _rod_tip(sheet: FactSheet, part: Subject) -> Samples:
    offset = optional(sheet, part, "offset")
    if part.entity.direction == "axial":
        return offset
    formula = outline.radial_rod_tip_radius if part.entity.direction == "radial" else outline.tangential_rod_tip_radius
    return sheet.apply(formula, sheet.value(part, "length"), offset=offset)


def _plate_tip(sheet: FactSheet, part: Subject) -> Samples:
    return sheet.apply(
        outline.plate_tip_radius,
        sheet.value(part, "radial"),
        sheet.value(part, "tangential"),
        offset=optional(sheet, part, "offset"),
    )


def _torus_tip(sheet: FactSheet, part: Subject) -> Samples:
    across = sheet.value(part, "ring_diameter") + sheet.value(part, "section_diameter")
    return sheet.apply(outline.disk_tip_radius, across, offset=optional(sheet, part, "offset"))


def _profile_tip(sheet: FactSheet, part: Subject) -> Samples:
    sheet.note(f"{part.path}.points")
    return np.atleast_1d(profile_points(part)[0].max())


def _point_tip(sheet: FactSheet, part: Subject) -> Samples:
    return sheet.apply(outline.point_tip_radius, sheet.value(part, "radius"), offset=optional(sheet, part, "offset"))


def _stated_tip(sheet: FactSheet, part: Subject) -> Samples:
    return sheet.value(part, "tip_radius")


def _mesh_tip(sheet: FactSheet, part: Subject) -> Samples:
    moments, unit = _mesh(sheet, part)
    return np.array([moments.tip_radius * unit])


TIP_RADIUS: dict[str, OfPart] = {
    "mesh": _mesh_tip,
    "linear": _point_tip,
    "disk": _round_tip("diameter"),
    "ring": _round_tip("outer_diameter"),
    "sphere": _round_tip("diameter"),
    "cone": _round_tip("large_diameter"),
    "rod": _rod_tip,
    "plate": _plate_tip,
    "torus": _torus_tip,
    "profile": _profile_tip,
    "point": _point_tip,
    "stated": _stated_tip,
}
"""Distance of the outermost point from the shaft axis."""
