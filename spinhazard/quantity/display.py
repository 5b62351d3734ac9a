"""SI number to text: sensible figures, in SI or US customary units."""

from __future__ import annotations

import math
from datetime import date
from typing import Literal, NamedTuple

System = Literal["si", "us"]
FIGURES = 4


class _Step(NamedTuple):
    at_least: float  # smallest magnitude [SI] shown in this unit
    unit: str
    factor: float  # SI value of one such unit


_SI: dict[str, tuple[_Step, ...]] = {
    "m": (_Step(1.0, "m", 1.0), _Step(0.0, "mm", 1e-3)),
    "kg": (_Step(0.1, "kg", 1.0), _Step(0.0, "g", 1e-3)),
    "s": (
        _Step(172800.0, "d", 86400.0),
        _Step(5400.0, "h", 3600.0),
        _Step(600.0, "min", 60.0),
        _Step(0.1, "s", 1.0),
        _Step(0.0, "ms", 1e-3),
    ),
    "rad/s": (_Step(0.0, "rpm", 2.0 * math.pi / 60.0),),
    "J": (_Step(1e6, "MJ", 1e6), _Step(1e3, "kJ", 1e3), _Step(0.0, "J", 1.0)),
    "W": (_Step(1e6, "MW", 1e6), _Step(1e3, "kW", 1e3), _Step(0.0, "W", 1.0)),
    "Pa": (_Step(1e9, "GPa", 1e9), _Step(1e5, "MPa", 1e6), _Step(0.0, "Pa", 1.0)),
    "N": (_Step(1e3, "kN", 1e3), _Step(0.0, "N", 1.0)),
    "rad": (_Step(0.0, "deg", math.pi / 180.0),),
}
_US: dict[str, tuple[_Step, ...]] = {
    "m": (_Step(3.048, "ft", 0.3048), _Step(0.0, "in", 0.0254)),
    "kg": (_Step(0.0, "lb", 0.45359237),),
    "s": _SI["s"],
    "rad/s": _SI["rad/s"],
    "m/s": (_Step(0.0, "ft/min", 0.3048 / 60.0),),
    "J": (_Step(0.0, "ft lbf", 1.3558179483314004),),
    "kg m²": (_Step(0.0, "lb ft²", 0.042140110093804),),
    "kg m²/s": (_Step(0.0, "lb ft²/s", 0.042140110093804),),
    "N m": (_Step(1.3558179483314004, "lbf ft", 1.3558179483314004), _Step(0.0, "lbf in", 0.1129848290276167)),
    "N": (_Step(0.0, "lbf", 4.4482216152605),),
    "Pa": (_Step(6.894757293168e6, "ksi", 6.894757293168e6), _Step(0.0, "psi", 6894.757293168)),
    "W": (_Step(0.0, "hp", 745.6998715822702),),
    "kg/m³": (_Step(0.0, "lb/ft³", 16.018463373960142),),
    "rad": _SI["rad"],
    "K": (_Step(0.0, "degF", 5.0 / 9.0),),
}


def _step(value: float, unit: str, system: System) -> _Step:
    steps = (_US if system == "us" else _SI).get(unit)
    if steps is None:
        return _Step(0.0, unit, 1.0)
    return next((step for step in steps if abs(value) >= step.at_least * (1.0 - 1e-12)), steps[-1])


def number(value: float, *, figures: int = FIGURES) -> str:
    """A number with a sensible count of figures, thousands left unseparated.

    Parameters
    ----------
    value : float
        Finite number.
    figures : int
        Significant figures.

    Returns
    -------
    str
        Decimal notation between 1e-4 and 1e6, powers of ten outside.

    Examples
    --------
    >>> number(60123.4), number(0.0421401), number(3.0), number(2.5e-7)
    ('60120', '0.04214', '3', '2.5e-07')
    """
    if value == 0.0:
        return "0"
    magnitude = math.floor(math.log10(abs(value)))
    if not -5 < magnitude < 7:
        return f"{value:.{figures}g}"
    rounded = round(value, figures - 1 - magnitude)
    text = f"{rounded:.{max(0, figures - 1 - magnitude)}f}"
    return text.rstrip("0").rstrip(".") if "." in text else text


def display(value: object, unit: str = "", *, system: System = "si", figures: int = FIGURES) -> str:
    """A fact or stated value as a person reads it.

    Parameters
    ----------
    value : float, str, bool or date
        Value in the SI unit `unit`, or a word.
    unit : str
        SI unit, as facts declare it.
    system : "si" or "us"
        Units shown.
    figures : int
        Significant figures.

    Returns
    -------
    str
        Text such as ``60.12 kJ``, ``never``, ``3 min``.

    Examples
    --------
    >>> display(60123.4, "J"), display(155.0, "rad/s"), display(float("inf"), "s")
    ('60.12 kJ', '1480 rpm', 'never')
    >>> display(0.42, "m"), display(0.42, "m", system="us")
    ('420 mm', '16.54 in')
    """
    if isinstance(value, bool):
        return "yes" if value else "no"
    if isinstance(value, date):
        return value.isoformat()
    if not isinstance(value, (int, float)):
        return str(value)
    if math.isnan(value):
        return "not known"
    if math.isinf(value):
        return "never" if unit == "s" else "without limit"
    step = _step(value, unit, system)
    text = number(value / step.factor, figures=figures)
    return f"{text} {step.unit}" if step.unit else text


def display_interval(value: float, low: float, high: float, unit: str, *, system: System = "si") -> str:
    """Best estimate with its interval, all in the unit that fits the best estimate.

    Parameters
    ----------
    value, low, high : float
        Best estimate and ends of the coverage interval [SI].
    unit : str
        SI unit.
    system : "si" or "us"
        Units shown.

    Returns
    -------
    str
        Text such as ``60.12 kJ (57.02 to 63.3)``.

    Examples
    --------
    >>> display_interval(60123.4, 57020.1, 63300.9, "J")
    '60.12 kJ (57.02 to 63.3)'
    """
    best = display(value, unit, system=system)
    if not math.isfinite(value) or (low == value and high == value):
        return best
    factor = _step(value, unit, system).factor
    ends = [number(end / factor) if math.isfinite(end) else display(end, unit) for end in (low, high)]
    return f"{best} ({ends[0]} to {ends[1]})"
