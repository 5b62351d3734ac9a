"""Volumes by hand, and mass, volume and density from each other."""

from fractions import Fraction

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.mechanics import volume

BY_HAND = [
    (volume.disk_volume(2.0, 1.0), np.pi),
    (volume.disk_volume(2.0, 1.0, bore=1.0), 0.75 * np.pi),
    (volume.sphere_volume(2.0), 4.0 / 3.0 * np.pi),
    (volume.sphere_volume(2.0, inner_diameter=1.0), 7.0 / 6.0 * np.pi),
    (volume.plate_volume(1.0, 2.0, tangential=3.0), 6.0),
    (volume.frustum_volume(2.0, 0.0, length=3.0), np.pi),
    (volume.frustum_volume(2.0, 1.0, length=3.0, bore=0.5), np.pi * 3.0 / 4.0 * (7.0 / 3.0 - 0.25)),
    # Pappus: area of the section times the way of its centre
    (volume.torus_volume(2.0, 0.2), np.pi * 0.01 * 2.0 * np.pi),
    (volume.mass_from_density(7850.0, 0.002), 15.7),
    (volume.density_from_mass(15.7, 0.002), 7850.0),
]


@pytest.mark.parametrize(("computed", "by_hand"), BY_HAND)
def test_volume_is_what_a_hand_calculation_gives(computed, by_hand):
    assert float(computed) == pytest.approx(by_hand, rel=1e-14)


@given(st.floats(0.1, 10.0), st.floats(1e-12, 1e-6))
def test_thin_ring_keeps_its_digits(diameter, wall):
    bore = diameter - diameter * wall
    ring = float(volume.disk_volume(diameter, 1.0, bore=bore))

    exact = Fraction(diameter) ** 2 - Fraction(bore) ** 2  # no digit is lost in fractions

    assert ring == pytest.approx(np.pi / 4.0 * float(exact), rel=1e-14, abs=0.0)


@given(st.floats(1.0, 2e4), st.floats(1e-6, 1e3))
def test_density_comes_back_from_the_mass(density, content):
    mass = volume.mass_from_density(density, content)

    assert float(volume.density_from_mass(mass, content)) == pytest.approx(density, rel=1e-14)


@pytest.mark.parametrize(
    ("call", "message"),
    [
        (lambda: volume.disk_volume(1.0, 0.0), r"thickness = 0 m: accepted is more than 0"),
        (lambda: volume.disk_volume(1.0, 1.0, bore=1.0), r"bore = 1 m: accepted is less than diameter"),
        (lambda: volume.sphere_volume(1.0, inner_diameter=1.0), r"inner_diameter = 1 m: accepted is less than diameter"),
        (lambda: volume.density_from_mass(1.0, 0.0), r"volume = 0 m³: accepted is more than 0"),
        (lambda: volume.mass_from_density(0.0, 1.0), r"density = 0 kg/m³: accepted is more than 0"),
    ],
)  # fmt: skip
def test_body_that_cannot_be_is_refused_with_value_unit_and_range(call, message):
    with pytest.raises(ValueError, match=message):
        call()
