"""Stated spreads to one sample axis. Entry 0 is the best estimate, the others are draws; the only random generator here.

Every stated value draws from a stream of its own, keyed by the digest of the inputs and by its path: the same file gives
the same numbers, and a value added to it leaves the draws of the others as they were (JCGM 101:2008, clause 6.4).
"""

from __future__ import annotations

import hashlib
import math
from collections.abc import Sequence

import numpy as np
from numpy.typing import NDArray

from spinhazard.quantity.stated import Stated
from spinhazard.statement.policy import Spreads

Samples = NDArray[np.float64]
SOURCE = "jcgm-101 clauses 6 and 7"
"""Where the method is from."""


class Sampler:
    """Draws for stated values.

    Parameters
    ----------
    seed : str
        Digest of the inputs.
    draws : int
        Number of draws; 0 for the best estimate alone.
    spreads : Spreads
        Relative half-widths where a value states no spread.
    """

    def __init__(self, seed: str, draws: int, spreads: Spreads) -> None:
        self.draws = draws
        self._seed = seed
        self._spreads = spreads

    def half_width(self, stated: Stated) -> float:
        """Half-width used for a value: the stated one, else the policy's for the class of its source.

        Parameters
        ----------
        stated : Stated
            The value.

        Returns
        -------
        float
            Half-width [SI].
        """
        if stated.half_width is not None:
            return stated.half_width
        share: float = getattr(self._spreads, stated.source_class or "not_stated")
        return share * abs(stated.value)

    def samples(self, path: str, stated: Stated) -> Samples:
        """Best estimate and draws of one stated value.

        Parameters
        ----------
        path : str
            Path of the value in the file.
        stated : Stated
            The value.

        Returns
        -------
        ndarray, shape (draws + 1,) or (1,)
            Entry 0 is the best estimate; shape (1,) where there is no spread.
        """
        half_width = self.half_width(stated)
        if self.draws == 0 or half_width == 0.0:
            return np.array([stated.value])
        key = int.from_bytes(hashlib.sha256(f"{self._seed}|{path}".encode()).digest()[:16], "big")
        generator = np.random.Generator(np.random.Philox(key=key))
        drawn = np.empty(self.draws + 1)
        drawn[0] = stated.value
        if stated.half_width is None or stated.coverage_factor is None:
            drawn[1:] = generator.uniform(stated.value - half_width, stated.value + half_width, self.draws)
        else:
            drawn[1:] = _positive_normal(generator, stated.value, half_width / stated.coverage_factor, self.draws)
        return drawn

    def correlated(self, path: str, best: Samples, covariance: Samples) -> tuple[Samples, ...]:
        """Best estimates and draws of quantities that were fitted together.

        Parameters
        ----------
        path : str
            Path of the value they were fitted to.
        best : ndarray, shape (k,)
            Best estimates, none below zero.
        covariance : ndarray, shape (k, k)
            Their covariance.

        Returns
        -------
        tuple of ndarray
            Samples of each; draws below zero are taken as zero, the bound of the fit.
        """
        if self.draws == 0:
            return tuple(np.array([value]) for value in best)
        key = int.from_bytes(hashlib.sha256(f"{self._seed}|{path}".encode()).digest()[:16], "big")
        generator = np.random.Generator(np.random.Philox(key=key))
        drawn = np.maximum(generator.multivariate_normal(best, covariance, self.draws, method="eigh"), 0.0)
        return tuple(np.concatenate([[value], column]) for value, column in zip(best, drawn.T, strict=True))


def _positive_normal(generator: np.random.Generator, mean: float, deviation: float, count: int) -> Samples:
    """Normal draws; no stated quantity here can be negative, so a draw that is gets drawn again."""
    drawn = generator.normal(mean, deviation, count)
    for _ in range(100):
        below = drawn <= 0.0
        if not below.any():
            return drawn
        drawn[below] = generator.normal(mean, deviation, int(below.sum()))
    return np.where(drawn > 0.0, drawn, mean)


def largest(terms: Sequence[Samples]) -> Samples:
    """Entry by entry the largest of samples of different lengths.

    Parameters
    ----------
    terms : sequence of ndarray
        Samples, at least one.

    Returns
    -------
    ndarray
        Their maximum; NaN where any is.
    """
    result: Samples = np.maximum.reduce(np.broadcast_arrays(*terms))
    return result


def smallest(terms: Sequence[Samples]) -> Samples:
    """Entry by entry the smallest of samples of different lengths.

    Parameters
    ----------
    terms : sequence of ndarray
        Samples, at least one.

    Returns
    -------
    ndarray
        Their minimum; NaN where any is.
    """
    result: Samples = np.minimum.reduce(np.broadcast_arrays(*terms))
    return result


def interval(samples: Samples, coverage: float) -> tuple[float, float]:
    """Probabilistically symmetric coverage interval (JCGM 101:2008, 7.7).

    Parameters
    ----------
    samples : ndarray, shape (n,)
        Entry 0 is the best estimate, which takes no part.
    coverage : float
        Coverage probability.

    Returns
    -------
    (float, float)
        Lower and upper end; both the best estimate where there are no draws.
    """
    if samples.size < 2:
        return float(samples[0]), float(samples[0])
    ordered = np.sort(samples[1:])
    tail = (1.0 - coverage) / 2.0
    last = ordered.size - 1
    # whole draws, not interpolated ones: a stop that never ends has draws at infinity
    return float(ordered[math.floor(tail * last)]), float(ordered[math.ceil((1.0 - tail) * last)])
