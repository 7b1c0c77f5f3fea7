"""Running the command line in this process and in one of its own."""

import json
import os
import subprocess
import sys
from pathlib import Path
from typing import Any, NamedTuple

import pytest

import braidsearch
from braidsearch.command_line.main import main

PACKAGE_HOME = str(Path(braidsearch.__file__).parent.parent)


class Outcome(NamedTuple):
    """The exit status of a command and what it printed."""

    status: int
    output: str
    errors: str

    @property
    def json(self) -> Any:
        """The one JSON value on standard output."""
        return json.loads(self.output)


class Runner:
    """Calls ``main`` with the arguments and takes what it prints."""

    def __init__(self, capsys: pytest.CaptureFixture[str]) -> None:
        self._capsys = capsys

    def __call__(self, *arguments: str) -> Outcome:
        """The outcome of ``braidsearch ARGUMENTS``."""
        status = main(arguments)
        return Outcome(status, *self._capsys.readouterr())

    def fail(self, *arguments: str) -> str:
        """The one line with which ``braidsearch ARGUMENTS`` is refused, with exit status 2."""
        outcome = self(*arguments)
        assert outcome.status == 2
        assert outcome.output == ""
        assert outcome.errors.endswith("\n")
        assert outcome.errors[:-1].isprintable()
        assert len(outcome.errors) < 400
        return outcome.errors[:-1]


def run_process(*arguments: str, **options: Any) -> Outcome:
    """The outcome of ``braidsearch ARGUMENTS`` in a process of its own."""
    finished = subprocess.run(
        command(*arguments),
        capture_output=True,
        text=True,
        check=False,
        timeout=120,
        env=environment(),
        **options,
    )
    return Outcome(finished.returncode, finished.stdout, finished.stderr)


def command(*arguments: str) -> list[str]:
    """The argument list that starts ``braidsearch ARGUMENTS`` with this interpreter."""
    return [sys.executable, "-m", "braidsearch", *arguments]


def environment() -> dict[str, str]:
    """The environment in which a process finds the package that is tested here."""
    return {**os.environ, "PYTHONPATH": PACKAGE_HOME}


def read_terminal(leader: int) -> bytes:
    """All that is written on a terminal until its other end is closed."""
    written = b""
    while True:
        try:
            piece = os.read(leader, 4096)
        except OSError:  # the other end is closed
            break
        if not piece:
            break
        written += piece
    os.close(leader)
    return written
