"""What a command answers, and how an answer reaches the user whole."""

from __future__ import annotations

import json
import os
import sys
from dataclasses import dataclass
from typing import Any, TextIO

SUCCESS = 0
USAGE_ERROR = 2
INTERRUPTED = 130

_LONGEST_MESSAGE = 300


@dataclass(frozen=True)
class Answer:
    """The exit status of a command, with what it prints on standard output and standard error."""

    status: int
    text: str
    hint: str = ""


def json_answer(status: int, value: dict[str, Any], hint: str = "") -> Answer:
    """One JSON object, and nothing else, on standard output."""
    return Answer(status, json.dumps(value), hint)


def deliver(answer: Answer) -> int:
    """Print the answer and return the exit status.

    A reader that goes away early (a closed pipe) does not change the verdict; an output that
    cannot be written (a full disk) is an error.
    """
    if answer.hint:
        print_error(answer.hint)
    if not answer.text or sys.stdout is None:
        return answer.status
    try:
        _print_line(answer.text, sys.stdout)
    except BrokenPipeError:
        _drop_output()
    except OSError as error:
        _drop_output()
        print_error(f"braidsearch: standard output: {error.strerror}: expected it to be written")
        return USAGE_ERROR
    return answer.status


def is_on_terminal() -> bool:
    """Whether standard output is a terminal that a report may be set for.

    A pipe, a file, a closed stream and a terminal that calls itself dumb get plain text.
    """
    is_dumb = os.environ.get("TERM") == "dumb"
    return sys.stdout is not None and sys.stdout.isatty() and not is_dumb


def print_error(message: str) -> None:
    """Print one message on standard error; one that cannot be printed there is lost."""
    try:
        if sys.stderr is not None:
            _print_line(message, sys.stderr)
    except OSError:
        pass


def one_line(message: str) -> str:
    """The message on one line, without control characters, cut when it is very long."""
    shown = "".join(character if character.isprintable() else " " for character in message)
    joined = " ".join(shown.split())
    return joined if len(joined) <= _LONGEST_MESSAGE else joined[: _LONGEST_MESSAGE - 4] + " ..."


def _print_line(text: str, stream: TextIO) -> None:
    encoding = stream.encoding or "utf-8"
    stream.write(text.encode(encoding, "backslashreplace").decode(encoding) + "\n")
    stream.flush()


def _drop_output() -> None:
    """Point standard output at nothing, so that the interpreter's last flush cannot fail."""
    nowhere = os.open(os.devnull, os.O_WRONLY)
    try:
        os.dup2(nowhere, sys.stdout.fileno())
    except OSError:
        pass
    finally:
        os.close(nowhere)
