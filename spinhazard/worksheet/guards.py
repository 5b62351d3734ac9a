"""Guards: reach, openings, and whether they would hold what could come off."""

from __future__ import annotations

from reportlab.platypus import Flowable

from spinhazard.worksheet.grid import Grid
from spinhazard.worksheet.page import Sheet, group, heading
from spinhazard.worksheet.style import BODY
from spinhazard.worksheet.text import paragraph, shares


def guards(sheet: Sheet, number: int) -> list[Flowable]:
    """Tables of access, openings and containment.

    Parameters
    ----------
    sheet : Sheet
        What to print.
    number : int
        Number of the section.

    Returns
    -------
    list of Flowable
        Flowables.
    """
    subjects = sheet.assessment.sheet.subjects.guards
    if not subjects:
        return [*heading(number, "Guards"), paragraph("No guard is stated.", BODY)]
    return [*heading(number, "Guards"), _access(sheet), *_openings(sheet), *_containment(sheet)]


def _access(sheet: Sheet) -> Flowable:
    rows = []
    for guard in sheet.assessment.sheet.subjects.guards:
        entity = guard.entity
        lock = entity.lock_release or "–"
        if entity.lock_release == "timer" and entity.lock_timer is not None:
            lock = f"timer {entity.lock_timer.text}"
        rows.append([
            entity.id, entity.kind, ", ".join(entity.covers), lock, entity.fastening or "–",
            *(sheet.number(key, guard.name) for key in ("guard_distance", "access_time", "required_distance")),
        ])  # fmt: skip
    heads = ("guard", "kind", "covers", "lock release", "fastened by", "distance", "access time", "distance needed")
    return Grid(heads, rows, shares(sheet.width, (19, 12, 14, 13, 10, 10, 11, 12)), numbers=(5, 6, 7))


def _openings(sheet: Sheet) -> list[Flowable]:
    rows = []
    for guard in sheet.assessment.sheet.subjects.guards:
        for index, opening in enumerate(guard.entity.openings, start=1):
            nearest = [sheet.number(key, guard.name) if index == 1 else "" for key in ("opening_size", "opening_limit")]
            rows.append(
                [guard.entity.id, str(index), opening.shape, opening.size.text, opening.distance.text, *nearest]
            )
    if not rows:
        return []
    figures = "ISO 13857 table 4" if sheet.assessment.policy.figures == "iso" else "29 CFR 1910.217 table O-10"
    heads = ("guard", "no.", "opening", "size", "to moving part", "nearest its limit", "allowed there")
    made = Grid(heads, rows, shares(sheet.width, (26, 6, 12, 13, 15, 15, 13)), numbers=(3, 4, 5, 6))
    text = f"The opening of each guard that comes nearest to its limit, and that limit, stand in its first line ({figures})."
    return [*group("Openings", made), paragraph(text, BODY)]


def _containment(sheet: Sheet) -> list[Flowable]:
    rows = []
    for guard in sheet.assessment.sheet.subjects.guards:
        if sheet.assessment.fact("fragment_energy", guard.name) is None:
            continue
        keys = (
            "fragment_part",
            "fragment_speed",
            "fragment_energy",
            "perforation_thickness",
            "design_thickness",
            "guard_thickness",
        )
        rows.append([guard.entity.id, *(sheet.number(key, guard.name) for key in keys)])
    if not rows:
        return []
    heads = ("guard", "worst piece", "its speed", "its energy", "perforates", "× 1.25", "guard wall")
    made = Grid(heads, rows, shares(sheet.width, (22, 20, 12, 12, 12, 11, 11)), numbers=(2, 3, 4, 5, 6))
    text = "Screening by a formula for steel plate hit by a stiff missile; it does not replace a test of the guard."
    return [*group("What could come off", made), paragraph(text, BODY)]
