"""The shipped examples: key facts against numbers worked out here by hand, and every finding that should be there.

Nothing below calls spinhazard.mechanics: the formulas are those of any mechanics handbook, written out once more with plain
arithmetic, and the stops are integrals of J dω/T and J ω dω/T.
"""

import math
import re
import tomllib
from pathlib import Path
from typing import get_args

import pytest
from scipy.integrate import quad
from scipy.optimize import brentq

from spinhazard import InputError, Policy, assess, assessment_from_text, read_assessment, read_policy
from spinhazard.quantity.notation import parse_stated
from spinhazard.quantity.stated import SOURCE_WORDS
from spinhazard.quantity.units import ANGULAR_SPEED, KINDS, UNIT_NAMES
from spinhazard.rules.loading import shipped_catalogue
from spinhazard.statement.machine import MachineKind

EXAMPLES = Path(__file__).parents[1] / "examples"
STARTERS = Path(__file__).parents[1] / "spinhazard" / "statement" / "starters"
RPM = 2.0 * math.pi / 60.0
INCH, FOOT, POUND, GRAVITY = 0.0254, 0.3048, 0.45359237, 9.80665
FOOT_POUND = POUND * GRAVITY * FOOT
STEEL, STAINLESS, GREY_IRON = 7850.0, 7950.0, 7200.0
"""Densities of the table of materials [kg/m³]."""

ATTENTION = ("for review", "borderline", "data missing")


def annulus_mass(density, outer, inner, width):
    return density * width * math.pi / 4.0 * (outer**2 - inner**2)


def annulus_inertia(mass, outer, inner=0.0):
    return mass * (outer**2 + inner**2) / 8.0


def integral(function, low, high):
    return quad(function, low, high, epsrel=1e-13, epsabs=0.0, limit=200)[0]


def time_to_slow(inertia, torque, fast, slow):
    """∫ J dω / T."""
    return integral(lambda speed: inertia / torque(speed), slow, fast)


def angle_to_slow(inertia, torque, fast, slow):
    """∫ J ω dω / T."""
    return integral(lambda speed: inertia * speed / torque(speed), slow, fast)


def speed_after(inertia, torque, fast, time):
    """Speed that is left after a time: the root of time_to_slow(…) − time."""
    slow = fast * 0.5
    while time_to_slow(inertia, torque, fast, slow) < time:
        slow *= 0.5
    return brentq(lambda speed: time_to_slow(inertia, torque, fast, speed) - time, slow, fast, xtol=1e-15, rtol=1e-14)


def worst_sector_angle():
    """Twice the root of tan x = 2x between 1 and π/2."""
    return 2.0 * brentq(lambda x: math.sin(x) - 2.0 * x * math.cos(x), 1.0, 1.5, xtol=1e-15)


def sector_centre(outer, inner, angle):
    return 2.0 / 3.0 * (outer**3 - inner**3) / (outer**2 - inner**2) * math.sin(angle / 2.0) / (angle / 2.0)


def perforated(energy, face):
    """T = E^(2/3) / (672 D) in ft lbf and inches."""
    return (energy / FOOT_POUND) ** (2.0 / 3.0) / (672.0 * face / INCH) * INCH


def measured_stop(times):
    mean = sum(times) / len(times)
    deviation = math.sqrt(sum((time - mean) ** 2 for time in times) / (len(times) - 1))
    return max(*times, mean + 3.0 * deviation) if len(times) >= 5 else max(times)


def braked_stop(inertia, drag, speed, standstill, *, delay, build_up, brake):
    """Time, turns and heat of a stop: drive still on, drag alone until the brake is there, then both."""
    at_brake = speed_after(inertia, drag, speed, build_up)
    with_brake = lambda omega: drag(omega) + brake  # noqa: E731  (one line of arithmetic)
    time = delay + build_up + time_to_slow(inertia, with_brake, at_brake, standstill)
    braked = angle_to_slow(inertia, with_brake, at_brake, standstill)
    turns = (speed * delay + angle_to_slow(inertia, drag, speed, at_brake) + braked) / (2.0 * math.pi)
    return time, turns, brake * braked


def fan():
    speed, top, standstill, ratio = 1480 * RPM, 1665 * RPM, 1 * RPM, 2.0
    plate_mass, shroud_mass = annulus_mass(STEEL, 1.2, 0.09, 0.010), annulus_mass(STEEL, 1.2, 0.8, 0.006)
    hub_mass = annulus_mass(GREY_IRON, 0.24, 0.09, 0.12)
    blades = 12 * (2.6 * (0.28**2 + 0.004**2) / 12 + 2.6 * 0.44**2)
    plate, shroud = annulus_inertia(plate_mass, 1.2, 0.09), annulus_inertia(shroud_mass, 1.2, 0.8)
    impeller = plate + shroud + blades + annulus_inertia(hub_mass, 0.24, 0.09)
    motor = 1.6 / 4
    inertia = impeller + motor * ratio**2
    stored = impeller * speed**2 / 2 + motor * (ratio * speed) ** 2 / 2
    air = 14e3 / speed**3
    drag = lambda omega: 6.2 + air * omega**2  # noqa: E731
    coast = time_to_slow(inertia, drag, speed, standstill)
    normal, turns, heat = braked_stop(inertia, drag, speed, standstill, delay=0.4, build_up=0.3, brake=400.0)
    access = 0.06 / 1.6  # at the belt guard, which opens by hand
    blade_energy = 2.6 * (speed * 0.44) ** 2 / 2
    mean_stress = STEEL * top**2 * (0.6**2 + 0.6 * 0.4 + 0.4**2) / 3
    return {
        "mass|part:impeller/backplate": plate_mass,
        "inertia|part:impeller/backplate": plate,
        "inertia|part:impeller/shroud": shroud,
        "inertia|part:impeller/blades": blades,
        "inertia|part:motor/rotor and pulley": motor,
        "shaft_inertia|shaft:impeller": impeller,
        "shaft_speed|shaft:motor": ratio * speed,
        "speed_departure|shaft:motor": 1 - 2905 / 2960,
        "referred_inertia|machine": inertia,
        "stored_energy|machine": stored,
        "stored_energy_at_max_speed|machine": stored * (1665 / 1480) ** 2,
        "energy_growth|machine": (1665 / 1480) ** 2,
        "highest_tip_speed|machine": speed * 0.6,
        "tip_speed|part:impeller/blades": speed * math.hypot(0.44 + 0.14, 0.002),
        "quadratic_drag|machine": air,
        "stopping_time|stop:normal stop": normal,
        "stopping_turns|stop:normal stop": turns,
        "brake_heat|stop:normal stop": heat,
        "brake_temperature_rise|stop:normal stop": heat / (14 * 490),
        "brake_rating_use|stop:normal stop": heat / 250e3,
        "stopping_time|stop:power loss": 288.0,
        "stopping_time|stop:brake failed": 0.4 + coast,
        "measured_over_computed|machine": 288.0 / coast,
        "governing_stopping_time|machine": 288.0,
        "power_loss_ratio|machine": 288.0 / normal,
        "access_time|guard:inspection door": 0.42 / 1.6,
        "required_distance|guard:inspection door": 1.6 * (288.0 + 0.06),
        "access_time|guard:inlet grille": 240.0,
        "opening_limit|guard:inlet grille": 0.012,
        "earliest_access|machine": access,
        "energy_at_access|stop:normal stop": inertia * speed**2 / 2,
        "energy_at_access|stop:power loss": inertia * speed_after(inertia, drag, speed, access) ** 2 / 2,
        "fragment_energy|guard:scroll casing": blade_energy,
        "design_thickness|guard:scroll casing": 1.25 * perforated(blade_energy, 0.040),
        "unbalance_force_after_loss|part:impeller/blades": 2.6 * 0.44 * speed**2,
        "burst_speed_margin|part:impeller/shroud": math.sqrt(0.75 * 360e6 / mean_stress),
        "yield_share|part:impeller/backplate": STEEL * top**2 / 4 * (3.3 * 0.6**2 + 0.7 * 0.045**2) / 235e6,
        "required_wait|lockout": 1.2 * 288.0,
        "procedure_age|lockout": 410 * 86400.0,
    }


def grinder():
    speed, top, standstill = 1725 * RPM, 1800 * RPM, 1 * RPM
    radius, bore = 7 * INCH, 0.75 * INCH
    left = annulus_inertia(24 * POUND, 2 * radius, 2 * bore)
    right = annulus_inertia(18.25 * POUND, 2 * radius, 2 * bore)
    rotor = 1.1 * POUND * FOOT**2
    inertia = left + right + rotor
    friction, air = 4.4 * POUND * GRAVITY * INCH, 8.0e-5 * POUND * GRAVITY * INCH
    drag = lambda omega: friction + air * omega**2  # noqa: E731
    coast = time_to_slow(inertia, drag, speed, standstill)
    measured = measured_stop([105.0, 108.0, 106.0, 110.0, 103.0, 107.0])
    angle = worst_sector_angle()
    centre, piece = sector_centre(radius, bore, angle), 24 * POUND * angle / (2 * math.pi)
    piece_energy = piece * (speed * centre) ** 2 / 2
    return {
        "inertia|part:spindle/left wheel": left,
        "inertia|part:spindle/right wheel": right,
        "inertia|part:spindle/rotor and flanges": rotor,
        "shaft_inertia|shaft:spindle": inertia,
        "stored_energy|machine": inertia * speed**2 / 2,
        "stored_energy_at_max_speed|machine": inertia * top**2 / 2,
        "tip_speed|part:spindle/left wheel": speed * radius,
        "tip_speed_at_max_speed|part:spindle/right wheel": top * radius,
        "marked_speed|part:spindle/right wheel": 1770 * RPM,
        "measured_stopping_time|machine": measured,
        "measured_over_computed|machine": measured / coast,
        "stopping_time|stop:normal stop": max(measured, 0.1 + coast),
        "stopping_turns|stop:power loss": angle_to_slow(inertia, drag, speed, standstill) / (2 * math.pi),
        "governing_stopping_time|machine": measured,
        "part_fragment_radius|part:spindle/left wheel": centre,
        "fragment_speed|guard:left hood": speed * centre,
        "fragment_energy|guard:left hood": piece_energy,
        "design_thickness|guard:left hood": 1.25 * perforated(piece_energy, 2 * INCH),
        "unbalance_force_after_loss|part:spindle/left wheel": piece * centre * speed**2,
        "opening_size|guard:dust outlet": 0.75 * INCH,
        "opening_limit|guard:dust outlet": 0.625 * INCH,
        "exposed_angle|guard:right hood": math.radians(95),
        "exposed_angle_limit|guard:right hood": math.radians(90),
        "access_time|guard:dust outlet": 60.0,
        "energy_at_access|stop:power loss": inertia * speed_after(inertia, drag, speed, 60.0) ** 2 / 2,
        "required_wait|lockout": 1.2 * measured,
    }


def press():
    speed, standstill = 350 * RPM, 1 * RPM
    rim_mass, web_mass = annulus_mass(GREY_IRON, 1.0, 0.64, 0.15), annulus_mass(GREY_IRON, 0.64, 0.12, 0.04)
    rim, web = annulus_inertia(rim_mass, 1.0, 0.64), annulus_inertia(web_mass, 0.64, 0.12)
    slide = 700 * 0.06**2
    inertia = rim + web + (24 + slide) * 0.2**2 + 5.2 * 4.1**2
    drag = lambda omega: 28 + 0.6 * omega  # noqa: E731
    # a + bω alone has a closed form: t = J/b ln[(a + bω₀)/(a + bω₁)]
    coast = inertia / 0.6 * math.log((28 + 0.6 * speed) / (28 + 0.6 * standstill))
    normal, turns, heat = braked_stop(inertia, drag, speed, standstill, delay=0.12, build_up=0.08, brake=2200.0)
    governing = 0.12 + coast
    third = 2 * math.pi / 3
    centre = sector_centre(0.5, 0.32, third)
    piece_energy = rim_mass / 3 * (speed * centre) ** 2 / 2
    access = 0.08 / 1.6  # at the flywheel cover
    after_access = (28 + 0.6 * speed) * math.exp(-0.6 * access / inertia)
    return {
        "mass|part:flywheel/rim": rim_mass,
        "inertia|part:flywheel/rim": rim,
        "inertia|part:flywheel/web": web,
        "inertia|part:crankshaft/slide and upper die": slide,
        "inertia_ratio|part:motor/rotor": 5.2 / (110 * 0.125**2),
        "shaft_speed|shaft:crankshaft": 0.2 * speed,
        "shaft_speed|shaft:motor": 4.1 * speed,
        "referred_inertia|machine": inertia,
        "stored_energy|machine": inertia * speed**2 / 2,
        "highest_tip_speed|machine": 4.1 * speed * 0.125,
        "stopping_time|stop:normal stop": normal,
        "stopping_turns|stop:normal stop": turns,
        "brake_heat|stop:normal stop": heat,
        "brake_temperature_rise|stop:normal stop": heat / (9 * 490),
        "stopping_time|stop:power loss": coast,
        "stopping_turns|stop:power loss": angle_to_slow(inertia, drag, speed, standstill) / (2 * math.pi),
        "governing_stopping_time|machine": governing,
        "power_loss_ratio|machine": coast / normal,
        "access_time|guard:light curtain": 0.6 / 1.6,
        "required_distance|guard:light curtain": 1.6 * (governing + 0.025),
        "required_distance|guard:two-hand control": 1.6 * (governing + 0.030) + 0.25,
        "energy_at_access|stop:power loss": inertia * ((after_access - 28) / 0.6) ** 2 / 2,
        "part_fragment_mass|part:flywheel/rim": rim_mass / 3,
        "fragment_energy|guard:flywheel cover": piece_energy,
        "design_thickness|guard:flywheel cover": 1.25 * perforated(piece_energy, 0.15),
        "unbalance_torque|shaft:crankshaft": 14 * GRAVITY,
        "dry_friction_at_shaft|shaft:crankshaft": 28 / 0.2,
        "required_wait|lockout": 1.2 * governing,
    }


def revolved(density, edges):
    """Mass and inertia of a body of revolution from slices: edges are (z₁, z₂, outer radius of z, inner radius of z)."""
    mass = inertia = 0.0
    for low, high, outer, inner in edges:
        mass += density * math.pi * integral(lambda z, o=outer, i=inner: o(z) ** 2 - i(z) ** 2, low, high)
        inertia += density * math.pi / 2 * integral(lambda z, o=outer, i=inner: o(z) ** 4 - i(z) ** 4, low, high)
    return mass, inertia


def centrifuge():
    speed, top, standstill, ratio = 1000 * RPM, 1150 * RPM, 0.5 * RPM, 1.45
    shell = annulus_inertia(185, 1.27, 1.25)
    floor_mass, floor = revolved(STAINLESS, [
        (0.0, 0.014, lambda _z: 0.625, lambda _z: 0.060),
        (0.014, 0.180, lambda z: 0.150 - 0.030 * (z - 0.014) / 0.166, lambda _z: 0.060),
    ])  # fmt: skip
    cake = annulus_inertia(420, 1.25, 0.95)
    basket, motor = shell + floor + cake, 4.4 / 4
    inertia = basket + motor * ratio**2
    drag = lambda omega: 12 + 0.003 * omega**2  # noqa: E731
    coast = time_to_slow(inertia, drag, speed, standstill)
    normal, turns, heat = braked_stop(inertia, drag, speed, standstill, delay=0.5, build_up=1.0, brake=300.0)
    measured = measured_stop([80.0, 79.0, 81.0, 80.0, 82.0, 80.0, 81.0, 79.0, 80.0, 81.0])
    piece_energy = 20 * (speed * 0.625) ** 2 / 2
    mean_stress = STAINLESS * top**2 * (0.635**2 + 0.635 * 0.625 + 0.625**2) / 3
    return {
        "inertia|part:basket/shell": shell,
        "mass|part:basket/floor and hub": floor_mass,
        "inertia|part:basket/floor and hub": floor,
        "inertia|part:basket/wet cake": cake,
        "inertia|part:motor/rotor and pulley": motor,
        "referred_inertia|machine": inertia,
        "stored_energy|machine": inertia * speed**2 / 2,
        "energy_growth|machine": 1.15**2,
        "estimated_energy_share|machine": cake / inertia,
        "tip_speed|part:basket/shell": speed * 0.635,
        "measured_stopping_time|machine": measured,
        "measured_over_computed|machine": measured / normal,
        "stopping_time|stop:normal stop": max(normal, measured),
        "stopping_turns|stop:normal stop": turns,
        "brake_heat|stop:normal stop": heat,
        "brake_rating_use|stop:normal stop": heat / 2.5e6,
        "stopping_time|stop:power loss": coast,
        "governing_stopping_time|machine": 0.5 + coast,
        "stop_variation|machine": (0.5 + coast) / max(normal, measured),
        "access_time|guard:lid": 120.0,
        "required_distance|guard:lid": 1.6 * (0.5 + coast + 0.1),
        "energy_at_access|stop:power loss": inertia * speed_after(inertia, drag, speed, 119.9) ** 2 / 2,
        "fragment_speed|guard:lid": speed * 0.625,
        "fragment_energy|guard:lid": piece_energy,
        "perforation_thickness|guard:lid": perforated(piece_energy, 0.12),
        "unbalance_force_after_loss|part:basket/shell": 20 * 0.625 * speed**2,
        "burst_speed_margin|part:basket/shell": math.sqrt(0.75 * 500e6 / mean_stress),
        "required_wait|lockout": 1.2 * (0.5 + coast),
    }


BY_HAND = {"extraction-fan": fan, "pedestal-grinder": grinder, "flywheel-press": press, "basket-centrifuge": centrifuge}


def assessed(name, **options):
    policy = read_policy(EXAMPLES / "policy-us.toml")[0] if name == "pedestal-grinder" else None
    return assess(read_assessment(EXAMPLES / f"{name}.toml"), policy=policy, **options)


@pytest.mark.parametrize("name", BY_HAND)
def test_the_facts_of_an_example_equal_those_worked_out_by_hand(name):
    result = assessed(name, best_estimate=True)

    for entry, by_hand in BY_HAND[name]().items():
        key, _, subject = entry.partition("|")
        fact = result.fact(key, subject)
        assert fact is not None, entry
        assert fact.best == pytest.approx(by_hand, rel=1e-9, abs=0.0), entry


EXPECTED = {
    "extraction-fan": {
        "for review": {
            "energy-above-review-level": ["machine"],
            "energy-growth-at-max-speed": ["machine"],
            "brake-lost-with-power": ["machine"],
            "brake-overloaded": ["stop:normal stop"],
            "few-stop-measurements": ["machine"],
            "measurement-out-of-date": ["machine"],
            "opens-before-standstill": ["guard:inspection door"],
            "fixed-guard-off-before-standstill": ["guard:inlet grille", "guard:belt guard"],
            "energy-left-at-access": ["stop:normal stop", "stop:power loss", "stop:brake failed"],
            "opening-too-large": ["guard:inlet grille"],
            "fan-opening-over-half-inch": ["guard:inlet grille"],
            "fixed-guard-opens-by-hand": ["guard:belt guard"],
            "guard-thinner-than-perforation": ["guard:scroll casing"],
            "wait-shorter-than-stop": ["lockout"],
            "back-drive-not-blocked": ["lockout"],
            "procedure-review-overdue": ["lockout"],
            "procedure-older-than-change": ["lockout"],
            "value-without-source": ["machine"],
            "instrument-out-of-calibration": ["machine"],
        },
        "borderline": {
            "unbalance-after-loss": ["part:impeller/blades"],
        },
        "data missing": {
            "burst-margin-low": ["part:impeller/hub"],
            "rim-stress-high": ["part:impeller/hub"],
        },
    },
    "pedestal-grinder": {
        "for review": {
            "energy-above-review-level": ["machine"],
            "above-marked-speed": ["part:spindle/right wheel"],
            "fixed-guard-off-before-standstill": ["guard:dust outlet"],
            "energy-left-at-access": ["stop:normal stop", "stop:power loss"],
            "opening-too-large": ["guard:dust outlet"],
            "work-rest-gap": ["guard:right hood"],
            "tongue-gap": ["guard:right hood"],
            "hood-angle": ["guard:right hood"],
            "method-out-of-range": ["guard:left hood"],
            "standstill-not-verified": ["lockout"],
        },
        "borderline": {
            "fixed-guard-off-before-standstill": ["guard:left hood", "guard:right hood"],
        },
        "data missing": {
            "guard-thinner-than-perforation": ["guard:right hood"],
            "guard-material-without-method": ["guard:right hood"],
            "method-out-of-range": ["guard:right hood"],
            "unbalance-after-loss": ["part:spindle/left wheel", "part:spindle/right wheel"],
            "procedure-review-overdue": ["lockout"],
            "procedure-older-than-change": ["lockout"],
        },
    },
    "flywheel-press": {
        "for review": {
            "energy-above-review-level": ["machine"],
            "inertia-impossible": ["part:motor/rotor"],
            "max-speed-not-stated": ["shaft:flywheel", "shaft:crankshaft", "shaft:motor"],
            "brake-lost-with-power": ["machine"],
            "drag-from-estimates": ["machine"],
            "curtain-too-close": ["guard:light curtain"],
            "two-hand-too-close": ["guard:two-hand control"],
            "fixed-guard-off-before-standstill": ["guard:flywheel cover", "guard:belt guard"],
            "energy-left-at-access": ["stop:normal stop", "stop:power loss", "stop:brake failed"],
            "hazardous-fragment-unenclosed": ["part:flywheel/rim"],
            "wait-shorter-than-stop": ["lockout"],
            "back-drive-not-blocked": ["lockout"],
        },
        "borderline": {
            "swings-back": ["shaft:crankshaft"],
        },
        "data missing": {
            "fixed-guard-opens-by-hand": ["guard:flywheel cover"],
            "energy-growth-at-max-speed": ["machine"],
            "tip-speed-above-guide": ["part:flywheel/rim", "part:flywheel/web"],
            "burst-margin-low": ["part:flywheel/rim", "part:flywheel/web"],
        },
    },
    "basket-centrifuge": {
        "for review": {
            "energy-above-review-level": ["machine"],
            "energy-growth-at-max-speed": ["machine"],
            "energy-rests-on-estimates": ["machine"],
            "centrifuge-energy-in-standard-scope": ["machine"],
            "above-marked-speed": ["part:basket/shell"],
            "brake-lost-with-power": ["machine"],
            "coast-not-measured": ["machine"],
            "lock-timer-too-short": ["guard:lid"],
            "lock-timer-margin-small": ["guard:lid"],
            "timer-where-stop-varies": ["guard:lid"],
            "energy-left-at-access": ["stop:power loss", "stop:brake failed"],
            "fixed-guard-off-before-standstill": ["guard:sight window", "guard:belt guard"],
            "method-out-of-range": ["guard:lid"],
            "guard-material-without-method": ["guard:sight window"],
            "unbalance-after-loss": ["part:basket/shell"],
        },
        "borderline": {
            "guard-thinner-than-perforation": ["guard:lid"],
        },
        "data missing": {
            "standstill-not-verified": ["lockout"],
            "brake-temperature-rise-high": ["stop:normal stop"],
        },
    },
}
"""What must be found, outcome by outcome: rule, and what it is about. The same list stands in NAME.expected.md with the reason."""


def expected(name, outcome):
    return {(rule, subject) for rule, subjects in EXPECTED[name][outcome].items() for subject in subjects}


def found(result, outcome):
    return {(finding.rule.key, finding.subject) for finding in result.findings if finding.outcome == outcome}


def written(name):
    """Rows of the table of findings in NAME.expected.md."""
    text = (EXAMPLES / f"{name}.expected.md").read_text("utf-8")
    rows = re.findall(r"^\| ([a-z ]+) \| ([a-z-]+) \| ([^|]+) \| ([^|]+) \|$", text, re.MULTILINE)
    return {
        outcome: {(rule, about.strip()) for word, rule, about, _ in rows if word == outcome} for outcome in ATTENTION
    }


@pytest.fixture(scope="module")
def full():
    """Every example once, with the stated spreads."""
    return {name: assessed(name) for name in BY_HAND}


@pytest.mark.parametrize("outcome", ATTENTION)
@pytest.mark.parametrize("name", BY_HAND)
def test_the_findings_of_an_example_are_the_expected_ones(full, name, outcome):
    assert found(full[name], outcome) == expected(name, outcome)


@pytest.mark.parametrize("name", BY_HAND)
def test_the_expected_findings_are_those_written_beside_the_example(name):
    assert written(name) == {outcome: expected(name, outcome) for outcome in ATTENTION}


@pytest.mark.parametrize("name", BY_HAND)
def test_the_best_estimate_alone_has_the_same_reviews_and_gaps_and_nothing_borderline(name):
    result = assessed(name, best_estimate=True)

    assert found(result, "for review") == expected(name, "for review")
    assert found(result, "data missing") == expected(name, "data missing")
    assert found(result, "borderline") == set()
    assert expected(name, "borderline") <= found(result, "not flagged")


@pytest.mark.parametrize("name", BY_HAND)
def test_every_example_says_that_its_plant_is_invented(name):
    result = assessed(name, best_estimate=True)

    assert result.file.machine.site.endswith("(invented)")
    assert "invented" in result.reading.text.split("\n\n")[0]


def test_together_the_examples_reach_most_of_the_catalogue(full):
    decided = {
        finding.rule.key
        for result in full.values()
        for finding in result.findings
        if finding.outcome != "not applicable"
    }
    every = {finding.rule.key for finding in full["extraction-fan"].findings}

    assert len(decided) >= 0.75 * len(every), sorted(every - decided)


def test_the_slot_of_the_grinder_is_too_wide_by_the_us_table_and_not_by_the_iso_one(full):
    iso = assess(read_assessment(EXAMPLES / "pedestal-grinder.toml"), best_estimate=True)

    assert ("opening-too-large", "guard:dust outlet") in found(full["pedestal-grinder"], "for review")
    assert ("opening-too-large", "guard:dust outlet") in found(iso, "not flagged")


OPTIONAL = re.compile(r"^(\s*)# (\[\[[a-z.]+\]\]|[a-z_0-9]+ = .*)$", re.MULTILINE)
"""A field or table of a starter that is commented out."""


def test_there_is_a_starter_for_every_kind_of_machine_and_no_other():
    assert {path.stem for path in STARTERS.glob("*.toml")} == set(get_args(MachineKind))


@pytest.mark.parametrize("kind", get_args(MachineKind))
def test_a_starter_assesses_as_it_stands_and_is_of_its_kind(kind):
    text = (STARTERS / f"{kind}.toml").read_text("utf-8")

    result = assess(assessment_from_text(text, name=f"{kind}.toml"), best_estimate=True)

    assert result.file.machine.kind == kind
    assert "Every value here is invented; replace it." in " ".join(text.split("\n\n")[0].replace("#", "").split())
    assert math.isfinite(result.fact("stored_energy").best)
    assert math.isfinite(result.fact("governing_stopping_time").best)
    assert not [fact for fact in result.facts if fact.failed]


@pytest.mark.parametrize("kind", get_args(MachineKind))
def test_a_starter_with_every_optional_field_switched_on_is_read_too(kind):
    text = (STARTERS / f"{kind}.toml").read_text("utf-8")
    switched_on, count = OPTIONAL.subn(r"\1\2", text)

    assert count >= 4
    assert assess(assessment_from_text(switched_on, name=f"{kind}.toml"), best_estimate=True).file.machine.kind == kind


@pytest.mark.parametrize("kind", get_args(MachineKind))
def test_the_tables_of_a_starter_come_in_the_same_order(kind):
    tables = re.findall(
        r"^\s*(?:# )?\[\[?([a-z.]+)\]\]?$", (STARTERS / f"{kind}.toml").read_text("utf-8"), re.MULTILINE
    )
    order = [
        "machine",
        "assessment",
        "shaft",
        "shaft.part",
        "stopping",
        "stopping.brake",
        "guard",
        "guard.opening",
        "lockout",
    ]

    places = [order.index(table.replace("shaft.part", "shaft").replace("guard.opening", "guard")) for table in tables]

    assert places == sorted(places)
    assert {"machine", "assessment", "shaft", "stopping", "guard", "lockout"} <= set(tables)


@pytest.mark.parametrize("kind", get_args(MachineKind))
def test_the_stops_stated_in_a_starter_agree_with_its_drag(kind):
    text = (STARTERS / f"{kind}.toml").read_text("utf-8")

    ratio = assess(assessment_from_text(text, name=f"{kind}.toml"), best_estimate=True).fact("measured_over_computed")

    assert ratio.best == pytest.approx(1.0, abs=0.1)


HOW_TO = (Path(__file__).parents[1] / "docs" / "how-to.md").read_text("utf-8")


def unit_rows():
    section = HOW_TO.split("## 11. Units")[1].split("## 12.")[0]
    for kind, accepted, written_as in re.findall(
        r"^\| ([a-z0-9 ]+) \| ([^|]*`[^|]*) \| ([^|]+) \|$", section, re.MULTILINE
    ):
        yield kind, re.findall(r"`([^`]+)`", accepted), re.findall(r'`"?([^"`]+)"?`', written_as)


def test_the_how_to_lists_units_that_are_read_and_every_kind_a_field_can_have():
    rows = {kind: units + amounts for kind, units, amounts in unit_rows()}

    for kind, units, amounts in unit_rows():
        for unit in units:
            assert parse_stated(f"2 {unit}", kind).value > 0.0, unit
        for amount in amounts:
            assert parse_stated(amount, kind).value > 0.0, amount
    assert set(rows) == set(KINDS) - {"area", "temperature"}


def test_the_how_to_names_every_single_unit_that_is_accepted():
    named = " ".join(f"`{unit}`" for _, units, _ in unit_rows() for unit in units)
    atoms = set(re.findall(r"[A-Za-zµμ°\"]+", named))

    assert set(UNIT_NAMES) - atoms - {"μm", "l"} == set()
    assert {unit for unit in ANGULAR_SPEED if f"`{unit}`" not in named} == set()


def test_the_message_in_the_how_to_is_what_the_program_says():
    lines = [
        "format = 1",
        "[machine]",
        'tag = "DX-12"',
        *[""] * 6,
        "[[shaft]]",
        'id = "spindle"',
        'speed = "1,480 rpm"',
    ]
    text = "\n".join([*lines, "[[shaft.part]]", 'shape = "point"', 'radius = "1 m"', 'mass = "1 kg"'])

    with pytest.raises(InputError, match="a comma between digits is not read") as refusal:
        assessment_from_text(text, name="dx-12.toml")

    assert f"```\n{refusal.value}\n```" in HOW_TO


def test_every_command_in_the_how_to_names_files_and_rules_that_exist():
    keys = set(re.findall(r"^spinhazard rules ([a-z-]+)", HOW_TO, re.MULTILINE))

    assert keys
    assert all(shipped_catalogue().rule(key) for key in keys)
    policy = HOW_TO.split("## 9.")[1].split("```toml\n")[1].split("```")[0]
    assert Policy.model_validate(tomllib.loads(policy)).figures == "us"


def test_the_sources_and_default_spreads_in_the_how_to_are_those_of_the_program():
    shipped = Policy().spreads
    rows = re.findall(
        r"^\| (measured|nameplate|drawing|calculated|estimated) \| ([^|]+) \| ± (\d+) % \|$", HOW_TO, re.MULTILINE
    )

    assert {word: kind for kind, words, _ in rows for word in words.split(", ")} == SOURCE_WORDS
    assert {kind: float(share) / 100 for kind, _, share in rows} == {
        kind: getattr(shipped, kind) for kind, _, _ in rows
    }
