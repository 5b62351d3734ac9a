"""Half-sections: exact integrals by hand, and outlines that are none, wherever the crossing lies."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.mechanics.inertia import disk_inertia, frustum_inertia, torus_inertia
from spinhazard.mechanics.polygon import MOST_CORNERS, crosses_itself, revolved_moments
from spinhazard.mechanics.volume import frustum_volume, torus_volume

SQUARE = ([0.0, 1.0, 1.0, 0.0], [0.0, 0.0, 1.0, 1.0])


def test_unit_square_sweeps_the_unit_cylinder():
    assert revolved_moments(*SQUARE) == pytest.approx((np.pi, np.pi / 2.0))


def test_trapezium_sweeps_the_frustum():
    volume, second = revolved_moments([0.0, 0.5, 0.32, 0.0], [0.0, 0.0, 0.55, 0.55])

    assert volume == pytest.approx(float(frustum_volume(1.0, 0.64, length=0.55)), rel=1e-14)
    assert second / volume == pytest.approx(float(frustum_inertia(1.0, 1.0, small_diameter=0.64)), rel=1e-14)


def test_many_corners_of_a_circle_sweep_the_torus():
    # an inscribed polygon of n corners is short by (2π/n)²/6 of the area: 1.6e-6 for 2000 corners
    turn = np.linspace(0.0, 2.0 * np.pi, MOST_CORNERS, endpoint=False)
    volume, second = revolved_moments(0.5 + 0.1 * np.cos(turn), 0.1 * np.sin(turn))

    assert volume == pytest.approx(float(torus_volume(1.0, 0.2)), rel=4e-6)
    assert second / volume == pytest.approx(float(torus_inertia(1.0, 1.0, section_diameter=0.2)), rel=4e-6)


@pytest.mark.parametrize("shift", range(4))
@pytest.mark.parametrize("step", [1, -1])
def test_neither_first_corner_nor_orientation_matters(shift, step):
    radii, heights = (np.roll(corners, shift)[::step] for corners in ([1.0, 3.0, 2.0, 1.0], [0.0, 0.0, 1.0, 2.0]))

    assert revolved_moments(radii, heights) == pytest.approx(
        revolved_moments([1.0, 3.0, 2.0, 1.0], [0.0, 0.0, 1.0, 2.0])
    )


def test_repeated_corner_changes_nothing():
    assert revolved_moments([*SQUARE[0], 0.0], [*SQUARE[1], 0.0]) == pytest.approx(revolved_moments(*SQUARE))


def test_slit_to_a_cavity_is_allowed_and_the_cavity_counts():
    # ring 1 to 4 by 4 high, cavity 2 to 3 by 1 high, reached along a slit and left along the same
    radii = [1.0, 4.0, 4.0, 1.0, 1.0, 2.0, 2.0, 3.0, 3.0, 1.0]
    heights = [0.0, 0.0, 4.0, 4.0, 2.0, 2.0, 3.0, 3.0, 2.0, 2.0]

    assert revolved_moments(radii, heights)[0] == pytest.approx(np.pi * ((16 - 1) * 4 - (9 - 4) * 1))


@pytest.mark.parametrize("step", [1, -1])
def test_slit_along_the_axis_is_allowed_too(step):
    # disk of radius 4, 4 high; the cavity, 1 to 2 by 1 to 2, is reached straight down from the top at radius 1
    radii = [0.0, 4.0, 4.0, 1.0, 1.0, 2.0, 2.0, 1.0, 1.0, 0.0]
    heights = [0.0, 0.0, 4.0, 4.0, 2.0, 2.0, 1.0, 1.0, 4.0, 4.0]

    assert revolved_moments(radii[::step], heights[::step])[0] == pytest.approx(np.pi * (16 * 4 - (4 - 1) * 1))


def test_two_cones_that_meet_on_the_axis_are_allowed():
    radii, heights = [0.0, 1.0, 0.0, 1.0, 0.0], [-1.0, -1.0, 0.0, 1.0, 1.0]

    assert revolved_moments(radii, heights) == pytest.approx((2.0 * np.pi / 3.0, 2.0 * np.pi / 10.0))


CROSSING = {
    "between corners": ([0.0, 1.0, 1.0, 0.0], [0.0, 1.0, 0.0, 1.0]),
    "at a corner of one strand": ([0.0, 2.0, 2.0, 1.0, 0.0], [0.0, 2.0, 0.0, 1.0, 2.0]),
    "at a corner of both strands": ([0.0, 1.0, 2.0, 2.0, 1.0, 0.0], [0.0, 1.0, 2.0, 0.0, 1.0, 2.0]),
    "through a corner on a flat edge": ([1.0, 4.0, 4.0, 2.0, 2.0, 1.0], [0.0, 0.0, 4.0, 0.0, -2.0, -2.0]),
    "cavity run round in the sense of the outside": (
        [0.0, 4.0, 4.0, 1.0, 1.0, 2.0, 2.0, 1.0, 1.0, 0.0],
        [0.0, 0.0, 4.0, 4.0, 1.0, 1.0, 2.0, 2.0, 4.0, 4.0],
    ),
    "run round twice": (SQUARE[0] * 2, SQUARE[1] * 2),
}


@pytest.mark.parametrize("corners", CROSSING.values(), ids=CROSSING)
def test_outline_that_crosses_itself_is_refused_wherever_the_crossing_lies(corners):
    with pytest.raises(ValueError, match="the outline crosses itself"):
        revolved_moments(*corners)


def test_too_many_corners_are_refused():
    turn = np.linspace(0.0, 2.0 * np.pi, MOST_CORNERS + 1, endpoint=False)

    with pytest.raises(ValueError, match=f"same 3 to {MOST_CORNERS} corners"):
        revolved_moments(2.0 + np.cos(turn), np.sin(turn))


def test_lists_of_different_length_are_refused():
    with pytest.raises(ValueError, match="two lists of the same"):
        revolved_moments([0.0, 1.0, 1.0], [0.0, 1.0])


def test_missing_corner_passes_through_as_nan():
    assert np.isnan(revolved_moments([0.0, 1.0, np.nan, 0.0], SQUARE[1])).all()


@given(st.lists(st.tuples(st.floats(0.05, 1.0), st.floats(0.05, 1.0)), min_size=1, max_size=12))
def test_stepped_shaft_is_the_sum_of_its_disks(steps):
    """Any stack of disks, drawn as one profile; neighbours of the same diameter leave a corner on a straight edge."""
    radii, heights, at = [0.0], [0.0], 0.0
    for diameter, width in steps:
        radii += [diameter / 2.0] * 2
        heights += [at, at + width]
        at += width
    volume, second = revolved_moments([*radii, 0.0], [*heights, at])
    volumes = [np.pi / 4.0 * d**2 * w for d, w in steps]

    assert volume == pytest.approx(sum(volumes), rel=1e-12)
    assert second == pytest.approx(
        sum(float(disk_inertia(v, d)) for v, (d, _) in zip(volumes, steps, strict=True)), rel=1e-12
    )


def turns_round(place, r, z):
    """Winding number by the angles a walker along the outline turns through, seen from a place."""
    angle = np.arctan2(z - place[1], r - place[0])
    steps = (np.roll(angle, -1) - angle + np.pi) % (2.0 * np.pi) - np.pi
    return round(float(steps.sum() / (2.0 * np.pi)))


def test_what_is_accepted_on_a_grid_encloses_each_point_once_or_not_at_all():
    """Random corners on a small grid: there, corners lie on edges and on each other all the time."""
    generator = np.random.default_rng(20261201)
    places = np.stack(np.meshgrid(np.arange(4) + 0.531, np.arange(4) + 0.297), axis=-1).reshape(-1, 2)
    accepted = 0
    for _ in range(3000):
        r, z = generator.integers(0, 5, (2, generator.integers(4, 8))).astype(float)
        if crosses_itself(r, z):
            continue
        accepted += 1
        turns = {turns_round(place, r, z) for place in places}
        assert turns <= {0, 1} or turns <= {0, -1}, (r, z)

    assert accepted > 500
