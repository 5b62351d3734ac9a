"""Units the trade writes, per kind of quantity. The only importer of pint, which sees one allow-listed name at a time.

A unit text is a product of known units with whole powers: ``N m s2``, ``kg/m3``, ``J/(kg K)``. Each field declares
its *kind*, not only its dimension: a torque is not an energy, and ``Hz`` as a speed means turns per second.
"""

from __future__ import annotations

import math
import re
from dataclasses import dataclass, field
from functools import lru_cache
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from collections.abc import Mapping

Dimension = tuple[int, int, int, int]  # powers of length, mass, time, temperature

UNIT_NAMES: dict[str, str] = {
    "m": "meter", "dm": "decimeter", "cm": "centimeter", "mm": "millimeter", "um": "micrometer", "µm": "micrometer", "μm": "micrometer",
    "km": "kilometer", "in": "inch", "inch": "inch", "inches": "inch", "ft": "foot", "mil": "thou", "thou": "thou",
    "yd": "yard", "mile": "mile",
    "kg": "kilogram", "g": "gram", "mg": "milligram", "t": "metric_ton", "lb": "pound", "lbs": "pound", "oz": "ounce",
    "slug": "slug",
    "s": "second", "sec": "second", "ms": "millisecond",
    "us": "microsecond", "µs": "microsecond", "min": "minute", "h": "hour", "hr": "hour", "d": "day",
    "N": "newton", "kN": "kilonewton", "MN": "meganewton", "mN": "millinewton", "lbf": "force_pound",
    "ozf": "force_ounce", "kgf": "kilogram_force", "kp": "kilogram_force", "kip": "kip",
    "J": "joule", "kJ": "kilojoule", "MJ": "megajoule", "Wh": "watt_hour", "kWh": "kilowatt_hour", "BTU": "Btu",
    "W": "watt", "kW": "kilowatt", "MW": "megawatt", "hp": "horsepower", "PS": "metric_horsepower",
    "Pa": "pascal", "kPa": "kilopascal", "MPa": "megapascal", "GPa": "gigapascal", "bar": "bar", "psi": "pound_force_per_square_inch",
    "ksi": "kilopound_force_per_square_inch",
    "K": "kelvin", "L": "liter", "l": "liter",
}  # fmt: skip
"""Spelling on nameplates and drawings to the name pint knows it by."""

JOINED: dict[str, str] = {
    "Nm": "N m", "kNm": "kN m", "Nmm": "N mm", "kgm2": "kg m2", "kgm^2": "kg m2", "kgm²": "kg m2", "kgfm2": "kgf m2",
    "lbft2": "lb ft2", "lbin2": "lb in2", "ftlbf": "ft lbf", "inlbf": "in lbf", "lbf-ft": "lbf ft", "ft-lbf": "ft lbf",
    "in-lbf": "in lbf", "lbf-in": "lbf in", "ozf-in": "ozf in", "lb-ft2": "lb ft2", "lb-in2": "lb in2", "kg-m2": "kg m2",
    "N-m": "N m", "fpm": "ft/min", "mph": "mile/h", '"': "in", "cc": "cm3",
}  # fmt: skip
"""Joined or hyphened spellings, and what they stand for."""

TURN = 2.0 * math.pi
ANGULAR_SPEED: dict[str, float] = {
    "rad/s": 1.0, "deg/s": math.pi / 180.0, "°/s": math.pi / 180.0,
    "rpm": TURN / 60.0, "RPM": TURN / 60.0, "r/min": TURN / 60.0, "rev/min": TURN / 60.0, "1/min": TURN / 60.0,
    "min-1": TURN / 60.0, "min^-1": TURN / 60.0, "min⁻¹": TURN / 60.0, "/min": TURN / 60.0,
    "Hz": TURN, "rps": TURN, "rev/s": TURN, "r/s": TURN, "kHz": TURN * 1e3, "krpm": TURN * 1e3 / 60.0,
}  # fmt: skip
"""Rotational speeds are converted here, never by a units library: dimensionally one turn is one radian."""
ANGLE: dict[str, float] = {
    "rad": 1.0, "deg": math.pi / 180.0, "°": math.pi / 180.0, "rev": TURN, "turn": TURN, "turns": TURN, "degrees": math.pi / 180.0,
}  # fmt: skip
RATIO: dict[str, float] = {"": 1.0, "%": 0.01, "percent": 0.01}
TEMPERATURE: dict[str, tuple[float, float]] = {
    "K": (1.0, 0.0), "degC": (1.0, 273.15), "°C": (1.0, 273.15), "C": (1.0, 273.15), "degF": (5.0 / 9.0, 459.67 * 5.0 / 9.0),
    "°F": (5.0 / 9.0, 459.67 * 5.0 / 9.0),
}  # fmt: skip
TEMPERATURE_DIFFERENCE: dict[str, float] = {
    "K": 1.0, "degC": 1.0, "°C": 1.0, "C": 1.0, "degF": 5.0 / 9.0, "°F": 5.0 / 9.0,
}  # fmt: skip


@dataclass(frozen=True)
class Kind:
    """A kind of quantity: what a field means, and which units it takes.

    Attributes
    ----------
    name, what, example, si : str
        Name, name with its article, an example as text, the SI unit.
    dimension : Dimension or None
        Powers of length, mass, time and temperature; None where `table` is the whole list.
    table : mapping or None
        Closed list of units with their factors.
    refused : mapping
        Units refused although the dimension fits, with the reason.
    taken_as : mapping
        Units read as another one (kilogram-force in GD² is a weight written for a mass).
    """

    name: str
    what: str
    example: str
    si: str
    dimension: Dimension | None = None
    table: Mapping[str, float] | None = None
    refused: Mapping[str, str] = field(default_factory=dict)
    taken_as: Mapping[str, str] = field(default_factory=dict)


_ENERGY_UNITS = ("J", "kJ", "MJ", "Wh", "kWh", "BTU")
_NOT_TORQUE = dict.fromkeys(_ENERGY_UNITS, "this is a unit of energy; a torque is written in N m or lbf ft")
_NOT_ENERGY = dict.fromkeys(
    ("N", "kN", "MN", "mN", "kgf", "kp"), "newton metre is written for torque; an energy is written in J"
)

KINDS: dict[str, Kind] = {
    kind.name: kind
    for kind in (
        Kind("length", "a length", "10 mm", "m", (1, 0, 0, 0)),
        Kind("area", "an area", "2 m2", "m²", (2, 0, 0, 0)),
        Kind("mass", "a mass", "45 kg", "kg", (0, 1, 0, 0)),
        Kind("time", "a time", "3 s", "s", (0, 0, 1, 0)),
        Kind("angular speed", "a rotational speed", "1480 rpm", "rad/s", table=ANGULAR_SPEED),
        Kind("speed", "a speed along a line", "30 m/s", "m/s", (1, 0, -1, 0)),
        Kind("angle", "an angle", "90 deg", "rad", table=ANGLE),
        Kind("ratio", "a plain number", "1.5", "", table=RATIO),
        Kind("inertia", "a moment of inertia", "1.9 kg m2", "kg m²", (2, 1, 0, 0)),
        Kind("gd2", "GD² (weight times the square of the diameter of gyration)", "7.6 kgf m2", "kg m²", (2, 1, 0, 0),
             taken_as={"kgf": "kg", "kp": "kg"}),
        Kind("wk2", "WK² (weight times the square of the radius of gyration)", "45 lb ft2", "kg m²", (2, 1, 0, 0),
             taken_as={"lbf": "lb", "ozf": "oz", "kgf": "kg"}),
        Kind("density", "a density", "7850 kg/m3", "kg/m³", (-3, 1, 0, 0)),
        Kind("force", "a force", "500 N", "N", (1, 1, -2, 0)),
        Kind("torque", "a torque", "180 N m", "N m", (2, 1, -2, 0), refused=_NOT_TORQUE),
        Kind("viscous drag", "a torque per rotational speed", "0.002 N m s", "N m s", (2, 1, -1, 0), refused=_NOT_TORQUE),
        Kind("windage", "a torque per rotational speed squared", "0.0041 N m s2", "N m s²", (2, 1, 0, 0)),
        Kind("energy", "an energy", "120 kJ", "J", (2, 1, -2, 0), refused=_NOT_ENERGY),
        Kind("power", "a power", "14 kW", "W", (2, 1, -3, 0)),
        Kind("stress", "a stress", "400 MPa", "Pa", (-1, 1, -2, 0)),
        Kind("specific heat", "a specific heat", "490 J/(kg K)", "J/(kg K)", (2, 0, -2, -1)),
        Kind("temperature", "a temperature", "40 degC", "K", (0, 0, 0, 1)),
        Kind("temperature difference", "a temperature difference", "150 K", "K", table=TEMPERATURE_DIFFERENCE),
        Kind("unbalance", "an unbalance (mass times distance)", "0.5 kg m", "kg m", (1, 1, 0, 0)),
    )
}  # fmt: skip

_POWER = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻", "0123456789-")
_FACTOR = re.compile(r"([A-Za-zµμ]+)(?:\^|\*\*)?(-?[1-6])?\Z")


class UnitRefused(ValueError):  # noqa: N818  (reads as what happened)
    """A unit that is unknown or does not fit the kind; the reason is its text, `hint` says what to write instead."""

    def __init__(self, reason: str, hint: str = "") -> None:
        super().__init__(reason)
        self.hint = hint


@lru_cache(maxsize=1)
def _registry() -> Any:
    import pint  # noqa: PLC0415  (0.4 s; only when a value is read)

    return pint.UnitRegistry()


@lru_cache(maxsize=256)
def _unit(spelling: str) -> tuple[float, Dimension]:
    """Factor to SI and dimension of one allow-listed spelling."""
    name = UNIT_NAMES[spelling]
    registry = _registry()
    factor, _ = registry.get_base_units(name)
    powers = registry.get_dimensionality(name)
    axes = ("[length]", "[mass]", "[time]", "[temperature]")
    length, mass, time, temperature = (round(float(powers.get(axis, 0))) for axis in axes)
    return float(factor), (length, mass, time, temperature)


def _factors(text: str) -> list[tuple[str, int]]:
    """Split ``J/(kg K)`` into [("J", 1), ("kg", -1), ("K", -1)].

    Parameters
    ----------
    text : str
        Unit text; products by space, ``·`` or ``*``, one ``/`` at most.

    Returns
    -------
    list of (str, int)
        Spellings and powers.

    Raises
    ------
    UnitRefused
        The text is no product of known units.
    """
    text = JOINED.get(text.strip(), text.strip())
    above, slash, below = text.partition("/")
    if "/" in below:
        raise UnitRefused(f'"{text}" has more than one "/"', 'write the units below the line in brackets, "J/(kg K)"')
    below = below.strip()
    if below.startswith("(") and below.endswith(")"):
        below = below[1:-1]
    if slash and not below:
        raise UnitRefused(f'nothing stands behind "/" in "{text}"')
    factors: list[tuple[str, int]] = []
    for part, sign in ((above, 1), (below, -1)):
        for token in part.replace("**", "^").replace("·", " ").replace("⋅", " ").replace("*", " ").split():
            for atom in JOINED.get(token, token).split():
                match = _FACTOR.match(atom.translate(_POWER))
                if match is None or match[1] not in UNIT_NAMES:
                    raise UnitRefused(f'the unit "{atom}" is not known here', _nearest(atom))
                factors.append((match[1], sign * int(match[2] or 1)))
    return factors


def _nearest(atom: str) -> str:
    import difflib  # noqa: PLC0415  (only on the way to a message)

    near = difflib.get_close_matches(atom, [*UNIT_NAMES, *ANGULAR_SPEED], n=1, cutoff=0.5)
    return f'the nearest known unit is "{near[0]}"' if near else ""


@lru_cache(maxsize=4096)
def factor_to_si(unit: str, kind_name: str) -> float:
    """Factor from a unit text to the SI unit of a kind.

    Parameters
    ----------
    unit : str
        Unit as written.
    kind_name : str
        Key of `KINDS`.

    Returns
    -------
    float
        SI value of one such unit.

    Raises
    ------
    UnitRefused
        The unit is unknown, or measures something else.
    """
    kind = KINDS[kind_name]
    if kind.table is not None:
        return _listed_factor(unit, kind)
    factor, dimension = 1.0, [0, 0, 0, 0]
    for spelling, power in _factors(unit):
        if spelling in kind.refused and not (kind.name == "energy" and _is_us_customary(unit)):
            raise UnitRefused(f'"{unit}": {kind.refused[spelling]}')
        one, axes = _unit(kind.taken_as.get(spelling, spelling))
        factor *= one**power
        dimension = [total + power * axis for total, axis in zip(dimension, axes, strict=True)]
    if tuple(dimension) != kind.dimension:
        raise UnitRefused(
            f'"{unit}" is the unit of {_what_it_measures(unit, tuple(dimension))}', _trade_hint(unit, kind)
        )
    return factor


def _is_us_customary(unit: str) -> bool:
    return "lbf" in unit or "ozf" in unit


def _listed_factor(unit: str, kind: Kind) -> float:
    table = kind.table or {}
    spelling = " ".join(unit.split())
    spelling = spelling.replace(" /", "/").replace("/ ", "/")
    if spelling in table:
        return table[spelling]
    if kind.name == "angular speed" and spelling in {"1/s", "s-1", "s^-1", "/s"}:
        raise UnitRefused(f'"{unit}" may mean turns or radians per second', "write rad/s or rev/s")
    if kind.name == "ratio":
        raise UnitRefused(f'"{unit}": this field takes a plain number')
    try:
        dimension = dimension_of(unit)
    except UnitRefused as error:
        raise UnitRefused(
            f'"{unit}" is not known as a unit of {kind.what.removeprefix("a ").removeprefix("an ")}', error.hint
        ) from None
    raise UnitRefused(f'"{unit}" is the unit of {_what_it_measures(unit, dimension)}')


def dimension_of(unit: str) -> Dimension:
    """Powers of length, mass, time and temperature of a unit text.

    Parameters
    ----------
    unit : str
        Unit as written.

    Returns
    -------
    Dimension
        The four powers.

    Raises
    ------
    UnitRefused
        A unit in it is not known.
    """  # noqa: DOC502  (raised by _factors)
    powers = [0, 0, 0, 0]
    for spelling, power in _factors(unit):
        powers = [total + power * axis for total, axis in zip(powers, _unit(spelling)[1], strict=True)]
    length, mass, time, temperature = powers
    return length, mass, time, temperature


def _what_it_measures(unit: str, dimension: tuple[int, ...]) -> str:
    if " ".join(unit.split()) in ANGULAR_SPEED:
        return "a rotational speed"
    for kind in KINDS.values():
        if kind.dimension == dimension and kind.name not in {"gd2", "wk2", "windage"}:
            return kind.what
    return "something else"


def _trade_hint(unit: str, kind: Kind) -> str:
    if kind.name == "inertia" and ("kgf" in unit or "kp" in unit):
        return "GD² in kgf m2 has a field of its own: gd2"
    if kind.name in {"torque", "force", "energy"} and "lb" in unit and "lbf" not in unit:
        return "lb is a mass here; write lbf for pound-force"
    if kind.name == "mass" and unit.strip() in {"lbf", "kgf", "N"}:
        return "write lb or kg for a mass"
    return ""


def to_si(number: float, unit: str, kind_name: str) -> float:
    """SI value of a number with a unit.

    Parameters
    ----------
    number : float
        Number as written.
    unit : str
        Unit as written.
    kind_name : str
        Key of `KINDS`.

    Returns
    -------
    float
        Value in the SI unit of the kind.

    Raises
    ------
    UnitRefused
        The unit is unknown, or measures something else.
    """  # noqa: DOC502  (raised by factor_to_si)
    if kind_name == "temperature":
        spelling = unit.strip()
        if spelling not in TEMPERATURE:
            factor_to_si(unit, kind_name)
        scale, offset = TEMPERATURE[spelling]
        return number * scale + offset
    return number * factor_to_si(unit, kind_name)
