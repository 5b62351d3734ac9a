"""Findings by urgency: what was found, why it matters, on whose text it rests, and what may be changed."""

from __future__ import annotations

from html import escape

from reportlab.platypus import Flowable, KeepTogether

from spinhazard.rules.engine import Finding
from spinhazard.rules.rule import URGENCIES
from spinhazard.sources import citation, resolve
from spinhazard.worksheet.page import Sheet, fact_anchor, finding_anchor, group, heading, link, source_anchor
from spinhazard.worksheet.style import BODY, SMALL
from spinhazard.worksheet.text import marked_up, paragraph, plain

MARKS = {"for review": "■ for review", "borderline": "◪ borderline"}
"""State is said in words and by a filled or half-filled square; never by colour."""
LAST = SMALL.clone("last of a finding", spaceAfter=6)


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
    ordered = in_order(sheet)
    for urgency in URGENCIES:
        found = [finding for finding in ordered if finding.rule.urgency == urgency]
        if found:
            made += group(urgency[0].upper() + urgency[1:])
            made += [_finding(sheet, finding) for finding in found]
    if not ordered:
        made.append(paragraph("Nothing is for review or borderline among the rules that could be decided.", BODY))
    return made


def in_order(sheet: Sheet) -> list[Finding]:
    """What is for review or borderline: by urgency, then outcome, then as the rules stand.

    Parameters
    ----------
    sheet : Sheet
        What to print.

    Returns
    -------
    list of Finding
        Findings.
    """
    outcomes = list(MARKS)
    found = [finding for finding in sheet.assessment.findings if finding.outcome in MARKS]
    return sorted(found, key=lambda f: (URGENCIES.index(f.rule.urgency), outcomes.index(f.outcome)))


def _finding(sheet: Sheet, finding: Finding) -> Flowable:
    rule = finding.rule
    says = finding.says  # read first: the message may look at more facts, and those belong to the list below
    likelihood = f", in {100 * finding.likelihood:.0f} % of the draws" if 0.0 < finding.likelihood < 1.0 else ""
    anchor = f'<a name="{escape(finding_anchor(rule.key, finding.subject))}"/>'
    head = f"{anchor}<b>{MARKS[finding.outcome]}{likelihood}: {plain(rule.key)}</b> · {plain(finding.subject)}"
    basis = "; ".join(link(citation(reference), source_anchor(resolve(reference).id)) for reference in rule.basis)
    lines = [
        marked_up(head, BODY),
        paragraph(says, BODY),
        paragraph(f"Why: {rule.because}", SMALL),
        marked_up(f"Basis: {basis}.", SMALL),
    ]
    if rule.measures:
        lines.append(paragraph(f"May be changed: {', '.join(rule.measures)}.", SMALL))
    lines.append(marked_up(f"Facts compared or named: {_facts(sheet, finding)}.", LAST))
    return KeepTogether(lines)


def _facts(sheet: Sheet, finding: Finding) -> str:
    """Keys of the facts, each leading to its line among the calculations."""
    known = sheet.fact_names
    words = []
    for name in finding.facts:
        key, _, subject = name.partition("|")
        words.append(link(key, fact_anchor(key, subject)) if name in known else plain(key))
    return ", ".join(words)
