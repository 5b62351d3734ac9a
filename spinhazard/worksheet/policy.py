"""The policy that was used, and what it changes of the shipped defaults; the sources cited."""

from __future__ import annotations

from reportlab.platypus import Flowable

from spinhazard.facts.fact import FACTS
from spinhazard.sources import Source, resolve
from spinhazard.worksheet.page import Sheet, group, heading
from spinhazard.worksheet.style import BODY, SMALL
from spinhazard.worksheet.text import paragraph, shares, table


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
    made += group("Deviations from the shipped defaults")
    if deviations:
        made.append(table(("setting", "shipped", "here"), deviations, shares(sheet.width, (40, 30, 30))))
    else:
        made.append(paragraph("None.", BODY))
    settings = [line.split(" = ", 1) for line in used.as_text().split("\n")]
    made += group("Settings")
    made.append(paragraph("; ".join(f"{name} {value}" for name, value in settings if value != "none") + ".", SMALL))
    rows = [
        [
            source.short,
            ", ".join(text for text in (source.author, source.title, source.edition, source.publisher) if text),
            source.status,
        ]
        for source in _cited(sheet)
    ]
    made += [*group("Sources"), table(("cited as", "document", "figures"), rows, shares(sheet.width, (25, 60, 15)))]
    return made


def _cited(sheet: Sheet) -> list[Source]:
    references = [
        basis
        for finding in sheet.assessment.findings
        if finding.outcome != "not applicable"
        for basis in finding.rule.basis
    ]
    references += [part for fact in sheet.assessment.facts for part in FACTS[fact.key].source.split("; ") if part]
    return sorted({source.id: source for source in map(resolve, references)}.values(), key=lambda source: source.id)
