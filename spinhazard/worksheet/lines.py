"""Text to lines that fit a width: widths of words are remembered, long words break where a reader would break them."""

from __future__ import annotations

import re
from functools import lru_cache
from typing import NamedTuple

from reportlab.pdfbase import pdfmetrics

from spinhazard.worksheet.style import BOLD, PLAIN

HARD_SPACE = "\N{NO-BREAK SPACE}"
_BREAKABLE = re.compile("[ \t\r\n]+")
_JOINTS = "._/-|,;" + HARD_SPACE
"""A long word is broken after one of these, if it has one; else at the last character that fits."""


class Face(NamedTuple):
    """How a line is set: font, size and distance of lines [pt]."""

    font: str
    size: float
    leading: float


NORMAL, STRONG = Face(PLAIN, 7.6, 9.6), Face(BOLD, 7.6, 9.6)
FINE, FINE_STRONG = Face(PLAIN, 7.2, 9.2), Face(BOLD, 7.2, 9.2)


class Run(NamedTuple):
    """Text in one face, starting on a line of its own."""

    text: str
    face: Face = NORMAL


class Line(NamedTuple):
    """One line of a cell, as it will be drawn."""

    text: str
    face: Face


@lru_cache(maxsize=2)
def known_characters(font: str) -> dict[int, float]:
    """Characters a font has, with their widths.

    Parameters
    ----------
    font : str
        Name of a registered font.

    Returns
    -------
    dict
        Code point to width [1/1000 of the size].
    """
    face = pdfmetrics.getFont(font).face
    return {code: face.charWidths[code] for code in face.charToGlyph if code in face.charWidths}


def drawable(text: object) -> str:
    """Text in which every character the font lacks is shown by its code point.

    Parameters
    ----------
    text : object
        Anything with a text.

    Returns
    -------
    str
        Printable text, not escaped.
    """
    whole = str(text)
    if whole.isascii() and whole.isprintable():
        return whole
    known = known_characters(PLAIN)
    return "".join(c if ord(c) in known or c in "\t\r\n" else f"[U+{ord(c):04X}]" for c in whole)


@lru_cache(maxsize=20000)
def _width(word: str, font: str) -> float:
    widths = known_characters(font)
    return sum(widths.get(ord(character), 600.0) for character in word)


def width_of(text: str, face: Face) -> float:
    """Width of a text on one line.

    Parameters
    ----------
    text : str
        Text.
    face : Face
        How it is set.

    Returns
    -------
    float
        Width [pt].
    """
    return _width(text, face.font) * face.size / 1000.0


@lru_cache(maxsize=20000)
def broken(text: str, face: Face, room: float) -> tuple[Line, ...]:
    """Text broken into lines.

    Parameters
    ----------
    text : str
        Text, taken literally; blanks count once.
    face : Face
        How it is set.
    room : float
        Width of the column [pt].

    Returns
    -------
    tuple of Line
        At least one line.
    """
    limit = room * 1000.0 / face.size
    blank = _width(" ", face.font)
    lines: list[str] = []
    line, used = "", 0.0
    for word in filter(None, _BREAKABLE.split(drawable(text))):
        width = _width(word, face.font)
        if line and used + blank + width <= limit:
            line, used = f"{line} {word}", used + blank + width
            continue
        if line:
            lines.append(line)
        *full, line = [word] if width <= limit else _pieces(word, face.font, limit)
        lines += full
        used = _width(line, face.font)
    return tuple(Line(one, face) for one in [*lines, line])


def _pieces(word: str, font: str, limit: float) -> list[str]:
    """Parts of a word that is wider than the column."""
    widths = known_characters(font)
    pieces: list[str] = []
    start, joint, used = 0, 0, 0.0
    index = 0
    while index < len(word):
        width = widths.get(ord(word[index]), 600.0)
        if used + width > limit and index > start:
            end = joint if joint > start else index
            pieces.append(word[start:end])
            start = joint = index = end
            used = 0.0
            continue
        used += width
        index += 1
        if word[index - 1] in _JOINTS:
            joint = index
    return [*pieces, word[start:]]


def kept_together(text: str) -> str:
    """A value with its unit, which no line end parts.

    Parameters
    ----------
    text : str
        Such as ``22 kg m²``.

    Returns
    -------
    str
        The same with hard spaces.
    """
    return text.replace(" ", HARD_SPACE)
