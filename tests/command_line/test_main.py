"""The console command itself: help, version, mistakes, and what is never let through."""

import re
from collections.abc import Sequence

import pytest

import braidsearch
from braidsearch.command_line import normalise
from braidsearch.command_line.answer import Answer
from braidsearch.command_line.main import COMMANDS
from tests.command_line.running import Runner, run_process


def test_help_lists_every_command_and_examples(run: Runner) -> None:
    """--help, -h and help print the same text on standard output, with exit status 0."""
    texts = {run(argument).output for argument in ("--help", "-h", "help")}
    (text,) = texts
    assert run("--help").status == 0
    assert "examples:" in text
    assert all(re.search(rf"^  {name} ", text, re.MULTILINE) for name in COMMANDS)


@pytest.mark.parametrize("command", COMMANDS)
def test_every_command_has_help_with_examples(run: Runner, command: str) -> None:
    """COMMAND --help exits 0, and each example in it begins with that command."""
    outcome = run(command, "--help")
    examples = outcome.output.split("examples:\n")[1].split("\n\n")[0].splitlines()
    assert outcome.status == 0
    assert len(examples) >= 2
    assert all(line.startswith("  braidsearch ") and command in line for line in examples)


def test_no_command_prints_the_help_as_an_error(run: Runner) -> None:
    """Without a command there is nothing to do: exit status 2, and nothing on standard output."""
    outcome = run()
    assert (outcome.status, outcome.output) == (2, "")
    assert "commands:" in outcome.errors


def test_version(run: Runner) -> None:
    """--version prints the version of the package."""
    assert run("--version") == (0, f"braidsearch {braidsearch.__version__}\n", "")


@pytest.mark.parametrize(
    ("arguments", "said"),
    [
        (["compair", "1", "1"], "'compair': expected a command, one of compare, verify"),
        (["compair", "1", "1"], "did you mean compare?"),
        (["-1", "1"], "'-1': expected a command"),
        (["--colour"], "'--colour': expected a command"),
        (["normalise"], "required: WORD"),
        (["normalise", "1", "--colour"], "--colour: expected only the options"),
        (["normalise", "1", "--colour=\x1b[31m"], "--colour"),
        (["normalise", "-x"], "-x"),
        (["normalise", "1", "1", "1"], "expected each word as one argument, in quotes"),
        (["normalise", "1", "-2"], "-2: expected each word as one argument, in quotes"),
        (["normalise", "1 x"], "WORD: 'x': expected integers"),
        (["normalise", "0"], "WORD: '0': expected a non-zero index"),
        (["normalise", "3: 1 2 3"], "WORD: letter 3: expected an index from 1 to 2"),
        (["normalise", "1 " * 200_000], "expected at most 100000 letters"),
        (["normalise", "1\n0\n"], "'0'"),
        (["normalise", "\udcff"], "udcff"),
        (["normalise", "--js", "1"], "--js: expected only the options"),
        (["invariants", "two"], "WORD: 'two': expected integers"),
    ],
)
def test_mistakes_get_one_line(run: Runner, arguments: Sequence[str], said: str) -> None:
    """A mistake is answered by one printable line that names it, with exit status 2."""
    line = run.fail(*arguments)
    assert line.startswith("braidsearch ")
    assert said in line


def test_defects_get_one_line(run: Runner, monkeypatch: pytest.MonkeyPatch) -> None:
    """An exception that nobody foresaw is one line with its place, never a traceback, exit 2."""

    def fall(_: Sequence[str]) -> Answer:
        raise ZeroDivisionError("no\nway")

    monkeypatch.setattr(normalise, "answer", fall)
    line = run.fail("normalise", "1")
    assert "internal error, please report it" in line
    assert "ZeroDivisionError in test_main.py, line" in line


@pytest.mark.parametrize(
    ("raised", "status"), [(KeyboardInterrupt(), 130), (MemoryError(), 2), (RecursionError(), 2)]
)
def test_interrupts_and_exhaustion_get_one_line(
    run: Runner, monkeypatch: pytest.MonkeyPatch, raised: BaseException, status: int
) -> None:
    """Ctrl-C, no memory and too deep a recursion end in a line, not in a traceback."""

    def fall(_: Sequence[str]) -> Answer:
        raise raised

    monkeypatch.setattr(normalise, "answer", fall)
    outcome = run("normalise", "1")
    assert (outcome.status, outcome.output) == (status, "")
    assert outcome.errors.count("\n") == 1


def test_console_command_in_a_process() -> None:
    """The entry point passes the exit status on."""
    assert run_process("normalise", "-1,2").status == 0
    mistake = run_process("normalise", "zero")
    assert mistake.status == 2
    assert mistake.errors.count("\n") == 1
    assert "Traceback" not in mistake.errors
