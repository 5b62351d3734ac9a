"""The rotor: shafts, parts, and where the energy is."""

from __future__ import annotations

from reportlab.platypus import Flowable, Spacer

from spinhazard.worksheet.grid import Bar, Cell, Grid
from spinhazard.worksheet.page import Sheet, heading
from spinhazard.worksheet.text import shares


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
    return [*heading(number, "Rotor"), _shafts(sheet), Spacer(1, 6), _parts(sheet)]


def _shafts(sheet: Sheet) -> Flowable:
    rows = []
    for shaft in sheet.assessment.sheet.subjects.shafts:
        coupled = shaft.entity.driven_by
        rows.append([
            shaft.entity.id, f"with {coupled}, {shaft.entity.ratio.text} turns each" if coupled else "–",
            *(sheet.number(key, shaft.name) for key in ("shaft_speed", "shaft_max_speed", "shaft_inertia", "shaft_energy")),
        ])  # fmt: skip
    heads = ("shaft", "coupled", "speed", "highest speed", "inertia", "energy")
    return Grid(heads, rows, shares(sheet.width, (18, 26, 13, 14, 15, 14)), numbers=(2, 3, 4, 5))


def _parts(sheet: Sheet) -> Flowable:
    widths = shares(sheet.width, (19, 9, 11, 13, 10, 13, 12, 9, 9))
    rows: list[list[Cell]] = []
    for part in sheet.assessment.sheet.subjects.parts:
        share = sheet.assessment.fact("energy_share", part.name)
        known = share is not None and share.known
        count = f"{part.entity.count} × " if part.entity.count > 1 else ""
        rows.append([
            f"{part.entity.id} ({part.parent.entity.id})" if part.parent is not None else part.entity.id, f"{count}{part.entity.shape}",
            *(sheet.number(key, part.name) for key in ("mass", "inertia", "tip_radius", "tip_speed", "kinetic_energy")),
            f"{100 * share.best:.1f} %" if known and share is not None else "not known",
            Bar(share.best if known and share is not None else 0.0),
        ])  # fmt: skip
    heads = ("part (shaft)", "shape", "mass", "inertia", "tip radius", "tip speed", "energy", "share", "")
    return Grid(heads, rows, widths, numbers=(2, 3, 4, 5, 6, 7))
