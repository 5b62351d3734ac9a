"""Pieces that come off, by hand: centres of mass, speeds, energies, perforation in its own units."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.mechanics import fragments

FOOT_POUND, INCH, PSI = 4.4482216152605 * 0.3048, 0.0254, 4.4482216152605 / 0.0254**2
some = st.floats(1e-2, 1e3)

BY_HAND = [
    # half disk 4R/3π; quarter (4√2/3π) R; whole disk: on the axis
    (fragments.sector_centroid_radius(0.6, 0.0, angle=math.pi), 4.0 * 0.6 / (3.0 * math.pi)),
    (fragments.sector_centroid_radius(0.6, 0.0, angle=math.pi / 2.0), 4.0 * math.sqrt(2.0) * 0.6 / (3.0 * math.pi)),
    # narrow sector: 2/3 R; narrow sector of a thin ring: R
    (fragments.sector_centroid_radius(0.6, 0.0, angle=1e-9), 0.4),
    (fragments.sector_centroid_radius(0.6, 0.6 * (1.0 - 1e-15), angle=1e-9), 0.6),
    # half of a thin wire ring: 2R/π
    (fragments.sector_centroid_radius(0.6, 0.6 * (1.0 - 1e-15), angle=math.pi), 1.2 / math.pi),
    (fragments.sector_mass(12.0, math.pi / 2.0), 3.0),
    (fragments.fragment_speed(155.0, 0.4), 62.0),
    (fragments.fragment_energy(2.0, 10.0), 100.0),
    (fragments.unbalance_force(2.0, 0.5, speed=100.0), 10000.0),
    (fragments.equivalent_diameter(math.pi), 2.0),
    (fragments.design_thickness(0.004), 0.005),
    # 1000 ft lbf on 1 in: 1000^(2/3)/672 = 100/672 in
    (fragments.perforation_thickness(1000.0 * FOOT_POUND, INCH), 100.0 / 672.0 * INCH),
]


@pytest.mark.parametrize(("computed", "by_hand"), BY_HAND)
def test_piece_is_what_a_hand_calculation_gives(computed, by_hand):
    assert float(computed) == pytest.approx(by_hand, rel=1e-13)


def test_whole_disk_has_its_centre_on_the_axis():
    assert float(fragments.sector_centroid_radius(0.6, 0.1, angle=2.0 * math.pi)) == pytest.approx(0.0, abs=1e-15)


@given(st.floats(0.0, 0.95), st.floats(0.05, 6.28))
def test_centre_of_a_sector_is_the_mean_over_its_area(hole, angle):
    """∫∫ x dA by Gauss's rule in radius and angle."""
    nodes, weights = np.polynomial.legendre.leggauss(40)
    radius = hole + (1.0 - hole) * (nodes + 1.0) / 2.0
    turn = angle / 2.0 * nodes
    mean = (weights @ radius**2) * (weights @ np.cos(turn)) / ((weights @ radius) * 2.0)

    assert float(fragments.sector_centroid_radius(1.0, hole, angle=angle)) == pytest.approx(mean, rel=1e-10, abs=1e-12)


def test_worst_sector_is_where_its_energy_is_stationary():
    half = fragments.WORST_SECTOR_ANGLE / 2.0

    assert math.tan(half) == pytest.approx(2.0 * half, rel=1e-14)
    assert math.degrees(fragments.WORST_SECTOR_ANGLE) == pytest.approx(133.563, abs=5e-4)


@given(st.floats(0.05, 6.28), st.floats(0.0, 0.9))
def test_no_sector_carries_more_energy_than_the_worst(angle, hole):
    def energy(turn):
        radius = fragments.sector_centroid_radius(0.6, 0.6 * hole, angle=turn)
        return fragments.fragment_energy(fragments.sector_mass(50.0, turn), fragments.fragment_speed(155.0, radius))

    assert energy(angle) <= energy(fragments.WORST_SECTOR_ANGLE) * (1.0 + 1e-12)


@given(st.floats(1.0, 1e6), st.floats(0.005, 0.5), st.floats(1.0, 10.0))
def test_more_energy_on_a_smaller_face_never_asks_for_less_plate(energy, diameter, factor):
    plate = {"strength": 400e6, "span": 0.3}
    brl, stanford = fragments.perforation_thickness, fragments.stanford_perforation_thickness
    rounding = 1.0 - 1e-14

    assert brl(factor * energy, diameter) >= brl(energy, diameter) * rounding
    assert brl(energy, diameter) >= brl(energy, factor * diameter) * rounding
    assert stanford(factor * energy, diameter, **plate) >= stanford(energy, diameter, **plate) * rounding
    assert stanford(energy, diameter, **plate) >= stanford(energy, factor * diameter, **plate) * rounding
    stronger = stanford(energy, diameter, strength=factor * 400e6, span=0.3)
    assert stanford(energy, diameter, **plate) >= stronger * rounding


@given(st.floats(1e-4, 1.0), st.floats(0.2, 10.0), st.floats(2e4, 1e5), st.floats(2.0, 100.0))
def test_stanford_form_returns_the_thickness_its_energy_was_worked_out_for(thickness, diameter, psi, span):
    energy = diameter * psi / 46500.0 * (16000.0 * thickness**2 + 1500.0 * span / 4.0 * thickness)
    back = fragments.stanford_perforation_thickness(
        energy * FOOT_POUND, diameter * INCH, strength=psi * PSI, span=span * INCH
    )

    assert float(back) / INCH == pytest.approx(thickness, rel=1e-9)


def test_piece_without_energy_perforates_nothing():
    assert float(fragments.perforation_thickness(0.0, 0.05)) == 0.0
    assert float(fragments.stanford_perforation_thickness(0.0, 0.05, strength=400e6, span=0.3)) == 0.0


@pytest.mark.parametrize(
    ("call", "message"),
    [
        (lambda: fragments.sector_centroid_radius(1.0, 1.0, angle=1.0), r"inner_radius = 1 m: accepted is less than outer_radius"),
        (lambda: fragments.sector_centroid_radius(1.0, 0.0, angle=6.3), r"angle: accepted is at most 2π rad"),
        (lambda: fragments.sector_mass(1.0, 0.0), r"angle = 0 rad: accepted is more than 0"),
        (lambda: fragments.perforation_thickness(1.0, 0.0), r"diameter = 0 m: accepted is more than 0"),
        (lambda: fragments.stanford_perforation_thickness(1.0, 1.0, strength=1.0, span=0.0), r"span = 0 m: accepted is more than 0"),
    ],
)  # fmt: skip
def test_value_that_cannot_be_is_refused_with_unit_and_range(call, message):
    with pytest.raises(ValueError, match=message):
        call()
