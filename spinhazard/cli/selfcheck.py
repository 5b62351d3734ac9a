"""``spinhazard selfcheck``: published values recomputed on this installation."""

from __future__ import annotations

from spinhazard.assessment import program_name
from spinhazard.cli.screen import say, wrapped
from spinhazard.selfcheck.runner import CheckResult, run_all
from spinhazard.sources import citation


def run(*, all_values: bool) -> None:
    """Recompute and report.

    Parameters
    ----------
    all_values : bool
        Show every value instead of a summary.

    Raises
    ------
    SystemExit
        Code 1 on any deviation, 0 otherwise.
    """
    results = run_all()
    deviating = [result for result in results if not result.within]
    if all_values:
        for subject in dict.fromkeys(result.check.subject for result in results):
            say("", subject.upper())
            for result in results:
                if result.check.subject == subject:
                    say(*_lines(result))
    else:
        for result in deviating:
            say(*_lines(result))
    counts = {
        kind: sum(result.check.kind == kind for result in results) for kind in ("published", "recomputed", "regression")
    }
    kinds = ", ".join(f"{count} {kind}" for kind, count in counts.items() if count)
    memory = sum(result.check.read == "memory" for result in results)
    say(
        "",
        *wrapped(
            f"{program_name()}: {len(results)} check values ({kinds}; {memory} of the figures from memory, marked so)."
        ),
    )
    if deviating:
        say(
            *wrapped(
                f"{len(deviating)} deviate by more than their tolerance. Do not use this installation before the cause is known."
            )
        )
        raise SystemExit(1)
    say(
        *wrapped(
            "Every value lies within its stated tolerance. This is evidence for the validation of software, no statement about a machine."
        )
    )


def _lines(result: CheckResult) -> list[str]:
    check = result.check
    mark = "  " if result.within else "! "
    head = (
        f"{check.name}: published {check.expect:.6g}, here {result.computed:.6g}, "
        f"deviation {result.deviation:.2g} (tolerance {check.tolerance:.2g})"
    )
    origin = f"{citation(check.source)}; {check.kind}" + ("; figure from memory" if check.read == "memory" else "")
    return [*wrapped(head, indent=4, first=mark), *wrapped(origin, indent=6)]
