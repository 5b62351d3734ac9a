"""Energy, momentum and tip speed by hand."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.mechanics import energy

some = st.floats(1e-3, 1e3)

BY_HAND = [
    # ½·1.9·155²; 1.9·155; 155·0.6
    (energy.rotational_energy(1.9, 155.0), 22823.75),
    (energy.rotational_energy(1.9, -155.0), 22823.75),
    (energy.rotational_energy(0.0, 155.0), 0.0),
    (energy.angular_momentum(1.9, 155.0), 294.5),
    (energy.tip_speed(155.0, 0.6), 93.0),
    (energy.speed_from_energy(10.0, 5.0), 2.0),
    (energy.speed_from_energy(0.0, 5.0), 0.0),
    (energy.gyration_radius(18.0, 2.0), 3.0),
]


@pytest.mark.parametrize(("computed", "by_hand"), BY_HAND)
def test_energy_is_what_a_hand_calculation_gives(computed, by_hand):
    assert float(computed) == pytest.approx(by_hand, rel=1e-14)


@given(some, some)
def test_speed_comes_back_from_its_energy(body, speed):
    assert float(energy.speed_from_energy(energy.rotational_energy(body, speed), body)) == pytest.approx(speed)


@given(some, some)
def test_all_mass_at_the_radius_of_gyration_has_the_same_energy(body, mass):
    radius = energy.gyration_radius(body, mass)
    rim = energy.tip_speed(10.0, radius)

    assert float(mass * rim**2 / 2.0) == pytest.approx(float(energy.rotational_energy(body, 10.0)))


def test_ten_per_cent_of_overspeed_is_a_fifth_more_energy():
    assert float(energy.rotational_energy(1.9, 110.0) / energy.rotational_energy(1.9, 100.0)) == pytest.approx(1.21)


@pytest.mark.parametrize(
    ("call", "message"),
    [
        (lambda: energy.rotational_energy(-1.0, 1.0), r"inertia = -1 kg m²: accepted is 0 or more"),
        (lambda: energy.speed_from_energy(1.0, 0.0), r"inertia = 0 kg m²: accepted is more than 0"),
        (lambda: energy.gyration_radius(1.0, 0.0), r"mass = 0 kg: accepted is more than 0"),
    ],
)
def test_value_that_cannot_be_is_refused_with_unit_and_range(call, message):
    with pytest.raises(ValueError, match=message):
        call()
