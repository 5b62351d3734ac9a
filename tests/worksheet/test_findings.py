"""Findings."""

from spinhazard import assess, assessment_from_text
from spinhazard.sources import citation
from spinhazard.worksheet.findings import MARKS


def shown(result):
    return [finding for finding in result.findings if finding.outcome in MARKS]


def test_each_finding_has_state_message_reason_basis_and_levers(made, flat):
    result, paper = made
    section = paper.section("Findings")

    assert shown(result)
    for finding in shown(result):
        assert flat(MARKS[finding.outcome]) in section
        assert flat(f": {finding.rule.key} · {finding.subject}") in section
        assert flat(finding.says) in section
        assert flat(f"Why: {finding.rule.because}") in section
        for reference in finding.rule.basis:
            assert flat(citation(reference)) in section
        for measure in finding.rule.measures:
            assert measure in section


def test_facts_of_a_finding_are_named(made, flat):
    result, paper = made
    section = paper.section("Findings")

    for finding in shown(result):
        keys = ", ".join(name.partition("|")[0] for name in finding.facts)
        assert flat(f"Facts compared or named: {keys}.") in section


def test_borderline_says_in_how_many_draws(made, flat):
    result, paper = made

    for finding in shown(result):
        if finding.outcome == "borderline" and 0.0 < finding.likelihood < 1.0:
            assert flat(
                f"borderline, in {100 * finding.likelihood:.0f} % of the draws: {finding.rule.key}"
            ) in paper.section("Findings")


def test_without_rules_the_section_says_that_nothing_was_flagged(fan, assess_text, printed):
    assert "Nothingisforrevieworborderline" in printed(assess_text(fan)).section("Findings")


def test_urgency_orders_the_groups(fan, printed):
    section = printed(assess(assessment_from_text(fan, name="fan"), best_estimate=True)).section("Findings")

    assert section.index("Beforenextaccess■") < section.index("Beforenextstart■") < section.index("Atnextrevision■")
