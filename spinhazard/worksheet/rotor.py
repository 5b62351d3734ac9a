"""The rotor: shafts, parts, and where the energy is."""

from __future__ import annotations

from reportlab.graphics.shapes import Drawing, Rect
from reportlab.platypus import Flowable

from spinhazard.worksheet.page import Sheet, heading
from spinhazard.worksheet.style import BODY, RULE, SHADE
from spinhazard.worksheet.text import paragraph, shares, table


def rotor(sheet: Sheet, number: int) -> list[Flowable]:
    """Tables of shafts and parts.

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
    return [*heading(number, "Rotor"), _shafts(sheet), paragraph("", BODY), _parts(sheet)]


def _shafts(sheet: Sheet) -> Flowable:
    rows = []
    for shaft in sheet.assessment.sheet.subjects.shafts:
        coupled = shaft.entity.driven_by
        rows.append([
            shaft.entity.id, f"with {coupled}, {shaft.entity.ratio.text} turns each" if coupled else "–",
            *(sheet.number(key, shaft.name) for key in ("shaft_speed", "shaft_max_speed", "shaft_inertia", "shaft_energy")),
        ])  # fmt: skip
    heads = ("shaft", "coupled", "speed", "highest speed", "inertia", "energy")
    return table(heads, rows, shares(sheet.width, (18, 26, 13, 14, 15, 14)), numbers=(2, 3, 4, 5))


def _parts(sheet: Sheet) -> Flowable:
    widths = shares(sheet.width, (19, 9, 11, 13, 10, 13, 12, 9, 9))
    rows: list[list[str | Flowable]] = []
    for part in sheet.assessment.sheet.subjects.parts:
        share = sheet.assessment.fact("energy_share", part.name)
        known = share is not None and share.known
        count = f"{part.entity.count} × " if part.entity.count > 1 else ""
        rows.append([
            f"{part.entity.id} ({part.parent.entity.id})" if part.parent is not None else part.entity.id, f"{count}{part.entity.shape}",
            *(sheet.number(key, part.name) for key in ("mass", "inertia", "tip_radius", "tip_speed", "kinetic_energy")),
            f"{100 * share.best:.1f} %" if known and share is not None else "not known",
            _bar(share.best if known and share is not None else 0.0, widths[-1] - 6),
        ])  # fmt: skip
    heads = ("part (shaft)", "shape", "mass", "inertia", "tip radius", "tip speed", "energy", "share", "")
    return table(heads, rows, widths, numbers=(2, 3, 4, 5, 6, 7))


def _bar(share: float, width: float) -> Drawing:
    drawing = Drawing(width, 7)
    drawing.add(Rect(0, 1, width, 5, fillColor=SHADE, strokeColor=None))
    drawing.add(Rect(0, 1, width * max(0.0, min(1.0, share)), 5, fillColor=RULE, strokeColor=None))
    return drawing
