"""Sorting on a Dask cluster: the same ledger, and one line where there is no cluster any more."""

import random
import signal
import time
from collections.abc import Iterator
from pathlib import Path
from typing import Any

import pytest

from braidsearch.errors import InputError
from braidsearch.ledger import executors
from braidsearch.ledger.executors import open_executor
from braidsearch.ledger.ledger import Ledger
from tests.ledger.robustness.ledgers import (
    IMAGES,
    STAGES,
    Life,
    Stage,
    entry,
    is_intact,
    ledger_text,
    random_braid,
)
from tests.ledger.robustness.processes import finish, message_of, run, start, wait_until

distributed = pytest.importorskip("distributed", reason="Dask is an extra that few install")

SORT = STAGES[1]


@pytest.fixture(scope="module")
def cluster() -> Iterator[Any]:
    """Two workers on this machine, each a process."""
    with new_cluster() as started:
        yield started


def new_cluster(workers: int = 2) -> Any:
    return distributed.LocalCluster(
        n_workers=workers, threads_per_worker=1, processes=True, dashboard_address=None
    )


def sort_on(address: str, path: Path, **options: Any) -> None:
    with Ledger(path) as ledger, open_executor(scheduler=address) as executor:
        ledger.sort(executor=executor, **options)


def test_a_cluster_sorts_to_the_same_ledger(cluster: Any, life: Life, tmp_path: Path):
    """Two workers of a cluster make the very rows that one process makes."""
    path = life.copy_before(SORT, tmp_path / "ledger")
    outcome = run("sort", str(path), *SORT.command, "--scheduler", cluster.scheduler_address)
    assert outcome.status == 3
    assert ledger_text(path) == life.text_after[SORT.name]


@pytest.mark.slow
@pytest.mark.parametrize("stage", STAGES[2:], ids=lambda stage: stage.name)
def test_a_cluster_makes_the_same_rows_at_every_stage(
    stage: Stage, cluster: Any, life: Life, tmp_path: Path
):
    """The command with a scheduler makes the same rows, images and retried questions included."""
    path = life.copy_before(stage, tmp_path / "ledger")
    outcome = run("sort", str(path), *stage.command, "--scheduler", cluster.scheduler_address)
    assert outcome.status in {0, 3}
    assert ledger_text(path) == life.text_after[stage.name]


@pytest.mark.slow
def test_a_cluster_two_processes_and_one_make_the_same_rows_of_many_links(
    cluster: Any, tmp_path: Path
):
    """Six hundred random braids sorted in three ways are one ledger, byte for byte."""
    generator = random.Random(600)
    entries = [entry(f"link {at}", random_braid(generator, (3, 6), (6, 20))) for at in range(600)]
    texts = []
    for name, options in {
        "serial": {"processes": 1},
        "processes": {"processes": 2},
        "cluster": {"scheduler": cluster.scheduler_address},
    }.items():
        with Ledger(tmp_path / name, create=True) as ledger, open_executor(**options) as executor:
            ledger.add(entries)
            ledger.sort(up_to=IMAGES, executor=executor)
        texts.append(ledger_text(tmp_path / name))
    assert texts[0] == texts[1] == texts[2]


def test_a_scheduler_that_does_not_answer_is_named_in_one_line(life: Life, tmp_path: Path):
    """Where nobody listens the command gives up soon, and the ledger is as it was."""
    path = life.copy_before(SORT, tmp_path / "ledger")
    begin = time.monotonic()
    outcome = run("sort", str(path), "--scheduler", "tcp://127.0.0.1:9")
    assert time.monotonic() - begin < 30  # ten of them in waiting for an answer
    assert outcome.status == 2
    assert "tcp://127.0.0.1:9" in message_of(outcome)
    assert ledger_text(path) == life.text_after["add"]


@pytest.mark.parametrize("address", ["nowhere", "http://127.0.0.1:9", "tcp://127.0.0.1:x", ""])
def test_an_address_that_is_none_is_named_in_one_line(address: str):
    """What is no address of a scheduler is refused as such."""
    with pytest.raises(InputError) as refused, open_executor(scheduler=address):
        pass
    assert address in str(refused.value)
    assert str(refused.value).isprintable()


def test_the_command_refuses_such_an_address_and_ends(life: Life, tmp_path: Path):
    """Nothing of the library's own follows the one line."""
    path = life.copy_before(SORT, tmp_path / "ledger")
    outcome = run("sort", str(path), "--scheduler", "tcp://127.0.0.1")
    assert outcome.status == 2
    assert "tcp://127.0.0.1" in message_of(outcome)


@pytest.mark.slow
@pytest.mark.parametrize("number", [signal.SIGINT, signal.SIGTERM])
def test_a_sort_that_waits_for_workers_can_be_interrupted(number: int, life: Life, tmp_path: Path):
    """A cluster may have no workers yet; who does not want to wait for them presses Ctrl-C."""
    path = life.copy_before(SORT, tmp_path / "ledger")
    with new_cluster(workers=0) as empty:
        process = start("sort", str(path), "--scheduler", empty.scheduler_address)
        wait_until(lambda: bool(empty.scheduler.tasks), "nothing is asked of the cluster")
        process.send_signal(number)
        outcome = finish(process)
    assert outcome.status == 130
    assert "interrupted" in message_of(outcome)


def test_workers_that_are_lost_while_the_scheduler_stays_are_not_waited_for_for_ever(
    life: Life, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
):
    """A sort whose workers are all gone ends in one line after a while; begun again it goes on."""
    monkeypatch.setattr(executors, "SECONDS_WITHOUT_WORKERS", 1.0)
    path = life.copy_before(SORT, tmp_path / "ledger")
    with new_cluster(workers=1) as left:

        def lose(progress: object) -> None:
            time.sleep(1.5)  # they are seen, then lost
            left.scale(0)
            wait_until(lambda: not left.scheduler.workers, "the worker does not end")

        with pytest.raises(InputError, match="or its workers have"):
            sort_on(left.scheduler_address, path, nodes=0, progress=lose)
    assert is_intact(path)
    with Ledger(path) as ledger:
        SORT.carry_out(ledger)
    assert ledger_text(path) == life.text_after[SORT.name]


@pytest.mark.slow
def test_a_cluster_that_ends_during_a_sort_loses_nothing(life: Life, tmp_path: Path):
    """When the scheduler goes away a sort ends in one line; begun again it goes on."""
    path = life.copy_before(SORT, tmp_path / "ledger")
    ending = new_cluster()

    def end(progress: object) -> None:
        ending.close()

    with pytest.raises(InputError) as stopped:
        sort_on(ending.scheduler_address, path, nodes=0, progress=end)
    assert "cluster" in str(stopped.value)
    assert str(stopped.value).isprintable()
    assert is_intact(path)
    with Ledger(path) as ledger:
        SORT.carry_out(ledger)
    assert ledger_text(path) == life.text_after[SORT.name]
