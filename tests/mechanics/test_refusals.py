"""Arguments that cannot be: refused with name, value, unit and range; NaN, which stands for missing, passes through."""

import inspect

import numpy as np
import pytest

from spinhazard.mechanics import (
    coastdown,
    drag,
    energy,
    fragments,
    inertia,
    outline,
    polygon,
    reach,
    strength,
    unbalance,
    volume,
)

REFUSED = [
    (lambda: inertia.disk_inertia(-1.0, 1.0), r"mass = -1 kg: accepted is 0 or more"),
    (lambda: inertia.disk_inertia(1.0, 1.0, bore=1.0), r"bore = 1 m: accepted is less than diameter"),
    (lambda: inertia.disk_inertia(1.0, [1.0, 0.0]), r"diameter = 0 m: accepted is more than 0"),
    (lambda: inertia.sphere_inertia(1.0, 1.0, inner_diameter=1.1), r"inner_diameter: accepted is at most diameter"),
    (lambda: inertia.frustum_inertia(1.0, 1.0, small_diameter=0.5, bore=0.6), r"bore: accepted is at most small_diameter"),
    (lambda: inertia.torus_inertia(1.0, 1.0, section_diameter=1.1), r"section_diameter: accepted is at most ring_diameter"),
    (lambda: inertia.pattern_inertia(1.0, 0), r"count = 0: accepted is more than 0"),
    (lambda: inertia.referred_inertia(1.0, 0.0), r"ratio = 0: accepted is more than 0"),
    (lambda: volume.frustum_volume(1.0, 0.5, length=1.0, bore=0.6), r"bore: accepted is at most small_diameter"),
    (lambda: energy.tip_speed(1.0, -1.0), r"radius = -1 m"),
    (lambda: drag.torque_from_power(1.0, 0.0), r"speed = 0 rad/s"),
    (lambda: coastdown.stopping_time(0.0, 1.0, end_speed=0.0, constant=1.0, linear=0.0, quadratic=0.0), r"inertia = 0 kg m²"),
    (lambda: coastdown.speed_after(-1.0, 1.0, start_speed=1.0, constant=1.0, linear=0.0, quadratic=0.0), r"time = -1 s"),
    (lambda: coastdown.angle_turned(1.0, 1.0, end_speed=0.0, constant=-1.0, linear=0.0, quadratic=0.0), r"constant = -1 N m"),
    (lambda: fragments.sector_centroid_radius(1.0, 0.0, angle=7.0), r"angle: accepted is at most 2π rad"),
    (lambda: fragments.equivalent_diameter(0.0), r"area = 0 m²"),
    (lambda: strength.bored_disk_stress(1.0, 1.0, radius=1.0, bore_radius=1.0, poisson=0.3), r"bore_radius = 1 m"),
    (lambda: reach.reach_time(1.0, 0.0), r"approach_speed = 0 m/s"),
    (lambda: unbalance.unbalance_torque(-1.0), r"unbalance = -1 kg m"),
    (lambda: polygon.revolved_moments([0.0, 1.0], [0.0, 1.0]), r"two lists of the same 3 to 2000 corners"),
    (lambda: polygon.revolved_moments([0.0, -1.0, 1.0], [0.0, 0.0, 1.0]), r"radii = -1 m"),
    (lambda: polygon.revolved_moments([0.0, 1.0, 1.0, 0.0], [0.0, 1.0, 0.0, 1.0]), r"the outline crosses itself"),
    (lambda: polygon.revolved_moments([0.0, 1.0, 2.0], [0.0, 0.0, 0.0]), r"encloses nothing"),
]  # fmt: skip


@pytest.mark.parametrize(("call", "message"), REFUSED, ids=[message for _, message in REFUSED])
def test_argument_out_of_range_is_refused_by_name(call, message):
    with pytest.raises(ValueError, match=message):
        call()


NAN_PASSES = [
    inertia.disk_inertia, inertia.sphere_inertia, inertia.plate_inertia, inertia.frustum_inertia, inertia.torus_inertia,
    inertia.offset_inertia, volume.disk_volume, volume.torus_volume, outline.plate_tip_radius, energy.rotational_energy,
    drag.friction_from_stop_time, coastdown.stopping_time, coastdown.speed_after, coastdown.angle_turned, strength.burst_speed,
    fragments.perforation_thickness, fragments.stanford_perforation_thickness, reach.reach_time, reach.curtain_distance,
    reach.us_opening_limit,
]  # fmt: skip


@pytest.mark.parametrize("function", NAN_PASSES, ids=lambda function: function.__name__)
def test_missing_value_passes_through_as_nan(function):
    names = list(inspect.signature(function).parameters)
    sizes = {"bore": 0.1, "inner_diameter": 0.1, "small_diameter": 0.5, "section_diameter": 0.1, "end_speed": 0.0}
    named = {name: sizes.get(name, 1.0) for name in names[2:]}

    assert np.isnan(float(function(np.nan, *([sizes.get(names[1], 1.0)] if len(names) > 1 else []), **named)))


def test_openings_keep_nan():
    assert np.isnan(float(reach.iso_opening_limit(np.nan, "slot")))
    assert np.isnan(float(reach.iso_opening_distance(0.2, "slot")))


def test_stop_that_is_over_takes_no_time_and_one_without_friction_never_ends():
    load = {"constant": 0.0, "linear": 0.0, "quadratic": 0.1}

    assert coastdown.stopping_time(1.0, 1.0, end_speed=2.0, **load) == 0.0
    assert coastdown.stopping_time(1.0, 1.0, end_speed=0.0, **load) == np.inf
    assert coastdown.angle_turned(1.0, 1.0, end_speed=0.0, **load) == np.inf
    assert coastdown.speed_after(np.inf, 1.0, start_speed=1.0, **load) == 0.0
    assert coastdown.speed_after(np.inf, 1.0, start_speed=1.0, constant=0.0, linear=0.0, quadratic=0.0) == 1.0
