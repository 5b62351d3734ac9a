"""Worksheets read back with an independent PDF library."""

import io
from pathlib import Path

import pytest
from pypdf import PdfReader

from spinhazard import assess, read_assessment
from spinhazard.worksheet import worksheet

EXAMPLES = sorted(path for path in (Path(__file__).parents[2] / "examples").glob("*.toml") if "policy" not in path.name)
LEAST = 'format = 1\n[machine]\ntag = "A"\n[[shaft]]\nid = "s"\n[[shaft.part]]\nshape = "disk"\ndiameter = "1 m"\n'


def _flat(text):
    return "".join(text.split())


class Paper:
    """A worksheet as read back: its text page by page, blanks left out where texts are compared."""

    def __init__(self, data):
        self.data = data
        self.reader = PdfReader(io.BytesIO(data))
        self.pages = [page.extract_text() for page in self.reader.pages]
        self._flat = _flat("".join(self.pages))

    def says(self, text, page=None):
        return _flat(text) in (self._flat if page is None else _flat(self.pages[page]))

    def section(self, title):
        """Text from the heading of a section to the next heading, blanks left out."""
        names = [_flat(entry.title) for entry in self.reader.outline]
        index = next(i for i, name in enumerate(names) if name.endswith(_flat(title)))
        start = self._flat.index(names[index])
        return self._flat[start : self._flat.index(names[index + 1], start) if index + 1 < len(names) else None]


@pytest.fixture(scope="session")
def flat():
    return _flat


@pytest.fixture(scope="session")
def printed():
    return lambda assessment, **named: Paper(worksheet(assessment, **named))


@pytest.fixture(scope="session", params=EXAMPLES, ids=lambda path: path.stem)
def made(request):
    result = assess(read_assessment(request.param))
    return result, Paper(worksheet(result))


@pytest.fixture
def least():
    return LEAST
