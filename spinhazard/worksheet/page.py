"""What each section is given: the assessment, the units and the width to fill; and words for facts."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from reportlab.platypus import CondPageBreak, Flowable, Paragraph

from spinhazard.assessment import Assessment
from spinhazard.facts.fact import Fact
from spinhazard.quantity.display import System, display, display_interval
from spinhazard.worksheet.style import GROUP, SECTION
from spinhazard.worksheet.text import plain

ROOM_BELOW_A_HEADING = 90.0
"""Points a heading needs below it, its own height included, to stay on the page."""


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


def heading(number: int, title: str) -> list[Flowable]:
    """Heading of a section, with its entry in the outline.

    Parameters
    ----------
    number : int
        Number of the section.
    title : str
        Title.

    Returns
    -------
    list of Flowable
        The heading.
    """
    text = f"{number}  {title}"
    made = Paragraph(f'<a name="section-{number}"/>{plain(text)}', SECTION)
    made.outline = (text, f"section-{number}")
    return [CondPageBreak(ROOM_BELOW_A_HEADING), made]


def group(title: str) -> list[Flowable]:
    """Heading inside a section, never the last line of a page.

    Parameters
    ----------
    title : str
        Title.

    Returns
    -------
    list of Flowable
        The heading.
    """
    return [CondPageBreak(ROOM_BELOW_A_HEADING), Paragraph(plain(title), GROUP)]
