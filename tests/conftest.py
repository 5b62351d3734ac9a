"""Fixtures and the fixed profile of the property tests."""

import os

import pytest
from hypothesis import HealthCheck, settings

settings.register_profile(
    "fixed", derandomize=True, deadline=None, max_examples=60, suppress_health_check=[HealthCheck.too_slow]
)
settings.register_profile("wide", deadline=None, max_examples=2000)
settings.load_profile(os.environ.get("HYPOTHESIS_PROFILE", "fixed"))

FAN = """
format = 1

[machine]
tag = "T-1"
kind = "fan"

[assessment]
assessor = "R. Example"
date = 2026-11-20

[[shaft]]
id = "impeller"
speed = "1480 rpm"
max_speed = "1628 rpm"
  [[shaft.part]]
  id = "wheel"
  shape = "stated"
  inertia = "22 kg m2"
  mass = "120 kg"
  tip_radius = "0.6 m"

[[shaft]]
id = "motor"
driven_by = "impeller"
ratio = 1.5
  [[shaft.part]]
  id = "rotor"
  shape = "stated"
  inertia = "2 kg m2"
  mass = "90 kg"
  tip_radius = "0.14 m"

[stopping]
shaft = "impeller"
friction_torque = "3.1 N m"
viscous = "0.002 N m s"
windage = "0.0041 N m s2"
control_delay = "0.4 s"
  [[stopping.brake]]
  id = "disc"
  torque = "180 N m"
  build_up = "0.2 s"
  works_without_power = false
  heat_capacity_mass = "14 kg"
  energy_rating = "120 kJ"
  [[stopping.brake]]
  id = "spring"
  torque = "40 N m"
  build_up = "0.5 s"
  works_without_power = true
  heat_capacity_mass = "10 kg"
  energy_rating = "500 kJ"

[[guard]]
id = "door"
covers = ["impeller"]
kind = "interlocked"
distance = "420 mm"
fastening = "tool"
opening_time = "3 s"
lock_release = "none"
response_time = "60 ms"

[lockout]
wait = "3 min"
verification = "seen at standstill"
blocked = false
back_drive = ["draught"]
procedure_reviewed = 2026-01-12
"""


@pytest.fixture
def fan():
    """Text of a fan with a coupled motor and two brakes; invented."""
    return FAN


@pytest.fixture
def assess_text():
    """Assess a text, best estimate and without rules unless said otherwise."""
    from spinhazard import assess, assessment_from_text
    from spinhazard.rules.loading import Catalogue

    no_rules = Catalogue((), "none")

    def run(text, *, best_estimate=True, catalogue=no_rules, **options):
        return assess(
            assessment_from_text(text, name="test.toml"), best_estimate=best_estimate, catalogue=catalogue, **options
        )

    return run
