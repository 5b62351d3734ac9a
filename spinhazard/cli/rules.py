"""``spinhazard rules [KEY]``: the catalogue as a list, or one rule explained."""

from __future__ import annotations

import difflib
import json
import sys
from pathlib import Path

from spinhazard.assessment import CAUTIONS
from spinhazard.cli.screen import padded, say, width, wrapped
from spinhazard.errors import Complaint, InputError, quoted
from spinhazard.facts import FACTS
from spinhazard.files import write_file
from spinhazard.rules.loading import shipped_catalogue
from spinhazard.rules.rule import Alternatives, Comparison, Condition, Rule
from spinhazard.sources import citation


def run(key: str | None, *, family: str | None, json_path: Path | None, overwrite: bool) -> None:
    """List or explain.

    Parameters
    ----------
    key : str or None
        Key of one rule.
    family : str or None
        Family to list.
    json_path : Path or None
        Where to write all of it as JSON; ``-`` for standard output.
    overwrite : bool
        Whether an existing file may be replaced.

    Raises
    ------
    InputError
        There is no such family.
    """
    catalogue = shipped_catalogue()
    families = sorted({rule.family for rule in catalogue.rules})
    if family is not None and family not in families:
        near = difflib.get_close_matches(family[:80], families, n=1, cutoff=0.4)
        raise InputError(
            Complaint(
                "no such family of rules",
                field="--family",
                stated=quoted(family),
                accepted=", ".join(families),
                nearest=near[0] if near else "",
            )
        )
    if key is not None:
        rules: tuple[Rule, ...] = (catalogue.rule(key),)
    else:
        rules = tuple(rule for rule in catalogue.rules if family in {None, rule.family})
    if json_path is not None:
        text = json.dumps([_data(rule) for rule in rules], ensure_ascii=False, indent=1) + "\n"
        if str(json_path) == "-":
            sys.stdout.write(text)
            return
        write_file(json_path, text.encode(), overwrite=overwrite)
        say(f"Wrote {json_path}")
    elif key is not None:
        say(*explained(rules[0]))
    else:
        say(*_listed(rules))


def _listed(rules: tuple[Rule, ...]) -> list[str]:
    lines: list[str] = []
    for family in dict.fromkeys(rule.family for rule in rules):
        members = [rule for rule in rules if rule.family == family]
        size = max(len(rule.key) for rule in members) + 4
        lines += ["", family.upper()]
        for rule in members:
            lines += wrapped(rule.asks, indent=size if width() > 100 else 6, first=padded(f"  {rule.key}", size)) if width() > 100 else [
                f"  {rule.key}", *wrapped(rule.asks, indent=6)]  # fmt: skip
    return [*lines[1:], "", f"{len(rules)} rules. One of them in full: spinhazard rules KEY"]


def explained(rule: Rule) -> list[str]:
    """One rule in words.

    Parameters
    ----------
    rule : Rule
        The rule.

    Returns
    -------
    list of str
        Lines.
    """
    lines = [f"{rule.key}  ({rule.family}, since {rule.since}; {rule.urgency})", *wrapped(rule.asks, indent=2)]
    lines += ["", "Why", *wrapped(rule.because, indent=2)]
    lines += ["", f"Looked at for each {rule.each}" + (", where" if rule.applies else "")]
    lines += [line for condition in rule.applies for line in wrapped(in_words(condition), indent=4, first="  · ")]
    lines += ["For review when"]
    lines += [line for condition in rule.review for line in wrapped(in_words(condition), indent=4, first="  · ")]
    lines += ["", "It says", *wrapped(rule.says, indent=2)]
    needs = dict.fromkeys(
        name for line in rule.comparisons() for name in (line.fact, line.operand.name) if name in FACTS
    )
    lines += [
        "",
        "It needs",
        *(text for name in needs for text in wrapped(f"{name}: {FACTS[name].label}", indent=4, first="  · ")),
    ]
    lines += [
        "",
        "Rests on",
        *(text for basis in rule.basis for text in wrapped(citation(basis), indent=4, first="  · ")),
    ]
    if rule.measures:
        lines += [
            "",
            "What may be changed",
            *(text for lever in rule.measures for text in wrapped(lever, indent=4, first="  · ")),
        ]
    if rule.withdrawn:
        lines += ["", f"Withdrawn with version {rule.withdrawn}; kept so that older worksheets can be explained."]
    return [*lines, "", *wrapped(CAUTIONS[2])]


def in_words(condition: Condition) -> str:
    """A condition as a sentence part.

    Parameters
    ----------
    condition : Condition
        Comparison or alternatives.

    Returns
    -------
    str
        Text.
    """
    if isinstance(condition, Alternatives):
        return " or ".join(_comparison_in_words(line) for line in condition.conditions)
    return _comparison_in_words(condition)


def _comparison_in_words(line: Comparison) -> str:
    label = FACTS[line.fact].label
    if line.word == "is stated":
        return f"{label}: {'stated' if line.operand.value else 'not stated'}"
    limit = FACTS[line.operand.name].label if line.operand.kind == "fact" else line.operand.name
    return f"{label} {line.word} {'the site policy: ' if line.operand.kind == 'policy' else ''}{limit}"


def _data(rule: Rule) -> dict[str, object]:
    return {
        "key": rule.key, "family": rule.family, "since": rule.since, "asks": rule.asks, "because": rule.because, "each": rule.each,
        "applies": [in_words(c) for c in rule.applies], "review": [in_words(c) for c in rule.review], "urgency": rule.urgency,
        "says": rule.says, "measures": list(rule.measures), "basis": [{"reference": b, "citation": citation(b)} for b in rule.basis],
        "withdrawn": rule.withdrawn or None,
    }  # fmt: skip
