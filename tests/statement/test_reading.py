"""Assessment files: what is accepted, what is refused, all complaints at once."""

from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.errors import InputError
from spinhazard.statement.reading import assessment_from_text, read_assessment, read_policy

SMALLEST = """
format = 1
[machine]
tag = "A"
[[shaft]]
id = "s"
speed = "100 rpm"
[[shaft.part]]
shape = "disk"
diameter = "1 m"
mass = "10 kg"
"""


def read(text):
    return assessment_from_text(text, name="a.toml").file


def test_smallest_file_is_accepted_and_nameless_parts_get_a_name():
    file = read(SMALLEST)

    assert file.machine.kind == "other"
    assert file.shafts[0].parts[0].id == "disk 1"
    assert file.stopping is None


def test_windows_line_ends_and_byte_order_mark_are_read(tmp_path):
    path = tmp_path / "a.toml"
    path.write_bytes(b"\xef\xbb\xbf" + SMALLEST.replace("\n", "\r\n").encode())

    assert read_assessment(path).file.machine.tag == "A"


def test_value_table_carries_source_note_and_calibration():
    file = read(
        SMALLEST.replace(
            'mass = "10 kg"',
            'mass = { value = "10 kg ± 2 %", source = "weighed", instrument = "scale 17", calibration_due = 2026-12-31 }',
        )
    )
    mass = file.shafts[0].parts[0].mass

    assert (mass.value, mass.half_width, mass.source, mass.source_class) == (10.0, 0.2, "weighed", "measured")
    assert mass.calibration_due.isoformat() == "2026-12-31"


@pytest.mark.parametrize(
    ("change", "complaint"),
    [
        (("format = 1", "format = 1.0"), "format number is not known"),
        (("format = 1", "format = true"), "format number is not known"),
        (("format = 1", ""), "format number is missing"),
        (('tag = "A"', 'tag = "A\\u0007B"'), "control character"),
        (('tag = "A"', 'tag = "A/B"'), 'holds "/"'),
        (('tag = "A"', 'tag = "' + "x" * 61 + '"'), "too long a text"),
        (('tag = "A"', "tag = 7"), "not a text"),
        (('tag = "A"', ""), "this field is needed and is not stated"),
        (('id = "s"', 'id = "s"\nratio = 2'), "ratio is stated without driven_by"),
        (('id = "s"', 'id = "s"\ndriven_by = "s"\nratio = 2'), "a shaft drives itself"),
        (('id = "s"', 'id = "s"\ndriven_by = "t"\nratio = 2'), "no shaft has this id"),
        (('shape = "disk"', 'shape = "disk"\ncount = 0'), "greater than or equal to 1"),
        (('shape = "disk"', 'shape = "disk"\ncount = 2.5'), "not a whole number"),
        (('shape = "disk"\n', ""), "the shape is not stated"),
        (('shape = "disk"', 'shape = "disk"\nmaterial = "stele"'), 'no such material.*Nearest: "steel"'),
        (
            ('mass = "10 kg"', 'mass = { value = "10 kg", source = "weihged" }'),
            'not a known kind of source.*Nearest: "weighed"',
        ),
        (('mass = "10 kg"', 'mass = { source = "weighed" }'), "empty"),
        (('mass = "10 kg"', 'mass = { value = "10 kg", note = 7 }'), "not a short text"),
        (('mass = "10 kg"', 'mass = { value = "10 kg", calibration_due = "soon" }'), "not a date"),
        (('mass = "10 kg"', "mass = true"), "neither a text nor a number"),
        (('mass = "10 kg"', 'mass = "0 kg"'), "zero cannot be meant"),
        (('mass = "10 kg"', 'masss = "10 kg"'), 'no such field here.*Nearest: "mass"'),
    ],
)
def test_what_cannot_be_meant_is_refused(change, complaint):
    with pytest.raises(InputError, match=complaint):
        read(SMALLEST.replace(*change))


def test_all_complaints_of_a_file_come_at_once_in_the_order_of_its_lines():
    text = (
        SMALLEST.replace('speed = "100 rpm"', 'speed = "100"').replace('diameter = "1 m"', 'diameter = "1 kg"')
        + '[lockout]\nwait = "soon"\n'
    )

    with pytest.raises(InputError, match=r"\w") as caught:
        read(text)

    complaints = caught.value.complaints
    assert [complaint.field for complaint in complaints] == [
        "shaft.s.speed",
        "shaft.s.part.disk 1.diameter",
        "lockout.wait",
    ]
    assert [complaint.line for complaint in complaints] == sorted(complaint.line for complaint in complaints)


def test_two_hundred_complaints_are_cut_to_fifty_and_counted():
    parts = "".join('[[shaft.part]]\nshape = "disk"\ndiameter = "1"\nmass = "1 kg"\n' for _ in range(200))

    with pytest.raises(InputError, match="and 150 more"):
        read(SMALLEST + parts)


@pytest.mark.parametrize(
    "text", ["format = 1\n[machine", "a" * 1000, "format = 1\nx = " + "[" * 5000, "format = " + "9" * 10_000, "\x01"]
)
def test_broken_toml_is_one_clear_complaint(text):
    with pytest.raises(InputError, match="not readable as TOML") as caught:
        read(text)

    assert len(caught.value.complaints) == 1


@given(st.text(max_size=300))
def test_no_text_makes_the_reader_crash(text):
    with pytest.raises(InputError, match=r"\w"):
        assessment_from_text(text, name="x")


def test_policy_names_what_it_does_not_know(tmp_path):
    path = tmp_path / "policy.toml"
    path.write_text('format = 1\nname = "North"\nwait_margin = 1.5\nfigures = "us"\nenergy_review_levle = "2 kJ"\n')

    with pytest.raises(
        InputError, match=r'line 5, energy_review_levle: no such field here.*Nearest: "energy_review_level"'
    ):
        read_policy(path)


def test_policy_lists_its_deviations_from_the_shipped_defaults(tmp_path):
    path = tmp_path / "policy.toml"
    path.write_text(
        'format = 1\nname = "North"\nwait_margin = 1.5\nenergy_review_level = "1000 J"\n[spreads]\nestimated = 0.3\n'
    )

    policy, _ = read_policy(path)

    assert policy.deviations() == (
        ("name", "shipped defaults", "North"),
        ("wait_margin", "1.2", "1.5"),
        ("spreads.estimated", "0.2", "0.3"),
    )


def test_missing_file_is_named_with_its_neighbour(tmp_path):
    (tmp_path / "fan.toml").write_text(SMALLEST)

    with pytest.raises(InputError, match=r"no such file.*fan\.toml"):
        read_assessment(Path(tmp_path / "fna.toml"))


def test_file_with_a_thousand_parts_is_refused_before_anything_is_drawn():
    parts = "".join('[[shaft.part]]\nshape = "disk"\ndiameter = "1 m"\nmass = "1 kg"\n' for _ in range(1000))

    with pytest.raises(InputError, match="too many"):
        read(SMALLEST + parts)
