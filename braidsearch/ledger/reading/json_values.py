"""Catalogues in JSON: one object a line, or a list of objects."""

from __future__ import annotations

import json
import re
from collections.abc import Iterator
from dataclasses import replace
from typing import Any, NoReturn

from braidsearch.errors import InputError
from braidsearch.ledger.reading.catalogue_file import CatalogueFile
from braidsearch.ledger.reading.columns import (
    LABEL_COLUMNS,
    LINK_COLUMNS,
    STRANDS,
    check_columns,
    plain_column,
    row_of_columns,
)
from braidsearch.ledger.reading.values import Problem, Row, shown
from braidsearch.words.link_notation import WORD

_BLANK = re.compile(r"[ \t\r\n]*")
_AN_OBJECT = 'an object such as {"name": "trefoil", "link": "1 1 1"}'


def iter_json_line_rows(file: CatalogueFile) -> Iterator[Row | Problem]:
    """The rows of a file with one JSON object a line; blank lines do not count."""
    for number, line in enumerate(file.iter_lines(), start=1):
        content = line.strip()
        if not content:
            continue
        try:
            value = _STRICT.decode(content)
        except (ValueError, RecursionError) as error:
            yield file.problem(number, _explain(error))
        else:
            yield _row_of_value(file, number, value)


def iter_json_rows(file: CatalogueFile) -> Iterator[Row | Problem]:
    """The rows of a JSON file: a list of objects, or objects one behind the other.

    The objects are read one at a time, so that a large file needs little more than its text. A
    mistake in the syntax ends the reading, since nobody knows where the next object begins.
    """
    text = file.read_text()
    position = _skip_blanks(text, 0)
    is_list = text.startswith("[", position)
    position = _skip_blanks(text, position + is_list)
    line, counted, item = 1, 0, 0
    while position < len(text) and not (is_list and text[position] == "]"):
        line += text.count("\n", counted, position)
        counted = position
        item += 1
        try:
            row, position = _decode_row(file, line, text, position)
            position = _skip_comma(text, position) if is_list else _skip_blanks(text, position)
        except (ValueError, RecursionError) as error:
            yield file.problem(_line_of(error, line), _explain(error))
            return
        yield replace(row, item=item)
        if file.progress is not None:
            file.progress(position, len(text))
    if is_list and text[position:].strip() != "]":
        found = shown(text[position + 1 :].strip()) if position < len(text) else "the end"
        yield file.problem(text.count("\n") + 1, f"{found}: expected a list, and nothing behind it")
    if file.progress is not None:
        file.progress(len(text), len(text))


def _decode_row(
    file: CatalogueFile, line: int, text: str, position: int
) -> tuple[Row | Problem, int]:
    """The row of the object at a place in the text, and where that ends."""
    try:
        value, end = _STRICT.raw_decode(text, position)
    except InputError as error:  # well formed, so that its end can be found
        return file.problem(line, error), _LENIENT.raw_decode(text, position)[1]
    return _row_of_value(file, line, value), end


def _skip_blanks(text: str, position: int) -> int:
    match = _BLANK.match(text, position)
    return position if match is None else match.end()


def _skip_comma(text: str, position: int) -> int:
    """The place of the next object of a list, or of the bracket that closes it."""
    position = _skip_blanks(text, position)
    if not text.startswith(",", position):
        return position if text.startswith("]", position) else _refuse_at("','", text, position)
    position = _skip_blanks(text, position + 1)
    return _refuse_at("an object", text, position) if text.startswith("]", position) else position


def _refuse_at(expected: str, text: str, position: int) -> NoReturn:
    raise json.JSONDecodeError(f"{expected} is missing", text, position)


def _line_of(error: Exception, line: int) -> int:
    return error.lineno if isinstance(error, json.JSONDecodeError) else line


def _explain(error: Exception) -> str:
    if isinstance(error, InputError):
        return str(error)
    if isinstance(error, json.JSONDecodeError):
        found = shown(error.doc[error.pos : error.pos + 20].strip() or "the end")
        return f"{found} in column {error.colno}: expected JSON ({error.msg})"
    if isinstance(error, RecursionError):
        return "lists nested too deeply: expected a few levels"
    return "an integer of thousands of digits: expected less"


def _object_of_pairs(pairs: list[tuple[str, Any]]) -> dict[str, Any]:
    result = dict(pairs)
    if len(result) < len(pairs):
        keys = [key for key, _ in pairs]
        twice = next(key for key in keys if keys.count(key) > 1)
        raise InputError(f"key {shown(twice)} twice: expected each key once")
    return result


def _refuse_constant(name: str) -> NoReturn:
    raise InputError(f"{name}: expected JSON, which has no such number")


_STRICT = json.JSONDecoder(object_pairs_hook=_object_of_pairs, parse_constant=_refuse_constant)
_LENIENT = json.JSONDecoder()


def _row_of_value(file: CatalogueFile, line: int, value: Any) -> Row | Problem:
    if not isinstance(value, dict):
        return file.problem(line, f"{_shown(value)}: expected {_AN_OBJECT}")
    try:
        columns = {plain_column(key): key for key in value}
        link = check_columns([plain_column(key) for key in value], file.ignore_columns)
        values = {
            column: _label_text(column, value[key])
            for column, key in columns.items()
            if column in LABEL_COLUMNS
        }
        notation = LINK_COLUMNS[link] or file.notation or WORD
        strands, values[link] = _link_texts(link, notation, value[columns[link]])
        beside = _strands_text(value[columns[STRANDS]]) if STRANDS in columns else ""
        if strands and beside:
            raise InputError(f"{strands} strands and {beside} strands: expected the count once")
        values[STRANDS] = strands or beside
    except InputError as error:
        return file.problem(line, error)
    return row_of_columns(file, line, link, values)


def _label_text(column: str, value: Any) -> str:
    if value is None:
        return ""
    if not isinstance(value, str):
        raise InputError(f"{column} {_shown(value)}: expected a text")
    return value


def _strands_text(value: Any) -> str:
    if value is None:
        return ""
    if not _is_integer(value) or value < 1:
        raise InputError(f"strands {_shown(value)}: expected an integer of at least 1")
    return str(value)


def _link_texts(column: str, notation: str, value: Any) -> tuple[str, str]:
    """The strand count, where the value holds one, and the link, as texts."""
    if isinstance(value, str):
        return "", value
    if notation == WORD and isinstance(value, dict) and set(value) == {STRANDS, "word"}:
        return _strands_text(value[STRANDS]), _letters(column, value["word"])
    if notation == WORD:
        return "", _letters(column, value)
    if notation == "polygon" or not _is_integers(value, levels=2):
        kinds = "the name of a file" if notation == "polygon" else "a text, or lists of integers"
        raise InputError(f"{column} {_shown(value)}: expected {kinds}")
    return "", json.dumps(value)


def _letters(column: str, value: Any) -> str:
    if not isinstance(value, list):
        expected = f'a text, a list of letters, or {{"{STRANDS}": 2, "word": [1, 1, 1]}}'
        raise InputError(f"{column} {_shown(value)}: expected {expected}")
    if not set(map(type, value)) <= {int}:  # a bool is an int, and no letter
        wrong = next(letter for letter in value if type(letter) is not int)
        raise InputError(f"{column}: {_shown(wrong)}: expected integers as letters")
    return " ".join(map(str, value))


def _is_integers(value: Any, levels: int) -> bool:
    """Whether the value is a list of integers, or of such lists, so many levels deep."""
    if not isinstance(value, list) or levels == 0:
        return False
    return all(_is_integer(item) or _is_integers(item, levels - 1) for item in value)


def _is_integer(value: Any) -> bool:
    return type(value) is int  # a bool is none


def _shown(value: Any) -> str:
    """The value as quoted in a message."""
    if isinstance(value, str):
        return shown(value)
    text = json.dumps(value)
    return text if len(text) <= 40 else text[:37] + "..."
