"""Inertia, volume and outermost point against triangle meshes of trimesh (Mirtich's polyhedral integrals).

A mesh of n facets round a circle is inscribed: its volume is low by about (2π/n)²/6 and its inertia by twice that. The
tolerance is four times that figure; refining the mesh has to bring the two together.
"""

import math

import numpy as np
import pytest
import trimesh

from spinhazard import assess, assessment_from_text
from spinhazard.mechanics import inertia, outline
from spinhazard.rules.loading import Catalogue

DENSITY = 7850.0
FACETS = 256
TOLERANCE = 4.0 * (2.0 * math.pi / FACETS) ** 2 / 6.0 * 2.0


def revolved(points, facets=FACETS):
    return trimesh.creation.revolve(np.array([*points, points[0]], dtype=float), sections=facets)


def moved(mesh, offset):
    mesh = mesh.copy()
    mesh.apply_translation([offset, 0.0, 0.0])
    return mesh


def about_shaft(mesh):
    """Moment of inertia about the z axis through the origin."""
    mesh.density = DENSITY
    centre = mesh.center_mass
    return mesh.moment_inertia[2, 2] + mesh.mass * (centre[0] ** 2 + centre[1] ** 2)


def tip(mesh):
    return float(np.hypot(mesh.vertices[:, 0], mesh.vertices[:, 1]).max())


CASES = {
    "solid disk": ('shape = "disk"\ndiameter = "0.8 m"\nthickness = "50 mm"', lambda n: trimesh.creation.cylinder(0.4, 0.05, sections=n)),
    "bored disk": (
        'shape = "disk"\ndiameter = "0.8 m"\nbore = "0.2 m"\nthickness = "50 mm"',
        lambda n: trimesh.creation.annulus(0.1, 0.4, 0.05, sections=n),
    ),
    "ring": (
        'shape = "ring"\nouter_diameter = "1.1 m"\ninner_diameter = "0.82 m"\nwidth = "160 mm"',
        lambda n: trimesh.creation.annulus(0.41, 0.55, 0.16, sections=n),
    ),
    "disk off the axis": (
        'shape = "disk"\ndiameter = "0.2 m"\nthickness = "30 mm"\noffset = "0.5 m"',
        lambda n: moved(trimesh.creation.cylinder(0.1, 0.03, sections=n), 0.5),
    ),
    "sphere off the axis": (
        'shape = "sphere"\ndiameter = "0.3 m"\noffset = "0.4 m"', lambda n: moved(trimesh.creation.uv_sphere(0.15, count=[n, n]), 0.4)
    ),
    "plate off the axis": (
        'shape = "plate"\nradial = "280 mm"\naxial = "300 mm"\ntangential = "40 mm"\noffset = "440 mm"',
        lambda _: moved(trimesh.creation.box([0.28, 0.04, 0.3]), 0.44),
    ),
    "cone": (
        'shape = "cone"\nlarge_diameter = "0.6 m"\nsmall_diameter = "0 m"\nlength = "0.5 m"',
        lambda n: trimesh.creation.cone(0.3, 0.5, sections=n),
    ),
    "bored frustum": (
        'shape = "cone"\nlarge_diameter = "1.0 m"\nsmall_diameter = "0.64 m"\nbore = "0.2 m"\nlength = "0.55 m"',
        lambda n: revolved([(0.1, 0.0), (0.5, 0.0), (0.32, 0.55), (0.1, 0.55)], n),
    ),
    "torus": (
        'shape = "torus"\nring_diameter = "1 m"\nsection_diameter = "0.2 m"',
        lambda n: trimesh.creation.torus(0.5, 0.1, major_sections=n, minor_sections=n),
    ),
    "profile": (
        'shape = "profile"\nunit = "mm"\npoints = [[60, 0], [300, 0], [300, 40], [120, 60], [120, 140], [60, 140]]',
        lambda n: revolved([(0.06, 0.0), (0.3, 0.0), (0.3, 0.04), (0.12, 0.06), (0.12, 0.14), (0.06, 0.14)], n),
    ),
}  # fmt: skip


def facts_of(fields):
    head = 'format = 1\n[machine]\ntag = "T"\n[[shaft]]\nid = "s"\nspeed = "100 rpm"\n[[shaft.part]]\nid = "p"\n'
    text = f'{head}density = "{DENSITY} kg/m3"\n{fields}\n'
    result = assess(assessment_from_text(text, name="mesh"), best_estimate=True, catalogue=Catalogue((), "none"))
    return {key: result.fact(key, "part:s/p").best for key in ("mass", "inertia", "tip_radius")}


@pytest.mark.parametrize("name", CASES)
def test_shape_agrees_with_its_mesh(name):
    fields, build = CASES[name]
    mesh, ours = build(FACETS), facts_of(fields)
    assert mesh.is_watertight
    mesh.density = DENSITY

    assert ours["mass"] == pytest.approx(mesh.mass, rel=TOLERANCE)
    assert ours["inertia"] == pytest.approx(about_shaft(mesh), rel=TOLERANCE)
    assert ours["tip_radius"] == pytest.approx(tip(mesh), rel=TOLERANCE)


@pytest.mark.parametrize("name", ["bored disk", "bored frustum", "torus"])
def test_finer_mesh_comes_nearer(name):
    fields, build = CASES[name]
    ours = facts_of(fields)["inertia"]
    coarse, fine = (abs(about_shaft(build(facets)) / ours - 1.0) for facets in (32, 128))

    assert fine < coarse / 10.0


def test_hollow_sphere_is_the_difference_of_two_spheres():
    shell = inertia.sphere_inertia(1.0, 0.6, inner_diameter=0.5)
    outer, inner = (trimesh.creation.uv_sphere(radius, count=[FACETS, FACETS]) for radius in (0.3, 0.25))
    for mesh in (outer, inner):
        mesh.density = 1.0
    reference = (outer.moment_inertia[2, 2] - inner.moment_inertia[2, 2]) / (outer.mass - inner.mass)

    assert shell == pytest.approx(reference, rel=TOLERANCE)


def test_revolved_volume_and_revolved_inertia_do_not_depend_on_the_orientation():
    r, z = [0.06, 0.3, 0.3, 0.06], [0.0, 0.0, 0.1, 0.1]

    assert inertia.revolved_volume(r, z) == inertia.revolved_volume(r[::-1], z[::-1])
    assert inertia.revolved_inertia(5.0, r, heights=z) == pytest.approx(
        float(inertia.disk_inertia(5.0, 0.6, bore=0.12))
    )


@pytest.mark.parametrize(("direction", "turn"), [("radial", [0, 1, 0]), ("tangential", [1, 0, 0])])
def test_slender_rod_agrees_with_a_thin_cylinder(direction, turn):
    """A cylinder a fiftieth as thick as long has 1 + 3 r²/L² times the inertia of a slender rod: 1 + 3e-4 for r = L/100."""
    length, offset = 0.8, 0.5
    mesh = trimesh.creation.cylinder(length / 100.0, length, sections=64)
    mesh.apply_transform(trimesh.transformations.rotation_matrix(math.pi / 2.0, turn))
    mesh = moved(mesh, offset)
    mesh.density = 1.0
    own = float(inertia.crossways_rod_inertia(mesh.mass, length))
    ours = float(inertia.offset_inertia(own, mesh.mass, offset=offset))
    mesh_inertia = mesh.moment_inertia[2, 2] + mesh.mass * offset**2

    assert mesh_inertia - ours == pytest.approx(3e-4 * own, rel=5e-3)
    outermost = {"radial": outline.radial_rod_tip_radius, "tangential": outline.tangential_rod_tip_radius}[direction]
    assert float(outermost(length, offset=offset)) == pytest.approx(tip(mesh), rel=2e-2)
