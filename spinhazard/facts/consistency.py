"""Statements that contradict each other only once something has been computed: mass against density times volume."""

from __future__ import annotations

from spinhazard.facts.sheet import FactSheet
from spinhazard.facts.subject import Subject
from spinhazard.statement.fields import Fault

ROUNDING = 0.01
"""Share by which a mass may differ from density times volume without any spread stated: figures on drawings are rounded."""


def contradictions(sheet: FactSheet) -> list[tuple[Subject, str, Fault]]:
    """Parts whose stated mass and stated density do not fit their volume within the spreads.

    Parameters
    ----------
    sheet : FactSheet
        The sheet.

    Returns
    -------
    list of (Subject, str, Fault)
        Part, field and what is wrong.
    """
    found = []
    for part in sheet.subjects.parts:
        stated = part.entity
        if stated.mass is None or stated.density is None:
            continue
        implied = sheet.fact("implied_density", part)
        if implied is None or not implied.known:
            continue
        spread = ROUNDING + sum(sheet.relative_spread(value) for value in (stated.mass, stated.density))
        if abs(implied.best / stated.density.value - 1.0) > spread:
            problem = (
                f"mass and density do not fit: the mass ({stated.mass.text}) in this volume is {implied.best:.4g} kg/m³"
            )
            accepted = "one of the two, or values that agree within their spreads"
            found.append((part, "density", Fault(problem, stated=stated.density.text, accepted=accepted)))
    return found
