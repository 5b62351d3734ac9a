"""What the lockout procedure says, as stated."""

from __future__ import annotations

from typing import Literal, Self

from pydantic import Field, model_validator

from spinhazard.statement.fields import Day, Fault, Model, TimeOrZero

BackDrive = Literal["none", "draught", "process flow", "gravity", "unbalance", "coupled drive"]


class Lockout(Model):
    """Waiting, verifying and blocking before hands go in."""

    wait: TimeOrZero | None = Field(None, description="time the procedure says to wait after isolating")
    verification: Literal["seen at standstill", "speed sensor", "tachometer", "none"] | None = Field(
        None, description="how standstill is verified"
    )
    blocked: bool | None = Field(None, strict=True, description="whether the rotor is blocked against turning")
    back_drive: tuple[BackDrive, ...] | None = Field(None, max_length=10, description="what could turn the rotor again")
    procedure_reviewed: Day | None = Field(None, description="day of the last review of the procedure")

    @model_validator(mode="after")
    def _none_stands_alone(self) -> Self:
        if self.back_drive and "none" in self.back_drive and len(self.back_drive) > 1:
            raise Fault(
                "names none beside something",
                field="back_drive",
                stated=list(self.back_drive),
                accepted='["none"] alone, or what there is',
            )
        return self
