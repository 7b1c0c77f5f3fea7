"""Reading the arguments of a command: words that begin with a minus sign, one-line errors."""

from __future__ import annotations

import argparse
import math
import re
import sys
from collections.abc import Callable, Sequence
from itertools import takewhile
from typing import IO, NoReturn

from braidsearch.errors import InputError
from braidsearch.words import MAX_LETTERS, Braid, parse_word

_GUARD = "\0"  # no argument of a process can hold it
_WORD_WITH_MINUS = re.compile(r"-\s*[0-9]")
_LONGEST_INPUT = 16 * MAX_LETTERS


class HelpRequested(Exception):  # noqa: N818 - no error: the user asked for it
    """The help of a command was asked for; the message is its text."""


class CommandParser(argparse.ArgumentParser):
    """A parser that raises: HelpRequested with the text, InputError with a line for a mistake."""

    def __init__(self, command: str, description: str, examples: str) -> None:
        super().__init__(
            prog=f"braidsearch {command}",
            description=description,
            epilog=f"examples:\n{examples}",
            formatter_class=argparse.RawDescriptionHelpFormatter,
            allow_abbrev=False,
        )

    def read(self, arguments: Sequence[str]) -> argparse.Namespace:
        """The arguments by name; ``-1,2`` is a word wherever it stands, never an option."""
        for argument in takewhile(lambda argument: argument != "--", arguments):
            if not self._is_known(argument):
                raise InputError(f"{argument}: expected only the options that --help lists")
        return self.parse_args([_guarded(argument) for argument in arguments])

    def _is_known(self, argument: str) -> bool:
        """Whether the argument is no option, or one of this parser's."""
        if (
            argument[:1] != "-"
            or argument == "-"
            or " " in argument
            or _guarded(argument) != argument
        ):
            return True
        flag = argument.partition("=")[0] if argument.startswith("--") else argument[:2]
        return flag in self._option_string_actions

    def add_word(self, name: str, explanation: str) -> None:
        """A braid word as a positional argument."""
        self.add_argument(name, metavar=name.upper(), type=_unguarded, help=explanation)

    def add_text(
        self, *flags: str, metavar: str, explanation: str, is_repeatable: bool = False
    ) -> None:
        """An option with a text for its value, or a list of them, or a positional argument."""
        action = "append" if is_repeatable else "store"
        self.add_argument(*flags, metavar=metavar, type=_unguarded, help=explanation, action=action)

    def add_number(
        self, flag: str, read: Callable[[str], object], expected: str, explanation: str
    ) -> None:
        """An option with a number for its value, read by ``read``; absent when it is not given."""
        self.add_argument(
            flag,
            metavar="N",
            default=argparse.SUPPRESS,
            type=_number_reader(read, expected),
            help=explanation,
        )

    def add_json(self) -> None:
        """The option --json."""
        self.add_argument(
            "--json", action="store_true", help="print one JSON object on standard output"
        )

    def print_help(self, file: IO[str] | None = None) -> NoReturn:  # type: ignore[override]
        """Raise HelpRequested with the text."""
        raise HelpRequested(self.format_help().rstrip())

    def error(self, message: str) -> NoReturn:
        """Raise InputError with the message, and with what was expected."""
        plain = message.replace(_GUARD, "")
        if plain.startswith("unrecognized arguments: "):
            plain += ': expected each word as one argument, in quotes: "1 -2 1"'
        raise InputError(plain.removeprefix("argument "))


def read_seconds(text: str) -> float:
    """Seconds, at least 0. Raises ValueError for anything else."""
    seconds = float(text)
    if not 0 <= seconds < math.inf:
        raise ValueError(text)
    return seconds


def read_word_argument(name: str, text: str) -> Braid:
    """The braid that an argument holds; ``-`` takes the word from standard input.

    Raises InputError, which names the argument, the offending token and what was expected.
    """
    try:
        return parse_word(read_standard_input(_LONGEST_INPUT) if text == "-" else text)
    except InputError as error:
        raise InputError(f"{name}: {error}") from None


def read_standard_input(longest: int) -> str:
    """All of standard input. Raises InputError for more than ``longest`` characters."""
    if sys.stdin is None:
        raise InputError("standard input: it is closed: expected text")
    try:
        text = sys.stdin.read(longest + 1)
    except UnicodeDecodeError:
        raise InputError("standard input: expected text in UTF-8") from None
    except OSError as error:
        raise InputError(f"standard input: {error.strerror}: expected text") from None
    if len(text) > longest:
        raise InputError(f"standard input: expected at most {longest} characters")
    return text


def _guarded(argument: str) -> str:
    return _GUARD + argument if _WORD_WITH_MINUS.match(argument) else argument


def _unguarded(argument: str) -> str:
    return argument.removeprefix(_GUARD)


def _number_reader(read: Callable[[str], object], expected: str) -> Callable[[str], object]:
    def read_number(argument: str) -> object:
        plain = _unguarded(argument)
        try:
            return None if plain == "none" else read(plain)
        except ValueError:
            raise argparse.ArgumentTypeError(f"{plain!r}: expected {expected}") from None

    return read_number
