"""The worksheet as a document: sections in order, page furniture, outline; same input, same bytes."""

from __future__ import annotations

import io
from collections.abc import Callable
from typing import Any

from reportlab.lib.pagesizes import A4, LETTER
from reportlab.lib.units import mm
from reportlab.pdfbase.pdfmetrics import stringWidth
from reportlab.pdfgen.canvas import Canvas
from reportlab.platypus import BaseDocTemplate, Flowable, Frame, PageTemplate

from spinhazard.assessment import Assessment
from spinhazard.quantity.display import System
from spinhazard.worksheet.calculations import calculations
from spinhazard.worksheet.findings import findings
from spinhazard.worksheet.guards import guards
from spinhazard.worksheet.identity import identity
from spinhazard.worksheet.inputs import inputs
from spinhazard.worksheet.lines import drawable
from spinhazard.worksheet.looked_at import looked_at
from spinhazard.worksheet.missing import missing
from spinhazard.worksheet.page import Sheet
from spinhazard.worksheet.policy import policy
from spinhazard.worksheet.rotor import rotor
from spinhazard.worksheet.signoff import signoff
from spinhazard.worksheet.stops import stops
from spinhazard.worksheet.style import BOLD, MARGIN, PLAIN, RULE, register_fonts
from spinhazard.worksheet.summary import summary

SECTIONS: tuple[Callable[[Sheet, int], list[Flowable]], ...] = (
    summary, findings, missing, rotor, stops, guards, looked_at, calculations, inputs, policy, signoff,
)  # fmt: skip
FOOT = "Flags conditions for review; local codes and qualified, licensed safety professionals take precedence."


def worksheet(assessment: Assessment, *, system: System = "si", paper: str = "a4") -> bytes:
    """The worksheet of one assessment.

    Parameters
    ----------
    assessment : Assessment
        The result.
    system : "si" or "us"
        Units shown.
    paper : "a4" or "letter"
        Size of the paper.

    Returns
    -------
    bytes
        A PDF; the same bytes for the same assessment.
    """
    register_fonts()
    size = LETTER if paper == "letter" else A4
    sheet = Sheet(assessment, system, size[0] - 2 * MARGIN)
    story: list[Flowable] = identity(sheet)
    for number, section in enumerate(SECTIONS, start=1):
        story += section(sheet, number)
    target = io.BytesIO()
    document = _Document(target, pagesize=size, assessment=assessment)
    document.build(story, canvasmaker=lambda *arguments, **named: _Pages(*arguments, assessment=assessment, **named))
    return target.getvalue()


class _Document(BaseDocTemplate):  # type: ignore[misc]  # reportlab has no types
    """One page template; headings become outline entries."""

    def __init__(self, target: io.BytesIO, *, pagesize: tuple[float, float], assessment: Assessment) -> None:
        machine = assessment.file.machine
        super().__init__(
            target, pagesize=pagesize, invariant=1, title=drawable(f"{machine.tag} {machine.name} worksheet".replace("  ", " ")),
            author=drawable(assessment.file.assessment.assessor) or "not stated",
            subject="Stored rotational energy, stopping, access, lockout",
            creator=assessment.program, lang="en", leftMargin=MARGIN, rightMargin=MARGIN, topMargin=24 * mm, bottomMargin=20 * mm,
        )  # fmt: skip
        frame = Frame(
            MARGIN,
            20 * mm,
            pagesize[0] - 2 * MARGIN,
            pagesize[1] - 42 * mm,
            leftPadding=0,
            rightPadding=0,
            topPadding=0,
            bottomPadding=0,
        )
        self.addPageTemplates(PageTemplate(id="page", frames=[frame]))

    def afterFlowable(self, flowable: Flowable) -> None:  # noqa: N802  (reportlab's name)
        outline = getattr(flowable, "outline", None)
        if outline is not None:
            title, key = outline
            self.canv.bookmarkPage(key)
            self.canv.addOutlineEntry(drawable(title), key, level=0)


class _Pages(Canvas):  # type: ignore[misc]  # reportlab has no types
    """Holds the pages back until their number is known, then adds head and foot to each."""

    def __init__(self, *arguments: Any, assessment: Assessment, **named: Any) -> None:
        super().__init__(*arguments, **{**named, "initialFontName": PLAIN})
        self._assessment = assessment
        self._held: list[dict[str, Any]] = []

    def showPage(self) -> None:  # noqa: N802  (reportlab's name)
        self._held.append(dict(self.__dict__))
        self._doc.pageCounter += 1  # bookmarks and links point to the page of this number
        self._startPage()

    def save(self) -> None:
        self._doc.pageCounter = 1
        for page in self._held:
            self.__dict__.update(page)
            self._furnish(len(self._held))
            super().showPage()
        super().save()

    def _furnish(self, pages: int) -> None:
        width, height = self._pagesize
        machine, record = self._assessment.file.machine, self._assessment.file.assessment
        right = f"revision {record.revision}" + (f" · {record.date}" if record.date else "")
        self.setStrokeColor(RULE)
        self.setLineWidth(0.5)
        self.line(MARGIN, height - 16 * mm, width - MARGIN, height - 16 * mm)
        self.line(MARGIN, 15.5 * mm, width - MARGIN, 15.5 * mm)
        self.setFont(BOLD, 7.5)
        self.drawString(
            MARGIN, height - 14 * mm, _cut(f"{machine.tag}  {machine.name}", BOLD, width - 2 * MARGIN - 150)
        )
        self.setFont(PLAIN, 7.5)
        self.drawRightString(width - MARGIN, height - 14 * mm, right)
        self.setFont(PLAIN, 6.6)
        self.drawString(MARGIN, 12.6 * mm, FOOT)
        self.drawRightString(width - MARGIN, 12.6 * mm, f"page {self._pageNumber} of {pages}")
        self.drawString(MARGIN, 9.6 * mm, f"inputs {self._assessment.digests['inputs']}")
        self.drawRightString(width - MARGIN, 9.6 * mm, self._assessment.program)


def _cut(text: str, font: str, room: float) -> str:
    """Text that fits on its line, shortened with an ellipsis."""
    text = drawable(text)
    while len(text) > 1 and stringWidth(text, font, 7.5) > room:
        text = text[:-2].rstrip() + "…"
    return text
