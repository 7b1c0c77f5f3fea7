"""The file of a ledger: its tables, its version, and what is said when it cannot be used."""

from __future__ import annotations

import os
import pathlib
import sqlite3
import time
from collections.abc import Iterator
from contextlib import contextmanager

from braidsearch.errors import InputError

APPLICATION = 0x42726C64
"""Stands in the head of the file, and says that it is a ledger."""

VERSION = 1
"""The version of the tables, also in the head."""

_PAUSE_SECONDS = 0.02

WAIT_SECONDS = 60.0
"""How long a writer waits for another one to finish."""

EXPECTED_INTACT = (
    "expected an intact ledger; restore a copy, or save what can still be read with ledger export"
)
"""What is said of a damaged ledger."""

_LONGEST_TEXT = 200

TABLES = """
CREATE TABLE braids (
    id INTEGER PRIMARY KEY, strands INTEGER NOT NULL, word TEXT NOT NULL,
    UNIQUE (strands, word)
) STRICT;
CREATE TABLE entries (
    id INTEGER PRIMARY KEY, name TEXT NOT NULL, source TEXT NOT NULL, note TEXT NOT NULL,
    given TEXT NOT NULL, remarks TEXT NOT NULL,
    braid INTEGER NOT NULL REFERENCES braids,
    UNIQUE (source, name)
) STRICT;
CREATE INDEX entries_by_name ON entries (name);
CREATE INDEX entries_by_braid ON entries (braid);
CREATE TABLE fingerprints (
    id INTEGER PRIMARY KEY, key TEXT NOT NULL UNIQUE, base TEXT NOT NULL,
    is_complete INTEGER NOT NULL CHECK (is_complete IN (0, 1)),
    components TEXT NOT NULL, linking_numbers TEXT NOT NULL, linking_sums TEXT NOT NULL,
    alexander TEXT, jones TEXT, homfly TEXT, signature TEXT
) STRICT;
CREATE INDEX incomplete_fingerprints ON fingerprints (base) WHERE is_complete = 0;
CREATE TABLE classes (
    id INTEGER PRIMARY KEY, form INTEGER NOT NULL UNIQUE REFERENCES braids,
    fingerprint INTEGER NOT NULL REFERENCES fingerprints
) STRICT;
CREATE INDEX classes_by_fingerprint ON classes (fingerprint);
CREATE TABLE forms (
    braid INTEGER PRIMARY KEY REFERENCES braids, class INTEGER NOT NULL REFERENCES classes
) STRICT;
CREATE INDEX forms_by_class ON forms (class);
CREATE TABLE placed (
    braid INTEGER PRIMARY KEY REFERENCES braids, form INTEGER NOT NULL REFERENCES forms
) STRICT;
CREATE INDEX placed_by_form ON placed (form);
CREATE TABLE evidence (
    id INTEGER PRIMARY KEY,
    left INTEGER NOT NULL REFERENCES braids, right INTEGER NOT NULL REFERENCES braids,
    symmetry TEXT NOT NULL CHECK (symmetry IN ('identity', 'mirror', 'reverse', 'mirror-reverse')),
    verdict TEXT NOT NULL CHECK (verdict IN ('same', 'different')),
    reason TEXT NOT NULL, certificate TEXT NOT NULL
) STRICT;
CREATE INDEX evidence_by_left ON evidence (left, right);
CREATE INDEX evidence_by_right ON evidence (right);
CREATE TABLE undecided (
    left INTEGER NOT NULL REFERENCES forms, right INTEGER NOT NULL REFERENCES forms,
    symmetry TEXT NOT NULL, nodes INTEGER NOT NULL, max_strands INTEGER, reason TEXT NOT NULL,
    PRIMARY KEY (left, right, symmetry)
) STRICT;
CREATE TABLE imaged (
    form INTEGER NOT NULL REFERENCES forms, symmetry TEXT NOT NULL, PRIMARY KEY (form, symmetry)
) STRICT;
CREATE TABLE contradictions (
    id INTEGER PRIMARY KEY, same INTEGER NOT NULL REFERENCES evidence,
    different INTEGER REFERENCES evidence, left INTEGER NOT NULL REFERENCES classes,
    right INTEGER NOT NULL REFERENCES classes
) STRICT;
CREATE INDEX copy_of_entries ON entries (note, given, remarks);
CREATE INDEX copy_of_evidence ON evidence (symmetry, verdict, reason);
CREATE INDEX copy_of_undecided ON undecided (nodes, max_strands, reason);
CREATE INDEX copy_of_contradictions ON contradictions (same, different, left, right);
"""
"""The statements that make the tables.

Whatever no proof and no other index holds once more is in an index ``copy_of_...``: SQLite's own
check compares a table with its indexes, so that no value can be damaged unnoticed.
"""


def connect(path: str | os.PathLike[str], *, create: bool) -> sqlite3.Connection:
    """An open connection to the ledger in the file, which is made when ``create`` says so.

    Transactions begin and end where it is said. Raises InputError, in one line that names the
    file, for a file that is missing, damaged, no ledger, or of a newer version.
    """
    name = os.fspath(path)
    if os.path.isdir(name):
        raise InputError(f"{name}: it is a folder: expected a ledger")
    if not create and not os.path.exists(name):
        raise InputError(f"{name}: no such ledger: expected one made by ledger add")
    if create and not os.path.isdir(os.path.dirname(os.path.abspath(name))):
        raise InputError(f"{name}: its folder does not exist: expected an existing one")
    with readable(name):
        try:
            return _opened(name, name, create)
        except sqlite3.OperationalError as error:
            if create or not _is_for_reading_only(name, error):
                raise
            place = pathlib.Path(name).absolute().as_uri()
            return _opened(f"{place}?immutable=1", name, create)


def _opened(place: str, name: str, create: bool) -> sqlite3.Connection:
    connection = sqlite3.connect(
        place, timeout=WAIT_SECONDS, isolation_level=None, uri=place != name
    )
    try:
        _set_up_in_turn(connection, name, create)
    except BaseException:
        connection.close()
        raise
    return connection


def _is_for_reading_only(name: str, error: sqlite3.OperationalError) -> bool:
    """Whether a ledger was not opened for want of a folder in which its log could be made.

    Where no log is left over, and none can be made, the file alone has all, and nobody changes it.
    """
    folder = os.path.dirname(os.path.abspath(name))
    can_log = os.access(folder, os.W_OK)
    is_wanting = any(part in str(error) for part in ("unable to open", "readonly"))
    return is_wanting and not can_log and not os.path.exists(f"{name}-wal")


def _set_up_in_turn(connection: sqlite3.Connection, name: str, create: bool) -> None:
    """Set the connection up; wait where another process makes the ledger or closes it just now.

    SQLite does not wait by itself for the change of the kind of journal, nor for a recovery.
    """
    give_up = time.monotonic() + WAIT_SECONDS
    while True:
        try:
            _set_up(connection, name, create)
            return
        except sqlite3.OperationalError as error:
            is_busy = "locked" in str(error) or "busy" in str(error)
            if not is_busy or time.monotonic() > give_up:
                raise
            time.sleep(_PAUSE_SECONDS)


def _check_length(connection: sqlite3.Connection, name: str) -> None:
    """Raise InputError for a file of which the last page is not whole.

    SQLite finds out by itself when pages are missing, but would fill up the last one with zeros.
    While there is a log beside the file, pages may be about to come from it.
    """
    page_size = connection.execute("PRAGMA page_size").fetchone()[0]
    log = f"{name}-wal"
    has_log = os.path.exists(log) and os.path.getsize(log) > 0
    if os.path.getsize(name) % page_size and not has_log:
        raise InputError(f"{name}: damaged (its end is missing): {EXPECTED_INTACT}")


def _set_up(connection: sqlite3.Connection, name: str, create: bool) -> None:
    connection.execute("PRAGMA foreign_keys = ON")
    if create and _is_empty(connection):
        _create(connection)
    application, version = (
        connection.execute(f"PRAGMA {field}").fetchone()[0]
        for field in ("application_id", "user_version")
    )
    if application != APPLICATION:
        raise InputError(f"{name}: an SQLite file, but no ledger: expected one made by ledger add")
    if version != VERSION:
        maker = "a newer" if version > VERSION else "no known"
        raise InputError(
            f"{name}: a ledger of version {version}, made by {maker} braidsearch: "
            f"expected version {VERSION}"
        )
    _check_length(connection, name)
    connection.execute("PRAGMA synchronous = FULL")


def _is_empty(connection: sqlite3.Connection) -> bool:
    """Whether nobody has made anything of the file yet."""
    tables, application, version = (
        connection.execute(question).fetchone()[0]
        for question in (
            "SELECT count(*) FROM sqlite_master",
            "PRAGMA application_id",
            "PRAGMA user_version",
        )
    )
    return not (tables or application or version)


def _create(connection: sqlite3.Connection) -> None:
    """Make the tables, whole or not at all; of two processes that try, one does it."""
    connection.execute("PRAGMA journal_mode = WAL")
    connection.execute("BEGIN IMMEDIATE")
    try:
        if _is_empty(connection):
            for statement in TABLES.split(";\n"):
                connection.execute(statement)
            connection.execute(f"PRAGMA application_id = {APPLICATION}")
            connection.execute(f"PRAGMA user_version = {VERSION}")
        connection.execute("COMMIT")
    except BaseException:
        if connection.in_transaction:
            connection.execute("ROLLBACK")
        raise


@contextmanager
def readable(name: str) -> Iterator[None]:
    """Say in one line what an error of SQLite means for the ledger in this file."""
    try:
        yield
    except sqlite3.Error as error:
        raise InputError(f"{name}: {_meaning(error)}") from error
    except UnicodeDecodeError as error:  # the message of an error of SQLite, with damaged text
        raise InputError(f"{name}: damaged (no text in UTF-8): {EXPECTED_INTACT}") from error


def printable(text: str) -> str:
    """The text on one line, with question marks for what cannot be shown."""
    return "".join(sign if sign.isprintable() else "?" for sign in text)


def _meaning(error: sqlite3.Error) -> str:
    text = printable(str(error))[:_LONGEST_TEXT]
    if "malformed" in text or "corrupt" in text or "decode" in text:
        return f"damaged ({text}): {EXPECTED_INTACT}"
    if "full" in text or "disk I/O" in text:
        return (
            f"{text}: the step under way was not kept, all before it was: "
            "make room and run the command again, it goes on from there"
        )
    if "locked" in text or "busy" in text:
        return "another process is writing in it: expected it to finish first"
    if "not a database" in text:
        return "no ledger: expected an SQLite file made by ledger add"
    if "readonly" in text:
        return "no permission to write: expected a ledger, in a folder, that can be written"
    if "unable to open" in text:
        return "cannot be opened: expected a file that can be read, in a folder that can be written"
    return f"{text}: {EXPECTED_INTACT}"
