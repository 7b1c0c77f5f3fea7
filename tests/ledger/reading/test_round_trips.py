"""What is written by the standard library's csv and json is read back as it was."""

import json
import pickle
from dataclasses import replace
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.errors import InputError
from braidsearch.ledger.reading import Entry, iter_rows, read_entries
from braidsearch.ledger.reading.entries import outcome_of
from braidsearch.words import Braid, format_sigma, format_word, parse_word
from tests.ledger.reading.catalogues import (
    catalogues,
    dump_lines,
    entries,
    json_objects,
    labels,
    read,
    table_text,
    write,
)
from tests.strategies import braids


@pytest.fixture(scope="module")
def folder(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """One folder for all examples."""
    return tmp_path_factory.mktemp("catalogues")


@given(catalogues, st.sampled_from([",", ";", "\t"]), st.booleans())
def test_tables(folder: Path, found: list[Entry], delimiter: str, has_mark: bool) -> None:
    """A table with any delimiter, with or without a byte order mark, gives its entries back."""
    text = "\ufeff" * has_mark + table_text(found, delimiter)
    reading = read(folder / "table.csv", text)
    assert reading.problems == ()
    assert list(reading.entries) == found


def with_strands(found: list[Entry]) -> list[Entry]:
    """The entries, with the strand count in each text, as the objects have it."""
    return [
        replace(e, given=f"{e.braid.strands}: {' '.join(map(str, e.braid.word))}".strip())
        for e in found
    ]


@settings(max_examples=50)
@given(catalogues)
def test_json_lines(folder: Path, found: list[Entry]) -> None:
    """One object a line, escaped or not, gives the entries back."""
    for ending, text in (
        ("jsonl", dump_lines(json_objects(found))),
        ("ndjson", "\n".join(map(json.dumps, json_objects(found)))),
    ):
        reading = read(folder / f"lines.{ending}", text)
        assert reading.problems == ()
        assert list(reading.entries) == with_strands(found)


@settings(max_examples=50)
@given(catalogues, st.sampled_from([None, 0, 2]))
def test_json_lists(folder: Path, found: list[Entry], indent: int | None) -> None:
    """A list of objects, on one line or on many, gives the entries back in order."""
    reading = read(folder / "list.json", json.dumps(json_objects(found), indent=indent))
    assert reading.problems == ()
    assert list(reading.entries) == with_strands(found)
    assert [entry.item for entry in reading.entries] == list(range(1, len(found) + 1))


@settings(max_examples=50)
@given(st.lists(st.tuples(labels, braids()), min_size=1, unique_by=lambda pair: pair[0]))
def test_lines_with_names(folder: Path, found: list[tuple[str, Braid]]) -> None:
    """``name = link`` for every name without an equals sign, a number sign or a notation."""
    kept = [(n, b) for n, b in found if not set(n) & set("=#") and not n.lower().startswith("pd")]
    text = "".join(f"{name} = {format_word(braid)}\n" for name, braid in kept)
    if not kept:
        return
    reading = read(folder / "lines.txt", text)
    assert reading.problems == ()
    assert [(entry.name, entry.braid) for entry in reading.entries] == kept


@given(entries())
def test_what_was_given_reads_as_the_braid(folder: Path, entry: Entry) -> None:
    """The text that an entry keeps is one that gives its braid again."""
    again = read(folder / "again.txt", entry.given)
    assert [found.braid for found in again.entries] == [entry.braid]
    assert again.entries[0].given == entry.given


_SEPARATORS = st.sampled_from([" ", ",", ", ", "  ", " ,", "\t"])


def reading_of(text: str) -> Braid | str:
    """The braid that ``parse_word`` makes of a text, or its message."""
    try:
        return parse_word(text)
    except InputError as error:
        return str(error)


@given(braids(max_strands=12), _SEPARATORS, st.sampled_from(["{}", "[{}]", "({})", "[{}"]))
def test_the_fast_way_is_the_slow_way(
    folder: Path, braid: Braid, separator: str, brackets: str
) -> None:
    """Every text is read as ``parse_word`` reads it, or refused with its message."""
    letters = brackets.format(separator.join(map(str, braid.word)))
    for text in (letters, f"{braid.strands}: {letters}", f"2: {letters}", format_sigma(braid)):
        if not text.strip():
            continue
        (row,) = iter_rows(write(folder / "one.txt", text))
        outcome = outcome_of(row)
        assert reading_of(text) == (
            outcome.braid if isinstance(outcome, Entry) else outcome.message
        )


@given(entries())
def test_values_travel_between_processes(folder: Path, entry: Entry) -> None:
    """Rows, entries and problems are pickled and come out the same."""
    write(folder / "travel.csv", table_text([entry]) + "too,many,cells,in,here\n")
    rows = list(iter_rows(folder / "travel.csv"))
    values = [*rows, *map(outcome_of, rows), read_entries(folder / "travel.csv")]
    assert pickle.loads(pickle.dumps(values)) == values
