"""The policy that was used, and what it changes of the shipped defaults; the sources cited."""

from __future__ import annotations

from reportlab.platypus import Flowable

from spinhazard.facts.fact import FACTS
from spinhazard.sources import Source, resolve
from spinhazard.worksheet.grid import Grid
from spinhazard.worksheet.page import Sheet, group, heading, source_anchor
from spinhazard.worksheet.style import BODY, SMALL
from spinhazard.worksheet.text import paragraph, shares


def policy(sheet: Sheet, number: int) -> list[Flowable]:
    """Name, digests, deviations, settings.

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
    used = sheet.assessment.policy
    digests = sheet.assessment.digests
    made: list[Flowable] = [
        *heading(number, "Policy and sources"),
        paragraph(
            f"Policy: {used.name}. Shipped defaults are the project's own choice and no law; a site sets its own.", BODY
        ),
        *(paragraph(f"{name}: {digest}", SMALL) for name, digest in digests.items()),
    ]
    deviations = [list(entry) for entry in used.deviations()]
    if deviations:
        table = Grid(("setting", "shipped", "here"), deviations, shares(sheet.width, (40, 30, 30)))
        made += group("Deviations from the shipped defaults", table)
    else:
        made += [*group("Deviations from the shipped defaults"), paragraph("None.", BODY)]
    made += group("Settings", _settings(sheet))
    made += group("Sources", _sources(sheet))
    return made


def _settings(sheet: Sheet) -> Grid:
    """Every threshold and default, two to a line."""
    lines = [line.split(" = ", 1) for line in sheet.assessment.policy.as_text().split("\n")]
    entries = [[name.replace("_", " "), value] for name, value in lines]
    half = (len(entries) + 1) // 2
    rows = [[*entries[i], *(entries[half + i] if half + i < len(entries) else ("", ""))] for i in range(half)]
    return Grid(("setting", "value", "setting", "value"), rows, shares(sheet.width, (26, 24, 26, 24)), fine=True)


def _sources(sheet: Sheet) -> Grid:
    cited = _cited(sheet)
    rows = [
        [
            source.short,
            ", ".join(text for text in (source.author, source.title, source.edition, source.publisher) if text),
            source.status,
        ]
        for source in cited
    ]
    anchors = [(source_anchor(source.id),) for source in cited]
    heads = ("cited as", "document", "figures from")
    return Grid(heads, rows, shares(sheet.width, (25, 60, 15)), anchors=anchors, fine=True)


def _cited(sheet: Sheet) -> list[Source]:
    references = [
        basis
        for finding in sheet.assessment.findings
        if finding.outcome != "not applicable"
        for basis in finding.rule.basis
    ]
    references += [part for fact in sheet.assessment.facts for part in FACTS[fact.key].source.split("; ") if part]
    return sorted({source.id: source for source in map(resolve, references)}.values(), key=lambda source: source.id)
