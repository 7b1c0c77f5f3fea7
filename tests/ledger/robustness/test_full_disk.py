"""A disk without room: what was kept stays, one line says so, and with room the work goes on."""

import os
import resource
import shutil
import sqlite3
import subprocess
from collections.abc import Callable, Iterator
from pathlib import Path
from typing import Any

import pytest

from braidsearch.errors import InputError
from braidsearch.ledger.ledger import Ledger
from tests.ledger.robustness.ledgers import (
    STAGES,
    Life,
    Stage,
    is_intact,
    ledger_text,
    sample_entries,
    write_table,
)
from tests.ledger.robustness.processes import is_root, message_of, run, sort_command

SORT = STAGES[1]


def carry_out_on_few_pages(
    stage: Stage, path: Path, more_pages: int, monkeypatch: pytest.MonkeyPatch
) -> str | None:
    """Carry out a stage with room for few more pages; the message where it does not suffice."""
    connect: Callable[..., sqlite3.Connection] = sqlite3.connect

    def connect_narrowly(*arguments: Any, **options: Any) -> sqlite3.Connection:
        connection = connect(*arguments, **options)
        pages = connection.execute("PRAGMA page_count").fetchone()[0]
        connection.execute(f"PRAGMA max_page_count = {max(1, pages + more_pages)}")
        return connection

    with monkeypatch.context() as patched:
        patched.setattr(sqlite3, "connect", connect_narrowly)
        try:
            with Ledger(path, create=True) as ledger:
                stage.carry_out(ledger)
        except InputError as error:
            return str(error)
    return None


@pytest.mark.parametrize("stage", STAGES, ids=lambda stage: stage.name)
def test_a_stage_without_room_keeps_what_it_has_and_goes_on(
    stage: Stage, life: Life, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
):
    """A full file ends a stage in one line; with more room each time it ends in the same rows."""
    monkeypatch.setattr("braidsearch.ledger.ahead.BLOCK", 8)
    path = life.copy_before(stage, tmp_path / "ledger")
    messages = []
    for more_pages in (0, 8, 16, 1_000):
        message = carry_out_on_few_pages(stage, path, more_pages, monkeypatch)
        assert not path.exists() or is_intact(path)
        messages.append(message)
    assert messages[0] is not None
    assert messages[-1] is None
    for message in messages:
        if message is not None:
            assert message.startswith(f"{path}: ")
            assert "make room" in message
            assert message.isprintable()
    assert ledger_text(path) == life.text_after[stage.name]


def test_a_command_that_may_write_no_more_says_so_in_one_line(life: Life, tmp_path: Path):
    """A bound on the size of files, as a quota sets, ends add and sort in one line each."""
    table = write_table(tmp_path / "links.csv", sample_entries())
    path = tmp_path / "new ledger"
    outcome = run("add", str(path), str(table), preexec_fn=bound_files)
    assert outcome.status == 2
    assert "make room" in message_of(outcome)
    assert run("add", str(path), str(table)).status == 0
    assert ledger_text(path) == life.text_after["add"]
    outcome = run(*sort_command(path, SORT.command, 1), preexec_fn=bound_files)
    assert outcome.status == 2
    assert "make room" in message_of(outcome)
    assert is_intact(path)
    with Ledger(path) as ledger:
        SORT.carry_out(ledger)
    assert ledger_text(path) == life.text_after[SORT.name]


def bound_files() -> None:
    """No file may grow beyond 40,000 bytes."""
    resource.setrlimit(resource.RLIMIT_FSIZE, (40_000, 40_000))


@pytest.fixture
def small_disk(tmp_path: Path) -> Iterator[Path]:
    """A disk of two mebibytes."""
    folder = tmp_path / "disk"
    folder.mkdir()
    if not is_root():
        pytest.skip("only root may mount a small disk")
    command = ["mount", "-t", "tmpfs", "-o", "size=2m", "tmpfs", str(folder)]
    mounted = subprocess.run(command, capture_output=True, text=True, check=False)
    if mounted.returncode:
        pytest.skip(f"no small disk can be mounted: {mounted.stderr.strip()}")
    try:
        yield folder
    finally:
        subprocess.run(["umount", str(folder)], check=True)


@pytest.mark.skipif(shutil.which("mount") is None, reason="no small disk can be mounted")
@pytest.mark.parametrize("free", [8_192, 131_072])
def test_a_disk_that_is_full_loses_nothing(free: int, small_disk: Path, life: Life):
    """On a disk that is really full a sort ends in one line, and goes on after room is made."""
    path = life.copy_before(SORT, small_disk / "ledger")
    fill(small_disk / "ballast", small_disk, free)
    outcome = run(*sort_command(path, SORT.command, 1))
    assert outcome.status == 2
    assert "make room" in message_of(outcome)
    assert "Traceback" not in run("report", str(path)).errors
    (small_disk / "ballast").unlink()
    assert is_intact(path)
    with Ledger(path) as ledger:
        SORT.carry_out(ledger)
    assert ledger_text(path) == life.text_after[SORT.name]


def fill(ballast: Path, folder: Path, free: int) -> None:
    """Leave so many bytes free on a disk."""
    room = os.statvfs(folder)
    ballast.write_bytes(b"\0" * (room.f_bavail * room.f_frsize - free))
