"""The rows of a ledger: small questions and small changes, in SQL and nothing else."""

from __future__ import annotations

import json
import os
import sqlite3
from collections.abc import Iterable, Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from functools import lru_cache
from itertools import combinations
from typing import TYPE_CHECKING, Any

from braidsearch.errors import InputError
from braidsearch.ledger.fingerprints import FIELDS, Fingerprint
from braidsearch.ledger.reading import Entry
from braidsearch.ledger.schema import connect, readable
from braidsearch.words import Braid

if TYPE_CHECKING:
    from braidsearch.ledger.placing import Effort, Finding

Revision = tuple[int, int, int]
"""Braids placed, classes, the number of the last proof."""

COLUMNS = ", ".join(name.replace("-", "_") for name in FIELDS)
"""The columns of a fingerprint's values."""


@dataclass(frozen=True, slots=True)
class Evidence:
    """A stored proof: its number, what it claims, and the text of its certificate."""

    number: int
    left: int
    right: int
    symmetry: str
    verdict: str
    reason: str
    certificate: str


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


class Store:
    """A ledger's file, open. Every method is one question or one change.

    Changes are made inside ``writing``, and are kept all or none. Raises InputError in one line
    for whatever is wrong with the file.
    """

    def __init__(self, path: str | os.PathLike[str], *, create: bool = False) -> None:
        self.path = os.fspath(path)
        self._connection = connect(path, create=create)
        self._braid_of = lru_cache(maxsize=100_000)(self._read_braid)

    def close(self) -> None:
        """Close the file."""
        self._connection.close()

    @contextmanager
    def writing(self) -> Iterator[None]:
        """A transaction: what is changed inside is kept as a whole, or, after an error, not."""
        self.execute("BEGIN IMMEDIATE")
        try:
            yield
            self.execute("COMMIT")
        except BaseException:
            if self._connection.in_transaction:
                self._connection.execute("ROLLBACK")
            raise

    @contextmanager
    def reading(self) -> Iterator[None]:
        """One state of the ledger, whatever other processes write meanwhile."""
        self.execute("BEGIN")
        try:
            yield
        finally:
            if self._connection.in_transaction:
                self._connection.execute("ROLLBACK")

    def execute(self, statement: str, values: Iterable[Any] = ()) -> sqlite3.Cursor:
        """Execute one statement."""
        with readable(self.path):
            return self._connection.execute(statement, tuple(values))

    def rows(self, statement: str, values: Iterable[Any] = ()) -> list[tuple[Any, ...]]:
        """All rows of a question."""
        with readable(self.path):
            return self._connection.execute(statement, tuple(values)).fetchall()

    def one(self, statement: str, values: Iterable[Any] = ()) -> Any:
        """The first value of the first row, None where there is no row."""
        with readable(self.path):
            row = self._connection.execute(statement, tuple(values)).fetchone()
        return None if row is None else row[0]

    # braids and entries

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
        return _braid_from(strands, word)

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
        return [(number, _braid_from(strands, word)) for number, strands, word in rows]

    def count_unsorted(self) -> int:
        """How many braids of entries are not sorted yet."""
        return self.count(
            "braids",
            "id IN (SELECT braid FROM entries) AND id NOT IN (SELECT braid FROM placed)",
        )

    def count(self, table: str, condition: str = "1") -> int:
        """How many rows of a table fulfil a condition."""
        return int(self.one(f"SELECT count(*) FROM {table} WHERE {condition}"))

    # classes

    def class_of_form(self, form: int) -> int | None:
        """The class of a canonical form, None for a form that is not in the ledger."""
        number: int | None = self.one("SELECT class FROM forms WHERE braid = ?", [form])
        return number

    def form_of_class(self, number: int) -> int:
        """The form that represents a class."""
        return int(self.one("SELECT form FROM classes WHERE id = ?", [number]))

    def fingerprint_of_class(self, number: int) -> Fingerprint:
        """The fingerprint of the form that represents a class."""
        rows = self.rows(
            f"SELECT {COLUMNS} FROM fingerprints JOIN classes ON fingerprint = fingerprints.id "
            "WHERE classes.id = ?",
            [number],
        )
        return Fingerprint(rows[0])

    def agreeing_classes(self, marks: Fingerprint) -> list[tuple[int, Braid, Fingerprint]]:
        """The classes from which the fingerprint does not tell a link, oldest first."""
        if marks.is_complete:
            condition, values = "key = ?", [key_of(marks)]
            condition += " OR (base = ? AND is_complete = 0)"
            values.append(base_of(marks))
        else:
            condition, values = "base = ?", [base_of(marks)]
        rows = self.rows(
            f"SELECT classes.id, strands, word, {COLUMNS} FROM fingerprints "
            "JOIN classes ON fingerprint = fingerprints.id JOIN braids ON braids.id = form "
            f"WHERE {condition} ORDER BY classes.id",
            values,
        )
        found = [(row[0], _braid_from(row[1], row[2]), Fingerprint(row[3:])) for row in rows]
        return [one for one in found if marks.first_difference(one[2]) is None]

    def count_agreeing(self, marks: Fingerprint) -> list[int]:
        """For each invariant, how many classes agree with the fingerprint in all up to it."""
        counts = []
        for depth in range(1, len(FIELDS) + 1):
            agrees, values = _agreement(marks, depth)
            statement = "SELECT count(*) FROM fingerprints JOIN classes "
            statement += f"ON fingerprint = fingerprints.id WHERE {agrees}"
            counts.append(int(self.one(statement, values)))
        return counts

    def nearest_classes(
        self, marks: Fingerprint, most: int
    ) -> list[tuple[int, Braid, Fingerprint]]:
        """The oldest of the classes that agree with the fingerprint in most invariants in order."""
        counts = [self.count("classes"), *self.count_agreeing(marks)]
        depth = max((place for place, count in enumerate(counts) if count), default=0)
        agrees, values = _agreement(marks, depth)
        rows = self.rows(
            f"SELECT classes.id, strands, word, {COLUMNS} FROM fingerprints "
            "JOIN classes ON fingerprint = fingerprints.id JOIN braids ON braids.id = form "
            f"WHERE {agrees} ORDER BY classes.id LIMIT ?",
            [*values, most],
        )
        return [(row[0], _braid_from(row[1], row[2]), Fingerprint(row[3:])) for row in rows]

    def all_classes(self) -> Iterator[tuple[int, Braid, Fingerprint]]:
        """Every class with the form that represents it and the fingerprint of that."""
        statement = (
            f"SELECT classes.id, strands, word, {COLUMNS} FROM classes "
            "JOIN fingerprints ON fingerprint = fingerprints.id JOIN braids ON braids.id = form "
            "ORDER BY classes.id"
        )
        with readable(self.path):
            for row in self._connection.execute(statement):
                yield row[0], _braid_from(row[1], row[2]), Fingerprint(row[3:])

    def iter_agreeing_pairs(self) -> Iterator[tuple[int, int]]:
        """Every two classes that their fingerprints do not tell apart."""
        yield from self.rows(
            "SELECT one.id, other.id FROM classes AS one JOIN classes AS other "
            "ON one.fingerprint = other.fingerprint AND one.id < other.id ORDER BY one.id, other.id"
        )
        lacking = self.rows("SELECT DISTINCT base FROM fingerprints WHERE is_complete = 0")
        for (base,) in lacking:
            rows = self.rows(
                f"SELECT classes.id, classes.fingerprint, {COLUMNS} FROM classes "
                "JOIN fingerprints ON fingerprint = fingerprints.id WHERE base = ?",
                [base],
            )
            marked = sorted((row[0], row[1], Fingerprint(row[2:])) for row in rows)
            for (one, key, marks), (other, its, theirs) in combinations(marked, 2):
                if key != its and marks.first_difference(theirs) is None:
                    yield one, other

    def has_incomplete(self, base: tuple[str | None, ...]) -> bool:
        """Whether a fingerprint with these values for every link lacks others."""
        return bool(
            self.one(
                "SELECT 1 FROM fingerprints WHERE base = ? AND is_complete = 0", [json.dumps(base)]
            )
        )

    def add_class(self, form: int, marks: Fingerprint) -> int:
        """A new class, represented by a form."""
        fingerprint = self._add_fingerprint(marks)
        statement = "INSERT INTO classes (form, fingerprint) VALUES (?, ?)"
        number = int(self.execute(statement, [form, fingerprint]).lastrowid or 0)
        self.add_form(form, number)
        return number

    def _add_fingerprint(self, marks: Fingerprint) -> int:
        key = key_of(marks)
        known = self.one("SELECT id FROM fingerprints WHERE key = ?", [key])
        if known is not None:
            return int(known)
        marked = ", ".join("?" * (3 + len(FIELDS)))
        statement = (
            f"INSERT INTO fingerprints (key, base, is_complete, {COLUMNS}) VALUES ({marked})"
        )
        values = [key, base_of(marks), int(marks.is_complete), *marks.values]
        return int(self.execute(statement, values).lastrowid or 0)

    def add_form(self, form: int, number: int) -> None:
        """Put a form into a class."""
        self.execute("INSERT INTO forms (braid, class) VALUES (?, ?)", [form, number])

    def place(self, braid: int, form: int) -> None:
        """Say which form a braid of an entry has."""
        self.execute("INSERT OR IGNORE INTO placed (braid, form) VALUES (?, ?)", [braid, form])

    def is_placed(self, braid: int) -> bool:
        """Whether the braid has its form in the ledger."""
        return bool(self.one("SELECT 1 FROM placed WHERE braid = ?", [braid]))

    def merge_classes(self, kept: int, merged: int) -> None:
        """Put all forms of one class into another, and end it."""
        self.execute("UPDATE forms SET class = ? WHERE class = ?", [kept, merged])
        self.execute("UPDATE contradictions SET left = ? WHERE left = ?", [kept, merged])
        self.execute("UPDATE contradictions SET right = ? WHERE right = ?", [kept, merged])
        self.execute("DELETE FROM classes WHERE id = ?", [merged])

    # evidence

    def add_evidence(self, left: int, right: int, finding: Finding) -> int:
        """Keep a proof."""
        statement = (
            "INSERT INTO evidence (left, right, symmetry, verdict, reason, certificate) "
            "VALUES (?, ?, ?, ?, ?, ?)"
        )
        values = [left, right, finding.symmetry, finding.outcome, finding.reason]
        return int(self.execute(statement, [*values, finding.certificate]).lastrowid or 0)

    def evidence(self, condition: str = "1", values: Iterable[Any] = ()) -> Iterator[Evidence]:
        """The proofs for which a condition holds, in the order in which they were found."""
        statement = (
            "SELECT evidence.id, evidence.left, evidence.right, evidence.symmetry, verdict, "
            f"evidence.reason, certificate FROM evidence WHERE {condition} ORDER BY evidence.id"
        )
        with readable(self.path):
            for row in self._connection.execute(statement, tuple(values)):
                yield Evidence(*row)

    def set_undecided(self, left: int, right: int, finding: Finding, effort: Effort) -> None:
        """Keep that a question is open, with the limits that were tried."""
        self.execute(
            "INSERT OR REPLACE INTO undecided VALUES (?, ?, ?, ?, ?, ?)",
            [left, right, finding.symmetry, effort.nodes, effort.max_strands, finding.reason],
        )

    def settle(self, left: int, right: int, symmetry: str) -> None:
        """Say that a question is open no more."""
        self.execute(
            "DELETE FROM undecided WHERE left = ? AND right = ? AND symmetry = ?",
            [left, right, symmetry],
        )

    def undecided(self) -> list[tuple[int, int, str, Effort, str]]:
        """The open questions: two forms, the symmetry, the limits tried, the reason."""
        from braidsearch.ledger.placing import Effort  # noqa: PLC0415 - loads the search, which look-ups do without

        rows = self.rows("SELECT * FROM undecided ORDER BY left, right, symmetry")
        return [
            (left, right, symmetry, Effort(nodes, most), reason)
            for left, right, symmetry, nodes, most, reason in rows
        ]

    def add_contradiction(self, same: int, different: int, left: int, right: int) -> None:
        """Keep that two proofs contradict each other."""
        self.execute(
            "INSERT INTO contradictions (same, different, left, right) VALUES (?, ?, ?, ?)",
            [same, different, left, right],
        )

    def revision(self) -> Revision:
        """What tells whether another process has changed the classes meanwhile."""
        with readable(self.path):
            row = self._connection.execute(
                "SELECT (SELECT count(*) FROM placed), (SELECT count(*) FROM classes), "
                "(SELECT coalesce(max(id), 0) FROM evidence)"
            ).fetchone()
        placed, classes, evidence = row
        return placed, classes, evidence

    def check_revision(self, expected: Revision) -> None:
        """Raise InputError when another process has changed the classes meanwhile."""
        if self.revision() != expected:
            raise InputError(
                f"{self.path}: another process has sorted in it meanwhile: nothing is lost; "
                "expected one at a time: run the command again to go on"
            )


def key_of(marks: Fingerprint) -> str:
    """The text under which a fingerprint is looked up."""
    return json.dumps(marks.values)


def _agreement(marks: Fingerprint, depth: int) -> tuple[str, list[str]]:
    """The condition that a fingerprint agrees in the first invariants, and its values."""
    agrees, values = "1", []
    for name, value in zip(FIELDS[:depth], marks.values, strict=False):
        if value is not None:
            column = name.replace("-", "_")
            agrees += f" AND ({column} = ? OR {column} IS NULL)"
            values.append(value)
    return agrees, values


def base_of(marks: Fingerprint) -> str:
    """The text under which fingerprints are looked up when one lacks values."""
    return json.dumps(marks.base)


def _columns_of(braid: Braid) -> tuple[int, str]:
    return braid.strands, " ".join(map(str, braid.word))


def _braid_from(strands: int, word: str) -> Braid:
    return Braid.trusted(tuple(map(int, word.split())), strands)


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
        _braid_from(strands, word),
        class_number,
    )
