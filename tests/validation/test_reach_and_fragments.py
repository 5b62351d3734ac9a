"""Procedures of standards and screening formulas against their own figures, worked out here by other means.

Sources: ISO 13855:2010 clause 6 and ISO 13857 table 4 (figures from memory), 29 CFR 1910.217 table O-10 (reprint of 2002),
BC-TOP-9-A revision 2 (from memory), Schlichting chapters 5 and 21 (from memory). Functions: curtain_distance,
iso_opening_limit, iso_opening_distance, us_opening_limit, stanford_perforation_thickness, disk_windage_torque.
"""

import numpy as np
import pytest
from scipy.optimize import brentq

from spinhazard.mechanics import drag, fragments, reach


@pytest.mark.parametrize(
    ("time", "resolution", "distance"),
    [
        (0.15, 14, 300),
        (0.35, 30, 688),
        (0.02, 14, 100),
        (0.25, 14, 500),
        (0.251, 14, 500),
        (0.5, 14, 800),
        (0.1, 50, 1010),
        (0.3, 40, 688),
    ],
)
def test_curtain_distance_follows_the_procedure_of_the_standard(time, resolution, distance):
    # by hand: 2000 mm/s first; beyond 500 mm again with 1600 mm/s, then at least 500; above 40 mm: 1600 mm/s and 850 mm
    assert float(reach.curtain_distance(time, resolution / 1000.0)) == pytest.approx(distance / 1000.0, abs=1e-9)


ISO_TABLE = {  # upper end of the class in mm: distance for slot, square, round
    4: (2, 2, 2), 6: (10, 5, 5), 8: (20, 15, 5), 10: (80, 25, 20), 12: (100, 80, 80), 20: (120, 120, 120), 30: (850, 120, 120),
    40: (850, 200, 120), 120: (850, 850, 850),
}  # fmt: skip


@pytest.mark.parametrize("size", ISO_TABLE)
@pytest.mark.parametrize(("column", "shape"), [(0, "slot"), (1, "square"), (2, "round")])
def test_openings_follow_the_table_on_both_sides_of_each_class(size, column, shape):
    distance = ISO_TABLE[size][column]
    allowed = max(upper for upper, row in ISO_TABLE.items() if row[column] <= distance)

    assert float(reach.iso_opening_distance(size / 1000.0, shape)) == pytest.approx(distance / 1000.0)
    assert float(reach.iso_opening_limit(distance / 1000.0, shape)) == pytest.approx(allowed / 1000.0)
    just_nearer = max((upper for upper, row in ISO_TABLE.items() if row[column] < distance), default=0)
    assert float(reach.iso_opening_limit(distance / 1000.0 - 1e-6, shape)) == pytest.approx(just_nearer / 1000.0)


def test_us_opening_limit_is_nothing_below_half_an_inch_and_keeps_its_last_row():
    inch = 0.0254

    assert float(reach.us_opening_limit(0.49 * inch)) == 0.0
    assert float(reach.us_opening_limit(1.5 * inch)) == pytest.approx(0.375 * inch)
    assert float(reach.us_opening_limit(60 * inch)) == pytest.approx(2.125 * inch)


@pytest.mark.parametrize(
    ("energy", "diameter", "psi", "span"),
    [(1000.0, 0.05, 58000.0, 8.0), (40000.0, 0.1, 70000.0, 12.0), (80.0, 0.02, 45000.0, 5.0)],
)
def test_stanford_perforation_thickness_solves_its_own_equation(energy, diameter, psi, span):
    foot_pound, inch = energy / 1.3558179483314004, diameter / 0.0254
    root = brentq(
        lambda t: psi / 46500.0 * (16000.0 * t * t + 1500.0 * span / 4.0 * t) - foot_pound / inch,
        0.0,
        100.0,
        xtol=1e-14,
    )
    ours = fragments.stanford_perforation_thickness(
        energy, diameter, strength=psi * 6894.757293168361, span=span * 0.0254
    )

    assert float(ours) / 0.0254 == pytest.approx(root, rel=1e-9)


def test_disk_windage_torque_grows_with_its_published_powers():
    def torque(speed):
        return float(drag.disk_windage_torque(1.2, speed, radius=0.6, viscosity=1.81e-5))

    slow, fast = 2.0, 200.0  # laminar and turbulent
    assert np.log(torque(2 * slow) / torque(slow)) / np.log(2.0) == pytest.approx(1.5)
    assert np.log(torque(2 * fast) / torque(fast)) / np.log(2.0) == pytest.approx(1.8)
    assert torque(0.0) == 0.0
