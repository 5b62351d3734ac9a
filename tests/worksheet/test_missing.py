"""Data missing."""

from spinhazard import assess, assessment_from_text


def test_every_missing_field_stands_with_the_rules_it_would_decide(least, printed, flat):
    result = assess(assessment_from_text(least, name="least"), best_estimate=True)
    section = printed(result).section("Data missing")
    missing = [finding for finding in result.findings if finding.outcome == "data missing"]

    assert len(missing) > 5
    assert f"{len(missing)}findingscouldnotbedecided" in section
    for finding in missing:
        assert flat(finding.rule.key) in section
        for field in finding.missing:
            assert flat(field) in section


def test_field_that_settles_most_stands_first(least, printed):
    result = assess(assessment_from_text(least, name="least"), best_estimate=True)
    counts = {}
    for finding in result.findings:
        if finding.outcome == "data missing":
            for field in finding.missing:
                counts[field] = counts.get(field, 0) + 1
    section = printed(result).section("Data missing")
    first = section.partition("todecide")[2]

    assert any(
        first.startswith(field.replace(" ", "")) for field, count in counts.items() if count == max(counts.values())
    )


def test_complete_statement_says_that_every_rule_was_decided(fan, assess_text, printed):
    assert "Everyrulethatappliescouldbedecided." in printed(assess_text(fan)).section("Data missing")
