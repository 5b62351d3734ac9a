"""STL files written by trimesh, binary and ASCII, read back: volume, inertia and outermost point against trimesh's own."""

import time

import numpy as np
import pytest
import trimesh

from spinhazard import InputError, assess, read_assessment
from spinhazard.mechanics.mesh import mesh_moments
from spinhazard.rules.loading import Catalogue
from spinhazard.statement.stl import read_stl

FILE = """format = 1
[machine]
tag = "T"
[[shaft]]
id = "s"
speed = "600 rpm"
[[shaft.part]]
id = "p"
shape = "mesh"
file = "part.stl"
unit = "mm"
axis = "{axis}"
density = "7850 kg/m3"
"""
TURN = {"x": 0, "y": 1, "z": 2}


def impeller():
    """A hub with four blades off the axis, in millimetres."""
    hub = trimesh.creation.annulus(20.0, 60.0, 80.0, sections=64)
    blade = trimesh.creation.box([120.0, 6.0, 60.0])
    blades = []
    for quarter in range(4):
        turned = blade.copy()
        turned.apply_translation([130.0, 0.0, 0.0])
        turned.apply_transform(trimesh.transformations.rotation_matrix(quarter * np.pi / 2, [0, 0, 1]))
        blades.append(turned)
    return trimesh.util.concatenate([hub, *blades])


def reference(mesh, axis):
    """Inertia about the axis through the origin at density 1, volume, outermost distance; by trimesh."""
    mesh = mesh.copy()
    mesh.density = 1.0
    place = TURN[axis]
    across = [i for i in range(3) if i != place]
    second = mesh.moment_inertia[place, place] + mesh.volume * sum(mesh.center_mass[i] ** 2 for i in across)
    return second, mesh.volume, float(np.hypot(*(mesh.vertices[:, i] for i in across)).max())


@pytest.mark.parametrize("axis", ["x", "y", "z"])
@pytest.mark.parametrize("kind", ["stl", "stl_ascii"])
def test_mesh_part_agrees_with_trimesh(tmp_path, axis, kind):
    mesh = impeller()
    (tmp_path / "part.stl").write_bytes(trimesh.exchange.export.export_mesh(mesh, None, file_type=kind) if kind == "stl" else
                                        trimesh.exchange.stl.export_stl_ascii(mesh).encode())  # fmt: skip
    (tmp_path / "a.toml").write_text(FILE.format(axis=axis))
    result = assess(read_assessment(tmp_path / "a.toml"), best_estimate=True, catalogue=Catalogue((), "none"))
    second, volume, tip = reference(mesh, axis)

    assert result.fact("mass", "part:s/p").best == pytest.approx(7850 * volume * 1e-9, rel=1e-5)
    assert result.fact("inertia", "part:s/p").best == pytest.approx(7850 * second * 1e-15, rel=1e-5)
    assert result.fact("tip_radius", "part:s/p").best == pytest.approx(tip * 1e-3, rel=1e-6)


def test_another_mesh_changes_the_digest_of_the_inputs(tmp_path):
    (tmp_path / "a.toml").write_text(FILE.format(axis="z"))
    digests = []
    for size in (100.0, 101.0):
        (tmp_path / "part.stl").write_bytes(trimesh.creation.box([size] * 3).export(file_type="stl"))
        digests.append(assess(read_assessment(tmp_path / "a.toml"), best_estimate=True).digests["inputs"])

    assert digests[0] != digests[1]


def corners_of(mesh):
    return np.array(mesh.triangles, dtype=float)


def test_open_inverted_and_flat_surfaces_are_refused_with_the_reason():
    box = trimesh.creation.box([1.0, 1.0, 1.0])

    with pytest.raises(ValueError, match="the surface is not closed: 3 edges have no neighbour"):
        mesh_moments(corners_of(box)[1:], "z")
    with pytest.raises(ValueError, match="turned inside out"):
        mesh_moments(corners_of(box)[:, ::-1], "z")
    one_turned = corners_of(box)
    one_turned[0] = one_turned[0, ::-1]
    with pytest.raises(ValueError, match="not closed"):
        mesh_moments(one_turned, "z")
    flat = corners_of(box) * np.array([1.0, 1.0, 0.0])
    with pytest.raises(ValueError, match="encloses nothing"):
        mesh_moments(flat, "z")


@pytest.mark.parametrize(
    ("data", "complaint"),
    [
        (b"", "not an STL file"),
        (b"solid x\nendsolid x\n", "there is no triangle in it"),
        (b"solid x\nfacet normal 0 0 1\nouter loop\nvertex 0 0 0\nvertex 1 0 0\n", "cut short"),
        (b"\x00" * 80 + (100).to_bytes(4, "little") + b"\x00" * 50, "cut short: 100 triangles announced"),
        (
            b"solid x\nfacet normal 0 0 1\nouter loop\nvertex 0 0 nan\nvertex 1 0 0\nvertex 0 1 0\nendloop\nendfacet\n",
            "no finite number",
        ),
        (
            b"solid x\nfacet normal 0 0 1\nouter loop\nvertex 0 0 a\nvertex 1 0 0\nvertex 0 1 0\nendloop\nendfacet\n",
            "is no number",
        ),
    ],
)
def test_file_that_is_no_stl_is_refused(tmp_path, data, complaint):
    (tmp_path / "part.stl").write_bytes(data)

    with pytest.raises(InputError, match=complaint):
        read_stl(tmp_path / "part.stl")


def test_open_mesh_is_told_at_its_part(tmp_path):
    mesh = trimesh.creation.box([1.0, 1.0, 1.0])
    mesh.update_faces(np.arange(11))
    (tmp_path / "part.stl").write_bytes(mesh.export(file_type="stl"))
    (tmp_path / "a.toml").write_text(FILE.format(axis="z"))

    with pytest.raises(InputError, match=r"line 10, shaft\.s\.part\.p\.file: the surface is not closed"):
        assess(read_assessment(tmp_path / "a.toml"))


def test_million_triangles_are_read_in_seconds(tmp_path):
    mesh = trimesh.creation.icosphere(subdivisions=8)
    repeated = np.concatenate([corners_of(mesh)])
    assert repeated.shape[0] > 1_000_000
    mesh.export(tmp_path / "part.stl")
    started = time.perf_counter()
    moments = mesh_moments(read_stl(tmp_path / "part.stl").corners, "z")

    assert moments.volume == pytest.approx(4.0 / 3.0 * np.pi, rel=1e-4)
    assert time.perf_counter() - started < 60.0
