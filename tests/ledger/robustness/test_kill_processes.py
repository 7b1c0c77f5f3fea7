"""Whole commands killed at random moments, alone and with the processes that they start."""

import os
import random
import signal
import time
from pathlib import Path

import pytest

from tests.ledger.robustness.ledgers import (
    STAGES,
    Life,
    Stage,
    is_intact,
    ledger_text,
    sample_entries,
    write_table,
)
from tests.ledger.robustness.processes import (
    finish,
    kill_after,
    members,
    message_of,
    run,
    sort_command,
    start,
    wait_until,
)

pytestmark = pytest.mark.skipif(not Path("/proc/self/stat").exists(), reason="no table to look in")

SORT, IMAGES = STAGES[1:3]


def check_killed_sorts(stage: Stage, life: Life, folder: Path, processes: int, kills: int) -> None:
    """Kill the command at seeded moments of its work, in one ledger, until a run is whole."""
    path = life.copy_before(stage, folder / "whole")
    begin = time.monotonic()
    assert run(*sort_command(path, stage.command, processes)).status in {0, 3}
    taken = time.monotonic() - begin
    assert ledger_text(path) == life.text_after[stage.name]
    generator = random.Random(kills)
    for kill in range(kills):
        path = life.copy_before(stage, folder / f"killed {kill}")
        moment = taken * (kill + generator.random()) / kills
        kill_after(start(*sort_command(path, stage.command, processes)), moment)
        assert is_intact(path), moment
        assert run(*sort_command(path, stage.command, processes)).status in {0, 3}
        assert ledger_text(path) == life.text_after[stage.name], moment


def test_a_killed_sort_of_two_processes_leaves_none_and_goes_on(life: Life, tmp_path: Path):
    """The workers of a killed sort end by themselves; begun again it ends in the same ledger."""
    path = life.copy_before(SORT, tmp_path / "ledger")
    process = start(*sort_command(path, SORT.command, 2))
    wait_until(lambda: len(workers_of(process.pid)) == 2, "no workers are started")
    assert kill_after(process, 0.5)
    assert is_intact(path)
    assert run(*sort_command(path, SORT.command, 2)).status == 3
    assert ledger_text(path) == life.text_after[SORT.name]


@pytest.mark.slow
@pytest.mark.parametrize("processes", [1, 2])
@pytest.mark.parametrize("stage", STAGES[1:], ids=lambda stage: stage.name)
def test_sorts_killed_at_twenty_moments_go_on(
    stage: Stage, processes: int, life: Life, tmp_path: Path
):
    """The same at twenty moments of each kind of sort, with one process and with two."""
    check_killed_sorts(stage, life, tmp_path, processes, kills=20)


def test_a_killed_add_has_entered_all_or_nothing(life: Life, tmp_path: Path):
    """Whenever the command add is killed, there is no ledger, an empty one, or all of it."""
    table = write_table(tmp_path / "links.csv", sample_entries())
    begin = time.monotonic()
    assert run("add", str(tmp_path / "whole"), str(table)).status == 0
    taken = time.monotonic() - begin
    assert ledger_text(tmp_path / "whole") == life.text_after["add"]
    for share in (0.6, 0.9):
        path = tmp_path / f"killed at {share}"
        kill_after(start("add", str(path), str(table)), share * taken)
        assert run("add", str(path), str(table)).status == 0
        assert ledger_text(path) == life.text_after["add"]


def test_a_worker_that_is_killed_ends_the_sort_in_one_line(life: Life, tmp_path: Path):
    """When the system ends a worker, the sort says so, leaves nothing behind, and may go on."""
    path = life.copy_before(IMAGES, tmp_path / "ledger")
    process = start(*sort_command(path, IMAGES.command, 2))
    wait_until(lambda: len(workers_of(process.pid)) == 2, "no workers are started")
    os.kill(workers_of(process.pid)[0], signal.SIGKILL)
    outcome = finish(process)
    assert outcome.status == 2
    assert "worker" in message_of(outcome)
    wait_until(lambda: not members(process.pid), "processes are left behind")
    assert run(*sort_command(path, IMAGES.command, 1)).status == 3
    assert ledger_text(path) == life.text_after[IMAGES.name]


def workers_of(leader: int) -> list[int]:
    """The worker processes that a command has started."""
    return [
        number
        for number in members(leader)
        if b"spawn_main" in Path(f"/proc/{number}/cmdline").read_bytes()
    ]
