"""What each section is given: the assessment, the units and the width to fill; and words for facts."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property
from html import escape

import numpy as np
from reportlab.platypus import CondPageBreak, Flowable, Paragraph

from spinhazard.assessment import Assessment
from spinhazard.facts.fact import Fact
from spinhazard.quantity.display import System, display, display_interval
from spinhazard.worksheet.grid import Grid
from spinhazard.worksheet.style import GROUP, SECTION
from spinhazard.worksheet.text import plain

ROOM_BELOW_A_HEADING = 90.0
"""Room a heading needs, its own height included, to stay on the page [pt]."""
WITH_TEXT_AND_TABLE = 180.0
"""The same where a text stands between the heading and a table [pt]."""


@dataclass(frozen=True)
class Sheet:
    """The assessment as a section sees it.

    Attributes
    ----------
    assessment : Assessment
        The result.
    system : "si" or "us"
        Units shown.
    width : float
        Width of the text [pt].
    """

    assessment: Assessment
    system: System
    width: float

    @cached_property
    def fact_names(self) -> frozenset[str]:
        """Every fact of the assessment as "key|subject"."""
        return frozenset(f"{fact.key}|{fact.subject}" for fact in self.assessment.facts)

    @cached_property
    def linked_facts(self) -> frozenset[str]:
        """Facts that a printed finding leads to, as "key|subject"."""
        shown = [finding for finding in self.assessment.findings if finding.outcome in {"for review", "borderline"}]
        for finding in shown:
            _ = finding.says  # the message may look at more facts than the condition
        return frozenset(name for finding in shown for name in finding.facts)

    def number(self, key: str, subject: str = "machine", *, interval: bool = False, figures: int = 4) -> str:
        """A fact as text.

        Parameters
        ----------
        key, subject : str
            Which fact.
        interval : bool
            With the ends of its interval.
        figures : int
            Significant figures.

        Returns
        -------
        str
            ``–`` where it does not apply, ``not known`` where it is missing.
        """
        fact = self.assessment.fact(key, subject)
        return "–" if fact is None else self.of(fact, interval=interval, figures=figures)

    def of(self, fact: Fact, *, interval: bool = False, figures: int = 4) -> str:
        """Value of a fact as text.

        Parameters
        ----------
        fact : Fact
            The fact.
        interval : bool
            With the ends of its interval.
        figures : int
            Significant figures.

        Returns
        -------
        str
            Text with unit.
        """
        if fact.value is None:
            return "not known"
        if not isinstance(fact.value, np.ndarray):
            return display(fact.value if isinstance(fact.value, (str, bool)) else str(fact.value))
        if interval:
            return display_interval(fact.best, *self.assessment.interval(fact), fact.unit, system=self.system)
        return display(fact.best, fact.unit, system=self.system, figures=figures)


def fact_anchor(key: str, subject: str) -> str:
    """Name of the place where a fact is calculated.

    Parameters
    ----------
    key, subject : str
        Which fact.

    Returns
    -------
    str
        Anchor.
    """
    return f"fact {key} of {subject}"


def finding_anchor(key: str, subject: str) -> str:
    """Name of the place where a finding stands.

    Parameters
    ----------
    key, subject : str
        Rule and subject.

    Returns
    -------
    str
        Anchor.
    """
    return f"finding {key} at {subject}"


def source_anchor(name: str) -> str:
    """Name of the place where a source stands in the list.

    Parameters
    ----------
    name : str
        Id of the source.

    Returns
    -------
    str
        Anchor.
    """
    return f"source {name}"


def link(text: str, anchor: str) -> str:
    """Markup of a text that leads to an anchor; printed like any other text.

    Parameters
    ----------
    text, anchor : str
        Text shown, and where it leads.

    Returns
    -------
    str
        Markup, escaped.
    """
    return f'<a href="#{escape(anchor)}" color="black">{plain(text)}</a>'


def heading(number: int, title: str, *, room: float = ROOM_BELOW_A_HEADING) -> list[Flowable]:
    """Heading of a section, with its entry in the outline.

    Parameters
    ----------
    number : int
        Number of the section.
    title : str
        Title.
    room : float
        Room it needs to stay on the page [pt]; more where a text stands between it and a table.

    Returns
    -------
    list of Flowable
        The heading.
    """
    text = f"{number}  {title}"
    made = Paragraph(f'<a name="section-{number}"/>{plain(text)}', SECTION)
    made.outline = (text, f"section-{number}")
    return [CondPageBreak(room), made]


def group(title: str, below: Grid | None = None) -> list[Flowable]:
    """Heading inside a section, never the last line of a page.

    Parameters
    ----------
    title : str
        Title.
    below : Grid, optional
        The table under it, whose first rows stay with it.

    Returns
    -------
    list of Flowable
        The heading, and the table.
    """
    made = [Paragraph(plain(title), GROUP)]
    if below is None:
        return [CondPageBreak(ROOM_BELOW_A_HEADING), *made]
    return [CondPageBreak(below.least + GROUP.leading + GROUP.spaceBefore + GROUP.spaceAfter), *made, below]
