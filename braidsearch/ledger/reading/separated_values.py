"""Catalogues as tables: comma-separated values, or with semicolons or tabs between them."""

from __future__ import annotations

import csv
from collections.abc import Iterator, Sequence
from itertools import chain

from braidsearch.errors import InputError
from braidsearch.ledger.reading.catalogue_file import MAX_FIELD, CatalogueFile
from braidsearch.ledger.reading.columns import (
    KNOWN_COLUMNS,
    check_columns,
    plain_column,
    row_of_columns,
)
from braidsearch.ledger.reading.values import Problem, Row, shown
from braidsearch.ledger.reading.whole_files import polygon_row

_DELIMITERS = (",", ";", "\t")
_COORDINATES = ["x", "y", "z"]


def iter_table_rows(file: CatalogueFile) -> Iterator[Row | Problem]:
    """The rows of a table, whose first line that is not blank names the columns.

    The delimiter is the one that makes the most known titles of that line. A table of columns x,
    y, z is one link in space. Raises InputError for columns that are none.
    """
    lines = file.iter_lines(newline="")
    skipped = 0
    header = ""
    for header in lines:
        if header.strip():
            break
        skipped += 1
    delimiter = _choose_delimiter(header)
    csv.field_size_limit(max(csv.field_size_limit(), MAX_FIELD))
    records = _iter_records(chain([header], lines), delimiter)
    first, titles = next(records, (1, []))
    if isinstance(titles, str):
        raise file.error(first + skipped, titles)
    columns = [plain_column(title) for title in titles]
    if columns == _COORDINATES:
        yield polygon_row(file)
        return
    try:
        link = check_columns(columns, file.ignore_columns)
    except InputError as error:
        raise file.error(first + skipped, str(error)) from None
    for line, cells in records:
        if isinstance(cells, str):
            yield file.problem(line + skipped, cells)
        elif len(cells) != len(columns):
            yield file.problem(line + skipped, _wrong_count(cells, columns, delimiter))
        elif any(map(str.strip, cells)):
            values = dict(zip(columns, cells, strict=True))
            yield row_of_columns(file, line + skipped, link, values)


def _iter_records(lines: Iterator[str], delimiter: str) -> Iterator[tuple[int, list[str] | str]]:
    """The first line of each record, counted from 1, with its cells or what is wrong with it."""
    reader = csv.reader(lines, delimiter=delimiter, strict=True)
    while True:
        line = reader.line_num + 1
        try:
            cells = next(reader)
        except StopIteration:
            return
        except csv.Error as error:
            yield line, _explain(str(error))
        else:
            if cells:
                yield line, cells


def _explain(reason: str) -> str:
    if "unexpected end" in reason:
        return "a quote that is left open: expected a closing one before the end of the file"
    if "field larger" in reason:
        return f"a cell of more than {MAX_FIELD} characters: expected a shorter one"
    return f'{reason}: expected a cell in quotes to end with its quote, and "" for a quote in it'


def _choose_delimiter(header: str) -> str:
    def known(delimiter: str) -> int:
        cells = next(csv.reader([header], delimiter=delimiter), [])
        return sum(plain_column(cell) in (*KNOWN_COLUMNS, *_COORDINATES) for cell in cells)

    return max(_DELIMITERS, key=known)


def _wrong_count(cells: Sequence[str], columns: Sequence[str], delimiter: str) -> str:
    counted = f"{len(cells)} cell{'s' * (len(cells) != 1)}"
    text = shown(delimiter.join(cells))
    hint = f"; one with {shown(delimiter)} in it stands in quotes" * (len(cells) > len(columns))
    return f"{text}: {counted}: expected {len(columns)}, as in the first line{hint}"
