"""Bounded reading, and writing beside the target before renaming: the only module that opens a file for writing."""

from __future__ import annotations

import contextlib
import os
import stat
import tempfile
from pathlib import Path

from spinhazard.errors import Complaint, InputError, OutputError

ASSESSMENT_FILE_LIMIT = 1_000_000
"""Bytes; a machine of 60 parts and 20 guards needs about 30 000."""


def read_text(path: Path, *, limit: int = ASSESSMENT_FILE_LIMIT, what: str = "an assessment file") -> str:
    """Text of a file that is not trusted: bounded in size, UTF-8, without NUL.

    Parameters
    ----------
    path : Path
        File to read.
    limit : int
        Largest size accepted [bytes].
    what : str
        What the file should be, for the message.

    Returns
    -------
    str
        The text, without a byte order mark.

    Raises
    ------
    InputError
        The file is missing, a folder, unreadable, too large, or not text.
    """
    data = _read_bytes(path, limit=limit, what=what)
    try:
        text = data.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        raise InputError(
            Complaint(
                f"not readable as text (byte {error.start} is not UTF-8)", file=str(path), accepted=f"{what} in UTF-8"
            )
        ) from None
    if "\x00" in text:
        raise InputError(
            Complaint("not a text file (it holds NUL characters)", file=str(path), accepted=f"{what} in UTF-8")
        )
    return text


def check_readable(path: Path, *, limit: int, what: str) -> None:
    """Refuse a file that another reader is going to open: missing, no regular file, or too large.

    Parameters
    ----------
    path : Path
        File to be read.
    limit : int
        Largest size accepted [bytes].
    what : str
        What the file should be, for the message.

    Raises
    ------
    InputError
        The file is missing, a folder, unreadable, or too large.
    """
    try:
        about = path.stat()
        if stat.S_ISDIR(about.st_mode):
            raise InputError(Complaint("this is a folder", file=str(path), accepted=what))
        if not stat.S_ISREG(about.st_mode):
            raise InputError(Complaint("this is not a regular file", file=str(path), accepted=what))
        path.open("rb").close()
    except FileNotFoundError:
        raise InputError(_no_such_file(path, what)) from None
    except (OSError, ValueError) as error:
        reason = getattr(error, "strerror", None) or str(error)
        raise InputError(Complaint(f"cannot be read ({reason})", file=str(path), accepted=what)) from None
    if about.st_size > limit:
        raise InputError(_too_large(path, limit, what))


def _too_large(path: Path, limit: int, what: str) -> Complaint:
    return Complaint(
        f"larger than {limit:,} bytes".replace(",", " "), file=str(path), accepted=f"{what} below that size"
    )


def _read_bytes(path: Path, *, limit: int, what: str) -> bytes:
    check_readable(path, limit=limit, what=what)
    with path.open("rb") as stream:
        data = stream.read(limit + 1)
    if len(data) > limit:  # it has grown since
        raise InputError(_too_large(path, limit, what))
    return data


def _no_such_file(path: Path, what: str) -> Complaint:
    import difflib  # noqa: PLC0415  (only on the way to a message)

    names: list[str] = []
    with contextlib.suppress(OSError):
        names = [entry.name for entry in path.parent.iterdir()][:10_000]
    near = difflib.get_close_matches(path.name, names, n=1)
    return Complaint("no such file", file=str(path), accepted=what, nearest=str(path.parent / near[0]) if near else "")


def check_output(path: Path, *, overwrite: bool) -> None:
    """Refuse a target early, before anything is computed.

    Parameters
    ----------
    path : Path
        File to be written later.
    overwrite : bool
        Whether an existing file may be replaced.

    Raises
    ------
    OutputError
        The target exists and may not be replaced, is a folder, or its folder is missing or not writable.
    """
    if path.is_dir():
        raise OutputError(Complaint("this is a folder", file=str(path), accepted="the name of a file to write"))
    if path.exists() and not overwrite:
        raise OutputError(
            Complaint(
                "exists already and was left as it is",
                file=str(path),
                accepted="a new name, or --overwrite to replace it",
            )
        )
    folder = path.parent
    if not folder.is_dir():
        raise OutputError(
            Complaint("its folder does not exist", file=str(path), accepted="a path in an existing folder")
        )
    if not os.access(folder, os.W_OK):
        raise OutputError(
            Complaint("its folder cannot be written to", file=str(path), accepted="a path in a writable folder")
        )


def write_file(path: Path, data: bytes, *, overwrite: bool) -> None:
    """Write beside the target, flush to disk, then rename; on any failure the target is what it was.

    Parameters
    ----------
    path : Path
        Target.
    data : bytes
        Whole content.
    overwrite : bool
        Whether an existing file may be replaced.

    Raises
    ------
    OutputError
        The file could not be written, or exists and may not be replaced.
    """
    check_output(path, overwrite=overwrite)
    beside: str | None = None
    try:
        handle, beside = tempfile.mkstemp(prefix=".spinhazard-", dir=path.parent)
        with os.fdopen(handle, "wb") as stream:
            stream.write(data)
            stream.flush()
            os.fsync(stream.fileno())
        # mkstemp makes files private to the user; a worksheet is read by others, as any new file would be
        mask = os.umask(0)
        os.umask(mask)
        Path(beside).chmod(0o666 & ~mask)
        if overwrite:
            Path(beside).replace(path)
        else:
            os.link(beside, path)  # fails where the target has appeared meanwhile; rename would replace it
    except FileExistsError:
        raise OutputError(Complaint("exists already and was left as it is", file=str(path))) from None
    except OSError as error:
        raise OutputError(Complaint(f"could not be written ({error.strerror or error})", file=str(path))) from None
    finally:
        if beside is not None:
            with contextlib.suppress(OSError):
                Path(beside).unlink()
