"""The columns of a catalogue: what they are called, and rows made of their values."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from braidsearch.errors import InputError
from braidsearch.ledger.reading.catalogue_file import CatalogueFile, Labels, make_row
from braidsearch.ledger.reading.values import Problem, Row, shown
from braidsearch.words.link_notation import PREFIXES, WORD

LABEL_COLUMNS = ("name", "source", "note")
STRANDS = "strands"
LINK_COLUMNS: dict[str, str | None] = {"link": None, "braid": WORD, "word": WORD, **PREFIXES}
"""The columns for the link, each with the notation that it says, None where the file says it."""

KNOWN_COLUMNS = (*LABEL_COLUMNS, STRANDS, *LINK_COLUMNS)

_EXPECTED = (
    f"one column for the link ({', '.join(LINK_COLUMNS)}) and, as you like, "
    f"{', '.join(LABEL_COLUMNS)}, {STRANDS}"
)
_MOST_SHOWN = 8


def plain_column(title: str) -> str:
    """The title of a column as it is compared: blanks and capitals do not count."""
    return title.strip().lower()


def check_columns(columns: Sequence[str], ignore_columns: bool) -> str:
    """The one column for the link among these, which are plain.

    Raises InputError where there is none or more than one, for a title that stands twice, and,
    unless they are to be ignored, for all unknown ones at once.
    """
    known = [column for column in columns if column in KNOWN_COLUMNS]
    unknown = [column for column in columns if column not in KNOWN_COLUMNS]
    links = [column for column in known if column in LINK_COLUMNS]
    if not links:
        raise InputError(f"{_listed(columns)}: expected {_EXPECTED}")
    for column in known:
        if known.count(column) > 1:
            raise InputError(f"two columns {shown(column)}: expected each once")
    if len(links) > 1:
        raise InputError(f"{_listed(links)}: expected {_EXPECTED}")
    if unknown and not ignore_columns:
        raise InputError(
            f"{_listed(unknown)}: expected {_EXPECTED}; --ignore-columns leaves others out"
        )
    return links[0]


def row_of_columns(
    file: CatalogueFile, line: int, link: str, values: Mapping[str, str]
) -> Row | Problem:
    """The row with these values by plain title; ``link`` is the column for the link."""
    labels = Labels(*(values.get(column, "") for column in (*LABEL_COLUMNS, STRANDS)))
    return make_row(file, line, values[link], LINK_COLUMNS[link], labels)


def _listed(columns: Sequence[str]) -> str:
    """The columns as quoted in a message."""
    quoted = [shown(column) for column in columns[:_MOST_SHOWN]]
    more = [f"{len(columns) - _MOST_SHOWN} more"] if len(columns) > _MOST_SHOWN else []
    return f"column{'s' * (len(columns) != 1)} {', '.join(quoted + more) or 'none'}"
