"""The summary on page one: the figures that decide, what is for review, what is missing."""

from __future__ import annotations

from reportlab.platypus import Flowable, Spacer, Table

from spinhazard.facts.fact import Fact
from spinhazard.rules.rule import OUTCOMES, URGENCIES
from spinhazard.sampling import SOURCE
from spinhazard.sources import citation
from spinhazard.worksheet.page import Sheet, heading
from spinhazard.worksheet.style import BODY, FIGURE, FIGURE_BOX, LABEL
from spinhazard.worksheet.text import paragraph, shares, table

MOST_LINES = 14


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
        *_urgent(sheet),
        Spacer(1, 3),
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


def _urgent(sheet: Sheet) -> list[Flowable]:
    found = [
        finding
        for urgency in URGENCIES
        for outcome in ("for review", "borderline")
        for finding in sheet.assessment.findings
        if finding.outcome == outcome and finding.rule.urgency == urgency
    ]
    if not found:
        return [paragraph("Nothing is for review or borderline among the rules that could be decided.", BODY)]
    lines: dict[tuple[str, str, str], list[str]] = {}
    for finding in found:
        name = "" if finding.subject in {"machine", "lockout"} else finding.subject.partition(":")[2]
        lines.setdefault((finding.rule.urgency, finding.outcome, finding.rule.key), []).append(name)
    rows = [
        (urgency, outcome, key, ", ".join(name for name in names if name))
        for (urgency, outcome, key), names in lines.items()
    ]
    shown = [list(row) for row in rows[:MOST_LINES]]
    if len(rows) > MOST_LINES:
        shown.append(["", "", f"and {len(rows) - MOST_LINES} more, in the section on findings", ""])
    made = table(("urgency", "outcome", "finding", "at"), shown, shares(sheet.width, (20, 13, 34, 33)))
    return [made]


def _counts(sheet: Sheet) -> str:
    counts = {outcome: sum(finding.outcome == outcome for finding in sheet.assessment.findings) for outcome in OUTCOMES}
    text = "Findings: " + ", ".join(f"{count} {outcome}" for outcome, count in counts.items()) + ". "
    if sheet.assessment.draws:
        share = f"{100 * sheet.assessment.policy.coverage:g} %"
        return (
            text + f"Figures under a value are the ends of its {share} interval ({sheet.assessment.draws} draws from "
            f"the stated spreads; {citation(SOURCE)})."
        )
    return text + "Best estimate only; the stated spreads were left out."
