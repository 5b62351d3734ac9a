"""Kleene's strong logic: truth tables, laws on random draws, comparison at and beside a limit."""

import itertools

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from hypothesis.extra import numpy as arrays

from spinhazard.rules import logic
from spinhazard.rules.logic import NO, UNKNOWN, YES

ONE = {word: np.array([word], dtype=np.int8) for word in (NO, UNKNOWN, YES)}
AND = {
    (NO, NO): NO, (NO, UNKNOWN): NO, (NO, YES): NO,
    (UNKNOWN, NO): NO, (UNKNOWN, UNKNOWN): UNKNOWN, (UNKNOWN, YES): UNKNOWN,
    (YES, NO): NO, (YES, UNKNOWN): UNKNOWN, (YES, YES): YES,
}  # fmt: skip
OR = {
    (NO, NO): NO, (NO, UNKNOWN): UNKNOWN, (NO, YES): YES,
    (UNKNOWN, NO): UNKNOWN, (UNKNOWN, UNKNOWN): UNKNOWN, (UNKNOWN, YES): YES,
    (YES, NO): YES, (YES, UNKNOWN): YES, (YES, YES): YES,
}  # fmt: skip
truths = arrays.arrays(np.int8, st.integers(1, 40), elements=st.sampled_from([NO, UNKNOWN, YES]))
pairs = st.integers(1, 40).flatmap(
    lambda n: st.tuples(*[arrays.arrays(np.int8, n, elements=st.sampled_from([NO, UNKNOWN, YES]))] * 2)
)
numbers = st.floats(allow_nan=False, allow_infinity=True, width=64)


@pytest.mark.parametrize("pair", list(itertools.product((NO, UNKNOWN, YES), repeat=2)))
def test_and_follows_the_truth_table_of_kleene(pair):
    assert logic.all_of([ONE[pair[0]], ONE[pair[1]]]).tolist() == [AND[pair]]


@pytest.mark.parametrize("pair", list(itertools.product((NO, UNKNOWN, YES), repeat=2)))
def test_or_follows_the_truth_table_of_kleene(pair):
    assert logic.any_of([ONE[pair[0]], ONE[pair[1]]]).tolist() == [OR[pair]]


def test_of_nothing_all_hold_and_none_does():
    assert logic.all_of([]).tolist() == [YES]
    assert logic.any_of([]).tolist() == [NO]


def test_certain_and_unknown_are_the_same_in_every_draw():
    assert logic.certain(holds=True).tolist() == [YES]
    assert logic.certain(holds=False).tolist() == [NO]
    assert logic.unknown().tolist() == [UNKNOWN]
    assert logic.certain(holds=True).dtype == np.int8


@given(pairs)
def test_the_order_of_conditions_does_not_matter(pair):
    left, right = pair

    assert np.array_equal(logic.all_of([left, right]), logic.all_of([right, left]))
    assert np.array_equal(logic.any_of([left, right]), logic.any_of([right, left]))


@given(pairs)
def test_and_is_the_mirror_of_or(pair):
    left, right = pair

    mirrored = YES - logic.any_of([YES - left, YES - right])

    assert np.array_equal(logic.all_of([left, right]), mirrored)


@given(pairs)
def test_settling_an_unknown_never_turns_a_decided_result_round(pair):
    """What was decided with a value missing stays decided whatever the value turns out to be."""
    left, right = pair
    for combine in (logic.all_of, logic.any_of):
        before = combine([left, right])
        for settled in (NO, YES):
            after = combine([np.where(left == UNKNOWN, settled, left), np.where(right == UNKNOWN, settled, right)])
            assert np.array_equal(after[before != UNKNOWN], before[before != UNKNOWN])


@given(truths)
def test_one_draw_at_a_time_gives_the_same_as_all_at_once(truth):
    one_by_one = [int(logic.all_of([truth[i : i + 1], logic.unknown()])[0]) for i in range(truth.size)]

    assert logic.all_of([truth, logic.unknown()]).tolist() == one_by_one


@given(numbers, numbers)
def test_exceeding_and_being_exceeded_exclude_each_other(left, right):
    first = logic.exceeds(np.array([left]), np.array([right]))[0]
    second = logic.exceeds(np.array([right]), np.array([left]))[0]

    assert {first, second} != {YES}


@given(numbers)
def test_nothing_exceeds_itself(number):
    assert logic.exceeds(np.array([number]), np.array([number])).tolist() == [NO]


@pytest.mark.parametrize(
    ("left", "right", "truth"),
    [
        (1.0, 0.0, YES),
        (0.0, 1.0, NO),
        (0.1 + 0.2, 0.3, NO),
        (0.3 * (1 + 1e-9), 0.3, YES),
        (-1.0, -2.0, YES),
        (np.inf, 300.0, YES),
        (300.0, np.inf, NO),
        (np.inf, np.inf, NO),
        (np.nan, 1.0, UNKNOWN),
        (1.0, np.nan, UNKNOWN),
    ],
)
def test_exceeds_knows_limits_endless_stops_and_values_that_are_none(left, right, truth):
    assert logic.exceeds(np.array([left]), np.array([right])).tolist() == [truth]


def test_exceeds_compares_draw_by_draw_with_one_limit():
    found = logic.exceeds(np.array([1.0, 2.0, np.nan]), np.array([1.5]))

    assert found.tolist() == [NO, YES, UNKNOWN]
    assert found.dtype == np.int8


def test_the_share_leaves_the_best_estimate_out():
    truth = np.array([NO, YES, YES, NO, UNKNOWN], dtype=np.int8)

    assert logic.likelihood(truth) == 0.5
    assert logic.undecided(truth) == 0.25


def test_without_draws_the_best_estimate_is_the_share():
    assert logic.likelihood(logic.certain(holds=True)) == 1.0
    assert logic.likelihood(logic.certain(holds=False)) == 0.0
    assert logic.undecided(logic.unknown()) == 1.0


@given(truths)
def test_shares_lie_between_nothing_and_all(truth):
    assert 0.0 <= logic.likelihood(truth) <= 1.0
    assert logic.likelihood(truth) + logic.undecided(truth) <= 1.0
