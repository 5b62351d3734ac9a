"""Coast-down logs: the truth comes back, within the interval, whatever the noise; and what is no coast is refused."""

import numpy as np
import pytest

from spinhazard.mechanics.coastdown import speed_after, stopping_time
from spinhazard.mechanics.coastfit import find_coast, fit_coast, predicted_stop


def log(a, b, c, *, top=155.0, readings=1500, noise=0.0, seed=1):
    plateau = 20.0
    duration = float(stopping_time(1.0, top, end_speed=0.03 * top, constant=a, linear=b, quadratic=c))
    time = np.linspace(-plateau, duration, readings)
    speed = np.where(
        time < 0.0, top, speed_after(np.maximum(time, 0.0), 1.0, start_speed=top, constant=a, linear=b, quadratic=c)
    )
    return time + plateau, np.abs(speed + np.random.default_rng(seed).normal(0.0, noise * top, readings))


@pytest.mark.parametrize("truth", [(0.12, 0.0, 1.6e-4), (0.12, 2e-3, 1.6e-4), (1.5, 0.0, 0.0), (0.02, 5e-3, 0.0)])
def test_log_without_noise_gives_its_coefficients_back(truth):
    fit = fit_coast(*log(*truth))

    assert fit.value == pytest.approx(truth, rel=1e-4, abs=1e-7)
    assert fit.began == pytest.approx(20.0, abs=0.1 * fit.time[-1])


def test_truth_lies_inside_its_interval_in_nine_of_ten_logs():
    inside = np.zeros(3)
    for seed in range(200):
        generator = np.random.default_rng(seed)
        truth = np.array(
            [10 ** generator.uniform(-2, 1), 10 ** generator.uniform(-4, -1.3), 10 ** generator.uniform(-6, -3.5)]
        )
        truth[1:] = np.where(generator.random(2) < 0.2, 0.0, truth[1:])
        noise, readings = 10 ** generator.uniform(-3.3, -2), int(10 ** generator.uniform(2.5, 4))
        fit = fit_coast(*log(*truth, top=generator.uniform(50, 300), noise=noise, readings=readings, seed=seed))
        inside += (fit.low <= truth * (1 + 1e-9)) & (fit.high >= truth * (1 - 1e-9))

    assert np.all(inside / 200 >= 0.90), inside / 200


def test_predicted_stop_from_another_speed_holds_the_true_one():
    truth = (0.12, 0.0, 1.6e-4)
    fit = fit_coast(*log(*truth, noise=0.003, readings=5000))
    best, low, high = predicted_stop(fit, 170.0)
    true = float(stopping_time(1.0, 170.0, end_speed=0.0, constant=truth[0], linear=truth[1], quadratic=truth[2]))

    assert low <= true <= high
    assert best == pytest.approx(true, rel=0.02)


def test_spikes_are_left_out_and_counted():
    time, speed = log(0.12, 0.0, 1.6e-4, noise=0.002)
    clean = fit_coast(time, speed)
    speed[[300, 700, 1200]] = [5000.0, 0.0, 900.0]
    spiked = fit_coast(time, speed)

    assert spiked.spikes == clean.spikes + 3
    assert spiked.value == pytest.approx(clean.value, rel=0.01, abs=1e-6)
    assert any("spikes" in remark for remark in spiked.remarks)


def test_speed_that_rises_again_ends_the_coast_and_is_told():
    time, speed = log(0.12, 0.0, 1.6e-4, readings=1000)
    speed[700:] += 60.0
    fit = fit_coast(time, speed)

    assert any("the speed rises again" in remark for remark in fit.remarks)
    assert fit.value == pytest.approx((0.12, 0.0, 1.6e-4), rel=0.02, abs=1e-4)


@pytest.mark.parametrize(
    ("speed", "reason"),
    [
        (np.full(500, 155.0), "there is no coast in it"),
        (np.zeros(500), "the speed is zero throughout"),
        (np.linspace(10.0, 155.0, 500), "there is no coast in it"),
        (155.0 - np.linspace(0.0, 20.0, 500), "there is no coast in it"),
    ],
)
def test_log_without_a_coast_is_refused(speed, reason):
    with pytest.raises(ValueError, match=reason):
        find_coast(np.arange(500.0), speed)


def test_parts_that_cannot_be_told_apart_are_named():
    fit = fit_coast(*log(0.5, 0.0, 0.0, noise=0.01, readings=300))

    assert any("windage cannot be told from none" in remark for remark in fit.remarks)


def test_long_log_is_averaged_and_gives_the_same():
    short, long = (fit_coast(*log(0.12, 1e-4, 1.6e-4, noise=0.002, readings=n)) for n in (3000, 300_000))

    assert long.time.size == 2000
    assert long.value == pytest.approx(short.value, rel=0.05, abs=1e-3)
    assert np.all(long.high - long.low <= short.high - short.low)
