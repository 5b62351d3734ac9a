"""Findings by urgency, with reason, basis and what may be changed; what could not be decided; what was looked at."""

from __future__ import annotations

from reportlab.platypus import Flowable, KeepTogether

from spinhazard.rules.engine import Finding
from spinhazard.rules.rule import URGENCIES
from spinhazard.sources import citation
from spinhazard.worksheet.page import Sheet, group, heading
from spinhazard.worksheet.style import BODY, SMALL
from spinhazard.worksheet.text import marked_up, paragraph, plain, shares, table

MARKS = {"for review": "■ for review", "borderline": "◪ borderline", "data missing": "□ data missing"}
"""State is said in words and by a filled, half-filled or empty square; never by colour."""


def findings(sheet: Sheet, number: int) -> list[Flowable]:
    """For review and borderline, most urgent first.

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
    made = heading(number, "Findings")
    any_found = False
    for urgency in URGENCIES:
        found = [
            f
            for o in ("for review", "borderline")
            for f in sheet.assessment.findings
            if f.outcome == o and f.rule.urgency == urgency
        ]
        if found:
            any_found = True
            made += group(urgency[0].upper() + urgency[1:])
            made += [_finding(finding) for finding in found]
    if not any_found:
        made.append(paragraph("Nothing is for review or borderline among the rules that could be decided.", BODY))
    return made


def _finding(finding: Finding) -> Flowable:
    rule = finding.rule
    likelihood = f", in {100 * finding.likelihood:.0f} % of the draws" if 0.0 < finding.likelihood < 1.0 else ""
    head = f"<b>{plain(MARKS[finding.outcome])}{likelihood}: {plain(rule.key)}</b> · {plain(finding.subject)}"
    basis = "; ".join(citation(reference) for reference in rule.basis)
    numbers = ", ".join(dict.fromkeys(name.partition("|")[0] for name in finding.facts))
    lines = [
        marked_up(head, BODY),
        paragraph(finding.says, BODY),
        paragraph(f"Why: {rule.because}", SMALL),
        paragraph(f"Basis: {basis}.", SMALL),
    ]
    if rule.measures:
        lines.append(paragraph(f"May be changed: {', '.join(rule.measures)}.", SMALL))
    lines.append(paragraph(f"Decided on: {numbers}.", SMALL.clone("decided", spaceAfter=5)))
    return KeepTogether(lines)


def missing(sheet: Sheet, number: int) -> list[Flowable]:
    """What could not be decided, and the fields that would settle it.

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
    found = [finding for finding in sheet.assessment.findings if finding.outcome == "data missing"]
    made = heading(number, "Data missing")
    if not found:
        return [*made, paragraph("Every rule that applies could be decided.", BODY)]
    fields: dict[str, list[str]] = {}
    for finding in found:
        for field in finding.missing:
            fields.setdefault(field, []).append(finding.rule.key)
    ranked = sorted(fields.items(), key=lambda entry: (-len(entry[1]), entry[0]))
    rows = [[field, ", ".join(dict.fromkeys(keys))] for field, keys in ranked]
    text = f"{len(found)} findings could not be decided. What is not stated was not assessed; it is no finding in favour of the machine."
    return [*made, paragraph(text, BODY), table(("state this field", "to decide"), rows, shares(sheet.width, (40, 60)))]


def looked_at(sheet: Sheet, number: int) -> list[Flowable]:
    """Rules that were looked at and not flagged, and rules that do not apply.

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
    rows = [[f.rule.key, f.subject, f.says] for f in sheet.assessment.findings if f.outcome == "not flagged"]
    absent: dict[str, list[str]] = {}
    for finding in sheet.assessment.findings:
        if finding.outcome == "not applicable":
            absent.setdefault(finding.rule.key, []).append(finding.subject)
    made = heading(number, "Looked at and not flagged")
    if rows:
        made.append(table(("rule", "subject", "as compared"), rows, shares(sheet.width, (26, 22, 52))))
    made += group("Not applicable here")
    made.append(
        paragraph(
            "; ".join(f"{key} ({len(names)})" for key, names in absent.items()) + "." if absent else "None.", SMALL
        )
    )
    return made
