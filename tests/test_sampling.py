"""One sample axis: reproducible, of the stated distributions, and in agreement with outside references."""

import math

import numpy as np
import pytest

from spinhazard.quantity.notation import parse_stated
from spinhazard.quantity.stated import Stated
from spinhazard.sampling import Sampler, interval
from spinhazard.statement.policy import Spreads

DRAWS = 20_000


def sampler(draws=DRAWS, seed="seed"):
    return Sampler(seed, draws, Spreads())


def test_entry_zero_is_the_best_estimate_and_the_same_seed_gives_the_same_draws():
    stated = parse_stated("45 kg ± 5 %", "mass")
    first, second = sampler().samples("a.mass", stated), sampler().samples("a.mass", stated)

    assert first[0] == 45.0
    assert np.array_equal(first, second)
    assert not np.array_equal(first, sampler().samples("b.mass", stated))
    assert not np.array_equal(first, sampler(seed="other").samples("a.mass", stated))


def test_tolerance_is_rectangular_and_coverage_factor_normal():
    rectangular = sampler().samples("x", parse_stated("10 s ± 1 s", "time"))[1:]
    normal = sampler().samples("x", parse_stated("10 s ± 1 s (k=2)", "time"))[1:]

    assert 9.0 <= rectangular.min() < 9.001
    assert 10.999 < rectangular.max() <= 11.0
    assert rectangular.std() == pytest.approx(1 / math.sqrt(3), rel=0.02)
    assert normal.std() == pytest.approx(0.5, rel=0.02)


def test_normal_draws_below_zero_are_drawn_again():
    drawn = sampler().samples("x", parse_stated("1 s ± 1.5 s (k=2)", "time"))

    assert drawn.min() > 0.0


def test_default_spread_is_that_of_the_class_of_the_source():
    estimated = Stated(10.0, "mass", "10 kg", source="assumed", source_class="estimated")
    bare = Stated(10.0, "mass", "10 kg")

    assert sampler().half_width(estimated) == pytest.approx(2.0)
    assert sampler().samples("x", bare).shape == (1,)


def test_interval_is_symmetric_in_probability_and_counts_infinities():
    samples = np.concatenate([[50.0], np.arange(1001.0)])
    never = np.concatenate([[50.0], np.arange(900.0), np.full(100, np.inf)])

    assert interval(samples, 0.95) == (25.0, 975.0)
    assert interval(never, 0.95) == (24.0, math.inf)
    assert interval(np.array([3.0]), 0.95) == (3.0, 3.0)


def test_spread_of_the_energy_agrees_with_linear_propagation(fan, assess_text):
    """Reference: the package uncertainties (linear propagation, JCGM 100:2008, 5.1)."""
    from uncertainties import ufloat

    from spinhazard import Policy

    text = fan.replace('"1480 rpm"', '"1480 rpm ± 1 % (k=2)"').replace('"22 kg m2"', '"22 kg m2 ± 2 % (k=2)"')
    fact = assess_text(text, best_estimate=False, policy=Policy(draws=200_000)).fact("stored_energy")
    speed = ufloat(1480 * 2 * math.pi / 60, 1480 * 2 * math.pi / 60 * 0.005)
    energy = 0.5 * ufloat(22.0, 0.22) * speed**2 + 0.5 * 2.0 * (1.5 * speed) ** 2

    assert fact.value[1:].std() == pytest.approx(energy.std_dev, rel=0.02)


def test_energy_of_a_rectangular_speed_has_the_analytic_interval(fan, assess_text):
    from spinhazard import Policy

    text = fan.replace('"1480 rpm"', '"1480 rpm ± 10 %"')
    result = assess_text(text, best_estimate=False, policy=Policy(draws=200_000))
    low, high = result.interval(result.fact("stored_energy"))
    best = result.fact("stored_energy").best

    # E goes with the square of a speed spread evenly from 0.9 to 1.1: its 2.5 % and 97.5 % points are 0.905² and 1.095²
    assert low / best == pytest.approx(0.905**2, rel=2e-3)
    assert high / best == pytest.approx(1.095**2, rel=2e-3)


def test_interval_holds_the_best_estimate(fan, assess_text):
    result = assess_text(fan.replace('"22 kg m2"', '"22 kg m2 ± 10 %"'), best_estimate=False)

    for fact in result.facts:
        if isinstance(fact.value, np.ndarray) and math.isfinite(fact.best):
            low, high = result.interval(fact)
            assert low <= fact.best * (1 + 1e-12) + 1e-12, fact.key
            assert high >= fact.best * (1 - 1e-12) - 1e-12, fact.key


@pytest.mark.parametrize("index", [1, 2, 33, 64, 100])
def test_draws_at_once_equal_single_evaluations(index, fan):
    """Sample axis and branches: what one draw gives alone, it gives among thousands."""
    from spinhazard import Policy, assess, assessment_from_text
    from spinhazard.rules.loading import Catalogue

    none = Catalogue((), "none")
    text = (
        fan.replace('"22 kg m2"', '"22 kg m2 ± 10 %"')
        .replace('"3.1 N m"', '"3.1 N m ± 30 %"')
        .replace('"0.2 s"', '"0.4 s ± 90 %"')
    )
    whole = assess(assessment_from_text(text, name="x"), policy=Policy(draws=100), catalogue=none)
    drawn = {
        path: float(whole.sheet._drawn[path][index])
        for path in ("shaft.impeller.part.wheel.inertia", "stopping.friction_torque", "stopping.brake.disc.build_up")
    }
    single = (
        fan.replace('"22 kg m2"', f'"{drawn["shaft.impeller.part.wheel.inertia"]:.17g} kg m2"')
        .replace('"3.1 N m"', f'"{drawn["stopping.friction_torque"]:.17g} N m"')
        .replace('"0.2 s"', f'"{drawn["stopping.brake.disc.build_up"]:.17g} s"')
    )
    alone = assess(assessment_from_text(single, name="x"), best_estimate=True, catalogue=none)

    for case in ("normal stop", "power loss", "brake failed"):
        for key in ("stopping_time", "stopping_turns", "energy_at_access", "brake_heat", "brake_temperature_rise"):
            value = whole.fact(key, f"stop:{case}").value
            assert value[index if value.size > 1 else 0] == pytest.approx(
                alone.fact(key, f"stop:{case}").best, rel=1e-9
            )
