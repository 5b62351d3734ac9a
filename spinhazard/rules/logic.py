"""Three-valued comparison under uncertainty (Kleene's strong logic), one value for each draw; pure.

NO < UNKNOWN < YES, so that "and" is the minimum and "or" the maximum.
"""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np
from numpy.typing import NDArray

Truth = NDArray[np.int8]
NO, UNKNOWN, YES = 0, 1, 2
_RELATIVE_WIDTH_OF_A_LIMIT = 1e-12  # a value computed to be at the limit is at it, not beyond it by a rounding error


def certain(*, holds: bool) -> Truth:
    """A truth that is the same in every draw.

    Parameters
    ----------
    holds : bool
        Whether it holds.

    Returns
    -------
    ndarray, shape (1,)
        YES or NO.
    """
    return np.array([YES if holds else NO], dtype=np.int8)


def unknown() -> Truth:
    """The truth of a comparison with a missing side.

    Returns
    -------
    ndarray, shape (1,)
        UNKNOWN.
    """
    return np.array([UNKNOWN], dtype=np.int8)


def exceeds(left: NDArray[np.float64], right: NDArray[np.float64]) -> Truth:
    """Whether left is greater than right, draw by draw; equal is not greater.

    Parameters
    ----------
    left, right : ndarray, shape (n,) or (1,)
        Samples.

    Returns
    -------
    ndarray, shape (n,) or (1,)
        YES or NO; UNKNOWN where a side is not a number, as never over never.
    """
    with np.errstate(invalid="ignore", over="ignore"):
        greater = left > right + np.where(np.isfinite(right), np.abs(right), 0.0) * _RELATIVE_WIDTH_OF_A_LIMIT
    return np.where(np.isnan(left) | np.isnan(right), UNKNOWN, np.where(greater, YES, NO)).astype(np.int8)


def all_of(truths: Sequence[Truth]) -> Truth:
    """Conjunction, draw by draw; of nothing: YES.

    Parameters
    ----------
    truths : sequence of ndarray
        Truths of shape (n,) or (1,).

    Returns
    -------
    ndarray
        Their minimum.
    """
    result = certain(holds=True)
    for truth in truths:
        result = np.minimum(result, truth)
    return result


def any_of(truths: Sequence[Truth]) -> Truth:
    """Disjunction, draw by draw; of nothing: NO.

    Parameters
    ----------
    truths : sequence of ndarray
        Truths of shape (n,) or (1,).

    Returns
    -------
    ndarray
        Their maximum.
    """
    result = certain(holds=False)
    for truth in truths:
        result = np.maximum(result, truth)
    return result


def likelihood(truth: Truth) -> float:
    """Share of the draws in which it holds.

    Parameters
    ----------
    truth : ndarray, shape (n,) or (1,)
        Entry 0 belongs to the best estimate and takes no part where there are draws.

    Returns
    -------
    float
        Between 0 and 1.
    """
    draws = truth[1:] if truth.size > 1 else truth
    return float(np.count_nonzero(draws == YES) / draws.size)


def undecided(truth: Truth) -> float:
    """Share of the draws in which nothing can be said.

    Parameters
    ----------
    truth : ndarray, shape (n,) or (1,)
        Entry 0 belongs to the best estimate and takes no part where there are draws.

    Returns
    -------
    float
        Between 0 and 1.
    """
    draws = truth[1:] if truth.size > 1 else truth
    return float(np.count_nonzero(draws == UNKNOWN) / draws.size)
