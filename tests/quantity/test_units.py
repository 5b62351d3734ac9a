"""Units of the trade against published conversion factors."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.quantity.units import KINDS, UNIT_NAMES, UnitRefused, factor_to_si, to_si


@pytest.mark.parametrize(
    ("unit", "kind", "factor"),
    [
        # NIST Special Publication 811 (2008), appendix B.8, read in published transcriptions
        ("in", "length", 0.0254),
        ("ft", "length", 0.3048),
        ("mil", "length", 2.54e-5),
        ("lb", "mass", 0.45359237),
        ("oz", "mass", 0.028349523125),
        ("lbf", "force", 4.4482216152605),
        ("kgf", "force", 9.80665),
        ("lbf ft", "torque", 1.3558179483314004),
        ("ft lbf", "torque", 1.3558179483314004),
        ("in lbf", "torque", 0.1129848290276167),
        ("ozf in", "torque", 4.4482216152605 / 16.0 * 0.0254),
        ("kgf m", "torque", 9.80665),
        ("ft lbf", "energy", 1.3558179483314004),
        ("hp", "power", 745.6998715822702),
        ("psi", "stress", 6894.757293168361),
        ("ft/min", "speed", 5.08e-3),
        ("lb ft2", "wk2", 0.042140110093804806),
        ("lb in2", "wk2", 2.9263965342920005e-4),
        ("lb ft2", "inertia", 0.042140110093804806),
        ("lbf in s2", "inertia", 0.1129848290276167),
        ("slug ft2", "inertia", 1.3558179483314004),
        ("lb/in3", "density", 27679.904710203125),
        # own definitions: one turn is 2 pi radians
        ("rpm", "angular speed", 2.0 * math.pi / 60.0),
        ("RPM", "angular speed", 2.0 * math.pi / 60.0),
        ("1/min", "angular speed", 2.0 * math.pi / 60.0),
        ("Hz", "angular speed", 2.0 * math.pi),
        ("rad/s", "angular speed", 1.0),
        ("deg", "angle", math.pi / 180.0),
        ("kgf m2", "gd2", 1.0),
        ("kg m2", "gd2", 1.0),
        ("Nm", "torque", 1.0),
        ("N·m", "torque", 1.0),
        ("N m s2", "windage", 1.0),
        ("N*m*s^2", "windage", 1.0),
        ("kg·m²", "inertia", 1.0),
        ("J/(kg K)", "specific heat", 1.0),
        ("min", "time", 60.0),
        ("h", "time", 3600.0),
    ],
)
def test_factor_agrees_with_the_published_one(unit, kind, factor):
    assert factor_to_si(unit, kind) == pytest.approx(factor, rel=1e-12)


@pytest.mark.parametrize(
    ("unit", "kind", "reason"),
    [
        ("N m", "energy", "newton metre is written for torque"),
        ("J", "torque", "a unit of energy"),
        ("kgf m2", "inertia", "unit of something else"),
        ("lb ft", "torque", "unit of an unbalance"),
        ("kg/m/s", "density", 'more than one "/"'),
        ("kg/", "density", "nothing stands behind"),
        ("kgg", "mass", "not known here"),
        ("1/s", "angular speed", "turns or radians"),
        ("Hz", "time", "not known here"),
        ("m", "angular speed", "unit of a length"),
        ("kg", "ratio", "takes a plain number"),
        ("m9", "length", "not known here"),
    ],
)
def test_unit_that_does_not_fit_is_refused_with_the_reason(unit, kind, reason):
    with pytest.raises(UnitRefused, match=reason):
        factor_to_si(unit, kind)


def test_refusals_of_the_trade_traps_say_what_to_write():
    with pytest.raises(UnitRefused, match="something else") as gd2:
        factor_to_si("kgf m2", "inertia")
    with pytest.raises(UnitRefused, match="unbalance") as pounds:
        factor_to_si("lb ft", "torque")

    assert "gd2" in gd2.value.hint
    assert "lbf" in pounds.value.hint


@given(st.floats(min_value=-1e6, max_value=1e6), st.sampled_from(sorted(UNIT_NAMES)))
def test_units_go_there_and_back(number, unit):
    for kind in KINDS:
        try:
            factor = factor_to_si(unit, kind)
        except UnitRefused:
            continue
        assert number * factor / factor == pytest.approx(number, rel=1e-12, abs=1e-12)


def test_celsius_is_a_temperature_and_a_difference():
    assert to_si(40.0, "degC", "temperature") == pytest.approx(313.15)
    assert to_si(40.0, "degC", "temperature difference") == pytest.approx(40.0)


def test_every_kind_reads_its_own_example():
    from spinhazard.quantity.notation import parse_stated

    for kind in KINDS.values():
        assert parse_stated(kind.example if kind.name != "ratio" else float(kind.example), kind.name).value > 0.0
