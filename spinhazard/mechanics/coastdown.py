"""Coasting down against dry friction, viscous drag and windage: J dω/dt = −(a + b ω + c ω²).

One form for every case, without cancellation and without asking which coefficient is zero (derivation in
docs/methods/coastdown.md):

    u = (ω₀ − ω₁) / (2a + b(ω₀ + ω₁) + 2c ω₀ω₁),  Δ = 4ac − b²,  t = 2 J u φ(Δ u²)
    φ(z) = atan(√z)/√z for z > 0, artanh(√−z)/√−z for z < 0, 1 − z/3 + z²/5 − … near 0
"""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from spinhazard.mechanics.arrays import Array, not_negative, positive
from spinhazard.mechanics.formula import formula

_SYMBOLS = {
    "inertia": "J",
    "start_speed": "omega_0",
    "end_speed": "omega_1",
    "constant": "a",
    "linear": "b",
    "quadratic": "c",
}
_NEAR_ZERO = 1e-3  # below it four terms of the series are exact to 1e-16
_WELL_CONDITIONED = 1e-4  # share of the logarithm that must be left after the subtraction in the angle's closed form
_SAME_TORQUE = 1e-17  # relative change of the torque that no digit of the result sees
_NODES, _WEIGHTS = np.polynomial.legendre.leggauss(48)
_CHUNK = 4096  # entries integrated at once, to bound the memory of the quadrature


def _checked(constant: ArrayLike, linear: ArrayLike, quadratic: ArrayLike) -> tuple[Array, Array, Array]:
    return (
        not_negative("constant", constant, "N m"), not_negative("linear", linear, "N m s"), not_negative("quadratic", quadratic, "N m s²")
    )  # fmt: skip


@formula(equation="see method: coastdown", unit="s", symbols=_SYMBOLS, source="spinhazard-methods coastdown")
def stopping_time(
    inertia: ArrayLike,
    start_speed: ArrayLike,
    *,
    end_speed: ArrayLike,
    constant: ArrayLike,
    linear: ArrayLike,
    quadratic: ArrayLike,
) -> Array:
    """Time from one speed down to another under drag alone.

    Parameters
    ----------
    inertia : array_like
        Moment of inertia [kg m²], > 0.
    start_speed, end_speed : array_like
        Speeds [rad/s], >= 0.
    constant, linear, quadratic : array_like
        Drag: a [N m], b [N m s], c [N m s²], >= 0.

    Returns
    -------
    ndarray
        Time [s]; infinite where the end speed is never reached, 0 where the start is not above the end.

    Raises
    ------
    ValueError
        An argument is negative, or the inertia is not positive.

    Examples
    --------
    >>> print(f"{stopping_time(1.9, 155.0, end_speed=0.0, constant=3.1, linear=0.002, quadratic=0.0041):.10f}")
    23.3699599300
    """  # noqa: DOC502
    a, b, c = _checked(constant, linear, quadratic)
    start, end = not_negative("start_speed", start_speed, "rad/s"), not_negative("end_speed", end_speed, "rad/s")
    drop = np.maximum(start - end, 0.0)
    with np.errstate(divide="ignore", invalid="ignore", over="ignore"):
        denominator = 2.0 * a + b * (start + end) + 2.0 * c * start * end
        u = drop / denominator
        z = (4.0 * a * c - b * b) * u * u
        at_start, at_end = a + b * start + c * start * start, a + b * end + c * end * end
        time = (
            2.0
            * positive("inertia", inertia, "kg m²")
            * u
            * _phi(z, 4.0 * at_start * at_end / (denominator * denominator))
        )
    return np.where(drop == 0.0, 0.0, np.where(at_end == 0.0, np.inf, time))


def _phi(z: Array, one_plus_z: Array) -> Array:
    """φ(z); for z near −1 the distance from −1 comes from the torques, where it does not cancel."""
    root = np.sqrt(np.abs(z))
    negative = 0.5 * np.log1p(2.0 * root * (1.0 + root) / one_plus_z) / root
    series = 1.0 + z * (-1.0 / 3.0 + z * (0.2 + z * (-1.0 / 7.0 + z / 9.0)))
    return np.where(np.abs(z) < _NEAR_ZERO, series, np.where(z > 0.0, np.arctan(root) / root, negative))


@formula(
    equation="see method: coastdown",
    unit="rad/s",
    symbols={"time": "t"} | {name: symbol for name, symbol in _SYMBOLS.items() if name != "end_speed"},
    source="spinhazard-methods coastdown",
)
def speed_after(
    time: ArrayLike,
    inertia: ArrayLike,
    *,
    start_speed: ArrayLike,
    constant: ArrayLike,
    linear: ArrayLike,
    quadratic: ArrayLike,
) -> Array:
    """Speed after coasting for a time: the inverse of :func:`stopping_time`.

    Parameters
    ----------
    time : array_like
        Time [s], >= 0, may be infinite.
    inertia : array_like
        Moment of inertia [kg m²], > 0.
    start_speed : array_like
        Speed at time 0 [rad/s], >= 0.
    constant, linear, quadratic : array_like
        Drag: a [N m], b [N m s], c [N m s²], >= 0.

    Returns
    -------
    ndarray
        Speed [rad/s]; 0 from standstill on.

    Raises
    ------
    ValueError
        An argument is negative, or the inertia is not positive.

    Examples
    --------
    >>> print(f"{speed_after(47.5, 1.9, start_speed=155.0, constant=3.1, linear=0.0, quadratic=0.0):.6f}")
    77.500000
    """  # noqa: DOC502
    a, b, c = _checked(constant, linear, quadratic)
    start = not_negative("start_speed", start_speed, "rad/s")
    half = not_negative("time", time, "s") / (2.0 * positive("inertia", inertia, "kg m²"))
    with np.errstate(divide="ignore", invalid="ignore", over="ignore"):
        discriminant = 4.0 * a * c - b * b
        root = np.sqrt(np.abs(discriminant))
        angle = root * half
        z = discriminant * half * half
        series = half * (1.0 + z * (1.0 / 3.0 + z * (2.0 / 15.0 + z * 17.0 / 315.0)))
        u = np.where(np.abs(z) < 1e-5, series, np.where(z > 0.0, np.tan(angle), np.tanh(angle)) / root)
        end = (start - u * (2.0 * a + b * start)) / (1.0 + u * (b + 2.0 * c * start))
    stopped = ((discriminant > 0.0) & (angle >= np.pi / 2.0)) | np.isinf(half)
    nothing_brakes = (a == 0.0) & (b == 0.0) & (c == 0.0)
    kept = np.where(np.isnan(half), np.nan, start)  # a missing time or inertia stays missing where nothing brakes
    return np.where(nothing_brakes, kept, np.where(stopped, 0.0, np.clip(end, 0.0, start)))


@formula(equation="see method: coastdown", unit="rad", symbols=_SYMBOLS, source="spinhazard-methods coastdown")
def angle_turned(
    inertia: ArrayLike,
    start_speed: ArrayLike,
    *,
    end_speed: ArrayLike,
    constant: ArrayLike,
    linear: ArrayLike,
    quadratic: ArrayLike,
) -> Array:
    """Angle turned from one speed down to another under drag alone, J∫ω dω/T.

    Parameters
    ----------
    inertia : array_like
        Moment of inertia [kg m²], > 0.
    start_speed, end_speed : array_like
        Speeds [rad/s], >= 0.
    constant, linear, quadratic : array_like
        Drag: a [N m], b [N m s], c [N m s²], >= 0.

    Returns
    -------
    ndarray
        Angle [rad]; infinite where windage alone brakes a stop to zero.

    Raises
    ------
    ValueError
        An argument is negative, or the inertia is not positive.

    Examples
    --------
    >>> print(f"{angle_turned(1.9, 155.0, end_speed=0.0, constant=3.1, linear=0.0, quadratic=0.0):.6f}")
    7362.500000
    """  # noqa: DOC502
    checked = (
        *_checked(constant, linear, quadratic), not_negative("start_speed", start_speed, "rad/s"),
        not_negative("end_speed", end_speed, "rad/s"), positive("inertia", inertia, "kg m²"),
    )  # fmt: skip
    shape = np.broadcast_shapes(*(array.shape for array in checked))
    a, b, c, start, end, body = (np.broadcast_to(array, shape).ravel() for array in checked)
    end = np.minimum(end, start)
    with np.errstate(divide="ignore", invalid="ignore", over="ignore"):
        time = stopping_time(body, start, end_speed=end, constant=a, linear=b, quadratic=c)
        at_end = a + b * end + c * end * end
        logarithm = np.log1p((start - end) * (b + c * (start + end)) / at_end)
        rest = logarithm - b * time / body
        angle = body * rest / (2.0 * c)
        # a torque that does not change in sixteen digits is constant too: the quadrature has no scale to follow there
        steady = ((b == 0.0) & (c == 0.0)) | ((logarithm < _SAME_TORQUE) & (a > 0.0))
        frictionless = (a == 0.0) & ~steady
        angle = np.where(frictionless, _without_friction(body, start, end, b, c), angle)
        angle = np.where(steady, body * (start - end) * (start + end) / (2.0 * at_end), angle)
    hard = ~(steady | frictionless) & ~(rest > _WELL_CONDITIONED * logarithm) & (start > end) & np.isfinite(time)
    if hard.any():
        angle[hard] = _integrated(body[hard], start[hard], end[hard], a[hard], b[hard], c[hard])
    return np.where(start == end, 0.0, angle).reshape(shape)


def _without_friction(body: Array, start: Array, end: Array, b: Array, c: Array) -> Array:
    """A = 0: J∫dω/(b + cω), in a form that holds for c = 0 as well."""
    y = c * (start - end) / (b + c * end)
    over = np.where(np.abs(y) < 1e-8, 1.0 - y / 2.0, np.log1p(y) / y)
    return np.where(np.isinf(y), np.inf, body * (start - end) / (b + c * end) * over)


def _integrated(body: Array, start: Array, end: Array, a: Array, b: Array, c: Array) -> Array:
    """Gauss–Legendre where windage is a small correction; equal steps in the logarithm of a + bω follow the only scale left."""
    pieces = []
    for first in range(0, body.size, _CHUNK):
        part = slice(first, first + _CHUNK)
        low = (a[part] + b[part] * end[part])[:, None]
        slope = b[part][:, None]
        width = np.log1p(slope * (start[part] - end[part])[:, None] / low)
        step = width * (0.5 + 0.5 * _NODES)
        speed = end[part][:, None] + low * np.expm1(step) / slope
        torque = a[part][:, None] + slope * speed + c[part][:, None] * speed**2
        integrand = speed / torque * low * np.exp(step) / slope * width
        pieces.append(body[part] * 0.5 * (integrand @ _WEIGHTS))
    return np.concatenate(pieces)
