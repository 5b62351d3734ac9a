"""Every check value, and proof that a wrong one is caught."""

from dataclasses import replace

import pytest

from spinhazard.mechanics.formula import REGISTRY
from spinhazard.selfcheck.runner import function_of, load_checks, run, run_all
from spinhazard.sources import resolve

CHECKS = load_checks()
every_check = pytest.mark.parametrize("check", CHECKS, ids=lambda check: f"{check.subject}: {check.name}")


@every_check
def test_value_from_outside_is_met(check):
    result = run(check)

    assert result.within, f"{check.source}: expected {check.expect}, computed {result.computed}"


@every_check
def test_value_wrong_by_four_percent_is_caught(check):
    assert not run(replace(check, expect=check.expect * 1.04)).within
    assert not run(replace(check, expect=check.expect / 1.04)).within


@every_check
def test_source_is_in_the_bibliography_and_no_figure_read_comes_from_a_source_known_by_memory_only(check):
    source = resolve(check.source)

    if check.read == "text":
        assert source.status == "text", check.source


def test_value_that_is_no_number_is_never_within():
    assert not run(replace(CHECKS[0], expect=float("nan"))).within


def test_zero_is_compared_absolutely():
    nothing = replace(
        CHECKS[0], function="energy.tip_speed", arguments={"speed": 0.0, "radius": 1.0}, expect=0.0, tolerance=1e-12
    )
    something = replace(nothing, arguments={"speed": 1e-6, "radius": 1.0})

    assert run(nothing).within
    assert run(something).deviation == 1e-6
    assert not run(something).within


def test_there_are_enough_published_values_most_of_them_read_and_no_conversions():
    published = [check for check in CHECKS if check.kind == "published"]

    assert len(published) >= 140
    assert len([check for check in published if check.subject != "units"]) >= 110
    assert len([check for check in published if check.read == "text"]) >= 130


def test_every_subject_has_its_values():
    assert {check.subject for check in CHECKS} == {
        "inertia",
        "energy",
        "stopping",
        "strength",
        "fragments",
        "reach",
        "units",
    }
    assert {check.kind for check in CHECKS} <= {"published", "recomputed", "regression"}
    assert {check.read for check in CHECKS} <= {"text", "memory", "computed"}


@every_check
def test_only_what_was_recomputed_counts_as_computed(check):
    assert (check.read == "computed") <= (check.kind in {"recomputed", "regression"})
    assert check.kind == "published" or check.read != "text"


def test_all_checks_run_in_the_order_of_the_files():
    assert [result.check for result in run_all()] == list(CHECKS)


@pytest.mark.parametrize("name", ["os.system", "inertia.missing_inertia", "inertia", "formula.record"])
def test_unknown_function_is_refused(name):
    with pytest.raises(LookupError, match=rf"no formula is called {name}"):
        function_of(name)


def test_every_declared_formula_can_be_looked_up():
    for name in REGISTRY:
        assert function_of(name).__name__ == name.partition(".")[2]


def test_wide_tolerances_say_that_the_source_rounds():
    for check in CHECKS:
        assert 0.0 < check.tolerance <= 0.02
        if check.tolerance > 1e-3:
            assert "round" in check.because or "figures" in check.because, check.name


def test_names_are_told_apart():
    names = [(check.subject, check.name) for check in CHECKS]

    assert len(names) == len(set(names))


def test_published_value_is_given_with_the_figures_of_its_source():
    for check in CHECKS:
        if check.kind == "published":
            assert any(sign.isdigit() or sign in "½ρω" for sign in check.stated), check.name
