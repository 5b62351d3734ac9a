"""Examples of a rule as cases: the given facts are put before the engine, without machine, sheet or random numbers."""

from __future__ import annotations

import numpy as np

from spinhazard.errors import CatalogueError, Complaint, quoted
from spinhazard.facts.fact import FACTS, Declaration, Fact, FactValue
from spinhazard.quantity.notation import NotationError, parse_stated
from spinhazard.rules.conditions import KIND_OF_UNIT
from spinhazard.rules.engine import Finding, judge
from spinhazard.rules.rule import Example, Rule
from spinhazard.sampling import Samples
from spinhazard.statement.policy import Policy

GRID = 401
"""Points of the even grid that stands for the spread of a given value."""
MISSING, DOES_NOT_APPLY, NEVER = "missing", "does not apply", "never"


def run_example(rule: Rule, example: Example, *, policy: Policy | None = None) -> Finding:
    """What the engine finds for an example.

    A value with a spread becomes an even grid over its interval, all given values moving together; one without is a single
    number. A fact that is not given is missing.

    Parameters
    ----------
    rule : Rule
        The rule.
    example : Example
        One of its examples, or another one.
    policy : Policy, optional
        Thresholds; the shipped defaults where left out.

    Returns
    -------
    Finding
        Outcome and message; compare its outcome with ``example.expect``.

    Raises
    ------
    CatalogueError
        A given value is not of the kind of its fact.
    """  # noqa: DOC502  (raised by _given_value)

    def lookup(key: str) -> Fact | None:
        given = example.given.get(key, MISSING)
        declaration = FACTS[key]
        if given == DOES_NOT_APPLY:
            return None
        value = None if given == MISSING else _given_value(rule, declaration, given)
        return Fact(
            key=key, subject=rule.each, unit=declaration.unit, value=value, missing=(key,) if value is None else ()
        )

    return judge(rule, rule.each, lookup, policy or Policy())


def _given_value(rule: Rule, declaration: Declaration, given: object) -> FactValue:
    if declaration.is_word:
        if isinstance(given, (str, bool)):
            return given
        raise _refused(rule, declaration, given, "neither a word nor true or false", "")
    if given == NEVER:
        return np.array([np.inf])
    kind = KIND_OF_UNIT.get(declaration.unit)
    if kind is None or not isinstance(given, (str, int, float)):
        raise _refused(rule, declaration, given, "not a value of this fact", "")
    try:
        stated = parse_stated(given, kind)
    except NotationError as error:
        raise _refused(rule, declaration, given, error.problem, error.accepted) from None
    best = np.array([stated.value])
    if not stated.half_width:
        return best
    spread: Samples = np.linspace(stated.low, stated.high, GRID)
    return np.concatenate((best, spread))


def _refused(rule: Rule, declaration: Declaration, given: object, problem: str, accepted: str) -> CatalogueError:
    return CatalogueError(
        Complaint(
            problem,
            file=f"{rule.family}.toml",
            field=f"{rule.key}.example.given.{declaration.key}",
            stated=quoted(given),
            accepted=accepted,
        )
    )
