"""How the machine comes to rest, as stated: drag, measured stops, brakes."""

from __future__ import annotations

from typing import Literal, Self

from pydantic import Field, model_validator

from spinhazard.statement.fields import (
    AngularSpeed,
    AngularSpeedOrZero,
    Day,
    Energy,
    Fault,
    FileName,
    Identifier,
    Mass,
    Model,
    Power,
    SpecificHeat,
    TemperatureDifference,
    Text,
    Time,
    TimeOrZero,
    Torque,
    TorqueOrZero,
    ViscousDrag,
    Windage,
)  # fmt: skip

StopCase = Literal["normal stop", "power loss", "brake failed"]
STOP_CASES: tuple[StopCase, ...] = ("normal stop", "power loss", "brake failed")


class LossPower(Model):
    """Power lost at one speed, and how the loss grows with speed."""

    speed: AngularSpeed = Field(description="speed at which the loss was read, at the stopping shaft")
    power: Power = Field(description="power lost at that speed")
    law: Literal["constant torque", "viscous", "fan"] = Field(description="how the loss grows with speed")


class Brake(Model):
    """A brake, its torque referred to the stopping shaft."""

    id: Identifier = Field(description="name of the brake")
    torque: Torque = Field(description="braking torque while turning, at the stopping shaft")
    build_up: TimeOrZero | None = Field(None, description="time from the command until the torque is there")
    works_without_power: bool | None = Field(None, strict=True, description="whether it brakes with the supply lost")
    heat_capacity_mass: Mass | None = Field(None, description="mass of drum or disc that takes up the heat")
    specific_heat: SpecificHeat | None = Field(None, description="specific heat of drum or disc")
    energy_rating: Energy | None = Field(None, description="largest energy for one stop")
    max_temperature_rise: TemperatureDifference | None = Field(
        None, description="largest temperature rise of drum or disc"
    )


class Stopping(Model):
    """The stop: at which shaft, against which torques."""

    shaft: Identifier = Field(description="shaft that the torques below are referred to")
    friction_torque: TorqueOrZero | None = Field(None, description="constant part of the drag torque")
    viscous: ViscousDrag | None = Field(None, description="part of the drag torque that grows with speed, per rad/s")
    windage: Windage | None = Field(
        None, description="part of the drag torque that grows with speed squared, per (rad/s)²"
    )
    loss_power: tuple[LossPower, ...] = Field((), max_length=20, description="power lost at a known speed")
    coastdown_log: FileName | None = Field(None, description="tachometer log of a coast, a file beside this one")
    measured_times: tuple[Time, ...] = Field(
        (), max_length=1000, description="measured stops, each from command to standstill"
    )
    measured_case: StopCase | Literal["coast"] | None = Field(
        None, description="stop case the measured stops belong to"
    )
    measured_on: Day | None = Field(None, description="day of the measured stops")
    conditions: Text = Field("", description="what was tried: warm, dampers closed, heaviest tool, no load …")
    standstill_speed: AngularSpeedOrZero | None = Field(
        None, description="speed below which the shaft counts as stopped"
    )
    control_delay: TimeOrZero | None = Field(None, description="time the drive keeps driving after the stop command")
    brakes: tuple[Brake, ...] = Field((), alias="brake", max_length=20, description="brakes")

    @model_validator(mode="after")
    def _one_source_of_drag(self) -> Self:
        stated = [name for name in ("friction_torque", "viscous", "windage") if getattr(self, name) is not None]
        stated += ["loss_power"] if self.loss_power else []
        if self.coastdown_log is not None and stated:
            raise Fault(
                f"stands beside {', '.join(stated)}", field="coastdown_log", stated=self.coastdown_log,
                accepted="either a log, which gives the whole drag, or stated drag",
            )  # fmt: skip
        return self

    @model_validator(mode="after")
    def _brake_names_differ(self) -> Self:
        names = [brake.id for brake in self.brakes]
        for name in names:
            if names.count(name) > 1:
                raise Fault(
                    "two brakes have the same id", field="brake", stated=name, accepted="a name of its own for each"
                )
        return self
