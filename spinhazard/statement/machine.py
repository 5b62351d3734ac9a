"""The assessment file as a whole: machine, assessment, shafts, stopping, guards, lockout."""

from __future__ import annotations

from typing import Literal

from pydantic import Field

from spinhazard.statement.fields import Day, Force, Identifier, Model, Text
from spinhazard.statement.guarding import Guard
from spinhazard.statement.lockout import Lockout
from spinhazard.statement.rotor import Shaft
from spinhazard.statement.stopping import Stopping

MachineKind = Literal["fan", "grinder", "saw", "press", "centrifuge", "lathe", "mixer", "roll", "flywheel", "other"]
Trigger = Literal[
    "speed", "drive", "rotor", "brake", "guard", "procedure", "bearing", "repair", "relocation", "accident"
]


class Machine(Model):
    """Which machine this is."""

    tag: Identifier = Field(description="tag or asset number")
    name: Text = Field("", description="what it is called")
    kind: MachineKind = Field("other", description="kind of machine")
    site: Text = Field("", description="plant")
    location: Text = Field("", description="place in the plant")
    serial: Text = Field("", description="serial number")
    references: Text = Field("", description="drawings, manuals and reports used")
    hold_down_capacity: Force | None = Field(None, description="sideways force that mounting and foundation can hold")


class AssessmentRecord(Model):
    """Who assessed it, when, and why."""

    assessor: Text = Field("", description="who stated the values")
    role: Text = Field("", description="their role")
    date: Day | None = Field(None, description="day of the assessment")
    revision: int = Field(1, strict=True, ge=0, le=100_000, description="revision of this assessment")
    reason: Text = Field("", description="why it was made or revised")
    last_change: Day | None = Field(None, description="day of the last change of rotor, drive, brake or speed")
    changed: tuple[Trigger, ...] = Field((), max_length=20, description="what has changed since this assessment")


class AssessmentFile(Model):
    """One machine as the assessor states it."""

    format: Literal[1] = Field(description="version of this file format")
    machine: Machine
    assessment: AssessmentRecord = AssessmentRecord()
    shafts: tuple[Shaft, ...] = Field(alias="shaft", min_length=1, max_length=100)
    stopping: Stopping | None = None
    guards: tuple[Guard, ...] = Field((), alias="guard", max_length=200)
    lockout: Lockout = Lockout()

    def shaft(self, name: str) -> Shaft:
        """The shaft of that id; the file was refused if there is none.

        Parameters
        ----------
        name : str
            Identifier of the shaft.

        Returns
        -------
        Shaft
            The shaft.
        """
        return next(shaft for shaft in self.shafts if shaft.id == name)
