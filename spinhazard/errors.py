"""Every exception the program raises on purpose, one class for each reaction of the reader.

::

    SpinhazardError
    ├── InputError       what was stated cannot be used            exit code 2
    ├── OutputError      what was asked for could not be written   exit code 3
    └── CatalogueError   a rule, source or policy file is wrong    exit code 2

The parts of a message stay attributes; the sentence is built in one place, :meth:`Complaint.__str__`.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

LONGEST_QUOTE = 60


def quoted(value: object) -> str:
    """Stated text fit for one terminal line: control characters escaped, long text cut.

    Parameters
    ----------
    value : object
        What the user stated.

    Returns
    -------
    str
        Text in double quotes for strings, plain for numbers and the like.
    """
    if isinstance(value, str):
        text = "".join(
            c if c.isprintable() else c.encode("unicode_escape").decode() for c in value[: LONGEST_QUOTE * 2]
        )
        if len(value) > LONGEST_QUOTE:
            text = f"{text[:LONGEST_QUOTE]}… ({len(value)} characters)"
        return f'"{text}"'
    if isinstance(value, bool):
        return "true" if value else "false"
    text = str(value)
    text = "".join(c if c.isprintable() else c.encode("unicode_escape").decode() for c in text[: LONGEST_QUOTE * 2])
    return f"{text[:LONGEST_QUOTE]}…" if len(text) > LONGEST_QUOTE else text


@dataclass(frozen=True)
class Complaint:
    """One thing that is wrong, with everything a person needs to mend it."""

    problem: str
    file: str = ""
    line: int | None = None
    field: str = ""
    stated: str = ""
    accepted: str = ""
    nearest: str = ""

    def __str__(self) -> str:
        where = self.file
        if self.line is not None:
            where += f", line {self.line}" if where else f"line {self.line}"
        if self.field:
            where += f", {self.field}" if where else self.field
        sentences = [f"{where}: {self.problem}." if where else f"{self.problem}."]
        if self.stated:
            sentences.append(f"Stated: {self.stated}.")
        if self.accepted:
            sentences.append(f"Accepted: {self.accepted}.")
        if self.nearest:
            sentences.append(f"Nearest: {self.nearest}.")
        return " ".join(sentences)


class SpinhazardError(Exception):
    """Base of all exceptions raised on purpose; carries its complaints."""

    exit_code = 2

    def __init__(self, complaints: Complaint | Iterable[Complaint]) -> None:
        self.complaints = (complaints,) if isinstance(complaints, Complaint) else tuple(complaints)
        super().__init__(self.complaints)

    def __str__(self) -> str:
        return "\n".join(str(complaint) for complaint in self.complaints)


class InputError(SpinhazardError):
    """What was stated cannot be used; nothing was written."""


class CatalogueError(SpinhazardError):
    """A rule, a source or a policy names something that does not exist or does not fit."""


class OutputError(SpinhazardError):
    """An output could not be written; what stood there before is untouched."""

    exit_code = 3
