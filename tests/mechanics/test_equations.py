"""The equation printed on the worksheet is the one the code computes: sympy evaluates it at random arguments and compares."""

import importlib
import inspect
import pkgutil

import numpy as np
import pytest
import sympy

from spinhazard import mechanics
from spinhazard.mechanics.formula import REGISTRY, Formula, printed, with_numbers

for found in pkgutil.iter_modules(mechanics.__path__):
    importlib.import_module(f"spinhazard.mechanics.{found.name}")  # declaring fills the registry

NAMES = {"Max": sympy.Max, "sqrt": sympy.sqrt, "sin": sympy.sin, "pi": sympy.pi, "E": sympy.Symbol("E"), "S": sympy.Symbol("S"),
         "N": sympy.Symbol("N"), "C": sympy.Symbol("C"), "Q": sympy.Symbol("Q")}  # fmt: skip
CLOSED = {name: formula for name, formula in REGISTRY.items() if not formula.equation.startswith("see method")}
DEFAULTS = {
    "bore": 0.1,
    "inner_diameter": 0.1,
    "offset": 0.3,
    "intrusion": 0.05,
    "drag_work": 1.0,
    "inner_radius": 0.2,
    "bore_radius": 0.2,
}
SMALLER_THAN_ONE = {"small_diameter": 0.6, "section_diameter": 0.4, "poisson": 0.3, "end_speed": 0.5}


def function_of(name):
    module, _, function = name.partition(".")
    return getattr(importlib.import_module(f"spinhazard.mechanics.{module}"), function)


def right_side(formula: Formula):
    return sympy.sympify(formula.equation.partition(" = ")[2].replace("lambda", "lambda_"), locals=dict(NAMES))


def random_arguments(function, generator):
    made = {}
    for name in inspect.signature(function).parameters:
        base = DEFAULTS.get(name, SMALLER_THAN_ONE.get(name, 1.0))
        made[name] = base * generator.uniform(1.0, 1.5)
    return made


def deviation(formula, function, generator):
    arguments = random_arguments(function, generator)
    values = {sympy.Symbol(symbol): arguments[parameter] for parameter, symbol in formula.symbols.items()}
    expected = float(right_side(formula).subs(values).evalf(30))
    computed = float(function(**arguments))
    return abs(computed / expected - 1.0)


@pytest.mark.parametrize("name", CLOSED)
def test_printed_equation_is_what_the_code_computes(name):
    generator = np.random.default_rng(20261120)
    tolerance = (
        1e-8 if name == "fragments.perforation_thickness" else 1e-12
    )  # its coefficient is printed to nine figures

    for _ in range(5):
        assert deviation(CLOSED[name], function_of(name), generator) < tolerance


def test_wrong_equation_is_caught():
    right = REGISTRY["energy.rotational_energy"]
    wrong = Formula(right.name, "E = J*omega**2", right.unit, right.symbols, right.source)

    assert deviation(wrong, function_of(right.name), np.random.default_rng(1)) > 0.4


@pytest.mark.parametrize("name", sorted(set(REGISTRY) - set(CLOSED)))
def test_algorithm_has_a_page_and_a_validation_that_names_it(name, request):
    root = request.config.rootpath
    page = REGISTRY[name].equation.partition(": ")[2]
    validations = "".join(path.read_text("utf-8") for path in (root / "tests/validation").glob("test_*.py"))

    assert (root / f"docs/methods/{page}.md").exists()
    assert name.partition(".")[2] in validations


@pytest.mark.parametrize(
    ("plain", "shown"),
    [
        ("E = J*omega**2/2", "E = ½ J ω²"),
        ("v = omega*R", "v = ω R"),
        ("omega = sqrt(2*E/J)", "ω = √(2 E/J)"),
        ("T = E**(2/3)/(1275957.16*D)", "T = E^(2/3)/(1275957.16 D)"),
        ("Q = J*(omega_0**2 - omega_1**2)/2 - W", "Q = J (ω₀² − ω₁²)/2 − W"),
        ("sigma = (3 + nu)*rho*omega**2*R**2/8", "σ = (3 + ν) ρ ω² R²/8"),
        ("see method: reach", "see method: reach"),
    ],
)
def test_equation_is_printed_as_an_engineer_writes_it(plain, shown):
    assert printed(plain) == shown


def test_numbers_are_put_in_with_their_units_and_powers_in_brackets():
    formula = REGISTRY["energy.rotational_energy"]

    assert with_numbers(formula, {"inertia": "1.9 kg m²", "speed": "1480 rpm"}) == "½ × (1.9 kg m²) × (1480 rpm)²"


def test_range_of_a_method_is_data():
    formula = Formula("x.y", "T = a", "m", {}, "practice", {"thickness/diameter": (0.1, 0.8), "speed": (21.0, 122.0)})

    assert formula.range_breaches({"thickness": 0.5, "diameter": 1.0, "speed": 50.0}) == ()
    assert formula.range_breaches({"thickness": 0.05, "diameter": 1.0, "speed": 150.0}) == (
        "thickness/diameter = 0.05, outside 0.1 to 0.8",
        "speed = 150, outside 21 to 122",
    )
