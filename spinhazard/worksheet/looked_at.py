"""Rules that were looked at and not flagged, and rules that do not apply, so that an auditor sees the whole list."""

from __future__ import annotations

from reportlab.platypus import Flowable

from spinhazard.worksheet.grid import Grid
from spinhazard.worksheet.page import WITH_TEXT_AND_TABLE, Sheet, group, heading
from spinhazard.worksheet.style import BODY
from spinhazard.worksheet.text import paragraph, shares

NOT_HERE = "Does not apply here: "


def looked_at(sheet: Sheet, number: int) -> list[Flowable]:
    """Both tables.

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
    widths = shares(sheet.width, (26, 24, 50))
    rows = [[f.rule.key, f.subject, f.says] for f in sheet.assessment.findings if f.outcome == "not flagged"]
    text = (
        "Not flagged means that the condition of the rule is not met by the values stated. It says nothing beyond that."
    )
    made = [*heading(number, "Looked at and not flagged", room=WITH_TEXT_AND_TABLE), paragraph(text, BODY)]
    if rows:
        made.append(Grid(("rule", "subject", "as compared"), rows, widths, fine=True))
    absent = _not_applicable(sheet)
    if absent:
        made += group("Not applicable here", Grid(("rule", "subjects", "because"), absent, widths, fine=True))
    return made


def _not_applicable(sheet: Sheet) -> list[list[str]]:
    """Rule, subjects and reasons, one line to a rule."""
    rules: dict[str, tuple[list[str], list[str]]] = {}
    for finding in sheet.assessment.findings:
        if finding.outcome == "not applicable":
            subjects, reasons = rules.setdefault(finding.rule.key, ([], []))
            subjects.append(finding.subject)
            reasons.append(finding.says.removeprefix(NOT_HERE).rstrip("."))
    return [
        [key, _named(sheet, subjects), "; or ".join(dict.fromkeys(reasons)) + "."]
        for key, (subjects, reasons) in rules.items()
    ]


def _named(sheet: Sheet, subjects: list[str]) -> str:
    """Subjects of one kind: all of them in a word, or their names."""
    kind, _, first = subjects[0].partition(":")
    if not first:
        return kind
    of_this_kind = sum(1 for name in sheet.assessment.sheet.by_name if name.startswith(f"{kind}:"))
    if len(subjects) == of_this_kind > 1:
        return f"every {kind} ({of_this_kind})"
    return f"{kind}: " + ", ".join(subject.partition(":")[2] for subject in subjects)
