"""A fact: a named quantity with its trace; and how one is declared."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from datetime import date
from typing import TYPE_CHECKING, Any, NamedTuple

import numpy as np

from spinhazard.mechanics.formula import Formula, record
from spinhazard.sampling import Samples

if TYPE_CHECKING:
    from spinhazard.facts.sheet import FactSheet
    from spinhazard.facts.subject import Subject

Word = str | bool | date | tuple[str, ...]
FactValue = Samples | Word | None


class Step(NamedTuple):
    """One formula as it was used: best-estimate arguments by parameter name, and the result [SI]."""

    formula: Formula
    arguments: Mapping[str, float]
    result: float


class Fact(NamedTuple):
    """One quantity of one subject.

    Attributes
    ----------
    key, subject, unit : str
        Name, subject ("part:impeller/hub"), SI unit ("" for plain numbers and words).
    value : ndarray, word or None
        Samples (entry 0 the best estimate), or a word, yes or no, or day; None where missing.
    missing : tuple of str
        Fields that would settle it.
    outside : tuple of str
        Ranges of methods that were left.
    failed : str
        Why it could not be computed although everything was stated.
    asked : tuple of str
        What it was made from: facts as "key|subject", stated values by path, policy as "policy.NAME".
    steps : tuple of Step
        Formulas used, with their numbers.
    """

    key: str
    subject: str
    unit: str
    value: FactValue
    missing: tuple[str, ...] = ()
    outside: tuple[str, ...] = ()
    failed: str = ""
    asked: tuple[str, ...] = ()
    steps: tuple[Step, ...] = ()

    @property
    def known(self) -> bool:
        """Whether there is a value."""
        return self.value is not None

    @property
    def best(self) -> float:
        """Best estimate of a number [SI]; NaN where missing or a word."""
        return float(self.value[0]) if isinstance(self.value, np.ndarray) else float("nan")


@dataclass(frozen=True, slots=True)
class Declaration:
    """What a fact function declares about itself."""

    key: str
    label: str
    unit: str
    symbol: str
    per: str
    equation: str
    source: str
    formulas: tuple[Formula, ...]
    is_word: bool
    function: Callable[[FactSheet, Any], FactValue]


FACTS: dict[str, Declaration] = {}


def fact(
    *, per: str, unit: str = "", symbol: str = "", formulas: Sequence[Callable[..., Any]] = (), equation: str = "", source: str = "",
    word: bool = False,
) -> Callable[[Callable[[FactSheet, Subject], FactValue]], Callable[[FactSheet, Subject], FactValue]]:  # fmt: skip
    """Declare a function of this package as a fact; its name is the key, its first docstring line the label.

    Parameters
    ----------
    per : str
        Kind of subject: machine, shaft, part, stop, guard or lockout.
    unit : str
        SI unit of the value.
    symbol : str
        Symbol on the worksheet.
    formulas : sequence of callables
        Formulas of `spinhazard.mechanics` that it applies; equation and source are inherited from them.
    equation, source : str
        Where no single formula says it: the equation as printed, and its source.
    word : bool
        Whether the value is a word, yes or no, or a day instead of a number.

    Returns
    -------
    callable
        Decorator that returns the function unchanged.
    """

    def declare(function: Callable[[FactSheet, Subject], FactValue]) -> Callable[[FactSheet, Subject], FactValue]:
        records = tuple(record(formula) for formula in formulas)
        FACTS[function.__name__] = Declaration(
            key=function.__name__,
            label=(function.__doc__ or "").strip().split("\n")[0].rstrip("."),
            unit=unit,
            symbol=symbol,
            per=per,
            equation=equation or "; ".join(dict.fromkeys(formula.equation for formula in records)),
            source=source or "; ".join(dict.fromkeys(formula.source for formula in records)),
            formulas=records,
            is_word=word,
            function=function,
        )
        return function

    return declare
