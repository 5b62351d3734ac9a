"""Texts the user sees for bad files, checked as texts."""

from pathlib import Path

import pytest

from spinhazard.errors import InputError
from spinhazard.statement.reading import assessment_from_text

FOLDER = Path(__file__).parents[1] / "messages"


@pytest.mark.parametrize("name", sorted(path.stem for path in FOLDER.glob("bad-*.toml")))
def test_bad_file_gives_exactly_these_complaints(name):
    text = (FOLDER / f"{name}.toml").read_text("utf-8")

    with pytest.raises(InputError, match=r"\w") as caught:
        assessment_from_text(text, name=f"{name}.toml")

    assert str(caught.value) == (FOLDER / f"{name}.txt").read_text("utf-8").rstrip("\n")
