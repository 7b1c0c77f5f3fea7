"""Reading certificates, strictly: what the format does not name is an error, never ignored."""

from __future__ import annotations

import json
import os
from collections.abc import Iterable
from dataclasses import replace
from pathlib import Path
from typing import Any, NoReturn

from braidsearch.certificates.grammar import (
    CLAIM_FIELDS,
    DISTINCTION_FIELDS,
    FORMAT,
    INVARIANTS,
    MAX_MOVES,
    MOVE_FIELDS,
    MOVES,
    PARAMETERS,
    PROOF_FIELDS,
    SUBLINKS,
    VALUES,
    VERSION,
    Shape,
)
from braidsearch.certificates.values import Certificate, Distinction
from braidsearch.errors import InputError
from braidsearch.moves import Move
from braidsearch.words import MAX_LETTERS, MAX_STRANDS, SYMMETRIES, Braid


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
    items = _read_list(data, where, MAX_MOVES)
    return [_read_move(item, f"{where}[{i}]") for i, item in enumerate(items)]


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
    if field == "strands" and not 1 <= number <= MAX_STRANDS:
        _refuse(where, data, f"an integer from 1 to {MAX_STRANDS}")
    return number


def _read_letters(data: Any, where: str) -> tuple[int, ...]:
    letters = tuple(
        _read_integer(item, f"{where}[{i}]")
        for i, item in enumerate(_read_list(data, where, MAX_LETTERS))
    )
    for place, letter in enumerate(letters):
        if not 1 <= abs(letter) < MAX_STRANDS:
            _refuse(f"{where}[{place}]", letter, f"a letter, 1 to {MAX_STRANDS - 1} in size")
    return letters


def _read_distinctions(data: Any) -> list[Distinction]:
    items = _read_list(data, "distinctions", len(SYMMETRIES))
    if not items:
        _refuse("distinctions", data, "at least one")
    return [_read_distinction(item, f"distinctions[{i}]") for i, item in enumerate(items)]


def _read_distinction(data: Any, where: str) -> Distinction:
    _check_keys(data, DISTINCTION_FIELDS, where)
    name = _read_invariant(data["invariant"], INVARIANTS, f"{where}.invariant")
    parameters = _read_parameters(data["parameters"], name, f"{where}.parameters")
    return Distinction(
        symmetry=_read_symmetry(data["symmetry"], f"{where}.symmetry"),
        invariant=name,
        parameters=parameters,
        left_moves=_read_moves(data["left_moves"], f"{where}.left_moves"),
        right_moves=_read_moves(data["right_moves"], f"{where}.right_moves"),
        left=_read_value(data["left"], name, parameters, f"{where}.left"),
        right=_read_value(data["right"], name, parameters, f"{where}.right"),
    )


def _read_invariant(data: Any, known: Iterable[str], where: str) -> str:
    names = tuple(known)
    if not isinstance(data, str) or data not in names:
        _refuse(where, data, f"one of {', '.join(names)}")
    return data


def _read_parameters(data: Any, invariant: str, where: str) -> dict[str, Any]:
    """The parameters; those of sublinks hold another invariant's name and parameters too."""
    shapes = dict(PARAMETERS.get(invariant, {}))
    values: dict[str, Any] = {}
    if invariant == SUBLINKS:
        _check_has(data, ("invariant",), where)
        values["invariant"] = _read_invariant(data["invariant"], VALUES, f"{where}.invariant")
        shapes |= PARAMETERS.get(values["invariant"], {})
    _check_keys(data, (*values, *shapes), where)
    for name, shape in shapes.items():
        values[name] = _read_shape(data[name], shape, f"{where}.{name}")
    return values


def _read_value(data: Any, invariant: str, parameters: dict[str, Any], where: str) -> Any:
    if invariant != SUBLINKS:
        return _read_shape(data, VALUES[invariant], where)
    shape = VALUES[parameters["invariant"]]
    items = enumerate(_read_list(data, where))
    return [_read_shape(item, shape, f"{where}[{i}]") for i, item in items]


def _read_shape(data: Any, shape: Shape, where: str) -> Any:
    if shape.depth == 0:
        return _read_bounded(data, shape, where)
    items = _read_list(data, where)
    least, most = shape.entries or (0, len(items))
    if shape.depth == 1 and shape.width is not None:
        least = most = shape.width
    if not least <= len(items) <= most:
        expected = str(least) if least == most else f"{least} to {most}"
        _refuse(where, data, f"{expected} {'integers' if shape.depth == 1 else 'entries'}")
    inner = replace(shape, depth=shape.depth - 1, entries=None)
    values = [_read_shape(item, inner, f"{where}[{i}]") for i, item in enumerate(items)]
    if shape.is_permutation and shape.depth == 1:
        _check_permutation(values, data, where)
    return values


def _read_bounded(data: Any, shape: Shape, where: str) -> int:
    number = _read_integer(data, where)
    least = number if shape.least is None else shape.least
    most = number if shape.most is None else shape.most
    if not least <= number <= most:
        _refuse(where, data, f"an integer from {least} to {most}")
    return number


def _check_permutation(values: list[int], data: Any, where: str) -> None:
    if not values or sorted(values) != list(range(1, len(values) + 1)):
        _refuse(where, data, "the images of 1, 2, ... under a permutation")


def _read_symmetry(data: Any, where: str) -> str:
    if not isinstance(data, str) or data not in SYMMETRIES:
        _refuse(where, data, f"one of {', '.join(SYMMETRIES)}")
    return data


def _read_list(data: Any, where: str, most: int | None = None) -> list[Any]:
    if not isinstance(data, list):
        _refuse(where, data, "a list")
    if most is not None and len(data) > most:
        raise InputError(f"{where}: {len(data)} entries: expected at most {most}")
    return data


def _read_integer(data: Any, where: str) -> int:
    if not isinstance(data, int) or isinstance(data, bool):
        _refuse(where, data, "an integer")
    return data


def _check_constant(data: Any, constant: str | int, where: str) -> None:
    if type(data) is not type(constant) or data != constant:
        _refuse(where, data, json.dumps(constant))


def _check_has(data: Any, expected: Iterable[str], where: str) -> None:
    if not isinstance(data, dict):
        _refuse(where, data, "a JSON object")
    names = tuple(expected)
    for name in names:
        if name not in data:
            raise InputError(f"{where}: no key {name!r}: expected the keys {', '.join(names)}")


def _check_keys(data: Any, expected: Iterable[str], where: str) -> None:
    names = tuple(expected)
    _check_has(data, names, where)
    for key in data:
        if key not in names:
            known = f"the keys {', '.join(names)}" if names else "no key"
            raise InputError(f"{where}: unknown key {_shown(key)}: expected {known}")


def _refuse(where: str, found: Any, expected: str) -> NoReturn:
    raise InputError(f"{where}: {_shown(found)}: expected {expected}")


def _shown(found: Any) -> str:
    text = json.dumps(found, default=repr)
    return text if len(text) <= 40 else text[:37] + "..."
