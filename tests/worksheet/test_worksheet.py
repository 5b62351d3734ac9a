"""Worksheets read back with an independent PDF library: text, furniture, fonts, outline, bytes."""

import io
import re
from pathlib import Path

import pytest
from pypdf import PdfReader

from spinhazard import Policy, assess, assessment_from_text, read_assessment
from spinhazard.assessment import CAUTIONS
from spinhazard.facts import FACTS
from spinhazard.worksheet import worksheet

ROOT = Path(__file__).parents[2]
EXAMPLES = sorted(path for path in (ROOT / "examples").glob("*.toml") if "policy" not in path.name)
SECTIONS = ("Summary", "Findings", "Data missing", "Rotor", "Stops", "Guards", "Looked at and not flagged", "Calculations",
            "Stated values", "Policy and sources", "Signatures")  # fmt: skip


def pages_of(data):
    return [page.extract_text() for page in PdfReader(io.BytesIO(data)).pages]


def flat(text):
    return "".join(text.split())


@pytest.fixture(scope="module", params=EXAMPLES, ids=lambda path: path.stem)
def made(request):
    result = assess(read_assessment(request.param))
    return result, worksheet(result)


def test_every_page_carries_digest_page_number_and_deference(made):
    result, data = made
    pages = pages_of(data)

    for number, text in enumerate(pages, start=1):
        assert f"page {number} of {len(pages)}" in text
        assert result.digests["inputs"] in text
        assert "qualified, licensed safety professionals" in text
        assert result.file.machine.tag in text


def test_cautions_and_the_deciding_figures_stand_on_page_one(made):
    first = flat(pages_of(made[1])[0])

    for caution in CAUTIONS:
        assert flat(caution) in first
    assert flat("stored energy in running") in first
    assert flat("speed of the fastest point") in first
    assert flat("wait that covers it") in first


def test_outline_names_every_section(made):
    titles = [entry.title for entry in PdfReader(io.BytesIO(made[1])).outline]

    assert titles == [f"{number}  {title}" for number, title in enumerate(SECTIONS, start=1)]


def test_every_finding_and_every_fact_stands_on_the_worksheet(made):
    result, data = made
    whole = flat(" ".join(pages_of(data)))

    for finding in result.findings:
        assert flat(finding.rule.key) in whole
    for fact in result.facts:
        if not FACTS[fact.key].is_word:
            assert flat(fact.key) in whole, fact.key


def test_every_stated_value_stands_with_its_text_and_source(made):
    from spinhazard.facts.records import values_of

    result, data = made
    whole = flat(" ".join(pages_of(data)))
    for _, stated in values_of(result.file):
        assert flat(stated.text) in whole
        assert flat(stated.source) in whole


def test_fonts_are_embedded_and_have_the_trades_characters(made):
    reader = PdfReader(io.BytesIO(made[1]))
    fonts = {
        font.get_object()["/BaseFont"]: font.get_object()
        for page in reader.pages
        for font in page["/Resources"]["/Font"].values()
    }

    assert fonts
    for name, font in fonts.items():
        assert "DejaVu" in name
        assert "/FontFile2" in font["/FontDescriptor"]
    whole = "".join(page.extract_text() for page in reader.pages)
    for character in "ω²³½Σ":
        assert character in whole


def test_same_input_gives_the_same_bytes(made):
    result, data = made

    assert worksheet(result) == data
    assert worksheet(assess(result.reading)) == data


def test_no_page_claims_safety(made):
    whole = " ".join(pages_of(made[1]))

    assert not re.search(r"\b(safe|passed|approved|compliant|OK)\b", whole)


def test_numbers_put_into_an_equation_can_be_retraced(fan, assess_text):
    whole = flat(" ".join(pages_of(worksheet(assess_text(fan)))))

    assert flat("½ J ω²") in whole
    # E = ½ × 22 kg m² × (1480 rpm)², by hand 264.2 kJ
    assert flat("½ × (22 kg m²) × (1480 rpm)² = 264.2 kJ") in whole


HOSTILE = {
    "markup": "<b>bold</b> & <img src='http://x/y.png'/> <a href='x'>link</a> &amp;",
    "long word": "x" * 300,
    "right to left": "מאוורר مروحة",
    "emoji": "fan 🌀 hall 😀",
    "format": "{0} %s %(x)s ${y}",
}


@pytest.mark.parametrize("text", HOSTILE.values(), ids=HOSTILE.keys())
def test_user_text_comes_out_as_text(fan, text):
    changed = fan.replace(
        'kind = "fan"', f'kind = "fan"\nname = "{text}"\nsite = "{text}"\nlocation = "{text}"'
    ).replace("[stopping]\n", f'[stopping]\nconditions = "{text}"\n')
    result = assess(assessment_from_text(changed, name="hostile"), best_estimate=True)
    whole = flat(" ".join(pages_of(worksheet(result))))

    if text == HOSTILE["emoji"]:
        assert "fan[U+1F300]hall[U+1F600]" in whole
    elif text == HOSTILE["right to left"]:
        assert "מאוורר" in whole or "מאוורר"[::-1] in whole
    else:
        assert flat(text) in whole


def test_paper_and_units_are_those_asked_for(fan, assess_text):
    result = assess_text(fan)
    letter = PdfReader(io.BytesIO(worksheet(result, system="us", paper="letter")))

    assert (float(letter.pages[0].mediabox.width), float(letter.pages[0].mediabox.height)) == (612.0, 792.0)
    assert "ft lbf" in letter.pages[0].extract_text()


def test_machine_with_nothing_but_a_disk_gives_a_worksheet():
    text = 'format = 1\n[machine]\ntag = "A"\n[[shaft]]\nid = "s"\n[[shaft.part]]\nshape = "disk"\ndiameter = "1 m"\n'
    pages = pages_of(worksheet(assess(assessment_from_text(text, name="least"))))

    assert "not known" in pages[0]
    assert any("shaft.s.speed" in page for page in pages)


def test_machine_of_sixty_parts_and_twenty_guards_gives_a_worksheet():
    parts = "".join(
        f'[[shaft.part]]\nid = "part number {i}"\nshape = "disk"\ndiameter = "{300 + i} mm"\nmass = "{i + 1} kg"\n'
        for i in range(60)
    )
    guards = "".join(
        f'[[guard]]\nid = "guard number {i}"\ncovers = ["s"]\nkind = "hinged"\ndistance = "{100 + i} mm"\n'
        for i in range(20)
    )
    text = 'format = 1\n[machine]\ntag = "LONG"\n[[shaft]]\nid = "s"\nspeed = "900 rpm"\n' + parts + guards
    result = assess(assessment_from_text(text, name="long"), policy=Policy(draws=200))
    whole = flat(" ".join(pages_of(worksheet(result))))

    assert flat("part number 59 (s)") in whole
    assert flat("guard number 19") in whole


def test_stop_that_never_ends_is_said_and_drawn(fan, assess_text):
    text = fan.replace('friction_torque = "3.1 N m"\n', "").replace(
        "works_without_power = true", "works_without_power = false"
    )
    whole = flat(" ".join(pages_of(worksheet(assess_text(text)))))

    assert "never" in whole
