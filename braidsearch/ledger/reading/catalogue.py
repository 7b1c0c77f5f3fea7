"""Reading a catalogue of links from a file of any of the formats that are known."""

from __future__ import annotations

import json
import os
import re
from collections.abc import Iterator
from dataclasses import replace
from itertools import chain, islice
from pathlib import Path

from braidsearch.errors import InputError
from braidsearch.ledger.reading.catalogue_file import (
    CatalogueFile,
    Progress,
    check_label,
)
from braidsearch.ledger.reading.entries import gather_entries, iter_distinct, outcome_of
from braidsearch.ledger.reading.json_values import iter_json_line_rows, iter_json_rows
from braidsearch.ledger.reading.plain_lines import iter_code_rows, iter_line_rows
from braidsearch.ledger.reading.separated_values import iter_table_rows
from braidsearch.ledger.reading.values import Entry, Problem, Reading, Repeated, Row
from braidsearch.ledger.reading.whole_files import polygon_row
from braidsearch.words.link_notation import PREFIXES, WORD

CERTIFICATE_FORMAT = "braidsearch certificate"

_LARGEST_CERTIFICATE = 16_000_000
_CERTIFICATE = re.compile(rf'\s*\{{\s*"format"\s*:\s*"{CERTIFICATE_FORMAT}"')
_TABLES = (".csv", ".tsv")
_JSON_LINES = (".jsonl", ".ndjson")
_NOTATION_OF_SUFFIX = {
    ".pd": "planar-diagram",
    ".gauss": "gauss",
    ".dt": "dowker-thistlethwaite",
    ".xyz": "polygon",
    ".polygon": "polygon",
}


def read_entries(
    path: str | os.PathLike[str],
    *,
    source: str | None = None,
    notation: str | None = None,
    ignore_columns: bool = False,
    progress: Progress | None = None,
) -> Reading:
    """All entries of a catalogue, and its mistakes; see ``iter_rows`` for arguments and errors."""
    options = {"source": source, "notation": notation}
    return gather_entries(
        iter_outcomes(path, **options, ignore_columns=ignore_columns, progress=progress)
    )


def iter_outcomes(
    path: str | os.PathLike[str],
    *,
    source: str | None = None,
    notation: str | None = None,
    ignore_columns: bool = False,
    progress: Progress | None = None,
) -> Iterator[Entry | Problem | Repeated]:
    """The entries and mistakes of a catalogue one at a time; see ``iter_rows``."""
    options = {"source": source, "notation": notation}
    rows = iter_rows(path, **options, ignore_columns=ignore_columns, progress=progress)
    return iter_distinct(map(outcome_of, rows))


def iter_rows(
    path: str | os.PathLike[str],
    *,
    source: str | None = None,
    notation: str | None = None,
    ignore_columns: bool = False,
    progress: Progress | None = None,
) -> Iterator[Row | Problem]:
    """The rows of a catalogue, and what is wrong with those that are none; nothing is parsed yet.

    The suffix says the format: .csv and .tsv a table, .jsonl and .ndjson one JSON object a line,
    .json a list of them, .pd, .gauss and .dt codes, .xyz and .polygon one link in space; all else
    one link a line. ``notation``, a key of PREFIXES or WORD, says how links are written that have
    no notation in front; "polygon" makes all of the file one link in space.

    ``source`` stands for links that name none, and is the file's name where it is left out. A link
    without a name gets the file's stem with its line (in a .json file its number), or the stem
    alone where there is no other. ``progress`` is called with the bytes that were read and all.

    Raises InputError for a file that cannot be read, is no text in UTF-8, has no links, or has
    no columns for them, and for a source or notation that is none.
    """
    file = CatalogueFile(
        Path(path),
        check_label((source or "").strip() or Path(path).name, "source"),
        _checked_notation(notation),
        ignore_columns,
        progress,
    )
    return _iter_named(file, _iter_format(file))


def is_certificate_file(path: str | os.PathLike[str]) -> bool:
    """Whether a file is a certificate, perhaps a damaged one, and no catalogue of links."""
    try:
        with open(path, encoding="utf-8", errors="replace") as file:
            text = file.read(_LARGEST_CERTIFICATE)
        if _CERTIFICATE.match(text):
            return True
        value = json.loads(text) if text.lstrip()[:1] == "{" else None
    except (OSError, ValueError, RecursionError):
        return False
    return isinstance(value, dict) and value.get("format") == CERTIFICATE_FORMAT


def _iter_format(file: CatalogueFile) -> Iterator[Row | Problem]:
    """The rows, those without a name of their own without one."""
    suffix = file.path.suffix.lower()
    notation = file.notation or _NOTATION_OF_SUFFIX.get(suffix)
    if notation == "polygon":
        return iter([polygon_row(file)])
    if suffix in _TABLES:
        return iter_table_rows(file)
    if suffix in _JSON_LINES:
        return iter_json_line_rows(file)
    if suffix == ".json":
        if is_certificate_file(file.path):
            raise file.error(0, "a certificate: expected a catalogue of links")
        return iter_json_rows(file)
    if notation not in (None, WORD):
        return iter_code_rows(file, notation)
    return iter_line_rows(file)


def _iter_named(file: CatalogueFile, rows: Iterator[Row | Problem]) -> Iterator[Row | Problem]:
    """The rows with names for those that have none."""
    first = list(islice(rows, 2))
    if not first:
        raise file.error(0, "no links: expected at least one")
    for row in chain(first, rows):
        if isinstance(row, Problem) or row.name:
            yield row
            continue
        stem = file.path.stem
        name = stem if len(first) == 1 else f"{stem}-{row.item or row.line}"
        try:
            yield replace(row, name=check_label(name, "name"))
        except InputError as error:
            yield Problem(row.file, row.line, str(error), row.item)


def _checked_notation(notation: str | None) -> str | None:
    """The notation with its full name."""
    if notation is None or notation == WORD:
        return notation
    if notation not in PREFIXES:
        expected = f"{WORD}, {', '.join(PREFIXES)}"
        raise InputError(f"notation {notation!r}: expected one of {expected}")
    return PREFIXES[notation]
