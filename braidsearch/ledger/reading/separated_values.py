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
    csv.field_size_limit(max(csv.field_size_limit(), MAX_FIELD))
    lines = file.iter_lines(newline="")
    blank = 0
    for header in lines:
        if header.strip():
            break
        blank += 1
    else:
        return
    delimiter = _choose_delimiter(header)
    records = _iter_records(chain([header], lines), delimiter, blank)
    columns, link = _read_titles(file, *next(records))
    if not link:
        yield polygon_row(file)
        return
    for line, cells in records:
        if isinstance(cells, str):
            yield file.problem(line, cells)
        elif len(cells) != len(columns):
            yield file.problem(line, _wrong_count(cells, columns, delimiter))
        elif any(map(str.strip, cells)):
            values = dict(zip(columns, cells, strict=True))
            yield row_of_columns(file, line, link, values)


def _read_titles(file: CatalogueFile, line: int, titles: list[str] | str) -> tuple[list[str], str]:
    """The columns, and which is that of the link; of none where they are coordinates."""
    if isinstance(titles, str):
        raise file.error(line, titles)
    columns = [plain_column(title) for title in titles]
    if columns == _COORDINATES:
        return columns, ""
    try:
        return columns, check_columns(columns, file.ignore_columns)
    except InputError as error:
        raise file.error(line, str(error)) from None


def _iter_records(
    lines: Iterator[str], delimiter: str, before: int
) -> Iterator[tuple[int, list[str] | str]]:
    """The number of each record's first line, with its cells or what is wrong with it.

    ``before`` so many lines stand in front. Records without any cell are left out.
    """
    reader = csv.reader(lines, delimiter=delimiter, strict=True)
    while True:
        line = before + reader.line_num + 1
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
    return 'text behind a closing quote: expected a delimiter, and "" for a quote inside a cell'


def _choose_delimiter(header: str) -> str:
    def known(delimiter: str) -> int:
        try:
            cells = next(csv.reader([header], delimiter=delimiter), [])
        except csv.Error:  # read again with the others, and reported there
            return 0
        return sum(plain_column(cell) in (*KNOWN_COLUMNS, *_COORDINATES) for cell in cells)

    return max(_DELIMITERS, key=known)


def _wrong_count(cells: Sequence[str], columns: Sequence[str], delimiter: str) -> str:
    counted = f"{len(cells)} cell{'s' * (len(cells) != 1)}"
    text = shown(delimiter.join(cells))
    hint = f"; one with {shown(delimiter)} in it stands in quotes" * (len(cells) > len(columns))
    return f"{text}: {counted}: expected {len(columns)}, as in the first line{hint}"
