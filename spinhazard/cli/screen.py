"""Text on the terminal: width, wrapping, complaints. Plain text, so that it reads the same piped, logged or in monochrome."""

from __future__ import annotations

import shutil
import sys
import textwrap
import unicodedata

from spinhazard.errors import SpinhazardError

NARROWEST, WIDEST = 60, 120


def width() -> int:
    """Columns to write to.

    Returns
    -------
    int
        Width of the terminal within bounds; 80 when piped.
    """
    return max(NARROWEST, min(WIDEST, shutil.get_terminal_size((80, 24)).columns))


def columns_of(text: str) -> int:
    """Terminal columns a text takes; East Asian wide characters take two, combining ones none.

    Parameters
    ----------
    text : str
        One line.

    Returns
    -------
    int
        Columns.
    """
    return sum(0 if unicodedata.combining(c) else 2 if unicodedata.east_asian_width(c) in "WF" else 1 for c in text)


def padded(text: str, size: int) -> str:
    """Text filled up with spaces to a number of columns.

    Parameters
    ----------
    text : str
        One line.
    size : int
        Columns.

    Returns
    -------
    str
        The filled text.
    """
    return text + " " * max(0, size - columns_of(text))


def wrapped(text: str, *, indent: int = 0, first: str = "") -> list[str]:
    """Text broken to the width of the terminal.

    Parameters
    ----------
    text : str
        Text of one paragraph.
    indent : int
        Columns before each line.
    first : str
        What stands before the first line in place of the indent.

    Returns
    -------
    list of str
        Lines.
    """
    margin = " " * indent
    lines = textwrap.wrap(
        text,
        width=width() - 1,
        initial_indent=first or margin,
        subsequent_indent=margin,
        break_long_words=True,
        break_on_hyphens=False,
    )
    return lines or [first.rstrip()]


def say(*lines: str) -> None:
    """Print lines to standard output.

    Parameters
    ----------
    *lines : str
        Lines; characters that the terminal's encoding lacks become question marks.
    """
    encoding = sys.stdout.encoding or "utf-8"
    for line in lines:
        sys.stdout.write(line.encode(encoding, "replace").decode(encoding) + "\n")


def complain(error: SpinhazardError) -> None:
    """Print complaints to standard error, wrapped, one paragraph each.

    Parameters
    ----------
    error : SpinhazardError
        What went wrong.
    """
    encoding = sys.stderr.encoding or "utf-8"
    for complaint in error.complaints:
        for line in wrapped(str(complaint), indent=2, first="spinhazard: "):
            sys.stderr.write(line.encode(encoding, "replace").decode(encoding) + "\n")
