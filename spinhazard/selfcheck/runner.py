"""Reads the check values of ``checks/*.toml`` and computes each with the program's formulas."""

from __future__ import annotations

import tomllib
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from functools import lru_cache
from importlib import resources
from typing import Any, Literal

import numpy as np

from spinhazard.mechanics import (
    braking,
    coastdown,
    drag,
    energy,
    fragments,
    inertia,
    outline,
    pendulum,
    reach,
    strength,
    unbalance,
    volume,
)
from spinhazard.mechanics.formula import REGISTRY
from spinhazard.quantity.notation import parse_stated

MODULES = {
    module.__name__.rpartition(".")[2]: module
    for module in (
        braking,
        coastdown,
        drag,
        energy,
        fragments,
        inertia,
        outline,
        pendulum,
        reach,
        strength,
        unbalance,
        volume,
    )
}


@dataclass(frozen=True)
class Check:
    """One value from outside.

    Attributes
    ----------
    name, subject : str
        What it is, and the file it stands in.
    function : str
        Formula, ``module.name``, or ``units.convert``.
    arguments : mapping
        SI values, or text where the function takes text.
    stated : str
        The figures as the source gives them.
    expect, tolerance : float
        Expected SI value and relative tolerance (absolute where zero is expected).
    because : str
        Why that tolerance.
    source : str
        "id place".
    kind : str
        "published", "recomputed" by other means, or "regression" (no evidence of its own).
    read : str
        "text" where the figure was read in a text, "memory" where it was not, "computed" where it was worked out by
        other means from formulas that do not rest on memory.
    """

    name: str
    subject: str
    function: str
    arguments: Mapping[str, Any]
    stated: str
    expect: float
    tolerance: float
    because: str
    source: str
    kind: Literal["published", "recomputed", "regression"]
    read: Literal["text", "memory", "computed"]


@dataclass(frozen=True)
class CheckResult:
    """A check and what this installation computes for it."""

    check: Check
    computed: float
    deviation: float

    @property
    def within(self) -> bool:
        """Whether the deviation is within the stated tolerance; a value that is not a number never is."""
        return bool(self.deviation <= self.check.tolerance)


@lru_cache(maxsize=1)
def load_checks() -> tuple[Check, ...]:
    """All checks, files in alphabetical order.

    Returns
    -------
    tuple of Check
        The checks.
    """
    folder = resources.files("spinhazard.selfcheck").joinpath("checks")
    files = sorted((entry for entry in folder.iterdir() if entry.name.endswith(".toml")), key=lambda entry: entry.name)
    return tuple(
        Check(subject=entry.name.removesuffix(".toml"), **raw)
        for entry in files
        for raw in tomllib.loads(entry.read_text("utf-8"))["check"]
    )


def _convert(*, text: str, kind: str) -> float:
    return parse_stated(text, kind).value


def function_of(name: str) -> Callable[..., Any]:
    """The function a check names.

    Parameters
    ----------
    name : str
        ``units.convert``, or the name of a declared formula.

    Returns
    -------
    callable
        The function.

    Raises
    ------
    LookupError
        No formula has this name.
    """
    if name == "units.convert":
        return _convert
    if name not in REGISTRY:
        raise LookupError(f"no formula is called {name}")
    module, _, function = name.partition(".")
    found: Callable[..., Any] = getattr(MODULES[module], function)
    return found


def run(check: Check) -> CheckResult:
    """Compute one check.

    Parameters
    ----------
    check : Check
        The check.

    Returns
    -------
    CheckResult
        With what this installation computes.
    """
    computed = float(np.asarray(function_of(check.function)(**check.arguments)))
    deviation = abs(computed) if check.expect == 0.0 else abs(computed / check.expect - 1.0)
    return CheckResult(check, computed, deviation)


def run_all() -> tuple[CheckResult, ...]:
    """Compute all checks.

    Returns
    -------
    tuple of CheckResult
        In the order of the files.
    """
    return tuple(run(check) for check in load_checks())
