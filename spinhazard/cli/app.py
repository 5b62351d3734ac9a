"""The commands and their options; each calls the file of its own name."""

from __future__ import annotations

from pathlib import Path
from typing import Annotated, Literal, Optional

import typer

app = typer.Typer(
    name="spinhazard",
    help="Assess machines whose parts keep turning after the power is off. Flags conditions for review; defers to local codes"
    " and qualified, licensed safety professionals.",
    no_args_is_help=True,
    add_completion=False,
    pretty_exceptions_enable=False,
    rich_markup_mode=None,
)

Overwrite = Annotated[bool, typer.Option("--overwrite", help="Replace output files that exist.")]
Units = Annotated[str, typer.Option(metavar="si|us", help="Units shown: si, or us (US customary).")]
PolicyFile = Annotated[Optional[Path], typer.Option(metavar="FILE", help="The site's policy file.")]  # noqa: UP045  (typer reads it at run time)
JsonPath = Annotated[
    Path | None, typer.Option("--json", metavar="PATH", help="Write the result as JSON; - for standard output.")
]

AssessmentPath = Annotated[Optional[Path], typer.Option(metavar="FILE", help="Merge into its stopping table.")]  # noqa: UP045


@app.callback(invoke_without_command=True)
def _root(
    *,
    version: Annotated[bool, typer.Option("--version", help="Show name and version.", is_eager=True)] = False,
) -> None:
    if version:
        from spinhazard.assessment import program_name  # noqa: PLC0415

        typer.echo(program_name())
        raise typer.Exit


def _system(units: str) -> Literal["si", "us"]:
    if units not in {"si", "us"}:
        from spinhazard.errors import Complaint, InputError, quoted  # noqa: PLC0415

        raise InputError(Complaint("not a system of units", field="--units", stated=quoted(units), accepted="si, us"))
    return "us" if units == "us" else "si"


@app.command()
def start(
    kind: Annotated[
        str, typer.Argument(help="fan, grinder, saw, press, centrifuge, lathe, mixer, roll, flywheel or other.")
    ],
    file: Annotated[Path, typer.Argument(help="File to write.")],
    *,
    overwrite: Overwrite = False,
) -> None:
    """Write a commented starter file for a kind of machine."""
    from spinhazard.cli import start as command  # noqa: PLC0415

    command.run(kind, file, overwrite=overwrite)


@app.command()
def assess(
    files: Annotated[list[Path], typer.Argument(metavar="FILE…", help="Assessment files.")],
    pdf: Annotated[
        Path | None, typer.Option(metavar="PATH", help="Write the worksheet; a folder for several files.")
    ] = None,
    json: JsonPath = None,
    policy: PolicyFile = None,
    units: Units = "si",
    *,
    paper: Annotated[str, typer.Option(metavar="a4|letter", help="Paper of the worksheet.")] = "a4",
    best_estimate: Annotated[bool, typer.Option("--best-estimate", help="Leave the uncertainty out.")] = False,
    overwrite: Overwrite = False,
) -> None:
    """Assess machines: stored energy, stops, access, containment, lockout; flag conditions for review.

    Exit code 0: nothing for review. 1: something for review, borderline or missing. 2: input not usable. 3: output not written.
    """
    from spinhazard.cli import assess as command  # noqa: PLC0415

    outputs = command.Outputs(pdf=pdf, json=json, paper=paper, overwrite=overwrite)
    command.run(files, outputs, policy_file=policy, system=_system(units), best_estimate=best_estimate)


@app.command()
def coastdown(  # noqa: PLR0913  (one argument for each option)
    logs: Annotated[list[Path], typer.Argument(metavar="LOG…", help="Tachometer logs (CSV) of the same rotor.")],
    *,
    time_column: Annotated[str, typer.Option(metavar="NAME", help="Column of the time.")] = "",
    speed_column: Annotated[str, typer.Option(metavar="NAME", help="Column of the speed.")] = "",
    time_unit: Annotated[str, typer.Option(metavar="UNIT", help="Unit of the time, where the head has none.")] = "",
    speed_unit: Annotated[str, typer.Option(metavar="UNIT", help="Unit of the speed, where the head has none.")] = "",
    inertia: Annotated[str, typer.Option(metavar="TEXT", help='Inertia at the shaft of the log, "1.9 kg m2".')] = "",
    start: Annotated[list[str], typer.Option("--from", metavar="SPEED", help="Predict the stop from this speed.")] = [],  # noqa: B006
    standstill: Annotated[
        str, typer.Option(metavar="SPEED", help="Speed below which the shaft counts as stopped.")
    ] = "",
    into: AssessmentPath = None,
    json: JsonPath = None,
    overwrite: Overwrite = False,
) -> None:
    """Fit dry friction, viscous drag and windage to coast-down logs; predict stops from other speeds."""
    from spinhazard.cli import coastdown as command  # noqa: PLC0415
    from spinhazard.statement.tachometer_log import LogOptions  # noqa: PLC0415

    options = LogOptions(time_column, speed_column, time_unit, speed_unit)
    command.run(logs, options, command.Wanted(inertia, tuple(start), standstill, into, json, overwrite))


@app.command()
def rules(
    key: Annotated[Optional[str], typer.Argument(help="Key of one rule to explain.")] = None,  # noqa: UP045
    family: Annotated[Optional[str], typer.Option(metavar="NAME", help="Only this family.")] = None,  # noqa: UP045
    json: JsonPath = None,
    *,
    overwrite: Overwrite = False,
) -> None:
    """List the rules, or explain one: question, condition, basis, what may be done."""
    from spinhazard.cli import rules as command  # noqa: PLC0415

    command.run(key, family=family, json_path=json, overwrite=overwrite)


@app.command()
def selfcheck(
    *,
    all_values: Annotated[bool, typer.Option("--all", help="Show every value, not only the summary.")] = False,
) -> None:
    """Recompute the published check values on this installation; exit code 1 on any deviation."""
    from spinhazard.cli import selfcheck as command  # noqa: PLC0415

    command.run(all_values=all_values)
