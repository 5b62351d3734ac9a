"""Rules against facts: every rule on every subject it is about, with one of five outcomes."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, field
from functools import cached_property

from spinhazard.facts.fact import FACTS, Fact
from spinhazard.facts.sheet import FactSheet
from spinhazard.facts.subject import Subject
from spinhazard.quantity.display import System
from spinhazard.rules import logic
from spinhazard.rules.rule import Outcome, Rule
from spinhazard.rules.view import Lookup, View, shown
from spinhazard.statement.policy import Policy

__all__ = ["Finding", "Lookup", "findings", "judge", "shown"]


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
    words : callable
        Makes the message; most findings are never read.
    missing : tuple of str
        Fields that would settle it.
    view : View
        What the rule saw.
    """

    rule: Rule
    subject: str
    outcome: Outcome
    likelihood: float
    words: Callable[[], str] = field(repr=False, compare=False)
    missing: tuple[str, ...]
    view: View = field(repr=False, compare=False)

    @property
    def outside(self) -> tuple[str, ...]:
        """Ranges of methods that were left on the way."""
        return self.view.outside

    @property
    def facts(self) -> tuple[str, ...]:
        """Facts it was decided on, as "key|subject"."""
        return self.view.facts

    @cached_property
    def says(self) -> str:
        """Message with the numbers put in."""
        return self.words()


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
    view = View(rule, lookup, policy, system)
    met = view.truth(rule.applies)
    if not view.does_not_apply and met.max() > logic.NO:
        met = logic.all_of([met, view.truth(rule.review)])
        if not view.does_not_apply:
            return _decided(view, rule, subject, met, tail=(1.0 - policy.coverage) / 2.0)
    return _finding(
        view, rule, subject, "not applicable", 0.0, lambda: view.why_not(rule.applies, "Does not apply here")
    )


def _decided(view: View, rule: Rule, subject: str, met: logic.Truth, *, tail: float) -> Finding:
    """Outcome of a rule that applies."""
    if met[0] == logic.UNKNOWN:
        return _finding(view, rule, subject, "data missing", 0.0, view.what_is_missing, missing=view.missing())
    share = logic.likelihood(met)
    if met[0] == logic.YES:
        return _finding(view, rule, subject, "for review", share, view.message)
    # a share at the end of the coverage interval is inside it, not beyond it by a rounding error
    if share > tail + 1e-12:
        note = f"Not so by the best estimate, but in {100.0 * share:.0f} % of the stated uncertainty."
        return _finding(view, rule, subject, "borderline", share, lambda: f"{view.message()} {note}")
    doubts = _doubts(view, met, tail)
    return _finding(
        view, rule, subject, "borderline" if doubts else "not flagged", share,
        lambda: " ".join((view.why_not((*rule.applies, *rule.review), "Not met"), *doubts)),
    )  # fmt: skip


def _doubts(view: View, met: logic.Truth, tail: float) -> list[str]:
    """Why a condition that was not met is no clearance all the same."""
    doubts = []
    undecided = logic.undecided(met)
    if undecided > tail + 1e-12:
        doubts.append(f"Without definite value in {100.0 * undecided:.0f} % of the stated uncertainty.")
    if view.outside:
        doubts.append(f"Outside the range of the method ({'; '.join(view.outside)}), so this is no clearance.")
    return doubts


def _finding(
    view: View,
    rule: Rule,
    subject: str,
    outcome: Outcome,
    share: float,
    words: Callable[[], str],
    *,
    missing: tuple[str, ...] = (),
) -> Finding:
    return Finding(rule, subject, outcome, share, words, missing, view)
