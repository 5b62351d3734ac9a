"""Sources, calibration, changes: what the record of the assessment itself says."""

from __future__ import annotations

from collections.abc import Iterator
from functools import lru_cache

import numpy as np

from spinhazard.facts.fact import Word, fact
from spinhazard.facts.sheet import FactSheet
from spinhazard.facts.subject import Subject
from spinhazard.quantity.stated import Stated
from spinhazard.sampling import Samples
from spinhazard.statement.fields import Model
from spinhazard.statement.machine import AssessmentFile


@lru_cache(maxsize=64)
def _keys_of(model: type[Model]) -> tuple[tuple[str, str], ...]:
    """Attributes of a model and the keys they have in a file."""
    return tuple((name, info.alias or name) for name, info in model.model_fields.items())


def stated_values(model: Model, prefix: str = "") -> Iterator[tuple[str, Stated]]:
    """Every stated value below a model, with its path in the file.

    Parameters
    ----------
    model : Model
        Assessment file or one of its tables.
    prefix : str
        Path of the model itself, with a dot at its end.

    Yields
    ------
    (str, Stated)
        Path and value.
    """
    for name, key in _keys_of(type(model)):
        found = getattr(model, name)
        path = f"{prefix}{key}"
        if isinstance(found, Stated):
            yield path, found
        elif isinstance(found, Model):
            yield from stated_values(found, f"{path}.")
        elif isinstance(found, tuple):
            for index, entry in enumerate(found, start=1):
                if isinstance(entry, Stated):
                    yield f"{path}.{index}", entry
                elif isinstance(entry, Model):
                    yield from stated_values(entry, f"{path}.{getattr(entry, 'id', index)}.")


MEASURABLE = ("mass", "density", "inertia", "gd2", "wk2", "speed", "max_speed", "torque", "friction_torque", "viscous", "windage",
              "power", "diameter", "outer_diameter", "energy_rating", "heat_capacity_mass")  # fmt: skip
"""Fields whose value a decision hangs on; a timer setting or a count needs no source of its own."""


def values_of(file: AssessmentFile) -> list[tuple[str, Stated]]:
    """Stated values of a whole file.

    Parameters
    ----------
    file : AssessmentFile
        The statement.

    Returns
    -------
    list of (str, Stated)
        Path and value, in the order of the models.
    """
    return list(stated_values(file))


@fact(per="machine", symbol="n", equation="count", source="practice")
def values_without_source(sheet: FactSheet, _machine: Subject) -> Samples:
    """Number of stated masses, inertias, speeds, torques and main dimensions without a source."""
    stated = sheet.shared("stated values", lambda: values_of(sheet.file))
    bare = [path for path, value in stated if not value.source and path.rpartition(".")[2] in MEASURABLE]
    return np.array([float(len(bare))])


@fact(per="machine", symbol="n", equation="count", source="practice")
def values_past_calibration(sheet: FactSheet, _machine: Subject) -> Samples | None:
    """Number of values measured with an instrument whose calibration had run out on the day of the assessment."""
    stated = sheet.shared("stated values", lambda: values_of(sheet.file))
    due = [value.calibration_due for _, value in stated if value.calibration_due is not None]
    if not due:
        return None
    if sheet.file.assessment.date is None:
        return sheet.missing("assessment.date")
    sheet.note("assessment.date")
    return np.array([float(sum(day < sheet.file.assessment.date for day in due))])


@fact(per="machine", word=True)
def marked_speed_is_stated(sheet: FactSheet, _machine: Subject) -> Word | None:
    """Whether a largest speed marked on a part is stated."""
    return any(part.entity.max_rated_speed is not None for part in sheet.subjects.parts)


@fact(per="machine", word=True)
def wheel_use_is_stated(sheet: FactSheet, _machine: Subject) -> Word | None:
    """Whether a guard states the use of the abrasive wheel behind it."""
    return any(guard.entity.wheel_use is not None for guard in sheet.subjects.guards)


@fact(per="machine", word=True)
def fragment_is_stated(sheet: FactSheet, _machine: Subject) -> Word | None:
    """Whether a part states the piece that could come off it."""
    return any(part.entity.fragment is not None for part in sheet.subjects.parts)


@fact(per="machine", word=True)
def has_changed(sheet: FactSheet, _machine: Subject) -> Word | None:
    """Whether something is stated to have changed since the assessment, or changed on a later day."""
    record = sheet.file.assessment
    if record.changed:
        sheet.note("assessment.changed")
        return True
    if record.last_change is not None and record.date is not None:
        sheet.note("assessment.last_change")
        return record.last_change > record.date
    return False


@fact(per="machine", word=True)
def assessor_is_named(sheet: FactSheet, _machine: Subject) -> Word | None:
    """Whether assessor and day of the assessment are stated."""
    sheet.note("assessment.assessor")
    return bool(sheet.file.assessment.assessor) and sheet.file.assessment.date is not None
