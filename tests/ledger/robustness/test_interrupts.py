"""Sorts that are asked to stop: Ctrl-C, and the signal that ends a process."""

import os
import signal
import time
from pathlib import Path

import pytest

from braidsearch.ledger import sorting
from braidsearch.ledger.ledger import Ledger
from tests.ledger.robustness.ledgers import STAGES, Life, Stage, is_intact, ledger_text
from tests.ledger.robustness.processes import (
    finish,
    members,
    message_of,
    sort_command,
    start,
    wait_until,
)

SORT, IMAGES, RETRY = STAGES[1:]
INTERRUPTED = {130, -signal.SIGINT}
"""A shell calls both 130. Python ends itself by the signal when it came inside an ``exec``, such as
those of dataclasses that are being imported."""


def carry_out_interrupted(
    stage: Stage, ledger: Ledger, changes: int, monkeypatch: pytest.MonkeyPatch
) -> None:
    """Interrupt this process, as Ctrl-C does, when a stage is about to make a further change."""
    begin = sorting.Sorter._changing
    left = changes

    def begin_or_stop(sorter: sorting.Sorter) -> object:
        nonlocal left
        left -= 1
        if not left:
            os.kill(os.getpid(), signal.SIGINT)
        return begin(sorter)

    with monkeypatch.context() as patched:
        patched.setattr(sorting.Sorter, "_changing", begin_or_stop)
        with pytest.raises(KeyboardInterrupt):
            stage.carry_out(ledger)


@pytest.mark.parametrize("stage", [SORT, RETRY], ids=lambda stage: stage.name)
def test_an_interrupted_sort_leaves_a_ledger_that_can_be_used_at_once(
    stage: Stage, life: Life, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
):
    """After Ctrl-C the same open ledger answers, and the same call completes it."""
    monkeypatch.setattr("braidsearch.ledger.ahead.BLOCK", 8)
    path = life.copy_before(stage, tmp_path / "ledger")
    with Ledger(path) as ledger:
        carry_out_interrupted(stage, ledger, 3, monkeypatch)
        assert ledger.report().classes
        stage.carry_out(ledger)
    assert ledger_text(path) == life.text_after[stage.name]


def test_ctrl_c_ends_the_command_in_one_line_and_leaves_no_process(life: Life, tmp_path: Path):
    """Ctrl-C, which goes to the workers too, ends a sort with status 130; it may go on."""
    path = life.copy_before(IMAGES, tmp_path / "ledger")
    process = start(*sort_command(path, IMAGES.command, 2))
    wait_until(lambda: len(members(process.pid)) > 2, "no workers are started")
    time.sleep(0.3)
    os.killpg(process.pid, signal.SIGINT)
    outcome = finish(process)
    wait_until(lambda: not members(process.pid), "processes are left behind")
    assert outcome.status in INTERRUPTED
    assert "interrupted" in message_of(outcome)
    assert is_intact(path)
    with Ledger(path) as ledger:
        IMAGES.carry_out(ledger)
    assert ledger_text(path) == life.text_after[IMAGES.name]


def test_a_sort_that_is_told_to_end_leaves_a_ledger_and_no_process(life: Life, tmp_path: Path):
    """The signal that ends a process takes no row that was kept; begun again the sort goes on."""
    path = life.copy_before(SORT, tmp_path / "ledger")
    process = start(*sort_command(path, SORT.command, 2))
    wait_until(lambda: len(members(process.pid)) > 1, "no workers are started")
    process.send_signal(signal.SIGTERM)
    outcome = finish(process)
    wait_until(lambda: not members(process.pid), "processes are left behind")
    assert outcome.status in INTERRUPTED
    assert "interrupted" in message_of(outcome)
    assert is_intact(path)
    with Ledger(path) as ledger:
        SORT.carry_out(ledger)
    assert ledger_text(path) == life.text_after[SORT.name]
