"""Reach, distances and openings by hand; both tables rise with the distance."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.mechanics import reach

INCH = 0.0254
some = st.floats(0.0, 100.0)

BY_HAND = [
    (reach.reach_time(0.8, 1.6), 0.5),
    (reach.reach_time(0.8, 1.6, intrusion=0.4), 0.25),
    (reach.reach_time(0.4, 1.6, intrusion=0.8), 0.0),
    (reach.separation_distance(1.6, 0.5), 0.8),
    (reach.separation_distance(1.6, 0.5, intrusion=0.25), 1.05),
    (reach.separation_distance(1.6, math.inf), math.inf),
    # 0.15 s and 14 mm: 2000·0.15 = 300; 0.35 s and 30 mm: 700 + 128 = 828, again 560 + 128 = 688
    (reach.curtain_distance(0.15, 0.014), 0.300),
    (reach.curtain_distance(0.35, 0.030), 0.688),
    (reach.curtain_distance(0.0, 0.010), 0.1),
    (reach.curtain_distance(math.inf, 0.010), math.inf),
    (reach.two_hand_distance(0.5), 1.05),
    (reach.two_hand_distance(0.0), 0.25),
    (reach.us_distance(1.0), 63.0 * INCH),
]


@pytest.mark.parametrize(("computed", "by_hand"), BY_HAND)
def test_distance_is_what_a_hand_calculation_gives(computed, by_hand):
    assert float(computed) == pytest.approx(by_hand, rel=1e-14)


@given(some, st.floats(0.1, 5.0), st.floats(0.0, 1.0))
def test_distance_asked_for_is_reached_just_when_the_hazard_has_ended(time, approach, intrusion):
    distance = reach.separation_distance(approach, time, intrusion=intrusion)

    assert float(reach.reach_time(distance, approach, intrusion=intrusion)) == pytest.approx(time, abs=1e-12, rel=1e-12)


@given(st.floats(0.0, 10.0), st.floats(0.0, 5.0), st.floats(0.005, 0.1))
def test_longer_stop_never_asks_for_less_distance(time, longer, resolution):
    near, far = reach.curtain_distance([time, time + longer], resolution)

    assert near <= far
    assert reach.two_hand_distance(time) <= reach.two_hand_distance(time + longer)
    assert reach.us_distance(time) <= reach.us_distance(time + longer)


@given(st.floats(0.0, 10.0), st.floats(0.005, 0.1), st.floats(0.0, 0.05))
def test_coarser_curtain_never_asks_for_less_distance(time, resolution, coarser):
    assert reach.curtain_distance(time, resolution) <= reach.curtain_distance(time, resolution + coarser) + 1e-12


@pytest.mark.parametrize("shape", ["slot", "square", "round"])
def test_opening_tables_rise_and_end_together(shape):
    assert np.all(np.diff(reach.OPENING_CLASSES) > 0.0)
    assert np.all(np.diff(reach.OPENING_DISTANCES[shape]) >= 0.0)
    assert reach.OPENING_DISTANCES[shape].size == reach.OPENING_CLASSES.size


def test_us_table_rises_and_has_an_opening_for_each_distance():
    assert np.all(np.diff(reach.US_DISTANCES_INCH) > 0.0)
    assert np.all(np.diff(reach.US_OPENINGS_INCH) > 0.0)
    assert reach.US_DISTANCES_INCH.size == reach.US_OPENINGS_INCH.size


@given(st.floats(0.0, 1.0), st.floats(0.0, 0.5))
def test_slot_is_never_allowed_wider_than_a_round_hole(distance, farther):
    slot, round_hole = (reach.iso_opening_limit(distance, shape) for shape in ("slot", "round"))

    assert slot <= round_hole
    assert round_hole <= reach.iso_opening_limit(distance + farther, "round")


@given(st.floats(0.001, 0.12), st.floats(1.0, 2.0), st.sampled_from(["slot", "square", "round"]))
def test_wider_opening_never_asks_for_less_distance(size, factor, shape):
    wider = min(0.12, factor * size)

    assert reach.iso_opening_distance(size, shape) <= reach.iso_opening_distance(wider, shape)


@pytest.mark.parametrize("unit", [1.0, 0.1, 10.0])
def test_last_binary_digit_of_a_limit_does_not_matter(unit):
    # 120 mm by way of centimetres or metres
    distance = 120.0 * unit * 0.001 / unit

    assert float(reach.iso_opening_limit(np.nextafter(distance, 0.0), "slot")) == pytest.approx(0.020)
    assert float(reach.iso_opening_distance(np.nextafter(0.020, 1.0), "slot")) == pytest.approx(0.120)
    assert float(reach.us_opening_limit(np.nextafter(5.5 * INCH, 0.0))) == pytest.approx(0.75 * INCH)


def test_size_above_the_table_has_no_distance():
    assert np.isnan(float(reach.iso_opening_distance(0.121, "slot")))
    assert np.isfinite(float(reach.iso_opening_distance(0.120, "slot")))


@pytest.mark.parametrize(
    ("call", "message"),
    [
        (lambda: reach.reach_time(-1.0, 1.6), r"distance = -1 m: accepted is 0 or more"),
        (lambda: reach.curtain_distance(0.1, 0.0), r"resolution = 0 m: accepted is more than 0"),
        (lambda: reach.iso_opening_distance(0.0, "slot"), r"size = 0 m: accepted is more than 0"),
        (lambda: reach.us_opening_limit(-0.1), r"distance = -0.1 m: accepted is 0 or more"),
    ],
)
def test_value_that_cannot_be_is_refused_with_unit_and_range(call, message):
    with pytest.raises(ValueError, match=message):
        call()
