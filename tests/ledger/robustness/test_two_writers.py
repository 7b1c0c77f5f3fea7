"""Several processes on one ledger at once."""

import sqlite3
import threading
from collections.abc import Callable, Iterator
from contextlib import closing, contextmanager
from pathlib import Path

import pytest

from braidsearch.errors import InputError
from braidsearch.ledger import sorting
from braidsearch.ledger.ledger import Ledger
from braidsearch.words import Braid
from tests.ledger.robustness.ledgers import (
    STAGES,
    Life,
    Stage,
    count_rows,
    entry,
    is_intact,
    ledger_text,
    partition,
    sample_entries,
    write_table,
)
from tests.ledger.robustness.processes import finish, message_of, run, sort_command, start

SORT, IMAGES, RETRY = STAGES[1:]


@contextmanager
def before_change(
    monkeypatch: pytest.MonkeyPatch, number: int, happen: Callable[[], object]
) -> Iterator[None]:
    """Let something happen when a sort is about to make its change of this number, from 1."""
    begin = sorting.Sorter._changing
    changes = 0

    def happen_and_begin(sorter: sorting.Sorter) -> object:
        nonlocal changes
        changes += 1
        if changes == number:
            patched.undo()
            happen()
        return begin(sorter)

    with monkeypatch.context() as patched:
        patched.setattr("braidsearch.ledger.ahead.BLOCK", 8)
        patched.setattr(sorting.Sorter, "_changing", happen_and_begin)
        yield
    assert changes >= number


def test_of_two_adds_at_once_both_are_entered(tmp_path: Path):
    """Two commands that make a ledger and enter links at once lose none of them."""
    entries = sample_entries()
    parts = [write_table(tmp_path / f"{at}.csv", entries[at::2]) for at in range(2)]
    path = tmp_path / "ledger"
    processes = [start("add", str(path), str(part)) for part in parts]
    assert [finish(process).status for process in processes] == [0, 0]
    with Ledger(path) as ledger:
        found = {(one.name, one.braid) for one in ledger.store.entries()}
    assert found == {(one.name, one.braid) for one in entries}


def test_many_threads_that_make_one_ledger_make_it_once(tmp_path: Path):
    """Of many that find no ledger and make one, all can enter their link in the same."""
    path = tmp_path / "ledger"
    barrier = threading.Barrier(8)
    errors: list[BaseException] = []

    def add(number: int) -> None:
        barrier.wait()
        try:
            with Ledger(path, create=True) as ledger:
                ledger.add([entry(f"link {number}", Braid([1] * (number + 1)))])
        except BaseException as error:
            errors.append(error)

    threads = [threading.Thread(target=add, args=[number]) for number in range(8)]
    for thread in threads:
        thread.start()
    for thread in threads:
        thread.join()
    assert errors == []
    assert count_rows(path, "entries") == 8
    assert is_intact(path)


@pytest.mark.parametrize("number", [1, 2])
@pytest.mark.parametrize("stage", [SORT, RETRY], ids=lambda stage: stage.name)
def test_of_two_sorts_one_goes_on_and_the_other_stops(
    stage: Stage, number: int, life: Life, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
):
    """A sort that finds the ledger sorted meanwhile stops in one line, and has changed nothing."""
    path = life.copy_before(stage, tmp_path / "ledger")

    def sort_all() -> None:
        with Ledger(path) as other:
            stage.carry_out(other)

    with (
        Ledger(path) as ledger,
        before_change(monkeypatch, number, sort_all),
        pytest.raises(InputError, match="another process has sorted in it meanwhile"),
    ):
        stage.carry_out(ledger)
    assert ledger_text(path) == life.text_after[stage.name]


def test_of_two_sort_commands_at_once_the_ledger_is_that_of_one(life: Life, tmp_path: Path):
    """Two commands that sort at once: each ends or stops with its message; the rows are those of
    one."""
    path = life.copy_before(SORT, tmp_path / "ledger")
    processes = [start(*sort_command(path, SORT.command, 1)) for _ in range(2)]
    outcomes = [finish(process) for process in processes]
    assert 3 in [outcome.status for outcome in outcomes]
    for outcome in outcomes:
        if outcome.status != 3:
            assert outcome.status == 2
            assert "another process" in message_of(outcome)
    assert ledger_text(path) == life.text_after[SORT.name]


def test_links_entered_during_a_sort_are_kept_and_sorted(
    life: Life, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
):
    """An add while a sort is under way disturbs neither: the classes are those of all links."""
    path = life.copy_before(SORT, tmp_path / "ledger")
    more = [entry("late trefoil", Braid([1, 2, 1, 2])), entry("late unknot", Braid([1, 2]))]

    def add() -> None:
        with Ledger(path) as other:
            other.add(more)

    with Ledger(path) as ledger, before_change(monkeypatch, 2, add):
        SORT.carry_out(ledger)
    with Ledger(path) as ledger:
        SORT.carry_out(ledger)
        classes = partition(ledger)
        assert ledger.check().valid
    with Ledger(tmp_path / "at once", create=True) as ledger:
        ledger.add([*sample_entries(), *more])
        SORT.carry_out(ledger)
        assert partition(ledger) == classes


def test_readers_during_a_sort_see_one_state(
    life: Life, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
):
    """What a reader has begun to read does not change under it, and every state read is whole."""
    path = life.copy_before(SORT, tmp_path / "ledger")
    seen = []

    def look() -> None:
        with Ledger(path) as other, other.store.reading():
            seen.append(other.store.count("placed"))
            with Ledger(path) as third:
                SORT.carry_out(third)
            seen.append(other.store.count("placed"))

    with (
        Ledger(path) as ledger,
        before_change(monkeypatch, 3, look),
        pytest.raises(InputError, match="another process"),
    ):
        SORT.carry_out(ledger)
    assert 0 < seen[0] == seen[1] < count_rows(path, "placed")


def test_report_find_and_check_answer_during_a_sort(
    life: Life, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
):
    """Between two blocks of a sort the ledger is in order, as far as it is sorted."""
    path = life.copy_before(SORT, tmp_path / "ledger")
    sample = sample_entries()

    def look() -> None:
        with Ledger(path) as other:
            report = other.report()
            assert 0 < sum(len(link.entries) for link in report.classes) < len(sample)
            assert other.check().valid
            found = other.find(sample[0].braid)
            assert found.outcome == "same"
            assert found.unsorted > 0

    with Ledger(path) as ledger, before_change(monkeypatch, 3, look):
        SORT.carry_out(ledger)
    assert ledger_text(path) == life.text_after[SORT.name]


def test_a_command_waits_for_a_writer_and_says_when_that_takes_too_long(
    life: Life, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
):
    """A ledger that stays locked is reported in one line, and can be read meanwhile."""
    monkeypatch.setattr("braidsearch.ledger.schema.WAIT_SECONDS", 0.1)
    path = life.copy_before(SORT, tmp_path / "ledger")
    with closing(sqlite3.connect(path, isolation_level=None)) as writer:
        writer.execute("BEGIN IMMEDIATE")
        with Ledger(path) as ledger:
            assert ledger.report().unsorted == len(sample_entries())
            with pytest.raises(InputError, match="another process is writing in it"):
                ledger.add([entry("one more", Braid([1]))])


def test_a_reader_for_long_does_not_stop_a_writer(life: Life, tmp_path: Path):
    """While one reads, a command can enter links."""
    path = life.copy_before(SORT, tmp_path / "ledger")
    table = write_table(tmp_path / "more.csv", [entry("one more", Braid([1, 1, 1]))])
    with Ledger(path) as ledger, ledger.store.reading():
        before = ledger.store.count("entries")
        assert run("add", str(path), str(table)).status == 0
        assert ledger.store.count("entries") == before
    assert count_rows(path, "entries") == before + 1
