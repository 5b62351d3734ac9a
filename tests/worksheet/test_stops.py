"""Stop cases and their drawing."""

import math

import numpy as np
import pytest
from reportlab.graphics.shapes import PolyLine  # noqa: TID251  (the drawing is looked at)

from spinhazard.quantity.display import display
from spinhazard.worksheet.page import Sheet
from spinhazard.worksheet.stop_drawing import HEIGHT, stop_drawing

NEVER = [('friction_torque = "3.1 N m"\n', ""), ("works_without_power = true", "works_without_power = false")]


def never(fan):
    for old, new in NEVER:
        fan = fan.replace(old, new)
    return fan


def drawn(result):
    return stop_drawing(Sheet(result, "si", 490.0))


def test_table_has_every_stop_case_with_its_time(made, flat):
    result, paper = made
    section = paper.section("Stops")

    for stop in result.sheet.subjects.stops:
        assert flat(stop.entity + display(result.fact("stopping_time", stop.name).best, "s")) in section


def test_measured_stops_stand_one_by_one(made, flat):
    result, paper = made

    for time in result.file.stopping.measured_times:
        assert flat(time.text) in paper.section("Stops")


def test_longest_mean_spread_and_convention_of_measured_stops_are_given(fan, assess_text, printed, flat):
    # 60, 61, 62, 63, 64 s: mean 62 s, deviation √2.5 = 1.581 s, mean and three deviations 66.74 s
    times = ", ".join(f'"{second} s"' for second in (60, 61, 62, 63, 64))
    changed = fan.replace("[stopping]\n", f'[stopping]\nmeasured_case = "power loss"\nmeasured_times = [{times}]\n')
    section = printed(assess_text(changed)).section("Stops")

    assert flat("Longest 64 s; mean 62 s, standard deviation 1.581 s. Used: 66.74 s") in section
    assert flat("plus three standard deviations") in section


def test_cases_are_told_apart_by_line_style(fan, assess_text):
    drawing, _ = drawn(assess_text(fan))
    curves = [shape for shape in drawing.contents if isinstance(shape, PolyLine)]

    assert len(curves) == 6
    assert len({str(curve.strokeDashArray) for curve in curves}) == 3
    assert len({str(curve.strokeColor) for curve in curves}) == 1


def test_curve_starts_at_running_speed_and_ends_at_standstill(fan, assess_text):
    drawing, _ = drawn(assess_text(fan))
    curve = next(shape for shape in drawing.contents if isinstance(shape, PolyLine))
    heights = np.array(curve.points[1::2]) - 40.0

    assert heights[0] == pytest.approx((HEIGHT - 26.0) / 1.05)
    assert heights[-1] == pytest.approx(0.0, abs=1e-9)
    assert np.all(np.diff(heights) <= 1e-9)


def test_curve_reaches_standstill_at_the_time_in_the_table(fan, assess_text):
    result = assess_text(fan)
    drawing, _ = drawn(result)
    curves = [shape for shape in drawing.contents if isinstance(shape, PolyLine)][:3]
    times = [result.fact("stopping_time", stop.name).best for stop in result.sheet.subjects.stops]
    horizon = 1.06 * max(times)

    for curve, time in zip(curves, times, strict=True):
        across, heights = np.array(curve.points[0::2]), np.array(curve.points[1::2])
        still = (across[np.argmax(heights <= 40.0 + 1e-9)] - across[0]) / (across[-1] - across[0]) * horizon
        assert still == pytest.approx(time, abs=1.5 * horizon / 240)


def test_stop_that_never_ends_is_said_and_drawn_to_a_stated_horizon(fan, assess_text, printed, flat):
    result = assess_text(never(fan))
    _, remarks = drawn(result)

    assert math.isinf(result.fact("stopping_time", "stop:power loss").best)
    assert "power loss never reaches standstill and is drawn to 10 min" in remarks
    section = printed(result).section("Stops")
    assert flat("power loss never") in section
    assert flat("Power loss never reaches standstill and is drawn to 10 min.") in section


def test_curves_that_lie_on_each_other_are_named(fan, assess_text):
    one = fan.replace('torque = "40 N m"', 'torque = "0.001 N m"').replace(
        'control_delay = "0.4 s"', 'control_delay = "0 s"'
    )
    _, remarks = drawn(assess_text(one))

    assert "power loss and brake failed lie on each other" in remarks
    assert drawn(assess_text(fan))[1] == []


def test_access_and_wait_are_marked(fan, assess_text, printed):
    section = printed(assess_text(fan)).section("Stops")

    assert "A:earliestaccess,2.94sintothestop" in section
    assert "W:statedwait,180s" in section


def test_nothing_stated_about_stopping_gives_a_sentence_and_no_drawing(least, assess_text, printed):
    result = assess_text(least)

    assert drawn(result) is None
    assert "Nothingisstatedaboutstopping" in printed(result).section("Stops")
