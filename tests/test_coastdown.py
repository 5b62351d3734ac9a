"""From a log to the stopping table, to an assessment, and back."""

import json
import math
import os
import subprocess
import sys
from pathlib import Path

import numpy as np
import pytest

from spinhazard import InputError, assess, assessment_from_text, read_assessment
from spinhazard.coastdown import fit_log, merged_into, slowest, stopping_lines
from spinhazard.mechanics.coastdown import speed_after, stopping_time
from spinhazard.statement.tachometer_log import LogOptions

ROOT = Path(__file__).parents[1]
TRUTH = (0.117, 7.5e-5, 1.55e-4)
SPEED = 1480 * 2 * math.pi / 60
DRAG = 'friction_torque = "3.1 N m"\nviscous = "0.002 N m s"\nwindage = "0.0041 N m s2"\n'


@pytest.fixture
def log_file(tmp_path):
    def write(name="run.csv", truth=TRUTH, seed=1):
        a, b, c = truth
        time = np.arange(0.0, 420.0, 0.25)
        speed = np.where(
            time < 15,
            SPEED,
            speed_after(np.maximum(time - 15, 0), 1.0, start_speed=SPEED, constant=a, linear=b, quadratic=c),
        )
        noisy = np.abs(speed + np.random.default_rng(seed).normal(0, 0.3, time.size)) * 60 / (2 * math.pi)
        path = tmp_path / name
        rows = (f"{t:.2f};{n:.2f}".replace(".", ",") for t, n in zip(time, noisy, strict=True))
        path.write_text("time [s];speed [rpm]\n" + "\n".join(rows))
        return path

    return write


def spinhazard(*arguments, cwd=ROOT):
    environment = {**os.environ, "COLUMNS": "80", "PYTHONPATH": str(ROOT)}
    command = [sys.executable, "-m", "spinhazard", *map(str, arguments)]
    return subprocess.run(command, cwd=cwd, capture_output=True, text=True, env=environment, check=False)


def test_command_gives_the_keys_of_the_contract(log_file, tmp_path):
    done = spinhazard("coastdown", log_file(), "--json", tmp_path / "fit.json", "--from", "1628 rpm")
    data = json.loads((tmp_path / "fit.json").read_text("utf-8"))

    assert done.returncode == 0, done.stderr
    assert max(len(line) for line in done.stdout.splitlines()) <= 80
    for key, true in zip(
        ("constant_over_inertia", "linear_over_inertia", "quadratic_over_inertia"), TRUTH, strict=True
    ):
        assert data[key]["low"] <= true <= data[key]["high"]
        assert data[key]["low"] <= data[key]["value"] <= data[key]["high"]
    assert data["predictions"][0]["from"] == pytest.approx(1628 * 2 * math.pi / 60)


def test_fit_merged_into_a_file_gives_the_stop_of_the_log(log_file, tmp_path, fan):
    file = tmp_path / "fan.toml"
    file.write_text(fan)
    done = spinhazard("coastdown", log_file(), "--into", file)
    assert done.returncode == 0, done.stderr

    result = assess(read_assessment(file), best_estimate=True)
    true = float(stopping_time(1.0, SPEED, end_speed=0.0, constant=TRUTH[0], linear=TRUTH[1], quadratic=TRUTH[2]))
    unbraked = file.read_text().replace("works_without_power = true", "works_without_power = false")
    coast = assess(assessment_from_text(unbraked, name="x"), best_estimate=True)

    assert coast.fact("stopping_time", "stop:power loss").best == pytest.approx(true, rel=0.01)
    assert "coast-down log run.csv" in file.read_text()
    assert result.file.stopping.friction_torque.source_class == "measured"
    assert [line for line in fan.splitlines() if line not in file.read_text().splitlines()] == DRAG.splitlines()


def test_log_named_in_the_file_gives_the_drag_with_its_trace(log_file, tmp_path, fan):
    log_file("dx.csv")
    text = fan.replace(DRAG, 'coastdown_log = "dx.csv"\n').replace(
        "works_without_power = true", "works_without_power = false"
    )
    (tmp_path / "fan.toml").write_text(text)
    result = assess(read_assessment(tmp_path / "fan.toml"))
    true = float(stopping_time(1.0, SPEED, end_speed=0.0, constant=TRUTH[0], linear=TRUTH[1], quadratic=TRUTH[2]))
    stop = result.fact("stopping_time", "stop:power loss")
    low, high = result.interval(stop)

    assert stop.best == pytest.approx(true, rel=0.01)
    assert low < stop.best < high
    assert "stopping.coastdown_log" in result.fact("constant_over_inertia").asked
    assert result.fact("constant_drag").best == pytest.approx(result.fact("constant_over_inertia").best * 26.5)


def test_another_log_changes_the_digest_of_the_inputs(log_file, tmp_path, fan):
    (tmp_path / "fan.toml").write_text(fan.replace(DRAG, 'coastdown_log = "dx.csv"\n'))
    digests = []
    for seed in (1, 2):
        log_file("dx.csv", seed=seed)
        digests.append(assess(read_assessment(tmp_path / "fan.toml"), best_estimate=True).digests["inputs"])

    assert digests[0] != digests[1]


@pytest.mark.parametrize("name", ["../dx.csv", "/etc/passwd", "a/b.csv", "..", "~x", "c:x"])
def test_log_outside_the_folder_of_the_file_is_refused(fan, name):
    with pytest.raises(InputError, match="not the name of a file beside this one"):
        assessment_from_text(fan.replace(DRAG, f'coastdown_log = "{name}"\n'), name="fan.toml")


def test_log_beside_stated_drag_is_refused(fan):
    with pytest.raises(InputError, match="stands beside friction_torque, viscous, windage"):
        assessment_from_text(fan.replace(DRAG, DRAG + 'coastdown_log = "dx.csv"\n'), name="fan.toml")


def test_log_without_a_coast_is_told_at_its_field(tmp_path, fan):
    (tmp_path / "flat.csv").write_text("time [s],speed [rpm]\n" + "\n".join(f"{i},1480" for i in range(50)))
    (tmp_path / "fan.toml").write_text(fan.replace(DRAG, 'coastdown_log = "flat.csv"\n'))

    with pytest.raises(InputError, match=r"stopping\.coastdown_log: there is no coast in it"):
        assess(read_assessment(tmp_path / "fan.toml"))


def test_slowest_of_several_runs_is_used(log_file):
    runs = [
        fit_log(log_file(f"{k}.csv", truth=(a, 0.0, 1.5e-4)), LogOptions()) for k, a in enumerate((0.15, 0.09, 0.12))
    ]

    assert slowest(runs, SPEED) is runs[1]


def test_file_without_stopping_table_is_left_alone(log_file, tmp_path, fan):
    run = fit_log(log_file(), LogOptions())
    head = fan[: fan.index("[stopping]")]

    with pytest.raises(InputError, match=r"there is no \[stopping\] table"):
        merged_into(head, stopping_lines(run, 26.5), name="fan.toml")


@pytest.mark.parametrize(
    ("arguments", "complaint"),
    [
        (("--inertia", "1.9 kg"), "--inertia"),
        (("--from", "1480"), "the unit is missing"),
        (("--speed-unit", "kg"), "unit of the speed"),
        (("--into", "nowhere.toml"), "no such file"),
    ],
)
def test_wrong_options_give_one_clear_message(log_file, arguments, complaint):
    done = spinhazard("coastdown", log_file(), *arguments)

    assert done.returncode == 2
    assert complaint in " ".join(done.stderr.split())
    assert done.stdout == ""
