"""The five outcomes and their edges, with made-up rules and facts."""

import numpy as np
import pytest

from spinhazard import assessment_from_text
from spinhazard.facts.fact import Fact
from spinhazard.facts.sheet import FactSheet
from spinhazard.rules.engine import findings, judge, shown
from spinhazard.rules.loading import load_rules, shipped_catalogue
from spinhazard.sampling import Sampler
from spinhazard.statement.policy import Policy

POLICY = Policy()
YES, NO = True, False
HEAD = """
[[rule]]
key = "made-up"
since = "0.1.0"
asks = "Is it so?"
because = "Made up for a test."
urgency = "before next access"
basis = ["practice"]
"""


def rule_of(body, *, each="guard", says="Distance {guard_distance}."):
    return load_rules(f'{HEAD}each = "{each}"\nsays = "{says}"\n{body}', name="t.toml", family="test")[0]


def number(key, values, *, unit="m", missing=(), outside=(), failed=""):
    value = None if values is None else np.atleast_1d(np.array(values, dtype=float))
    return Fact(key=key, subject="guard:g", unit=unit, value=value, missing=missing, outside=outside, failed=failed)


def word(key, value, *, missing=()):
    return Fact(key=key, subject="guard:g", unit="", value=value, missing=missing)


def judged(rule, *facts, policy=POLICY, **options):
    known = {fact.key: fact for fact in facts}
    return judge(rule, "guard:g", known.get, policy, **options)


NEAR = rule_of('review = [["guard_distance", "is below", "1 m"]]')


def test_a_condition_that_holds_is_for_review_with_its_numbers():
    finding = judged(NEAR, number("guard_distance", 0.42))

    assert (finding.outcome, finding.likelihood, finding.says) == ("for review", 1.0, "Distance 420 mm.")
    assert finding.facts == ("guard_distance|guard:g",)


def test_messages_follow_the_system_of_units():
    assert judged(NEAR, number("guard_distance", 0.254), system="us").says == "Distance 10 in."


def test_a_condition_that_does_not_hold_is_not_flagged_and_says_why():
    finding = judged(NEAR, number("guard_distance", 1.5))

    assert (finding.outcome, finding.likelihood) == ("not flagged", 0.0)
    assert finding.says == "Not met: distance from the guard plane to the nearest moving part (1.5 m) is not below 1 m."


def test_a_missing_value_is_data_missing_with_the_fields_that_settle_it():
    finding = judged(NEAR, number("guard_distance", None, missing=("guard.g.distance",)))

    assert (finding.outcome, finding.missing) == ("data missing", ("guard.g.distance",))
    assert finding.says == "Not decided: guard.g.distance is not stated."


def test_missing_lists_hold_every_field_once_and_only_what_is_undecided():
    rule = rule_of(
        'review = [["guard_distance", "is below", "required_distance"], ["access_time", "exceeds", "1 s"], '
        '["lock_timer", "is below", "9 s"]]'
    )
    finding = judged(
        rule,
        number("guard_distance", None, missing=("guard.g.distance",)),
        number("required_distance", None, missing=("stopping.shaft", "guard.g.distance")),
        number("access_time", 2.0, unit="s", missing=("decided.anyway",)),
        number("lock_timer", None, unit="s", missing=("guard.g.lock_timer",)),
    )

    assert finding.missing == ("guard.g.distance", "stopping.shaft", "guard.g.lock_timer")
    assert finding.says == "Not decided: guard.g.distance, stopping.shaft, guard.g.lock_timer are not stated."


def test_a_condition_that_fails_anyway_needs_no_missing_value():
    rule = rule_of('review = [["guard_distance", "is below", "1 m"], ["access_time", "exceeds", "1 s"]]')

    finding = judged(rule, number("guard_distance", 2.0), number("access_time", None, missing=("x",)))

    assert (finding.outcome, finding.missing) == ("not flagged", ())


def test_an_alternative_that_holds_needs_no_missing_value():
    rule = rule_of('review = [{ any = [["guard_distance", "is below", "1 m"], ["access_time", "exceeds", "1 s"]] }]')

    finding = judged(rule, number("guard_distance", 0.5), number("access_time", None, missing=("x",)))

    assert finding.outcome == "for review"


def test_a_fact_that_could_not_be_computed_says_why():
    finding = judged(NEAR, number("guard_distance", None, failed="the values do not fit each other"))

    assert (finding.outcome, finding.says) == ("data missing", "Not decided: the values do not fit each other.")


def test_a_value_that_is_no_number_is_not_decided_and_not_cleared():
    """Never over never: nothing is missing, and still nothing can be said."""
    finding = judged(NEAR, number("guard_distance", np.nan))

    assert (finding.outcome, finding.missing) == ("data missing", ())
    assert finding.says == (
        "Not decided: no definite value comes of what is stated for distance from the guard plane to the nearest moving part."
    )


def test_a_rule_that_does_not_apply_says_which_condition_is_not_met():
    rule = rule_of('applies = [["guard_kind", "is", "rail"]]\nreview = [["guard_distance", "is below", "1 m"]]')

    finding = judged(rule, word("guard_kind", "fixed"), number("guard_distance", 0.5))

    assert finding.outcome == "not applicable"
    assert finding.says == 'Does not apply here: kind of guard (fixed) is not "rail".'


def test_a_compared_fact_that_does_not_exist_makes_the_rule_not_applicable():
    rule = rule_of('review = [["guard_distance", "is below", "required_distance"]]')

    finding = judged(rule, number("guard_distance", 0.5))

    assert finding.outcome == "not applicable"
    assert finding.says == (
        "Does not apply here: distance at which the rotor would stand still before it is reached: the governing stop with the "
        "guard's response: nothing to compare."
    )


def test_an_alternative_that_does_not_exist_is_left_to_the_others():
    rule = rule_of(
        'review = [{ any = [["lock_timer", "is below", "9 s"], ["guard_distance", "is below", "required_distance"], '
        '["access_time", "exceeds", "1 s"]] }]'
    )
    distance = number("guard_distance", 0.5)

    assert judged(rule, distance, number("access_time", 2.0)).outcome == "for review"
    finding = judged(rule, distance, number("access_time", 0.5))
    assert finding.outcome == "not flagged"
    assert "time after which the guard lock is released: nothing to compare" in finding.says
    assert judged(rule, distance).outcome == "not applicable"


def test_a_missing_condition_of_application_is_data_missing_only_where_it_matters():
    rule = rule_of('applies = [["guard_kind", "is", "rail"]]\nreview = [["guard_distance", "is below", "1 m"]]')
    kind = word("guard_kind", None, missing=("guard.g.kind",))

    assert judged(rule, kind, number("guard_distance", 0.5)).missing == ("guard.g.kind",)
    assert judged(rule, kind, number("guard_distance", 1.5)).outcome == "not flagged"


def draws(best, share, *, of=1000):
    """Best estimate at `best`, a share of the draws below 1 m, the others above."""
    below = round(share * of)
    return number("guard_distance", [best] + [0.5] * below + [1.5] * (of - below))


@pytest.mark.parametrize(
    ("share", "outcome"), [(0.0, "not flagged"), (0.025, "not flagged"), (0.026, "borderline"), (1.0, "borderline")]
)
def test_borderline_begins_beyond_the_end_of_the_coverage_interval(share, outcome):
    finding = judged(NEAR, draws(1.2, share))

    assert (finding.outcome, finding.likelihood) == (outcome, share)


def test_a_wider_coverage_lets_fewer_draws_be_borderline():
    wide = Policy(coverage=0.99)

    assert judged(NEAR, draws(1.2, 0.005), policy=wide).outcome == "not flagged"
    assert judged(NEAR, draws(1.2, 0.006), policy=wide).outcome == "borderline"


def test_borderline_gives_the_message_and_the_share():
    assert judged(NEAR, draws(1.2, 0.3)).says == (
        "Distance 1.2 m. Not so by the best estimate, but in 30 % of the stated uncertainty."
    )


def test_the_best_estimate_alone_makes_it_for_review():
    finding = judged(NEAR, draws(0.9, 0.2))

    assert (finding.outcome, finding.likelihood) == ("for review", 0.2)


def test_draws_without_value_keep_a_rule_from_not_flagging():
    distance = number("guard_distance", [1.2] + [np.nan] * 30 + [1.5] * 970)

    finding = judged(NEAR, distance)

    assert (finding.outcome, finding.likelihood) == ("borderline", 0.0)
    assert finding.says.endswith("Without definite value in 3 % of the stated uncertainty.")
    assert judged(NEAR, number("guard_distance", [1.2] + [np.nan] * 25 + [1.5] * 975)).outcome == "not flagged"


def test_outside_the_range_of_a_method_a_rule_is_borderline_at_best():
    outside = ("thickness/diameter = 0.05, outside 0.1 to 0.8",)

    cleared = judged(NEAR, number("guard_distance", 1.5, outside=outside))
    flagged = judged(NEAR, number("guard_distance", 0.5, outside=outside))

    assert (cleared.outcome, cleared.outside) == ("borderline", outside)
    assert cleared.says.endswith(
        "Outside the range of the method (thickness/diameter = 0.05, outside 0.1 to 0.8), so this is no clearance."
    )
    assert flagged.outcome == "for review"


def test_a_stop_without_end_is_longer_than_every_wait():
    rule = shipped_catalogue(examples=True).rule("wait-shorter-than-stop")
    facts = {
        "stated_wait": number("stated_wait", 1e6, unit="s"),
        "required_wait": number("required_wait", np.inf, unit="s"),
        "governing_stopping_time": number("governing_stopping_time", np.inf, unit="s"),
        "governing_stop": word("governing_stop", "power loss"),
    }

    finding = judge(rule, "lockout", facts.get, POLICY)

    assert finding.outcome == "for review"
    assert "never" in finding.says


def test_a_ratio_without_limit_can_be_shown():
    rule = shipped_catalogue(examples=True).rule("brake-lost-with-power")

    finding = judge(rule, "machine", {"power_loss_ratio": number("power_loss_ratio", np.inf, unit="")}.get, POLICY)

    assert finding.outcome == "for review"
    assert "without limit" in finding.says


@pytest.mark.parametrize(("value", "known"), [("3 s", True), (None, False)])
def test_being_stated_is_a_question_of_its_own(value, known):
    stated = rule_of('review = [["lock_timer", "is stated"]]')
    absent = rule_of('review = [["lock_timer", "is stated", false]]')
    fact = number("lock_timer", None if value is None else 3.0, unit="s", missing=("guard.g.lock_timer",))

    assert judged(stated, fact).outcome == ("for review" if known else "not flagged")
    assert judged(absent, fact).outcome == ("not flagged" if known else "for review")
    assert judged(absent).outcome == "for review"
    label = "Not met: time after which the guard lock is released is"
    assert judged(stated).says == f"{label} not stated."
    assert judged(absent, number("lock_timer", 3.0, unit="s")).says == f"{label} stated."


@pytest.mark.parametrize(
    ("body", "value", "outcome", "says"),
    [
        ('"is", "rail"', "rail", "for review", "Distance"),
        ('"is not", "rail"', "rail", "not flagged", 'kind of guard (rail) is "rail"'),
        ('"is not", "rail"', "fixed", "for review", "Distance"),
        ('"is one of", ["rail", "fixed"]', "fixed", "for review", "Distance"),
        ('"is one of", ["rail", "fixed"]', "none", "not flagged", 'kind of guard (none) is none of "rail", "fixed"'),
    ],
)
def test_words_are_compared_as_words(body, value, outcome, says):
    rule = rule_of(f'review = [["guard_kind", {body}]]')

    finding = judged(rule, word("guard_kind", value), number("guard_distance", 1.0))

    assert finding.outcome == outcome
    assert says in finding.says


def test_yes_and_no_are_told_as_such():
    rule = rule_of('review = [["guard_contains", "is", false]]', says="It is.")

    assert judged(rule, word("guard_contains", NO)).outcome == "for review"
    assert judged(rule, word("guard_contains", YES)).says == (
        "Not met: whether the guard is meant to hold what could come off: yes."
    )


def test_several_causes_are_one_word_with_commas():
    rule = rule_of('review = [["back_drive", "is", "draught, gravity"]]', each="lockout", says="By {back_drive}.")

    assert judged(rule, word("back_drive", ("draught", "gravity"))).outcome == "for review"


def test_a_setting_of_the_policy_is_the_limit_and_is_told_in_the_units_shown():
    rule = rule_of(
        'review = [["stored_energy", "exceeds", "policy.energy_review_level"]]',
        each="machine",
        says="Level {policy.energy_review_level}.",
    )
    site = Policy(energy_review_level="0.5 kJ")

    assert judged(rule, number("stored_energy", 600.0, unit="J"), policy=site).says == "Level 500 J."
    assert judged(rule, number("stored_energy", 400.0, unit="J"), policy=site).says == (
        "Not met: energy stored in all turning parts in running (400 J) does not exceed 500 J (policy)."
    )


def test_a_fact_as_the_limit_is_told_with_its_value():
    rule = rule_of('review = [["guard_distance", "is below", "required_distance"]]')

    says = judged(rule, number("guard_distance", 0.9), number("required_distance", 0.5)).says

    assert says.endswith("the governing stop with the guard's response (500 mm).")


@pytest.mark.parametrize(
    ("fact", "text"),
    [
        (None, "–"),
        (number("guard_distance", None), "not known"),
        (number("stop_measurements", 5.0, unit=""), "5"),
        (number("stop_variation", 1.25, unit=""), "1.25"),
        (number("power_loss_ratio", np.inf, unit=""), "without limit"),
        (number("governing_stopping_time", np.inf, unit="s"), "never"),
        (word("guard_kind", "rail"), "rail"),
        (word("is_guarded", YES), "yes"),
    ],
)
def test_facts_are_shown_as_a_person_reads_them(fact, text):
    assert shown(fact, "si") == text


def sheet_of(text):
    return FactSheet(assessment_from_text(text, name="t.toml").file, POLICY, Sampler("seed", 0, POLICY.spreads))


def test_every_rule_is_asked_for_every_subject_of_its_kind(fan):
    sheet = sheet_of(fan.replace("procedure_reviewed = 2026-01-12\n", ""))
    rules = shipped_catalogue(examples=True).rules

    with np.errstate(all="ignore"):
        found = findings(rules, sheet)

    expected = [(rule.key, subject.name) for rule in rules for subject in sheet.subjects.of_kind(rule.each)]
    assert [(finding.rule.key, finding.subject) for finding in found] == expected
    assert {finding.outcome for finding in found} >= {"for review", "not flagged", "data missing", "not applicable"}


def test_a_part_asks_its_own_shaft_and_the_machine(fan):
    rule = rule_of(
        'review = [["is_contained", "is", false], ["stored_energy", "exceeds", "1 J"], ["tip_speed", "exceeds", "1 m/s"]]',
        each="part", says="{shaft_speed}",
    )  # fmt: skip
    sheet = sheet_of(fan)

    with np.errstate(all="ignore"):
        found = {finding.subject: finding for finding in findings((rule,), sheet)}

    assert list(found) == [part.name for part in sheet.subjects.parts]
    for part in sheet.subjects.parts:
        assert f"is_contained|{part.parent.name}" in found[part.name].facts
        assert "stored_energy|machine" in found[part.name].facts


def test_a_withdrawn_rule_is_not_asked(fan):
    body = 'withdrawn = "0.2.0"\nwithdrawn_because = "Merged."\nreview = [["guard_distance", "is below", "1 m"]]'

    assert findings((rule_of(body),), sheet_of(fan)) == []
