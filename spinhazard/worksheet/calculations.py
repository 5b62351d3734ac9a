"""Every calculation: equation, the numbers put in, result with interval, source, and what it was made from."""

from __future__ import annotations

import math
import re
from typing import TypeAlias

import numpy as np
from reportlab.platypus import Flowable

from spinhazard.assessment import equation_of
from spinhazard.facts.fact import FACTS, Fact, Step
from spinhazard.mechanics.formula import printed, with_numbers
from spinhazard.quantity.display import display
from spinhazard.sources import citation
from spinhazard.worksheet.grid import Cell, Grid
from spinhazard.worksheet.lines import FINE, FINE_STRONG, NORMAL, Run, kept_together
from spinhazard.worksheet.page import WITH_TEXT_AND_TABLE, Sheet, fact_anchor, group, heading
from spinhazard.worksheet.style import BODY
from spinhazard.worksheet.text import paragraph, shares

MOST_STEPS = 12
NOTHING_STATED = "nothing is stated about it"
NOT_COMPUTED = ("as stated", "from the table of materials", "–", NOTHING_STATED)
"""Values that no formula made; its source would mislead."""
Marks: TypeAlias = tuple[tuple[object, ...], ...]
"""Formulas and arguments of the steps of a fact, by which equal runs of steps are told."""
_VALUE = re.compile(r"\(-?\d[^() ]* [^()×+−]+\)")
"""A value with its unit, in brackets, as it stands in an equation with numbers."""
UNITS = {
    **dict.fromkeys(
        ("length", "diameter", "bore", "radius", "thickness", "width", "offset", "distance", "intrusion", "resolution", "radial", "axial",
         "tangential"), "m",
    ),
    "mass": "kg", "inertia": "kg m²", "gd2": "kg m²", "wk2": "kg m²", "time": "s", "torque": "N m", "energy": "J", "heat": "J",
    "power": "W", "volume": "m³", "density": "kg/m³", "angle": "rad", "constant": "N m",
    "linear": "N m s", "quadratic": "N m s²", "stress": "Pa",
    "strength": "Pa", "area": "m²", "unbalance": "kg m", "specific_heat": "J/(kg K)",
}  # fmt: skip
"""SI unit of an argument by the last word of its name; speeds depend on the formula."""


def calculations(sheet: Sheet, number: int) -> list[Flowable]:
    """All facts: numbers by subject, then words, days and choices in one table.

    Parameters
    ----------
    sheet : Sheet
        What to print.
    number : int
        Number of the section.

    Returns
    -------
    list of Flowable
        Flowables.
    """
    text = (
        "Each line gives the key, what it is, the equation, the equation with the best estimates put in, and the result with its interval. "
        "“From” names what it was made from: other facts by key, stated values by their path in the file, settings of the policy. "
        "A formula without a closed form is named by its method, with its arguments; the project's derivations describe it."
    )
    made = [*heading(number, "Calculations", room=WITH_TEXT_AND_TABLE), paragraph(text, BODY)]
    by_subject: dict[str, list[Fact]] = {}
    words = []
    for fact in sheet.assessment.facts:
        if isinstance(fact.value, np.ndarray) or not FACTS[fact.key].is_word:
            by_subject.setdefault(fact.subject, []).append(fact)
        else:
            words.append(fact)
    for subject, facts in by_subject.items():
        made += group(subject, _numbers_of(sheet, facts))
    if words:
        made += group("Words, days and choices", _words_of(sheet, words))
    return made


def _numbers_of(sheet: Sheet, facts: list[Fact]) -> Grid:
    """Table of the facts of one subject."""
    shown: dict[Marks, str] = {}
    return Grid(
        ("fact", "equation and numbers", "result", "from"),
        [_row(sheet, fact, shown) for fact in facts],
        shares(sheet.width, (27, 37, 16, 20)),
        anchors=[[name] if name else [] for name in _anchors(sheet, facts)],
        fine=True,
    )


def _words_of(sheet: Sheet, facts: list[Fact]) -> Grid:
    """Table of the facts that are no numbers; subjects of the same value share a line."""
    lines: dict[tuple[str, str], list[Fact]] = {}
    for fact in facts:
        lines.setdefault((fact.key, "; ".join((sheet.of(fact), *_remarks(fact)))), []).append(fact)
    rows: list[list[Cell]] = [
        [
            [Run(key, FINE_STRONG), Run(FACTS[key].label, FINE)],
            value,
            ", ".join(fact.subject for fact in same),
            "; ".join(dict.fromkeys(filter(None, (_made_from(sheet, fact) for fact in same)))),
        ]
        for (key, value), same in lines.items()
    ]
    anchors = [[name for name in _anchors(sheet, same) if name] for same in lines.values()]
    heads = ("fact", "value", "of", "from")
    return Grid(heads, rows, shares(sheet.width, (33, 17, 27, 23)), anchors=anchors, fine=True)


def _anchors(sheet: Sheet, facts: list[Fact]) -> list[str]:
    """Names of the facts that a finding leads to, empty for the others."""
    linked = sheet.linked_facts
    return [fact_anchor(fact.key, fact.subject) if f"{fact.key}|{fact.subject}" in linked else "" for fact in facts]


def _row(sheet: Sheet, fact: Fact, shown: dict[Marks, str]) -> list[Cell]:
    declaration = FACTS[fact.key]
    lines = _lines(sheet, fact, shown)
    remarks = _remarks(fact)
    middle = lines or ([] if remarks and not fact.known else [_taken(fact)])
    source = "; ".join(citation(part) for part in _sources(fact))
    if source and (lines or (middle and middle[0] not in NOT_COMPUTED)):
        middle.append(f"[{source}]")
    symbol = f"{declaration.symbol}: " if declaration.symbol else ""
    value, ends, interval = sheet.of(fact, interval=True).partition(" (")
    result = [Run(symbol + kept_together(value), NORMAL)]
    if ends:
        result.append(Run(f"({interval}", FINE))
    return [
        [Run(fact.key, FINE_STRONG), Run(declaration.label, FINE)],
        [Run(line, FINE) for line in (*middle, *remarks)],
        result,
        _made_from(sheet, fact),
    ]


def _remarks(fact: Fact) -> list[str]:
    """Why there is no value, or what limits the one there is."""
    remarks = [f"missing: {', '.join(fact.missing)}"] if fact.missing else []
    remarks += [fact.failed] if fact.failed else []
    remarks += [f"outside the range of the method: {'; '.join(fact.outside)}"] if fact.outside else []
    return remarks


def _made_from(sheet: Sheet, fact: Fact) -> str:
    path = sheet.assessment.sheet.by_name[fact.subject].path
    return "; ".join(_short(name, fact.subject, path) for name in fact.asked)


def _lines(sheet: Sheet, fact: Fact, shown: dict[Marks, str]) -> list[str]:
    """Equation and the formulas with numbers; of a fact that chooses among formulas, only those it used."""
    # a run of steps that another fact of the subject has shown already is named by that fact
    declaration = FACTS[fact.key]
    own = declaration.equation != "; ".join(dict.fromkeys(formula.equation for formula in declaration.formulas))
    equations = [equation_of(fact.key)] if own and declaration.equation else []
    equations += [printed(step.formula.equation) for step in fact.steps if not own]
    lines = [line for line in equations if not line.startswith("see method")]
    steps = list(fact.steps)
    marks = tuple((step.formula.name, *step.arguments.values()) for step in steps)
    earlier = next((known for known in shown if len(known) > 1 and marks[: len(known)] == known), None)
    if earlier is None:
        shown.setdefault(marks, fact.key)
    else:
        steps = steps[len(earlier) :]
        lines.append(f"with the {len(earlier)} steps shown under {shown[earlier]}{', then' if steps else ''}")
    lines += [_numbers(sheet, step) for step in steps[:MOST_STEPS] if not math.isnan(step.result)]
    if len(steps) > MOST_STEPS:
        lines.append(f"and {len(steps) - MOST_STEPS} further applications")
    return list(dict.fromkeys(lines))


def _taken(fact: Fact) -> str:
    """Where a value comes from that no formula made."""
    if not fact.known:
        return "–"
    if any(name.startswith("material ") for name in fact.asked):
        return "from the table of materials"
    if fact.asked and all(name.startswith("policy.") for name in fact.asked):
        return "from the policy"
    if not fact.asked:
        return NOTHING_STATED
    return "taken from the facts named on the right" if any("|" in name for name in fact.asked) else "as stated"


def _sources(fact: Fact) -> list[str]:
    used = [step.formula.source for step in fact.steps]
    return list(dict.fromkeys(used or [part for part in FACTS[fact.key].source.split("; ") if part]))


def _short(name: str, subject: str, path: str) -> str:
    """A reference without its subject where that is the fact's own."""
    key, bar, about = name.partition("|")
    if bar:
        return key if about == subject else f"{key} of {about}"
    return f"stated {name.removeprefix(path + '.')}" if name.startswith(path + ".") else name


def _numbers(sheet: Sheet, step: Step) -> str:
    """One application of a formula with its numbers."""
    texts = {name: display(value, _unit(step, name), system=sheet.system) for name, value in step.arguments.items()}
    result = kept_together(display(step.result, step.formula.unit, system=sheet.system))
    if step.formula.equation.startswith("see "):
        arguments = ", ".join(
            f"{printed(step.formula.symbols.get(name, name))} = {kept_together(text)}" for name, text in texts.items()
        )
        return f"{step.formula.name}({arguments}) = {result}"
    left = step.formula.equation.partition(" = ")[0]
    return f"{printed(left)} = {_VALUE.sub(_as_one, with_numbers(step.formula, texts))} = {result}"


def _as_one(value: re.Match[str]) -> str:
    return kept_together(value[0])


def _unit(step: Step, name: str) -> str:
    last = name.rpartition("_")[2]
    if name == "specific_heat":
        return UNITS[name]
    if last == "speed":
        return "m/s" if step.formula.symbols.get(name) in {"v", "v_f", "K"} else "rad/s"
    if last == "work":
        return "J"
    return UNITS.get(name, UNITS.get(last, ""))
