"""A process killed at any point of its work on a ledger, and the work begun again.

The kill comes from inside, at a chosen instruction of SQLite's virtual machine, so that every part
of every statement and transaction has its turn.
"""

import os
import random
import signal
import sqlite3
from collections.abc import Callable
from contextlib import suppress
from pathlib import Path
from typing import Any, NoReturn

import pytest

from braidsearch.ledger.ledger import Ledger
from tests.ledger.robustness.ledgers import (
    STAGES,
    Life,
    Stage,
    count_rows,
    is_intact,
    ledger_text,
    sample_entries,
)

pytestmark = pytest.mark.skipif(not hasattr(os, "fork"), reason="a process must be copied")

ADD, SORT, *_ = STAGES

GRAIN = 20
"""So many instructions of the virtual machine lie between two points at which a kill may come."""


class Clock:
    """Counts the points passed on all connections; kills its own process at one of them."""

    def __init__(self, last: int | None) -> None:
        self.points, self.last = 0, last

    def tick(self) -> int:
        self.points += 1
        if self.points == self.last:
            os.kill(os.getpid(), signal.SIGKILL)
        return 0

    def connect(self, *arguments: Any, **options: Any) -> sqlite3.Connection:
        """In place of sqlite3.connect."""
        connection = _connect(*arguments, **options)
        connection.set_progress_handler(self.tick, GRAIN)
        return connection


_connect: Callable[..., sqlite3.Connection] = sqlite3.connect


def carry_out(stage: Stage, path: Path) -> None:
    with Ledger(path, create=True) as ledger:
        stage.carry_out(ledger)


def count_points(stage: Stage, path: Path, monkeypatch: pytest.MonkeyPatch) -> int:
    """How many points a stage passes when it is not disturbed."""
    clock = Clock(None)
    with monkeypatch.context() as patched:
        patched.setattr(sqlite3, "connect", clock.connect)
        carry_out(stage, path)
    return clock.points


def die_at(point: int, stage: Stage, path: Path) -> None:
    """Begin a stage in a copy of this process, which is killed at the point."""
    child = os.fork()
    if child == 0:
        _die_in_child(point, stage, path)
    _, status = os.waitpid(child, 0)
    assert os.WIFSIGNALED(status)
    assert os.WTERMSIG(status) == signal.SIGKILL


def _die_in_child(point: int, stage: Stage, path: Path) -> NoReturn:
    with suppress(BaseException):
        sqlite3.connect = Clock(point).connect  # type: ignore[assignment]
        carry_out(stage, path)
    os._exit(1)


def check_kills(
    stage: Stage, life: Life, folder: Path, monkeypatch: pytest.MonkeyPatch, kills: int
) -> None:
    """Kill a stage at so many seeded points, each time in a ledger of its own, and go on."""
    monkeypatch.setattr("braidsearch.ledger.ahead.BLOCK", 8)
    whole = life.copy_before(stage, folder / "whole")
    points = count_points(stage, whole, monkeypatch)
    assert ledger_text(whole) == life.text_after[stage.name]
    assert points > kills
    generator = random.Random(points)
    for point in generator.sample(range(1, points + 1), kills):
        path = life.copy_before(stage, folder / f"killed at {point}")
        die_at(point, stage, path)
        assert not path.exists() or is_intact(path), point
        if stage is ADD:
            assert count_entries(path) in {0, len(sample_entries())}, point
        carry_out(stage, path)
        assert ledger_text(path) == life.text_after[stage.name], point


def count_entries(path: Path) -> int:
    """How many links a ledger has, also one without its tables yet."""
    is_made = path.exists() and count_rows(path, "sqlite_master") > 0
    return count_rows(path, "entries") if is_made else 0


@pytest.mark.parametrize("stage", STAGES, ids=lambda stage: stage.name)
def test_a_killed_stage_begun_again_ends_in_the_same_ledger(
    stage: Stage, life: Life, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
):
    """Whatever is kept of a stage that is killed, the same stage completes it to the same rows.

    Of links that are entered all are kept or none.
    """
    check_kills(stage, life, tmp_path, monkeypatch, kills=4)


@pytest.mark.slow
@pytest.mark.parametrize("stage", STAGES, ids=lambda stage: stage.name)
def test_a_stage_killed_at_many_points_ends_in_the_same_ledger(
    stage: Stage, life: Life, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
):
    """The same at forty points of each stage."""
    check_kills(stage, life, tmp_path, monkeypatch, kills=40)


def test_a_stage_killed_twice_ends_in_the_same_ledger(
    life: Life, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
):
    """What goes on after a kill may be killed as well."""
    monkeypatch.setattr("braidsearch.ledger.ahead.BLOCK", 8)
    stage = SORT
    points = count_points(stage, life.copy_before(stage, tmp_path / "whole"), monkeypatch)
    path = life.copy_before(stage, tmp_path / "killed")
    for point in (points // 2, points // 4):
        die_at(point, stage, path)
    carry_out(stage, path)
    assert ledger_text(path) == life.text_after[stage.name]
