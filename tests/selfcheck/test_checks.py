"""Every check value, and proof that a wrong one is caught."""

from dataclasses import replace

import pytest

from spinhazard.selfcheck.runner import function_of, load_checks, run


@pytest.mark.parametrize("check", load_checks(), ids=lambda check: f"{check.subject}: {check.name}")
def test_value_from_outside_is_met(check):
    result = run(check)

    assert result.within, f"{check.source}: expected {check.expect}, computed {result.computed}"


def test_there_are_enough_published_values_and_most_are_no_conversions():
    published = [check for check in load_checks() if check.kind == "published"]

    assert len(published) >= 25
    assert len([check for check in published if check.subject != "units"]) >= 25


def test_wrong_value_is_caught():
    check = load_checks()[0]

    assert not run(replace(check, expect=check.expect * 1.02)).within
    assert not run(replace(check, expect=float("nan"))).within


def test_unknown_function_is_refused():
    with pytest.raises(LookupError, match=r"no formula is called os\.system"):
        function_of("os.system")


def test_wide_tolerances_say_that_the_source_rounds():
    for check in load_checks():
        assert check.tolerance <= 0.02
        if check.tolerance > 1e-3:
            assert "round" in check.because or "figures" in check.because, check.name


def test_names_are_told_apart():
    names = [(check.subject, check.name) for check in load_checks()]

    assert len(names) == len(set(names))
