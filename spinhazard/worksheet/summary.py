"""The summary on page one: the figures that decide, what is for review, what is missing."""

from __future__ import annotations

from reportlab.platypus import Flowable, Spacer, Table

from spinhazard.facts.fact import Fact
from spinhazard.rules.rule import OUTCOMES
from spinhazard.worksheet.findings import in_order
from spinhazard.worksheet.grid import Cell, Grid, Linked
from spinhazard.worksheet.missing import fields_to_state
from spinhazard.worksheet.page import Sheet, finding_anchor, heading
from spinhazard.worksheet.style import BODY, FIGURE, FIGURE_BOX, LABEL
from spinhazard.worksheet.text import paragraph, shares

MOST_LINES, MOST_FIELDS = 14, 6


def summary(sheet: Sheet, number: int) -> list[Flowable]:
    """Figures, urgent findings, counts.

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
    return [
        *heading(number, "Summary"),
        _figures(sheet),
        Spacer(1, 5),
        *_stop_cases(sheet),
        _urgent(sheet),
        *_missing(sheet),
        paragraph(_counts(sheet), BODY),
    ]


def _figures(sheet: Sheet) -> Table:
    assessment = sheet.assessment
    governing = assessment.fact("governing_stop")
    case = f"governing stop: {governing.value}" if governing is not None and governing.known else "governing stop"
    boxes = [
        ("stored energy in running", assessment.fact("stored_energy")),
        ("speed of the fastest point", assessment.fact("highest_tip_speed")),
        (case, assessment.fact("governing_stopping_time")),
        ("wait that covers it, with margin", assessment.fact("required_wait", "lockout")),
    ]
    made = Table([[_figure(sheet, label, fact) for label, fact in boxes]], colWidths=[sheet.width / 4] * 4)
    made.setStyle(FIGURE_BOX)
    return made


def _figure(sheet: Sheet, label: str, fact: Fact | None) -> list[Flowable]:
    if fact is None or not fact.known:
        needed = ", ".join(fact.missing[:3]) if fact is not None else ""
        return [
            paragraph("not known", FIGURE),
            paragraph(label, LABEL),
            paragraph(f"needs {needed}" if needed else "", LABEL),
        ]
    low, high = sheet.assessment.interval(fact)
    whole = sheet.of(fact, interval=True)
    ends = whole.partition(" (")[2].rstrip(")") if low != high else ""
    return [paragraph(sheet.of(fact), FIGURE), paragraph(label, LABEL), *([paragraph(ends, LABEL)] if ends else [])]


def _urgent(sheet: Sheet) -> Flowable:
    """One line to a rule, most urgent first, each leading to its first finding."""
    lines: dict[tuple[str, str, str], list[str]] = {}
    for finding in in_order(sheet):
        lines.setdefault((finding.rule.urgency, finding.outcome, finding.rule.key), []).append(finding.subject)
    if not lines:
        return paragraph("Nothing is for review or borderline among the rules that could be decided.", BODY)
    rows: list[list[Cell]] = [
        [
            urgency,
            outcome,
            Linked(key, finding_anchor(key, subjects[0])),
            ", ".join(filter(None, map(_place, subjects))),
        ]
        for (urgency, outcome, key), subjects in list(lines.items())[:MOST_LINES]
    ]
    if len(lines) > MOST_LINES:
        rows.append(["", "", f"and {len(lines) - MOST_LINES} more, in the section on findings", ""])
    return Grid(("urgency", "outcome", "finding", "at"), rows, shares(sheet.width, (20, 13, 34, 33)))


def _place(subject: str) -> str:
    return subject.partition(":")[2]


def _stop_cases(sheet: Sheet) -> list[Flowable]:
    cases = sheet.assessment.sheet.subjects.stops
    if not cases:
        return [paragraph("Stop cases: nothing is stated about stopping.", BODY)]
    times = "; ".join(f"{stop.entity} {sheet.number('stopping_time', stop.name)}" for stop in cases)
    return [paragraph(f"Time to standstill: {times}.", BODY)]


def _missing(sheet: Sheet) -> list[Flowable]:
    fields = [field for field, _ in fields_to_state(sheet)]
    if not fields:
        return []
    more = f" and {len(fields) - MOST_FIELDS} more, in the section on missing data" if len(fields) > MOST_FIELDS else ""
    return [paragraph(f"Missing, so not decided: {', '.join(fields[:MOST_FIELDS])}{more}.", BODY)]


def _counts(sheet: Sheet) -> str:
    counts = {outcome: sum(finding.outcome == outcome for finding in sheet.assessment.findings) for outcome in OUTCOMES}
    text = "Findings: " + ", ".join(f"{count} {outcome}" for outcome, count in counts.items()) + ". "
    draws = sheet.assessment.draws
    if not draws:
        return text + "Best estimate only; the stated spreads were left out."
    share = f"{100 * sheet.assessment.policy.coverage:g} %"
    return f"{text}Figures under a value are the ends of its {share} interval ({draws} draws from the stated spreads)."
