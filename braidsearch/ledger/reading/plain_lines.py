"""Catalogues of one link a line, as on the command line, and files of diagram codes."""

from __future__ import annotations

from collections.abc import Iterator
from itertools import islice

from braidsearch.errors import InputError
from braidsearch.ledger.reading.catalogue_file import CatalogueFile, Labels, make_row, one_line
from braidsearch.ledger.reading.values import Problem, Row, shown
from braidsearch.ledger.reading.whole_files import is_coordinates, polygon_row
from braidsearch.words.link_notation import WORD, split_notation

_LINES_TRIED = 20


def iter_line_rows(file: CatalogueFile) -> Iterator[Row | Problem]:
    """The rows of a file with one link a line, perhaps as ``name = link``.

    A ``#`` begins a comment; blank lines do not count. A file that begins with coordinates is one
    link in space.
    """
    contents = _iter_contents(file)
    for place, (line, content) in enumerate(contents):
        if place == 0 and is_coordinates(content):
            yield polygon_row(file)
            return
        yield _row_of_line(file, line, content, None)


def iter_code_rows(file: CatalogueFile, notation: str) -> Iterator[Row | Problem]:
    """The rows of a file of diagram codes: one a line, or one that takes all lines.

    Lines are links of their own where all of the first twenty are codes by themselves, and one
    code where none is (a crossing a line, brackets that close lines below). Where some are, as may
    be with a component a line, it is one code if it is one at all.
    """
    tried = islice(_iter_contents(file), _LINES_TRIED)
    are_codes = [_is_code(_split_name(content)[1], notation) for _, content in tried]
    if len(are_codes) > 1 and not all(are_codes):
        code = one_line(file.read_text())
        if not any(are_codes) or _is_code(code, notation):
            yield make_row(file, 0, code, notation)
            return
    for line, content in _iter_contents(file):
        yield _row_of_line(file, line, content, notation)


def _iter_contents(file: CatalogueFile) -> Iterator[tuple[int, str]]:
    """The lines that hold something, without comments, with their numbers from 1."""
    for number, line in enumerate(file.iter_lines(), start=1):
        content = line.split("#", 1)[0].strip()
        if content:
            yield number, content


def _row_of_line(
    file: CatalogueFile, line: int, content: str, notation: str | None
) -> Row | Problem:
    name, link = _split_name(content)
    if name == "":
        return file.problem(line, f"{shown(content)}: expected a name before the equals sign")
    return make_row(file, line, link, notation, Labels(name or ""))


def _split_name(content: str) -> tuple[str | None, str]:
    """The name in front of the link, None where there is none.

    No link has an equals sign in it but one that names a file, which a notation tells.
    """
    name, equals, link = content.partition("=")
    if not equals or _has_notation(content):
        return None, content
    return name.strip(), link


def _has_notation(content: str) -> bool:
    try:
        return split_notation(content)[0] != WORD
    except InputError:  # a name with a colon in it
        return False


def _is_code(text: str, notation: str) -> bool:
    from braidsearch.diagrams.codes import parse_code  # noqa: PLC0415 - words come faster

    try:
        parse_code(notation, text)
    except InputError:
        return False
    return True
