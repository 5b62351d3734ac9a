"""The model of a rule: what the TOML of the catalogue says, resolved."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, Literal

Outcome = Literal["for review", "borderline", "data missing", "not flagged", "not applicable", "accepted"]
OUTCOMES: tuple[Outcome, ...] = ("for review", "borderline", "data missing", "not flagged", "not applicable")
NEEDS_ATTENTION: tuple[Outcome, ...] = ("for review", "borderline", "data missing")
Urgency = Literal["before next access", "before next start", "at next revision"]
URGENCIES: tuple[Urgency, ...] = ("before next access", "before next start", "at next revision")
EACH = ("machine", "shaft", "part", "stop", "guard", "lockout")
WORDS = ("exceeds", "is below", "is", "is not", "is one of", "is stated")
FORBIDDEN_NAMES = ("avoid-*", "use-*", "no-*", "check-*", "*-ok", "*-safe", "prefer-*", "add-*")
"""Patterns a rule key may not have: it names the condition found, not the remedy."""


@dataclass(frozen=True, slots=True)
class Operand:
    """Right side of a comparison: a fact, a policy setting, or a value written in the rule.

    Attributes
    ----------
    kind : str
        "fact", "policy" or "value".
    name : str
        Key of the fact, field of the policy, or the text as written.
    value : object
        SI number, word or tuple of words for "value".
    """

    kind: Literal["fact", "policy", "value"]
    name: str
    value: Any = None


@dataclass(frozen=True, slots=True)
class Comparison:
    """One line of a condition: fact, comparison word, operand."""

    fact: str
    word: str
    operand: Operand


@dataclass(frozen=True, slots=True)
class Alternatives:
    """Conditions of which one must hold."""

    conditions: tuple[Comparison, ...]


Condition = Comparison | Alternatives


@dataclass(frozen=True, slots=True)
class Example:
    """A case beside the rule: facts given, outcome expected."""

    given: dict[str, Any]
    expect: Outcome
    note: str = ""


@dataclass(frozen=True, slots=True)
class Rule:
    """One rule of the catalogue."""

    key: str
    family: str
    since: str
    asks: str
    because: str
    each: str
    applies: tuple[Condition, ...]
    review: tuple[Condition, ...]
    urgency: Urgency
    says: str
    measures: tuple[str, ...]
    basis: tuple[str, ...]
    examples: tuple[Example, ...]
    withdrawn: str = ""
    withdrawn_because: str = ""

    def comparisons(self) -> tuple[Comparison, ...]:
        """Every comparison of the rule, those of alternatives included.

        Returns
        -------
        tuple of Comparison
            In the order written.
        """
        found: list[Comparison] = []
        for condition in (*self.applies, *self.review):
            found += condition.conditions if isinstance(condition, Alternatives) else (condition,)
        return tuple(found)
