"""Names and signatures; empty until people fill them in."""

from __future__ import annotations

from reportlab.platypus import Flowable, KeepTogether

from spinhazard.worksheet.grid import Grid
from spinhazard.worksheet.page import Sheet, heading
from spinhazard.worksheet.style import BODY
from spinhazard.worksheet.text import paragraph, shares


def signoff(sheet: Sheet, number: int) -> list[Flowable]:
    """Block for signatures.

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
    record = sheet.assessment.file.assessment
    text = (
        "A signature says that the stated values and the decisions taken on the findings were checked by the person named. It does not say "
        "that the machine meets any law or standard; that judgement lies with qualified, licensed safety professionals under local codes."
    )
    rows = [
        ["prepared by", record.assessor, record.role, "", ""],
        ["checked by", "", "", "", ""],
        ["released by", "", "", "", ""],
    ]
    heads = ("", "name", "role", "day", "signature")
    made = Grid(heads, rows, shares(sheet.width, (16, 26, 22, 12, 24)), row_height=32.0)
    return [KeepTogether([*heading(number, "Signatures"), paragraph(text, BODY), made])]
