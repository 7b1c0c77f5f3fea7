"""A file of links: its lines as text, what was said of it, and rows made of what stands there."""

from __future__ import annotations

import os
import re
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from functools import cached_property
from io import TextIOWrapper
from pathlib import Path
from typing import BinaryIO, NamedTuple, cast

from braidsearch.errors import InputError
from braidsearch.ledger.reading.values import Problem, Row, shown
from braidsearch.words.link_notation import (
    PREFIXES,
    WORD,
    named_file,
    read_named_file,
    split_notation,
)

MAX_FIELD = 10_000_000
MAX_TEXT = 100_000_000
MAX_LABEL = 200
MAX_NOTE = 10_000
NO_LINK = (
    'no link: expected a braid word such as "1 -2 1" (an empty one with its strands, "1:"), '
    "or a drawing"
)

_LONGEST_PATH = 100
_UNDECODED = re.compile("[\udc80-\udcff\0]")
# Direction marks are refused with the control characters: with them a name shows as another.
_CONTROL = "\x00-\x08\x0b\x0c\x0e-\x1f\x7f-\x9f\u2028\u2029\u202a-\u202e\u2066-\u2069\ud800-\udfff"
_NOT_IN_NOTES = re.compile(f"[{_CONTROL}]")
_NOT_IN_LABELS = re.compile(f"[{_CONTROL}\t\n\r]")

Progress = Callable[[int, int], None]
"""Called with what was read and all there is: bytes, or characters of a .json file."""


class Labels(NamedTuple):
    """What stands beside a link, each perhaps empty; the strand count belongs to a plain word."""

    name: str = ""
    source: str = ""
    note: str = ""
    strands: str = ""


@dataclass(frozen=True)
class CatalogueFile:
    """A file to be read, with what the caller says of it.

    ``source`` is that of links which name none; ``notation`` that of links without a notation in
    front, None where the file's suffix says. Paths in the file count from its own folder.
    """

    path: Path
    source: str
    notation: str | None = None
    ignore_columns: bool = False
    progress: Progress | None = None

    @cached_property
    def shown(self) -> str:
        """The path as quoted in a message: of a long one the end, which tells most."""
        text = os.fspath(self.path)
        short = text if len(text) <= _LONGEST_PATH else "..." + text[3 - _LONGEST_PATH :]
        return short if short.isprintable() else repr(short)

    def problem(self, line: int, message: object) -> Problem:
        """A mistake on a line of this file; line 0 is the whole file."""
        return Problem(self.shown, line, str(message))

    def error(self, line: int, message: str) -> InputError:
        """The error for what makes all of the file unreadable."""
        return InputError(str(self.problem(line, message)))

    def iter_lines(self, newline: str | None = None) -> Iterator[str]:
        """The lines, one after the other, with their ends; ``newline`` is that of ``open``.

        Raises InputError for a file that cannot be opened, for what is no text in UTF-8, and for
        a line that is too long.
        """
        with self._open(newline) as file:
            total = os.fstat(file.fileno()).st_size
            number = 0
            while line := self._read(file, 2 * MAX_FIELD):
                number += 1
                self._check_text(line, number)
                yield line
                if self.progress is not None and file.seekable():
                    self.progress(min(cast("BinaryIO", file.buffer).tell(), total), total)

    def read_text(self) -> str:
        """All of the file. Raises InputError as ``iter_lines`` does, and for too large a file."""
        with self._open(None) as file:
            text = self._read(file, None)
        found = _UNDECODED.search(text)
        if found is not None:
            self._check_text(found[0], text.count("\n", 0, found.start()) + 1)
        if len(text) > MAX_TEXT:
            other = ", or one object a line (.jsonl)" * (self.path.suffix.lower() == ".json")
            raise self.error(0, f"more than {MAX_TEXT} characters: expected a smaller file{other}")
        return text

    def _open(self, newline: str | None) -> TextIOWrapper:
        try:
            return open(self.path, encoding="utf-8-sig", errors="surrogateescape", newline=newline)
        except (OSError, ValueError) as error:
            raise self._unreadable(error) from None

    def _read(self, file: TextIOWrapper, longest_line: int | None) -> str:
        """The next line, or all there is, a little more than MAX_TEXT characters at most."""
        try:
            return file.read(MAX_TEXT + 1) if longest_line is None else file.readline(longest_line)
        except OSError as error:
            raise self._unreadable(error) from None

    def _check_text(self, line: str, number: int) -> None:
        found = None if line.isascii() and "\0" not in line else _UNDECODED.search(line)
        if found is not None:
            byte = ord(found[0]) & 0xFF
            raise self.error(number, f"byte 0x{byte:02x}: expected a file of text in UTF-8")
        if len(line) >= 2 * MAX_FIELD:
            raise self.error(number, f"expected lines of fewer than {2 * MAX_FIELD} characters")

    def _unreadable(self, error: OSError | ValueError) -> InputError:
        reason = error.strerror if isinstance(error, OSError) else str(error)
        return self.error(0, f"{reason}: expected a file")


def make_row(
    file: CatalogueFile,
    line: int,
    text: str,
    notation: str | None = None,
    labels: Labels | None = None,
) -> Row | Problem:
    """The row with this text for its link, or what is wrong with it.

    ``notation`` is the one that the place of the text says, WORD where a word or any drawing with
    its notation in front may stand, None where a text with nothing in front is of the notation
    of the file. A row without a name gets one later.
    """
    name, source, note, strands = map(str.strip, labels or Labels())
    try:
        check_label(name, "name")
        check_label(source, "source")
        _check_note(note)
        found, body = _split(file, text.strip(), notation, strands)
        body, named = _fetch(file, found, body)
    except InputError as error:
        return file.problem(line, error)
    return Row(file.shown, line, name, source or file.source, note, found, body, named)


def check_label(label: str, title: str) -> str:
    """The label, a name or a source, if it can be one. Raises InputError otherwise."""
    if len(label) > MAX_LABEL:
        raise InputError(f"{title} {shown(label)}: expected at most {MAX_LABEL} characters")
    if _NOT_IN_LABELS.search(label):
        raise InputError(f"{title} {shown(label)}: expected no control characters")
    return label


def _check_note(note: str) -> None:
    if len(note) > MAX_NOTE:
        raise InputError(f"note {shown(note)}: expected at most {MAX_NOTE} characters")
    if _NOT_IN_NOTES.search(note):
        raise InputError(f"note {shown(note)}: expected no control characters")


def _split(file: CatalogueFile, text: str, notation: str | None, strands: str) -> tuple[str, str]:
    """The notation of a text and what stands behind it."""
    if notation in (None, WORD):
        found, body = split_notation(text)
        if found == WORD:
            found = notation or file.notation or WORD
    else:
        found, body = notation, _without_prefix(text, notation)
    if strands:
        body = _with_strands(found, body, strands)
    if not body:
        raise InputError(NO_LINK)
    return found, body


def _without_prefix(text: str, notation: str) -> str:
    for prefix, name in PREFIXES.items():
        if name == notation and text.lower().startswith(f"{prefix}:"):
            return text[len(prefix) + 1 :].strip()
    return text


def _with_strands(notation: str, body: str, strands: str) -> str:
    if notation != WORD or ":" in body:
        raise InputError(f"{shown(body)} beside {shown(strands)} strands: expected a plain word")
    if not re.fullmatch("[0-9]{1,9}", strands):
        raise InputError(f"{shown(strands)} strands: expected an integer of at least 1")
    return f"{int(strands)}: {body}".strip()


def _fetch(file: CatalogueFile, notation: str, body: str) -> tuple[str, str]:
    """The code itself, or the text of the file that stands in its place and the file's name."""
    if notation == WORD:
        return body, ""
    if body == "-":
        raise InputError("'-': expected a code or the name of a file, not standard input")
    path = named_file(notation, body)
    if path is None:
        return body, ""
    text = read_named_file(file.path.parent / path)
    return (text, path) if notation == "polygon" else (one_line(text), path)


def one_line(code: str) -> str:
    """A code of several lines on one: the readers of codes take a semicolon for a line's end."""
    lines = (line.split("#", 1)[0].strip() for line in code.splitlines())
    return "; ".join(line for line in lines if line)
