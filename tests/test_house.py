"""What must stay true of the whole house. Each rule is shown to fail once on a made-up offender."""

import ast
import inspect
import itertools
import re
import shutil
import subprocess
import sys
import tomllib
from pathlib import Path

import pytest

from spinhazard import sampling
from spinhazard.facts import FACTS
from spinhazard.mechanics import formula as formulas
from spinhazard.rules.loading import shipped_catalogue
from spinhazard.sources import load_sources, resolve

ROOT = Path(__file__).parents[1]
PACKAGE = ROOT / "spinhazard"
MODULES = sorted(PACKAGE.rglob("*.py"))
FORBIDDEN = re.compile(r"\b(safe|pass|passed|passes|approved|compliant|OK)\b")
LONGEST_FILE, LONGEST_BODY = 400, 40


def run(*arguments):
    return subprocess.run([sys.executable, *arguments], cwd=ROOT, capture_output=True, text=True, check=False)


@pytest.mark.parametrize(
    "command",
    [
        ("-m", "ruff", "check", "."),
        ("-m", "ruff", "format", "--check", "."),
        ("-m", "mypy"),
        ("-c", "from importlinter.cli import lint_imports_command; lint_imports_command()"),
    ],
    ids=["lint", "format", "types", "imports"],
)
def test_the_tools_find_nothing(command):
    result = run(*command)

    assert result.returncode == 0, result.stdout + result.stderr


def long_bodies(source):
    for node in ast.walk(ast.parse(source)):
        if isinstance(node, ast.FunctionDef):
            body = node.body[1:] if ast.get_docstring(node) else node.body
            if body and body[-1].end_lineno - body[0].lineno + 1 > LONGEST_BODY:
                yield node.name


def test_no_function_body_is_longer_than_forty_lines():
    assert [(path.name, name) for path in MODULES for name in long_bodies(path.read_text("utf-8"))] == []
    assert list(long_bodies("def f():\n" + "    x = 1\n" * 41)) == ["f"]


def test_no_file_is_longer_than_four_hundred_lines_beside_its_docstrings():
    def lines_of_code(source):
        docstrings = sum(
            node.body[0].end_lineno - node.body[0].lineno + 1
            for node in ast.walk(ast.parse(source))
            if isinstance(node, (ast.FunctionDef, ast.ClassDef, ast.Module)) and ast.get_docstring(node)
        )
        return source.count("\n") - docstrings

    assert [path.name for path in MODULES if lines_of_code(path.read_text("utf-8")) > LONGEST_FILE] == []
    assert lines_of_code('"""Doc."""\n' + "x = 1\n" * 401) == 401


def documented_parameters(function):
    text = inspect.getdoc(function) or ""
    found = re.search(r"Parameters\n-+\n(.*?)(?:\n\n[A-Z]\w+\n-+|\Z)", text, re.DOTALL)
    lines = found[1].split("\n") if found else []
    return [
        name.strip()
        for line in lines
        if line and not line.startswith(" ")
        for name in line.partition(" : ")[0].split(",")
    ]


def public_functions():
    for name in formulas.REGISTRY:
        module, _, function = name.partition(".")
        yield name, getattr(__import__(f"spinhazard.mechanics.{module}", fromlist=[function]), function)


@pytest.mark.parametrize(
    ("name", "function"), list(public_functions()), ids=lambda value: value if isinstance(value, str) else ""
)
def test_each_formula_documents_its_parameters_with_units_and_an_example(name, function):
    text = inspect.getdoc(function)

    if "As in :func:" not in text:
        assert documented_parameters(function) == list(inspect.signature(function).parameters)
    assert re.search(r"Returns\n-+\n", text), name
    assert ">>>" in text
    assert "[" in text or formulas.REGISTRY[name].unit == ""
    assert set(formulas.REGISTRY[name].symbols) <= set(inspect.signature(function).parameters)


def test_documented_parameters_are_really_compared():
    def offender(mass, _radius):
        """Do.

        Parameters
        ----------
        mass : float
            Mass.

        Returns
        -------
        float
        """

    assert documented_parameters(offender) == ["mass"]


def references():
    yield sampling.SOURCE
    yield from (formula.source for formula in formulas.REGISTRY.values())
    yield from (part for declaration in FACTS.values() for part in declaration.source.split("; ") if part)
    yield from (basis for rule in shipped_catalogue().rules for basis in rule.basis)
    for path in (PACKAGE / "selfcheck/checks").glob("*.toml"):
        yield from (check["source"] for check in tomllib.loads(path.read_text("utf-8"))["check"])


def test_every_reference_leads_to_a_source_and_every_source_is_used():
    used = {resolve(reference).id for reference in references()}

    assert set(load_sources()) - used == set()
    with pytest.raises(LookupError, match="no source has the id"):
        resolve("nowhere 1.2")


def test_every_fact_has_a_label_and_a_known_unit():
    from spinhazard.rules.loading import KIND_OF_UNIT

    further = {"m³", "kg m²/s", "N m s", "N m s²", "rad/s²", "1/s", "1/rad"}
    for declaration in FACTS.values():
        assert declaration.label
        assert not declaration.label.endswith(".")
        assert declaration.unit in KIND_OF_UNIT or declaration.unit in further, declaration.key


def strings_of(source):
    tree = ast.parse(source)
    docstrings = {
        id(node.body[0].value)
        for node in ast.walk(tree)
        if isinstance(node, (ast.FunctionDef, ast.ClassDef, ast.Module)) and ast.get_docstring(node)
    }
    return [
        node.value
        for node in ast.walk(tree)
        if isinstance(node, ast.Constant) and isinstance(node.value, str) and id(node) not in docstrings
    ]


def test_the_tool_never_claims_safety():
    shown = [text for path in MODULES if path.name != "rule.py" for text in strings_of(path.read_text("utf-8"))]
    files = [*PACKAGE.rglob("*.toml"), *(ROOT / "examples").glob("*")]
    shown += [path.read_text("utf-8") for path in files if path.name != "sources.toml"]

    assert [match[0] for text in shown for match in FORBIDDEN.finditer(text)] == []
    assert FORBIDDEN.search("this guard is safe")


def test_help_needs_neither_reportlab_nor_pint_nor_numpy():
    code = (
        "import sys; from spinhazard.cli.app import app\n"
        "try: app(['--help'])\nexcept SystemExit: pass\n"
        "heavy = {'reportlab', 'pint', 'numpy', 'pydantic'} & set(sys.modules); print(heavy or 'none'); sys.exit(bool(heavy))"
    )
    result = run("-c", code)

    assert result.returncode == 0, result.stdout


def test_every_command_has_help_and_a_section_in_the_docs():
    from spinhazard.cli.app import app

    cli = (ROOT / "docs/generated/cli.md").read_text("utf-8")
    for command in app.registered_commands:
        name = command.name or command.callback.__name__
        assert inspect.getdoc(command.callback)
        assert f"## spinhazard {name}\n" in cli


def test_generated_docs_are_not_stale():
    result = run("docs/generate.py", "--check")

    assert result.returncode == 0, result.stdout + result.stderr


def test_the_top_level_holds_what_the_customer_fixed():
    listed = subprocess.run(
        [shutil.which("git"), "ls-files"], cwd=ROOT, capture_output=True, text=True, check=False
    ).stdout.splitlines()
    top = {line.partition("/")[0] for line in listed if not line.startswith(".")}

    assert top <= {"README.md", "DEVELOPERS.md", "pyproject.toml", "spinhazard", "tests", "examples", "docs"}


def test_ci_calls_exactly_the_test_command_of_the_readme():
    blocks = re.findall(r"```sh\n(.*?)\n```", (ROOT / "README.md").read_text("utf-8"), re.DOTALL)
    script = (ROOT / ".ci/run").read_text("utf-8").rstrip("\n").split("\n")

    assert script[-1] == blocks[1]
    assert "\n" not in blocks[0]
    assert "\n" not in blocks[1]


def test_each_dependency_is_justified_in_one_line():
    project = tomllib.loads((ROOT / "pyproject.toml").read_text("utf-8"))["project"]
    names = [
        re.match(r"[A-Za-z0-9-]+", entry)[0]
        for entry in itertools.chain(project["dependencies"], *project["optional-dependencies"].values())
    ]
    lines = (ROOT / "docs/dependencies.md").read_text("utf-8").split("\n")

    for name in names:
        assert sum(line.startswith(f"| {name} |") for line in lines) == 1, name
