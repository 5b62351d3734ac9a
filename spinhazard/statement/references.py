"""What one table says about another: ids that must differ, shafts that must exist, drives that must not run in a circle.

Checked on the plain data, so that these complaints come together with those about single fields.
"""

from __future__ import annotations

import difflib
from collections.abc import Iterator
from typing import Any

from spinhazard.statement.fields import Fault
from spinhazard.statement.lines import Path

MOST_PARTS = 500
"""Parts in one file; a machine of sixty is a large one, and every fact of a part carries thousands of draws."""
Found = Iterator[tuple[Path, Fault]]


def reference_faults(raw: dict[str, Any]) -> Found:
    """Every reference that leads nowhere, and every id used twice.

    Parameters
    ----------
    raw : dict
        Plain data of an assessment file.

    Yields
    ------
    (Path, Fault)
        Place and what is wrong there.
    """
    shafts = _entries(raw.get("shaft"))
    names = [shaft["id"] for _, shaft in shafts if isinstance(shaft.get("id"), str)]
    yield from _twice(("shaft",), shafts)
    for index, shaft in shafts:
        yield from _twice(("shaft", index, "part"), _entries(shaft.get("part")))
        driver = shaft.get("driven_by")
        if isinstance(driver, str) and driver not in names:
            yield ("shaft", index, "driven_by"), _unknown(driver, names)
    yield from _circles(shafts)
    if sum(len(_entries(shaft.get("part"))) for _, shaft in shafts) > MOST_PARTS:
        yield ("shaft",), Fault("too many parts", accepted=f"at most {MOST_PARTS} parts in one file")
    guards = _entries(raw.get("guard"))
    yield from _twice(("guard",), guards)
    for index, guard in guards:
        covers = guard.get("covers")
        for shaft_name in covers if isinstance(covers, list) else ():
            if isinstance(shaft_name, str) and shaft_name not in names:
                yield ("guard", index, "covers"), _unknown(shaft_name, names)
    stopping = raw.get("stopping")
    if isinstance(stopping, dict) and isinstance(stopping.get("shaft"), str) and stopping["shaft"] not in names:
        yield ("stopping", "shaft"), _unknown(stopping["shaft"], names)


def _entries(value: Any) -> list[tuple[int, dict[str, Any]]]:
    return [(i, entry) for i, entry in enumerate(value) if isinstance(entry, dict)] if isinstance(value, list) else []


def _twice(path: Path, entries: list[tuple[int, dict[str, Any]]]) -> Found:
    seen: set[str] = set()
    for index, entry in entries:
        name = entry.get("id")
        if isinstance(name, str):
            if name in seen:
                yield (
                    (*path, index, "id"),
                    Fault("this id is used twice", stated=name, accepted="a name of its own for each"),
                )
            seen.add(name)


def _unknown(name: str, names: list[str]) -> Fault:
    near = difflib.get_close_matches(name[:80], names, n=1, cutoff=0.4)
    return Fault(
        "no shaft has this id", stated=name, accepted="one of " + ", ".join(f'"{known}"' for known in names[:20]),
        nearest=f'"{near[0]}"' if near else "",
    )  # fmt: skip


def _circles(shafts: list[tuple[int, dict[str, Any]]]) -> Found:
    drivers = {
        shaft["id"]: shaft["driven_by"] for _, shaft in shafts
        if isinstance(shaft.get("id"), str) and isinstance(shaft.get("driven_by"), str)
    }  # fmt: skip
    told: set[str] = set()
    for index, shaft in shafts:
        start = shaft.get("id")
        if not isinstance(start, str) or start in told:
            continue
        chain = [start]
        while (driver := drivers.get(chain[-1])) is not None and driver not in chain:
            chain.append(driver)
        if driver is not None and driver == start:
            told.update(chain)
            yield (
                ("shaft", index, "driven_by"),
                Fault(
                    "shafts drive each other in a circle" if len(chain) > 1 else "a shaft drives itself",
                    stated=" ← ".join([*chain, start]), accepted="driven_by on all but one shaft of a drivetrain",
                ),
            )  # fmt: skip
