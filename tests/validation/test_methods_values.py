"""Figures the method pages print, worked out here by other means: 40-digit arithmetic (mpmath), roots, published factors.

Covers stopping_time, angle_turned, disk_windage_torque, stanford_perforation_thickness, curtain_distance, revolved_volume,
revolved_inertia and the closed forms beside them. Sources as on the pages of docs/methods; figures of standards from memory.
"""

import re

import mpmath
import numpy as np
import pytest

from spinhazard.mechanics import coastdown, drag, fragments, inertia, pendulum, reach, strength
from spinhazard.quantity.units import factor_to_si

POUND, FOOT, INCH, GRAVITY = mpmath.mpf("0.45359237"), mpmath.mpf("0.3048"), mpmath.mpf("0.0254"), mpmath.mpf("9.80665")
FOOT_POUND, PSI = POUND * GRAVITY * FOOT, POUND * GRAVITY / INCH**2

STOPS = [  # J, a, b, c, from, to: seconds
    ((1.9, 3.1, 0.002, 0.0041, 155.0, 0.0), 23.36995992999758),
    ((1.9, 3.1, 0.0, 0.0, 155.0, 0.0), 95.0),
    ((1.9, 3.1, 0.02, 0.0, 155.0, 0.0), 65.8489821531948),
    ((1.9, 3.1, 0.3, 0.0041, 155.0, 0.0), 12.77980377521567),
    ((1.9, 0.0, 0.02, 0.001, 155.0, 1.0), 277.70035016831974),
    ((10.0, 2.0, 0.4, 0.02, 100.0, 0.0), 45.45454545454546),
]


@pytest.mark.parametrize(("case", "seconds"), STOPS)
def test_stop_takes_as_long_as_forty_digits_say(case, seconds):
    body, a, b, c, start, end = case
    load = {"constant": a, "linear": b, "quadratic": c}
    with mpmath.workdps(40):
        points = [mpmath.mpf(end), mpmath.mpf(start) / 10, mpmath.mpf(start)]
        exact = [float(mpmath.quad(lambda w, k=k: body * w**k / (a + b * w + c * w * w), points)) for k in (0, 1)]

    assert exact[0] == pytest.approx(seconds, rel=4e-16)
    assert float(coastdown.stopping_time(body, start, end_speed=end, **load)) == pytest.approx(seconds, rel=1e-14)
    assert float(coastdown.angle_turned(body, start, end_speed=end, **load)) == pytest.approx(exact[1], rel=1e-10)


def test_frustum_has_the_recomputed_volume_and_inertia():
    """R 0.5, r 0.32, h 0.55 m: a cone's radius falls evenly, integrated here with 40 digits."""
    with mpmath.workdps(40):
        radius = lambda z: mpmath.mpf("0.5") - mpmath.mpf("0.18") * z / mpmath.mpf("0.55")  # noqa: E731
        volume = mpmath.pi * mpmath.quad(lambda z: radius(z) ** 2, [0, mpmath.mpf("0.55")])
        over_mass = mpmath.pi / 2 * mpmath.quad(lambda z: radius(z) ** 4, [0, mpmath.mpf("0.55")]) / volume
    profile = [0.0, 0.5, 0.32, 0.0], [0.0, 0.0, 0.55, 0.55]

    assert float(volume) == pytest.approx(0.295121213878, rel=1e-11)
    assert float(over_mass) == pytest.approx(0.0907317096, rel=1e-9)
    assert float(inertia.revolved_volume(*profile)) == pytest.approx(float(volume), rel=1e-14)
    assert float(inertia.revolved_inertia(1.0, profile[0], heights=profile[1])) == pytest.approx(
        float(over_mass), rel=1e-14
    )
    assert float(inertia.frustum_inertia(1.0, 1.0, small_diameter=0.64)) == pytest.approx(float(over_mass), rel=1e-14)


def test_suspensions_have_the_recomputed_inertia():
    bifilar = pendulum.bifilar_inertia(12.0, 0.4, length=1.5, period=1.8)
    trifilar = pendulum.trifilar_inertia(12.0, 0.25, length=1.5, period=1.8)

    assert float(bifilar) == pytest.approx(0.25754666, rel=1e-7)
    assert float(trifilar) == pytest.approx(0.40241667, rel=1e-7)


def test_disk_in_air_has_the_recomputed_torque():
    air = {"radius": 0.6, "viscosity": 1.81e-5}
    number = mpmath.mpf("1.2") * 155 * mpmath.mpf("0.36") / mpmath.mpf("1.81e-5")
    torque = mpmath.mpf("0.146") * number ** mpmath.mpf("-0.2") * mpmath.mpf("0.6") * 155**2 * mpmath.mpf("0.6") ** 5

    assert float(drag.reynolds_number(1.2, 155.0, **air)) == pytest.approx(3.70e6, rel=1e-3)
    assert float(drag.disk_windage_torque(1.2, 155.0, **air)) == pytest.approx(7.949, abs=5e-4)
    assert float(drag.disk_windage_torque(1.2, 155.0, **air)) == pytest.approx(float(torque), rel=1e-13)


def test_perforation_has_the_recomputed_thicknesses():
    energy, diameter = 1000 / FOOT_POUND, mpmath.mpf("0.05") / INCH
    brl = energy ** (mpmath.mpf(2) / 3) / (672 * diameter)
    stanford = mpmath.findroot(
        lambda t: mpmath.mpf(58000) / 46500 * (16000 * t**2 + 1500 * mpmath.mpf(2) * t) - energy / diameter, 0.1
    )
    ours = fragments.stanford_perforation_thickness(1000.0, 0.05, strength=float(58000 * PSI), span=float(8 * INCH))

    assert float(fragments.perforation_thickness(1000.0, 0.05)) == pytest.approx(float(brl * INCH), rel=1e-13)
    assert float(brl * INCH) * 1000.0 == pytest.approx(1.5675, abs=5e-5)
    assert float(ours) == pytest.approx(float(stanford * INCH), rel=1e-12)
    assert float(stanford * INCH) * 1000.0 == pytest.approx(1.8357, abs=5e-5)


def test_coefficient_of_the_perforation_in_si_is_the_one_the_page_prints(request):
    coefficient = float(672 * FOOT_POUND ** (mpmath.mpf(2) / 3) / INCH**2)
    page = (request.config.rootpath / "docs/methods/fragments.md").read_text("utf-8")

    assert coefficient == pytest.approx(1.275957e6, rel=2e-7)
    assert coefficient == pytest.approx(float(re.search(r"T = E\^\(2/3\)/\(([\d.]+)·10⁶ D\)", page)[1]) * 1e6, rel=5e-7)


def test_worst_sector_and_a_third_have_the_recomputed_energies():
    with mpmath.workdps(30):
        half = mpmath.findroot(lambda x: mpmath.tan(x) - 2 * x, mpmath.mpf("1.16"))
        share = lambda angle: angle * (mpmath.sin(angle / 2) / (angle / 2)) ** 2  # noqa: E731
        third = share(2 * mpmath.pi / 3) / share(2 * half)

    assert float(2 * half) == pytest.approx(fragments.WORST_SECTOR_ANGLE, rel=1e-15)
    assert float(2 * half) * 180.0 / np.pi == pytest.approx(133.563, abs=5e-4)
    assert float(third) == pytest.approx(0.988, abs=5e-4)


def test_disks_at_a_hundred_metres_a_second_have_the_recomputed_stresses():
    turning = {"radius": 1.0, "poisson": 0.3}

    assert float(strength.thin_rim_stress(7850.0, 100.0)) / 1e6 == pytest.approx(78.5, rel=1e-12)
    assert float(strength.solid_disk_stress(7850.0, 100.0, **turning)) / 1e6 == pytest.approx(32.381, abs=5e-4)
    assert float(strength.bored_disk_stress(7850.0, 100.0, bore_radius=0.1, **turning)) / 1e6 == pytest.approx(
        64.900, abs=5e-4
    )


def test_page_tells_rightly_how_far_the_simple_stresses_are_off_for_a_bored_disk():
    """A small hole: the rim calculation 21 % high, that of the solid disk 50 % low."""
    bored = float(strength.bored_disk_stress(7850.0, 100.0, radius=1.0, bore_radius=1e-6, poisson=0.3))

    assert float(strength.thin_rim_stress(7850.0, 100.0)) / bored == pytest.approx(1.21, abs=5e-3)
    assert float(strength.solid_disk_stress(7850.0, 100.0, radius=1.0, poisson=0.3)) / bored == pytest.approx(
        0.5, rel=1e-9
    )


@pytest.mark.parametrize(
    ("time", "resolution", "first", "final"), [(0.15, 14, 300, 300), (0.35, 30, 828, 688), (0.26, 14, 520, 500)]
)
def test_curtain_distance_is_worked_out_again_beyond_half_a_metre(time, resolution, first, final):
    """Millimetres: first with 2000 mm/s, then, beyond 500 mm, with 1600 mm/s and not below 500 mm."""
    assert 2000 * time + 8 * (resolution - 14) == pytest.approx(first)
    assert float(reach.curtain_distance(time, resolution / 1000.0)) * 1000.0 == pytest.approx(final)


@pytest.mark.parametrize(
    ("unit", "made_of", "kilogram_square_metres"),
    [
        ("lb ft2", POUND * FOOT**2, 0.0421401101),
        ("lb in2", POUND * INCH**2, 2.926396535e-4),
        ("lbf in s2", POUND * GRAVITY * INCH, 0.1129848290),
        ("slug ft2", POUND * GRAVITY * FOOT, 1.3558179483),
    ],
)
def test_units_of_data_sheets_have_the_recomputed_factors(unit, made_of, kilogram_square_metres):
    assert float(made_of) == pytest.approx(kilogram_square_metres, rel=1e-9)
    assert factor_to_si(unit, "inertia") == pytest.approx(float(made_of), rel=1e-14)
