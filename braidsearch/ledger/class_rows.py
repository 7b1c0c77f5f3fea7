"""The rows of classes, their forms and their fingerprints: small questions and small changes."""

from __future__ import annotations

import json
from collections.abc import Iterator
from itertools import combinations

from braidsearch.ledger.database import Database
from braidsearch.ledger.entry_rows import braid_from
from braidsearch.ledger.fingerprints import FIELDS, Fingerprint
from braidsearch.ledger.schema import readable
from braidsearch.words import Braid

COLUMNS = ", ".join(name.replace("-", "_") for name in FIELDS)
"""The columns of a fingerprint's values."""


class ClassRows(Database):
    """Classes by their numbers, looked up by form and by fingerprint."""

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
        found = [(row[0], braid_from(row[1], row[2]), Fingerprint(row[3:])) for row in rows]
        return [one for one in found if marks.first_difference(one[2]) is None]

    def count_agreeing(self, marks: Fingerprint) -> list[int]:
        """For each invariant, how many classes agree with the fingerprint in all up to it."""
        counted, values = [], []
        for depth in range(1, len(FIELDS) + 1):
            agrees, theirs = _agreement(marks, depth)
            counted.append(f"count(CASE WHEN {agrees} THEN 1 END)")
            values += theirs
        first, its = _agreement(marks, 1)  # one pass, over the classes that agree in anything
        statement = f"SELECT {', '.join(counted)} FROM fingerprints JOIN classes "
        statement += f"ON fingerprint = fingerprints.id WHERE {first}"
        return list(self.rows(statement, [*values, *its])[0])

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
        return [(row[0], braid_from(row[1], row[2]), Fingerprint(row[3:])) for row in rows]

    def all_classes(self) -> Iterator[tuple[int, Braid, Fingerprint]]:
        """Every class with the form that represents it and the fingerprint of that."""
        statement = (
            f"SELECT classes.id, strands, word, {COLUMNS} FROM classes "
            "JOIN fingerprints ON fingerprint = fingerprints.id JOIN braids ON braids.id = form "
            "ORDER BY classes.id"
        )
        with readable(self.path):
            for row in self._connection.execute(statement):
                yield row[0], braid_from(row[1], row[2]), Fingerprint(row[3:])

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
