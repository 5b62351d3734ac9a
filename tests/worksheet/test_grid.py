"""Tables that break over pages."""

import io

import pytest
from pypdf import PdfReader
from reportlab.pdfbase.pdfmetrics import stringWidth  # noqa: TID251  (an independent measure of width)
from reportlab.platypus import SimpleDocTemplate  # noqa: TID251  (a document to put tables in)

from spinhazard.worksheet.grid import TALLEST, Bar, Grid, Linked
from spinhazard.worksheet.lines import FINE_STRONG, Run
from spinhazard.worksheet.style import register_fonts

register_fonts()


def pages_of(*flowables):
    target = io.BytesIO()
    SimpleDocTemplate(target, pagesize=(300, 400), topMargin=20, bottomMargin=20).build(list(flowables))
    return [page.extract_text().split("\n") for page in PdfReader(target).pages]


def grid(count, text="text"):
    return Grid(("name", "value"), [[f"row {i}", text] for i in range(count)], (60.0, 60.0))


def test_head_is_repeated_on_each_page_and_no_row_is_lost():
    pages = pages_of(grid(70))

    assert len(pages) > 2
    for page in pages:
        assert page[0].split()[0] == "name"
    rows = [line for page in pages for line in page if line.startswith("row")]
    assert rows == [f"row {i}" for i in range(70)]


def test_row_of_several_lines_stays_whole():
    table = grid(5, "word " * 30)
    height = table.wrap(120.0, 1000.0)[1]
    first, rest = table.split(120.0, height * 0.5)

    assert first.wrap(120.0, 1000.0)[1] <= height * 0.5
    row = (height - 13.6) / 5
    assert (first.wrap(0, 0)[1] - 13.6) / row == pytest.approx(2.0, abs=0.05)
    assert (rest.wrap(0, 0)[1] - 13.6) / row == pytest.approx(3.0, abs=0.05)


def test_nothing_is_split_off_where_not_one_row_fits():
    assert grid(3).split(120.0, 15.0) == []


def test_last_row_does_not_stand_alone():
    table = grid(6)
    height = table.wrap(120.0, 1000.0)[1]
    _, rest = table.split(120.0, height - 1.0)

    assert rest.wrap(0, 0)[1] == grid(2).wrap(0, 0)[1]


def test_row_taller_than_a_page_is_broken_inside_and_loses_no_word():
    words = [f"w{i}" for i in range(900)]
    table = Grid(("name", "value"), [["row", " ".join(words)]], (60.0, 60.0))
    pages = pages_of(table)

    assert table.wrap(0, 0)[1] > TALLEST
    assert len(pages) > 2
    found = [word for page in pages for line in page for word in line.split() if word[0] == "w"]
    assert found == words


def test_table_can_be_split_again_on_the_next_page():
    table = grid(40)
    _, rest = table.split(120.0, 100.0)
    second, third = rest.split(120.0, 100.0)

    total = sum(part.wrap(0, 0)[1] - 13.6 for part in (table.split(120.0, 100.0)[0], second, third))
    assert total == pytest.approx(table.wrap(0, 0)[1] - 13.6)


def test_numbers_end_at_the_right_of_their_column():
    class Spy:
        def __init__(self):
            self.ends, self.face = [], (None, None, None)

        def __getattr__(self, name):
            return None

        def setFont(self, *face):  # noqa: N802
            self.face = face

        def setTextOrigin(self, x, _y):  # noqa: N802
            self.x = x

        def textLine(self, text):  # noqa: N802
            self.ends.append(self.x + stringWidth(text, self.face[0], self.face[1]))

    table = Grid(("a", "b"), [["x", "1"], ["x", "12345"]], (60.0, 60.0), numbers=(1,))
    spy = Spy()
    for row in (table._head, *table._rows):
        table._put_text(spy, row, 0.0)

    assert spy.ends[1::2] == pytest.approx([117.0] * 3, abs=0.01)


def test_links_bars_and_runs_are_drawn():
    rows = [[Linked("to the end", "end"), Bar(0.5)], [[Run("bold", FINE_STRONG), Run("second line")], ""]]
    table = Grid(("a", "b"), rows, (60.0, 60.0), anchors=[(), ("end",)])
    target = io.BytesIO()
    SimpleDocTemplate(target, pagesize=(300, 400)).build([table])
    page = PdfReader(target).pages[0]

    assert page["/Annots"][0].get_object()["/Dest"][0].idnum == page.indirect_reference.idnum
    assert "second line" in page.extract_text()
    assert page.get_contents().get_data().count(b" re f") == 2


def test_least_height_holds_head_and_two_rows():
    assert grid(30).least == pytest.approx(grid(2).wrap(0, 0)[1])
