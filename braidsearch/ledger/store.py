"""The rows of a ledger: braids, entries, classes, proofs and open questions."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from typing import Any

from braidsearch.errors import InputError
from braidsearch.ledger.class_rows import COLUMNS, ClassRows, base_of, key_of
from braidsearch.ledger.entry_rows import EntryRows, StoredEntry
from braidsearch.ledger.findings import Effort, Finding
from braidsearch.ledger.schema import readable

INSIDE = "(SELECT braid FROM forms WHERE class = ?)"
"""The forms of a class, in a statement."""

Revision = tuple[int, int, int]
"""Braids placed, classes, the number of the last proof."""


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


class Store(EntryRows, ClassRows):
    """A ledger's file, open. Every method is one question or one change.

    Changes are made inside ``writing``, and are kept all or none. Raises InputError in one line
    for whatever is wrong with the file.
    """

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
        rows = self.rows("SELECT * FROM undecided ORDER BY left, right, symmetry")
        return [
            (left, right, symmetry, Effort(nodes, most), reason)
            for left, right, symmetry, nodes, most, reason in rows
        ]

    def undecided_about(self, number: int) -> list[tuple[int, int, str]]:
        """The open questions about forms of a class: two forms and the symmetry."""
        return self.rows(
            f"SELECT left, right, symmetry FROM undecided WHERE left IN {INSIDE} "
            f"OR right IN {INSIDE} ORDER BY left, right, symmetry",
            [number, number],
        )

    def proof_between(self, one: int, other: int, symmetry: str, verdict: str) -> int | None:
        """The first proof between forms of two classes, in either direction, that says this."""
        number: int | None = self.one(
            "SELECT id FROM evidence WHERE verdict = ? AND symmetry = ? AND "
            f"(left IN {INSIDE} AND right IN {INSIDE} OR left IN {INSIDE} AND right IN {INSIDE}) "
            "ORDER BY id LIMIT 1",
            [verdict, symmetry, one, other, other, one],
        )
        return number

    def is_undecided(self, left: int, right: int, symmetry: str) -> bool:
        """Whether a question is open still."""
        condition = "left = ? AND right = ? AND symmetry = ?"
        return bool(self.one(f"SELECT 1 FROM undecided WHERE {condition}", [left, right, symmetry]))

    def add_contradiction(self, same: int, different: int | None, left: int, right: int) -> None:
        """Keep that two proofs contradict each other, or a proof (None) the classes' values."""
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


__all__ = ["COLUMNS", "INSIDE", "Evidence", "Store", "StoredEntry", "base_of", "key_of"]
