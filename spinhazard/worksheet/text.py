"""User text to paper: nothing a user writes is ever markup, and every character shows as something."""

from __future__ import annotations

from collections.abc import Sequence
from functools import lru_cache
from typing import Any, TypeAlias
from xml.sax.saxutils import escape

from reportlab.lib.styles import ParagraphStyle
from reportlab.pdfbase import pdfmetrics
from reportlab.platypus import Paragraph, Table

from spinhazard.worksheet.style import CELL, GRID, HEAD_CELL, HEAD_NUMBER, NUMBER, PLAIN


@lru_cache(maxsize=1)
def _known_characters() -> frozenset[int]:
    return frozenset(pdfmetrics.getFont(PLAIN).face.charToGlyph)


def plain(text: object) -> str:
    """Text with its markup characters escaped and what the font lacks shown by code point.

    Parameters
    ----------
    text : object
        Anything with a text.

    Returns
    -------
    str
        Fit for a reportlab paragraph.
    """
    return escape(drawable(text))


def drawable(text: object) -> str:
    """Text in which every character the font lacks is shown by its code point; for drawings and canvas, unescaped.

    Parameters
    ----------
    text : object
        Anything with a text.

    Returns
    -------
    str
        Printable text.
    """
    whole = str(text)
    if whole.isascii():
        return whole
    known = _known_characters()
    return "".join(c if ord(c) in known else f"[U+{ord(c):04X}]" for c in whole)


class _Paragraph(Paragraph):  # type: ignore[misc]  # reportlab has no types
    """A paragraph that remembers its lines for a width: tables ask for the height of each cell again on every page."""

    _size: tuple[float, tuple[float, float]] | None = None

    def wrap(self, available_width: float, available_height: float) -> tuple[float, float]:
        if self._size is None or self._size[0] != available_width or not hasattr(self, "blPara"):
            self._size = (available_width, super().wrap(available_width, available_height))
        return self._size[1]


@lru_cache(maxsize=64)
def _fragment(style: ParagraphStyle) -> Any:
    """The one fragment a paragraph of this style is made of, to be copied with another text."""
    return Paragraph("x", style).frags[0]


def paragraph(text: object, style: ParagraphStyle = CELL) -> Paragraph:
    """A paragraph of plain text, which never meets the markup parser.

    Parameters
    ----------
    text : object
        Text, taken literally.
    style : ParagraphStyle
        Style.

    Returns
    -------
    Paragraph
        Flowable.
    """
    return _Paragraph("", style, frags=[_fragment(style).clone(text=" ".join(drawable(text).split()))])


def marked_up(text: str, style: ParagraphStyle = CELL) -> Paragraph:
    """A paragraph with our own markup; what a user wrote goes through :func:`plain` first.

    Parameters
    ----------
    text : str
        Text with reportlab's markup.
    style : ParagraphStyle
        Style.

    Returns
    -------
    Paragraph
        Flowable.
    """
    return _Paragraph(text, style)


Cell: TypeAlias = Any  # text, taken literally, or flowables (reportlab has no types)


def table(
    heads: Sequence[str], rows: Sequence[Sequence[Cell]], widths: Sequence[float], *, numbers: Sequence[int] = ()
) -> Table:
    """A table that breaks over pages and repeats its head.

    Parameters
    ----------
    heads : sequence of str
        Column heads.
    rows : sequence of sequences
        Cells: text, taken literally, or flowables.
    widths : sequence of float
        Column widths [pt].
    numbers : sequence of int
        Columns set to the right.

    Returns
    -------
    Table
        Flowable.
    """
    top = [paragraph(head, HEAD_NUMBER if index in numbers else HEAD_CELL) for index, head in enumerate(heads)]
    body = [
        [
            paragraph(cell, NUMBER if index in numbers else CELL) if isinstance(cell, str) else cell
            for index, cell in enumerate(row)
        ]
        for row in rows
    ]
    made = Table([top, *body], colWidths=list(widths), repeatRows=1, splitInRow=1, spaceAfter=4)
    made.setStyle(GRID)
    return made


def shares(total: float, parts: Sequence[float]) -> list[float]:
    """Column widths from parts of the whole.

    Parameters
    ----------
    total : float
        Width to share out [pt].
    parts : sequence of float
        Relative widths.

    Returns
    -------
    list of float
        Widths [pt].
    """
    return [total * part / sum(parts) for part in parts]
