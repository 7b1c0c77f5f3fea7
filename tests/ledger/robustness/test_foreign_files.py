"""Files that are no ledger, or one of another time, or may not be written."""

import ctypes
import os
import shutil
import sqlite3
import sys
from contextlib import closing
from pathlib import Path

import pytest

from braidsearch.errors import InputError
from braidsearch.ledger.ledger import Ledger
from braidsearch.ledger.schema import APPLICATION, VERSION
from tests.ledger.robustness.ledgers import (
    STAGES,
    Life,
    count_rows,
    is_intact,
    ledger_text,
    sample_entries,
    write_table,
)
from tests.ledger.robustness.processes import is_root, message_of, run, sort_command

SORT = STAGES[1]


def refusals(path: Path) -> set[str]:
    """The messages with which the class refuses a file, whether it may make a ledger or not."""
    messages = set()
    for create in (False, True):
        with pytest.raises(InputError) as refused:
            Ledger(path, create=create).close()
        messages.add(str(refused.value))
    for message in messages:
        assert message.startswith(f"{path}: ")
        assert message.isprintable()
    return messages


def change(path: Path, *statements: str) -> None:
    with closing(sqlite3.connect(path)) as connection:
        for statement in statements:
            connection.execute(statement)
        connection.commit()


@pytest.mark.parametrize("version", [VERSION + 1, 99, 0, -1])
def test_a_ledger_of_another_version_is_refused_and_left_alone(
    version: int, life: Life, tmp_path: Path
):
    """A ledger of a newer version, or of none that there was, is named so, and not touched."""
    path = life.copy_before(SORT, tmp_path / "ledger")
    change(path, f"PRAGMA user_version = {version}")
    before = path.read_bytes()
    (message,) = refusals(path)
    assert f"version {version}" in message
    assert f"expected version {VERSION}" in message
    assert ("newer" in message) == (version > VERSION)
    assert path.read_bytes() == before


@pytest.mark.parametrize(
    "statements",
    [
        ("CREATE TABLE entries (id INTEGER)",),
        ("CREATE TABLE anything (value TEXT)", "PRAGMA user_version = 1"),
        ("PRAGMA application_id = 7",),
        ("PRAGMA user_version = 3",),
    ],
)
def test_a_file_of_another_application_is_refused_and_left_alone(
    statements: tuple[str, ...], tmp_path: Path
):
    """An SQLite file that others have made is no ledger, even when it has no rows yet."""
    path = tmp_path / "others"
    change(path, *statements)
    before = path.read_bytes()
    (message,) = refusals(path)
    assert "no ledger" in message
    assert path.read_bytes() == before


@pytest.mark.parametrize(
    "content", [b"name,link\ntrefoil,1 1 1\n", b"\0\0", b"SQLite format 3\0", bytes(8192)]
)
def test_a_file_that_is_no_database_is_refused_and_left_alone(content: bytes, tmp_path: Path):
    """A table of links, or anything else, is never taken for a ledger nor overwritten by one."""
    path = tmp_path / "file"
    path.write_bytes(content)
    refusals(path)
    assert path.read_bytes() == content


def test_an_empty_file_becomes_a_ledger_only_where_one_is_to_be_made(tmp_path: Path):
    """A file without content is no ledger; to enter links makes one of it."""
    path = tmp_path / "empty"
    path.touch()
    with pytest.raises(InputError, match="no ledger"):
        Ledger(path)
    with Ledger(path, create=True) as ledger:
        ledger.add(sample_entries()[:1])
    assert count_rows(path, "entries") == 1


def test_a_head_that_claims_to_be_a_ledger_is_not_enough(tmp_path: Path):
    """A file with a ledger's head and none of its tables is told, and not filled."""
    path = tmp_path / "hollow"
    change(path, f"PRAGMA application_id = {APPLICATION}", f"PRAGMA user_version = {VERSION}")
    with Ledger(path) as ledger, pytest.raises(InputError, match="no such table"):
        ledger.report()


def test_folders_and_what_is_not_there_are_refused(tmp_path: Path):
    """A folder is no ledger, a ledger needs an existing folder, and is made by add alone."""
    (message,) = refusals(tmp_path)
    assert "folder" in message
    with pytest.raises(InputError, match="its folder does not exist"):
        Ledger(tmp_path / "missing" / "ledger", create=True)
    with pytest.raises(InputError, match="no such ledger"):
        Ledger(tmp_path / "ledger")
    assert list(tmp_path.iterdir()) == []


@pytest.mark.parametrize("action", ["sort", "report", "check", "find"])
def test_commands_refuse_foreign_files_in_one_line(action: str, tmp_path: Path):
    """Every action answers a file that is no ledger with one line and status 2."""
    path = tmp_path / "links.csv"
    path.write_text("name,link\ntrefoil,1 1 1\n")
    outcome = run(action, str(path), *["1 1 1"] * (action == "find"))
    assert outcome.status == 2
    assert str(path) in message_of(outcome)


def test_the_log_beside_a_ledger_may_be_missing(life: Life, tmp_path: Path):
    """Without the log's index nothing is lost; without the log, what came last, and no more."""
    path = life.copy_before(SORT, tmp_path / "ledger")
    copies = [tmp_path / "without index" / "ledger", tmp_path / "without log" / "ledger"]
    with Ledger(path) as ledger:
        SORT.carry_out(ledger)
        for copy in copies:
            copy.parent.mkdir()
            for file in tmp_path.glob("ledger*"):
                shutil.copyfile(file, copy.with_name(file.name))
    text = life.text_after[SORT.name]
    for copy, missing in zip(copies, (["-shm"], ["-shm", "-wal"]), strict=True):
        for ending in missing:
            copy.with_name(f"ledger{ending}").unlink()
        assert is_intact(copy)
    assert ledger_text(copies[0]) == text
    assert ledger_text(copies[1]) == life.text_after["add"]
    with Ledger(copies[1]) as ledger:
        SORT.carry_out(ledger)
    assert ledger_text(copies[1]) == text


# permissions: root has none of its privileges here, so that they count for it as well


def give_up_privileges() -> None:
    """Let permissions of files count for root (capabilities(7): DAC_OVERRIDE, DAC_READ_SEARCH)."""
    if is_root():
        drop_from_bounding_set = 24
        for capability in (1, 2):
            if ctypes.CDLL(None).prctl(drop_from_bounding_set, capability, 0, 0, 0):
                raise OSError("privileges cannot be given up")


needs_permissions = pytest.mark.skipif(
    is_root() and sys.platform != "linux", reason="root may write everything"
)


@needs_permissions
@pytest.mark.parametrize("action", ["sort", "add"])
def test_a_ledger_that_may_not_be_written_says_so(action: str, life: Life, tmp_path: Path):
    """To change a ledger without permission ends in one line, and changes nothing."""
    folder = tmp_path / "archive"
    folder.mkdir()
    path = life.copy_before(STAGES[2], folder / "ledger")
    before = path.read_bytes()
    table = write_table(tmp_path / "links.csv", sample_entries())
    path.chmod(0o444)
    folder.chmod(0o555)
    arguments = ["add", str(path), str(table)]
    if action == "sort":
        arguments = list(sort_command(path, STAGES[2].command, 1))
    outcome = run(*arguments, preexec_fn=give_up_privileges)
    assert outcome.status == 2
    assert "can be written" in message_of(outcome)
    assert path.read_bytes() == before


def test_a_ledger_that_may_not_be_read_says_so(life: Life, tmp_path: Path):
    """A ledger of somebody else that is closed to the reader is named in one line."""
    path = life.copy_before(SORT, tmp_path / "ledger")
    path.chmod(0)
    try:
        outcome = run("report", str(path), preexec_fn=give_up_privileges)
    finally:
        os.chmod(path, 0o600)
    assert outcome.status == 2
    assert str(path) in message_of(outcome)
