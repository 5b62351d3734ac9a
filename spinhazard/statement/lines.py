"""Where in a TOML text each key stands, so that a message can name the line.

tomllib gives values without positions. This scanner follows headers, keys, brackets and strings of a text that tomllib
has already accepted; it never reads values. What it does not find has the line of the nearest table around it.
"""

from __future__ import annotations

import re

Path = tuple[str | int, ...]
_KEY = r"""(?:[A-Za-z0-9_-]+|"(?:[^"\\]|\\.)*"|'[^']*')"""
_DOTTED = rf"{_KEY}(?:\s*\.\s*{_KEY})*"
_ARRAY_HEADER = re.compile(rf"\s*\[\[\s*({_DOTTED})\s*\]\]")
_HEADER = re.compile(rf"\s*\[\s*({_DOTTED})\s*\]")
_ASSIGNMENT = re.compile(rf"\s*({_DOTTED})\s*=")
_INNER_KEY = re.compile(rf"[{{,]\s*({_DOTTED})\s*=")
_ONE_KEY = re.compile(_KEY)
_STRINGS = re.compile(
    r'"""(?:[^"\\]|\\.|"(?!""))*(?:"""|\Z)|\'\'\'.*?(?:\'\'\'|\Z)|"(?:[^"\\\n]|\\.)*"|\'[^\'\n]*\'|#[^\n]*', re.DOTALL
)


def _keys(dotted: str) -> list[str]:
    return [key.strip("\"'") for key in _ONE_KEY.findall(dotted)]


def _masked(text: str) -> str:
    """The text with the inside of strings and comments blanked, quoted keys and line ends kept."""

    def blank(match: re.Match[str]) -> str:
        whole = match[0]
        after = text[match.end() : match.end() + 80].lstrip(" \t")
        if "\n" not in whole and whole[0] in "\"'" and after[:1] in {"=", ".", "]"}:
            return whole
        return re.sub(r"[^\n]", " ", whole)

    return _STRINGS.sub(blank, text)


def line_numbers(text: str) -> dict[Path, int]:
    """Line of every table, array entry and key.

    Parameters
    ----------
    text : str
        TOML text that tomllib has accepted.

    Returns
    -------
    dict
        Path such as ("shaft", 0, "part", 1, "mass") to line number, counted from 1.
    """
    found: dict[Path, int] = {(): 1}
    counts: dict[Path, int] = {}
    table: Path = ()
    depth = 0
    for number, line in enumerate(_masked(text).split("\n"), start=1):
        if depth == 0:
            if header := _ARRAY_HEADER.match(line):
                table = _array_entry(_keys(header[1]), counts)
                found[table] = number
                continue
            if header := _HEADER.match(line):
                table = _resolve(_keys(header[1]), counts)
                found.setdefault(table, number)
                continue
            if assignment := _ASSIGNMENT.match(line):
                path = (*table, *_keys(assignment[1]))
                found.setdefault(path, number)
                for inner in _INNER_KEY.finditer(line, assignment.end()):
                    found.setdefault((*path, *_keys(inner[1])), number)
        depth = max(0, depth + line.count("[") + line.count("{") - line.count("]") - line.count("}"))
    return found


def _resolve(keys: list[str], counts: dict[Path, int]) -> Path:
    """A header's path with the index of the array entry it continues."""
    path: Path = ()
    for key in keys:
        path = (*path, key)
        if path in counts:
            path = (*path, counts[path])
    return path


def _array_entry(keys: list[str], counts: dict[Path, int]) -> Path:
    array = (*_resolve(keys[:-1], counts), keys[-1])
    counts[array] = counts.get(array, -1) + 1
    return (*array, counts[array])


def nearest_line(lines: dict[Path, int], path: Path) -> int:
    """Line of a path, or of the nearest table around it.

    Parameters
    ----------
    lines : dict
        Result of :func:`line_numbers`.
    path : Path
        Path looked for.

    Returns
    -------
    int
        Line number.
    """
    while path not in lines:
        path = path[:-1]
    return lines[path]
