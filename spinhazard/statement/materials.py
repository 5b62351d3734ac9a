"""Materials a part or guard may name, with density and strength; values in ``materials.toml``."""

from __future__ import annotations

import difflib
import tomllib
from dataclasses import dataclass
from functools import lru_cache
from importlib import resources

from spinhazard.statement.fields import Fault

OTHER_NAMES = {
    "cast iron": "grey cast iron",
    "gray cast iron": "grey cast iron",
    "grey iron": "grey cast iron",
    "gray iron": "grey cast iron",
    "aluminum": "aluminium",
    "mild steel": "steel",
    "carbon steel": "steel",
    "structural steel": "steel",
    "nodular iron": "ductile iron",
    "spheroidal graphite iron": "ductile iron",
    "stainless": "stainless steel",
}
"""Spellings of the trade and the entry they mean."""


@dataclass(frozen=True)
class Material:
    """Handbook values of one material in SI units; None where the table states none."""

    name: str
    density: float
    ultimate_strength: float | None
    yield_strength: float | None
    poisson: float | None
    guide_speed: float | None
    steel: bool
    note: str


@lru_cache(maxsize=1)
def materials() -> dict[str, Material]:
    """All materials by name.

    Returns
    -------
    dict
        Name to :class:`Material`, densities in kg/m³, strengths in Pa, guide speeds in m/s.
    """
    text = resources.files("spinhazard.statement").joinpath("materials.toml").read_text("utf-8")
    return {name: _material(name, entry) for name, entry in tomllib.loads(text).items()}


def _material(name: str, entry: dict[str, float | bool | str]) -> Material:
    def figure(key: str, scale: float = 1.0) -> float | None:
        value = entry.get(key)
        return None if value is None else float(value) * scale

    return Material(
        name=name,
        density=float(entry["density"]),
        ultimate_strength=figure("ultimate_strength", 1e6),
        yield_strength=figure("yield_strength", 1e6),
        poisson=figure("poisson"),
        guide_speed=figure("guide_speed"),
        steel=bool(entry.get("steel", False)),
        note=str(entry["note"]),
    )


def known_material(name: str) -> str:
    """Name of the entry a stated material means.

    Parameters
    ----------
    name : str
        As written.

    Returns
    -------
    str
        Key of :func:`materials`.

    Raises
    ------
    Fault
        No such material here; carries the nearest name.
    """
    plain = " ".join(name.lower().split())
    plain = OTHER_NAMES.get(plain, plain)
    if plain in materials():
        return plain
    names = [*materials(), *OTHER_NAMES]
    near = difflib.get_close_matches(plain[:80], names, n=1, cutoff=0.5)
    raise Fault(
        "no such material in the table", stated=name,
        accepted=", ".join(materials()) + "; or leave it out and state density and strength",
        nearest=f'"{near[0]}"' if near else "",
    )  # fmt: skip
