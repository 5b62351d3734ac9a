"""Who, what, when; and the cautions."""

from spinhazard.assessment import CAUTIONS


def test_cautions_stand_on_page_one(made):
    _, paper = made

    for caution in CAUTIONS:
        assert paper.says(caution, page=0)


def test_identity_stands_on_page_one(made):
    result, paper = made
    machine, record = result.file.machine, result.file.assessment

    for text in (
        machine.tag,
        machine.name,
        machine.site,
        machine.serial,
        record.assessor,
        str(record.date),
        record.reason,
    ):
        assert paper.says(text, page=0)
    assert paper.says("draft until signed", page=0)


def test_what_is_not_stated_is_said_to_be_so(least, printed):
    from spinhazard import assess, assessment_from_text

    paper = printed(assess(assessment_from_text(least, name="least"), best_estimate=True))

    assert paper.says("Assessed by not stated", page=0)
