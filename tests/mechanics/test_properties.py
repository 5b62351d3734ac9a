"""Laws that every rotor obeys, whatever its numbers."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.mechanics import braking, coastdown, drag, energy, fragments, inertia, outline, reach, strength, volume

some = st.floats(min_value=1e-3, max_value=1e3)
share = st.floats(min_value=0.0, max_value=0.99)
drags = st.tuples(
    st.floats(min_value=1e-3, max_value=1e3), st.one_of(st.just(0.0), st.floats(min_value=1e-6, max_value=10.0)),
    st.one_of(st.just(0.0), st.floats(min_value=1e-8, max_value=1.0)),
)  # fmt: skip


@given(some, some, st.floats(min_value=1.0, max_value=10.0))
def test_energy_goes_with_the_square_of_the_speed(body, speed, factor):
    assert energy.rotational_energy(body, factor * speed) == pytest.approx(
        factor**2 * energy.rotational_energy(body, speed)
    )


SHAPES = [
    lambda s: (inertia.disk_inertia, (0.6 * s,), {"bore": 0.2 * s}, volume.disk_volume(0.6 * s, 0.1 * s, bore=0.2 * s)),
    lambda s: (inertia.sphere_inertia, (0.6 * s,), {"inner_diameter": 0.4 * s}, volume.sphere_volume(0.6 * s, inner_diameter=0.4 * s)),
    lambda s: (inertia.plate_inertia, (0.6 * s,), {"tangential": 0.2 * s}, volume.plate_volume(0.6 * s, 0.1 * s, tangential=0.2 * s)),
    lambda s: (
        inertia.frustum_inertia, (0.6 * s,), {"small_diameter": 0.3 * s, "bore": 0.1 * s},
        volume.frustum_volume(0.6 * s, 0.3 * s, length=0.2 * s, bore=0.1 * s),
    ),
    lambda s: (inertia.torus_inertia, (0.6 * s,), {"section_diameter": 0.1 * s}, volume.torus_volume(0.6 * s, 0.1 * s)),
]  # fmt: skip


@pytest.mark.parametrize("shape", SHAPES, ids=["disk", "sphere", "plate", "frustum", "torus"])
@given(st.floats(min_value=0.01, max_value=100.0))
def test_inertia_goes_with_the_fifth_power_of_the_size(shape, size):
    def of(scale):
        formula, lengths, named, content = shape(scale)
        return float(formula(7850.0 * content, *lengths, **named))

    assert of(size) == pytest.approx(size**5 * of(1.0), rel=1e-9)


@given(some, some, st.floats(min_value=0.0, max_value=1e3))
def test_parallel_axis_never_lowers_the_inertia(own, mass, offset):
    assert inertia.offset_inertia(own, mass, offset=offset) >= own


@given(some, share)
def test_no_body_exceeds_mass_times_outermost_radius_squared(diameter, hollow):
    radius = outline.disk_tip_radius(diameter)

    assert inertia.disk_inertia(1.0, diameter, bore=hollow * diameter) <= radius**2 * (1 + 1e-12)
    assert inertia.sphere_inertia(1.0, diameter, inner_diameter=hollow * diameter) <= radius**2


@given(some, some, drags, share, st.floats(min_value=1.0, max_value=5.0))
def test_more_drag_or_torque_never_lengthens_a_stop(body, speed, load, end, factor):
    a, b, c = load

    def time(k):
        return float(coastdown.stopping_time(body, speed, end_speed=end * speed, constant=k * a, linear=b, quadratic=c))

    assert time(factor) <= time(1.0) * (1 + 1e-12)


@given(some, some, drags, st.floats(min_value=0.0, max_value=0.999))
def test_speed_after_the_time_to_a_speed_is_that_speed(body, speed, load, end):
    a, b, c = load
    time = coastdown.stopping_time(body, speed, end_speed=end * speed, constant=a, linear=b, quadratic=c)
    after = coastdown.speed_after(time, body, start_speed=speed, constant=a, linear=b, quadratic=c)

    assert float(after) == pytest.approx(end * speed, abs=1e-9 * speed)


@given(some, some, drags, share)
def test_work_of_drag_over_the_angle_is_the_energy_lost(body, speed, load, end):
    """Energy balance, of dry friction alone, where work is torque times angle."""
    a, _, _ = load
    angle = coastdown.angle_turned(body, speed, end_speed=end * speed, constant=a, linear=0.0, quadratic=0.0)

    assert float(braking.brake_heat(a, angle)) == pytest.approx(
        float(braking.absorbed_energy(body, speed, end_speed=end * speed)), rel=1e-9, abs=1e-12
    )


@given(some, some, drags)
def test_constant_torque_of_the_same_stop_lies_above_the_curve(body, speed, load):
    """The bound on which measured coasts without drag data rest (docs/methods/drag.md)."""
    a, b, c = load
    time = float(coastdown.stopping_time(body, speed, end_speed=0.0, constant=a, linear=b, quadratic=c))
    chord = float(drag.friction_from_stop_time(body, speed, time=time))
    moments = np.linspace(0.0, 0.999, 20) * time
    curve = coastdown.speed_after(moments, body, start_speed=speed, constant=a, linear=b, quadratic=c)
    line = coastdown.speed_after(moments, body, start_speed=speed, constant=chord, linear=0.0, quadratic=0.0)

    assert np.all(line >= curve - 1e-9 * speed)
    brake = 3.0 * a
    braked = coastdown.stopping_time(body, speed, end_speed=0.0, constant=a + brake, linear=b, quadratic=c)
    bound = coastdown.stopping_time(body, speed, end_speed=0.0, constant=chord + brake, linear=0.0, quadratic=0.0)
    assert bound >= braked * (1 - 1e-12)


def test_many_draws_at_once_equal_single_evaluations():
    generator = np.random.default_rng(7)
    a, b, c = 10 ** generator.uniform(-3, 2, (3, 200))
    b[::5], c[::7] = 0.0, 0.0
    load = {"constant": a, "linear": b, "quadratic": c}
    times = coastdown.stopping_time(2.0, 150.0, end_speed=0.0, **load)
    angles = coastdown.angle_turned(2.0, 150.0, end_speed=0.0, **load)

    for i in range(200):
        one = {"constant": a[i], "linear": b[i], "quadratic": c[i]}
        assert times[i] == coastdown.stopping_time(2.0, 150.0, end_speed=0.0, **one)
        assert angles[i] == pytest.approx(float(coastdown.angle_turned(2.0, 150.0, end_speed=0.0, **one)), rel=1e-12)


def test_sector_of_a_third_carries_nearly_the_most_energy():
    angles = np.radians(np.arange(10.0, 360.0, 0.1))

    def energy_of(angle):
        return fragments.sector_mass(1.0, angle) * fragments.sector_centroid_radius(1.0, 0.2, angle=angle) ** 2

    assert np.degrees(angles[np.argmax(energy_of(angles))]) == pytest.approx(
        np.degrees(fragments.WORST_SECTOR_ANGLE), abs=0.1
    )
    assert np.degrees(fragments.WORST_SECTOR_ANGLE) == pytest.approx(133.563, abs=5e-4)
    assert energy_of(np.radians(120.0)) / energy_of(fragments.WORST_SECTOR_ANGLE) == pytest.approx(0.988, abs=5e-4)


@given(
    st.floats(min_value=0.0, max_value=1.0),
    st.floats(min_value=0.0, max_value=1.0),
    st.sampled_from(["slot", "square", "round"]),
)
def test_farther_away_never_allows_less(one, other, shape):
    near, far = sorted((one, other))

    assert reach.iso_opening_limit(near, shape) <= reach.iso_opening_limit(far, shape)
    assert reach.us_opening_limit(near) <= reach.us_opening_limit(far)


@given(st.floats(min_value=0.001, max_value=0.12), st.sampled_from(["slot", "square", "round"]))
def test_opening_is_allowed_at_the_distance_it_asks_for(size, shape):
    assert reach.iso_opening_limit(reach.iso_opening_distance(size, shape), shape) >= size - 1e-9


@given(some, share)
def test_bored_disk_has_at_least_twice_the_stress_of_a_solid_one(radius, bore):
    solid = strength.solid_disk_stress(7850.0, 10.0, radius=radius, poisson=0.3)

    assert strength.bored_disk_stress(
        7850.0, 10.0, radius=radius, bore_radius=bore * radius, poisson=0.3
    ) >= 2 * solid * (1 - 1e-12)
