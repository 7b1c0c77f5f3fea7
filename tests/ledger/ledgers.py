"""Small invented ledgers, what they hold, and ways to look at them and to damage them."""

import sqlite3
from collections.abc import Iterable, Sequence
from pathlib import Path
from typing import Any

from braidsearch.ledger.ledger import Ledger
from braidsearch.ledger.reading import Entry
from braidsearch.words import Braid, parse_word

TREFOIL, MIRRORED, FIGURE_EIGHT, HOPF = "1 1 1", "-1 -1 -1", "1 -2 1 -2", "1 1"
GRANNY, FIVE_ONE = "1 1 1 2 2 2", "1 1 1 1 1"

LINKS = (
    ("thistle", "bench", TREFOIL),
    ("burdock", "bench", "1 2 1 2"),
    ("teasel", "bench", MIRRORED),
    ("yarrow", "bench", FIGURE_EIGHT),
    ("thistle", "field", "-1 2 -1 2 3"),  # the name of another link in another source
    ("sorrel, common", "field", HOPF),
    ('Mädesüß "high"', "field", "2 -1 2 -1"),
    ("dock", "field", GRANNY),
)
"""Names, sources and words of eight entries, in five classes."""

CLASSES = (
    ("bench/burdock", "bench/thistle"),
    ("bench/teasel",),
    ("bench/yarrow", 'field/Mädesüß "high"', "field/thistle"),
    ("field/dock",),
    ("field/sorrel, common",),
)
"""Which of them are the same oriented links."""

TWINS = (("rush", "marsh", "4: 1 2 1 1 1 2"), ("reed", "marsh", "3: 1 1 1 1 1"))
"""One link in two braids that no canonical form joins: a search must."""

MUTANTS = (
    ("ash", "wood", "-1 -1 2 -1 2 -1 3 -2 -2 3 3"),
    ("elm", "wood", "-1 -1 -1 -1 2 2 1 -3 2 2 -3 2 -3"),
)
"""Mutant knots (Kinoshita and Terasaka; Conway): one fingerprint, and yet two knots."""


def entry(name: str, source: str, word: str, note: str = "") -> Entry:
    """An entry with this word for its link."""
    return Entry(name, source, note, parse_word(word), word)


def entries_of(links: Iterable[tuple[str, str, str]]) -> list[Entry]:
    """The entries with these names, sources and words."""
    return [entry(*link) for link in links]


def braid_entries(braids: Iterable[Braid]) -> list[Entry]:
    """Entries for braids, named by their places."""
    return [Entry(f"b{place}", "drawn", "", braid, "") for place, braid in enumerate(braids)]


def make_ledger(path: Path, links: Iterable[tuple[str, str, str]] = LINKS, **options: Any) -> Path:
    """A sorted ledger with these links."""
    with Ledger(path, create=True) as ledger:
        ledger.add(entries_of(links))
        ledger.sort(**options)
    return path


def partition(path: Path) -> tuple[tuple[str, ...], ...]:
    """The classes of a ledger as titles of entries, in an order that is the same for equal ones."""
    with Ledger(path) as ledger:
        classes = ledger.report().classes
    return tuple(sorted(tuple(sorted(one.title for one in each.entries)) for each in classes))


def dump(path: Path) -> list[str]:
    """All of a ledger as SQL."""
    connection = sqlite3.connect(path)
    try:
        return list(connection.iterdump())
    finally:
        connection.close()


def damage(path: Path, statement: str, values: Sequence[Any] = ()) -> None:
    """Change rows behind the back of the ledger; nothing is held to what it refers to."""
    connection = sqlite3.connect(path)
    try:
        connection.execute("PRAGMA foreign_keys = OFF")
        with connection:
            assert connection.execute(statement, values).rowcount > 0, "nothing was damaged"
    finally:
        connection.close()


def ask(path: Path, statement: str) -> list[tuple[Any, ...]]:
    """The rows of a question to the file."""
    connection = sqlite3.connect(path)
    try:
        return connection.execute(statement).fetchall()
    finally:
        connection.close()
