"""What was looked at and not flagged, and what does not apply."""


def test_every_rule_that_was_not_flagged_stands_with_its_comparison(made, flat):
    result, paper = made
    section = paper.section("Looked at and not flagged")

    for finding in result.findings:
        if finding.outcome == "not flagged":
            assert flat(finding.rule.key) in section
            assert flat(finding.subject) in section


def test_every_rule_that_does_not_apply_stands_with_its_reason(made, flat):
    result, paper = made
    section = paper.section("Looked at and not flagged").partition("Notapplicablehere")[2]

    for finding in result.findings:
        if finding.outcome == "not applicable":
            assert flat(finding.rule.key) in section
    assert "kindofmachine" in section


def test_whole_catalogue_is_on_the_worksheet(made):
    result, paper = made

    for finding in result.findings:
        assert paper.says(finding.rule.key), finding.rule.key
