"""Log files: heads, separators, decimal commas, and what is refused."""

import math

import pytest

from spinhazard.errors import InputError
from spinhazard.statement.tachometer_log import LogOptions, read_log

RPM = 2 * math.pi / 60


@pytest.mark.parametrize(
    "text",
    [
        "time [s],speed [rpm]\n0,1480\n1,1400.5\n2,1300\n",
        "time [s];speed [rpm]\n0,0;1480,0\n1,0;1400,5\n2,0;1300\n",
        "t (s)\tn (1/min)\n0\t1480\n1\t1400,5\n2\t1300\n",
        "\ufeffno,speed [rpm],time [ms]\n1,1480,0\n2,1400.5,1000\n3,1300,2000\n",
        "time [s],speed [rpm]\n# a remark\n0,1480\n\n1,1400.5\n2,1300\n",
        "time [min];speed [Hz]\n0;24,6666666666666667\n0,0166666666666667;23,3416666666666667\n0,0333333333333333;21,6666666666666667\n",
        "time [s],speed [rpm]\n5,-1480\n6,-1400.5\n7,-1300\n",
    ],
)  # fmt: skip
def test_log_is_read_whatever_its_separator_units_and_order(tmp_path, text):
    path = tmp_path / "run.csv"
    path.write_text(text, "utf-8")
    log = read_log(path)

    assert log.time == pytest.approx([0.0, 1.0, 2.0], abs=1e-9)
    assert log.speed == pytest.approx([1480 * RPM, 1400.5 * RPM, 1300 * RPM])
    assert len(log.digest) == 64


def test_columns_and_units_can_be_named(tmp_path):
    path = tmp_path / "run.csv"
    path.write_text("ch1,ch2,ch3\n0,9,1480\n1,9,1400\n2,9,1300\n")
    log = read_log(path, LogOptions("ch1", "ch3", "s", "rpm"))

    assert log.speed[0] == pytest.approx(1480 * RPM)


@pytest.mark.parametrize(
    ("text", "complaint"),
    [
        ("", "fewer than two columns"),
        ("1480\n1400\n", "fewer than two columns"),
        ("time [s],speed\n0,1\n1,1\n2,1\n", "line 1: the speed has no unit"),
        ("time [s],speed [kg]\n0,1\n1,1\n2,1\n", "unit of the speed"),
        ("time [s],velocity [rpm]\n0,1\n1,1\n2,1\n", "no column for the speed"),
        ("time [s],speed [rpm]\n0,1480\n1,fast\n2,1300\n", "line 3: not a row of numbers"),
        ("time [s],speed [rpm]\n0,1480\n1\n2,1300\n", "line 3: not a row of numbers"),
        ("time [s],speed [rpm]\n0,1480\n1,nan\n2,1300\n", "line 3: 1 readings are no numbers"),
        ("time [s],speed [rpm]\n0,1480\n", "fewer than three readings"),
        ("time [s],speed [rpm]\n0,1480\n1,1400\n1,1300\n", "line 4: two readings have the same time"),
        ("time [s],speed [rpm]\n0,1480\n2,1400\n1,1300\n", "line 4: the time runs backwards"),
    ],
)
def test_what_is_no_log_is_refused_with_its_line(tmp_path, text, complaint):
    path = tmp_path / "run.csv"
    path.write_text(text)

    with pytest.raises(InputError, match=complaint):
        read_log(path)


def test_missing_and_binary_logs_are_refused(tmp_path):
    (tmp_path / "a.csv").write_bytes(b"\x00\x01\x02" * 100)

    with pytest.raises(InputError, match="not a text table"):
        read_log(tmp_path / "a.csv")
    with pytest.raises(InputError, match="no such file"):
        read_log(tmp_path / "b.csv")
