"""What every registered formula owes its callers: NaN passes, draws at once equal draws one by one, wrong signs are named."""

import importlib
import inspect
import pkgutil

import numpy as np
import pytest

from spinhazard import mechanics
from spinhazard.mechanics.formula import REGISTRY, record

for found in pkgutil.iter_modules(mechanics.__path__):
    importlib.import_module(f"spinhazard.mechanics.{found.name}")  # declaring fills the registry

CORNERS = {"radii", "heights"}  # outlines have no sample axis
SHAPES = {"shape"}
SIGNED = {  # a speed has a sign there, by design
    ("energy.rotational_energy", "speed"), ("energy.angular_momentum", "speed"), ("energy.tip_speed", "speed"),
}  # fmt: skip
SIZES = {
    "bore": 0.1, "inner_diameter": 0.1, "small_diameter": 0.5, "section_diameter": 0.1, "bore_radius": 0.2, "inner_radius": 0.2,
    "intrusion": 0.1, "drag_work": 0.1, "end_speed": 0.3, "poisson": 0.3, "time": 0.9, "size": 0.01, "resolution": 0.03,
    "distance": 0.4,
}  # fmt: skip


def function_of(name):
    module, _, function = name.partition(".")
    return getattr(importlib.import_module(f"spinhazard.mechanics.{module}"), function)


def numbers(name):
    return [p for p in inspect.signature(function_of(name)).parameters if p not in CORNERS | SHAPES]


def typical(name):
    given = {parameter: SIZES.get(parameter, 1.0) for parameter in numbers(name)}
    parameters = inspect.signature(function_of(name)).parameters
    given |= {"shape": "square"} if "shape" in parameters else {}
    given |= {"radii": [0.1, 0.4, 0.4, 0.1]} if "radii" in parameters else {}
    return given | ({"heights": [0.0, 0.0, 0.2, 0.2]} if "heights" in parameters else {})


EACH = [(name, parameter) for name in sorted(REGISTRY) for parameter in numbers(name)]


def call(name, given):
    function = function_of(name)
    positional = [p for p, kind in inspect.signature(function).parameters.items() if kind.kind is not kind.KEYWORD_ONLY]
    return function(*(given[p] for p in positional), **{p: v for p, v in given.items() if p not in positional})


def test_there_is_something_to_look_at():
    assert len(EACH) > 100
    assert len(REGISTRY) > 45


@pytest.mark.parametrize(("name", "parameter"), EACH)
def test_missing_argument_gives_a_missing_result(name, parameter):
    assert np.isnan(call(name, typical(name) | {parameter: np.nan}))
    assert np.isfinite(call(name, typical(name)))


@pytest.mark.parametrize(("name", "parameter"), EACH)
def test_one_missing_draw_leaves_the_others_alone(name, parameter):
    usual = typical(name)
    draws = call(name, usual | {parameter: np.array([usual[parameter], np.nan, usual[parameter]])})

    assert np.isnan(draws[1])
    assert draws[[0, 2]] == pytest.approx(float(call(name, usual)), rel=1e-13)


@pytest.mark.parametrize("name", sorted(name for name in REGISTRY if numbers(name)))
def test_draws_at_once_equal_draws_one_by_one(name):
    generator = np.random.default_rng(20261201)
    usual = typical(name)
    draws = {p: usual[p] * generator.uniform(1.0, 1.2, 50) for p in numbers(name)}
    together = call(name, usual | draws)
    single = [float(call(name, usual | {p: values[i] for p, values in draws.items()})) for i in range(50)]

    assert together.dtype == np.float64
    assert together.shape == (50,)
    assert together == pytest.approx(single, rel=1e-13)


@pytest.mark.parametrize("name", sorted(name for name in REGISTRY if len(numbers(name)) > 1))
def test_arguments_broadcast_against_each_other(name):
    first, second = numbers(name)[:2]
    usual = typical(name)
    table = call(name, usual | {first: usual[first] * np.ones((2, 1)), second: usual[second] * np.ones((1, 3))})

    assert table.shape == (2, 3)


@pytest.mark.parametrize(("name", "parameter"), [each for each in EACH if each not in SIGNED])
def test_negative_argument_is_refused_by_its_name(name, parameter):
    usual = typical(name)
    with pytest.raises(ValueError, match=rf"^{parameter} = -[\d.]+"):
        call(name, usual | {parameter: -usual[parameter]})
    with pytest.raises(ValueError, match=rf"^{parameter} = -[\d.]+"):
        call(name, usual | {parameter: np.array([usual[parameter], -usual[parameter]])})


@pytest.mark.parametrize(("name", "parameter"), sorted(SIGNED))
def test_turning_the_other_way_is_no_mistake(name, parameter):
    usual = typical(name)

    assert abs(call(name, usual | {parameter: -usual[parameter]})) == call(name, usual)


@pytest.mark.parametrize("name", sorted(REGISTRY))
def test_symbols_name_parameters_and_no_symbol_stands_twice(name):
    symbols = record(function_of(name)).symbols

    assert set(symbols) <= set(inspect.signature(function_of(name)).parameters)
    assert len(set(symbols.values())) == len(symbols)
