"""From rows to entries: words are parsed, drawings woven, and names held apart."""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator
from hashlib import blake2b

from braidsearch.errors import BraidsearchError, InputError
from braidsearch.ledger.reading.values import (
    PROBLEMS_SHOWN,
    Entry,
    Problem,
    Reading,
    Repeated,
    Row,
    place_of,
    shown,
)
from braidsearch.words import MAX_LETTERS, Braid, parse_word
from braidsearch.words.link_notation import WORD, hint_at_notations

_PLAIN_WORD = re.compile(
    r"(?:([1-9][0-9]{0,2}): )?(\[)?(-?[1-9][0-9]{0,2}(?:(?: |, ?)-?[1-9][0-9]{0,2})*)(?(2)\])"
)
_LONGEST_PLAIN_WORD = 6 * MAX_LETTERS
_DIGEST_SIZE = 16


def entry_of(row: Row) -> Entry:
    """The entry of a row: a braid word is parsed, a drawing is woven into a closed braid.

    Nothing but the row is looked at, so that it may be done anywhere. Raises InputError, in a
    line with the place, the offending text and what was expected; and what ``weave`` raises.
    """
    try:
        return _read_entry(row)
    except BraidsearchError as error:
        raise type(error)(f"{place_of(row)}: {error}") from None


def outcome_of(row: Row | Problem) -> Entry | Problem:
    """``entry_of`` with a mistake as a value; a problem of the row itself stays as it is."""
    if isinstance(row, Problem):
        return row
    try:
        return _read_entry(row)
    except BraidsearchError as error:
        return Problem(row.file, row.line, str(error), row.item)


def iter_distinct(outcomes: Iterable[Entry | Problem]) -> Iterator[Entry | Problem | Repeated]:
    """The outcomes of one file, with no two entries of the same name and source.

    One that says to the letter what an earlier one says comes out as Repeated; one with another
    braid, or another note, as a Problem.
    """
    seen: dict[str, dict[str, bytes]] = {}
    for outcome in outcomes:
        if isinstance(outcome, Problem):
            yield outcome
            continue
        content = _digest(outcome)
        first = seen.setdefault(outcome.source, {}).setdefault(outcome.name, content)
        if first is content:
            yield outcome
        elif first[:_DIGEST_SIZE] == content[:_DIGEST_SIZE]:
            yield Repeated(outcome.file, outcome.line, outcome.name, outcome.item)
        else:
            yield _name_problem(outcome, first)


def gather_entries(outcomes: Iterable[Entry | Problem | Repeated]) -> Reading:
    """All outcomes of one file together."""
    entries: list[Entry] = []
    problems: list[Problem] = []
    problem_count = repeated = 0
    for outcome in outcomes:
        if isinstance(outcome, Entry):
            entries.append(outcome)
        elif isinstance(outcome, Repeated):
            repeated += 1
        else:
            problem_count += 1
            if problem_count <= PROBLEMS_SHOWN:
                problems.append(outcome)
    return Reading(tuple(entries), tuple(problems), problem_count, repeated)


def _read_entry(row: Row) -> Entry:
    braid, remarks = (_read_word(row.text), ()) if row.notation == WORD else _read_drawing(row)
    given = row.given
    return Entry(
        row.name, row.source, row.note, braid, given, remarks, row.file, row.line, row.item
    )


def _read_drawing(row: Row) -> tuple[Braid, tuple[str, ...]]:
    from braidsearch.weaving.drawings import (  # noqa: PLC0415 - words come faster
        parse_drawing,
        weave_drawing,
    )

    try:
        woven = weave_drawing(parse_drawing(row.notation, row.text))
    except InputError as error:
        # The file of polygons that a row names has lines of its own, which the error counts.
        place = f"{shown(row.named_file)}: " if row.line and row.named_file else ""
        raise InputError(f"{place}{error}") from None
    return woven.braid, woven.notes


def _read_word(text: str) -> Braid:
    """``parse_word``; what most catalogues hold is read here, ten times as fast."""
    match = _PLAIN_WORD.fullmatch(text) if len(text) < _LONGEST_PLAIN_WORD else None
    if match is not None:
        letters = tuple(map(int, match[3].replace(",", " ").split()))
        needed = max(map(abs, letters)) + 1
        strands = int(match[1] or needed)
        if strands >= needed and len(letters) <= MAX_LETTERS:
            return Braid.trusted(letters, strands)
    try:
        return parse_word(text)
    except InputError as error:
        raise InputError(f"{error}{hint_at_notations(text)}") from None


def _digest(entry: Entry) -> bytes:
    """The braid and the note in few bytes, for there may be millions, and behind them the place."""
    text = f"{entry.braid.strands} {entry.braid.word} {entry.note}"
    digest = blake2b(text.encode(), digest_size=_DIGEST_SIZE).digest()
    return digest + entry.line.to_bytes(8, "big") + entry.item.to_bytes(8, "big")


def _name_problem(entry: Entry, first: bytes) -> Problem:
    line, item = (int.from_bytes(first[-place:][:8], "big") for place in (16, 8))
    other = f"object {item}" if item else f"line {line}"
    message = f"{shown(entry.name)}: expected another name, or the braid and the note of {other}"
    return Problem(entry.file, entry.line, message, entry.item)
