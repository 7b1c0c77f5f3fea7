"""The rows of braids and entries: small questions and small changes."""

from __future__ import annotations

import json
import os
from collections.abc import Iterable
from dataclasses import dataclass
from functools import lru_cache
from typing import TYPE_CHECKING, Any

from braidsearch.errors import InputError
from braidsearch.ledger.database import Database
from braidsearch.words import MAX_STRANDS, Braid

if TYPE_CHECKING:
    from braidsearch.ledger.reading import Entry


@dataclass(frozen=True, slots=True)
class StoredEntry:
    """An entry with its number, the braid's number, and its class (None: not sorted yet)."""

    number: int
    name: str
    source: str
    note: str
    given: str
    remarks: tuple[str, ...]
    braid_number: int
    braid: Braid
    class_number: int | None

    @property
    def title(self) -> str:
        """The name with its source, as it may be written to name this entry."""
        return f"{self.source}/{self.name}" if self.source else self.name


class EntryRows(Database):
    """Braids by their numbers, and the entries that have them."""

    def __init__(self, path: str | os.PathLike[str], *, create: bool = False) -> None:
        super().__init__(path, create=create)
        self._braid_of = lru_cache(maxsize=100_000)(self._read_braid)

    def braid_number(self, braid: Braid) -> int | None:
        """The number of a braid, None where it is not in the ledger."""
        number: int | None = self.one(
            "SELECT id FROM braids WHERE strands = ? AND word = ?", _columns_of(braid)
        )
        return number

    def add_braid(self, braid: Braid) -> int:
        """The number of a braid, which is entered when it is new."""
        number = self.braid_number(braid)
        if number is not None:
            return number
        statement = "INSERT INTO braids (strands, word) VALUES (?, ?)"
        return int(self.execute(statement, _columns_of(braid)).lastrowid or 0)

    def braid(self, number: int) -> Braid:
        """The braid with this number."""
        return self._braid_of(number)

    def _read_braid(self, number: int) -> Braid:
        ((strands, word),) = self.rows("SELECT strands, word FROM braids WHERE id = ?", [number])
        return braid_from(strands, word)

    def add_entry(self, entry: Entry) -> bool:
        """Enter an entry; False where the very same one is there already.

        Raises InputError where another link has its name and source.
        """
        number = self.add_braid(entry.braid)
        known = self.one(
            "SELECT braid FROM entries WHERE source = ? AND name = ?", [entry.source, entry.name]
        )
        if known == number:
            return False
        if known is not None:
            raise InputError(
                f"{entry.name}: the source {entry.source} has another link of this name "
                "in the ledger: expected another name or source"
            )
        self.execute(
            "INSERT INTO entries (name, source, note, given, remarks, braid) "
            "VALUES (?, ?, ?, ?, ?, ?)",
            [entry.name, entry.source, entry.note, entry.given, json.dumps(entry.remarks), number],
        )
        return True

    def has_other(self, entry: Entry) -> bool:
        """Whether another link has the name and the source of an entry."""
        rows = self.rows(
            "SELECT strands, word FROM entries JOIN braids ON braids.id = braid "
            "WHERE source = ? AND name = ?",
            [entry.source, entry.name],
        )
        return bool(rows) and rows[0] != _columns_of(entry.braid)

    def is_doubled(self, entry: Entry) -> bool:
        """Whether the name and the word of an entry stand under another source as well."""
        condition = "entries.name = ? AND source != ? AND strands = ? AND word = ?"
        statement = f"SELECT 1 FROM entries JOIN braids ON braids.id = braid WHERE {condition}"
        values = [entry.name, entry.source, *_columns_of(entry.braid)]
        return bool(self.one(statement, values))

    def entries(
        self, condition: str = "1", values: Iterable[Any] = (), most: int = -1
    ) -> list[StoredEntry]:
        """The entries for which a condition holds, in the order in which they were entered."""
        rows = self.rows(
            "SELECT entries.id, name, source, note, given, remarks, entries.braid, strands, word, "
            "forms.class FROM entries JOIN braids ON braids.id = entries.braid "
            "LEFT JOIN placed ON placed.braid = entries.braid "
            "LEFT JOIN forms ON forms.braid = placed.form "
            f"WHERE {condition} ORDER BY entries.id LIMIT ?",
            [*values, most],
        )
        return [_entry_from(row) for row in rows]

    def unsorted(self, most: int, after: int = 0) -> list[tuple[int, Braid]]:
        """The first braids of entries that are not sorted yet, with their numbers."""
        rows = self.rows(
            "SELECT braids.id, strands, word FROM braids WHERE braids.id > ? "
            "AND EXISTS (SELECT 1 FROM entries WHERE entries.braid = braids.id) "
            "AND NOT EXISTS (SELECT 1 FROM placed WHERE placed.braid = braids.id) "
            "ORDER BY braids.id LIMIT ?",
            [after, most],
        )
        return [(number, braid_from(strands, word)) for number, strands, word in rows]

    def count_unsorted(self) -> int:
        """How many braids of entries are not sorted yet."""
        return self.count(
            "braids",
            "id IN (SELECT braid FROM entries) AND id NOT IN (SELECT braid FROM placed)",
        )


def _columns_of(braid: Braid) -> tuple[int, str]:
    return braid.strands, " ".join(map(str, braid.word))


def braid_from(strands: int, word: str) -> Braid:
    """The braid of a row.

    Raises ValueError for what is no braid, which stands in damaged files alone.
    """
    letters = tuple(map(int, word.split()))
    most = max(map(abs, letters), default=0)
    if not 1 <= strands <= MAX_STRANDS or 0 in letters or most >= strands:
        raise ValueError(f"{word!r} on {strands} strands: expected a braid")
    return Braid.trusted(letters, strands)


def _entry_from(row: tuple[Any, ...]) -> StoredEntry:
    number, name, source, note, given, remarks, braid, strands, word, class_number = row
    return StoredEntry(
        number,
        name,
        source,
        note,
        given,
        tuple(json.loads(remarks)),
        braid,
        braid_from(strands, word),
        class_number,
    )
