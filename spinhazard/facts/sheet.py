"""The fact sheet: evaluates facts when asked, remembers them, records who asked for what. Nothing else.

A missing value is carried as NaN through the arithmetic; the sheet knows from its own record, not from the NaN, which
fields would settle the fact, and so collects all of them in one go.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from typing import Any, TypeVar

import numpy as np

from spinhazard.facts.fact import FACTS, Fact, FactValue, Step, Word
from spinhazard.facts.subject import Subject, Subjects, subjects_of
from spinhazard.mechanics.coastfit import CoastFit
from spinhazard.mechanics.formula import record
from spinhazard.mechanics.mesh import MeshMoments
from spinhazard.quantity.stated import Stated
from spinhazard.sampling import Sampler, Samples
from spinhazard.statement.machine import AssessmentFile
from spinhazard.statement.policy import Policy

Result = TypeVar("Result")
NOT_KNOWN: Samples = np.array([np.nan])
NOT_KNOWN.flags.writeable = False


@dataclass(frozen=True)
class Beside:
    """What the files say that an assessment file names.

    Attributes
    ----------
    coast : CoastFit or None
        Fit of the coast-down log.
    meshes : mapping
        Moments of each mesh in the unit of its file, by the part's path.
    """

    coast: CoastFit | None = None
    meshes: Mapping[str, MeshMoments] = field(default_factory=dict)


class _Frame:
    """What the fact being evaluated has asked for so far."""

    __slots__ = ("asked", "failed", "missing", "outside", "steps")

    def __init__(self) -> None:
        self.asked: list[str] = []
        self.missing: list[str] = []
        self.outside: list[str] = []
        self.steps: list[Step] = []
        self.failed = ""

    def take_over(self, other: _Frame) -> None:
        """Add what another piece of work has asked for."""
        self.asked += other.asked
        self.missing += other.missing
        self.outside += other.outside
        self.steps += other.steps
        self.failed = self.failed or other.failed


class FactSheet:
    """Facts of one assessment file under one policy.

    Parameters
    ----------
    file : AssessmentFile
        The statement.
    policy : Policy
        The site's policy.
    sampler : Sampler
        Source of the sample axis.
    beside : Beside, optional
        What the files beside it say.
    """

    def __init__(self, file: AssessmentFile, policy: Policy, sampler: Sampler, beside: Beside | None = None) -> None:
        self.file = file
        self.beside = beside or Beside()
        self.rules = policy
        self.subjects: Subjects = subjects_of(file)
        self.by_name = {subject.name: subject for subject in self.subjects.all()}
        self.stated: dict[str, Stated] = {}
        self._sampler = sampler
        self._facts: dict[tuple[str, str], Fact] = {}
        self._drawn: dict[str, Samples] = {}
        self._shared: dict[str, tuple[Any, _Frame]] = {}
        self._frames: list[_Frame] = [_Frame()]

    def fact(self, key: str, subject: Subject | None = None) -> Fact | None:
        """One fact with its trace; None where it does not apply to the subject.

        Parameters
        ----------
        key : str
            Key of a declared fact.
        subject : Subject, optional
            What it is about; may be left out for machine and lockout.

        Returns
        -------
        Fact or None
            The fact.

        Raises
        ------
        RuntimeError
            The fact depends on itself (a defect of the program).
        """
        if subject is None:
            subject = self.subjects.lockout if FACTS[key].per == "lockout" else self.subjects.machine
        name = (key, subject.name)
        found = self._facts.get(name)
        if found is not None:
            if found is _UNDER_WAY:
                raise RuntimeError(f"the fact {key} of {subject.name} depends on itself")
            return None if found is _DOES_NOT_APPLY else found
        declaration = FACTS[key]
        self._facts[name] = _UNDER_WAY
        frame = _Frame()
        self._frames.append(frame)
        try:
            value = declaration.function(self, subject)
        except BaseException:
            del self._facts[name]
            raise
        finally:
            self._frames.pop()
        if value is None and not frame.missing and not frame.failed:
            self._facts[name] = _DOES_NOT_APPLY
            return None
        made = self._facts[name] = Fact(
            key, subject.name, declaration.unit, None if frame.missing or frame.failed else value, _once(frame.missing),
            _once(frame.outside), frame.failed, _once(frame.asked), tuple(frame.steps),
        )  # fmt: skip
        return made

    def _ask(self, key: str, subject: Subject | None) -> Fact | None:
        found = self.fact(key, subject)
        if found is not None:
            frame = self._frames[-1]
            frame.asked.append(f"{key}|{found.subject}")
            frame.missing += found.missing
            frame.outside += found.outside
            frame.failed = frame.failed or found.failed
        return found

    def __call__(self, key: str, subject: Subject | None = None) -> Samples:
        """Samples of a fact that must apply; NaN where it is missing, which is then recorded.

        Parameters
        ----------
        key : str
            Key of a declared fact.
        subject : Subject, optional
            What it is about.

        Returns
        -------
        ndarray, shape (n,) or (1,)
            Samples.

        Raises
        ------
        LookupError
            The fact does not apply to the subject (a defect of the fact that asks).
        """
        found = self._ask(key, subject)
        if found is None:
            raise LookupError(f"{key} does not apply to {subject.name if subject else 'this machine'}")
        return found.value if isinstance(found.value, np.ndarray) else NOT_KNOWN

    def where_applies(self, key: str, subject: Subject | None = None) -> Samples | None:
        """Samples of a fact, or None where it does not apply.

        Parameters
        ----------
        key : str
            Key of a declared fact.
        subject : Subject, optional
            What it is about.

        Returns
        -------
        ndarray or None
            Samples.
        """
        found = self._ask(key, subject)
        if found is None:
            return None
        return found.value if isinstance(found.value, np.ndarray) else NOT_KNOWN

    def shared(self, name: str, work: Callable[[], Result]) -> Result:
        """An intermediate result that several facts use: worked out once, its trace written into each of them.

        Parameters
        ----------
        name : str
            Name it is remembered by.
        work : callable
            Works it out.

        Returns
        -------
        object
            What `work` returned.
        """
        if name not in self._shared:
            self._frames.append(_Frame())
            try:
                result = work()
            finally:
                frame = self._frames.pop()
            self._shared[name] = (result, frame)
        result, record_of_it = self._shared[name]
        self._frames[-1].take_over(record_of_it)
        return result

    def is_known(self, key: str, subject: Subject | None = None) -> bool:
        """Whether a fact applies and has a value; asking leaves no trace of missing fields.

        Parameters
        ----------
        key : str
            Key of a declared fact.
        subject : Subject, optional
            What it is about.

        Returns
        -------
        bool
            True where it has a value.
        """
        found = self.fact(key, subject)
        return found is not None and found.known

    def value(self, subject: Subject, field: str) -> Samples:
        """Samples of a stated field; NaN where it is not stated, which is then recorded.

        Parameters
        ----------
        subject : Subject
            Whose field.
        field : str
            Name of the field.

        Returns
        -------
        ndarray, shape (n,) or (1,)
            Samples.
        """
        stated = getattr(subject.entity, field)
        path = f"{subject.path}.{field}"
        return self.missing(path) if stated is None else self.draw(path, stated)

    def draw(self, path: str, stated: Stated) -> Samples:
        """Samples of a stated value anywhere in the file.

        Parameters
        ----------
        path : str
            Its path.
        stated : Stated
            The value.

        Returns
        -------
        ndarray, shape (n,) or (1,)
            Samples.
        """
        self._frames[-1].asked.append(path)
        drawn = self._drawn.get(path)
        if drawn is None:
            drawn = self._drawn[path] = self._sampler.samples(path, stated)
            self.stated[path] = stated
        return drawn

    def relative_spread(self, stated: Stated) -> float:
        """Half-width of the spread used for a value, over the value.

        Parameters
        ----------
        stated : Stated
            A value other than zero.

        Returns
        -------
        float
            Share.
        """
        return self._sampler.half_width(stated) / abs(stated.value)

    def word(self, subject: Subject, field: str) -> Word | None:
        """A stated word, yes or no, or day; None where it is not stated, which is then recorded.

        Parameters
        ----------
        subject : Subject
            Whose field.
        field : str
            Name of the field.

        Returns
        -------
        str, bool, date, tuple or None
            The word.
        """
        found: Word | None = getattr(subject.entity, field)
        path = f"{subject.path}.{field}"
        if found is None:
            self.missing(path)
        else:
            self._frames[-1].asked.append(path)
        return found

    def fitted(self, path: str, best: Samples, covariance: Samples) -> tuple[Samples, ...]:
        """Samples of quantities that were fitted together.

        Parameters
        ----------
        path : str
            Path of the value they were fitted to.
        best : ndarray, shape (k,)
            Best estimates.
        covariance : ndarray, shape (k, k)
            Their covariance.

        Returns
        -------
        tuple of ndarray
            Samples of each.
        """
        return self.shared(f"fit of {path}", lambda: self._sampler.correlated(path, best, covariance))

    def missing(self, *paths: str) -> Samples:
        """Record that fields are needed and not stated.

        Parameters
        ----------
        *paths : str
            Paths of the fields.

        Returns
        -------
        ndarray, shape (1,)
            NaN.
        """
        self._frames[-1].missing += paths
        return NOT_KNOWN

    def policy(self, name: str) -> Samples:
        """A threshold or default of the policy.

        Parameters
        ----------
        name : str
            Field of the policy.

        Returns
        -------
        ndarray, shape (1,)
            Its value [SI].
        """
        self._frames[-1].asked.append(f"policy.{name}")
        setting = getattr(self.rules, name)
        return np.array([setting.value if isinstance(setting, Stated) else float(setting)])

    def note(self, asked: str) -> None:
        """Record something else that a fact rests on (a table of materials, a count).

        Parameters
        ----------
        asked : str
            What it is.
        """
        self._frames[-1].asked.append(asked)

    def apply(self, formula: Callable[..., Samples], *arguments: Any, **named: Any) -> Samples:
        """Apply a formula and record it with its numbers.

        Parameters
        ----------
        formula : callable
            Function of `spinhazard.mechanics` declared with ``@formula``.
        *arguments, **named : array_like or str
            Its arguments.

        Returns
        -------
        ndarray
            Its result; NaN where the arguments do not fit each other, which is then recorded.
        """
        frame = self._frames[-1]
        given = dict(zip(formula.__code__.co_varnames, arguments, strict=False))
        given.update(named)
        try:
            result: Samples = formula(*arguments, **named)
        except ValueError as error:
            frame.failed = frame.failed or f"within the stated spreads the values do not fit each other: {error}"
            return NOT_KNOWN
        if result.ndim == 0:
            result = result.reshape(1)
        about = record(formula)
        best = {name: _first(value) for name, value in given.items() if not isinstance(value, str)}
        frame.outside += about.range_breaches(best) if about.valid else ()
        frame.steps.append(Step(about, best, float(result.item(0))))
        return result


def _first(value: Any) -> float:
    return float(value.item(0)) if isinstance(value, np.ndarray) else float(value)


def _once(names: list[str]) -> tuple[str, ...]:
    return tuple(dict.fromkeys(names)) if names else ()


def is_number(value: FactValue) -> bool:
    """Whether a fact's value is numeric.

    Parameters
    ----------
    value : FactValue
        Value of a fact.

    Returns
    -------
    bool
        True for samples.
    """
    return isinstance(value, np.ndarray)


_UNDER_WAY = Fact("under way", "", "", None)
_DOES_NOT_APPLY = Fact("does not apply", "", "", None)
