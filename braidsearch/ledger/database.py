"""The open file of a ledger: statements, transactions, and what errors of SQLite mean."""

from __future__ import annotations

import os
import sqlite3
from collections.abc import Iterable, Iterator
from contextlib import contextmanager, suppress
from typing import Any

from braidsearch.ledger.schema import connect, readable


class Database:
    """A ledger's file, open.

    Changes are made inside ``writing``, and are kept all or none. Raises InputError in one line
    for whatever is wrong with the file.
    """

    def __init__(self, path: str | os.PathLike[str], *, create: bool = False) -> None:
        self.path = os.fspath(path)
        self._connection = connect(path, create=create)

    def close(self) -> None:
        """Close the file."""
        self._connection.close()

    @contextmanager
    def writing(self) -> Iterator[None]:
        """A transaction: what is changed inside is kept as a whole, or, after an error, not."""
        try:
            self.execute("BEGIN IMMEDIATE")
            yield
            self.execute("COMMIT")
        finally:
            self._roll_back()

    @contextmanager
    def reading(self) -> Iterator[None]:
        """One state of the ledger, whatever other processes write meanwhile."""
        try:
            self.execute("BEGIN")
            yield
        finally:
            self._roll_back()

    def _roll_back(self) -> None:
        """Give up what is not committed; where even that fails, closing the file does it."""
        with suppress(sqlite3.Error):
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

    def count(self, table: str, condition: str = "1") -> int:
        """How many rows of a table fulfil a condition."""
        return int(self.one(f"SELECT count(*) FROM {table} WHERE {condition}"))
