"""Nothing a user writes is markup, and everything shows."""

import pytest

from spinhazard import assess, assessment_from_text
from spinhazard.worksheet.text import plain, shares

HOSTILE = {
    "markup": "<b>bold</b> & <img src='http://x/y.png'/> <a href='x'>link</a> &amp;",
    "unclosed markup": "<para><font size=",
    "long word": "x" * 300,
    "format": "{0} %s %(x)s ${y}",
}


def hostile(fan, text):
    changed = fan.replace(
        'kind = "fan"', f'kind = "fan"\nname = "{text[:110]}"\nsite = "{text}"\nlocation = "{text}"'
    ).replace("[stopping]\n", f'[stopping]\nconditions = "{text}"\n')
    return assess(assessment_from_text(changed, name="hostile"), best_estimate=True)


@pytest.mark.parametrize("text", HOSTILE.values(), ids=HOSTILE.keys())
def test_user_text_comes_out_as_text(fan, printed, text):
    assert printed(hostile(fan, text)).says(text)


def test_user_text_makes_no_links_and_no_pictures(fan, printed):
    paper = printed(hostile(fan, HOSTILE["markup"]))

    assert all("/XObject" not in page["/Resources"] for page in paper.reader.pages)
    assert all(
        "/A" not in annotation.get_object() for page in paper.reader.pages for annotation in page.get("/Annots", [])
    )


def test_names_of_parts_and_guards_are_text_in_tables_findings_and_anchors(fan, printed):
    name = "a &amp; <i>b<i> 'c'"
    changed = fan.replace('id = "wheel"', f'id = "{name}"').replace('id = "door"', f'id = "{name}"')
    paper = printed(assess(assessment_from_text(changed, name="hostile"), best_estimate=True))

    for section in ("Findings", "Rotor", "Guards", "Calculations", "Stated values"):
        assert "".join(name.split()) in paper.section(section)


def test_names_with_quotes_and_missing_glyphs_make_links_that_lead_somewhere(fan, printed):
    changed = fan.replace('id = "door"', """id = 'a "1" 🌀 <é> & (x) \\'""")
    paper = printed(assess(assessment_from_text(changed, name="hostile"), best_estimate=True))

    assert 'a"1"[U+1F300]<é>&(x)\\' in paper.section("Findings")
    assert any("/Annots" in page for page in paper.reader.pages)


def test_right_to_left_text_is_shown(fan, printed):
    paper = printed(hostile(fan, "מאוורר מروحة"))

    assert paper.says("מאוורר") or paper.says("מאוורר"[::-1])


def test_characters_without_glyph_are_shown_by_code_point(fan, printed):
    assert printed(hostile(fan, "fan 🌀 hall 😀")).says("fan [U+1F300] hall [U+1F600]")


def test_plain_escapes_markup():
    assert plain("a < b & c > d") == "a &lt; b &amp; c &gt; d"


def test_shares_fill_the_width():
    assert shares(100.0, (1, 3)) == [25.0, 75.0]
