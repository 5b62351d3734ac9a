"""File to model. Every complaint names file, line and field; all complaints of a file come at once."""

from __future__ import annotations

import difflib
import re
import tomllib
from collections.abc import Mapping
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any, TypeVar, get_args

from pydantic import BaseModel, ValidationError
from pydantic.fields import FieldInfo

from spinhazard.errors import Complaint, InputError, quoted
from spinhazard.files import read_text
from spinhazard.statement.fields import Fault, Model
from spinhazard.statement.lines import Path as KeyPath
from spinhazard.statement.lines import line_numbers, nearest_line
from spinhazard.statement.machine import AssessmentFile
from spinhazard.statement.policy import Policy
from spinhazard.statement.references import reference_faults
from spinhazard.statement.rotor import SHAPES, Mesh
from spinhazard.statement.stl import Triangles, read_stl
from spinhazard.statement.tachometer_log import TachometerLog, read_log

MOST_COMPLAINTS = 50
ModelType = TypeVar("ModelType", bound=Model)


@dataclass(frozen=True)
class Reading:
    """An assessment file with the text it was read from (the digest of the inputs is taken over that text)."""

    file: AssessmentFile
    text: str
    name: str
    folder: Path
    log: TachometerLog | None = None
    meshes: Mapping[str, Triangles] = field(default_factory=dict)

    @property
    def digests(self) -> tuple[str, ...]:
        """SHA-256 of the files that this one names, in the order they are named."""
        return tuple(found.digest for found in (self.log, *self.meshes.values()) if found is not None)


def read_assessment(path: Path) -> Reading:
    """Read and check one assessment file.

    Parameters
    ----------
    path : Path
        TOML file.

    Returns
    -------
    Reading
        The frozen statement and its text.

    Raises
    ------
    InputError
        With every complaint about the file.
    """  # noqa: DOC502  (raised by what is called)
    return assessment_from_text(read_text(path), name=str(path), folder=path.parent)


def assessment_from_text(text: str, *, name: str, folder: Path = Path()) -> Reading:
    """Check the text of an assessment file.

    Parameters
    ----------
    text : str
        TOML text.
    name : str
        What messages call the file.
    folder : Path
        Folder that file names in the text are relative to.

    Returns
    -------
    Reading
        The frozen statement and its text.

    Raises
    ------
    InputError
        With every complaint about the text.
    """
    raw = parse_toml(text, name=name)
    _check_format(raw, text, name, "an assessment file")
    number_parts(raw)
    complaints: list[Complaint] = []
    file: AssessmentFile | None = None
    try:
        file = AssessmentFile.model_validate(raw)
    except ValidationError as error:
        complaints += _complaints(error, AssessmentFile, raw, text, name)
    faults = list(reference_faults(raw))
    if faults:
        lines = line_numbers(text)
        complaints += [_complaint(fault, path, raw, nearest_line(lines, path), name) for path, fault in faults]
    if complaints or file is None:
        raise InputError(_in_order(complaints))
    log = None
    if file.stopping is not None and file.stopping.coastdown_log is not None:
        log = read_log(folder / file.stopping.coastdown_log)
    return Reading(file=file, text=text, name=name, folder=folder, log=log, meshes=_meshes_of(file, folder))


def _meshes_of(file: AssessmentFile, folder: Path) -> dict[str, Triangles]:
    names = dict.fromkeys(part.file for shaft in file.shafts for part in shaft.parts if isinstance(part, Mesh))
    return {name: read_stl(folder / name) for name in names}


def read_policy(path: Path) -> tuple[Policy, str]:
    """Read and check a site's policy.

    Parameters
    ----------
    path : Path
        TOML file.

    Returns
    -------
    (Policy, str)
        The policy and its text.

    Raises
    ------
    InputError
        With every complaint about the file.
    """
    text = read_text(path, what="a policy file")
    raw = parse_toml(text, name=str(path))
    _check_format(raw, text, str(path), "a policy file")
    try:
        return Policy.model_validate(raw), text
    except ValidationError as error:
        raise InputError(_in_order(_complaints(error, Policy, raw, text, str(path)))) from None


def parse_toml(text: str, *, name: str) -> dict[str, Any]:
    """TOML text to plain data.

    Parameters
    ----------
    text : str
        The text.
    name : str
        What messages call the file.

    Returns
    -------
    dict
        Plain data.

    Raises
    ------
    InputError
        The text is no TOML; names the line.
    """
    try:
        return tomllib.loads(text.replace("\r\n", "\n"))
    except tomllib.TOMLDecodeError as error:
        found = re.search(r"\(at line (\d+), column \d+\)", str(error))
        line = int(found[1]) if found else text.count("\n") + 1
        reason = re.sub(r"\s*\(at .*\)\Z", "", str(error))
        raise InputError(
            Complaint(
                f"not readable as TOML ({reason[0].lower()}{reason[1:]})",
                file=name,
                line=line,
                accepted='lines such as: speed = "1480 rpm"',
            )
        ) from None
    except (RecursionError, ValueError):
        raise InputError(
            Complaint("not readable as TOML (nested too deeply, or a number too long)", file=name)
        ) from None


def _check_format(raw: dict[str, Any], text: str, name: str, what: str) -> None:
    stated = raw.get("format")
    if stated == 1 and not isinstance(stated, (bool, float)):
        return
    line = line_numbers(text).get(("format",), 1)
    problem = "the format number is missing" if stated is None else "this format number is not known to this program"
    raise InputError(
        Complaint(
            problem,
            file=name,
            line=line,
            field="format",
            stated="" if stated is None else quoted(stated),
            accepted=f"format = 1 at the top of {what}",
        )
    )


def number_parts(raw: dict[str, Any]) -> None:
    """Give parts and brakes without an id one, so that messages and subjects can name them.

    Parameters
    ----------
    raw : dict
        Plain data of an assessment file; changed in place.
    """
    for shaft in _tables(raw.get("shaft")):
        for index, part in enumerate(_tables(shaft.get("part")), start=1):
            part.setdefault("id", f"{part.get('shape', 'part')} {index}")
    stopping = raw.get("stopping")
    if isinstance(stopping, dict):
        for index, brake in enumerate(_tables(stopping.get("brake")), start=1):
            brake.setdefault("id", f"brake {index}")


def _tables(value: Any) -> list[dict[str, Any]]:
    return [entry for entry in value if isinstance(entry, dict)] if isinstance(value, list) else []


def _in_order(complaints: list[Complaint]) -> list[Complaint]:
    unique = list(dict.fromkeys(complaints))
    unique.sort(key=lambda complaint: complaint.line or 0)
    if len(unique) > MOST_COMPLAINTS:
        rest = len(unique) - MOST_COMPLAINTS
        unique = [*unique[:MOST_COMPLAINTS], Complaint(f"and {rest} more", file=unique[0].file)]
    return unique


def _complaints(error: ValidationError, model: type[BaseModel], raw: Any, text: str, name: str) -> list[Complaint]:
    lines = line_numbers(text)
    made: list[Complaint] = []
    for item in error.errors(include_url=False):
        path, info, owner = _walk(item["loc"], model, raw)
        if item["type"] == "too_short" and item.get("input"):
            continue  # pydantic counts only the good entries; the bad ones have complaints of their own
        fault = _as_fault(item, owner, path)
        if fault.field:
            path = (*path, *fault.field.split("."))
        complaint = _complaint(fault, path, raw, nearest_line(lines, path), name)
        if info is not None and info.description and item["type"] == "value_error" and not fault.field:
            meaning = f"{info.description}, as {complaint.accepted}" if complaint.accepted else info.description
            complaint = Complaint(
                complaint.problem, file=name, line=complaint.line, field=complaint.field, stated=complaint.stated,
                accepted=meaning, nearest=complaint.nearest,
            )  # fmt: skip
        made.append(complaint)
    return made


def _complaint(fault: Fault, path: KeyPath, raw: Any, line: int, name: str) -> Complaint:
    return Complaint(
        fault.problem, file=name, line=line, field=readable_path(path, raw),
        stated="" if fault.stated is None else quoted(fault.stated), accepted=fault.accepted, nearest=fault.nearest,
    )  # fmt: skip


def complaint_about(reading: Reading, path: str, fault: Fault) -> Complaint:
    """A complaint found after reading, with the line its field stands in.

    Parameters
    ----------
    reading : Reading
        The file.
    path : str
        Readable path of the field, ids in place of indexes.
    fault : Fault
        What is wrong.

    Returns
    -------
    Complaint
        For an InputError.
    """
    raw = parse_toml(reading.text, name=reading.name)
    number_parts(raw)
    lines = line_numbers(reading.text)
    keys = next((keys for keys in lines if readable_path(keys, raw) == path), ())
    return _complaint(fault, keys, raw, lines[keys], reading.name)


def _walk(
    location: tuple[int | str, ...], model: type[BaseModel], raw: Any
) -> tuple[KeyPath, FieldInfo | None, type[BaseModel] | None]:
    """The path in the file of a location in the models (which also holds the shapes), its field, the field's model."""
    path: KeyPath = ()
    owner: type[BaseModel] | None = model
    parent: type[BaseModel] | None = None
    info: FieldInfo | None = None
    for step in location:
        if isinstance(step, str) and step in SHAPES and isinstance(raw, dict) and step not in raw:
            owner = SHAPES[step]
            continue
        if isinstance(step, str) and isinstance(raw, list):
            continue
        if isinstance(step, str) and step.startswith(("function-", "literal[", "nullable")):
            continue
        path = (*path, step)
        if isinstance(step, str):
            parent = owner
            info = _field_of(owner, step)
            owner = _model_inside(info)
            raw = raw.get(step) if isinstance(raw, dict) else None
        else:
            raw = raw[step] if isinstance(raw, (list, tuple)) and step < len(raw) else None
    return path, info, parent


def _field_of(owner: type[BaseModel] | None, name: str) -> FieldInfo | None:
    if owner is None:
        return None
    for key, info in owner.model_fields.items():
        if name in {key, info.alias}:
            return info
    return None


def _model_inside(info: FieldInfo | None) -> type[BaseModel] | None:
    waiting: list[Any] = [info.annotation] if info is not None else []
    while waiting:
        annotation = waiting.pop()
        if isinstance(annotation, type) and issubclass(annotation, BaseModel):
            return annotation
        waiting += get_args(annotation)
    return None


def _as_fault(item: Any, owner: type[BaseModel] | None, path: KeyPath) -> Fault:
    """One pydantic error as a fault in our words."""
    kind, context, stated = item["type"], item.get("ctx", {}), item.get("input")
    if kind == "value_error" and isinstance(context.get("error"), Fault):
        fault: Fault = context["error"]
        return fault
    if kind == "missing":
        return Fault("this field is needed and is not stated", accepted=_meaning_of(owner, path))
    if kind == "extra_forbidden":
        return _unknown_field(owner, str(path[-1]))
    if kind in {"literal_error", "union_tag_invalid", "union_tag_not_found"}:
        return _wrong_word(kind, context, stated)
    plain = {
        "too_short": "too few entries", "too_long": "too many entries", "string_too_long": "too long a text",
        "string_too_short": "empty", "string_type": "not a text", "int_type": "not a whole number",
        "bool_type": "neither true nor false", "model_type": "not a table", "tuple_type": "not a list",
        "model_attributes_type": "not a table", "dict_type": "not a table",
    }  # fmt: skip
    accepted = {
        "string_too_long": f"text of at most {context.get('max_length')} characters", "bool_type": "true or false",
        "int_type": "a whole number", "too_long": f"at most {context.get('max_length')} entries",
        "too_short": f"at least {context.get('min_length')} entry", "tuple_type": "a list in square brackets",
    }  # fmt: skip
    message = item["msg"][0].lower() + item["msg"][1:]
    shown = None if isinstance(stated, (dict, list)) else stated
    return Fault(plain.get(kind, message), stated=shown, accepted=accepted.get(kind, ""))


def _unknown_field(owner: type[BaseModel] | None, name: str) -> Fault:
    names = [info.alias or key for key, info in owner.model_fields.items()] if owner is not None else []
    near = difflib.get_close_matches(name[:80].lower(), names, n=1, cutoff=0.5)
    return Fault("no such field here", accepted=", ".join(names), nearest=f'"{near[0]}"' if near else "")


def _meaning_of(owner: type[BaseModel] | None, path: KeyPath) -> str:
    info = _field_of(owner, str(path[-1])) if path else None
    return info.description or "" if info is not None else ""


def _wrong_word(kind: str, context: dict[str, Any], stated: Any) -> Fault:
    if kind == "union_tag_not_found":
        return Fault("the shape is not stated", field="shape", accepted=", ".join(SHAPES))
    if kind == "union_tag_invalid":
        words, stated = list(SHAPES), context.get("tag")
        field = "shape"
    else:
        words = [word.strip("'") for word in re.split(r", | or ", str(context.get("expected", "")))]
        field = ""
    near = (
        difflib.get_close_matches(str(stated)[:80].lower(), words, n=1, cutoff=0.4) if isinstance(stated, str) else []
    )
    return Fault(
        "not a word known here",
        field=field,
        stated=stated,
        accepted=", ".join(words),
        nearest=f'"{near[0]}"' if near else "",
    )


def readable_path(path: KeyPath, raw: Any) -> str:
    """Path as a person writes it: ids in place of indexes where the tables have one.

    Parameters
    ----------
    path : KeyPath
        Keys and indexes.
    raw : Any
        Plain data they lead through.

    Returns
    -------
    str
        Such as ``shaft.impeller.part.backplate.thickness``.
    """
    words: list[str] = []
    for step in path:
        if isinstance(step, int):
            raw = raw[step] if isinstance(raw, (list, tuple)) and step < len(raw) else None
            name = raw.get("id") if isinstance(raw, dict) else None
            words.append(quoted(name).strip('"') if isinstance(name, str) and name else str(step + 1))
        else:
            raw = raw.get(step) if isinstance(raw, dict) else None
            words.append(quoted(step).strip('"'))
    return ".".join(words)
