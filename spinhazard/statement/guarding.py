"""Guards and their openings, as stated."""

from __future__ import annotations

from typing import Annotated, Literal, Self

from pydantic import AfterValidator, Field, model_validator

from spinhazard.statement.fields import (
    Angle,
    Fault,
    Identifier,
    Length,
    LengthOrZero,
    Model,
    Name,
    Stress,
    TimeOrZero,
)  # fmt: skip
from spinhazard.statement.materials import known_material

GuardKind = Literal["none", "fixed", "hinged", "interlocked", "light curtain", "two-hand", "enclosure", "rail"]


class Opening(Model):
    """An opening in a guard through which a finger, hand or arm could pass."""

    shape: Literal["slot", "square", "round"] = Field(description="form of the opening")
    size: Length = Field(description="smaller side of a slot, side of a square, diameter of a round opening")
    distance: LengthOrZero = Field(description="from the opening to the nearest moving part")
    length: Length | None = Field(None, description="longer side of a slot")


class Guard(Model):
    """What keeps people from the moving parts of one or more shafts."""

    id: Identifier = Field(description="name of the guard")
    covers: tuple[Identifier, ...] = Field(min_length=1, max_length=100, description="shafts behind this guard")
    kind: GuardKind = Field(description="kind of guard")
    distance: LengthOrZero | None = Field(None, description="from guard plane to the nearest moving part")
    intrusion: LengthOrZero | None = Field(
        None, description="how far a hand may be past the guard plane before it acts"
    )
    fastening: Literal["tool", "hand", "none"] | None = Field(None, description="what it takes to open a fixed guard")
    opening_time: TimeOrZero | None = Field(None, description="time to unfasten and open it")
    lock_release: Literal["none", "timer", "standstill sensor"] | None = Field(
        None, description="what releases the guard lock"
    )
    lock_timer: TimeOrZero | None = Field(None, description="time after which the lock is released")
    response_time: TimeOrZero | None = Field(None, description="from opening or interrupting to the stop command")
    resolution: Length | None = Field(None, description="smallest object a light curtain detects")
    height_above_floor: LengthOrZero | None = Field(None, description="of the lowest moving part behind it")
    material: Annotated[Name, AfterValidator(known_material)] | None = Field(None, description="material of the guard")
    thickness: Length | None = Field(None, description="thickness of the guard's wall")
    strength: Stress | None = Field(None, description="ultimate tensile strength of the guard's wall")
    span: Length | None = Field(None, description="free span of the guard's wall between supports")
    contains: bool | None = Field(None, strict=True, description="whether it is meant to hold what could come off")
    wheel_use: Literal["bench", "floor stand", "cylindrical", "surface", "cut-off", "top"] | None = Field(
        None, description="use of the abrasive wheel behind it"
    )
    exposed_angle: Angle | None = Field(None, description="angle of the abrasive wheel left open by its hood")
    work_rest_gap: LengthOrZero | None = Field(None, description="from work rest to abrasive wheel")
    tongue_gap: LengthOrZero | None = Field(None, description="from the hood's adjustable tongue to abrasive wheel")
    openings: tuple[Opening, ...] = Field((), alias="opening", max_length=100, description="openings in the guard")

    @model_validator(mode="after")
    def _each_shaft_once(self) -> Self:
        for shaft in self.covers:
            if self.covers.count(shaft) > 1:
                raise Fault("names a shaft twice", field="covers", stated=shaft, accepted="each shaft once")
        return self
