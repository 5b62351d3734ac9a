"""The whole pipeline on one page: statement → facts → rules → one frozen result and its JSON."""

from __future__ import annotations

import hashlib
import json
from dataclasses import dataclass
from functools import lru_cache
from importlib import metadata
from typing import Any

import numpy as np

from spinhazard.errors import InputError
from spinhazard.facts import FACTS
from spinhazard.facts.consistency import contradictions
from spinhazard.facts.fact import Fact
from spinhazard.facts.sheet import Beside, FactSheet
from spinhazard.mechanics.coastfit import CoastFit, fit_coast
from spinhazard.mechanics.formula import printed
from spinhazard.mechanics.mesh import mesh_moments
from spinhazard.quantity.display import System
from spinhazard.rules.engine import Finding, findings
from spinhazard.rules.loading import Catalogue, shipped_catalogue
from spinhazard.rules.rule import NEEDS_ATTENTION
from spinhazard.sampling import Sampler, interval
from spinhazard.statement.fields import Fault
from spinhazard.statement.machine import AssessmentFile
from spinhazard.statement.policy import Policy
from spinhazard.statement.reading import Reading, complaint_about
from spinhazard.statement.rotor import Mesh


@dataclass(frozen=True)
class Assessment:
    """Everything one assessment says.

    Attributes
    ----------
    reading : Reading
        The statement and its text.
    policy : Policy
        The policy used.
    sheet : FactSheet
        The facts, which remember how they were made.
    facts : tuple of Fact
        Every number, in the order of declaration and of the subjects.
    findings : tuple of Finding
        Every rule on every subject.
    digests : dict
        SHA-256 of inputs, catalogue and policy.
    draws : int
        Draws of the uncertainty; 0 for the best estimate alone.
    program : str
        Name and version.
    """

    reading: Reading
    policy: Policy
    sheet: FactSheet
    facts: tuple[Fact, ...]
    findings: tuple[Finding, ...]
    digests: dict[str, str]
    draws: int
    program: str

    @property
    def file(self) -> AssessmentFile:
        """The statement."""
        return self.reading.file

    @property
    def needs_attention(self) -> bool:
        """Whether something is for review, borderline or missing."""
        return any(finding.outcome in NEEDS_ATTENTION for finding in self.findings)

    def fact(self, key: str, subject: str = "machine") -> Fact | None:
        """One fact by key and subject; None where it does not apply.

        Parameters
        ----------
        key : str
            Key of the fact.
        subject : str
            Name of the subject.

        Returns
        -------
        Fact or None
            The fact.
        """
        return self.sheet.fact(key, self.sheet.by_name[subject])

    def interval(self, fact: Fact) -> tuple[float, float]:
        """Coverage interval of a fact.

        Parameters
        ----------
        fact : Fact
            A known number.

        Returns
        -------
        (float, float)
            Lower and upper end [SI]; both the best estimate where there are no draws.
        """
        return interval(np.asarray(fact.value, dtype=np.float64), self.policy.coverage)


@lru_cache(maxsize=1)
def program_name() -> str:
    """Name and version of the program.

    Returns
    -------
    str
        Such as ``spinhazard 0.1.0``.
    """
    return f"spinhazard {metadata.version('spinhazard')}"


@lru_cache(maxsize=1)
def shipped_policy() -> Policy:
    """The shipped defaults.

    Returns
    -------
    Policy
        Frozen, so one serves all.
    """
    return Policy()


def assess(
    reading: Reading,
    *,
    policy: Policy | None = None,
    best_estimate: bool = False,
    system: System = "si",
    catalogue: Catalogue | None = None,
) -> Assessment:
    """Assess one machine.

    Parameters
    ----------
    reading : Reading
        The statement.
    policy : Policy, optional
        The site's policy; the shipped defaults where left out.
    best_estimate : bool
        Leave the uncertainty out.
    system : "si" or "us"
        Units in the messages of the findings.
    catalogue : Catalogue, optional
        Rules; the shipped ones where left out.

    Returns
    -------
    Assessment
        The frozen result.

    Raises
    ------
    InputError
        Stated values contradict each other.
    """  # noqa: DOC502  (raised by what is called)
    policy = policy or shipped_policy()
    catalogue = catalogue or shipped_catalogue()
    digests = {
        "inputs": _digest("\n".join((reading.text, *reading.digests))),
        "catalogue": catalogue.digest,
        "policy": _digest(policy.as_text()),
    }
    draws = 0 if best_estimate else policy.draws
    sheet = FactSheet(reading.file, policy, Sampler(digests["inputs"], draws, policy.spreads), _beside(reading))
    # NaN stands for a missing value and infinity for a stop that never ends; both are meant
    with np.errstate(invalid="ignore", divide="ignore", over="ignore"):
        _refuse_contradictions(reading, sheet)
        found = tuple(findings(catalogue.rules, sheet, system=system))
        facts = tuple(_all_facts(sheet))
    return Assessment(
        reading=reading,
        policy=policy,
        sheet=sheet,
        facts=facts,
        findings=found,
        digests=digests,
        draws=draws,
        program=program_name(),
    )


def _beside(reading: Reading) -> Beside:
    """Fit the log and measure the meshes that a file names."""
    meshes = {}
    for shaft in reading.file.shafts:
        for part in shaft.parts:
            if isinstance(part, Mesh):
                path = f"shaft.{shaft.id}.part.{part.id}"
                try:
                    meshes[path] = mesh_moments(reading.meshes[part.file].corners, part.axis)
                except ValueError as error:
                    fault = Fault(
                        str(error),
                        stated=part.file,
                        accepted="a closed surface, its triangles turning left seen from outside",
                    )
                    raise InputError(complaint_about(reading, f"{path}.file", fault)) from None
    return Beside(coast_of(reading), meshes)


def coast_of(reading: Reading) -> CoastFit | None:
    """Fit of the coast-down log that a file names.

    Parameters
    ----------
    reading : Reading
        The statement.

    Returns
    -------
    CoastFit or None
        None where it names none.

    Raises
    ------
    InputError
        There is no coast in the log.
    """
    if reading.log is None:
        return None
    try:
        return fit_coast(reading.log.time, reading.log.speed)
    except ValueError as error:
        fault = Fault(
            str(error), stated=reading.log.name, accepted="a log in which the rotor coasts down from its speed"
        )
        raise InputError(complaint_about(reading, "stopping.coastdown_log", fault)) from None


def _refuse_contradictions(reading: Reading, sheet: FactSheet) -> None:
    found = contradictions(sheet)
    if found:
        raise InputError([complaint_about(reading, f"{part.path}.{field}", fault) for part, field, fault in found])


def _all_facts(sheet: FactSheet) -> list[Fact]:
    facts = []
    for declaration in FACTS.values():
        for subject in sheet.subjects.of_kind(declaration.per):
            fact = sheet.fact(declaration.key, subject)
            if fact is not None:
                facts.append(fact)
    return facts


def _digest(text: str) -> str:
    return "sha256:" + hashlib.sha256(text.encode()).hexdigest()


def equation_of(key: str) -> str:
    """Equation of a fact as printed.

    Parameters
    ----------
    key : str
        Key of a declared fact.

    Returns
    -------
    str
        Such as ``E = ½ J ω²``; empty for a value taken as stated.
    """
    declaration = FACTS[key]
    if any(declaration.equation == formula.equation for formula in declaration.formulas):
        return printed(declaration.equation)
    return "; ".join(
        printed(part) if "**" in part or "*" in part else part for part in declaration.equation.split("; ")
    )


def as_json(assessment: Assessment) -> str:
    """The result as JSON text, keys as in the contract, values in SI units.

    Parameters
    ----------
    assessment : Assessment
        The result.

    Returns
    -------
    str
        JSON, indented, one line end at its end.
    """
    return json.dumps(as_data(assessment), ensure_ascii=False, indent=1, allow_nan=False) + "\n"


def as_data(assessment: Assessment) -> dict[str, Any]:
    """The result as plain data, in the order of the contract.

    Parameters
    ----------
    assessment : Assessment
        The result.

    Returns
    -------
    dict
        Plain data without NaN or infinity.
    """
    file = assessment.file
    return {
        "format": 1,
        "program": assessment.program,
        "machine": _without_empty(file.machine.model_dump(exclude={"hold_down_capacity"})),
        "assessment": _without_empty(file.assessment.model_dump(mode="json")),
        "digests": assessment.digests,
        "uncertainty": {"draws": assessment.draws, "coverage": assessment.policy.coverage},
        "policy": {
            "name": assessment.policy.name,
            "deviations": [{"field": f, "shipped": a, "here": b} for f, a, b in assessment.policy.deviations()],
        },
        "facts": [_fact_data(assessment, fact) for fact in assessment.facts],
        "findings": [_finding_data(finding) for finding in assessment.findings],
        "measures": [],
        "cautions": CAUTIONS,
    }  # fmt: skip


def _without_empty(table: dict[str, Any]) -> dict[str, Any]:
    return {key: value for key, value in table.items() if value not in ("", None, [], ())}


def _number(value: float) -> float | str:
    return "never" if np.isinf(value) else value


def _fact_data(assessment: Assessment, fact: Fact) -> dict[str, Any]:
    declaration = FACTS[fact.key]
    data: dict[str, Any] = {"key": fact.key, "subject": fact.subject, "label": declaration.label}
    if isinstance(fact.value, np.ndarray):
        low, high = assessment.interval(fact)
        data |= {"value": _number(fact.best), "low": _number(low), "high": _number(high)}
    elif fact.value is None:
        data |= {"value": None, "low": None, "high": None, "missing": list(fact.missing)}
        if fact.failed:
            data["reason"] = fact.failed
    else:
        data["value"] = fact.value if isinstance(fact.value, (str, bool)) else str(fact.value)
    if fact.outside:
        data["outside"] = list(fact.outside)
    return data | {
        "unit": fact.unit, "equation": equation_of(fact.key), "source": declaration.source or "as stated", "from": list(fact.asked),
    }  # fmt: skip


def _finding_data(finding: Finding) -> dict[str, Any]:
    rule = finding.rule
    return {
        "rule": rule.key, "family": rule.family, "subject": finding.subject, "outcome": finding.outcome,
        "likelihood": round(finding.likelihood, 4), "urgency": rule.urgency, "asks": rule.asks, "says": finding.says,
        "because": rule.because, "missing": list(finding.missing), "outside": list(finding.outside), "measures": list(rule.measures),
        "basis": list(rule.basis), "from": list(finding.facts),
    }  # fmt: skip


CAUTIONS = [
    "This is an aid to calculation and review. It flags conditions for review; it does not say that a machine may be approached.",
    "Results depend on the values entered. What was not stated was not assessed, and conditions outside the rules were not looked for.",
    "Local codes, the maker's instructions and the judgement of qualified, licensed safety professionals take precedence.",
    "A wait replaces no verification: standstill is seen at the part itself before anyone reaches in.",
]
"""Shown on every output."""
