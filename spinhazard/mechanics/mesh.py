"""Volume, inertia and outermost point of a body from its closed surface of triangles, exact for flat faces.

Signed tetrahedra from the origin to each triangle (Mirtich 1996; from memory). The axis of the shaft passes through the
origin of the file.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
AXES = {"x": (1, 2), "y": (2, 0), "z": (0, 1)}
"""Coordinates across each axis."""


@dataclass(frozen=True)
class MeshMoments:
    """Of a body of density 1 in the unit of its file.

    Attributes
    ----------
    volume : float
        Volume.
    second : float
        Moment of inertia about the axis.
    tip_radius : float
        Distance of the outermost corner from the axis.
    offset : float
        Distance of the centre of mass from the axis.
    """

    volume: float
    second: float
    tip_radius: float
    offset: float


def mesh_moments(corners: Array, axis: str) -> MeshMoments:
    """Moments of a closed surface.

    Parameters
    ----------
    corners : ndarray, shape (n, 3, 3)
        Corners of each triangle, turning left seen from outside.
    axis : {"x", "y", "z"}
        Direction of the shaft, through the origin.

    Returns
    -------
    MeshMoments
        Volume, inertia at density 1, outermost distance.

    Raises
    ------
    ValueError
        The surface is open, is turned inside out, or encloses nothing.
    """
    _refuse_open(corners)
    a, b, c = corners[:, 0], corners[:, 1], corners[:, 2]
    six_volumes = np.einsum("ij,ij->i", a, np.cross(b, c))
    volume = float(six_volumes.sum() / 6.0)
    size = float(np.ptp(corners.reshape(-1, 3), axis=0).max())
    if abs(volume) <= 1e-9 * size**3:
        raise ValueError("the surface encloses nothing")
    if volume < 0.0:
        raise ValueError("the surface is turned inside out: its triangles run clockwise seen from outside")
    total = a + b + c
    # ∫x² over a tetrahedron with one corner at the origin: its volume/10 times the sum of squares and products of corners
    squares = (six_volumes[:, None] * (a * a + b * b + c * c + total * total)).sum(axis=0) / 120.0
    across = AXES[axis]
    centre = (six_volumes[:, None] * total).sum(axis=0) / 24.0 / volume
    radii = np.hypot(corners[..., across[0]], corners[..., across[1]])
    return MeshMoments(
        volume=volume, second=float(squares[list(across)].sum()), tip_radius=float(radii.max()),
        offset=float(np.hypot(centre[across[0]], centre[across[1]])),
    )  # fmt: skip


def _refuse_open(corners: Array) -> None:
    """Every edge has to be run through once in each direction."""
    size = float(np.ptp(corners.reshape(-1, 3), axis=0).max())
    # single-precision files repeat a corner exactly; a grid far below that joins what a text file rounds differently
    grid = np.round(corners.reshape(-1, 3) / (size * 1e-7 or 1.0)).astype(np.int64)
    _, names = np.unique(grid, axis=0, return_inverse=True)
    triangles = names.reshape(-1, 3)
    triangles = triangles[
        (triangles[:, 0] != triangles[:, 1]) & (triangles[:, 1] != triangles[:, 2]) & (triangles[:, 2] != triangles[:, 0])
    ]  # fmt: skip
    starts, ends = triangles.ravel(), np.roll(triangles, -1, axis=1).ravel()
    count = int(names.max()) + 1
    forward, backward = np.sort(starts * count + ends), np.sort(ends * count + starts)
    if not np.array_equal(forward, backward):
        loose = np.setdiff1d(forward, backward).size
        reason = f"{loose} edges have no neighbour" if loose else "neighbouring triangles run in different directions"
        raise ValueError(f"the surface is not closed: {reason}")
