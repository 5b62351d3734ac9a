"""TOML to rules. Refuses unknown facts, fields, sources and words, and comparisons of unlike kinds, with file and line."""

from __future__ import annotations

import difflib
import fnmatch
import hashlib
import re
import tomllib
from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from functools import lru_cache
from importlib import resources
from typing import Any

from spinhazard.errors import CatalogueError, Complaint, quoted
from spinhazard.facts import FACTS
from spinhazard.facts.fact import Declaration
from spinhazard.quantity.notation import NotationError, parse_stated
from spinhazard.quantity.stated import Stated
from spinhazard.rules.levers import is_lever
from spinhazard.rules.rule import (
    EACH,
    FORBIDDEN_NAMES,
    OUTCOMES,
    URGENCIES,
    WORDS,
    Alternatives,
    Comparison,
    Condition,
    Example,
    Operand,
    Rule,
)  # fmt: skip
from spinhazard.sources import resolve
from spinhazard.statement.policy import Policy

KIND_OF_UNIT = {
    "": "ratio", "m": "length", "kg": "mass", "s": "time", "rad/s": "angular speed", "m/s": "speed", "J": "energy", "N m": "torque",
    "Pa": "stress", "K": "temperature difference", "kg/m³": "density", "N": "force", "rad": "angle", "kg m²": "inertia",
}  # fmt: skip
"""Kind of quantity that a literal compared with a fact of this unit is written in."""
NEEDED = ("key", "since", "asks", "because", "each", "review", "urgency", "says", "basis")
TAKEN = (*NEEDED, "applies", "measures", "example", "withdrawn", "withdrawn_because")
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


@lru_cache(maxsize=1)
def shipped_catalogue() -> Catalogue:
    """The catalogue that comes with the program.

    Returns
    -------
    Catalogue
        All rules, families in alphabetical order of their files.
    """
    folder = resources.files("spinhazard.rules").joinpath("catalogue")
    files = sorted((entry for entry in folder.iterdir() if entry.name.endswith(".toml")), key=lambda entry: entry.name)
    texts = [(entry.name, entry.read_text("utf-8")) for entry in files]
    rules = [rule for name, text in texts for rule in load_rules(text, name=name, family=name.removesuffix(".toml"))]
    _refuse_twice(rules)
    digest = hashlib.sha256("\x00".join(text for _, text in texts).encode()).hexdigest()
    return Catalogue(rules=tuple(rules), digest=f"sha256:{digest}")


def _refuse_twice(rules: Sequence[Rule]) -> None:
    seen: set[str] = set()
    for rule in rules:
        if rule.key in seen:
            raise CatalogueError(
                Complaint("two rules have the same key", file=f"{rule.family}.toml", stated=quoted(rule.key))
            )
        seen.add(rule.key)


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
    rules: list[Rule] = []
    complaints: list[Complaint] = []
    for index, entry in enumerate(entries):
        try:
            rules.append(_rule(entry, family))
        except _RuleFault as fault:
            complaints.append(
                Complaint(
                    fault.problem,
                    file=name,
                    line=_line(text, index),
                    field=f"{entry.get('key', f'rule {index + 1}')}.{fault.field}",
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
    starts = [match.start() for match in re.finditer(r"^\s*\[\[rule\]\]", text, re.MULTILINE)]
    return text.count("\n", 0, starts[index]) + 1 if index < len(starts) else 1


class _RuleFault(Exception):  # noqa: N818
    def __init__(
        self, field: str, problem: str, *, stated: object = None, accepted: str = "", nearest: str = ""
    ) -> None:
        super().__init__(problem)
        self.field, self.problem, self.stated, self.accepted, self.nearest = field, problem, stated, accepted, nearest


def _nearest(word: object, words: Iterable[str]) -> str:
    near = difflib.get_close_matches(str(word)[:80], list(words), n=1, cutoff=0.4)
    return near[0] if near else ""


def _one_of(field: str, word: object, words: Sequence[str]) -> str:
    if not isinstance(word, str) or word not in words:
        raise _RuleFault(
            field, "not a word known here", stated=word, accepted=", ".join(words), nearest=_nearest(word, words)
        )
    return word


def _rule(entry: dict[str, Any], family: str) -> Rule:
    for field in entry:
        if field not in TAKEN:
            raise _RuleFault(
                field, "no such field in a rule", accepted=", ".join(TAKEN), nearest=_nearest(field, TAKEN)
            )
    for field in NEEDED:
        if field not in entry:
            raise _RuleFault(field, "this field is needed and is not stated")
    key = entry["key"]
    if not re.fullmatch(r"[a-z0-9]+(-[a-z0-9]+)+", key) or any(
        fnmatch.fnmatch(key, pattern) for pattern in FORBIDDEN_NAMES
    ):
        raise _RuleFault("key", "a key names the condition found, in lower case with hyphens", stated=key)
    each = _one_of("each", entry["each"], EACH)
    rule = Rule(
        key=key, family=family, since=entry["since"], asks=entry["asks"], because=entry["because"], each=each,
        applies=_conditions("applies", entry.get("applies", []), each), review=_conditions("review", entry["review"], each),
        urgency=_one_of("urgency", entry["urgency"], URGENCIES),  # type: ignore[arg-type]
        says=entry["says"], measures=tuple(entry.get("measures", ())), basis=tuple(entry["basis"]),
        examples=tuple(_example(example) for example in entry.get("example", ())), withdrawn=entry.get("withdrawn", ""),
    )  # fmt: skip
    _refuse_unknown_names(rule)
    return rule


def _refuse_unknown_names(rule: Rule) -> None:
    for reference in rule.basis:
        try:
            resolve(reference)
        except LookupError as error:
            raise _RuleFault("basis", str(error.args[0]).rstrip("."), stated=reference) from None
    if not rule.basis:
        raise _RuleFault("basis", "a rule needs a basis")
    for lever in rule.measures:
        if not is_lever(lever):
            raise _RuleFault("measures", "no such field in an assessment file", stated=lever)
    _refuse_unknown_placeholders(rule)
    for example in rule.examples:
        for name in example.given:
            _reachable("example", name, rule.each)


def _refuse_unknown_placeholders(rule: Rule) -> None:
    for placeholder in PLACEHOLDER.findall(rule.says):
        if placeholder.startswith("policy."):
            _policy_unit("says", placeholder)
        else:
            _reachable("says", placeholder, rule.each)


def _reachable(field: str, key: object, each: str) -> Declaration:
    """The declaration of a fact that a rule about `each` may ask for."""
    declaration = FACTS.get(key) if isinstance(key, str) else None
    if declaration is None:
        raise _RuleFault(field, "no such fact", stated=key, nearest=_nearest(key, FACTS))
    if declaration.per not in {each, "machine", "lockout"} and not (each == "part" and declaration.per == "shaft"):
        raise _RuleFault(field, f"a fact of each {declaration.per} cannot be asked for each {each}", stated=key)
    return declaration


def _conditions(field: str, entries: Any, each: str) -> tuple[Condition, ...]:
    if not isinstance(entries, list):
        raise _RuleFault(field, "not a list of conditions", stated=entries)
    found: list[Condition] = []
    for entry in entries:
        if isinstance(entry, dict):
            if set(entry) != {"any"} or not isinstance(entry["any"], list):
                raise _RuleFault(
                    field, "not a condition", stated=entry, accepted="[fact, word, value] or { any = [...] }"
                )
            found.append(Alternatives(tuple(_comparison(field, line, each) for line in entry["any"])))
        else:
            found.append(_comparison(field, entry, each))
    return tuple(found)


def _comparison(field: str, line: Any, each: str) -> Comparison:
    if not isinstance(line, list) or len(line) not in {2, 3}:
        raise _RuleFault(field, "not a condition", stated=line, accepted="[fact, word, value]")
    declaration = _reachable(field, line[0], each)
    word = _one_of(field, line[1], WORDS)
    if word == "is stated":
        return Comparison(declaration.key, word, Operand("value", "", line[2] if len(line) == 3 else True))
    if len(line) != 3:
        raise _RuleFault(field, "nothing to compare with", stated=line)
    if word in {"exceeds", "is below"}:
        if declaration.is_word:
            raise _RuleFault(field, "a word cannot exceed or be below anything", stated=line[0])
        return Comparison(declaration.key, word, _number_operand(field, line[2], declaration, each))
    return Comparison(declaration.key, word, _word_operand(field, line[2], declaration, word))


def _word_operand(field: str, right: Any, declaration: Declaration, word: str) -> Operand:
    if not declaration.is_word:
        raise _RuleFault(field, f'"{word}" compares words; {declaration.key} is a number', stated=right)
    if word == "is one of":
        if not isinstance(right, list) or not all(isinstance(item, str) for item in right):
            raise _RuleFault(field, "not a list of words", stated=right)
        return Operand("value", ", ".join(right), tuple(right))
    if not isinstance(right, (str, bool)):
        raise _RuleFault(field, "neither a word nor true or false", stated=right)
    return Operand("value", str(right).lower() if isinstance(right, bool) else right, right)


def _number_operand(field: str, right: Any, declaration: Declaration, each: str) -> Operand:
    if isinstance(right, str) and right.startswith("policy."):
        unit = _policy_unit(field, right)
        if unit != KIND_OF_UNIT.get(declaration.unit, declaration.unit):
            raise _RuleFault(field, f"{declaration.key} and {right} are of different kinds", stated=right)
        return Operand("policy", right.removeprefix("policy."))
    if isinstance(right, str) and right in FACTS:
        other = _reachable(field, right, each)
        if other.unit != declaration.unit or other.is_word:
            raise _RuleFault(field, f"{declaration.key} and {right} are of different kinds", stated=right)
        return Operand("fact", right)
    try:
        stated = parse_stated(right, KIND_OF_UNIT[declaration.unit])
    except (NotationError, KeyError) as error:
        raise _RuleFault(field, f"neither a fact, a policy setting, nor a value for {declaration.key} ({error})", stated=right,
                         nearest=_nearest(right, FACTS)) from None  # fmt: skip
    return Operand("value", str(right), stated.value)


def _policy_unit(field: str, name: str) -> str:
    setting = getattr(Policy(), name.removeprefix("policy."), None)
    if isinstance(setting, Stated):
        return setting.kind
    if isinstance(setting, (int, float)) and not isinstance(setting, bool):
        return "ratio"
    raise _RuleFault(
        field,
        "no such number in the policy",
        stated=name,
        nearest=_nearest(name.removeprefix("policy."), Policy.model_fields),
    )


def _example(entry: dict[str, Any]) -> Example:
    expect = _one_of("example.expect", entry.get("expect"), OUTCOMES)
    return Example(given=dict(entry.get("given", {})), expect=expect, note=entry.get("note", ""))  # type: ignore[arg-type]
