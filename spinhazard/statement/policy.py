"""A site's policy: thresholds, default spreads, which stop cases are credible, whose figures govern. Defaults are ours."""

from __future__ import annotations

from typing import Annotated, Any, Literal

from pydantic import Field

from spinhazard.quantity.notation import parse_stated
from spinhazard.quantity.stated import Stated
from spinhazard.statement.fields import (
    Density,
    Energy,
    LineSpeed,
    Model,
    Ratio,
    RatioOrZero,
    SpecificHeat,
    TemperatureDifference,
    Text,
    Time,
    TimeOrZero,
)  # fmt: skip
from spinhazard.statement.stopping import STOP_CASES, StopCase

Share = Annotated[float, Field(ge=0.0, le=1.0)]


def _default(text: str | float, kind: str) -> Any:
    """A default written the way a user would write it."""
    return Field(default_factory=lambda: parse_stated(text, kind))


class Spreads(Model):
    """Relative half-width taken where a value states no spread, by the class of its source."""

    measured: Share = 0.01
    nameplate: Share = 0.03
    drawing: Share = 0.01
    calculated: Share = 0.05
    estimated: Share = 0.2
    not_stated: Share = 0.0


class StopLimits(Model):
    """Usual limit of the stopping time by kind of machine; a kind without a figure has none."""

    saw: Time | None = _default("10 s", "time")
    lathe: Time | None = None
    mixer: Time | None = None
    grinder: Time | None = None
    press: Time | None = None
    fan: Time | None = None
    centrifuge: Time | None = None
    roll: Time | None = None
    flywheel: Time | None = None
    other: Time | None = None


class Policy(Model):
    """Everything a site may set. A field left out keeps the shipped default, which is our own choice and no law."""

    format: Literal[1] = 1
    name: Text = "shipped defaults"
    coverage: Annotated[float, Field(gt=0.5, lt=1.0)] = 0.95
    draws: Annotated[int, Field(ge=100, le=1_000_000)] = 4096
    figures: Literal["iso", "us"] = "iso"
    credible_stops: tuple[StopCase, ...] = Field(STOP_CASES, min_length=1)
    default_control_delay: TimeOrZero = _default("0 s", "time")
    default_build_up: TimeOrZero = _default("0 s", "time")
    wait_margin: Ratio = _default(1.2, "ratio")
    energy_review_level: Energy = _default("1 kJ", "energy")
    energy_at_access_level: Energy = _default("10 J", "energy")
    wait_energy_level: Energy = _default("100 J", "energy")
    energy_growth_limit: Ratio = _default(1.21, "ratio")
    estimated_share_limit: RatioOrZero = _default(0.5, "ratio")
    tip_speed_limit: LineSpeed = _default("400 m/s", "speed")
    density_low_limit: Density = _default("20 kg/m3", "density")
    density_high_limit: Density = _default("23000 kg/m3", "density")
    density_departure_limit: RatioOrZero = _default("30 %", "ratio")
    burst_factor: Ratio = _default(0.75, "ratio")
    burst_margin_limit: Ratio = _default(1.5, "ratio")
    yield_share_limit: Ratio = _default("50 %", "ratio")
    brake_temperature_rise_limit: TemperatureDifference = _default("150 K", "temperature difference")
    specific_heat: SpecificHeat = _default("490 J/(kg K)", "specific heat")
    power_loss_ratio_limit: Ratio = _default(2.0, "ratio")
    stop_variation_limit: Ratio = _default(1.2, "ratio")
    stop_departure_limit: Ratio = _default(1.1, "ratio")
    speed_departure_limit: RatioOrZero = _default("5 %", "ratio")
    least_stop_measurements: Annotated[int, Field(ge=1, le=1000)] = 5
    standstill_tip_speed_limit: LineSpeed = _default("100 mm/s", "speed")
    measurement_age_limit: Time = _default("1095 d", "time")
    procedure_age_limit: Time = _default("365 d", "time")
    fragment_energy_limit: Energy = _default("79 J", "energy")
    approach_speed: LineSpeed = _default("1.6 m/s", "speed")
    spreads: Spreads = Spreads()
    stop_limits: StopLimits = Field(default_factory=StopLimits)

    def as_text(self) -> str:
        """Every setting as one line; the digest of the policy is taken over this text.

        Returns
        -------
        str
            Lines "field = value", values as written.
        """
        return "\n".join(f"{name} = {text}" for name, text in _settings(self, ""))

    def deviations(self) -> tuple[tuple[str, str, str], ...]:
        """Every field that differs from the shipped default.

        Returns
        -------
        tuple of (str, str, str)
            Field, shipped value, this site's value, as text.
        """
        return tuple(_differences(Policy(), self, ""))


def _settings(model: Model, prefix: str) -> list[tuple[str, str]]:
    found: list[tuple[str, str]] = []
    for name in type(model).model_fields:
        value = getattr(model, name)
        found += (
            _settings(value, f"{prefix}{name}.") if isinstance(value, Model) else [(prefix + name, _as_text(value))]
        )
    return found


def _differences(shipped: Model, ours: Model, prefix: str) -> list[tuple[str, str, str]]:
    found: list[tuple[str, str, str]] = []
    for name in type(ours).model_fields:
        before, after = getattr(shipped, name), getattr(ours, name)
        if isinstance(after, Model):
            found += _differences(before, after, f"{prefix}{name}.")
        elif (
            (before.value, before.kind) != (after.value, after.kind) if _both_stated(before, after) else before != after
        ):
            found.append((prefix + name, _as_text(before), _as_text(after)))
    return found


def _both_stated(before: object, after: object) -> bool:
    return isinstance(before, Stated) and isinstance(after, Stated)


def _as_text(value: object) -> str:
    if isinstance(value, Stated):
        return value.text
    return ", ".join(value) if isinstance(value, tuple) else str(value) if value is not None else "none"
