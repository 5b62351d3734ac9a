"""``spinhazard assess FILE…``: terminal summary, worksheet, JSON."""

from __future__ import annotations

import sys
from dataclasses import dataclass
from pathlib import Path

from spinhazard.assessment import Assessment, as_json, assess
from spinhazard.cli.screen import say
from spinhazard.cli.summary import summary
from spinhazard.errors import Complaint, InputError, OutputError, SpinhazardError, quoted
from spinhazard.files import check_output, write_file
from spinhazard.quantity.display import System
from spinhazard.statement.policy import Policy
from spinhazard.statement.reading import read_assessment, read_policy


@dataclass(frozen=True)
class Outputs:
    """Where the results go."""

    pdf: Path | None
    json: Path | None
    paper: str
    overwrite: bool

    @property
    def json_to_screen(self) -> bool:
        """Whether the JSON goes to standard output, which then holds nothing else."""
        return self.json is not None and str(self.json) == "-"


def run(files: list[Path], outputs: Outputs, *, policy_file: Path | None, system: System, best_estimate: bool) -> None:
    """Assess files one after the other; the first unusable one stops nothing but the exit code.

    Parameters
    ----------
    files : list of Path
        Assessment files.
    outputs : Outputs
        Where the results go.
    policy_file : Path or None
        The site's policy.
    system : "si" or "us"
        Units shown.
    best_estimate : bool
        Leave the uncertainty out.

    Raises
    ------
    InputError
        A file was not usable; with several files the others were assessed all the same.
    SystemExit
        With the exit code of the contract.
    """
    targets = _targets(files, outputs)
    policy = read_policy(policy_file)[0] if policy_file is not None else Policy()
    attention = False
    failed: list[SpinhazardError] = []
    for file, (pdf, json) in zip(files, targets, strict=True):
        try:
            result = assess(read_assessment(file), policy=policy, best_estimate=best_estimate, system=system)
        except InputError as error:
            if len(files) == 1:
                raise
            failed.append(error)
            continue
        attention = attention or result.needs_attention
        written = _write(result, pdf, json, outputs, system)
        if not outputs.json_to_screen:
            say(*summary(result, system=system), *written, "")
    if failed:
        raise InputError([complaint for error in failed for complaint in error.complaints])
    raise SystemExit(1 if attention else 0)


def _targets(files: list[Path], outputs: Outputs) -> list[tuple[Path | None, Path | None]]:
    """Paths of worksheet and JSON for each file, refused before anything is computed."""
    if outputs.paper not in {"a4", "letter"}:
        raise InputError(
            Complaint(
                "not a size of paper known here", field="--paper", stated=quoted(outputs.paper), accepted="a4, letter"
            )
        )
    pdfs = _paths(files, outputs.pdf, ".pdf", "--pdf")
    jsons = [None] * len(files) if outputs.json_to_screen else _paths(files, outputs.json, ".json", "--json")
    if outputs.json_to_screen and len(files) > 1:
        raise OutputError(
            Complaint(
                "one JSON text holds one machine", field="--json", stated="-", accepted="a folder for several files"
            )
        )
    planned = [path for path in (*pdfs, *jsons) if path is not None]
    for path in planned:
        if planned.count(path) > 1:
            raise OutputError(Complaint("two outputs would have this name", file=str(path)))
        if any(path.exists() and path.samefile(file) for file in files if file.exists()):
            raise OutputError(
                Complaint("this is an input file", file=str(path), accepted="another name for the output")
            )
        check_output(path, overwrite=outputs.overwrite)
    return list(zip(pdfs, jsons, strict=True))


def _paths(files: list[Path], target: Path | None, ending: str, option: str) -> list[Path | None]:
    if target is None:
        return [None] * len(files)
    if target.is_dir():
        return [target / f"{file.stem}{ending}" for file in files]
    if len(files) > 1:
        raise OutputError(
            Complaint(
                "not a folder",
                file=str(target),
                field=option,
                accepted="an existing folder for several assessment files",
            )
        )
    return [target]


def _write(result: Assessment, pdf: Path | None, json: Path | None, outputs: Outputs, system: System) -> list[str]:
    """Make everything first, then write: a failure leaves nothing half-done."""
    made: list[tuple[Path, bytes]] = []
    if json is not None:
        made.append((json, as_json(result).encode()))
    if pdf is not None:
        from spinhazard.worksheet import worksheet  # noqa: PLC0415  (reportlab only where a worksheet is asked for)

        made.append((pdf, worksheet(result, system=system, paper=outputs.paper)))
    for path, data in made:
        write_file(path, data, overwrite=outputs.overwrite)
    if outputs.json_to_screen:
        sys.stdout.write(as_json(result))
    return ["", *(f"Wrote {path}" for path, _ in made)] if made else []
