"""What one rule sees for one subject: its facts, the truth of its comparisons, and both in words."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from spinhazard.facts.fact import FACTS, Fact, FactValue
from spinhazard.quantity.display import System, display
from spinhazard.quantity.stated import Stated
from spinhazard.quantity.units import KINDS
from spinhazard.rules import logic
from spinhazard.rules.loading import PLACEHOLDER
from spinhazard.rules.rule import Alternatives, Comparison, Condition, Rule
from spinhazard.statement.policy import Policy

Lookup = Callable[[str], Fact | None]
"""Fact of a key for the subject at hand; None where it does not apply."""
_NEGATED = {
    "exceeds": "does not exceed",
    "is below": "is not below",
    "is": "is not",
    "is not": "is",
    "is one of": "is none of",
}


class View:
    """The facts one rule sees for one subject.

    Parameters
    ----------
    rule : Rule
        The rule.
    lookup : callable
        Gives the fact of a key.
    policy : Policy
        Thresholds.
    system : "si" or "us"
        Units in texts.
    """

    def __init__(self, rule: Rule, lookup: Lookup, policy: Policy, system: System) -> None:
        self._rule, self._lookup, self._policy, self._system = rule, lookup, policy, system
        self._seen: dict[str, Fact | None] = {}
        self._absent: list[str] = []
        self._outside: list[str] = []

    @property
    def does_not_apply(self) -> bool:
        """Whether a fact that had to be compared does not apply to the subject."""
        return bool(self._absent)

    @property
    def facts(self) -> tuple[str, ...]:
        """Facts looked at, as "key|subject"."""
        return tuple(f"{fact.key}|{fact.subject}" for fact in self._seen.values() if fact is not None)

    @property
    def outside(self) -> tuple[str, ...]:
        """Ranges of methods that were left on the way."""
        return tuple(dict.fromkeys(self._outside)) if self._outside else ()

    def _fact(self, key: str) -> Fact | None:
        if key in self._seen:
            return self._seen[key]
        fact = self._seen[key] = self._lookup(key)
        if fact is not None and fact.outside:
            self._outside += fact.outside
        return fact

    def truth(self, conditions: tuple[Condition, ...]) -> logic.Truth:
        """Whether all conditions hold, draw by draw.

        Parameters
        ----------
        conditions : tuple of Comparison or Alternatives
            Conditions.

        Returns
        -------
        ndarray
            NO, UNKNOWN or YES; NO where `does_not_apply`.
        """
        return logic.all_of([self._holds(condition) for condition in conditions])

    def _holds(self, condition: Condition) -> logic.Truth:
        if isinstance(condition, Comparison):
            truth = self._compare(condition)
            if truth is not None:
                return truth
            lines: tuple[Comparison, ...] = (condition,)
        else:
            lines = condition.conditions
        truths = [truth for truth in map(self._compare, lines) if truth is not None]
        if not truths:
            self._absent += [key for line in lines for key in _facts_of(line) if self._fact(key) is None]
        return logic.any_of(truths)

    def _compare(self, line: Comparison) -> logic.Truth | None:
        """Truth of one comparison; None where a fact in it does not apply."""
        fact = self._fact(line.fact)
        if line.word == "is stated":
            return logic.certain(holds=(fact is not None and fact.known) == line.operand.value)
        if fact is None:
            return None
        if line.word in {"exceeds", "is below"}:
            return self._compare_numbers(fact, line)
        return logic.unknown() if fact.value is None else logic.certain(holds=_words_agree(fact.value, line))

    def _compare_numbers(self, fact: Fact, line: Comparison) -> logic.Truth | None:
        if line.operand.kind == "fact":
            other = self._fact(line.operand.name)
            if other is None:
                return None
            right = other.value
        else:
            right = np.array([self._operand_number(line)])
        if not isinstance(fact.value, np.ndarray) or not isinstance(right, np.ndarray):
            return logic.unknown()
        return logic.exceeds(fact.value, right) if line.word == "exceeds" else logic.exceeds(right, fact.value)

    def _operand_number(self, line: Comparison) -> float:
        if line.operand.kind == "value":
            return float(line.operand.value)
        setting = getattr(self._policy, line.operand.name)
        return setting.value if isinstance(setting, Stated) else float(setting)

    def _undecided(self) -> list[str]:
        """Facts of the comparisons that cannot be decided by best estimate."""
        keys: list[str] = []
        for line in self._rule.comparisons():
            truth = self._compare(line)
            if truth is not None and truth[0] == logic.UNKNOWN:
                keys += _facts_of(line)
        return list(dict.fromkeys(keys))

    def missing(self) -> tuple[str, ...]:
        """Fields behind the comparisons that could not be decided.

        Returns
        -------
        tuple of str
            Paths of the fields.
        """
        facts = [self._fact(key) for key in self._undecided()]
        return tuple(dict.fromkeys(path for fact in facts if fact is not None for path in fact.missing))

    def what_is_missing(self) -> str:
        """Why the rule could not be decided.

        Returns
        -------
        str
            One sentence.
        """
        failed = [fact.failed for fact in self._seen.values() if fact is not None and fact.failed]
        if failed:
            return f"Not decided: {failed[0]}."
        fields = self.missing()
        if fields:
            return f"Not decided: {', '.join(fields)} {'is' if len(fields) == 1 else 'are'} not stated."
        labels = ", ".join(_decapitalised(FACTS[key].label) for key in self._undecided())
        return f"Not decided: no definite value comes of what is stated for {labels}."

    def message(self) -> str:
        """The rule's message with the numbers put in.

        Returns
        -------
        str
            Text.
        """
        return PLACEHOLDER.sub(lambda match: self.shown(match[1]), self._rule.says)

    def shown(self, name: str) -> str:
        """A fact or a policy setting as text.

        Parameters
        ----------
        name : str
            Key of the fact, or ``policy.NAME``.

        Returns
        -------
        str
            Text such as ``212.4 s``.
        """
        if name.startswith("policy."):
            setting = getattr(self._policy, name.removeprefix("policy."))
            return (
                display(setting.value, KINDS[setting.kind].si, system=self._system)
                if isinstance(setting, Stated)
                else str(setting)
            )
        # a fact that is only told does not become one the rule was decided on
        return shown(self._seen[name] if name in self._seen else self._lookup(name), self._system)

    def why_not(self, conditions: tuple[Condition, ...], opening: str) -> str:
        """The comparisons that did not hold, in words.

        Parameters
        ----------
        conditions : tuple of Comparison or Alternatives
            Conditions to look at.
        opening : str
            How the sentence begins.

        Returns
        -------
        str
            One sentence.
        """
        reasons = [f"{_decapitalised(FACTS[key].label)}: nothing to compare" for key in self._absent]
        for condition in () if reasons else conditions:
            if self._holds(condition)[0] == logic.NO:
                lines = condition.conditions if isinstance(condition, Alternatives) else (condition,)
                reasons += [self._in_words(line) for line in lines]
        return f"{opening}: {'; '.join(dict.fromkeys(reasons))}." if reasons else f"{opening}."

    def _in_words(self, line: Comparison) -> str:
        fact = self._fact(line.fact)
        label = _decapitalised(FACTS[line.fact].label)
        if line.word == "is stated":
            return f"{label} is {'not ' if line.operand.value else ''}stated"
        absent = [_decapitalised(FACTS[key].label) for key in _facts_of(line) if self._fact(key) is None]
        if absent:
            return f"{absent[0]}: nothing to compare"
        if isinstance(line.operand.value, bool):
            return f"{label}: {shown(fact, self._system)}"
        limit = line.operand.name
        if line.word not in {"exceeds", "is below"}:
            words = line.operand.value if isinstance(line.operand.value, tuple) else (line.operand.value,)
            limit = ", ".join(f'"{word}"' for word in words)
        elif line.operand.kind == "fact":
            limit = f"{_decapitalised(FACTS[limit].label)} ({shown(self._fact(limit), self._system)})"
        elif line.operand.kind == "policy":
            limit = f"{self.shown('policy.' + limit)} (policy)"
        return f"{label} ({shown(fact, self._system)}) {_NEGATED[line.word]} {limit}"


def _facts_of(line: Comparison) -> list[str]:
    return [line.fact, line.operand.name] if line.operand.kind == "fact" else [line.fact]


def _decapitalised(label: str) -> str:
    return label[:1].lower() + label[1:] if label[1:2].islower() or label[1:2] == " " else label


def _words_agree(value: FactValue, line: Comparison) -> bool:
    stated = ", ".join(value) if isinstance(value, tuple) else value
    if line.word == "is one of":
        return stated in line.operand.value
    return bool(stated == line.operand.value) == (line.word == "is")


def shown(fact: Fact | None, system: System) -> str:
    """Best estimate of a fact as text.

    Parameters
    ----------
    fact : Fact or None
        The fact; None where it does not apply.
    system : "si" or "us"
        Units shown.

    Returns
    -------
    str
        Text such as ``212.4 s``.
    """
    if fact is None:
        return "–"
    if fact.value is None:
        return "not known"
    value = float(fact.value[0]) if isinstance(fact.value, np.ndarray) else fact.value
    if fact.unit == "" and isinstance(value, float) and abs(value) < 1e6 and value == int(value):
        return str(int(value))
    return display(value, fact.unit, system=system)
