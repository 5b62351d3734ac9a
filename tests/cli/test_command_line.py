"""The command line as a user runs it: exit codes, complaints, outputs."""

import json
import os
import subprocess
import sys
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[2]
FAN_FILE = ROOT / "examples/extraction-fan.toml"
CAUTION = "qualified, licensed safety professionals"


def spinhazard(*arguments, columns=80, cwd=ROOT):
    environment = {**os.environ, "COLUMNS": str(columns), "PYTHONPATH": str(ROOT)}
    return subprocess.run(
        [sys.executable, "-m", "spinhazard", *map(str, arguments)],
        cwd=cwd,
        capture_output=True,
        text=True,
        env=environment,
        check=False,
    )


@pytest.mark.parametrize("columns", [80, 120])
def test_summary_fits_the_terminal_and_carries_the_cautions(columns):
    done = spinhazard("assess", FAN_FILE, columns=columns)

    assert done.returncode == 1
    assert max(len(line) for line in done.stdout.splitlines()) <= columns
    assert "Stored energy" in done.stdout
    assert "Governing stop" in done.stdout
    assert CAUTION in " ".join(done.stdout.split())
    assert "\x1b" not in done.stdout


def test_worksheet_and_json_are_written_the_same_twice(tmp_path):
    for name in ("a", "b"):
        done = spinhazard("assess", FAN_FILE, "--pdf", tmp_path / f"{name}.pdf", "--json", tmp_path / f"{name}.json")
        assert done.returncode == 1, done.stderr

    assert (tmp_path / "a.pdf").read_bytes() == (tmp_path / "b.pdf").read_bytes()
    assert (tmp_path / "a.json").read_bytes() == (tmp_path / "b.json").read_bytes()
    data = json.loads((tmp_path / "a.json").read_text("utf-8"))
    assert data["format"] == 1
    assert data["machine"]["tag"]
    assert data["digests"].keys() == {"inputs", "catalogue", "policy"}
    assert all(
        {"rule", "subject", "outcome", "likelihood", "urgency", "says", "missing", "basis"} <= finding.keys()
        for finding in data["findings"]
    )


def test_json_goes_to_standard_output_alone():
    done = spinhazard("assess", FAN_FILE, "--json", "-", "--best-estimate")

    assert json.loads(done.stdout)["uncertainty"]["draws"] == 0


def test_existing_output_is_kept_and_named(tmp_path):
    target = tmp_path / "old.pdf"
    target.write_bytes(b"last year's")
    done = spinhazard("assess", FAN_FILE, "--pdf", target)

    assert done.returncode == 3
    assert "exists already and was left as it is" in " ".join(done.stderr.split())
    assert target.read_bytes() == b"last year's"
    assert spinhazard("assess", FAN_FILE, "--pdf", target, "--overwrite").returncode == 1
    assert target.read_bytes().startswith(b"%PDF")


def test_input_file_is_never_overwritten(tmp_path):
    file = tmp_path / "fan.toml"
    file.write_bytes(FAN_FILE.read_bytes())
    done = spinhazard("assess", file, "--json", file, "--overwrite")

    assert done.returncode == 3
    assert "this is an input file" in done.stderr
    assert file.read_bytes() == FAN_FILE.read_bytes()


@pytest.mark.parametrize(
    ("arguments", "code", "complaint"),
    [
        (("assess", "nowhere.toml"), 2, "no such file"),
        (("assess", "examples"), 2, "this is a folder"),
        (("assess", "spinhazard/worksheet/fonts/DejaVuSansCondensed.ttf"), 2, "not readable as text"),
        (("assess", "pyproject.toml"), 2, "the format number is missing"),
        (("assess", FAN_FILE, "--pdf", "nowhere/out.pdf"), 3, "its folder does not exist"),
        (("assess", FAN_FILE, "--units", "metric"), 2, "not a system of units"),
        (("assess", FAN_FILE, "--paper", "a5"), 2, "not a size of paper"),
        (("assess", FAN_FILE, FAN_FILE, "--pdf", "one.pdf"), 3, "an existing folder for several"),
        (("assess", FAN_FILE, "--policy", "examples/extraction-fan.toml"), 2, "no such field here"),
        (("rules", "opens-before-stanstill"), 2, "opens-before-standstill"),
        (("rules", "--family", "acess"), 2, "access"),
        (("start", "fann", "x.toml"), 2, "fan"),
        (("start", "fan", "README.md"), 3, "exists already"),
        (("selfcheck", "--wrong"), 2, "No such option"),
    ],
    ids=str,
)
def test_wrong_use_gives_one_clear_message(arguments, code, complaint, tmp_path):
    done = spinhazard(*arguments)

    assert done.returncode == code, done.stderr
    assert complaint in " ".join(done.stderr.split())
    assert "Traceback" not in done.stderr
    assert done.stdout == ""


def test_one_unusable_file_does_not_stop_the_others(tmp_path):
    bad = tmp_path / "bad.toml"
    bad.write_text("format = 1\n[machine]\n")
    done = spinhazard("assess", bad, FAN_FILE)

    assert done.returncode == 2
    assert "Stored energy" in done.stdout
    assert "bad.toml" in "".join(done.stderr.split())


def test_rules_are_listed_and_explained(tmp_path):
    listed = spinhazard("rules")
    explained = spinhazard("rules", "opens-before-standstill")
    written = spinhazard("rules", "--json", tmp_path / "rules.json")

    assert listed.returncode == explained.returncode == written.returncode == 0
    assert "opens-before-standstill" in listed.stdout
    for head in ("Why", "For review when", "It needs", "Rests on", "What may be changed"):
        assert head in explained.stdout
    assert len(json.loads((tmp_path / "rules.json").read_text("utf-8"))) >= 20


def test_selfcheck_reports_every_value_and_exits_with_zero():
    done = spinhazard("selfcheck", "--all")

    assert done.returncode == 0, done.stdout
    assert "published" in done.stdout


@pytest.mark.parametrize(
    "kind", ["fan", "grinder", "saw", "press", "centrifuge", "lathe", "mixer", "roll", "flywheel", "other"]
)
def test_starter_of_each_kind_can_be_assessed_as_it_is(kind, tmp_path):
    file = tmp_path / f"{kind}.toml"
    assert spinhazard("start", kind, file).returncode == 0

    done = spinhazard("assess", file, "--best-estimate")

    assert done.returncode in {0, 1}, done.stderr
    assert f"{kind} ·" in done.stdout


def test_reader_that_leaves_early_is_no_error():
    command = [sys.executable, "-m", "spinhazard", "rules"]
    with subprocess.Popen(command, cwd=ROOT, stdout=subprocess.PIPE, stderr=subprocess.PIPE) as process:
        process.stdout.readline()
        process.stdout.close()
        complaints = process.stderr.read().decode()

    assert "Traceback" not in complaints


def test_user_text_with_control_characters_never_reaches_the_terminal(tmp_path):
    file = tmp_path / "evil.toml"
    file.write_text('format = 1\n[machine]\ntag = "A"\nname = "\\u001b[31mred"\nunknown\\u0007 = 1\n')
    done = spinhazard("assess", file)

    assert done.returncode == 2
    assert "\x1b" not in done.stderr + done.stdout
