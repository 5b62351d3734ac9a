"""The bibliography: every formula, rule and check names its source by an id of ``sources.toml`` and a place in it."""

from __future__ import annotations

import difflib
import tomllib
from dataclasses import dataclass
from functools import lru_cache
from importlib import resources
from typing import Literal

Status = Literal["text", "memory", "common practice", "own"]


@dataclass(frozen=True)
class Source:
    """One document in one edition.

    Attributes
    ----------
    id : str
        Short name used in references.
    short : str
        As cited in a line.
    title, author, edition, publisher : str
        Bibliographic data.
    status : str
        "text": figures read in a published text; "memory": from memory, to be checked against the current edition;
        "common practice": the trade's habit without a source; "own": our own derivation or setting.
    note : str
        Remarks.
    """

    id: str
    short: str
    title: str
    author: str
    edition: str
    publisher: str
    status: Status
    note: str


@lru_cache(maxsize=1)
def load_sources() -> dict[str, Source]:
    """All sources by id.

    Returns
    -------
    dict
        Id to :class:`Source`.
    """
    raw = tomllib.loads(resources.files("spinhazard").joinpath("sources.toml").read_text("utf-8"))
    return {
        entry["id"]: Source(
            id=entry["id"], short=entry["short"], title=entry["title"], author=entry.get("author", ""), edition=entry.get("edition", ""),
            publisher=entry.get("publisher", ""), status=entry["status"], note=entry.get("note", ""),
        )
        for entry in raw["source"]
    }  # fmt: skip


def resolve(reference: str) -> Source:
    """The source a reference points to.

    Parameters
    ----------
    reference : str
        "id place", for example ``"iso-14119 6.2"``.

    Returns
    -------
    Source
        The source.

    Raises
    ------
    LookupError
        There is no such id; the text names the nearest.
    """
    name = reference.partition(" ")[0]
    found = load_sources().get(name)
    if found is None:
        near = difflib.get_close_matches(name, load_sources(), n=1, cutoff=0.4)
        raise LookupError(f'no source has the id "{name}"' + (f'; the nearest is "{near[0]}"' if near else ""))
    return found


def citation(reference: str) -> str:
    """A reference as printed.

    Parameters
    ----------
    reference : str
        "id place".

    Returns
    -------
    str
        Such as ``ISO 14119:2013, 6.2 (figure from memory)``.

    Raises
    ------
    LookupError
        There is no such id.
    """  # noqa: DOC502  (raised by resolve)
    source = resolve(reference)
    place = reference.partition(" ")[2]
    joint = "" if place.startswith("(") else ", "
    text = f"{source.short}{joint}{place}" if place else source.short
    return f"{text} (from memory)" if source.status == "memory" else text
