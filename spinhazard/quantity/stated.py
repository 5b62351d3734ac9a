"""A stated value: what the assessor wrote, read as one SI number with its spread and where it comes from."""

from __future__ import annotations

import math
from dataclasses import dataclass
from datetime import date
from typing import Literal

SourceClass = Literal["measured", "nameplate", "drawing", "calculated", "estimated"]

SOURCE_WORDS: dict[str, SourceClass] = {
    "measured": "measured",
    "weighed": "measured",
    "timed": "measured",
    "counted": "measured",
    "seen": "measured",
    "tested": "measured",
    "nameplate": "nameplate",
    "marking": "nameplate",
    "label": "nameplate",
    "drawing": "drawing",
    "data sheet": "drawing",
    "manual": "drawing",
    "maker": "drawing",
    "handbook": "drawing",
    "calculated": "calculated",
    "computed": "calculated",
    "estimated": "estimated",
    "assumed": "estimated",
    "guessed": "estimated",
}
"""Words of the trade for where a value comes from, and the class each belongs to."""


@dataclass(frozen=True, slots=True)
class Stated:
    """One stated value.

    Attributes
    ----------
    value : float
        Best estimate in SI units.
    kind : str
        Kind of quantity ("length", "angular speed", …).
    text : str
        The value as written.
    half_width : float or None
        Half-width of the stated spread in SI units; None where no spread is stated.
    coverage_factor : float or None
        Stated k of a normal spread; None for a rectangular one.
    source : str
        Source as written; empty where none is stated.
    source_class : SourceClass or None
        Class the source belongs to.
    note, instrument : str
        As written.
    calibration_due : date or None
        Day until which the instrument's calibration holds.
    """

    value: float
    kind: str
    text: str
    half_width: float | None = None
    coverage_factor: float | None = None
    source: str = ""
    source_class: SourceClass | None = None
    note: str = ""
    instrument: str = ""
    calibration_due: date | None = None

    @property
    def low(self) -> float:
        """Lower end of the stated spread [SI]; the value itself where none is stated."""
        return self.value - (self.half_width or 0.0)

    @property
    def high(self) -> float:
        """Upper end of the stated spread [SI]; the value itself where none is stated."""
        return self.value + (self.half_width or 0.0)

    @property
    def standard_uncertainty(self) -> float:
        """Standard uncertainty of the stated spread [SI] (JCGM 100:2008, 4.3.3 and 4.3.7)."""
        if not self.half_width:
            return 0.0
        if self.coverage_factor is not None:
            return self.half_width / self.coverage_factor
        return self.half_width / math.sqrt(3.0)
