"""TOML to rules. Refuses unknown facts, fields, sources and words, and comparisons of unlike kinds, with file and line."""

from __future__ import annotations

import difflib
import fnmatch
import hashlib
import re
import tomllib
from collections.abc import Iterable
from dataclasses import dataclass
from functools import lru_cache
from importlib import resources
from typing import Any

from spinhazard.errors import CatalogueError, Complaint, quoted
from spinhazard.rules.conditions import KIND_OF_UNIT, RuleFault, conditions, nearest_of, one_of, policy_kind, reachable
from spinhazard.rules.levers import is_lever, nearest_lever
from spinhazard.rules.rule import EACH, FORBIDDEN_NAMES, OUTCOMES, URGENCIES, Example, Rule
from spinhazard.sources import resolve

__all__ = ["KIND_OF_UNIT", "PLACEHOLDER", "Catalogue", "catalogue_of", "load_rules", "shipped_catalogue"]

NEEDED = ("key", "since", "asks", "because", "each", "review", "urgency", "says", "basis")
TAKEN = (*NEEDED, "applies", "measures", "example", "withdrawn", "withdrawn_because")
TEXTS = ("key", "since", "asks", "because", "each", "urgency", "says", "withdrawn", "withdrawn_because")
LISTS: dict[str, tuple[type, str]] = {
    "measures": (str, "not a list of texts"),
    "basis": (str, "not a list of texts"),
    "example": (dict, "examples are not written as [[rule.example]] tables"),
}
PLACEHOLDER = re.compile(r"\{([a-z_.]+)\}")


@dataclass(frozen=True)
class Catalogue:
    """Rules with the digest of the files they came from."""

    rules: tuple[Rule, ...]
    digest: str

    def rule(self, key: str) -> Rule:
        """The rule of a key.

        Parameters
        ----------
        key : str
            Key.

        Returns
        -------
        Rule
            The rule.

        Raises
        ------
        CatalogueError
            There is none; names the nearest.
        """
        for rule in self.rules:
            if rule.key == key:
                return rule
        keys = [rule.key for rule in self.rules]
        near = difflib.get_close_matches(key[:80], keys, n=1, cutoff=0.3)
        raise CatalogueError(
            Complaint(
                "no rule has this key",
                stated=quoted(key),
                accepted="a key that `spinhazard rules` lists",
                nearest=near[0] if near else "",
            )
        )


@lru_cache(maxsize=2)
def shipped_catalogue(*, examples: bool = False) -> Catalogue:
    """The catalogue that comes with the program.

    Parameters
    ----------
    examples : bool
        With the examples beside the rules, which an assessment does not need and which are most of the text.

    Returns
    -------
    Catalogue
        All rules, families in alphabetical order of their files.
    """
    folder = resources.files("spinhazard.rules").joinpath("catalogue")
    files = sorted((entry for entry in folder.iterdir() if entry.name.endswith(".toml")), key=lambda entry: entry.name)
    return catalogue_of(((entry.name, entry.read_text("utf-8")) for entry in files), examples=examples)


def _without_examples(text: str) -> str:
    """The same lines with those of the examples left empty, so that line numbers stay."""
    kept: list[str] = []
    inside = False
    for line in text.split("\n"):
        head = line.strip()
        if head.startswith("[["):
            inside = head == "[[rule.example]]"
        kept.append("" if inside else line)
    return "\n".join(kept)


def catalogue_of(files: Iterable[tuple[str, str]], *, examples: bool = True) -> Catalogue:
    """A catalogue from the texts of its files.

    Parameters
    ----------
    files : iterable of (str, str)
        Name and text of each file; the name without ``.toml`` is the family.
    examples : bool
        Read the examples as well; the digest is that of the whole text either way.

    Returns
    -------
    Catalogue
        All rules in the order of the files.

    Raises
    ------
    CatalogueError
        With every complaint about the first file that is wrong, or two rules have the same key.
    """
    texts = tuple(files)
    rules: dict[str, Rule] = {}
    for name, text in texts:
        wanted = text if examples else _without_examples(text)
        for index, rule in enumerate(load_rules(wanted, name=name, family=name.removesuffix(".toml"))):
            if rule.key in rules:
                raise CatalogueError(
                    Complaint(
                        "another rule has this key",
                        file=name,
                        line=_line(text, index),
                        field="key",
                        stated=quoted(rule.key),
                    )
                )
            rules[rule.key] = rule
    digest = hashlib.sha256("\x00".join(text for _, text in texts).encode()).hexdigest()
    return Catalogue(rules=tuple(rules.values()), digest=f"sha256:{digest}")


def load_rules(text: str, *, name: str, family: str) -> list[Rule]:
    """Rules of one file.

    Parameters
    ----------
    text : str
        TOML text with ``[[rule]]`` tables.
    name : str
        What messages call the file.
    family : str
        Family the rules belong to.

    Returns
    -------
    list of Rule
        The rules.

    Raises
    ------
    CatalogueError
        With every complaint about the file.
    """
    try:
        raw = tomllib.loads(text)
    except tomllib.TOMLDecodeError as error:
        raise CatalogueError(Complaint(f"not readable as TOML ({error})", file=name)) from None
    entries = raw.get("rule", [])
    if not isinstance(entries, list) or not all(isinstance(entry, dict) for entry in entries):
        raise CatalogueError(Complaint("rules are not written as [[rule]] tables", file=name, field="rule"))
    rules: list[Rule] = []
    complaints: list[Complaint] = []
    for index, entry in enumerate(entries):
        try:
            rules.append(_rule(entry, family))
        except RuleFault as fault:
            key = entry.get("key")
            complaints.append(
                Complaint(
                    fault.problem,
                    file=name,
                    line=_line(text, index),
                    field=f"{key if isinstance(key, str) else f'rule {index + 1}'}.{fault.field}",
                    stated=quoted(fault.stated) if fault.stated is not None else "",
                    accepted=fault.accepted,
                    nearest=fault.nearest,
                )
            )
    if complaints:
        raise CatalogueError(complaints)
    return rules


def _line(text: str, index: int) -> int:
    """Line of the n-th ``[[rule]]``; only on the way to a message."""
    starts = [match.start(1) for match in re.finditer(r"^[ \t]*(\[\[rule\]\])", text, re.MULTILINE)]
    return text.count("\n", 0, starts[index]) + 1 if index < len(starts) else 1


def _rule(entry: dict[str, Any], family: str) -> Rule:
    _refuse_unfit_fields(entry)
    key, each = entry["key"], one_of("each", entry["each"], EACH)
    if not re.fullmatch(r"[a-z0-9]+(-[a-z0-9]+)+", key) or any(
        fnmatch.fnmatch(key, pattern) for pattern in FORBIDDEN_NAMES
    ):
        raise RuleFault("key", "a key names the condition found, in lower case with hyphens", stated=key)
    rule = Rule(
        key=key, family=family, since=entry["since"], asks=entry["asks"], because=entry["because"], each=each,
        applies=conditions("applies", entry.get("applies", []), each), review=conditions("review", entry["review"], each),
        urgency=one_of("urgency", entry["urgency"], URGENCIES),  # type: ignore[arg-type]
        says=entry["says"], measures=tuple(entry.get("measures", ())), basis=tuple(entry["basis"]),
        examples=tuple(_example(example) for example in entry.get("example", ())), withdrawn=entry.get("withdrawn", ""),
        withdrawn_because=entry.get("withdrawn_because", ""),
    )  # fmt: skip
    _refuse_unknown_names(rule)
    return rule


def _refuse_unfit_fields(entry: dict[str, Any]) -> None:
    """Fields that are unknown, missing, or not of the form a rule takes."""
    for field, value in entry.items():
        if field not in TAKEN:
            raise RuleFault(
                field, "no such field in a rule", accepted=", ".join(TAKEN), nearest=nearest_of(field, TAKEN)
            )
        if field in TEXTS and not (isinstance(value, str) and value.strip()):
            raise RuleFault(field, "not a text", stated=value)
        if field in LISTS and not _is_list_of(LISTS[field][0], value):
            raise RuleFault(field, LISTS[field][1], stated=value)
    for field in (*NEEDED, *(("withdrawn_because",) if "withdrawn" in entry else ())):
        if field not in entry:
            raise RuleFault(field, "this field is needed and is not stated")


def _is_list_of(kind: type, value: object) -> bool:
    return isinstance(value, list) and all(isinstance(item, kind) for item in value)


def _refuse_unknown_names(rule: Rule) -> None:
    if not rule.review:
        raise RuleFault("review", "nothing is compared")
    _refuse_unknown_sources(rule)
    _refuse_unknown_placeholders(rule)
    for lever in rule.measures:
        if not is_lever(lever):
            raise RuleFault(
                "measures", "no such field in an assessment file", stated=lever, nearest=nearest_lever(lever)
            )
    for name in (name for example in rule.examples for name in example.given):
        reachable("example.given", name, rule.each)


def _refuse_unknown_sources(rule: Rule) -> None:
    if not rule.basis:
        raise RuleFault("basis", "a rule needs a basis")
    for reference in rule.basis:
        try:
            resolve(reference)
        except LookupError as error:
            raise RuleFault("basis", str(error.args[0]).rstrip("."), stated=reference) from None


def _refuse_unknown_placeholders(rule: Rule) -> None:
    for placeholder in PLACEHOLDER.findall(rule.says):
        if placeholder.startswith("policy."):
            policy_kind("says", placeholder)
        else:
            reachable("says", placeholder, rule.each)
    if re.search(r"[{}]", PLACEHOLDER.sub("", rule.says)):
        raise RuleFault(
            "says", "a brace that is no placeholder", stated=rule.says, accepted="{fact_key} or {policy.name}"
        )


def _example(entry: dict[str, Any]) -> Example:
    for field in entry:
        if field not in {"given", "expect", "note"}:
            raise RuleFault(f"example.{field}", "no such field in an example", accepted="given, expect, note")
    given, note = entry.get("given", {}), entry.get("note", "")
    if not isinstance(given, dict):
        raise RuleFault("example.given", "not a table of facts", stated=given)
    if not isinstance(note, str):
        raise RuleFault("example.note", "not a text", stated=note)
    expect = one_of("example.expect", entry.get("expect"), OUTCOMES)
    return Example(given=given, expect=expect, note=note)  # type: ignore[arg-type]
