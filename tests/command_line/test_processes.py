"""What only a process of its own shows: signals, pipes, terminals, start-up."""

import os
import pty
import re
import signal
import subprocess
import sys
import time
from pathlib import Path

import pytest

from tests.command_line.running import Outcome, command, environment, read_terminal, run_process

MUTANTS = ((-1, -1, 2, -1, 2, -1, 3, -2, -2, 3, 3), (-1, -1, -1, -1, 2, 2, 1, -3, 2, 2, -3, 2, -3))


def connected_sum(*words: tuple[int, ...]) -> str:
    """The word of the connected sum of closed 4-braids, one shared strand between neighbours."""
    letters = [
        letter + 3 * place if letter > 0 else letter - 3 * place
        for place, word in enumerate(words)
        for letter in word
    ]
    return " ".join(map(str, letters))


SUMS = (connected_sum(*MUTANTS[:1] * 6), connected_sum(*MUTANTS[:1] * 5, MUTANTS[1]))
"""Sums of mutants on nineteen strands: different, equal in every polynomial, and too large for
groups in which they differ, so that a search between them runs until it is stopped."""

ENDLESS = ("compare", *SUMS, "--seconds", "30", "--nodes", "none")
DECIDED = ("compare", "1 1 1", "-1 -1 -1")

WITHIN_SECONDS = 0.3
SLACK = 2
"""A test shares the machine with others; benchmarks/command_start.py measures without them."""


def run_on_terminal(*arguments: str) -> tuple[int, str, str]:
    """Exit status, standard output, and what standard error wrote on a terminal."""
    leader, follower = pty.openpty()
    process = subprocess.Popen(
        command(*arguments), stdout=subprocess.PIPE, stderr=follower, env=environment(), text=True
    )
    os.close(follower)
    shown = read_terminal(leader)
    output, _ = process.communicate(timeout=60)
    return process.returncode, output, shown.decode()


def test_interrupt_is_undecided_with_what_was_tried() -> None:
    """Ctrl-C during a search: exit status 3, a report, no traceback."""
    process = subprocess.Popen(
        command(*ENDLESS),
        stdout=subprocess.PIPE,
        stderr=subprocess.PIPE,
        text=True,
        env=environment(),
    )
    time.sleep(2)
    process.send_signal(signal.SIGINT)
    outcome = Outcome(0, *process.communicate(timeout=60))
    assert process.returncode == 3
    assert outcome.errors == ""
    assert outcome.output.startswith("undecided")
    assert "ending: interrupted" in outcome.output


def test_progress_is_shown_on_a_terminal_and_erased() -> None:
    """After a second a line is written over itself; at the end only blanks are left of it."""
    status, output, shown = run_on_terminal("compare", *SUMS, "--seconds", "2", "--json")
    lines = shown.split("\r")
    assert status == 3
    assert output.startswith("{")
    assert output.count("\n") == 1
    assert any(re.match("[1-9][0-9]* s, [0-9]+ classes, ", line) for line in lines)
    assert "\n" not in shown
    assert lines[-1] == lines[-2].strip() == ""


def test_short_searches_and_files_see_no_progress() -> None:
    """Nothing is written within the first second, nor ever where standard error is no terminal."""
    assert run_on_terminal(*DECIDED)[2] == ""
    assert run_process("compare", *SUMS, "--seconds", "2").errors == ""


@pytest.mark.parametrize("options", [(), ("--json",)])
def test_a_reader_that_leaves_does_not_change_the_verdict(options: tuple[str, ...]) -> None:
    """A closed pipe ends in silence, with the exit status of the verdict."""
    reading, writing = os.pipe()
    os.close(reading)
    finished = subprocess.run(
        command(*DECIDED, *options),
        stdout=writing,
        stderr=subprocess.PIPE,
        check=False,
        env=environment(),
    )
    os.close(writing)
    assert finished.returncode == 1
    assert finished.stderr == b""


@pytest.mark.skipif(not Path("/dev/full").exists(), reason="a device that is always full")
def test_a_full_disk_is_an_error() -> None:
    """An answer that cannot be written is not given: exit status 2, one line."""
    with open("/dev/full", "w", encoding="utf-8") as full:
        finished = subprocess.run(
            command(*DECIDED),
            stdout=full,
            stderr=subprocess.PIPE,
            check=False,
            text=True,
            env=environment(),
        )
    assert finished.returncode == 2
    assert finished.stderr.count("\n") == 1
    assert "No space left" in finished.stderr


def test_closed_streams_leave_the_verdict() -> None:
    """Without standard output, standard error or standard input the exit status still comes."""
    line = " ".join(f"'{argument}'" for argument in command(*DECIDED))
    for closed in (">&-", "2>&-", "<&-", ">&- 2>&- <&-"):
        finished = subprocess.run(["sh", "-c", f"{line} {closed}"], check=False, env=environment())
        assert finished.returncode == 1


def test_output_that_the_terminal_cannot_show_is_escaped() -> None:
    """In a plain ASCII locale a sigma in a message comes out as an escape, not as an exception."""
    ascii_only = {**environment(), "PYTHONIOENCODING": "ascii"}
    finished = subprocess.run(
        command("normalise", "σx"), capture_output=True, check=False, text=True, env=ascii_only
    )
    assert finished.returncode == 2
    assert "\\u03c3x" in finished.stderr


def test_certificate_can_be_piped_into_the_verifier() -> None:
    """compare -o - | verify -: the proof goes from one process to the other."""
    made = run_process("compare", "1 1 1", "1 2 1 2", "-o", "-")
    assert run_process("verify", "-", input=made.output).output.startswith("valid")


def loaded_modules(*arguments: str) -> set[str]:
    """The modules that are loaded when the command has been carried out."""
    script = (
        "import sys\n"
        "from braidsearch.command_line.main import main\n"
        f"main({list(arguments)!r})\n"
        "print('\\nMODULES', *sys.modules)\n"
    )
    finished = subprocess.run(
        [sys.executable, "-c", script],
        capture_output=True,
        check=True,
        text=True,
        env=environment(),
    )
    return set(finished.stdout.split("\nMODULES ")[1].split())


def test_a_pair_decided_by_invariants_loads_no_heavy_library() -> None:
    """Neither sympy, networkx nor numba is loaded where no search is needed."""
    modules = loaded_modules(*DECIDED)
    assert "braidsearch.search.driver" in modules
    assert modules.isdisjoint({"sympy", "networkx", "numba", "matplotlib"})


@pytest.mark.parametrize("arguments", [("--help",), ("compare", "x", "y"), ("verify", "/none")])
def test_help_and_mistakes_load_next_to_nothing(arguments: tuple[str, ...]) -> None:
    """Before there is anything to compute, numpy is not loaded either."""
    assert loaded_modules(*arguments).isdisjoint({"numpy", "sympy", "networkx", "numba"})


def test_import_of_the_package_is_light() -> None:
    """``import braidsearch`` loads no part of it before a name is used."""
    script = "import sys, braidsearch; print(*sys.modules)"
    finished = subprocess.run(
        [sys.executable, "-c", script],
        capture_output=True,
        check=True,
        text=True,
        env=environment(),
    )
    loaded = {name for name in finished.stdout.split() if name.startswith("braidsearch")}
    assert loaded == {"braidsearch"}


def test_a_pair_decided_by_invariants_is_answered_at_once() -> None:
    """From start to exit, the fastest of five runs stays near the figure of the benchmark."""
    times = []
    for _ in range(5):
        begin = time.perf_counter()
        assert run_process(*DECIDED).status == 1
        times.append(time.perf_counter() - begin)
    assert min(times) < WITHIN_SECONDS * SLACK
