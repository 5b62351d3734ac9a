"""Moments of inertia by hand, and the ways in which forms go over into each other."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.mechanics import inertia

share = st.floats(0.0, 0.999)

BY_HAND = [
    # 20 kg, D 0.4: 20·0.16/8; bored to 0.2: 20·(0.16 + 0.04)/8
    (inertia.disk_inertia(20.0, 0.4), 0.4),
    (inertia.disk_inertia(20.0, 0.4, bore=0.2), 0.5),
    # 10 kg, R 1: 2/5·10; shell 2/3·10; R 1, r 0.5: 2/5·10·(1 − 1/32)/(1 − 1/8)
    (inertia.sphere_inertia(10.0, 2.0), 4.0),
    (inertia.sphere_inertia(10.0, 2.0, inner_diameter=2.0), 20.0 / 3.0),
    (inertia.sphere_inertia(10.0, 2.0, inner_diameter=1.0), 4.0 * (31.0 / 32.0) / (7.0 / 8.0)),
    (inertia.crossways_rod_inertia(12.0, 2.0), 4.0),
    (inertia.plate_inertia(12.0, 3.0, tangential=4.0), 25.0),
    # full cone 3/10 m R²; frustum R 0.5, r 0.32: 3/10·(R⁵ − r⁵)/(R³ − r³)
    (inertia.frustum_inertia(10.0, 2.0, small_diameter=0.0), 3.0),
    (inertia.frustum_inertia(1.0, 1.0, small_diameter=0.64), 0.3 * (0.5**5 - 0.32**5) / (0.5**3 - 0.32**3)),
    (inertia.frustum_inertia(20.0, 0.4, small_diameter=0.4, bore=0.2), 0.5),
    # R 1, a 0.2: 8·(1 + 0.75·0.04)
    (inertia.torus_inertia(8.0, 2.0, section_diameter=0.4), 8.24),
    (inertia.point_inertia(2.0, 3.0), 18.0),
    (inertia.offset_inertia(1.0, 2.0, offset=3.0), 19.0),
    # rod about its end: 1/12 + 1/4 = 1/3
    (inertia.offset_inertia(inertia.crossways_rod_inertia(3.0, 2.0), 3.0, offset=1.0), 4.0),
    (inertia.pattern_inertia(0.5, 12), 6.0),
    (inertia.referred_inertia(2.0, 3.0), 18.0),
    (inertia.inertia_from_gd2(7.6), 1.9),
    (inertia.inertia_from_wk2(1.9), 1.9),
    (inertia.revolved_volume([0.0, 0.5, 0.5, 0.0], [0.0, 0.0, 0.1, 0.1]), np.pi * 0.25 * 0.1),
    (inertia.revolved_inertia(20.0, [0.0, 0.2, 0.2, 0.0], heights=[0.0, 0.0, 0.1, 0.1]), 0.4),
]


@pytest.mark.parametrize(("computed", "by_hand"), BY_HAND)
def test_inertia_is_what_a_hand_calculation_gives(computed, by_hand):
    assert float(computed) == pytest.approx(by_hand, rel=1e-14)


@given(st.floats(0.01, 10.0), st.floats(1e-12, 1e-3))
def test_thin_shell_keeps_its_digits(diameter, wall):
    """The handbook's (R⁵ − r⁵)/(R³ − r³) would lose ten of sixteen; first order in the wall: 2/3 m R² (1 − wall/R)."""
    inner = diameter * (1.0 - wall)
    shell = float(inertia.sphere_inertia(1.0, diameter, inner_diameter=inner))

    assert shell == pytest.approx(diameter**2 / 6.0 * (1.0 - wall), rel=2.0 * wall**2 + 1e-14)


@given(st.floats(0.01, 10.0), share)
def test_cone_of_one_diameter_is_a_cylinder(diameter, bored):
    cone = inertia.frustum_inertia(3.0, diameter, small_diameter=diameter, bore=bored * diameter)

    assert float(cone) == pytest.approx(float(inertia.disk_inertia(3.0, diameter, bore=bored * diameter)), rel=1e-9)


@given(st.floats(0.01, 10.0), share, share)
def test_bored_frustum_is_the_whole_less_its_hole(large, small, bored):
    """By densities: full frustum of density 1 less a cylinder of density 1, lengths of 1."""
    small_diameter = 0.05 * large + 0.95 * small * large
    bore = bored * small_diameter * 0.9
    full = np.pi / 12.0 * (large**2 + large * small_diameter + small_diameter**2)
    hole = np.pi / 4.0 * bore**2
    difference = inertia.frustum_inertia(full, large, small_diameter=small_diameter) - inertia.disk_inertia(
        hole, bore or 1.0
    )

    assert float(
        inertia.frustum_inertia(full - hole, large, small_diameter=small_diameter, bore=bore)
    ) == pytest.approx(float(difference), rel=1e-9)


@given(st.floats(0.01, 10.0), share)
def test_frustum_does_not_care_which_end_is_called_large(large, small):
    small_diameter = (0.01 + 0.99 * small) * large
    one, other = (
        inertia.frustum_inertia(1.0, a, small_diameter=b) for a, b in ((large, small_diameter), (small_diameter, large))
    )

    assert float(one) == pytest.approx(float(other), rel=1e-13)


@given(st.floats(1e-3, 1e3), st.floats(1e-2, 1e2), st.floats(0.0, 1e3))
def test_energy_is_the_same_on_either_side_of_a_gear(body, ratio, speed):
    referred = float(inertia.referred_inertia(body, ratio))

    assert referred * speed**2 == pytest.approx(body * (ratio * speed) ** 2, rel=1e-12, abs=1e-300)


def test_there_and_back_through_a_gear_is_where_it_began():
    assert float(inertia.referred_inertia(inertia.referred_inertia(2.0, 3.0), 1.0 / 3.0)) == pytest.approx(2.0)


@pytest.mark.parametrize(
    ("call", "message"),
    [
        (lambda: inertia.disk_inertia(1.0, 0.3, bore=0.4), r"bore = 0.4 m: accepted is less than diameter"),
        (lambda: inertia.disk_inertia(1.0, [0.3, 0.5], bore=[0.2, 0.6]), r"bore = 0.6 m: accepted is less than diameter"),
        (lambda: inertia.crossways_rod_inertia(1.0, 0.0), r"length = 0 m: accepted is more than 0"),
        (lambda: inertia.plate_inertia(1.0, 1.0, tangential=0.0), r"tangential = 0 m: accepted is more than 0"),
        (lambda: inertia.frustum_inertia(1.0, 0.0, small_diameter=0.0), r"large_diameter = 0 m: accepted is more than 0"),
        (lambda: inertia.pattern_inertia(1.0, 0.0), r"count = 0: accepted is more than 0"),
        (lambda: inertia.revolved_inertia(-5.0, [0.0, 1.0, 1.0], heights=[0.0, 0.0, 1.0]), r"mass = -5 kg: accepted is 0 or more"),
    ],
)  # fmt: skip
def test_body_that_cannot_be_is_refused_with_value_unit_and_range(call, message):
    with pytest.raises(ValueError, match=message):
        call()
