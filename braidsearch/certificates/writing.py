"""Writing certificates: the same value gives the same file, byte for byte."""

from __future__ import annotations

import json
import os
from pathlib import Path
from typing import TYPE_CHECKING, Any

from braidsearch.certificates.grammar import FORMAT, MOVE_FIELDS, VERSION, move_name
from braidsearch.errors import InputError
from braidsearch.moves import Move
from braidsearch.words import Braid

if TYPE_CHECKING:
    from braidsearch.certificates.values import Certificate, Distinction


def certificate_to_json(certificate: Certificate) -> dict[str, Any]:
    """The object that a certificate file holds, its keys in the order in which they are written."""
    claim = {
        "format": FORMAT,
        "version": VERSION,
        "left": braid_to_json(certificate.left),
        "right": braid_to_json(certificate.right),
        "verdict": certificate.verdict,
    }
    if certificate.verdict == "same":
        moves = _moves_to_json(certificate.moves)
        return claim | {"symmetry": certificate.symmetry, "moves": moves}
    return claim | {"distinctions": [_distinction_to_json(d) for d in certificate.distinctions]}


def format_certificate(certificate: Certificate) -> str:
    """The text of a certificate file: JSON with one line for each move."""
    return _lay_out(certificate_to_json(certificate), "") + "\n"


def write_certificate(certificate: Certificate, path: str | os.PathLike[str]) -> None:
    """Write the file whole or not at all: a reader never meets half of one.

    Raises InputError, which names the path, when the file cannot be written.
    """
    check_destination(path)
    target = os.path.realpath(path)
    text = format_certificate(certificate)
    try:
        if os.path.exists(target) and not os.path.isfile(target):
            Path(target).write_text(text, encoding="utf-8")  # a device or a pipe stays one
        else:
            _replace_file(target, text)
    except OSError as error:
        raise _unwritable(path, error.strerror or str(error)) from None


def check_destination(path: str | os.PathLike[str]) -> None:
    """Raise InputError when no certificate can be written to the path, before work is put in it."""
    target = os.path.realpath(path)
    folder = os.path.dirname(target)
    if os.path.isdir(target):
        raise _unwritable(path, "it is a folder: expected the name of a file")
    if not os.path.isdir(folder):
        raise _unwritable(path, "its folder does not exist: expected an existing one")
    if not os.access(target if os.path.exists(target) else folder, os.W_OK):
        raise _unwritable(path, "no permission: expected a place that can be written")


def _replace_file(target: str, text: str) -> None:
    partial = f"{target}.{os.getpid()}.partial"
    try:
        Path(partial).write_text(text, encoding="utf-8")
        os.replace(partial, target)
    finally:
        if os.path.exists(partial):
            os.unlink(partial)


def _unwritable(path: str | os.PathLike[str], why: str) -> InputError:
    return InputError(f"certificate {os.fspath(path)!r} cannot be written: {why}")


def braid_to_json(braid: Braid) -> dict[str, Any]:
    """A braid as files and JSON outputs have it: its strands and the letters of its word."""
    return {"strands": braid.strands, "word": list(braid.word)}


def _moves_to_json(moves: tuple[Move, ...]) -> list[dict[str, Any]]:
    return [_move_to_json(move) for move in moves]


def _move_to_json(move: Move) -> dict[str, Any]:
    name = move_name(move)
    return {"move": name} | {field: _thaw(getattr(move, field)) for field in MOVE_FIELDS[name]}


def _distinction_to_json(distinction: Distinction) -> dict[str, Any]:
    return {
        "symmetry": distinction.symmetry,
        "invariant": distinction.invariant,
        "parameters": {name: _thaw(value) for name, value in distinction.parameters},
        "left_moves": _moves_to_json(distinction.left_moves),
        "right_moves": _moves_to_json(distinction.right_moves),
        "left": _thaw(distinction.left),
        "right": _thaw(distinction.right),
    }


def _thaw(value: Any) -> Any:
    return [_thaw(item) for item in value] if isinstance(value, tuple) else value


_OPENED = ("", "moves", "distinctions", "left_moves", "right_moves")


def _lay_out(value: Any, key: str, indent: str = "") -> str:
    """JSON text: the lists of moves and of distinctions opened line by line, the rest on one."""
    if key not in _OPENED or not value:
        return json.dumps(value, ensure_ascii=True)
    inner = indent + "  "
    if isinstance(value, dict):
        lines = [f"{inner}{json.dumps(k)}: {_lay_out(v, k, inner)}" for k, v in value.items()]
        return "{\n" + ",\n".join(lines) + f"\n{indent}}}"
    opened = "" if key == "distinctions" else "item"
    lines = [inner + _lay_out(item, opened, inner) for item in value]
    return "[\n" + ",\n".join(lines) + f"\n{indent}]"
