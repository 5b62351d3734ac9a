"""The record of a formula: attached once, found again, printed with symbols and with numbers."""

import importlib
import pkgutil

import numpy as np
import pytest
import sympy

from spinhazard import mechanics
from spinhazard.mechanics import energy, inertia
from spinhazard.mechanics.formula import REGISTRY, Formula, printed, record, with_numbers

for found in pkgutil.iter_modules(mechanics.__path__):
    importlib.import_module(f"spinhazard.mechanics.{found.name}")  # declaring fills the registry

CLOSED = sorted(name for name, one in REGISTRY.items() if " = " in one.equation)


def test_record_is_that_of_the_registry():
    assert record(inertia.disk_inertia) is REGISTRY["inertia.disk_inertia"]
    assert record(inertia.disk_inertia).unit == "kg m²"


def test_function_without_a_record_has_none():
    with pytest.raises(AttributeError, match="formula"):
        record(printed)


def test_decorated_function_is_still_the_function():
    assert energy.tip_speed.__name__ == "tip_speed"
    assert float(energy.tip_speed(10.0, 2.0)) == 20.0


def test_record_cannot_be_changed_by_accident():
    with pytest.raises(AttributeError, match="cannot assign"):
        record(energy.tip_speed).unit = "ft/s"


@pytest.mark.parametrize(
    ("plain", "shown"),
    [
        ("J_r = J*i**2", "J_r = J i²"),
        ("J = J_0 + m*h**2", "J = J₀ + m h²"),
        ("c = P/omega**3", "c = P/ω³"),
        ("M = mu*P*d/2", "M = ½ µ P d"),
        ("R = h + D/2", "R = h + D/2"),
        ("t = Max(S - C, 0)/K", "t = Max(S − C, 0)/K"),
        ("x = -a", "x = −a"),
        ("x = a**(-1/2)", "x = a^(−1/2)"),
        ("V = pi**2*D*d**2/4", "V = π² D d²/4"),
        ("omega_b = omega*sqrt(f*sigma_u/sigma_m)", "ω_b = ω √(f σ_u/σ_m)"),
        ("J*omega", "J ω"),
    ],
)
def test_equation_is_printed_as_an_engineer_writes_it(plain, shown):
    assert printed(plain) == shown


@pytest.mark.parametrize(
    ("equation", "texts", "shown"),
    [
        ("v = omega*R", {"x": "155 rad/s", "y": "0.6 m"}, "(155 rad/s) × (0.6 m)"),
        ("v = omega*R", {"x": "155 rad/s"}, "(155 rad/s) × R"),
        ("v = omega*R", {"x": "12", "y": "0.6 m"}, "12 × (0.6 m)"),
        ("v = omega*R", {"x": "-12", "y": "0.6 m"}, "(-12) × (0.6 m)"),
        ("a = omega/R**3", {"x": "8 W", "y": "2 m"}, "(8 W)/(2 m)³"),
        ("a = omega - R", {"x": "8 W", "y": "2 W"}, "(8 W) − (2 W)"),
        ("see method: reach", {"x": "8 W"}, ""),
    ],
)
def test_numbers_stand_where_their_symbols_stood(equation, texts, shown):
    assert with_numbers(Formula("x.y", equation, "", {"x": "omega", "y": "R"}, "practice"), texts) == shown


def test_symbol_that_is_part_of_another_is_left_alone():
    made = Formula("x.y", "v = m*m_f", "", {"a": "m", "b": "m_f"}, "practice")

    assert with_numbers(made, {"a": "1 kg"}) == "(1 kg) × m_f"
    assert with_numbers(made, {"b": "2 kg"}) == "m × (2 kg)"


@pytest.mark.parametrize("name", CLOSED)
def test_numbers_put_into_the_equation_give_what_the_code_gives(name):
    """The line of numbers on the worksheet, read back as a calculator would: × for *, ½ for 0.5, raised digits as powers."""
    made = REGISTRY[name]
    module, _, function = name.partition(".")
    usual = {"small_diameter": 0.7, "section_diameter": 0.4, "end_speed": 0.6, "poisson": 0.3}
    small = {
        "bore": 0.2,
        "inner_diameter": 0.2,
        "bore_radius": 0.2,
        "inner_radius": 0.2,
        "intrusion": 0.1,
        "drag_work": 0.1,
    }
    generator = np.random.default_rng(5)
    given = {p: (usual | small).get(p, 1.3) * float(generator.uniform(1.0, 1.3)) for p in made.symbols}
    line = with_numbers(made, {p: f"{value!r}" for p, value in given.items()})
    raised = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹", "0123456789")
    plain, before = "", ""
    for sign in line:
        power = sign in "⁰¹²³⁴⁵⁶⁷⁸⁹"
        plain += ("**" if power and before not in "⁰¹²³⁴⁵⁶⁷⁸⁹" else "") + sign.translate(raised)
        before = sign
    for shown, meant in (("×", "*"), ("−", "-"), ("½", "0.5"), ("√", "sqrt"), ("π", "pi"), ("^", "**")):
        plain = plain.replace(shown, meant)
    names = {"sqrt": sympy.sqrt, "pi": sympy.pi, "sin": sympy.sin, "Max": sympy.Max}
    computed = getattr(importlib.import_module(f"spinhazard.mechanics.{module}"), function)(**given)

    assert float(sympy.sympify(plain, locals=names)) == pytest.approx(float(computed), rel=1e-8)


def test_ratio_and_single_value_are_both_held_against_their_range():
    made = Formula("x.y", "T = a", "m", {}, "practice", {"span/diameter": (5.0, 8.0)})

    assert made.range_breaches({"span": 5.0, "diameter": 1.0}) == ()
    assert made.range_breaches({"span": 8.0, "diameter": 1.0}) == ()
    assert made.range_breaches({"span": 9.0, "diameter": 1.0}) == ("span/diameter = 9, outside 5 to 8",)
