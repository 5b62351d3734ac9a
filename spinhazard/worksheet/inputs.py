"""Every stated value: as written, in SI, the spread used, and where it comes from."""

from __future__ import annotations

from reportlab.platypus import Flowable

from spinhazard.facts.records import values_of
from spinhazard.quantity.display import number as figures_of
from spinhazard.quantity.stated import Stated
from spinhazard.quantity.units import KINDS
from spinhazard.worksheet.grid import Grid
from spinhazard.worksheet.page import WITH_TEXT_AND_TABLE, Sheet, heading
from spinhazard.worksheet.style import BODY
from spinhazard.worksheet.text import paragraph, shares


def inputs(sheet: Sheet, number: int) -> list[Flowable]:
    """Table of all stated values.

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
    rows = [_row(sheet, path, stated) for path, stated in values_of(sheet.assessment.file)]
    text = "Paths are those of the assessment file. A spread marked “policy” was not stated and is the policy's for its kind of source."
    heads = ("value", "as written", "SI", "half-width, SI", "source, note, instrument")
    made = Grid(heads, rows, shares(sheet.width, (32, 17, 15, 13, 23)), numbers=(2, 3))
    return [*heading(number, "Stated values", room=WITH_TEXT_AND_TABLE), paragraph(text, BODY), made]


def _row(sheet: Sheet, path: str, stated: Stated) -> list[str]:
    unit = KINDS[stated.kind].si
    spread = "none"
    if stated.half_width:
        spread = figures_of(stated.half_width, figures=3) + (
            f" (k={stated.coverage_factor:g})" if stated.coverage_factor else ""
        )
    elif stated.value and stated.half_width is None and (share := sheet.assessment.sheet.relative_spread(stated)):
        spread = f"{figures_of(share * abs(stated.value), figures=3)} (policy)"
    origin = [text for text in (stated.source, stated.note, stated.instrument) if text]
    if stated.calibration_due is not None:
        origin.append(f"calibrated until {stated.calibration_due}")
    return [
        path,
        stated.text,
        f"{figures_of(stated.value)} {unit}".rstrip(),
        spread,
        "; ".join(origin) or "no source stated",
    ]
