"""Every calculation: equation, the numbers put in, result with interval, source, and what it was made from."""

from __future__ import annotations

import numpy as np
from reportlab.platypus import Flowable

from spinhazard.assessment import equation_of
from spinhazard.facts.fact import FACTS, Fact, Step
from spinhazard.mechanics.formula import printed, with_numbers
from spinhazard.quantity.display import display
from spinhazard.sources import citation
from spinhazard.worksheet.page import Sheet, group, heading
from spinhazard.worksheet.style import BODY, CELL, SMALL
from spinhazard.worksheet.text import marked_up, paragraph, plain, shares, table

MOST_STEPS = 12
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
    """All facts that are numbers, by subject.

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
        "“From” names what it was made from: other facts by key, stated values by their path in the file, settings of the policy."
    )
    made = [*heading(number, "Calculations"), paragraph(text, BODY)]
    by_subject: dict[str, list[Fact]] = {}
    for fact in sheet.assessment.facts:
        if isinstance(fact.value, np.ndarray) or fact.value is None:
            by_subject.setdefault(fact.subject, []).append(fact)
    for subject, facts in by_subject.items():
        rows = [_row(sheet, fact) for fact in facts]
        made += group(subject)
        made.append(
            table(
                ("fact", "equation and numbers", "result", "from"),
                rows,
                shares(sheet.width, (23, 37, 17, 23)),
                numbers=(),
            )
        )
    return made


def _row(sheet: Sheet, fact: Fact) -> list[str | Flowable | list[Flowable]]:
    declaration = FACTS[fact.key]
    symbol = f"{declaration.symbol}: " if declaration.symbol else ""
    name = marked_up(
        f'<a name="fact-{plain(fact.key)}"/><b>{plain(fact.key)}</b><br/>{plain(declaration.label)}', SMALL
    )
    middle: list[Flowable] = [paragraph(line, SMALL) for line in _lines(sheet, fact)] or [
        paragraph(_taken(fact), SMALL)
    ]
    source = "; ".join(citation(part) for part in _sources(fact))
    if source:
        middle.append(paragraph(f"[{source}]", SMALL))
    result = f"{symbol}{sheet.of(fact, interval=True)}"
    if fact.missing:
        result += f" (missing: {', '.join(fact.missing)})"
    if fact.failed:
        result += f" ({fact.failed})"
    if fact.outside:
        result += f" (outside the range of the method: {'; '.join(fact.outside)})"
    path = sheet.assessment.sheet.by_name[fact.subject].path
    made_from = "; ".join(_short(name, fact.subject, path) for name in fact.asked)
    return [name, middle, paragraph(result, CELL), paragraph(made_from, SMALL)]


def _lines(sheet: Sheet, fact: Fact) -> list[str]:
    """Equation and the formulas with numbers; of a fact that chooses among formulas, only those it used."""
    declaration = FACTS[fact.key]
    own = declaration.equation != "; ".join(dict.fromkeys(formula.equation for formula in declaration.formulas))
    equations = [equation_of(fact.key)] if own and declaration.equation else []
    equations += [printed(step.formula.equation) for step in fact.steps if not own]
    lines = [line for line in equations if not line.startswith("see method")]
    lines += [_numbers(sheet, step) for step in fact.steps[:MOST_STEPS]]
    if len(fact.steps) > MOST_STEPS:
        lines.append(f"and {len(fact.steps) - MOST_STEPS} further applications")
    return list(dict.fromkeys(lines))


def _taken(fact: Fact) -> str:
    """Where a value comes from that no formula made."""
    if any(name.startswith("material ") for name in fact.asked):
        return "from the table of materials"
    if fact.asked and all(name.startswith("policy.") for name in fact.asked):
        return "from the policy"
    return "as stated" if fact.known else "–"


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
    result = display(step.result, step.formula.unit, system=sheet.system)
    if step.formula.equation.startswith("see "):
        arguments = ", ".join(
            f"{printed(step.formula.symbols.get(name, name))} = {text}" for name, text in texts.items()
        )
        return f"{step.formula.name}({arguments}) = {result}"
    left = step.formula.equation.partition(" = ")[0]
    return f"{printed(left)} = {with_numbers(step.formula, texts)} = {result}"


def _unit(step: Step, name: str) -> str:
    last = name.rpartition("_")[2]
    if name == "specific_heat":
        return UNITS[name]
    if last == "speed":
        return "m/s" if step.formula.symbols.get(name) in {"v", "v_f", "K"} else "rad/s"
    if last == "work":
        return "J"
    return UNITS.get(name, UNITS.get(last, ""))
