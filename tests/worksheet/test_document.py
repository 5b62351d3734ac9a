"""The document as a whole: furniture, outline, links, fonts, information, bytes."""

import re

import pytest

from spinhazard import assess
from spinhazard.worksheet import worksheet

SECTIONS = ("Summary", "Findings", "Data missing", "Rotor", "Stops", "Guards", "Looked at and not flagged", "Calculations",
            "Stated values", "Policy and sources", "Signatures")  # fmt: skip
FORBIDDEN = re.compile(r"\b(safe|pass|passed|passes|approved|compliant|OK)\b")


def test_every_page_carries_tag_revision_digest_version_page_number_and_deference(made):
    result, paper = made

    for number in range(len(paper.pages)):
        for text in (
            f"page {number + 1} of {len(paper.pages)}",
            result.file.machine.tag,
            f"revision {result.file.assessment.revision}",
            result.digests["inputs"],
            result.program,
            "local codes and qualified, licensed safety professionals take precedence",
        ):
            assert paper.says(text, page=number)


def test_outline_leads_to_the_page_of_each_section(made):
    _, paper = made
    outline = paper.reader.outline

    assert [entry.title for entry in outline] == [f"{n}  {title}" for n, title in enumerate(SECTIONS, start=1)]
    for entry in outline:
        assert paper.says(entry.title, page=paper.reader.get_destination_page_number(entry))


def test_links_lead_to_the_pages_of_findings_calculations_and_sources(made):
    _, paper = made
    targets = set()
    numbers = {page.indirect_reference.idnum: number for number, page in enumerate(paper.reader.pages)}
    for page in paper.reader.pages:
        for annotation in page.get("/Annots", []):
            targets.add(numbers[annotation.get_object()["/Dest"][0].idnum])
    first = {
        entry.title.partition("  ")[2]: paper.reader.get_destination_page_number(entry)
        for entry in paper.reader.outline
    }

    assert any(first["Findings"] <= target <= first["Data missing"] for target in targets)
    assert any(first["Calculations"] < target <= first["Stated values"] for target in targets)
    assert any(target >= first["Policy and sources"] for target in targets)


def test_fonts_are_embedded_and_have_the_characters_of_the_trade(made):
    _, paper = made
    fonts = [font.get_object() for page in paper.reader.pages for font in page["/Resources"]["/Font"].values()]

    assert fonts
    for font in fonts:
        assert "DejaVu" in font["/BaseFont"]
        assert "/FontFile2" in font["/FontDescriptor"]
    for character in "ω²³½Σ×√σρ−§":
        assert paper.says(character)


def test_title_author_subject_and_language_are_in_the_document(made):
    result, paper = made
    about = paper.reader.metadata

    assert about.title.startswith(result.file.machine.tag)
    assert about.author == result.file.assessment.assessor
    assert "stopping" in about.subject
    assert paper.reader.trailer["/Root"]["/Lang"] == "en"


def test_same_input_gives_the_same_bytes_whatever_was_read_before(made):
    result, paper = made
    fresh = assess(result.reading)

    assert worksheet(fresh) == paper.data
    for finding in result.findings:
        assert finding.says
    assert worksheet(result) == paper.data


def test_no_page_claims_that_something_may_be_relied_on(made):
    _, paper = made

    assert [match[0] for page in paper.pages for match in FORBIDDEN.finditer(page)] == []
    assert FORBIDDEN.search("this guard is safe")


@pytest.mark.parametrize(("paper_name", "size"), [("letter", (612.0, 792.0)), ("a4", (595.28, 841.89))])
def test_paper_is_that_asked_for(fan, assess_text, printed, paper_name, size):
    box = printed(assess_text(fan), paper=paper_name).reader.pages[0].mediabox

    assert (float(box.width), float(box.height)) == pytest.approx(size, abs=0.01)


def test_us_units_stand_on_every_section_that_has_units(fan, assess_text, printed):
    paper = printed(assess_text(fan), system="us")

    assert "ftlbf" in paper.section("Summary")
    assert "lbft²" in paper.section("Rotor")
    assert "ft/min" in paper.section("Calculations")
    assert not re.search(r"\d(kJ|kgm²)", paper.section("Rotor"))
