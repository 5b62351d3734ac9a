"""What the lockout procedure says against what the rotor does."""

from __future__ import annotations

import numpy as np

from spinhazard.facts.drag import drivetrain
from spinhazard.facts.fact import Word, fact
from spinhazard.facts.sheet import FactSheet
from spinhazard.facts.subject import Subject
from spinhazard.mechanics import unbalance
from spinhazard.sampling import Samples

SECONDS_PER_DAY = 86400.0


@fact(per="lockout", unit="s", symbol="t_req", equation="t_req = k_wait t_gov", source="29cfr1910.147 (d)(5)")
def required_wait(sheet: FactSheet, _lockout: Subject) -> Samples:
    """Wait after isolating that covers the governing stop with the policy's margin."""
    return sheet.policy("wait_margin") * sheet("governing_stopping_time")


@fact(per="lockout", unit="s", symbol="t_wait")
def stated_wait(sheet: FactSheet, lockout: Subject) -> Samples:
    """Wait that the procedure states."""
    return sheet.value(lockout, "wait")


@fact(per="lockout", word=True)
def wait_is_stated(_sheet: FactSheet, lockout: Subject) -> Word | None:
    """Whether the procedure states a wait."""
    return lockout.entity.wait is not None


@fact(per="lockout", word=True)
def verification(sheet: FactSheet, lockout: Subject) -> Word | None:
    """How standstill is verified."""
    return sheet.word(lockout, "verification")


@fact(per="lockout", word=True)
def is_blocked(sheet: FactSheet, lockout: Subject) -> Word | None:
    """Whether the rotor is blocked against turning."""
    return sheet.word(lockout, "blocked")


@fact(per="lockout", word=True)
def back_drive(sheet: FactSheet, lockout: Subject) -> Word | None:
    """What could turn the rotor again."""
    causes = sheet.word(lockout, "back_drive")
    return None if causes is None else ", ".join(causes) if isinstance(causes, tuple) and causes else "none"


@fact(
    per="lockout", unit="s", symbol="age", equation="day of assessment − day of review", source="29cfr1910.147 (c)(6)"
)
def procedure_age(sheet: FactSheet, lockout: Subject) -> Samples:
    """Time from the last review of the procedure to the assessment."""
    reviewed, assessed = lockout.entity.procedure_reviewed, sheet.file.assessment.date
    if reviewed is None or assessed is None:
        stated = (("lockout.procedure_reviewed", reviewed), ("assessment.date", assessed))
        return sheet.missing(*(path for path, day in stated if day is None))
    sheet.note("lockout.procedure_reviewed")
    sheet.note("assessment.date")
    return np.array([(assessed - reviewed).days * SECONDS_PER_DAY])


@fact(per="lockout", word=True)
def procedure_before_change(sheet: FactSheet, lockout: Subject) -> Word | None:
    """Whether the procedure was last reviewed before the last change of rotor, drive, brake or speed."""
    changed = sheet.file.assessment.last_change
    if changed is None:
        return None
    if lockout.entity.procedure_reviewed is None:
        sheet.missing("lockout.procedure_reviewed")
        return None
    sheet.note("lockout.procedure_reviewed")
    sheet.note("assessment.last_change")
    return bool(lockout.entity.procedure_reviewed < changed)


@fact(per="shaft", unit="N m", symbol="T_u", formulas=[unbalance.unbalance_torque])
def unbalance_torque(sheet: FactSheet, shaft: Subject) -> Samples | None:
    """Largest torque by which static unbalance can turn the shaft."""
    return (
        None
        if shaft.entity.unbalance is None
        else sheet.apply(unbalance.unbalance_torque, sheet.value(shaft, "unbalance"))
    )


@fact(per="shaft", unit="N m", symbol="a_i", equation="a_i = a / i", source="spinhazard-methods drag")
def dry_friction_at_shaft(sheet: FactSheet, shaft: Subject) -> Samples | None:
    """Dry friction of the drivetrain as felt at this shaft."""
    if sheet.file.stopping is None:
        return sheet.missing("stopping.shaft")
    ratios = drivetrain(sheet, sheet.subjects.shaft(sheet.file.stopping.shaft))
    return sheet("constant_drag") / ratios[shaft.entity.id] if shaft.entity.id in ratios else None
