"""Our notation of stated values: ``"45 kg ± 5 %"``, ``"40 kg to 50 kg"``, ``"3 s ± 0.2 s (k=2)"``.

::

    value     = amount [ tolerance ] [ "(k=" number ")" ] | amount " to " amount
    amount    = number [ unit ]                       the unit may be left to the second amount
    tolerance = ( "±" | "+/-" | "+-" ) number ( "%" | unit )
    number    = digits [ "." digits ] [ "e" digits ] | [ digits " " ] digits "/" digits        (1 1/2 in)

No decimal comma, no thousands separator, nothing non-finite, no expression: what is not in this grammar is refused.
"""

from __future__ import annotations

import math
import re

from spinhazard.quantity.stated import Stated
from spinhazard.quantity.units import KINDS, Kind, UnitRefused, to_si

LONGEST_TEXT = 100
LARGEST_MAGNITUDE = 1e30
_NUMBER = re.compile(
    r"[+-]?(?:\d{1,15} \d{1,4}/\d{1,4}|\d{1,4}/\d{1,4}|(?:\d{1,20}(?:\.\d{0,20})?|\.\d{1,20})(?:[eE][+-]?\d{1,3})?)"
)
_TOLERANCE = re.compile(r"±|\+\s?/\s?-|\+-")
_COVERAGE = re.compile(r"[(,;]?\s?\bk\s?=\s?(\d{1,2}(?:\.\d{1,4})?)\s?\)?\Z")
_COMMA = re.compile(r"\d,\d")
_SPACED = re.compile(r"\A[+-]?\d{1,3} \d{3}(?![\d/])")


class NotationError(ValueError):
    """Text that is no stated value of the kind asked for.

    Attributes
    ----------
    problem, accepted : str
        What is wrong, and what the field takes.
    """

    def __init__(self, problem: str, kind: Kind) -> None:
        super().__init__(problem)
        self.problem = problem
        self.accepted = (
            f"{kind.what}, for example {kind.example if kind.name == 'ratio' else chr(34) + kind.example + chr(34)}"
        )


def parse_stated(text: str | float, kind_name: str) -> Stated:
    """Read one stated value.

    Parameters
    ----------
    text : str or number
        What was written; a bare number only for kinds without unit.
    kind_name : str
        Kind of quantity the field declares; "_" may stand for the space.

    Returns
    -------
    Stated
        Value in SI units with its spread.

    Raises
    ------
    NotationError
        The text is not of the grammar, or of another kind.
    """
    kind = KINDS[kind_name.replace("_", " ")]
    if isinstance(text, bool) or not isinstance(text, (str, int, float)):
        raise NotationError("neither a text nor a number", kind)
    if not isinstance(text, str):
        return _bare_number(text, kind)
    if len(text) > LONGEST_TEXT:
        raise NotationError(f"longer than {LONGEST_TEXT} characters", kind)
    plain = " ".join(text.split())
    if not plain:
        raise NotationError("empty", kind)
    if _COMMA.search(plain):
        raise NotationError(
            "a comma between digits is not read: write a decimal point, and no thousands separator", kind
        )
    if _SPACED.match(plain):
        raise NotationError("a space between digits is not read: write the number without thousands separator", kind)
    try:
        return _spread_out(plain, text, kind)
    except UnitRefused as error:
        raise NotationError(str(error) + (f" ({error.hint})" if error.hint else ""), kind) from None


def _bare_number(number: float, kind: Kind) -> Stated:
    if kind.name != "ratio":
        raise NotationError("a number without unit is not guessed at: write value and unit as text", kind)
    if not math.isfinite(number) or abs(number) > LARGEST_MAGNITUDE:
        raise NotationError("not a finite number of usual size", kind)
    return Stated(value=float(number), kind=kind.name, text=repr(number))


def _spread_out(plain: str, text: str, kind: Kind) -> Stated:
    coverage = _COVERAGE.search(plain)
    k = None
    if coverage is not None:
        k = float(coverage[1])
        if not 1.0 <= k <= 5.0:
            raise NotationError("the coverage factor k is not between 1 and 5", kind)
        plain = plain[: coverage.start()].rstrip()
    first, mark, second = plain.partition(" to ")
    if mark:
        if k is not None:
            raise NotationError("a range takes no coverage factor k", kind)
        return _range(first, second, text, kind)
    pieces = _TOLERANCE.split(plain)
    if len(pieces) > 2:
        raise NotationError("more than one tolerance", kind)
    if len(pieces) == 1:
        if k is not None:
            raise NotationError("a coverage factor k without a tolerance", kind)
        number, unit = _amount(plain, kind)
        return Stated(value=_si(number, unit, kind), kind=kind.name, text=text)
    return _tolerance(pieces[0].strip(), pieces[1].strip(), k, text, kind)


def _range(first: str, second: str, text: str, kind: Kind) -> Stated:
    high_number, high_unit = _amount(second, kind)
    low_number, low_unit = _amount(first, kind)
    low, high = _si(low_number, low_unit or high_unit, kind), _si(high_number, high_unit, kind)
    if low > high:
        raise NotationError("the range runs downwards", kind)
    return Stated(value=(low + high) / 2.0, kind=kind.name, text=text, half_width=(high - low) / 2.0)


def _tolerance(amount: str, spread: str, k: float | None, text: str, kind: Kind) -> Stated:
    number, unit = _amount(amount, kind)
    width, width_unit = _amount(spread, kind)
    if width < 0.0:
        raise NotationError("a negative tolerance", kind)
    if width_unit == "%":
        value = _si(number, unit, kind)
        if kind.name == "temperature":
            raise NotationError("a tolerance in % of a temperature has no meaning: state it in K", kind)
        half_width = abs(value) * width / 100.0
    else:
        if unit and not width_unit and kind.name != "ratio":
            raise NotationError("the tolerance has no unit", kind)
        value = _si(number, unit or width_unit, kind)
        width_kind = KINDS["temperature difference"] if kind.name == "temperature" else kind
        half_width = _si(width, width_unit, width_kind)
    return Stated(value=value, kind=kind.name, text=text, half_width=half_width, coverage_factor=k)


def _amount(text: str, kind: Kind) -> tuple[float, str]:
    match = _NUMBER.match(text)
    if match is None:
        raise NotationError("no number at the start", kind)
    number = _number(match[0], kind)
    unit = text[match.end() :].strip()
    if unit[:1] in {".", ",", "+", "*"} or (unit[:1].isdigit() and not unit.startswith("1/")):
        raise NotationError(f'"{text[:40]}" is not one number with one unit', kind)
    return number, unit


def _number(digits: str, kind: Kind) -> float:
    whole, _, fraction = digits.rpartition(" ")
    if "/" in digits:
        above, _, below = (fraction or whole).partition("/")
        if float(below) == 0.0:
            raise NotationError("a fraction with nothing below the line", kind)
        part = float(above) / float(below)
        number = part if not whole else math.copysign(abs(float(whole)) + part, -1.0 if whole.startswith("-") else 1.0)
    else:
        number = float(digits)
    if not math.isfinite(number) or abs(number) > LARGEST_MAGNITUDE:
        raise NotationError("not a finite number of usual size", kind)
    return number


def _si(number: float, unit: str, kind: Kind) -> float:
    if not unit and kind.name != "ratio":
        raise NotationError("the unit is missing", kind)
    return to_si(number, unit, kind.name)
