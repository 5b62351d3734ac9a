"""The compact terminal summary of one assessment; readable at 80 columns, piped and in monochrome."""

from __future__ import annotations

import numpy as np

from spinhazard.assessment import CAUTIONS, Assessment
from spinhazard.cli.screen import columns_of, padded, width, wrapped
from spinhazard.facts.fact import Fact
from spinhazard.quantity.display import System, display, display_interval
from spinhazard.rules.engine import Finding, shown
from spinhazard.rules.rule import OUTCOMES, URGENCIES

MOST_MISSING = 12


def summary(assessment: Assessment, *, system: System = "si") -> list[str]:
    """Lines of the summary.

    Parameters
    ----------
    assessment : Assessment
        The result.
    system : "si" or "us"
        Units shown.

    Returns
    -------
    list of str
        Lines without line ends.
    """
    return [
        *_identity(assessment),
        *_energy(assessment, system),
        *_stops(assessment, system),
        *_findings(assessment),
        *_missing(assessment),
        *_closing(assessment),
    ]


def _identity(assessment: Assessment) -> list[str]:
    machine, record = assessment.file.machine, assessment.file.assessment
    title = f"{machine.tag}  {machine.name}".rstrip()
    place = ", ".join(text for text in (machine.site, machine.location) if text)
    about = f"{machine.kind} · revision {record.revision}" + (f" · {record.date}" if record.date else "")
    about += f" · {record.assessor}" if record.assessor else ""
    lines = [*wrapped(title), *wrapped(about)]
    if place:
        lines += wrapped(place)
    return [*lines, "─" * min(width() - 1, max(columns_of(line) for line in lines))]


def _energy(assessment: Assessment, system: System) -> list[str]:
    rows = [
        ("Stored energy", assessment.fact("stored_energy")),
        ("  at highest speed", assessment.fact("stored_energy_at_max_speed")),
        ("Fastest point", assessment.fact("highest_tip_speed")),
        ("Governing stop", assessment.fact("governing_stopping_time")),
        ("Required wait", assessment.fact("required_wait", "lockout")),
    ]
    lines = []
    for label, fact in rows:
        if fact is None:
            continue
        text = number_of(assessment, fact, system)
        if fact.key == "governing_stopping_time" and fact.known:
            text += f"  ({shown(assessment.fact('governing_stop'), system)})"
        lines += wrapped(text, indent=22, first=padded(label, 22))
    return lines


def number_of(assessment: Assessment, fact: Fact, system: System) -> str:
    """A fact as text with its interval, or what is missing for it.

    Parameters
    ----------
    assessment : Assessment
        The result.
    fact : Fact
        The fact.
    system : "si" or "us"
        Units shown.

    Returns
    -------
    str
        Text.
    """
    if fact.failed:
        return f"not computed: {fact.failed}"
    if not isinstance(fact.value, np.ndarray):
        return "not known: " + ", ".join(fact.missing) if fact.value is None else str(fact.value)
    return display_interval(fact.best, *assessment.interval(fact), fact.unit, system=system)


def _stops(assessment: Assessment, system: System) -> list[str]:
    keys = ("stopping_time", "stopping_turns", "energy_at_access", "brake_heat")
    heads = ("stop case", "time", "turns", "left at access", "brake heat")
    table = []
    for stop in assessment.sheet.subjects.stops:
        facts = [assessment.fact(key, stop.name) for key in keys]
        if not any(fact is not None and fact.known for fact in facts):
            continue
        cells = ["–" if fact is None else display(fact.best, fact.unit, system=system, figures=3) for fact in facts]
        table.append((stop.entity, *cells))
    if not table:
        return []
    sizes = [max(len(row[i]) for row in (heads, *table)) + 2 for i in range(len(heads))]
    return [
        "",
        *(
            "".join(
                [padded(row[0], sizes[0]), *(cell.rjust(size) for cell, size in zip(row[1:], sizes[1:], strict=True))]
            ).rstrip()
            for row in (heads, *table)
        ),
    ]


def _findings(assessment: Assessment) -> list[str]:
    lines: list[str] = []
    for urgency in URGENCIES:
        found = [
            f for f in assessment.findings if f.outcome in {"for review", "borderline"} and f.rule.urgency == urgency
        ]
        if found:
            lines += ["", f"{urgency.upper()}"]
            for finding in sorted(found, key=lambda f: f.outcome != "for review"):
                lines += _finding(finding)
    return lines or ["", "Nothing for review or borderline among the rules that could be decided."]


def _finding(finding: Finding) -> list[str]:
    mark = "!" if finding.outcome == "for review" else "~"
    about = "" if finding.subject in {"machine", "lockout"} else f" · {finding.subject}"
    note = "" if finding.outcome == "for review" else " (borderline)"
    return [
        *wrapped(f"{finding.rule.key}{about}{note}", indent=4, first=f"  {mark} "),
        *wrapped(finding.says, indent=4),
    ]


def _missing(assessment: Assessment) -> list[str]:
    waiting = [finding for finding in assessment.findings if finding.outcome == "data missing"]
    if not waiting:
        return []
    fields: dict[str, int] = {}
    for finding in waiting:
        for field in finding.missing:
            fields[field] = fields.get(field, 0) + 1
    lines = ["", f"DATA MISSING  ({len(waiting)} findings cannot be decided)"]
    ranked = sorted(fields.items(), key=lambda entry: (-entry[1], entry[0]))
    for field, count in ranked[:MOST_MISSING]:
        lines += wrapped(f"{field}  ({count} finding{'s' if count > 1 else ''})", indent=6, first="  ? ")
    if len(ranked) > MOST_MISSING:
        lines.append(f"    and {len(ranked) - MOST_MISSING} more fields; the worksheet lists them all")
    return lines


def _closing(assessment: Assessment) -> list[str]:
    counts = {outcome: sum(f.outcome == outcome for f in assessment.findings) for outcome in OUTCOMES}
    text = ", ".join(f"{count} {outcome}" for outcome, count in counts.items())
    lines = ["", *wrapped(f"Findings: {text}.")]
    if assessment.draws:
        share = f"{100 * assessment.policy.coverage:g} %"
        lines += wrapped(f"Intervals in brackets cover {share} of {assessment.draws} draws from the stated spreads.")
    else:
        lines += wrapped("Best estimate only: the stated spreads were left out.")
    lines += wrapped(f"Policy: {assessment.policy.name}. Inputs {assessment.digests['inputs'][:23]}…")
    return [*lines, "", *wrapped(" ".join((CAUTIONS[0], CAUTIONS[2], CAUTIONS[3])))]
