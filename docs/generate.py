"""Write docs/generated from the code: formulas, facts, rules, published check values, command line. --check: only compare.

Run from the top of the project: ``python docs/generate.py``.
"""

from __future__ import annotations

import os
import subprocess
import sys
from pathlib import Path

from spinhazard.assessment import equation_of
from spinhazard.cli.app import app
from spinhazard.cli.rules import in_words
from spinhazard.facts import FACTS
from spinhazard.mechanics.formula import REGISTRY, printed
from spinhazard.quantity.units import KINDS, UNIT_NAMES
from spinhazard.rules.loading import shipped_catalogue
from spinhazard.rules.rule import Rule
from spinhazard.selfcheck.runner import run_all
from spinhazard.sources import citation, load_sources

FOLDER = Path(__file__).parent / "generated"
HEAD = "<!-- Written by docs/generate.py; change the code, not this page. -->\n\n"


def cell(text: object) -> str:
    """Text fit for a table cell."""
    return str(text).replace("|", "\\|").replace("\n", " ")


def table(heads: tuple[str, ...], rows: list[tuple[object, ...]]) -> str:
    """A table in Markdown."""
    lines = ["| " + " | ".join(heads) + " |", "| " + " | ".join("---" for _ in heads) + " |"]
    lines += ["| " + " | ".join(cell(entry) for entry in row) + " |" for row in rows]
    return "\n".join(lines) + "\n"


def formulas() -> str:
    """Every formula by module."""
    pages = ["# Formulas\n"]
    for module in dict.fromkeys(name.partition(".")[0] for name in REGISTRY):
        rows = []
        for name, formula in REGISTRY.items():
            if name.partition(".")[0] != module:
                continue
            symbols = ", ".join(f"{printed(symbol)} {parameter}" for parameter, symbol in formula.symbols.items())
            ranges = "; ".join(f"{what}: {low:g} to {high:g}" for what, (low, high) in formula.valid.items())
            rows.append(
                (
                    name.partition(".")[2],
                    printed(formula.equation),
                    formula.unit or "–",
                    symbols,
                    ranges,
                    citation(formula.source),
                )
            )
        pages.append(f"## {module}\n\n" + table(("formula", "equation", "unit", "symbols", "range", "source"), rows))
    return "\n".join(pages)


def facts() -> str:
    """Every fact by subject."""
    pages = ["# Facts\n\nNamed quantities that rules, worksheet and JSON use. SI units; words have no unit.\n"]
    for per in dict.fromkeys(declaration.per for declaration in FACTS.values()):
        rows = [
            (d.key, d.label, d.symbol, "word" if d.is_word else d.unit or "–", equation_of(d.key),
             "; ".join(citation(part) for part in dict.fromkeys(d.source.split("; ")) if part))
            for d in FACTS.values() if d.per == per
        ]  # fmt: skip
        pages.append(f"## of each {per}\n\n" + table(("key", "label", "symbol", "unit", "equation", "source"), rows))
    return "\n".join(pages)


def rule_page(rule: Rule) -> str:
    """One rule."""
    lines = [f"# {rule.key}\n", rule.asks + "\n", rule.because + "\n"]
    lines.append(f"Family {rule.family}; since {rule.since}; {rule.urgency}; looked at for each {rule.each}.\n")
    if rule.applies:
        lines.append("Applies where\n\n" + "\n".join(f"- {in_words(condition)}" for condition in rule.applies) + "\n")
    lines.append("For review when\n\n" + "\n".join(f"- {in_words(condition)}" for condition in rule.review) + "\n")
    lines.append(f"It says: {rule.says}\n")
    lines.append("Rests on\n\n" + "\n".join(f"- {citation(basis)}" for basis in rule.basis) + "\n")
    if rule.measures:
        lines.append("What may be changed\n\n" + "\n".join(f"- `{lever}`" for lever in rule.measures) + "\n")
    rows = [
        (", ".join(f"{k} = {v}" for k, v in example.given.items()), example.expect, example.note)
        for example in rule.examples
    ]
    lines.append("Examples\n\n" + table(("given", "outcome", "note"), rows))
    return "\n".join(lines)


def rules_index() -> str:
    """All rules in one table by family."""
    pages = ["# Rules\n"]
    rules = shipped_catalogue(examples=True).rules
    for family in dict.fromkeys(rule.family for rule in rules):
        rows = [(f"[{r.key}]({r.key}.md)", r.asks, r.urgency) for r in rules if r.family == family]
        pages.append(f"## {family}\n\n" + table(("key", "asks", "urgency"), rows))
    return "\n".join(pages)


def validation() -> str:
    """Every check value with what the program computes."""
    results = run_all()
    published = sum(result.check.kind == "published" for result in results)
    head = (
        f"# Validation\n\n{len(results)} check values, {published} of them published ones; the rest are recomputed or regression values,"
        " which are no evidence of their own. Figures from memory are marked. `spinhazard selfcheck` prints the same on any installation.\n"
    )
    pages = [head]
    for subject in dict.fromkeys(result.check.subject for result in results):
        rows = [
            (r.check.name, citation(r.check.source), r.check.stated, f"{r.check.expect:.6g}", f"{r.computed:.6g}", f"{r.deviation:.1e}",
             f"{r.check.tolerance:.1e}", r.check.kind + (", from memory" if r.check.read == "memory" else ""))
            for r in results if r.check.subject == subject
        ]  # fmt: skip
        heads = ("check", "source", "as stated there", "expected [SI]", "here [SI]", "deviation", "tolerance", "kind")
        pages.append(f"## {subject}\n\n" + table(heads, rows))
    return "\n".join(pages)


def sources() -> str:
    """The bibliography."""
    rows = [
        (s.id, s.short, s.author, s.title, s.edition, s.publisher, s.status, s.note) for s in load_sources().values()
    ]
    return "# Sources\n\n" + table(("id", "short", "author", "title", "edition", "publisher", "status", "note"), rows)


def units() -> str:
    """Kinds of quantity and known units."""
    products = "any product of the units below"
    rows = [
        (kind.name, kind.example, kind.si, ", ".join(kind.table) if kind.table else products) for kind in KINDS.values()
    ]
    text = "# Units\n\n" + table(("kind", "example", "SI unit", "units"), rows)
    return text + "\nUnits that products are made of: " + ", ".join(f"`{name}`" for name in UNIT_NAMES) + ".\n"


def command_line() -> str:
    """Help texts at 80 columns."""
    pages = ["# Command line\n"]
    for command in [
        "",
        *(entry.name or entry.callback.__name__ for entry in app.registered_commands if entry.callback),
    ]:
        environment = {**os.environ, "COLUMNS": "80", "TERMINAL_WIDTH": "80", "NO_COLOR": "1"}
        words = [sys.executable, "-m", "spinhazard", *([command] if command else []), "--help"]
        done = subprocess.run(words, capture_output=True, text=True, env=environment, check=True)  # noqa: S603  (our own program)
        title = f"## spinhazard {command}".rstrip()
        pages.append(f"{title}\n\n```\n{done.stdout.strip()}\n```\n")
    return "\n".join(pages)


def pages() -> dict[str, str]:
    """Name of each generated page and its text."""
    made = {
        "formulas.md": formulas(), "facts.md": facts(), "validation.md": validation(), "sources.md": sources(), "units.md": units(),
        "cli.md": command_line(), "rules/README.md": rules_index(),
    }  # fmt: skip
    made |= {f"rules/{rule.key}.md": rule_page(rule) for rule in shipped_catalogue(examples=True).rules}
    return {name: HEAD + text for name, text in made.items()}


def main() -> int:
    """Write, or compare with --check; 1 when something is stale."""
    wanted = pages()
    present = {str(path.relative_to(FOLDER)): path.read_text("utf-8") for path in FOLDER.rglob("*.md")}
    stale = sorted(name for name in {*wanted, *present} if wanted.get(name) != present.get(name))
    if "--check" in sys.argv:
        print(*(f"stale: docs/generated/{name}" for name in stale), sep="\n", end="\n" if stale else "")
        return 1 if stale else 0
    for name in stale:
        path = FOLDER / name
        if name in wanted:
            path.parent.mkdir(parents=True, exist_ok=True)
            path.write_text(wanted[name], "utf-8")
        else:
            path.unlink()
        print(f"wrote docs/generated/{name}" if name in wanted else f"removed docs/generated/{name}")
    return 0


if __name__ == "__main__":
    raise SystemExit(main())
