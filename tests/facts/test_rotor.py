"""Mass, inertia, speed and energy of parts, shafts and the machine, by hand."""

import math

import pytest

RPM = 2 * math.pi / 60

PART = """
format = 1
[machine]
tag = "T"
[[shaft]]
id = "s"
speed = "1000 rpm"
max_speed = "1100 rpm"
[[shaft.part]]
id = "p"
"""


@pytest.mark.parametrize(
    ("fields", "mass", "inertia", "tip"),
    [
        ('shape = "disk"\ndiameter = "1 m"\nthickness = "20 mm"\ndensity = "8000 kg/m3"', 8000 * math.pi / 4 * 0.02, None, 0.5),
        ('shape = "disk"\ndiameter = "1 m"\nbore = "0.2 m"\nmass = "10 kg"', 10.0, 10 * (0.25 + 0.01) / 2, 0.5),
        ('shape = "ring"\nouter_diameter = "1 m"\ninner_diameter = "0.8 m"\nmass = "10 kg"', 10.0, 10 * (0.25 + 0.16) / 2, 0.5),
        ('shape = "sphere"\ndiameter = "0.2 m"\nmass = "10 kg"\noffset = "0.5 m"', 10.0, 0.4 * 10 * 0.01 + 10 * 0.25, 0.6),
        ('shape = "rod"\nlength = "0.6 m"\ndirection = "radial"\noffset = "0.3 m"\nmass = "2 kg"', 2.0, 2 * 0.36 / 3, 0.6),
        ('shape = "rod"\nlength = "0.6 m"\ndirection = "tangential"\noffset = "0.4 m"\nmass = "2 kg"', 2.0, 2 * 0.36 / 12 + 2 * 0.16, 0.5),
        ('shape = "rod"\nlength = "0.6 m"\ndirection = "axial"\noffset = "0.4 m"\nmass = "2 kg"', 2.0, 2 * 0.16, 0.4),
        (
            'shape = "plate"\ncount = 12\noffset = "440 mm"\nradial = "280 mm"\naxial = "300 mm"\ntangential = "4 mm"\nmass = "2.6 kg"',
            31.2, 12 * 2.6 * ((0.28**2 + 0.004**2) / 12 + 0.44**2), math.hypot(0.58, 0.002),
        ),
        ('shape = "cone"\nlarge_diameter = "1 m"\nsmall_diameter = "0 m"\nmass = "10 kg"', 10.0, 0.3 * 10 * 0.25, 0.5),
        ('shape = "torus"\nring_diameter = "1 m"\nsection_diameter = "0.2 m"\nmass = "10 kg"', 10.0, 10 * (0.25 + 0.75 * 0.01), 0.6),
        ('shape = "point"\nradius = "0.5 m"\ncount = 3\nmass = "2 kg"', 6.0, 6 * 0.25, 0.5),
        ('shape = "stated"\ngd2 = "7.6 kgf m2"\nmass = "20 kg"\ntip_radius = "0.4 m"', 20.0, 1.9, 0.4),
        ('shape = "stated"\nwk2 = "45 lb ft2"\nmass = "20 kg"\ntip_radius = "0.4 m"', 20.0, 45 * 0.042140110093804806, 0.4),
        ('shape = "stated"\ninertia = "1.9 kg m2"\nmass = "20 kg"\ntip_radius = "0.4 m"', 20.0, 1.9, 0.4),
        ('shape = "profile"\nunit = "mm"\npoints = [[0, 0], [500, 0], [500, 100], [0, 100]]\nmass = "10 kg"', 10.0, 10 * 0.25 / 2, 0.5),
    ],
    ids=lambda value: value.split('"')[1] if isinstance(value, str) else "",
)  # fmt: skip
def test_each_shape_by_the_handbook(assess_text, fields, mass, inertia, tip):
    result = assess_text(PART + fields)
    inertia = mass * 0.25 / 2 if inertia is None else inertia
    speed = 1000 * RPM

    assert result.fact("mass", "part:s/p").best == pytest.approx(mass, rel=1e-12)
    assert result.fact("inertia", "part:s/p").best == pytest.approx(inertia, rel=1e-12)
    assert result.fact("tip_radius", "part:s/p").best == pytest.approx(tip, rel=1e-12)
    assert result.fact("tip_speed", "part:s/p").best == pytest.approx(tip * speed, rel=1e-12)
    assert result.fact("tip_speed_at_max_speed", "part:s/p").best == pytest.approx(1.1 * tip * speed, rel=1e-12)
    assert result.fact("kinetic_energy", "part:s/p").best == pytest.approx(0.5 * inertia * speed**2, rel=1e-12)
    assert result.fact("stored_energy").best == pytest.approx(0.5 * inertia * speed**2, rel=1e-12)


def test_driven_inertia_counts_with_the_ratio_squared(fan, assess_text):
    result = assess_text(fan)
    speed = 1480 * RPM

    assert result.fact("shaft_speed", "shaft:motor").best == pytest.approx(1.5 * speed)
    assert result.fact("referred_inertia").best == pytest.approx(22 + 2 * 2.25)
    assert result.fact("stored_energy").best == pytest.approx(0.5 * (22 + 2 * 2.25) * speed**2)
    assert result.fact("stored_energy_at_max_speed").best == pytest.approx(1.21 * result.fact("stored_energy").best)
    assert result.fact("angular_momentum").best == pytest.approx(22 * speed + 2 * 1.5 * speed)


def test_chain_of_three_shafts_is_followed_both_ways(fan, assess_text):
    third = '\n[[shaft]]\nid = "pump"\ndriven_by = "motor"\nratio = 0.5\n[[shaft.part]]\nid = "r"\nshape = "stated"\ninertia = "4 kg m2"\n'
    text = fan.replace("\n[stopping]", third + "\n[stopping]")

    on_impeller = assess_text(text)
    on_pump = assess_text(text.replace('shaft = "impeller"', 'shaft = "pump"'))

    assert on_impeller.fact("referred_inertia").best == pytest.approx(22 + 2 * 1.5**2 + 4 * 0.75**2)
    assert on_pump.fact("referred_inertia").best == pytest.approx((22 + 2 * 1.5**2 + 4 * 0.75**2) / 0.75**2)


def test_part_without_mass_and_material_names_what_would_settle_it(assess_text):
    result = assess_text(PART + 'shape = "disk"\ndiameter = "1 m"')

    assert result.fact("mass", "part:s/p").missing == ("shaft.s.part.p.mass", "shaft.s.part.p.material")
    assert result.fact("stored_energy").missing == ("shaft.s.part.p.mass", "shaft.s.part.p.material")
    assert result.fact("tip_speed", "part:s/p").known


def test_mass_and_density_that_disagree_are_refused(assess_text):
    from spinhazard import InputError

    with pytest.raises(InputError, match=r"line 15, shaft\.s\.part\.p\.density: mass and density do not fit"):
        assess_text(
            PART + 'shape = "disk"\ndiameter = "1 m"\nthickness = "20 mm"\nmass = "10 kg"\ndensity = "8000 kg/m3"'
        )


def test_mass_and_density_that_agree_within_their_spreads_are_taken(assess_text):
    result = assess_text(
        PART
        + 'shape = "disk"\ndiameter = "1 m"\nthickness = "20 mm"\nmass = "125 kg ± 2 %"\ndensity = "8000 kg/m3 ± 2 %"'
    )

    assert result.fact("mass", "part:s/p").best == 125.0


def test_missing_highest_speed_leaves_the_rest(fan, assess_text):
    result = assess_text(fan.replace('max_speed = "1628 rpm"\n', ""))

    assert result.fact("stored_energy_at_max_speed").missing == ("shaft.impeller.max_speed",)
    assert result.fact("stored_energy").known
