"""Calculations."""

import re

import pytest

from spinhazard import assess, assessment_from_text
from spinhazard.facts import FACTS
from spinhazard.quantity.display import display_interval


def test_every_fact_stands_with_key_and_label(made, flat):
    result, paper = made
    section = paper.section("Calculations")

    for fact in result.facts:
        assert flat(fact.key + FACTS[fact.key].label) in section or fact.key in section
    # a cell may be parted by the end of a page only where it is taller than a page, so most labels follow their key
    assert sum(flat(fact.key + FACTS[fact.key].label) in section for fact in result.facts) > 0.95 * len(result.facts)


def test_numbers_put_into_an_equation_can_be_retraced(fan, assess_text, printed, flat):
    section = printed(assess_text(fan)).section("Calculations")

    assert flat("E = ½ J ω²") in section
    # E = ½ × 22 kg m² × (1480 rpm)², by hand 264.2 kJ
    assert flat("½ × (22 kg m²) × (1480 rpm)² = 264.2 kJ") in section


def test_speed_of_the_outermost_point_can_be_retraced(fan, assess_text, printed, flat):
    # v = 2π · 1480/60 · 0.6 = 92.99 m/s
    assert flat("v = (1480 rpm) × (600 mm) = 92.99 m/s") in printed(assess_text(fan)).section("Calculations")


def test_result_carries_its_interval(made, flat):
    result, paper = made
    fact = result.fact("stored_energy")
    low, high = result.interval(fact)

    assert low < fact.best < high
    assert flat(display_interval(fact.best, low, high, "J")) in paper.section("Calculations")


def test_fact_without_value_names_the_missing_fields(least, printed):
    paper = printed(assess(assessment_from_text(least, name="least"), best_estimate=True))

    assert "missing:shaft.s.speed" in paper.section("Calculations")
    assert not any(re.search(r"\b(nan|inf|None(?!\.))\b", page) for page in paper.pages)


def test_fact_outside_the_range_of_its_method_says_so(made):
    result, paper = made
    outside = [fact for fact in result.facts if fact.outside]

    assert ("outsidetherangeofthemethod" in paper.section("Calculations")) == bool(outside)


def test_value_taken_over_is_told_from_a_stated_one(fan, assess_text, printed, flat):
    section = printed(assess_text(fan)).section("Calculations")

    assert flat("Speed of the shaft the part is on taken from the facts named on the right") in section
    assert flat("Wait that the procedure states as stated") in section


def test_steps_shown_once_are_named_where_they_come_again(fan, assess_text, printed):
    section = printed(assess_text(fan)).section("Calculations")
    normal = section.partition("stop:normalstopfactequation")[2].partition("stop:powerlossfactequation")[0]

    assert "stepsshownunderstopping_time" in normal
    assert normal.count("coastdown.stopping_time(") < 8


@pytest.mark.parametrize("word", ["governing_stop", "guard_kind", "back_drive"])
def test_words_stand_in_their_own_table(fan, assess_text, printed, word):
    assert word in printed(assess_text(fan)).section("Calculations").partition("Words,daysandchoices")[2]
