"""What a fact or a finding is about: the machine, a shaft, a part, a stop case, a guard, the lockout procedure."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from spinhazard.statement.machine import AssessmentFile
from spinhazard.statement.stopping import STOP_CASES


@dataclass(frozen=True, slots=True)
class Subject:
    """One subject.

    Attributes
    ----------
    kind : str
        machine, shaft, part, stop, guard or lockout.
    name : str
        As in the JSON: ``machine``, ``part:impeller/hub``, ``stop:power loss`` …
    path : str
        Where its stated values stand in the file: ``shaft.impeller.part.hub``.
    entity : object
        The statement model behind it; the name of the case for a stop.
    parent : Subject or None
        The shaft of a part.
    """

    kind: str
    name: str
    path: str
    entity: Any
    parent: Subject | None = None


@dataclass(frozen=True, slots=True)
class Subjects:
    """All subjects of one file."""

    machine: Subject
    shafts: tuple[Subject, ...]
    parts: tuple[Subject, ...]
    stops: tuple[Subject, ...]
    guards: tuple[Subject, ...]
    lockout: Subject

    def of_kind(self, kind: str) -> tuple[Subject, ...]:
        """Subjects of one kind, in the order of the file.

        Parameters
        ----------
        kind : str
            machine, shaft, part, stop, guard or lockout.

        Returns
        -------
        tuple of Subject
            The subjects.
        """
        if kind in {"machine", "lockout"}:
            return (self.machine if kind == "machine" else self.lockout,)
        several = {"shaft": self.shafts, "part": self.parts, "stop": self.stops, "guard": self.guards}
        return several[kind]

    def all(self) -> tuple[Subject, ...]:
        """Every subject, machine first, lockout last.

        Returns
        -------
        tuple of Subject
            The subjects.
        """
        return (self.machine, *self.shafts, *self.parts, *self.stops, *self.guards, self.lockout)

    def shaft(self, name: str) -> Subject:
        """Subject of a shaft.

        Parameters
        ----------
        name : str
            Identifier of the shaft.

        Returns
        -------
        Subject
            The shaft.
        """
        return next(shaft for shaft in self.shafts if shaft.entity.id == name)

    def parts_of(self, shaft: Subject) -> tuple[Subject, ...]:
        """Parts on a shaft.

        Parameters
        ----------
        shaft : Subject
            The shaft.

        Returns
        -------
        tuple of Subject
            Its parts.
        """
        return tuple(part for part in self.parts if part.parent is shaft)


def subjects_of(file: AssessmentFile) -> Subjects:
    """Subjects of an assessment file.

    Parameters
    ----------
    file : AssessmentFile
        The statement.

    Returns
    -------
    Subjects
        All subjects; the stop case ``brake failed`` exists only where there is a brake.
    """
    shafts = tuple(Subject("shaft", f"shaft:{shaft.id}", f"shaft.{shaft.id}", shaft) for shaft in file.shafts)
    parts = tuple(
        Subject("part", f"part:{shaft.entity.id}/{part.id}", f"{shaft.path}.part.{part.id}", part, shaft)
        for shaft in shafts
        for part in shaft.entity.parts
    )
    braked = file.stopping is not None and bool(file.stopping.brakes)
    return Subjects(
        machine=Subject("machine", "machine", "machine", file.machine),
        shafts=shafts,
        parts=parts,
        stops=tuple(
            Subject("stop", f"stop:{case}", "stopping", case) for case in STOP_CASES if braked or case != "brake failed"
        ),
        guards=tuple(Subject("guard", f"guard:{guard.id}", f"guard.{guard.id}", guard) for guard in file.guards),
        lockout=Subject("lockout", "lockout", "lockout", file.lockout),
    )
