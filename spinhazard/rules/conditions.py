"""Conditions of a rule, from plain TOML data: facts that exist and can be asked for, words known here, kinds that agree."""

from __future__ import annotations

import difflib
from collections.abc import Iterable, Sequence
from functools import lru_cache
from typing import Any

from spinhazard.facts import FACTS
from spinhazard.facts.fact import Declaration
from spinhazard.quantity.notation import NotationError, parse_stated
from spinhazard.quantity.stated import Stated
from spinhazard.rules.rule import WORDS, Alternatives, Comparison, Condition, Operand
from spinhazard.statement.policy import Policy

KIND_OF_UNIT = {
    "": "ratio", "m": "length", "kg": "mass", "s": "time", "rad/s": "angular speed", "m/s": "speed", "J": "energy", "N m": "torque",
    "Pa": "stress", "K": "temperature difference", "kg/m³": "density", "N": "force", "rad": "angle", "kg m²": "inertia",
}  # fmt: skip
"""Kind of quantity that a literal compared with a fact of this unit is written in."""
CONDITION = "[fact, word, value] or { any = [...] }"


class RuleFault(Exception):  # noqa: N818  (reads as what happened)
    """Something in a rule that cannot hold; `field` is the field of the rule it stands in."""

    def __init__(
        self, field: str, problem: str, *, stated: object = None, accepted: str = "", nearest: str = ""
    ) -> None:
        super().__init__(problem)
        self.field, self.problem, self.stated, self.accepted, self.nearest = field, problem, stated, accepted, nearest


def nearest_of(word: object, words: Iterable[str]) -> str:
    """The word that comes nearest; only on the way to a message.

    Parameters
    ----------
    word : object
        What was written.
    words : iterable of str
        What could have been meant.

    Returns
    -------
    str
        The nearest, or empty.
    """
    near = difflib.get_close_matches(str(word)[:80], list(words), n=1, cutoff=0.4)
    return near[0] if near else ""


def one_of(field: str, word: object, words: Sequence[str]) -> str:
    """A word out of a closed list.

    Parameters
    ----------
    field : str
        Field of the rule.
    word : object
        What was written.
    words : sequence of str
        The list.

    Returns
    -------
    str
        The word.

    Raises
    ------
    RuleFault
        It is not in the list.
    """
    if not isinstance(word, str) or word not in words:
        raise RuleFault(
            field, "not a word known here", stated=word, accepted=", ".join(words), nearest=nearest_of(word, words)
        )
    return word


def reachable(field: str, key: object, each: str) -> Declaration:
    """The declaration of a fact that a rule about `each` may ask for.

    Parameters
    ----------
    field : str
        Field of the rule.
    key : object
        Key of the fact as written.
    each : str
        Kind of subject the rule is about.

    Returns
    -------
    Declaration
        The fact.

    Raises
    ------
    RuleFault
        There is no such fact, or it belongs to another kind of subject.
    """
    declaration = FACTS.get(key) if isinstance(key, str) else None
    if declaration is None:
        raise RuleFault(field, "no such fact", stated=key, nearest=nearest_of(key, FACTS))
    if declaration.per not in {each, "machine", "lockout"} and not (each == "part" and declaration.per == "shaft"):
        raise RuleFault(field, f"a fact of each {declaration.per} cannot be asked for each {each}", stated=key)
    return declaration


@lru_cache(maxsize=1)
def _shipped() -> Policy:
    return Policy()


def policy_kind(field: str, name: str) -> str:
    """Kind of quantity of a number in the policy.

    Parameters
    ----------
    field : str
        Field of the rule.
    name : str
        ``policy.NAME``.

    Returns
    -------
    str
        Kind of quantity.

    Raises
    ------
    RuleFault
        The policy has no such number.
    """
    setting = getattr(_shipped(), name.removeprefix("policy."), None)
    if isinstance(setting, Stated):
        return setting.kind
    if isinstance(setting, (int, float)) and not isinstance(setting, bool):
        return "ratio"
    near = nearest_of(name.removeprefix("policy."), Policy.model_fields)
    raise RuleFault(field, "no such number in the policy", stated=name, nearest=f"policy.{near}" if near else "")


def conditions(field: str, entries: object, each: str) -> tuple[Condition, ...]:
    """A list of conditions that must all hold.

    Parameters
    ----------
    field : str
        ``applies`` or ``review``.
    entries : object
        Plain TOML data.
    each : str
        Kind of subject the rule is about.

    Returns
    -------
    tuple of Comparison or Alternatives
        The conditions.

    Raises
    ------
    RuleFault
        Something in them cannot hold.
    """
    if not isinstance(entries, list):
        raise RuleFault(field, "not a list of conditions", stated=entries, accepted=f"a list of {CONDITION}")
    return tuple(_condition(field, entry, each) for entry in entries)


def _condition(field: str, entry: object, each: str) -> Condition:
    if not isinstance(entry, dict):
        return _comparison(field, entry, each)
    lines = entry.get("any")
    if set(entry) != {"any"} or not isinstance(lines, list) or not lines:
        raise RuleFault(field, "not a condition", stated=entry, accepted=CONDITION)
    return Alternatives(tuple(_comparison(field, line, each) for line in lines))


def _comparison(field: str, line: object, each: str) -> Comparison:
    if not isinstance(line, list) or len(line) not in {2, 3}:
        raise RuleFault(field, "not a condition", stated=line, accepted=CONDITION)
    declaration = reachable(field, line[0], each)
    word = one_of(field, line[1], WORDS)
    if word == "is stated":
        wanted = line[2] if len(line) == 3 else True
        if not isinstance(wanted, bool):
            raise RuleFault(field, "neither true nor false", stated=wanted)
        return Comparison(declaration.key, word, Operand("value", "", wanted))
    if len(line) != 3:
        raise RuleFault(field, "nothing to compare with", stated=line)
    if word in {"exceeds", "is below"}:
        if declaration.is_word:
            raise RuleFault(field, "a word cannot exceed or be below anything", stated=line[0])
        return Comparison(declaration.key, word, _number_operand(field, line[2], declaration, each))
    return Comparison(declaration.key, word, _word_operand(field, line[2], declaration, word))


def _word_operand(field: str, right: Any, declaration: Declaration, word: str) -> Operand:
    if not declaration.is_word:
        raise RuleFault(field, f'"{word}" compares words; {declaration.key} is a number', stated=right)
    if word == "is one of":
        if not isinstance(right, list) or not right or not all(isinstance(item, str) for item in right):
            raise RuleFault(field, "not a list of words", stated=right)
        return Operand("value", ", ".join(right), tuple(right))
    if not isinstance(right, (str, bool)):
        raise RuleFault(field, "neither a word nor true or false", stated=right)
    # shown the way a fact that is true or false is shown beside it
    return Operand("value", ("yes" if right else "no") if isinstance(right, bool) else right, right)


def _number_operand(field: str, right: Any, declaration: Declaration, each: str) -> Operand:
    if isinstance(right, str) and right.startswith("policy."):
        if policy_kind(field, right) != KIND_OF_UNIT.get(declaration.unit):
            raise RuleFault(field, f"{declaration.key} and {right} are of different kinds", stated=right)
        return Operand("policy", right.removeprefix("policy."))
    if isinstance(right, str) and right in FACTS:
        other = reachable(field, right, each)
        if other.unit != declaration.unit or other.is_word:
            raise RuleFault(field, f"{declaration.key} and {right} are of different kinds", stated=right)
        return Operand("fact", right)
    if declaration.unit not in KIND_OF_UNIT:
        raise RuleFault(field, f"{declaration.key} can be compared with facts only", stated=right)
    try:
        stated = parse_stated(right, KIND_OF_UNIT[declaration.unit])
    except NotationError as error:
        raise RuleFault(
            field, f"neither a fact, a policy setting, nor a value for {declaration.key} ({error})", stated=right,
            accepted=error.accepted, nearest=nearest_of(right, FACTS),
        ) from None  # fmt: skip
    return Operand("value", str(right), stated.value)
