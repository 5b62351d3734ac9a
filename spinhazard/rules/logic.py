"""Three-valued comparison under uncertainty (Kleene's strong logic), one value for each draw; pure.

NO < UNKNOWN < YES, so that "and" is the minimum and "or" the maximum.
"""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np
from numpy.typing import NDArray

Truth = NDArray[np.int8]
NO, UNKNOWN, YES = 0, 1, 2
_NO, _UNKNOWN, _YES = (np.array([truth], dtype=np.int8) for truth in (NO, UNKNOWN, YES))
for _constant in (_NO, _UNKNOWN, _YES):
    _constant.flags.writeable = False
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
    return _YES if holds else _NO


def unknown() -> Truth:
    """The truth of a comparison with a missing side.

    Returns
    -------
    ndarray, shape (1,)
        UNKNOWN.
    """
    return _UNKNOWN


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
    if left.size == right.size == 1:  # the best estimate alone, or nothing with a spread
        one, other = float(left[0]), float(right[0])
        if one != one or other != other:  # noqa: PLR0124  (NaN)
            return _UNKNOWN
        return certain(holds=one > other + abs(other) * _RELATIVE_WIDTH_OF_A_LIMIT)
    with np.errstate(invalid="ignore", over="ignore"):
        truth = (left > right + np.abs(right) * _RELATIVE_WIDTH_OF_A_LIMIT).astype(np.int8) * np.int8(YES)
    known = (left == left) & (right == right)  # noqa: PLR0124  (false for NaN, and quicker than asking isnan twice)
    return truth if known.all() else np.where(known, truth, np.int8(UNKNOWN))


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
    if not truths:
        return certain(holds=True)
    result = truths[0]
    for truth in truths[1:]:
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
    if not truths:
        return certain(holds=False)
    result = truths[0]
    for truth in truths[1:]:
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
    if truth.size == 1:
        return float(truth[0] == YES)
    return float(np.count_nonzero(truth[1:] == YES) / (truth.size - 1))


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
