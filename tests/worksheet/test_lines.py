"""Text to lines."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.worksheet.lines import NORMAL, STRONG, broken, drawable, kept_together, width_of
from spinhazard.worksheet.style import register_fonts

register_fonts()
TEXTS = st.text(st.characters(codec="utf-8", exclude_categories=["Cs", "Cc"]), max_size=200)


@given(TEXTS, st.floats(30.0, 500.0), st.sampled_from([NORMAL, STRONG]))
def test_no_line_is_wider_than_its_column(text, room, face):
    for line, _ in broken(text, face, room):
        assert len(line) == 1 or width_of(line, face) <= room + 1e-6


@given(TEXTS, st.floats(30.0, 500.0))
def test_no_character_is_lost_by_breaking(text, room):
    lines = "".join(line.text for line in broken(text, NORMAL, room))

    assert lines.replace(" ", "") == drawable(text).replace(" ", "")


def test_text_breaks_between_words():
    assert [line.text for line in broken("aaaa bbbb cccc", NORMAL, 45.0)] == ["aaaa bbbb", "cccc"]


def test_long_path_breaks_after_a_joint():
    assert [line.text for line in broken("shaft.impeller.part.hub", NORMAL, 60.0)] == ["shaft.impeller.", "part.hub"]


def test_long_word_without_joint_breaks_at_the_last_character_that_fits():
    lines = [line.text for line in broken("W" * 50, NORMAL, 60.0)]

    assert "".join(lines) == "W" * 50
    assert len(lines) > 5
    assert width_of(lines[0] + "W", NORMAL) > 60.0


def test_value_stays_with_its_unit():
    lines = [line.text for line in broken(f"the inertia is {kept_together('22 kg m²')}", NORMAL, 70.0)]

    assert lines == ["the inertia is", "22\u00a0kg\u00a0m²"]


def test_empty_text_is_one_empty_line():
    assert [line.text for line in broken("", NORMAL, 60.0)] == [""]


@pytest.mark.parametrize(
    ("text", "shown"),
    [
        ("½ ≤ ω", "½ ≤ ω"),
        ("fan 🌀", "fan [U+1F300]"),
        ("a\u0007b", "a[U+0007]b"),
        ("漢", "[U+6F22]"),
        ("<b>&amp;", "<b>&amp;"),
    ],
)
def test_character_that_the_font_lacks_is_shown_by_its_code_point(text, shown):
    assert drawable(text) == shown
