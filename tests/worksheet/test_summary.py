"""The summary."""

import re

import pytest

from spinhazard import Policy, assess, assessment_from_text
from spinhazard.quantity.display import display
from spinhazard.rules.rule import OUTCOMES


def test_deciding_figures_and_all_stop_cases_stand_on_page_one(made):
    result, paper = made

    for key, subject in (
        ("stored_energy", "machine"),
        ("highest_tip_speed", "machine"),
        ("governing_stopping_time", "machine"),
        ("required_wait", "lockout"),
    ):
        fact = result.fact(key, subject)
        assert paper.says(display(fact.best, fact.unit), page=0)
    assert paper.says(f"governing stop: {result.fact('governing_stop').value}", page=0)
    for stop in result.sheet.subjects.stops:
        assert paper.says(f"{stop.entity} {display(result.fact('stopping_time', stop.name).best, 's')}", page=0)


def test_counts_are_those_of_the_findings(made):
    result, paper = made

    for outcome in OUTCOMES:
        count = sum(finding.outcome == outcome for finding in result.findings)
        assert f"{count}{outcome}".replace(" ", "") in paper.section("Summary")


def test_most_urgent_findings_come_first(made):
    _, paper = made
    places = [
        paper.section("Summary").rfind(text) for text in ("beforenextaccess", "beforenextstart", "atnextrevision")
    ]
    present = [place for place in places if place >= 0]

    assert len(present) >= 2
    assert present == sorted(present)


def test_what_is_missing_stands_on_page_one(least, printed):
    paper = printed(assess(assessment_from_text(least, name="least")))

    assert paper.says("not known", page=0)
    assert paper.says("Missing, so not decided: ", page=0)
    assert paper.says("shaft.s.speed", page=0)


@pytest.mark.parametrize(
    ("best_estimate", "said"), [(True, "Best estimate only"), (False, "200 draws from the stated spreads")]
)
def test_uncertainty_is_named(fan, printed, best_estimate, said):
    reading = assessment_from_text(fan, name="fan")

    assert printed(assess(reading, policy=Policy(draws=200), best_estimate=best_estimate)).says(said, page=0)


def test_long_list_is_cut_and_says_how_many_follow(made):
    result, paper = made
    rules = {f.rule.key for f in result.findings if f.outcome in {"for review", "borderline"}}
    shown = re.search(r"and(\d+)more,inthesectiononfindings", paper.section("Summary"))

    assert (shown is not None) == (len(rules) > 14)
