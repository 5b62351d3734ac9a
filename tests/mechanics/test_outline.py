"""Outermost points by hand: right-angled triangles of 3, 4 and 5."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.mechanics import outline

size, away = st.floats(1e-3, 10.0), st.floats(0.0, 10.0)

BY_HAND = [
    (outline.disk_tip_radius(0.2), 0.1),
    (outline.disk_tip_radius(0.2, offset=0.5), 0.6),
    (outline.plate_tip_radius(0.4, 0.6, offset=0.2), 0.5),
    (outline.plate_tip_radius(0.6, 0.8), 0.5),
    (outline.radial_rod_tip_radius(1.0), 0.5),
    (outline.radial_rod_tip_radius(1.0, offset=0.5), 1.0),
    (outline.tangential_rod_tip_radius(0.6, offset=0.4), 0.5),
    (outline.point_tip_radius(0.5), 0.5),
    (outline.point_tip_radius(0.5, offset=0.25), 0.75),
]


@pytest.mark.parametrize(("computed", "by_hand"), BY_HAND)
def test_outermost_point_is_what_a_hand_calculation_gives(computed, by_hand):
    assert float(computed) == pytest.approx(by_hand, rel=1e-14)


@given(size, size, away)
def test_outermost_point_is_never_nearer_than_the_centre_of_the_piece(length, width, offset):
    tips = [
        outline.disk_tip_radius(length, offset=offset), outline.plate_tip_radius(length, width, offset=offset),
        outline.radial_rod_tip_radius(length, offset=offset), outline.tangential_rod_tip_radius(length, offset=offset),
    ]  # fmt: skip

    assert min(map(float, tips)) >= offset


@given(size, size, away)
def test_plate_reaches_as_far_as_either_rod_in_it(radial, tangential, offset):
    plate = outline.plate_tip_radius(radial, tangential, offset=offset)

    assert plate >= outline.radial_rod_tip_radius(radial, offset=offset)
    assert plate >= outline.tangential_rod_tip_radius(tangential, offset=offset) * (1.0 - 1e-15)


@pytest.mark.parametrize(
    ("call", "message"),
    [
        (lambda: outline.disk_tip_radius(0.0), r"diameter = 0 m: accepted is more than 0"),
        (lambda: outline.plate_tip_radius(1.0, 0.0), r"tangential = 0 m: accepted is more than 0"),
        (lambda: outline.radial_rod_tip_radius(1.0, offset=-0.1), r"offset = -0.1 m: accepted is 0 or more"),
    ],
)
def test_length_that_cannot_be_is_refused(call, message):
    with pytest.raises(ValueError, match=message):
        call()
