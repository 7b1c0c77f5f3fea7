"""Reading certificates, strictly: what the format does not name is an error, never ignored."""

from __future__ import annotations

import json
import os
from collections.abc import Iterable
from pathlib import Path
from typing import Any, NoReturn

from braidsearch.certificates.grammar import (
    CLAIM_FIELDS,
    DISTINCTION_FIELDS,
    FORMAT,
    MOVE_FIELDS,
    MOVES,
    PROOF_FIELDS,
    VERSION,
)
from braidsearch.certificates.values import Certificate, Distinction
from braidsearch.errors import InputError
from braidsearch.moves import Move
from braidsearch.words import SYMMETRIES, Braid


def read_certificate(path: str | os.PathLike[str]) -> Certificate:
    """Read a certificate file; whether its claim holds is not checked here.

    Raises InputError, in one line that names the place in the file and what was expected there.
    """
    try:
        text = Path(path).read_text(encoding="utf-8")
    except OSError as error:
        raise InputError(f"{os.fspath(path)!r}: {error.strerror}: expected a file") from None
    except UnicodeDecodeError:
        raise InputError(f"{os.fspath(path)!r}: expected text in UTF-8") from None
    return parse_certificate(text)


def parse_certificate(text: str) -> Certificate:
    """Read a certificate from the text of its file. Raises InputError as read_certificate does."""
    try:
        return _read_certificate(_load(text))
    except RecursionError:
        raise InputError("certificate: lists nested too deeply: expected a few levels") from None


def _read_certificate(data: Any) -> Certificate:
    if not isinstance(data, dict):
        _refuse("certificate", data, "a JSON object")
    verdict = data.get("verdict")
    if verdict not in ("same", "different"):
        _refuse("verdict", verdict, '"same" or "different"')
    _check_keys(data, (*CLAIM_FIELDS, *PROOF_FIELDS[verdict]), "certificate")
    _check_constant(data["format"], FORMAT, "format")
    _check_constant(data["version"], VERSION, "version")
    left, right = _read_braid(data["left"], "left"), _read_braid(data["right"], "right")
    if verdict == "same":
        symmetry = _read_symmetry(data["symmetry"], "symmetry")
        return Certificate.same(left, right, symmetry, _read_moves(data["moves"], "moves"))
    return Certificate.different(left, right, _read_distinctions(data["distinctions"]))


def _load(text: str) -> Any:
    try:
        return json.loads(
            text,
            object_pairs_hook=_object_of_pairs,
            parse_float=lambda digits: _refuse("certificate", digits, "integers only"),
            parse_constant=lambda name: _refuse("certificate", name, "integers only"),
        )
    except InputError:
        raise
    except json.JSONDecodeError as error:
        raise InputError(
            f"certificate: line {error.lineno}, column {error.colno}: expected JSON ({error.msg})"
        ) from None
    except ValueError:
        raise InputError("certificate: an integer of thousands of digits: expected less") from None


def _object_of_pairs(pairs: list[tuple[str, Any]]) -> dict[str, Any]:
    result: dict[str, Any] = {}
    for key, value in pairs:
        if key in result:
            _refuse("certificate", key, "each key once")
        result[key] = value
    return result


def _read_braid(data: Any, where: str) -> Braid:
    _check_keys(data, ("strands", "word"), where)
    strands = _read_integer(data["strands"], f"{where}.strands")
    word = _read_letters(data["word"], f"{where}.word")
    try:
        return Braid(word, strands)
    except InputError as error:
        raise InputError(f"{where}: {error}") from None


def _read_moves(data: Any, where: str) -> list[Move]:
    return [_read_move(item, f"{where}[{i}]") for i, item in enumerate(_read_list(data, where))]


def _read_move(data: Any, where: str) -> Move:
    name = data.get("move") if isinstance(data, dict) else None
    if not isinstance(name, str) or name not in MOVES:
        _refuse(where, name if isinstance(data, dict) else data, f"a move among {', '.join(MOVES)}")
    fields = MOVE_FIELDS[name]
    _check_keys(data, ("move", *fields), where)
    values = {field: _read_move_field(data[field], field, f"{where}.{field}") for field in fields}
    return MOVES[name](**values)


def _read_move_field(data: Any, field: str, where: str) -> Any:
    if field in ("by", "word"):
        return _read_letters(data, where)
    number = _read_integer(data, where)
    if field == "sign" and number not in (1, -1):
        _refuse(where, data, "1 or -1")
    if field == "strands" and number < 1:
        _refuse(where, data, "at least 1")
    return number


def _read_letters(data: Any, where: str) -> tuple[int, ...]:
    letters = tuple(
        _read_integer(item, f"{where}[{i}]") for i, item in enumerate(_read_list(data, where))
    )
    if 0 in letters:
        _refuse(f"{where}[{letters.index(0)}]", 0, "a non-zero integer")
    return letters


def _read_distinctions(data: Any) -> list[Distinction]:
    items = _read_list(data, "distinctions")
    if not items:
        _refuse("distinctions", data, "at least one")
    return [_read_distinction(item, f"distinctions[{i}]") for i, item in enumerate(items)]


def _read_distinction(data: Any, where: str) -> Distinction:
    _check_keys(data, DISTINCTION_FIELDS, where)
    if not isinstance(data["invariant"], str):
        _refuse(f"{where}.invariant", data["invariant"], "the name of an invariant")
    if not isinstance(data["parameters"], dict):
        _refuse(f"{where}.parameters", data["parameters"], "an object")
    try:
        return Distinction(
            symmetry=_read_symmetry(data["symmetry"], f"{where}.symmetry"),
            invariant=data["invariant"],
            parameters=data["parameters"],
            left_moves=_read_moves(data["left_moves"], f"{where}.left_moves"),
            right_moves=_read_moves(data["right_moves"], f"{where}.right_moves"),
            left=data["left"],
            right=data["right"],
        )
    except InputError as error:
        message = str(error)
        raise InputError(message if where in message else f"{where}: {message}") from None


def _read_symmetry(data: Any, where: str) -> str:
    if not isinstance(data, str) or data not in SYMMETRIES:
        _refuse(where, data, f"one of {', '.join(SYMMETRIES)}")
    return data


def _read_list(data: Any, where: str) -> list[Any]:
    if not isinstance(data, list):
        _refuse(where, data, "a list")
    return data


def _read_integer(data: Any, where: str) -> int:
    if not isinstance(data, int) or isinstance(data, bool):
        _refuse(where, data, "an integer")
    return data


def _check_constant(data: Any, constant: str | int, where: str) -> None:
    if type(data) is not type(constant) or data != constant:
        _refuse(where, data, json.dumps(constant))


def _check_keys(data: Any, expected: Iterable[str], where: str) -> None:
    if not isinstance(data, dict):
        _refuse(where, data, "a JSON object")
    names = tuple(expected)
    for name in names:
        if name not in data:
            raise InputError(f"{where}: no key {name!r}: expected the keys {', '.join(names)}")
    for key in data:
        if key not in names:
            raise InputError(f"{where}: unknown key {key!r}: expected the keys {', '.join(names)}")


def _refuse(where: str, found: Any, expected: str) -> NoReturn:
    shown = json.dumps(found, default=repr)
    cut = shown if len(shown) <= 40 else shown[:37] + "..."
    raise InputError(f"{where}: {cut}: expected {expected}")
