"""Who, what, when; and the cautions, on page one."""

from __future__ import annotations

from reportlab.platypus import Flowable, Table

from spinhazard.assessment import CAUTIONS
from spinhazard.worksheet.page import Sheet
from spinhazard.worksheet.style import BODY, BOLD, CAUTION_BOX, CELL, IDENTITY, LABEL, SMALL, SUBTITLE, TITLE
from spinhazard.worksheet.text import paragraph, shares


def identity(sheet: Sheet) -> list[Flowable]:
    """Title block and box of cautions.

    Parameters
    ----------
    sheet : Sheet
        What to print.

    Returns
    -------
    list of Flowable
        Flowables.
    """
    machine, record = sheet.assessment.file.machine, sheet.assessment.file.assessment
    pairs = [
        ("Kind", machine.kind), ("Plant", machine.site), ("Place", machine.location), ("Serial number", machine.serial),
        ("Assessed by", ", ".join(text for text in (record.assessor, record.role) if text) or "not stated"),
        ("Assessed on", str(record.date) if record.date else "not stated"), ("Revision", str(record.revision)),
        ("Reason", record.reason), ("References", machine.references), ("Program", sheet.assessment.program),
        ("Policy", sheet.assessment.policy.name), ("Status", "draft until signed at the end"),
    ]  # fmt: skip
    shown = [(label, text) for label, text in pairs if text]
    cells = [[paragraph(label, LABEL), paragraph(text, CELL)] for label, text in shown]
    half = (len(cells) + 1) // 2
    rows = [
        [*cells[i], *(cells[half + i] if half + i < len(cells) else [paragraph(""), paragraph("")])]
        for i in range(half)
    ]
    block = Table(rows, colWidths=shares(sheet.width, (13, 37, 13, 37)))
    block.setStyle(IDENTITY)
    return [
        paragraph(f"{machine.tag}  {machine.name}".rstrip(), TITLE),
        paragraph("Worksheet on stored rotational energy, stopping, access and lockout", SUBTITLE),
        block,
        _cautions(sheet),
    ]


def _cautions(sheet: Sheet) -> Table:
    lines = [
        [paragraph("Cautions", BODY.clone("cautions", fontName=BOLD))],
        *([paragraph(text, SMALL)] for text in CAUTIONS),
    ]
    box = Table(lines, colWidths=[sheet.width], spaceBefore=6, spaceAfter=4)
    box.setStyle(CAUTION_BOX)
    return box
