"""Reading is bounded; writing loses nothing."""

import os

import pytest

from spinhazard.errors import InputError, OutputError
from spinhazard.files import read_text, write_file


def test_missing_file_names_the_nearest(tmp_path):
    (tmp_path / "fan.toml").write_text("format = 1")

    with pytest.raises(InputError, match=r"no such file\..*Nearest: .*fan\.toml"):
        read_text(tmp_path / "fann.toml")


def test_folder_is_refused(tmp_path):
    with pytest.raises(InputError, match="this is a folder"):
        read_text(tmp_path)


def test_binary_file_is_refused(tmp_path):
    (tmp_path / "a.toml").write_bytes(b"\x89PNG\r\n\x1a\n\xff\xfe")
    (tmp_path / "b.toml").write_bytes(b"format\x00= 1")

    with pytest.raises(InputError, match="is not UTF-8"):
        read_text(tmp_path / "a.toml")
    with pytest.raises(InputError, match="NUL characters"):
        read_text(tmp_path / "b.toml")


def test_fifty_megabytes_are_not_read(tmp_path):
    big = tmp_path / "big.toml"
    with big.open("wb") as stream:
        stream.truncate(50_000_000)

    with pytest.raises(InputError, match="larger than 1 000 000 bytes"):
        read_text(big)


def test_device_is_refused():
    from pathlib import Path

    with pytest.raises(InputError, match="not a regular file"):
        read_text(Path("/dev/null"))


def test_byte_order_mark_is_taken_off(tmp_path):
    (tmp_path / "a.toml").write_bytes(b"\xef\xbb\xbfformat = 1")

    assert read_text(tmp_path / "a.toml") == "format = 1"


def test_existing_output_is_left_as_it_is(tmp_path):
    target = tmp_path / "out.pdf"
    target.write_bytes(b"old")

    with pytest.raises(OutputError, match="exists already and was left as it is"):
        write_file(target, b"new", overwrite=False)

    assert target.read_bytes() == b"old"
    write_file(target, b"new", overwrite=True)
    assert target.read_bytes() == b"new"
    assert [path.name for path in tmp_path.iterdir()] == ["out.pdf"]


def test_failed_writing_leaves_nothing_behind(tmp_path, monkeypatch):
    target = tmp_path / "out.pdf"
    target.write_bytes(b"old")

    def full(_handle):
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(os, "fsync", full)
    with pytest.raises(OutputError, match="No space left on device"):
        write_file(target, b"new", overwrite=True)

    assert target.read_bytes() == b"old"
    assert [path.name for path in tmp_path.iterdir()] == ["out.pdf"]


def test_folder_or_missing_folder_as_output_is_refused(tmp_path):
    with pytest.raises(OutputError, match="this is a folder"):
        write_file(tmp_path, b"", overwrite=True)
    with pytest.raises(OutputError, match="its folder does not exist"):
        write_file(tmp_path / "none" / "out.pdf", b"", overwrite=False)


def test_folder_without_write_permission_is_refused(tmp_path, monkeypatch):
    monkeypatch.setattr(os, "access", lambda *_: False)

    with pytest.raises(OutputError, match="cannot be written to"):
        write_file(tmp_path / "out.pdf", b"", overwrite=False)
