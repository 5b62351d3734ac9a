"""Inertia from a swing on cords or a falling weight, by hand from the figures of docs/methods/inertia.md."""

import math

import pytest

HEAD = 'format = 1\n[machine]\ntag = "T"\n[[shaft]]\nid = "s"\nspeed = "1000 rpm"\n[[shaft.part]]\nid = "p"\n'
G = 9.80665


@pytest.mark.parametrize(
    ("fields", "inertia"),
    [
        # 12 kg on two cords 0.4 m apart, 1.5 m long, 1.8 s: 0.25754666 kg m²; on three on a radius of 0.25 m: 0.40241667
        ('mass = "12 kg"\nbifilar = { distance = "0.4 m", length = "1.5 m", period = "1.8 s" }', 0.25754666),
        ('mass = "12 kg"\ntrifilar = { radius = "0.25 m", length = "1.5 m", period = "1.8 s" }', 0.40241667),
        (
            'falling_weight = { weight = "2 kg", radius = "50 mm", height = "1 m", time = "4 s" }',
            2 * 0.05**2 * (G * 16 / 2 - 1),
        ),
    ],
)
def test_measured_inertia_by_hand(assess_text, fields, inertia):
    result = assess_text(f'{HEAD}shape = "stated"\ntip_radius = "0.3 m"\n{fields}\n')

    assert result.fact("inertia", "part:s/p").best == pytest.approx(inertia, rel=3e-8)


def test_mass_along_a_line_counts_as_mass_times_radius_squared(assess_text):
    result = assess_text(HEAD + 'shape = "linear"\nradius = "0.2 m"\nmass = "6 kg"\n')
    speed = 1000 * 2 * math.pi / 60

    assert result.fact("inertia", "part:s/p").best == pytest.approx(6 * 0.04)
    assert result.fact("kinetic_energy", "part:s/p").best == pytest.approx(0.5 * 6 * (0.2 * speed) ** 2)
    assert result.fact("tip_speed", "part:s/p").best == pytest.approx(0.2 * speed)


def test_fall_quicker_than_free_fall_is_told_and_not_computed(assess_text):
    weight = 'falling_weight = { weight = "2 kg", radius = "50 mm", height = "1 m", time = "0.3 s" }'
    fact = assess_text(f'{HEAD}shape = "stated"\ntip_radius = "0.3 m"\n{weight}\n').fact("inertia", "part:s/p")

    assert fact.value is None
    assert "longer than free fall" in fact.failed


def test_swing_without_mass_names_the_mass(assess_text):
    swing = 'bifilar = { distance = "0.4 m", length = "1.5 m", period = "1.8 s" }'
    result = assess_text(f'{HEAD}shape = "stated"\ntip_radius = "0.3 m"\n{swing}\n')

    assert result.fact("stored_energy").missing == ("shaft.s.part.p.mass",)
