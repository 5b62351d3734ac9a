"""User text to paper: nothing a user writes is ever markup, and every character shows as something."""

from __future__ import annotations

from collections.abc import Sequence
from functools import lru_cache
from html import escape
from typing import Any

from reportlab.lib.styles import ParagraphStyle
from reportlab.platypus import Paragraph

from spinhazard.worksheet.lines import drawable
from spinhazard.worksheet.style import CELL


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
    return escape(drawable(text), quote=False)


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
