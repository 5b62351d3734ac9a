"""Exact integrals over a closed half-section: volume and inertia of the body it sweeps (Green's theorem)."""

from __future__ import annotations

from itertools import pairwise

import numpy as np
from numpy.typing import ArrayLike, NDArray

from spinhazard.mechanics.arrays import Array

MOST_CORNERS = 2000


def revolved_moments(radii: ArrayLike, heights: ArrayLike) -> tuple[float, float]:
    """Volume, and inertia at density 1, of a body of revolution.

    V = π Σ Δz (r₁² + r₁r₂ + r₂²)/3 and J/ρ = π/2 Σ Δz (r₁⁴ + r₁³r₂ + r₁²r₂² + r₁r₂³ + r₂⁴)/5 over the edges; the sign of
    the sums is that of the orientation.

    Parameters
    ----------
    radii, heights : array_like, shape (corners,)
        Corners in order [m]; the last is joined to the first.

    Returns
    -------
    (float, float)
        Volume [m³] and inertia over density [m⁵].

    Raises
    ------
    ValueError
        The outline crosses itself, has a negative radius, too few or too many corners, or no area.
    """
    r, z = np.asarray(radii, dtype=np.float64), np.asarray(heights, dtype=np.float64)
    if r.ndim != 1 or r.shape != z.shape or not 3 <= r.size <= MOST_CORNERS:
        raise ValueError(f"radii and heights: accepted are two lists of the same 3 to {MOST_CORNERS} corners")
    if np.any(r < 0.0):
        raise ValueError(f"radii = {r.min():.6g} m: accepted is 0 or more")
    if crosses_itself(r, z):
        raise ValueError("the outline crosses itself: accepted are corners in order round the half-section")
    r2, dz = np.roll(r, -1), np.roll(z, -1) - z
    volume = np.pi * np.sum(dz * (r**2 + r * r2 + r2**2)) / 3.0
    second = np.pi / 2.0 * np.sum(dz * (r**4 + r**3 * r2 + r**2 * r2**2 + r * r2**3 + r2**4)) / 5.0
    size = float(max(r.max(), np.ptp(z)))
    if abs(volume) <= 1e-12 * size**3:
        raise ValueError("the outline encloses nothing: accepted are corners that do not lie on one line")
    return float(abs(volume)), float(abs(second))


def crosses_itself(r: Array, z: Array) -> bool:
    """Whether a closed outline crosses itself, between corners or at one, or runs round more than once.

    Touching is no crossing: a slit that leads to a cavity and back, and two tips that meet on the axis, enclose what they show.

    Parameters
    ----------
    r, z : ndarray, shape (corners,)
        Corners in order.

    Returns
    -------
    bool
        True where it does; False where a corner is NaN.
    """
    if np.isnan(r).any() or np.isnan(z).any():
        return False
    return _edges_cross(r, z) or not _winds_once(r, z)


def _edges_cross(r: Array, z: Array) -> bool:
    corners = r.size
    ends = np.column_stack([r, z])
    starts, stops = ends, np.roll(ends, -1, axis=0)
    for index in range(corners - 2):
        others = np.arange(index + 2, corners if index else corners - 1)
        if others.size and bool(np.any(_meet(starts[index], stops[index], starts[others], stops[others]))):
            return True
    return False


def _winds_once(r: Array, z: Array) -> bool:
    """Whether every point is enclosed once or not at all, always in the same sense; sees crossings that lie on a corner."""
    # between neighbouring heights of corners no edges cross (_edges_cross), so one line across each such band tells
    r2, z2 = np.roll(r, -1), np.roll(z, -1)
    levels = np.unique(z)
    apart = 1e-12 * float(max(r.max(), np.ptp(z)))
    turns = set()
    for low, high in pairwise(levels):
        across = np.flatnonzero((np.minimum(z, z2) <= low) & (np.maximum(z, z2) >= high))
        share = ((low + high) / 2.0 - z[across]) / (z2[across] - z[across])
        radius = r[across] + share * (r2[across] - r[across])
        order = np.argsort(radius, kind="stable")
        winding = np.cumsum(np.sign(z2[across] - z[across])[order])[:-1]
        turns.update(winding[np.diff(radius[order]) > apart].tolist())
    return turns <= {0.0, 1.0} or turns <= {0.0, -1.0}


def _meet(a: Array, b: Array, c: Array, d: Array) -> NDArray[np.bool_]:
    """Whether segment ab crosses each of the segments cd between its ends; merely touching is left to the winding."""
    side_c, side_d = _side(a, b, c), _side(a, b, d)
    side_a, side_b = _side(c, d, a), _side(c, d, b)
    crossing: NDArray[np.bool_] = (side_c * side_d < 0.0) & (side_a * side_b < 0.0)
    return crossing


def _side(a: Array, b: Array, p: Array) -> Array:
    ab, ap = b - a, p - a
    side: Array = ab[..., 0] * ap[..., 1] - ab[..., 1] * ap[..., 0]
    return side
