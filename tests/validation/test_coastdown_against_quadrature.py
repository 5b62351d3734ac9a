"""Stopping time, angle and speed against independent references: mpmath quadrature with 40 digits, scipy solve_ivp (DOP853).

Covers stopping_time, angle_turned and speed_after over log-uniform coefficients, each zero in about 15 % of the cases.
"""

import math

import mpmath
import numpy as np
import pytest
from scipy.integrate import solve_ivp

from spinhazard.mechanics import coastdown

CASES = 150


def cases():
    generator = np.random.default_rng(20260101)

    def spread(low, high):
        value = 10 ** generator.uniform(math.log10(low), math.log10(high), CASES)
        value[generator.random(CASES) < 0.15] = 0.0
        return value

    a, b, c = spread(1e-6, 1e4), spread(1e-8, 1e3), spread(1e-10, 10)
    start = 10 ** generator.uniform(0, 4, CASES)
    end = np.where(generator.random(CASES) < 0.5, 0.0, start * generator.random(CASES))
    body = 10 ** generator.uniform(-3, 4, CASES)
    return [tuple(map(float, case)) for case in zip(body, a, b, c, start, end, strict=True)]


def by_quadrature(body, a, b, c, start, end):
    with mpmath.workdps(40):
        body, a, b, c, start, end = map(mpmath.mpf, (body, a, b, c, start, end))
        points = [
            end,
            *(start * mpmath.mpf(10) ** -k for k in range(14, 0, -1) if start * mpmath.mpf(10) ** -k > end),
            start,
        ]
        time = mpmath.quad(lambda w: body / (a + b * w + c * w * w), points)
        angle = mpmath.quad(lambda w: body * w / (a + b * w + c * w * w), points)
        return float(time), float(angle)


def test_time_angle_and_speed_agree_with_forty_digit_quadrature():
    worst_time = worst_angle = worst_speed = 0.0
    for body, a, b, c, start, end in cases():
        load = {"constant": a, "linear": b, "quadratic": c}
        time = float(coastdown.stopping_time(body, start, end_speed=end, **load))
        if a == 0.0 and end == 0.0:
            assert math.isinf(time)
            continue
        if a == b == c == 0.0:
            assert math.isinf(time)
            continue
        reference_time, reference_angle = by_quadrature(body, a, b, c, start, end)
        angle = float(coastdown.angle_turned(body, start, end_speed=end, **load))
        speed = float(coastdown.speed_after(time, body, start_speed=start, **load))
        worst_time = max(worst_time, abs(time / reference_time - 1.0))
        worst_angle = max(worst_angle, abs(angle / reference_angle - 1.0))
        worst_speed = max(worst_speed, abs(speed - end) / start)

    assert worst_time < 1e-13
    assert worst_angle < 1e-9
    assert worst_speed < 1e-12


@pytest.mark.parametrize(
    ("load", "end"),
    [((3.1, 0.002, 0.0041), 0.0), ((3.1, 0.0, 0.0), 0.0), ((0.5, 0.3, 0.0), 0.0), ((0.0, 0.02, 0.001), 1.0)],
)
def test_stop_agrees_with_an_adaptive_ode_solver(load, end):
    a, b, c = load

    def motion(_t, y):
        return [-(a + b * y[0] + c * y[0] ** 2) / 1.9, y[0]]

    def stopped(_t, y):
        return y[0] - end

    stopped.terminal = True
    solution = solve_ivp(motion, (0.0, 1e4), [155.0, 0.0], method="DOP853", rtol=1e-11, atol=1e-12, events=stopped)
    named = {"constant": a, "linear": b, "quadratic": c}

    assert float(coastdown.stopping_time(1.9, 155.0, end_speed=end, **named)) == pytest.approx(solution.t[-1], rel=1e-8)
    assert float(coastdown.angle_turned(1.9, 155.0, end_speed=end, **named)) == pytest.approx(
        solution.y[1, -1], rel=1e-8
    )


def test_ill_conditioned_angle_is_integrated_in_pieces_of_bounded_size():
    """Windage a hundred-thousandth of the viscous drag, ten thousand draws at once."""
    linear = np.geomspace(0.1, 10.0, 10_000)
    angle = coastdown.angle_turned(1.9, 155.0, end_speed=0.0, constant=3.1, linear=linear, quadratic=linear * 1e-9)
    without = 1.9 / linear * (155.0 - 3.1 / linear * np.log1p(linear * 155.0 / 3.1))

    assert angle == pytest.approx(without, rel=1e-6)
