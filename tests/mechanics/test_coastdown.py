"""Stopping times, speeds on the way and angles by hand, at the edges of the model, and laws that hold for any rotor."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.mechanics.coastdown import angle_turned, speed_after, stopping_time
from spinhazard.mechanics.energy import rotational_energy

some = st.floats(1e-2, 1e3)
share = st.floats(0.0, 0.99)
part = st.one_of(st.just(0.0), st.floats(1e-6, 10.0))
drags = st.tuples(st.floats(1e-3, 1e3), part, part).map(
    lambda load: dict(zip(("constant", "linear", "quadratic"), load, strict=True))
)
NONE = {"constant": 0.0, "linear": 0.0, "quadratic": 0.0}
DRY, VISCOUS, WINDAGE = NONE | {"constant": 3.1}, NONE | {"linear": 0.02}, NONE | {"quadratic": 0.0041}


def time(body, start, end=0.0, **load):
    return float(stopping_time(body, start, end_speed=end, **load))


def angle(body, start, end=0.0, **load):
    return float(angle_turned(body, start, end_speed=end, **load))


def test_dry_friction_takes_equal_times_for_equal_drops_of_speed():
    # J ω/a = 1.9·155/3.1; J (ω₀² − ω₁²)/2a
    assert time(1.9, 155.0, **DRY) == pytest.approx(95.0, rel=1e-14)
    assert time(1.9, 155.0, 77.5, **DRY) == pytest.approx(47.5, rel=1e-14)
    assert angle(1.9, 155.0, **DRY) == pytest.approx(1.9 * 155.0**2 / 6.2, rel=1e-14)
    assert float(speed_after(47.5, 1.9, start_speed=155.0, **DRY)) == pytest.approx(77.5, rel=1e-14)


def test_viscous_drag_alone_decays_exponentially():
    # time constant J/b = 95 s
    assert time(1.9, 155.0, 155.0 / math.e, **VISCOUS) == pytest.approx(95.0, rel=1e-13)
    assert float(speed_after(95.0, 1.9, start_speed=155.0, **VISCOUS)) == pytest.approx(155.0 / math.e, rel=1e-13)
    assert angle(1.9, 155.0, **VISCOUS) == pytest.approx(1.9 * 155.0 / 0.02, rel=1e-13)


def test_windage_alone_takes_the_reciprocal_of_the_speed():
    # 1/ω grows evenly by c/J each second; angle (J/c) ln(ω₀/ω₁)
    assert time(1.9, 155.0, 31.0, **WINDAGE) == pytest.approx(1.9 / 0.0041 * (1.0 / 31.0 - 1.0 / 155.0), rel=1e-13)
    assert angle(1.9, 155.0, 31.0, **WINDAGE) == pytest.approx(1.9 / 0.0041 * math.log(5.0), rel=1e-13)
    after = float(speed_after(1.9 / 0.0041 / 155.0, 1.9, start_speed=155.0, **WINDAGE))
    assert after == pytest.approx(77.5, rel=1e-13)


def test_friction_with_windage_is_an_arc_tangent():
    # a = c = J = 1: t = atan ω₀, ω = tan(atan ω₀ − t), θ = ½ ln(1 + ω₀²)
    load = {"constant": 1.0, "linear": 0.0, "quadratic": 1.0}

    assert time(1.0, 1.0, **load) == pytest.approx(math.pi / 4.0, rel=1e-15)
    assert float(speed_after(math.pi / 8.0, 1.0, start_speed=1.0, **load)) == pytest.approx(math.tan(math.pi / 8.0))
    assert angle(1.0, 1.0, **load) == pytest.approx(math.log(2.0) / 2.0, rel=1e-13)


def test_double_root_is_an_ordinary_point():
    # 4ac = b²: torque 0.02 (ω + 10)², t = (J/c)(1/10 − 1/110)
    load = {"constant": 2.0, "linear": 0.4, "quadratic": 0.02}
    there = time(10.0, 100.0, **load)

    assert there == pytest.approx(10.0 / 0.02 * (1.0 / 10.0 - 1.0 / 110.0), rel=1e-14)
    for nudge in (1.0 - 1e-9, 1.0 + 1e-9):
        assert time(10.0, 100.0, **(load | {"linear": 0.4 * nudge})) == pytest.approx(there, rel=1e-8)


@pytest.mark.parametrize("load", [VISCOUS, WINDAGE, {"constant": 0.0, "linear": 0.02, "quadratic": 0.0041}, NONE])
def test_without_dry_friction_standstill_is_never_reached(load):
    assert time(1.9, 155.0, **load) == math.inf
    assert float(speed_after(1e3, 1.9, start_speed=155.0, **load)) > 0.0


def test_angle_without_dry_friction_is_finite_if_drag_falls_slower_than_speed_squared():
    both = {"constant": 0.0, "linear": 0.02, "quadratic": 0.0041}

    assert angle(1.9, 155.0, **both) == pytest.approx(1.9 / 0.0041 * math.log1p(0.0041 * 155.0 / 0.02), rel=1e-13)
    assert angle(1.9, 155.0, **WINDAGE) == math.inf
    assert angle(1.9, 155.0, **NONE) == math.inf


@pytest.mark.parametrize("share_of_windage", [0.0, 1e-12, 8e-9, 2e-8, 1e-3])
def test_angle_without_dry_friction_keeps_its_digits_however_small_the_windage(share_of_windage):
    # y = c ω₀/b: (J ω₀/b)·ln(1 + y)/y = (J ω₀/b)(1 − y/2 + y²/3 − …)
    y = share_of_windage
    series = 1.0 - y / 2.0 + y**2 / 3.0 - y**3 / 4.0 + y**4 / 5.0

    assert angle(2.0, 100.0, constant=0.0, linear=0.5, quadratic=y * 0.005) == pytest.approx(400.0 * series, rel=1e-13)


def test_rotor_that_has_stopped_never_turns_again_on_a_later_branch_of_the_tangent():
    load = {"constant": 3.1, "linear": 0.002, "quadratic": 0.0041}
    later = np.linspace(1.0 + 1e-9, 20.0, 5000) * time(1.9, 155.0, **load)

    assert np.all(speed_after(later, 1.9, start_speed=155.0, **load) == 0.0)


@pytest.mark.parametrize("load", [DRY, VISCOUS, WINDAGE, NONE])
@pytest.mark.parametrize("end", [155.0, 200.0])
def test_rotor_already_slower_takes_no_time_and_no_angle(load, end):
    assert time(1.9, 155.0, end, **load) == 0.0
    assert angle(1.9, 155.0, end, **load) == 0.0


@pytest.mark.parametrize("after", [95.0, 96.0, 1e6, math.inf])
def test_rotor_stays_at_rest_once_it_has_stopped(after):
    assert float(speed_after(after, 1.9, start_speed=155.0, **DRY)) == pytest.approx(0.0, abs=1e-12)
    windy = {"constant": 3.1, "linear": 0.002, "quadratic": 0.0041}
    assert float(speed_after(after, 1.9, start_speed=155.0, **windy)) == 0.0


@pytest.mark.parametrize(
    "load",
    [{"linear": 0.0, "quadratic": 1e-5}, {"linear": 1e-9, "quadratic": 1e-5}, {"linear": 1e-9, "quadratic": 0.0}],
)
@pytest.mark.parametrize("start", [1e-3, 1e-12, 1e-160, 1e-200, 5e-324])
def test_creeping_rotor_is_stopped_by_dry_friction_alone(start, load):
    dry = start / 2.0 * (1.9 / 3.1 * start)  # J ω²/2a, in an order that underflows late

    assert time(1.9, start, constant=3.1, **load) == pytest.approx(1.9 / 3.1 * start, rel=1e-6, abs=1e-322)
    assert angle(1.9, start, constant=3.1, **load) == pytest.approx(dry, rel=1e-6, abs=1e-300)


def test_missing_time_or_inertia_is_missing_even_where_nothing_brakes():
    assert np.isnan(float(speed_after(np.nan, 1.9, start_speed=155.0, **NONE)))
    assert np.isnan(float(speed_after(1.0, np.nan, start_speed=155.0, **NONE)))


def test_rotor_that_nothing_brakes_keeps_its_speed_for_ever():
    assert float(speed_after(math.inf, 1.9, start_speed=155.0, **NONE)) == 155.0


@given(some, some, drags, share)
def test_stop_in_two_stages_takes_as_long_as_in_one(body, speed, load, middle):
    between = middle * speed

    assert time(body, speed, between, **load) + time(body, between, **load) == pytest.approx(
        time(body, speed, **load), rel=1e-11
    )
    assert angle(body, speed, between, **load) + angle(body, between, **load) == pytest.approx(
        angle(body, speed, **load), rel=1e-8
    )


@given(some, some, drags, st.floats(1e-2, 1e2))
def test_twice_the_inertia_takes_twice_the_time_and_turns_twice_as_far(body, speed, load, factor):
    assert time(factor * body, speed, **load) == pytest.approx(factor * time(body, speed, **load), rel=1e-12)
    assert angle(factor * body, speed, **load) == pytest.approx(factor * angle(body, speed, **load), rel=1e-8)


@given(some, some, drags, st.sampled_from(["constant", "linear", "quadratic"]), st.floats(0.0, 10.0))
def test_more_drag_of_any_kind_never_lengthens_a_stop(body, speed, load, kind, more):
    heavier = load | {kind: load[kind] + more}

    assert time(body, speed, **heavier) <= time(body, speed, **load) * (1.0 + 1e-12)
    assert angle(body, speed, **heavier) <= angle(body, speed, **load) * (1.0 + 1e-9)


@given(some, some, drags)
def test_speed_never_rises_on_the_way_and_never_falls_below_zero(body, speed, load):
    moments = np.linspace(0.0, 1.2, 40) * time(body, speed, **load)
    speeds = speed_after(moments, body, start_speed=speed, **load)

    assert speeds[0] == pytest.approx(speed, rel=1e-12)
    assert np.all(np.diff(speeds) <= 1e-9 * speed)
    assert np.all(speeds >= 0.0)


@given(some, some, drags)
def test_rotor_turns_no_farther_than_at_half_its_speed_all_the_time(body, speed, load):
    """Mean speed of a coast under drag that grows with speed is at most half of the speed it began with."""
    turned, took = angle(body, speed, **load), time(body, speed, **load)

    assert 0.0 < turned <= speed * took / 2.0 * (1.0 + 1e-9)


@given(some, some, drags, share)
def test_drag_takes_as_much_energy_as_the_rotor_loses(body, speed, load, end):
    """Work ∫T dθ = aθ + ∫(bω + cω²)ω dt, by Simpson's rule over the speeds on the way."""
    took = time(body, speed, end * speed, **load)
    # moments crowd at the start, where windage is steepest
    moments = took * np.linspace(0.0, 1.0, 4001) ** 3
    speeds = speed_after(moments, body, start_speed=speed, **load)
    power = load["linear"] * speeds**2 + load["quadratic"] * speeds**3
    jacobian = 3.0 * took * np.linspace(0.0, 1.0, 4001) ** 2
    weights = np.full(4001, 2.0)
    weights[1::2], weights[0], weights[-1] = 4.0, 1.0, 1.0
    work = load["constant"] * angle(body, speed, end * speed, **load) + float(weights @ (power * jacobian)) / 12000.0
    lost = float(rotational_energy(body, speed) - rotational_energy(body, end * speed))

    assert work == pytest.approx(lost, rel=1e-4)
