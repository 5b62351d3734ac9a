"""Every comparison of every rule counts: turned round, moved by a tenth or dropped, some example of the rule notices."""

import dataclasses

import pytest

from spinhazard.rules.examples import run_example
from spinhazard.rules.loading import shipped_catalogue
from spinhazard.rules.rule import Alternatives, Operand
from spinhazard.statement.policy import Policy

RULES = shipped_catalogue(examples=True).rules
POLICY = Policy()
TURNED = {"exceeds": "is below", "is below": "exceeds", "is": "is not", "is not": "is"}


def changed(rule, field, where, replacement):
    """The rule with one comparison replaced, or dropped where the replacement is None."""
    position, place = where
    conditions = list(getattr(rule, field))
    if place is None:
        conditions[position : position + 1] = [] if replacement is None else [replacement]
    else:
        lines = list(conditions[position].conditions)
        lines[place : place + 1] = [] if replacement is None else [replacement]
        conditions[position : position + 1] = [Alternatives(tuple(lines))] if lines else []
    return dataclasses.replace(rule, **{field: tuple(conditions)})


def comparisons_of(rule):
    for field in ("applies", "review"):
        for position, condition in enumerate(getattr(rule, field)):
            if isinstance(condition, Alternatives):
                for place, line in enumerate(condition.conditions):
                    yield field, (position, place), line
            else:
                yield field, (position, None), condition


def limit_of(line):
    """Number on the right side; None where it is a fact or a word."""
    if line.operand.kind == "value":
        return line.operand.value if isinstance(line.operand.value, float) else None
    if line.operand.kind == "policy":
        setting = getattr(POLICY, line.operand.name)
        return float(getattr(setting, "value", setting))
    return None


def mutants(rule):
    """Every small change of the rule, with what was changed."""
    for field, where, line in comparisons_of(rule):
        name = f"{field} {line.fact} {line.word} {line.operand.name}"
        yield f"{name}: dropped", changed(rule, field, where, None)
        if line.word in TURNED:
            turned = dataclasses.replace(line, word=TURNED[line.word])
            yield f"{name}: turned round", changed(rule, field, where, turned)
        if line.word == "is stated":
            turned = dataclasses.replace(line, operand=Operand("value", "", not line.operand.value))
            yield f"{name}: turned round", changed(rule, field, where, turned)
        limit = limit_of(line)
        # a tenth of nothing is nothing: a limit of zero is covered by the case at the limit and a count of one
        for factor in (0.9, 1.1) if limit else ():
            moved = dataclasses.replace(line, operand=Operand("value", line.operand.name, limit * factor))
            yield f"{name}: limit times {factor}", changed(rule, field, where, moved)


def survivors(rule):
    """Changes that no example of the rule notices."""
    return [
        name
        for name, mutant in mutants(rule)
        if all(run_example(mutant, example, policy=POLICY).outcome == example.expect for example in rule.examples)
    ]


@pytest.mark.parametrize("rule", RULES, ids=lambda rule: rule.key)
def test_no_small_change_of_a_rule_goes_unnoticed(rule):
    assert survivors(rule) == []


def test_a_rule_with_fewer_examples_lets_changes_through():
    rule = shipped_catalogue(examples=True).rule("rail-distance-off")
    poorer = dataclasses.replace(rule, examples=rule.examples[1:3])

    assert "review guard_distance is below 15 in: dropped" in survivors(poorer)
    assert "review guard_distance exceeds 20 in: limit times 0.9" in survivors(poorer)
    assert "applies guard_kind is rail: dropped" in survivors(poorer)


def test_every_numeric_comparison_has_at_least_two_mutants():
    for rule in RULES:
        numeric = [line for line in rule.comparisons() if line.word in {"exceeds", "is below"}]
        assert len(list(mutants(rule))) >= 2 * len(numeric)
