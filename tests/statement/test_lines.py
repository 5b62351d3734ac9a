"""Line numbers of tables and keys."""

import tomllib
from pathlib import Path

import pytest

from spinhazard.statement.lines import line_numbers, nearest_line

ROOT = Path(__file__).parents[2]
TEXT = '''format = 1
title = """
[not.a.table]
key = 1
"""   # a comment with = and [brackets]

["quoted key"]
a.b = "x = y"

[[shaft]]
id = "one"   # [[shaft]] in a comment
points = [
  [1, 2],
  [3, 4],
]
mass = { value = "1 kg", source = "weighed" }
  [[shaft.part]]
  id = 'a "quoted" name'
  [[shaft.part]]
  id = "b"

[[shaft]]
id = "two"
  [[shaft.part]]
  id = "c"
[stopping]
shaft = "one"
'''


def test_each_key_has_the_line_it_stands_in():
    lines = line_numbers(TEXT)

    assert lines[("format",)] == 1
    assert lines[("title",)] == 2
    assert lines[("quoted key",)] == 7
    assert lines[("quoted key", "a", "b")] == 8
    assert lines[("shaft", 0)] == 10
    assert lines[("shaft", 0, "points")] == 12
    assert lines[("shaft", 0, "mass", "source")] == 16
    assert lines[("shaft", 0, "part", 1, "id")] == 20
    assert lines[("shaft", 1, "part", 0, "id")] == 25
    assert lines[("stopping", "shaft")] == 27
    assert ("not", "a", "table") not in lines


def test_what_has_no_line_has_that_of_the_table_around_it():
    lines = line_numbers(TEXT)

    assert nearest_line(lines, ("shaft", 1, "part", 0, "mass")) == 24
    assert nearest_line(lines, ("nothing", "here")) == 1


def _paths(value, path=()):
    if isinstance(value, dict):
        for key, inner in value.items():
            yield (*path, key)
            yield from _paths(inner, (*path, key))
    elif isinstance(value, list) and value and isinstance(value[0], dict):
        for index, inner in enumerate(value):
            yield from _paths(inner, (*path, index))


@pytest.mark.parametrize(
    "file", sorted([*(ROOT / "examples").glob("*.toml"), *(ROOT / "spinhazard/statement/starters").glob("*.toml")])
)
def test_every_key_of_the_shipped_files_is_found_where_it_is_written(file):
    text = file.read_text("utf-8")
    lines, rows = line_numbers(text), text.split("\n")

    for path in _paths(tomllib.loads(text)):
        if isinstance(path[-1], str) and path in lines:
            assert path[-1] in rows[lines[path] - 1]
    plain = [path for path in _paths(tomllib.loads(text)) if all(isinstance(key, str) for key in path)]
    assert [path for path in plain if path not in lines and not isinstance(tomllib.loads(text)[path[0]], list)] in (
        [],
        [("stopping", "brake")],
    )
