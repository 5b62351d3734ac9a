"""A table that breaks over pages between its rows and repeats its head.

Ready-made tables lay out every cell as a paragraph, again for each page; a worksheet has thousands of cells, so this one
breaks each text once and draws all cells of a page as one text object.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any, NamedTuple, TypeAlias

from reportlab.platypus import Flowable

from spinhazard.worksheet.lines import FINE, NORMAL, STRONG, Face, Line, Run, broken, width_of
from spinhazard.worksheet.style import FAINT, RULE, SHADE

BESIDE, ABOVE, BELOW = 3.0, 1.6, 2.4
"""Room left and right of a cell, above and below it [pt]."""
AFTER_NUMBERS = 10.0
"""Room left of a text column that follows a column of numbers [pt]."""
TALLEST = 500.0
"""A row taller than this is broken inside [pt]; every other row stays whole."""


class Bar(NamedTuple):
    """A cell that shows a share of the whole as a bar."""

    share: float


class Linked(NamedTuple):
    """A cell whose text leads to an anchor of the document."""

    text: str
    target: str


Cell: TypeAlias = str | Sequence[Run] | Bar | Linked


class _Row(NamedTuple):
    """A row as laid out: the lines of each cell, bars and links by column, and its height with the room around."""

    cells: tuple[tuple[Line, ...], ...]
    marks: tuple[tuple[int, Bar | Linked], ...]
    height: float
    anchors: Sequence[str] = ()


class Grid(Flowable):  # type: ignore[misc]  # reportlab has no types
    """The table.

    Parameters
    ----------
    heads : sequence of str
        Column heads.
    rows : sequence of sequences of Cell
        Cells: text, taken literally, runs, bars or links.
    widths : sequence of float
        Column widths [pt].
    numbers : sequence of int
        Columns set to the right.
    anchors : sequence of sequences of str
        Names of each row for links to it.
    fine : bool
        In the smaller face.
    row_height : float
        Least height of a row below the head [pt].
    """

    spaceAfter = 5.0  # noqa: N815  (reportlab's name)

    def __init__(
        self,
        heads: Sequence[str],
        rows: Sequence[Sequence[Cell]],
        widths: Sequence[float],
        *,
        numbers: Sequence[int] = (),
        anchors: Sequence[Sequence[str]] = (),
        fine: bool = False,
        row_height: float = 0.0,
    ) -> None:
        super().__init__()
        self._widths, self._numbers = tuple(widths), frozenset(numbers)
        self._lefts, self._rooms = self._columns()
        self._head = self._laid_out(heads, STRONG, (), least=0.0)
        names = anchors or [()] * len(rows)
        face = FINE if fine else NORMAL
        self._rows = [self._laid_out(row, face, name, least=row_height) for row, name in zip(rows, names, strict=True)]

    def _columns(self) -> tuple[list[float], list[float]]:
        """Left edge of the text and room for it, column by column."""
        lefts, rooms, edge = [], [], 0.0
        for index, width in enumerate(self._widths):
            before = AFTER_NUMBERS if index - 1 in self._numbers and index not in self._numbers else BESIDE
            lefts.append(edge + before)
            rooms.append(width - before - BESIDE)
            edge += width
        return lefts, rooms

    def _laid_out(self, row: Sequence[Cell], face: Face, anchors: Sequence[str], *, least: float) -> _Row:
        cells: list[tuple[Line, ...]] = []
        marks: list[tuple[int, Bar | Linked]] = []
        for index, cell in enumerate(row):
            if isinstance(cell, str):
                cells.append(broken(cell, face, self._rooms[index]))
            elif isinstance(cell, Linked):
                cells.append(broken(cell.text, face, self._rooms[index]))
                marks.append((index, cell))
            elif isinstance(cell, Bar):
                cells.append(())
                marks.append((index, cell))
            else:
                cells.append(tuple(line for run in cell for line in broken(run.text, run.face, self._rooms[index])))
        return _Row(tuple(cells), tuple(marks), max(least, _height(cells)), anchors)

    def _with(self, rows: list[_Row]) -> Grid:
        """The same table with other rows, which are laid out already."""
        made = Grid((), (), self._widths, numbers=tuple(self._numbers))
        made._head, made._rows = self._head, rows
        return made

    @property
    def least(self) -> float:
        """Height of the head and the first two rows [pt], so that a heading stays with them."""
        return float(self._head.height + sum(min(row.height, TALLEST / 3.0) for row in self._rows[:2]))

    def wrap(self, _width: float, _height: float) -> tuple[float, float]:
        """Size of the whole table, as reportlab asks for it."""
        return sum(self._widths), self._head.height + sum(row.height for row in self._rows)

    def split(self, _width: float, height: float) -> list[Grid]:
        """The part that fits and the rest; nothing where not even one row fits."""
        left, count = height - self._head.height, 0
        while count < len(self._rows) and self._rows[count].height <= left + 1e-6:
            left -= self._rows[count].height
            count += 1
        rows = self._rows
        if count < len(rows) and rows[count].height > TALLEST:
            parts = _row_in_two(rows[count], left)
            if parts is not None:
                rows = [*rows[:count], *parts, *rows[count + 1 :]]
                count += 1
        if count == 0:
            return []
        if count == len(rows):
            return [self]
        if count == len(rows) - 1 and count > 2:
            count -= 1  # the last row does not stand alone under a repeated head
        return [self._with(rows[:count]), self._with(rows[count:])]

    def draw(self) -> None:
        """Draw it on the canvas."""
        canvas: Any = self.canv
        rows = [self._head, *self._rows]
        top = sum(row.height for row in rows)
        total = sum(self._widths)
        text = canvas.beginText()
        faint = []
        bottom = top
        for row in rows:
            for anchor in row.anchors:
                canvas.bookmarkHorizontal(anchor, 0, bottom)
            self._put_text(text, row, bottom)
            self._put_marks(canvas, row, bottom)
            bottom -= row.height
            faint.append((0.0, bottom, total, bottom))
        canvas.setFillGray(0.0)
        canvas.drawText(text)
        canvas.setLineWidth(0.25)
        canvas.setStrokeColor(FAINT)
        canvas.lines(faint[1:-1])
        canvas.setLineWidth(0.7)
        canvas.setStrokeColor(RULE)
        canvas.lines([(0.0, top, total, top), faint[0], faint[-1]])

    def _put_text(self, text: Any, row: _Row, top: float) -> None:
        for index, lines in enumerate(row.cells):
            left, y = self._lefts[index], top - ABOVE
            to_the_right = index in self._numbers
            placed = False
            for line, face in lines:
                if to_the_right or not placed:
                    shift = self._rooms[index] - width_of(line, face) if to_the_right else 0.0
                    text.setTextOrigin(left + shift, y - face.size)
                    placed = True
                if (text._fontname, text._fontsize, text._leading) != face:  # noqa: SLF001
                    text.setFont(*face)
                text.textLine(line)
                y -= face.leading

    def _put_marks(self, canvas: Any, row: _Row, top: float) -> None:
        for index, mark in row.marks:
            left, room = self._lefts[index], self._rooms[index]
            if isinstance(mark, Linked):
                place = (left, top - row.height, left + room, top)
                canvas.linkRect("", mark.target, place, relative=1, thickness=0)
                continue
            middle = top - ABOVE - 7.5
            canvas.setFillColor(SHADE)
            canvas.rect(left, middle, room, 5.0, stroke=0, fill=1)
            canvas.setFillColor(RULE)
            canvas.rect(left, middle, room * min(1.0, max(0.0, mark.share)), 5.0, stroke=0, fill=1)


def _height(cells: Sequence[tuple[Line, ...]]) -> float:
    return ABOVE + BELOW + max((sum(face.leading for _, face in lines) for lines in cells), default=0.0)


def _row_in_two(row: _Row, room: float) -> tuple[_Row, _Row] | None:
    """A row that is too tall for any page, broken between lines; None where there is no room for a few of them."""
    first, second = [], []
    for lines in row.cells:
        left, count = room - ABOVE - BELOW, 0
        while count < len(lines) and lines[count].face.leading <= left:
            left -= lines[count].face.leading
            count += 1
        first.append(lines[:count])
        second.append(lines[count:])
    if max(map(len, first)) < 3 or not any(second):
        return None
    return _Row(tuple(first), row.marks, _height(first), row.anchors), _Row(tuple(second), (), _height(second))
