"""STL files, binary and ASCII, to triangles; nothing more. Bounded in size, every defect told."""

from __future__ import annotations

import hashlib
import re
from dataclasses import dataclass
from pathlib import Path

import numpy as np
from numpy.typing import NDArray

from spinhazard.errors import Complaint, InputError
from spinhazard.files import check_readable

STL_LIMIT = 120_000_000
"""Bytes; two million triangles of a binary file."""
_RECORD = np.dtype([("normal", "<f4", 3), ("corners", "<f4", (3, 3)), ("attribute", "<u2")])
_VERTEX = re.compile(rb"vertex\s+(\S+)\s+(\S+)\s+(\S+)")


@dataclass(frozen=True)
class Triangles:
    """A surface as it stands in its file, in the file's own unit.

    Attributes
    ----------
    name : str
        File.
    corners : ndarray, shape (n, 3, 3)
        Corners of each triangle.
    digest : str
        SHA-256 of the file.
    """

    name: str
    corners: NDArray[np.float64]
    digest: str


def read_stl(path: Path) -> Triangles:
    """Read one STL file.

    Parameters
    ----------
    path : Path
        File.

    Returns
    -------
    Triangles
        Its triangles.

    Raises
    ------
    InputError
        The file is no STL, is truncated, holds no triangle, or a coordinate is no number.
    """
    check_readable(path, limit=STL_LIMIT, what="an STL file")
    data = path.read_bytes()
    corners = _binary(data, path) if _is_binary(data) else _ascii(data, path)
    if corners.shape[0] == 0:
        raise InputError(Complaint("there is no triangle in it", file=str(path), accepted="a closed surface"))
    if not np.isfinite(corners).all():
        raise InputError(Complaint("a coordinate is no finite number", file=str(path), accepted="finite coordinates"))
    return Triangles(name=str(path), corners=corners, digest=hashlib.sha256(data).hexdigest())


def _is_binary(data: bytes) -> bool:
    """An ASCII file begins with "solid" and has facets; some binary files begin so as well, but their length fits their count."""
    if len(data) >= 84 and len(data) == 84 + 50 * int.from_bytes(data[80:84], "little"):
        return True
    return not data[:200].lstrip().lower().startswith(b"solid")


def _binary(data: bytes, path: Path) -> NDArray[np.float64]:
    count = int.from_bytes(data[80:84], "little") if len(data) >= 84 else -1
    if count < 0 or len(data) < 84 + 50 * count:
        problem = (
            "not an STL file, or cut short" if count < 0 else f"cut short: {count} triangles announced, fewer there"
        )
        raise InputError(Complaint(problem, file=str(path), accepted="a binary or ASCII STL file"))
    return np.frombuffer(data, dtype=_RECORD, count=count, offset=84)["corners"].astype(np.float64)


def _ascii(data: bytes, path: Path) -> NDArray[np.float64]:
    found = _VERTEX.findall(data)
    if len(found) % 3 or data.count(b"endfacet") * 3 != len(found):
        raise InputError(
            Complaint("cut short, or a facet without three corners", file=str(path), accepted="a whole ASCII STL file")
        )
    try:
        return np.array(found, dtype="S40").astype(np.float64).reshape(-1, 3, 3)
    except ValueError:
        raise InputError(
            Complaint("a coordinate is no number", file=str(path), accepted="finite coordinates")
        ) from None
