"""Commands on ledgers in processes of their own, watched with all that they start."""

import os
import signal
import subprocess
import time
from collections.abc import Callable, Sequence
from pathlib import Path
from typing import Any

from tests.command_line.running import Outcome, command, environment

PATIENCE = 60.0
"""Seconds within which whatever is waited for must come, on a machine shared with others."""


def start(*arguments: str, **options: Any) -> subprocess.Popen[str]:
    """Start ``braidsearch ledger ARGUMENTS`` as the leader of a new session."""
    return subprocess.Popen(
        command("ledger", *arguments),
        stdout=subprocess.PIPE,
        stderr=subprocess.PIPE,
        text=True,
        env=environment(),
        start_new_session=True,
        **options,
    )


def finish(process: subprocess.Popen[str], patience: float | None = 3 * PATIENCE) -> Outcome:
    """Wait for the end of a process; None waits for ever."""
    output, errors = process.communicate(timeout=patience)
    return Outcome(process.returncode, output, errors)


def run(*arguments: str, **options: Any) -> Outcome:
    """The outcome of ``braidsearch ledger ARGUMENTS``."""
    return finish(start(*arguments, **options))


def sort_command(path: Path, arguments: Sequence[str], processes: int) -> tuple[str, ...]:
    """The arguments of a sorting by so many processes."""
    return ("sort", str(path), *arguments, "--processes", str(processes))


def kill_after(process: subprocess.Popen[str], seconds: float) -> bool:
    """Kill a process, and it alone, after so many seconds; False where it has ended before.

    What it has started must end by itself then.
    """
    try:
        process.wait(seconds)
    except subprocess.TimeoutExpired:
        process.send_signal(signal.SIGKILL)
    was_killed = process.wait(PATIENCE) == -signal.SIGKILL
    wait_until(lambda: not members(process.pid), "processes are left behind")
    process.communicate(timeout=PATIENCE)
    return was_killed


def members(session: int) -> list[int]:
    """The processes of a session that are alive."""
    found = []
    for file in Path("/proc").glob("[0-9]*/stat"):
        try:
            fields = file.read_text().rpartition(")")[2].split()
        except OSError:  # it has ended meanwhile
            continue
        state, own_session = fields[0], int(fields[3])
        if own_session == session and state not in "ZX":
            found.append(int(file.parent.name))
    return sorted(found)


def wait_until(is_so: Callable[[], bool], otherwise: str, patience: float = PATIENCE) -> None:
    """Wait until something is so; AssertionError where it takes too long."""
    end = time.monotonic() + patience
    while not is_so():
        assert time.monotonic() < end, otherwise
        time.sleep(0.02)


def message_of(outcome: Outcome) -> str:
    """The one line that a command has printed, which is all that it has printed."""
    assert outcome.output == ""
    lines = outcome.errors.splitlines()
    assert len(lines) == 1, outcome.errors
    assert lines[0].isprintable()
    return lines[0]


def is_root() -> bool:
    """Whether this process may do everything, so that no file is closed to it."""
    return hasattr(os, "geteuid") and os.geteuid() == 0
