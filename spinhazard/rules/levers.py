"""Fields of the assessment file that a protective measure may change, by their path without identifiers."""

from __future__ import annotations

import difflib
from functools import lru_cache
from typing import Any, get_args

from pydantic import BaseModel

from spinhazard.statement.machine import AssessmentFile


@lru_cache(maxsize=1)
def _paths() -> frozenset[str]:
    return frozenset(_below(AssessmentFile, ""))


def _below(model: type[BaseModel], prefix: str) -> list[str]:
    paths: list[str] = []
    for name, info in model.model_fields.items():
        path = f"{prefix}{info.alias or name}"
        paths.append(path)
        for inner in _models_in(info.annotation):
            paths += _below(inner, f"{path}.")
    return paths


def _models_in(annotation: Any) -> list[type[BaseModel]]:
    if isinstance(annotation, type) and issubclass(annotation, BaseModel):
        return [annotation]
    return [model for part in get_args(annotation) for model in _models_in(part)]


def is_lever(path: str) -> bool:
    """Whether a path leads to a field of the assessment file.

    Parameters
    ----------
    path : str
        Such as ``guard.distance`` or ``shaft.part.max_rated_speed``.

    Returns
    -------
    bool
        True where there is such a field.
    """
    return path in _paths()


def nearest_lever(path: str) -> str:
    """The path that comes nearest to one that leads nowhere; only on the way to a message.

    Parameters
    ----------
    path : str
        As written.

    Returns
    -------
    str
        The nearest, or empty.
    """
    near = difflib.get_close_matches(path[:80], _paths(), n=1, cutoff=0.4)
    return near[0] if near else ""
