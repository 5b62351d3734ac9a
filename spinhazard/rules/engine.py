"""Rules against facts: every rule on every subject it is about, with one of five outcomes."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from spinhazard.facts.fact import FACTS, Fact, FactValue
from spinhazard.facts.sheet import FactSheet
from spinhazard.facts.subject import Subject
from spinhazard.quantity.display import System, display
from spinhazard.quantity.stated import Stated
from spinhazard.rules import logic
from spinhazard.rules.loading import PLACEHOLDER
from spinhazard.rules.rule import Alternatives, Comparison, Condition, Outcome, Rule
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


@dataclass(frozen=True)
class Finding:
    """A rule applied to one subject.

    Attributes
    ----------
    rule : Rule
        The rule.
    subject : str
        Subject, as in the JSON.
    outcome : Outcome
        One of the five.
    likelihood : float
        Share of the draws in which the condition holds; 1 or 0 without draws.
    says : str
        Message with the numbers put in.
    missing : tuple of str
        Fields that would settle it.
    outside : tuple of str
        Ranges of methods that were left on the way.
    facts : tuple of str
        Facts it was decided on, as "key|subject".
    """

    rule: Rule
    subject: str
    outcome: Outcome
    likelihood: float
    says: str
    missing: tuple[str, ...]
    outside: tuple[str, ...]
    facts: tuple[str, ...]


def findings(rules: tuple[Rule, ...], sheet: FactSheet, *, system: System = "si") -> list[Finding]:
    """Every rule on every subject of its kind.

    Parameters
    ----------
    rules : tuple of Rule
        Rules, withdrawn ones are left out.
    sheet : FactSheet
        Facts.
    system : "si" or "us"
        Units in the messages.

    Returns
    -------
    list of Finding
        In the order of the rules, then of the subjects.
    """
    return [
        judge(rule, subject.name, _lookup_for(sheet, subject), sheet.rules, system=system)
        for rule in rules
        if not rule.withdrawn
        for subject in sheet.subjects.of_kind(rule.each)
    ]


def _lookup_for(sheet: FactSheet, subject: Subject) -> Lookup:
    def lookup(key: str) -> Fact | None:
        per = FACTS[key].per
        if per == subject.kind:
            return sheet.fact(key, subject)
        return sheet.fact(key, subject.parent if per == "shaft" else None)

    return lookup


def judge(rule: Rule, subject: str, lookup: Lookup, policy: Policy, *, system: System = "si") -> Finding:
    """One rule on one subject.

    Parameters
    ----------
    rule : Rule
        The rule.
    subject : str
        Name of the subject.
    lookup : callable
        Gives the fact of a key.
    policy : Policy
        Thresholds and coverage.
    system : "si" or "us"
        Units in the message.

    Returns
    -------
    Finding
        Outcome and message.
    """
    view = _View(rule, lookup, policy, system)
    applies = view.truth(rule.applies)
    if bool((applies == logic.NO).all()) or view.does_not_apply:
        return view.finding(subject, "not applicable", 0.0, view.why_not(rule.applies, "Does not apply here"))
    met = logic.all_of([applies, view.truth(rule.review)])
    if view.does_not_apply:
        return view.finding(subject, "not applicable", 0.0, view.why_not(rule.applies, "Does not apply here"))
    share = logic.likelihood(met)
    if met[0] == logic.UNKNOWN:
        return view.finding(subject, "data missing", 0.0, view.what_is_missing(), missing=view.missing(met))
    if met[0] == logic.YES:
        return view.finding(subject, "for review", share, view.message())
    if share > (1.0 - policy.coverage) / 2.0 + 1e-12:
        return view.finding(subject, "borderline", share, f"{view.message()} {_borderline_note(share)}")
    if view.outside():
        return view.finding(
            subject, "borderline", share, f"{view.why_not(rule.review, 'Not met')} {_outside_note(view.outside())}"
        )
    return view.finding(subject, "not flagged", share, view.why_not((*rule.applies, *rule.review), "Not met"))


def _borderline_note(share: float) -> str:
    return f"Not so by the best estimate, but in {100.0 * share:.0f} % of the stated uncertainty."


def _outside_note(outside: tuple[str, ...]) -> str:
    return f"Outside the range of the method ({'; '.join(outside)}), so this is no clearance."


class _View:
    """The facts one rule sees for one subject."""

    def __init__(self, rule: Rule, lookup: Lookup, policy: Policy, system: System) -> None:
        self._rule, self._lookup, self._policy, self._system = rule, lookup, policy, system
        self._seen: dict[str, Fact | None] = {}
        self.does_not_apply = False

    def _fact(self, key: str) -> Fact | None:
        if key not in self._seen:
            self._seen[key] = self._lookup(key)
        return self._seen[key]

    def truth(self, conditions: tuple[Condition, ...]) -> logic.Truth:
        return logic.all_of([
            logic.any_of([self._compare(line) for line in condition.conditions])
            if isinstance(condition, Alternatives) else self._compare(condition)
            for condition in conditions
        ])  # fmt: skip

    def _compare(self, line: Comparison) -> logic.Truth:
        fact = self._fact(line.fact)
        if line.word == "is stated":
            return logic.certain(holds=(fact is not None and fact.known) == line.operand.value)
        if fact is None:
            self.does_not_apply = self.does_not_apply or not self._is_alternative(line)
            return logic.certain(holds=False)
        if line.word in {"exceeds", "is below"}:
            return self._compare_numbers(fact, line)
        if fact.value is None:
            return logic.unknown()
        return logic.certain(holds=_words_agree(fact.value, line))

    def _is_alternative(self, line: Comparison) -> bool:
        return any(
            isinstance(condition, Alternatives) and line in condition.conditions
            for condition in (*self._rule.applies, *self._rule.review)
        )

    def _compare_numbers(self, fact: Fact, line: Comparison) -> logic.Truth:
        if line.operand.kind == "fact":
            other = self._fact(line.operand.name)
            if other is None:
                self.does_not_apply = True
                return logic.certain(holds=False)
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

    def finding(
        self, subject: str, outcome: Outcome, share: float, says: str, *, missing: tuple[str, ...] = ()
    ) -> Finding:
        seen = tuple(f"{fact.key}|{fact.subject}" for fact in self._seen.values() if fact is not None)
        return Finding(self._rule, subject, outcome, share, says, missing, self.outside(), seen)

    def outside(self) -> tuple[str, ...]:
        return tuple(
            dict.fromkeys(breach for fact in self._seen.values() if fact is not None for breach in fact.outside)
        )

    def missing(self, _met: logic.Truth) -> tuple[str, ...]:
        """Fields behind the comparisons that could not be decided."""
        found: list[str] = []
        for line in self._rule.comparisons():
            if line.word == "is stated" or self._compare(line)[0] != logic.UNKNOWN:
                continue
            for key in (line.fact, line.operand.name if line.operand.kind == "fact" else ""):
                fact = self._fact(key) if key else None
                found += fact.missing if fact is not None else ()
        return tuple(dict.fromkeys(found))

    def what_is_missing(self) -> str:
        fields = self.missing(logic.unknown())
        failed = [fact.failed for fact in self._seen.values() if fact is not None and fact.failed]
        if failed:
            return f"Not decided: {failed[0]}."
        return f"Not decided: {', '.join(fields)} {'is' if len(fields) == 1 else 'are'} not stated."

    def message(self) -> str:
        return PLACEHOLDER.sub(lambda match: self.shown(match[1]), self._rule.says)

    def shown(self, name: str) -> str:
        if name.startswith("policy."):
            setting = getattr(self._policy, name.removeprefix("policy."))
            return setting.text if isinstance(setting, Stated) else str(setting)
        return shown(self._fact(name), self._system)

    def why_not(self, conditions: tuple[Condition, ...], opening: str) -> str:
        """The comparisons that did not hold, in words."""
        reasons = []
        for condition in conditions:
            lines = condition.conditions if isinstance(condition, Alternatives) else (condition,)
            truths = [self._compare(line) for line in lines]
            if logic.any_of(truths)[0] == logic.NO:
                reasons += [self._in_words(line) for line in lines]
        return f"{opening}: {'; '.join(dict.fromkeys(reasons))}." if reasons else f"{opening}."

    def _in_words(self, line: Comparison) -> str:
        fact = self._fact(line.fact)
        label = _decapitalised(FACTS[line.fact].label)
        if line.word == "is stated":
            return f"{label} is {'not ' if line.operand.value else ''}stated"
        if fact is None:
            return f"{label} has no meaning here"
        limit = line.operand.name
        if line.operand.kind == "fact":
            limit = f"{_decapitalised(FACTS[limit].label)} ({shown(self._fact(limit), self._system)})"
        elif line.operand.kind == "policy":
            limit = f"{self.shown('policy.' + limit)} (policy)"
        return f"{label} ({shown(fact, self._system)}) {_NEGATED[line.word]} {limit}"


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
    if fact.unit == "" and isinstance(value, float) and value == int(value) and abs(value) < 1e6:
        return str(int(value))
    return display(value, fact.unit, system=system)
