"""Types of the fields: stated quantities by kind, words, identifiers, dates. Each refuses what it cannot mean."""

from __future__ import annotations

import math
from collections.abc import Callable
from datetime import date, datetime
from typing import Annotated, Any

from pydantic import AfterValidator, BaseModel, BeforeValidator, ConfigDict, PlainValidator, StringConstraints

from spinhazard.quantity.notation import NotationError, parse_stated
from spinhazard.quantity.stated import SOURCE_WORDS, Stated
from spinhazard.quantity.units import KINDS

VALUE_TABLE = ("value", "source", "note", "instrument", "calibration_due")
LONGEST_NOTE = 500


class Fault(ValueError):  # noqa: N818  (reads as what happened)
    """A statement that cannot hold; `field` is the path below the model that found it."""

    def __init__(
        self, problem: str, *, field: str = "", stated: object = None, accepted: str = "", nearest: str = ""
    ) -> None:
        super().__init__(problem)
        self.problem = problem
        self.field = field
        self.stated = stated
        self.accepted = accepted
        self.nearest = nearest


class Model(BaseModel):
    """Base of all statement models: frozen, nothing unknown, no silent conversion between types."""

    # built when first used, and then once for the whole file: each model on its own would double the start-up time
    model_config = ConfigDict(
        frozen=True, extra="forbid", arbitrary_types_allowed=True, populate_by_name=True, defer_build=True
    )


def _nearest(word: object, words: tuple[str, ...]) -> str:
    import difflib  # noqa: PLC0415  (only on the way to a message)

    near = difflib.get_close_matches(str(word)[:80], words, n=1, cutoff=0.5)
    return f'"{near[0]}"' if near else ""


def plain_text(value: str) -> str:
    """Refuse control characters, which would reach terminals and papers.

    Parameters
    ----------
    value : str
        Text as written.

    Returns
    -------
    str
        The same text, line ends made spaces, outer spaces removed.

    Raises
    ------
    Fault
        A control or unassigned character is in it.
    """
    text = " ".join(value.split())
    for character in text:
        if not character.isprintable() and character not in "\u200c\u200d\u200e\u200f":
            raise Fault(f"holds the control character U+{ord(character):04X}", stated=value, accepted="plain text")
    return text


def _identifier(value: str) -> str:
    for character in "/|":
        if character in value:
            raise Fault(f'holds "{character}"', stated=value, accepted='a short name without "/" and "|"')
    return value


Text = Annotated[str, StringConstraints(strict=True, max_length=LONGEST_NOTE), AfterValidator(plain_text)]
Name = Annotated[str, StringConstraints(strict=True, min_length=1, max_length=120), AfterValidator(plain_text)]
Identifier = Annotated[
    str,
    StringConstraints(strict=True, min_length=1, max_length=60),
    AfterValidator(plain_text),
    AfterValidator(_identifier),
]


def _file_name(value: str) -> str:
    if value in {".", ".."} or any(mark in value for mark in "/\\:") or value.startswith("~"):
        raise Fault(
            "not the name of a file beside this one", stated=value, accepted="a plain file name, without folders"
        )
    return value


FileName = Annotated[
    str,
    StringConstraints(strict=True, min_length=1, max_length=200),
    AfterValidator(plain_text),
    AfterValidator(_file_name),
]


def _day(value: Any) -> Any:
    if isinstance(value, datetime) or not isinstance(value, (date, str)):
        raise Fault("not a date", stated=value, accepted="a date such as 2026-11-20")
    if isinstance(value, str):
        try:
            return date.fromisoformat(value)
        except ValueError:
            raise Fault("not a date", stated=value, accepted="a date such as 2026-11-20") from None
    return value


Day = Annotated[date, BeforeValidator(_day)]


def stated_quantity(kind: str, *, above: float | None = None, at_least: float | None = None) -> Callable[[Any], Stated]:
    """Reader of one field: text, number or value table to :class:`Stated`.

    Parameters
    ----------
    kind : str
        Kind of quantity the field declares.
    above, at_least : float, optional
        Lower limit of the value and of its spread [SI], exclusive or inclusive.

    Returns
    -------
    callable
        Validator for a pydantic field.
    """

    def read(raw: Any) -> Stated:
        if isinstance(raw, Stated):
            return raw
        table = raw if isinstance(raw, dict) else {"value": raw}
        try:
            stated = parse_stated(table.get("value", ""), kind)
        except NotationError as error:
            raise Fault(error.problem, stated=table.get("value", raw), accepted=error.accepted) from None
        _refuse_below(stated, above, at_least)
        return _with_origin(stated, table) if isinstance(raw, dict) else stated

    return read


def _refuse_below(stated: Stated, above: float | None, at_least: float | None) -> None:
    limit = at_least if above is None else above
    if limit is None:
        return
    what = KINDS[stated.kind].what
    # the lower end of a normal spread is only its k-fold; sampling keeps draws at the limit
    low = stated.low if stated.coverage_factor is None else stated.value
    accepted = f"{what} {'above' if above is not None else 'of at least'} {limit:g}"

    def outside(number: float) -> bool:
        return number <= limit if above is not None else number < limit

    if outside(stated.value):
        problem = "zero cannot be meant" if stated.value == 0.0 else "a negative value cannot be meant"
        raise Fault(problem, stated=stated.text, accepted=accepted)
    if outside(low):
        raise Fault("the stated spread reaches down to zero or below", stated=stated.text, accepted=accepted)


def _with_origin(stated: Stated, table: dict[str, Any]) -> Stated:
    for key in table:
        if key not in VALUE_TABLE:
            raise Fault(
                f'unknown field "{key}"',
                field=str(key),
                accepted=", ".join(VALUE_TABLE),
                nearest=_nearest(key, VALUE_TABLE),
            )
    texts: dict[str, str] = {}
    for key in ("source", "note", "instrument"):
        value = table.get(key, "")
        if not isinstance(value, str) or len(value) > LONGEST_NOTE:
            raise Fault(
                "not a short text", field=key, stated=value, accepted=f"text of at most {LONGEST_NOTE} characters"
            )
        texts[key] = plain_text(value)
    words = tuple(SOURCE_WORDS)
    if "source" in table and texts["source"].lower() not in SOURCE_WORDS:
        raise Fault(
            "not a known kind of source", field="source", stated=texts["source"], accepted=", ".join(words),
            nearest=_nearest(texts["source"].lower(), words),
        )  # fmt: skip
    due = table.get("calibration_due")
    return Stated(
        value=stated.value, kind=stated.kind, text=stated.text, half_width=stated.half_width,
        coverage_factor=stated.coverage_factor, source=texts["source"], source_class=SOURCE_WORDS.get(texts["source"].lower()),
        note=texts["note"], instrument=texts["instrument"], calibration_due=None if due is None else _day(due),
    )  # fmt: skip


Length = Annotated[Stated, PlainValidator(stated_quantity("length", above=0.0))]
LengthOrZero = Annotated[Stated, PlainValidator(stated_quantity("length", at_least=0.0))]
Mass = Annotated[Stated, PlainValidator(stated_quantity("mass", above=0.0))]
Density = Annotated[Stated, PlainValidator(stated_quantity("density", above=0.0))]
Inertia = Annotated[Stated, PlainValidator(stated_quantity("inertia", above=0.0))]
Gd2 = Annotated[Stated, PlainValidator(stated_quantity("gd2", above=0.0))]
Wk2 = Annotated[Stated, PlainValidator(stated_quantity("wk2", above=0.0))]
AngularSpeed = Annotated[Stated, PlainValidator(stated_quantity("angular speed", above=0.0))]
AngularSpeedOrZero = Annotated[Stated, PlainValidator(stated_quantity("angular speed", at_least=0.0))]
TimeOrZero = Annotated[Stated, PlainValidator(stated_quantity("time", at_least=0.0))]
Time = Annotated[Stated, PlainValidator(stated_quantity("time", above=0.0))]
Torque = Annotated[Stated, PlainValidator(stated_quantity("torque", above=0.0))]
TorqueOrZero = Annotated[Stated, PlainValidator(stated_quantity("torque", at_least=0.0))]
ViscousDrag = Annotated[Stated, PlainValidator(stated_quantity("viscous drag", at_least=0.0))]
Windage = Annotated[Stated, PlainValidator(stated_quantity("windage", at_least=0.0))]
Power = Annotated[Stated, PlainValidator(stated_quantity("power", above=0.0))]
Energy = Annotated[Stated, PlainValidator(stated_quantity("energy", above=0.0))]
Ratio = Annotated[Stated, PlainValidator(stated_quantity("ratio", above=0.0))]
RatioOrZero = Annotated[Stated, PlainValidator(stated_quantity("ratio", at_least=0.0))]
Angle = Annotated[Stated, PlainValidator(stated_quantity("angle", above=0.0))]
Stress = Annotated[Stated, PlainValidator(stated_quantity("stress", above=0.0))]
Force = Annotated[Stated, PlainValidator(stated_quantity("force", above=0.0))]
LineSpeed = Annotated[Stated, PlainValidator(stated_quantity("speed", above=0.0))]
SpecificHeat = Annotated[Stated, PlainValidator(stated_quantity("specific heat", above=0.0))]
TemperatureDifference = Annotated[Stated, PlainValidator(stated_quantity("temperature difference", above=0.0))]
Unbalance = Annotated[Stated, PlainValidator(stated_quantity("unbalance", at_least=0.0))]


def finite(value: float) -> bool:
    """Whether a number read from a file can be computed with.

    Parameters
    ----------
    value : float
        Any number.

    Returns
    -------
    bool
        False for NaN, infinities and magnitudes beyond 1e30.
    """
    return math.isfinite(value) and abs(value) <= 1e30
