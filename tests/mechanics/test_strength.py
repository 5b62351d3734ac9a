"""Stresses of rims and disks by hand, and against the equilibrium they come from."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.mechanics import strength

some = st.floats(1e-2, 1e3)
STEEL = 7850.0

BY_HAND = [
    # rim at 100 m/s: 7850·10⁴; solid 3.3/8 of it; bored to a tenth: (3.3 + 0.7·0.01)/4; annulus (1 + 0.1 + 0.01)/3
    (strength.thin_rim_stress(STEEL, 100.0), 78.5e6),
    (strength.solid_disk_stress(STEEL, 100.0, radius=1.0, poisson=0.3), 78.5e6 * 3.3 / 8.0),
    (strength.bored_disk_stress(STEEL, 100.0, radius=1.0, bore_radius=0.1, poisson=0.3), 78.5e6 * 3.307 / 4.0),
    (strength.mean_hoop_stress(STEEL, 100.0, radius=1.0, bore_radius=0.1), 78.5e6 * 1.11 / 3.0),
    # √(0.75·400/75) = 2
    (strength.burst_speed(100.0, 400e6, mean_stress=75e6, burst_factor=0.75), 200.0),
    (strength.speed_margin(300.0, 150.0), 2.0),
]


@pytest.mark.parametrize(("computed", "by_hand"), BY_HAND)
def test_stress_is_what_a_hand_calculation_gives(computed, by_hand):
    assert float(computed) == pytest.approx(by_hand, rel=1e-14)


@given(st.floats(0.01, 0.95), st.floats(0.0, 0.49))
def test_mean_hoop_stress_is_the_mean_of_the_elastic_one_whatever_the_ratio_of_poisson(bore, nu):
    """Hoop stress of a bored disk at radius x (Timoshenko), averaged over the section by Gauss's rule."""
    nodes, weights = np.polynomial.legendre.leggauss(60)
    x = bore + (1.0 - bore) * (nodes + 1.0) / 2.0
    hoop = (3.0 + nu) / 8.0 * (1.0 + bore**2 + bore**2 / x**2 - (1.0 + 3.0 * nu) / (3.0 + nu) * x**2)
    mean = float(strength.mean_hoop_stress(1.0, 1.0, radius=1.0, bore_radius=bore))

    assert mean == pytest.approx(float(weights @ hoop) / 2.0, rel=1e-6)


@given(st.floats(0.0, 0.999), st.floats(0.0, 0.49))
def test_largest_stress_at_the_bore_is_that_of_the_elastic_solution(bore, nu):
    at_bore = (3.0 + nu) / 8.0 * (2.0 + bore**2 - (1.0 + 3.0 * nu) / (3.0 + nu) * bore**2)
    computed = strength.bored_disk_stress(1.0, 1.0, radius=1.0, bore_radius=bore, poisson=nu)

    assert float(computed) == pytest.approx(at_bore, rel=1e-13)


@given(st.floats(0.0, 0.999))
def test_bored_disk_lies_between_twice_a_solid_disk_and_a_thin_rim(bore):
    solid = float(strength.solid_disk_stress(STEEL, 100.0, radius=1.0, poisson=0.3))
    bored = float(strength.bored_disk_stress(STEEL, 100.0, radius=1.0, bore_radius=bore, poisson=0.3))

    assert 2.0 * solid * (1.0 - 1e-12) <= bored <= float(strength.thin_rim_stress(STEEL, 100.0))


def test_narrow_ring_goes_over_into_the_thin_rim():
    rim = float(strength.thin_rim_stress(STEEL, 100.0))

    for ring in (
        strength.mean_hoop_stress(STEEL, 100.0, radius=1.0, bore_radius=1.0 - 1e-9),
        strength.bored_disk_stress(STEEL, 100.0, radius=1.0, bore_radius=1.0 - 1e-9, poisson=0.3),
    ):
        assert float(ring) == pytest.approx(rim, rel=2e-9)


@given(some, st.floats(1e6, 1e9), st.floats(1e5, 1e9), st.floats(0.5, 1.0))
def test_at_the_burst_speed_the_mean_stress_is_the_share_of_the_strength(speed, ultimate, stress, factor):
    burst = float(strength.burst_speed(speed, ultimate, mean_stress=stress, burst_factor=factor))

    assert stress * (burst / speed) ** 2 == pytest.approx(factor * ultimate, rel=1e-12)


@given(some, some)
def test_burst_speed_does_not_depend_on_the_speed_the_stress_was_worked_out_for(one, other):
    bursts = [
        float(
            strength.burst_speed(
                speed,
                400e6,
                mean_stress=strength.mean_hoop_stress(STEEL, speed, radius=0.5, bore_radius=0.1),
                burst_factor=0.75,
            )
        )
        for speed in (one, other)
    ]

    assert bursts[0] == pytest.approx(bursts[1], rel=1e-12)


@pytest.mark.parametrize(
    ("call", "message"),
    [
        (lambda: strength.thin_rim_stress(0.0, 1.0), r"density = 0 kg/m³: accepted is more than 0"),
        (lambda: strength.mean_hoop_stress(1.0, 1.0, radius=1.0, bore_radius=2.0), r"bore_radius = 2 m: accepted is less than radius"),
        (lambda: strength.burst_speed(1.0, 1.0, mean_stress=0.0, burst_factor=1.0), r"mean_stress = 0 Pa: accepted is more than 0"),
        (lambda: strength.speed_margin(1.0, 0.0), r"highest_speed = 0 rad/s: accepted is more than 0"),
    ],
)  # fmt: skip
def test_value_that_cannot_be_is_refused_with_unit_and_range(call, message):
    with pytest.raises(ValueError, match=message):
        call()
