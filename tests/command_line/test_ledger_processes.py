"""What only a process of its own shows of a ledger: what it loads, and its progress."""

import os
import pty
import random
import sys
import threading
from collections.abc import Iterator
from contextlib import contextmanager, suppress
from pathlib import Path

import pytest

from braidsearch.command_line.ledger import progress
from braidsearch.command_line.main import main
from braidsearch.ledger.ledger import Ledger
from braidsearch.words import Braid
from tests.command_line.test_processes import loaded_modules
from tests.ledger.ledgers import braid_entries, make_ledger

HEAVY = {"sympy", "networkx", "numba", "rich", "distributed", "multiprocessing", "asyncio"}


@pytest.fixture(scope="module")
def plants(tmp_path_factory: pytest.TempPathFactory) -> str:
    """The invented ledger."""
    return str(make_ledger(tmp_path_factory.mktemp("processes") / "plants.ledger"))


@pytest.mark.parametrize(
    "arguments", [("find", "1 1 1 1 1"), ("find", "1 2 1 2"), ("proof", "bench/thistle", "teasel")]
)
def test_look_ups_load_no_heavy_library(plants: str, arguments: tuple[str, ...]) -> None:
    """Where invariants or a canonical form decide, neither search nor pictures are loaded."""
    modules = loaded_modules("ledger", arguments[0], plants, *arguments[1:])
    assert "braidsearch.ledger.store" in modules
    assert modules.isdisjoint(HEAVY)


@pytest.mark.parametrize("arguments", [("--help",), ("sort", "--help"), ("moss",)])
def test_help_and_mistakes_load_next_to_nothing(arguments: tuple[str, ...]) -> None:
    """Before there is anything to do, not even NumPy is loaded."""
    assert loaded_modules("ledger", *arguments).isdisjoint({"numpy", "sqlite3", *HEAVY})


@contextmanager
def terminal_as_errors(monkeypatch: pytest.MonkeyPatch) -> Iterator[list[bytes]]:
    """A terminal in place of standard error; what is shown there is in the list at the end."""
    leader, follower = pty.openpty()
    shown: list[bytes] = []

    def read_all() -> None:
        with suppress(OSError):  # the other end is closed
            while piece := os.read(leader, 1000):
                shown.append(piece)

    reader = threading.Thread(target=read_all)
    reader.start()
    with open(follower, "w", encoding="utf-8") as stream, monkeypatch.context() as patched:
        patched.setattr(sys, "stderr", stream)
        patched.setenv("TERM", "xterm")
        patched.setenv("COLUMNS", "120")
        yield shown
    reader.join(10)
    os.close(leader)


def test_progress_is_a_bar_on_a_terminal_and_erased(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    """What is done, how much of it, rate and time left; at the end nothing of it stays."""
    monkeypatch.setattr(progress, "FIRST_AFTER", 0.0)
    generator = random.Random(11)
    braids = [Braid(generator.choices([1, -1, 2, -2], k=7), 3) for _ in range(300)]
    with Ledger(tmp_path / "a.ledger", create=True) as ledger:
        ledger.add(braid_entries(braids))
    with terminal_as_errors(monkeypatch) as pieces:
        assert main(["ledger", "sort", str(tmp_path / "a.ledger"), "--processes", "1"]) == 0
    shown = b"".join(pieces).decode()
    for part in ("sorting", "/s", " left", " classes, 0 open", "/2"):
        assert part in shown
    assert shown.rstrip().endswith("\x1b[2K")  # the line is erased


def test_what_is_quick_shows_no_bar(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """Nothing is written within the first second."""
    assert progress.FIRST_AFTER == 1.0
    monkeypatch.setattr(progress, "FIRST_AFTER", 60.0)  # the machine may be slow
    path = make_ledger(tmp_path / "a.ledger")
    with terminal_as_errors(monkeypatch) as pieces:
        assert main(["ledger", "check", str(path)]) == 0
    assert pieces == []
