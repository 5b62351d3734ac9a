"""What could not be decided, and the fields that would settle it."""

from __future__ import annotations

from reportlab.platypus import Flowable

from spinhazard.worksheet.grid import Grid
from spinhazard.worksheet.page import WITH_TEXT_AND_TABLE, Sheet, heading
from spinhazard.worksheet.style import BODY
from spinhazard.worksheet.text import paragraph, shares


def fields_to_state(sheet: Sheet) -> list[tuple[str, list[str]]]:
    """Fields that are missing, those that settle most rules first.

    Parameters
    ----------
    sheet : Sheet
        What to print.

    Returns
    -------
    list of (str, list of str)
        Path of the field, and the rules it would decide.
    """
    fields: dict[str, list[str]] = {}
    for finding in sheet.assessment.findings:
        if finding.outcome == "data missing":
            for field in finding.missing:
                fields.setdefault(field, []).append(finding.rule.key)
    return sorted(fields.items(), key=lambda entry: -len(entry[1]))


def missing(sheet: Sheet, number: int) -> list[Flowable]:
    """Table of missing fields.

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
    count = sum(finding.outcome == "data missing" for finding in sheet.assessment.findings)
    if not count:
        return [*heading(number, "Data missing"), paragraph("Every rule that applies could be decided.", BODY)]
    rows = [[field, ", ".join(dict.fromkeys(keys))] for field, keys in fields_to_state(sheet)]
    opening = "One finding" if count == 1 else f"{count} findings"
    text = f"{opening} could not be decided. What is not stated was not assessed; it is no finding in favour of the machine."
    made = Grid(("state this field", "to decide"), rows, shares(sheet.width, (40, 60)))
    return [*heading(number, "Data missing", room=WITH_TEXT_AND_TABLE), paragraph(text, BODY), made]
