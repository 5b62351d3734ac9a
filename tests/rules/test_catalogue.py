"""The shipped rules: every example gives what it says, every rule brings the cases it owes, every word is one of the trade's."""

import dataclasses
import re
import tomllib
from importlib import resources
from typing import get_args

import pytest

from spinhazard.errors import CatalogueError
from spinhazard.facts import FACTS
from spinhazard.rules.examples import run_example
from spinhazard.rules.loading import PLACEHOLDER, shipped_catalogue
from spinhazard.rules.rule import FORBIDDEN_NAMES, Example
from spinhazard.sources import resolve
from spinhazard.statement.guarding import Guard
from spinhazard.statement.lockout import BackDrive, Lockout
from spinhazard.statement.machine import MachineKind
from spinhazard.statement.policy import Policy
from spinhazard.statement.rotor import SHAPES, Shaft
from spinhazard.statement.stopping import StopCase

RULES = shipped_catalogue(examples=True).rules
FAMILIES = (
    "access", "containment", "energy", "lockout", "plausibility", "records", "speed", "stopping", "strength",
)  # fmt: skip
POLICY = Policy()
FORBIDDEN = re.compile(r"\b(safe|pass|approved|compliant|ok)\b", re.IGNORECASE)
NUMERIC = {"exceeds", "is below"}
AGREED = [
    "energy-above-review-level", "energy-growth-at-max-speed", "max-speed-not-stated", "energy-rests-on-estimates",
    "coupled-inertia-not-stated", "inertia-impossible", "density-impossible", "tip-speed-implausible",
    "tip-speed-above-guide", "above-marked-speed", "burst-margin-low", "rim-stress-high", "never-reaches-standstill",
    "stop-slower-than-kind", "brake-lost-with-power", "brake-overloaded", "few-stop-measurements",
    "measured-and-computed-disagree", "measurement-out-of-date", "drag-from-estimates", "part-without-guard",
    "opens-before-standstill", "lock-timer-too-short", "timer-where-stop-varies", "energy-left-at-access",
    "curtain-too-close", "two-hand-too-close", "opening-too-large", "fan-opening-over-half-inch",
    "low-flywheel-unguarded", "rail-distance-off", "fixed-guard-opens-by-hand", "work-rest-gap", "tongue-gap",
    "hood-angle", "guard-thinner-than-perforation", "hazardous-fragment-unenclosed", "guard-material-without-method",
    "method-out-of-range", "unbalance-after-loss", "wait-shorter-than-stop", "wait-not-stated",
    "standstill-not-verified", "back-drive-not-blocked", "swings-back", "procedure-review-overdue",
    "value-without-source", "instrument-out-of-calibration", "reassessment-due",
]  # fmt: skip
"""Conditions that the catalogue owes; a rule may be withdrawn, what it asked may not be lost."""


def words_of(model, field):
    """Words that a field of a statement model takes, from its annotation."""
    annotation = model.model_fields[field].annotation
    return {word for part in (annotation, *get_args(annotation)) for word in get_args(part) if isinstance(word, str)}


VOCABULARY = {
    "machine_kind": set(get_args(MachineKind)),
    "part_shape": set(SHAPES),
    "shaft_drive": words_of(Shaft, "drive"),
    "guard_kind": words_of(Guard, "kind"),
    "guard_fastening": words_of(Guard, "fastening"),
    "lock_release": words_of(Guard, "lock_release"),
    "verification": words_of(Lockout, "verification"),
    "back_drive": set(get_args(BackDrive)),
    "measured_case": {*get_args(StopCase), "coast"},
}
CASES = [
    pytest.param(rule, example, id=f"{rule.key}-{number}")
    for rule in RULES
    for number, example in enumerate(rule.examples, start=1)
]
each_rule = pytest.mark.parametrize("rule", RULES, ids=lambda rule: rule.key)


@pytest.mark.parametrize(("rule", "example"), CASES)
def test_every_example_gives_the_outcome_it_states(rule, example):
    finding = run_example(rule, example, policy=POLICY)

    assert finding.outcome == example.expect, finding.says
    assert finding.says
    assert not re.search(r"[{}]", finding.says)


def test_an_example_with_the_wrong_outcome_is_noticed():
    rule = shipped_catalogue(examples=True).rule("wait-shorter-than-stop")
    enough = Example(given={"stated_wait": "5 min", "required_wait": "254 s"}, expect="for review")

    assert run_example(rule, enough).outcome == "not flagged"


def test_the_catalogue_covers_what_was_agreed_in_all_families():
    assert set(AGREED) - {rule.key for rule in RULES} == set()
    assert {rule.family for rule in RULES} == set(FAMILIES)
    assert len(RULES) >= len(AGREED) > 45


def kinds_owed(rule):
    """Kinds of examples that a rule owes, from its comparisons."""
    comparisons = rule.comparisons()
    owed = {"for review", "not flagged"}
    if any(line.word != "is stated" for line in comparisons):
        owed.add("data missing")
    if rule.applies:
        owed.add("not applicable")
    if any(line.word in NUMERIC for line in comparisons):
        owed |= {"borderline", "at the limit"}
    return owed


def kinds_there(rule):
    """Kinds of examples that a rule brings."""
    limits = {"at the limit" for example in rule.examples if example.note.startswith("at the limit")}
    return {example.expect for example in rule.examples} | limits


@each_rule
def test_every_rule_brings_the_kinds_of_examples_it_owes(rule):
    assert kinds_owed(rule) - kinds_there(rule) == set()


def test_a_rule_without_its_case_at_the_limit_is_noticed():
    rule = shipped_catalogue(examples=True).rule("swings-back")
    poorer = dataclasses.replace(rule, examples=tuple(example for example in rule.examples if not example.note))

    assert kinds_owed(poorer) - kinds_there(poorer) == {"at the limit"}


@each_rule
def test_at_the_limit_a_rule_does_not_flag(rule):
    at_limit = [example for example in rule.examples if example.note.startswith("at the limit")]

    assert {run_example(rule, example).outcome for example in at_limit} <= {"not flagged", "not applicable"}


@each_rule
def test_keys_name_the_condition_found(rule):
    assert re.fullmatch(r"[a-z0-9]+(-[a-z0-9]+)+", rule.key)
    assert not any(re.match(pattern.replace("*", ".*") + r"\Z", rule.key) for pattern in FORBIDDEN_NAMES)


@each_rule
def test_rules_speak_like_an_engineer_and_never_clear_a_machine(rule):
    texts = [rule.asks, rule.because, rule.says, *(example.note for example in rule.examples)]

    assert [match[0] for text in texts for match in FORBIDDEN.finditer(text)] == []
    assert FORBIDDEN.search("This guard is safe.")
    assert rule.asks.endswith("?")
    assert rule.because.endswith(".")
    assert rule.says.endswith(".")
    assert len(rule.because) >= 40


def settings_named(rule):
    """Settings of the policy that the basis names."""
    places = [reference.partition(" ")[2] for reference in rule.basis if reference.startswith("policy ")]
    return {name for place in places for name in place.split(", ")}


@each_rule
def test_every_basis_resolves_and_names_the_policy_where_the_policy_decides(rule):
    compared = {line.operand.name for line in rule.comparisons() if line.operand.kind == "policy"}

    assert [resolve(reference).short for reference in rule.basis]
    assert compared <= settings_named(rule) <= set(Policy.model_fields)


def test_a_basis_that_leads_nowhere_is_noticed():
    with pytest.raises(LookupError, match='no source has the id "iso-99999"'):
        resolve("iso-99999 6.2")


@each_rule
def test_words_compared_are_words_a_statement_can_hold(rule):
    for line in rule.comparisons():
        if line.word not in {"is", "is not", "is one of"}:
            continue
        operand = line.operand.value
        if isinstance(operand, bool):
            assert line.fact not in VOCABULARY
            continue
        words = set(operand) if isinstance(operand, tuple) else {operand}
        assert words <= VOCABULARY[line.fact], line.fact


@each_rule
def test_given_words_are_words_a_statement_can_hold(rule):
    for example in rule.examples:
        for key, given in example.given.items():
            if key not in VOCABULARY or given in {"missing", "does not apply"}:
                continue
            words = given.split(", ") if key == "back_drive" else [given]
            assert set(words) <= VOCABULARY[key], key


@each_rule
def test_what_a_rule_compares_is_what_its_message_shows(rule):
    """A number that decides is a number the engineer sees; levels of the policy are named in the message or on its page."""
    compared = {line.fact for line in rule.comparisons() if line.word in NUMERIC}
    shown = set(PLACEHOLDER.findall(rule.says))

    behind = {
        "density_departure": "implied_density", "stop_time_before_access": "stop_time_before_access",
    }  # fmt: skip
    assert {behind.get(fact, fact) for fact in compared} <= shown


def test_rules_are_sorted_into_the_families_of_their_files():
    folder = resources.files("spinhazard.rules").joinpath("catalogue")
    for family in FAMILIES:
        raw = tomllib.loads(folder.joinpath(f"{family}.toml").read_text("utf-8"))
        assert [rule.key for rule in RULES if rule.family == family] == [entry["key"] for entry in raw["rule"]]


def test_every_placeholder_of_every_message_is_a_fact_or_a_setting():
    for rule in RULES:
        for name in PLACEHOLDER.findall(rule.says):
            assert name in FACTS or hasattr(POLICY, name.removeprefix("policy."))


@pytest.mark.parametrize(
    ("given", "problem"),
    [
        ({"stated_wait": "5 kg"}, r"lockout\.toml, wait-shorter-than-stop\.example\.given\.stated_wait: .*kg"),
        ({"stated_wait": True}, r"stated_wait: neither a text nor a number\. Stated: true"),
        ({"stated_wait": ["5 s"]}, r"stated_wait: not a value of this fact"),
    ],
)
def test_an_example_whose_value_is_of_another_kind_is_refused(given, problem):
    rule = shipped_catalogue(examples=True).rule("wait-shorter-than-stop")

    with pytest.raises(CatalogueError, match=problem):
        run_example(rule, Example(given={**given, "required_wait": "9 s"}, expect="for review"))


def test_an_example_that_gives_a_number_for_a_word_is_refused():
    rule = shipped_catalogue(examples=True).rule("standstill-not-verified")

    with pytest.raises(CatalogueError, match=r"verification: neither a word nor true or false\. Stated: 3"):
        run_example(rule, Example(given={"verification": 3}, expect="for review"))


def test_a_spread_is_an_even_grid_around_the_best_estimate():
    rule = shipped_catalogue(examples=True).rule("energy-above-review-level")

    finding = run_example(rule, Example(given={"stored_energy": "950 J ± 100 J"}, expect="borderline"))

    # 1000 J lies three quarters up the interval 850 J to 1050 J; 100 of the 401 points lie beyond it
    assert finding.likelihood == pytest.approx(100 / 401)
    assert finding.says.endswith("Not so by the best estimate, but in 25 % of the stated uncertainty.")


def test_a_site_policy_moves_the_limit_of_an_example():
    rule = shipped_catalogue(examples=True).rule("energy-above-review-level")
    strict = Policy(energy_review_level="100 J")

    case = Example(given={"stored_energy": "420 J"}, expect="not flagged")

    assert run_example(rule, case).outcome == "not flagged"
    assert run_example(rule, case, policy=strict).outcome == "for review"
    assert "100 J" in run_example(rule, case, policy=strict).says
