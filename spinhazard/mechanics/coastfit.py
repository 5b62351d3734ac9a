"""A coast-down log to the drag of its rotor: A = a/J, B = b/J, C = c/J in dω/dt = −(A + Bω + Cω²), none below zero.

The closed form ω(t) is fitted to the speeds themselves, not to differences of noisy speeds. Method: see
docs/methods/coastfit.md; standards that use retardation tests: IEEE 115, IEC 60034-2-1 (from memory).
"""

from __future__ import annotations

from dataclasses import dataclass
from itertools import product

import numpy as np
from numpy.typing import NDArray

from spinhazard.mechanics.coastdown import speed_after, stopping_time

Array = NDArray[np.float64]
BLOCKS = 2000
"""Most blocks a log is averaged to; the coast is smooth over a two-thousandth of it."""
NAMES = ("constant", "linear", "quadratic")
_PLATEAU, _FLOOR, _LEAST_FALL, _RISE = 0.99, 0.01, 0.2, 0.03
_SPIKE = 6.0  # robust standard deviations from the fit beyond which a reading is left out, and counted
_NORMAL_95 = 1.959964


@dataclass(frozen=True)
class Coast:
    """Where in a log the rotor coasts, and what had to be assumed to say so."""

    first: int
    last: int
    assumptions: tuple[str, ...]


@dataclass(frozen=True)
class CoastFit:
    """Drag over inertia, fitted.

    Attributes
    ----------
    start_speed : float
        Fitted speed at the start of the coast [rad/s].
    value, low, high : ndarray, shape (3,)
        A [rad/s²], B [1/s], C [1/rad] with the ends of their 95 % intervals.
    covariance : ndarray, shape (3, 3)
        Of A, B, C.
    deviation : float
        Standard deviation of one reading from the fit [rad/s].
    readings, spikes : int
        Readings used, and readings left out as spikes.
    end_speed : float
        Lowest speed in the coast [rad/s]; what lies below is extrapolated.
    time, speed, fitted : ndarray, shape (blocks,)
        Block averages from the start of the coast, and the fit [s], [rad/s].
    began : float
        Time in the log at which the coast begins [s].
    remarks : tuple of str
        Assumptions, and parts that cannot be told apart.
    """

    start_speed: float
    value: Array
    low: Array
    high: Array
    covariance: Array
    deviation: float
    readings: int
    spikes: int
    end_speed: float
    time: Array
    speed: Array
    fitted: Array
    began: float
    remarks: tuple[str, ...]


def find_coast(time: Array, speed: Array) -> Coast:
    """The stretch of a log in which the speed falls from its highest level.

    Parameters
    ----------
    time : ndarray, shape (n,)
        Rising times [s].
    speed : ndarray, shape (n,)
        Speeds [rad/s], >= 0.

    Returns
    -------
    Coast
        First reading and the one after the last.

    Raises
    ------
    ValueError
        There is no coast in the log.
    """
    size = max(1, speed.size // BLOCKS)
    blocks = speed.size // size
    level = _running_median(np.median(speed[: blocks * size].reshape(blocks, size), axis=1))
    top = float(level.max())
    if top <= 0.0:
        raise ValueError("the speed is zero throughout")
    plateau = float(np.median(level[level >= 0.98 * top]))
    # where the speed has left its plateau by more than the scatter, the coast has surely begun
    start = int(np.flatnonzero(level >= min(_PLATEAU * plateau, plateau - 4.0 * _noise(level)))[-1])
    after = level[start:]
    assumptions = []
    stop = after.size
    below = np.flatnonzero(after <= _FLOOR * top)
    if below.size:
        stop = int(below[0])
    lowest = np.minimum.accumulate(after[:stop])
    noise = _noise(after[:stop])
    rises = np.flatnonzero(after[:stop] > lowest + max(_RISE * top, 6.0 * noise))
    lasting = [int(i) for i in rises if np.all(after[i : i + 3] > lowest[i] + _RISE * top / 2.0)]
    if lasting:
        stop = int(np.argmin(after[: lasting[0]])) + 1
        moment = time[min((start + lasting[0]) * size, time.size - 1)]
        assumptions.append(f"the speed rises again {moment:.4g} s into the log; the coast is taken to end before")
    if stop < 5 or (after[0] - after[:stop].min()) < _LEAST_FALL * top:
        raise ValueError("there is no coast in it: the speed does not fall by a fifth from its highest level")
    return Coast(first=start * size, last=min((start + stop) * size, speed.size), assumptions=tuple(assumptions))


def _running_median(values: Array) -> Array:
    """Median over five neighbours: a spike of one or two readings leaves no trace."""
    padded = np.pad(values, 2, mode="edge")
    return np.median(np.lib.stride_tricks.sliding_window_view(padded, 5), axis=-1)


def _noise(level: Array) -> float:
    """Robust standard deviation of the scatter about a smooth curve, from second differences."""
    if level.size < 5:
        return 0.0
    second = level[2:] - 2.0 * level[1:-1] + level[:-2]
    return float(np.median(np.abs(second)) / 0.6745 / np.sqrt(6.0))


def fit_coast(time: Array, speed: Array) -> CoastFit:
    """Find the coast in a log and fit the drag over inertia.

    Parameters
    ----------
    time : ndarray, shape (n,)
        Rising times [s].
    speed : ndarray, shape (n,)
        Speeds [rad/s], >= 0.

    Returns
    -------
    CoastFit
        Coefficients with 95 % intervals.

    Raises
    ------
    ValueError
        There is no coast in the log.
    """  # noqa: DOC502  (raised by find_coast)
    coast = find_coast(time, speed)
    t, w = time[coast.first : coast.last], speed[coast.first : coast.last]
    began = float(t[0])
    t = t - began
    scales = _scales(float(np.median(w[:5])), float(t[-1]))
    smooth = _running_median(w)
    away = np.abs(w - smooth)
    blocks = _averaged(t, w, away <= max(_SPIKE * 1.4826 * float(np.median(away)), 0.02 * scales[0]))
    parameters = _fitted(*blocks, _first_guess(*blocks, scales), scales)
    scatter = w - _model(t, parameters, scales)
    keep = np.abs(scatter) <= max(_SPIKE * 1.4826 * float(np.median(np.abs(scatter))), 1e-9 * scales[0])
    spikes = int(t.size - np.count_nonzero(keep))
    if spikes:
        blocks = _averaged(t, w, keep)
        parameters = _fitted(*blocks, parameters, scales)
    return _report(blocks, parameters, scales, (t[keep], w[keep]), coast, (began, spikes))


def _scales(top: float, duration: float) -> Array:
    """Magnitudes of ω₀, A, B, C, so that all parameters are of order one."""
    return np.array([top, top / duration, 1.0 / duration, 1.0 / (top * duration)])


def _averaged(t: Array, w: Array, keep: NDArray[np.bool_]) -> tuple[Array, Array, Array]:
    """Block averages with the number of readings in each."""
    t, w = t[keep], w[keep]
    count = min(BLOCKS, t.size)
    edges = np.linspace(0, t.size, count + 1).astype(np.intp)
    sizes = np.diff(edges).astype(np.float64)
    return np.add.reduceat(t, edges[:-1]) / sizes, np.add.reduceat(w, edges[:-1]) / sizes, sizes


def _model(t: Array, parameters: Array, scales: Array) -> Array:
    start, a, b, c = parameters * scales
    return speed_after(t, 1.0, start_speed=start, constant=a, linear=b, quadratic=c)


def _first_guess(t: Array, w: Array, weights: Array, scales: Array) -> Array:
    """Integral regression: ω(0) − ω(t) = A t + B ∫ω + C ∫ω², linear in the unknowns and without differences."""
    steps = np.diff(t)
    first = np.concatenate([[0.0], np.cumsum(steps * (w[1:] + w[:-1]) / 2.0)])
    second = np.concatenate([[0.0], np.cumsum(steps * (w[1:] ** 2 + w[:-1] ** 2) / 2.0)])
    design = np.column_stack([np.ones_like(t), -t, -first, -second]) * scales
    return _bounded_least_squares(design, w, weights, np.zeros(4), damping=0.0)


def _bounded_least_squares(design: Array, target: Array, weights: Array, base: Array, *, damping: float) -> Array:
    """Step d that minimises |W(design d − target)|² + damping |d|² with base + d >= 0 in the last three: all eight cases tried."""
    root = np.sqrt(weights)[:, None]
    normal = (design * root).T @ (design * root) + damping * np.eye(4)
    right = (design * root).T @ (target * root[:, 0])
    best, least = -base, np.inf
    for held in product((False, True), repeat=3):
        fixed = np.array([False, *held])
        step = np.where(fixed, -base, 0.0)
        free = ~fixed
        try:
            step[free] = np.linalg.solve(
                normal[np.ix_(free, free)], right[free] - normal[np.ix_(free, fixed)] @ step[fixed]
            )
        except np.linalg.LinAlgError:
            continue
        if np.any((base + step)[1:] < -1e-12):
            continue
        cost = float(step @ normal @ step - 2.0 * right @ step)
        if cost < least:
            best, least = step, cost
    return best


def _jacobian(t: Array, parameters: Array, scales: Array) -> Array:
    columns = []
    for index in range(4):
        step = 1e-5 * max(1.0, abs(parameters[index]))
        up, down = parameters.copy(), parameters.copy()
        up[index] += step
        down[index] = max(down[index] - step, 0.0)
        columns.append((_model(t, up, scales) - _model(t, down, scales)) / (up[index] - down[index]))
    return np.column_stack(columns)


def _fitted(t: Array, w: Array, weights: Array, parameters: Array, scales: Array) -> Array:
    """Levenberg–Marquardt within the bounds."""
    parameters = np.maximum(parameters, 0.0)
    residual = w - _model(t, parameters, scales)
    cost = float(weights @ residual**2)
    damping = 1e-6 * float(weights.sum()) * scales[0] ** 2
    for _ in range(80):
        step = _bounded_least_squares(_jacobian(t, parameters, scales), residual, weights, parameters, damping=damping)
        trial = np.maximum(parameters + step, 0.0)
        trial_residual = w - _model(t, trial, scales)
        trial_cost = float(weights @ trial_residual**2)
        if trial_cost <= cost:
            done = cost - trial_cost <= 1e-12 * cost and bool(np.abs(step).max() < 1e-7)
            parameters, residual, cost, damping = trial, trial_residual, trial_cost, damping / 6.0
            if done:
                break
        else:
            damping *= 8.0
    return parameters


def _report(
    blocks: tuple[Array, Array, Array], parameters: Array, scales: Array, kept: tuple[Array, Array], coast: Coast, about: tuple[float, int]
) -> CoastFit:  # fmt: skip
    t, w, weights = blocks
    residual = w - _model(t, parameters, scales)
    jacobian = _jacobian(t, parameters, scales)
    normal = (jacobian * weights[:, None]).T @ jacobian
    freedom = max(1, t.size - 4)
    variance = float(weights @ residual**2) / freedom
    inverse = np.linalg.pinv(normal, rcond=1e-13)
    # readings that follow each other in error carry less than their number says
    following = (
        float(np.clip(np.corrcoef(residual[1:], residual[:-1])[0, 1], 0.0, 0.95))
        if t.size > 10 and variance > 0.0
        else 0.0
    )
    covariance = variance * (1.0 + following) / (1.0 - following) * inverse * np.outer(scales, scales)
    centre = (parameters + inverse @ (jacobian.T @ (weights * residual))) * scales
    half = (_NORMAL_95 + 2.4 / freedom) * np.sqrt(np.maximum(np.diag(covariance), 0.0))
    value = (parameters * scales)[1:]
    low = np.minimum(np.maximum(centre - half, 0.0)[1:], value)
    high = np.maximum(np.maximum(centre + half, 0.0)[1:], value)
    scatter = kept[1] - _model(kept[0], parameters, scales)
    began, spikes = about
    remarks = [*coast.assumptions, *_indistinct(value, low, covariance[1:, 1:])]
    if spikes:
        remarks.append(f"{spikes} of {kept[0].size + spikes} readings lie far off the fit and were left out as spikes")
    return CoastFit(
        start_speed=float(parameters[0] * scales[0]), value=value, low=low, high=high, covariance=covariance[1:, 1:],
        deviation=float(np.std(scatter)), readings=int(kept[0].size), spikes=spikes, end_speed=float(w[-1]),
        time=t, speed=w, fitted=_model(t, parameters, scales), began=began, remarks=tuple(remarks),
    )  # fmt: skip


_WORDS = {"constant": "dry friction", "linear": "viscous drag", "quadratic": "windage"}


def _indistinct(value: Array, low: Array, covariance: Array) -> list[str]:
    """Parts that this log cannot tell from nothing or from each other."""
    remarks = [
        f"{_WORDS[name]} cannot be told from none by this log" for name, end in zip(NAMES, low, strict=True) if end == 0.0
    ]  # fmt: skip
    spread = np.sqrt(np.maximum(np.diag(covariance), 0.0))
    for i, j in ((0, 1), (1, 2), (0, 2)):
        if (
            spread[i] * spread[j] > 0.0
            and abs(covariance[i, j]) / (spread[i] * spread[j]) > 0.98
            and value[i] * value[j] > 0.0
        ):
            remarks.append(
                f"{_WORDS[NAMES[i]]} and {_WORDS[NAMES[j]]} can hardly be told apart: their sum is known better than either"
            )
    return remarks


def predicted_stop(
    fit: CoastFit, start_speed: float, *, end_speed: float = 0.0, draws: int = 4000
) -> tuple[float, float, float]:
    """Coasting time from another speed, with its 95 % interval from the covariance of the fit.

    Parameters
    ----------
    fit : CoastFit
        The fit.
    start_speed, end_speed : float
        Speeds [rad/s].
    draws : int
        Draws of the coefficients.

    Returns
    -------
    (float, float, float)
        Best estimate, lower and upper end [s]; infinite where the model never stops.
    """
    generator = np.random.Generator(np.random.Philox(key=20260101))
    drawn = np.maximum(generator.multivariate_normal(fit.value, fit.covariance, draws, method="eigh"), 0.0)
    times = np.sort(
        stopping_time(
            1.0, start_speed, end_speed=end_speed, constant=drawn[:, 0], linear=drawn[:, 1], quadratic=drawn[:, 2]
        )
    )
    best = float(
        stopping_time(
            1.0, start_speed, end_speed=end_speed, constant=fit.value[0], linear=fit.value[1], quadratic=fit.value[2]
        )
    )
    return best, float(min(times[int(0.025 * draws)], best)), float(max(times[int(0.975 * draws)], best))
