"""``spinhazard start KIND FILE``: a commented starter file."""

from __future__ import annotations

import difflib
from importlib import resources
from pathlib import Path
from typing import get_args

from spinhazard.cli.screen import say
from spinhazard.errors import Complaint, InputError, quoted
from spinhazard.files import write_file
from spinhazard.statement.machine import MachineKind

KINDS: tuple[str, ...] = get_args(MachineKind)


def run(kind: str, file: Path, *, overwrite: bool) -> None:
    """Write the starter of a kind.

    Parameters
    ----------
    kind : str
        Kind of machine.
    file : Path
        Target.
    overwrite : bool
        Whether an existing file may be replaced.

    Raises
    ------
    InputError
        There is no such kind.
    """
    if kind not in KINDS:
        near = difflib.get_close_matches(kind[:80].lower(), KINDS, n=1, cutoff=0.4)
        raise InputError(
            Complaint(
                "not a kind of machine known here",
                field="KIND",
                stated=quoted(kind),
                accepted=", ".join(KINDS),
                nearest=near[0] if near else "",
            )
        )
    text = resources.files("spinhazard.statement").joinpath("starters", f"{kind}.toml").read_text("utf-8")
    write_file(file, text.encode("utf-8"), overwrite=overwrite)
    say(f"Wrote {file}. Put in what you know, leave out what you do not, then: spinhazard assess {file}")
