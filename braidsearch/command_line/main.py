"""The console command: find the command, run it, print its answer, map it to the exit status."""

from __future__ import annotations

import sys
from collections.abc import Sequence
from importlib import import_module
from typing import NoReturn

from braidsearch.command_line.answer import (
    INTERRUPTED,
    SUCCESS,
    USAGE_ERROR,
    Answer,
    deliver,
    one_line,
    print_error,
)
from braidsearch.command_line.arguments import HelpRequested
from braidsearch.command_line.choices import list_choices, unknown_choice
from braidsearch.errors import BraidsearchError, InputError

COMMANDS: dict[str, str] = {
    "compare": "say whether two closed braids are the same link, with a certificate",
    "verify": "replay a certificate",
    "explain": "a proof in words, step by step, as text or as LaTeX",
    "weave": "a closed braid for a drawing or a curve in space",
    "tighten": "fewest strands, then fewest letters, for the same link",
    "symmetry": "which mirror images and reverses of a link are the same link again",
    "normalise": "reduced word, left normal form and conjugacy summit of a braid",
    "invariants": "invariants of the closure of a braid",
    "ledger": "a catalogue of links that keeps the evidence for every decision",
    "draw": "the picture of a braid, of its closure, or of a proof",
}
"""Each command and its summary; the command NAME is ``answer`` in the file NAME.py here."""

_HELP = """usage: braidsearch COMMAND ...

Decide whether two closed braids are the same link, and hand over a proof that anyone can check.

commands:
{commands}

A braid is a word of signed integers in quotes, +i for sigma_i (a positive crossing) and -i for
its inverse, with the strand count in front where it is more than the word needs:
"1 -2 1 -2", "4: 1 -2 1 -2", "s1 s2^-1". A lone - reads the word from standard input. Drawings are
read wherever a braid is: "pd: [[1,5,2,4],...]", "gauss: ...", "dt: 4 6 2", "polygon: FILE".

examples:
  braidsearch compare "1 1 1" "1 2 1 2" -o proof.json
  braidsearch verify proof.json
  braidsearch invariants "1 -2 1 -2"

braidsearch COMMAND --help tells more of a command; braidsearch --version prints the version.
exit status: compare 0 same, 1 different, 3 undecided; symmetry 0 decided, 3 undecided; verify
0 valid, 1 rejected; all: 2 for a mistake in the input."""


def run() -> NoReturn:
    """The entry point of the console command: ends the process with the exit status."""
    sys.exit(main(sys.argv[1:]))


def main(arguments: Sequence[str]) -> int:
    """Carry out the command line and return the exit status; no exception leaves here."""
    try:
        return deliver(_answer(arguments))
    except HelpRequested as help_requested:
        return deliver(Answer(SUCCESS, str(help_requested)))
    except BraidsearchError as error:
        return _fail(arguments, str(error))
    except KeyboardInterrupt:
        print_error(f"{_name(arguments)}: interrupted")
        return INTERRUPTED
    except MemoryError:
        return _fail(arguments, "out of memory: expected a smaller input")
    except Exception as error:  # a defect: one line for the user, with the place for the report
        return _fail(arguments, _describe_defect(error))


def _answer(arguments: Sequence[str]) -> Answer:
    command = arguments[0] if arguments else "--help"
    if command in ("-h", "--help", "help"):
        text = _help_text()
        return Answer(SUCCESS, text) if arguments else Answer(USAGE_ERROR, "", text)
    if command == "--version":
        from braidsearch import __version__  # noqa: PLC0415 - reads the package's metadata

        return Answer(SUCCESS, f"braidsearch {__version__}")
    if command not in COMMANDS:
        raise InputError(unknown_choice(command, "a command", COMMANDS))
    module = import_module(f"braidsearch.command_line.{command}")
    answer: Answer = module.answer(arguments[1:])
    return answer


def _help_text() -> str:
    return _HELP.format(commands=list_choices(COMMANDS))


def _fail(arguments: Sequence[str], message: str) -> int:
    print_error(one_line(f"{_name(arguments)}: {message}"))
    return USAGE_ERROR


def _name(arguments: Sequence[str]) -> str:
    """The command that messages begin with, with the action on a ledger if it is one."""
    words = ["braidsearch", *arguments[:1]]
    if words[1:] == ["ledger"]:
        from braidsearch.command_line.ledger import ACTIONS  # noqa: PLC0415 - only for messages

        words += [word for word in arguments[1:2] if word in ACTIONS]
    return " ".join(words)


def _describe_defect(error: Exception) -> str:
    import traceback  # noqa: PLC0415 - only for a defect

    place = traceback.extract_tb(error.__traceback__)[-1]
    file = place.filename.replace("\\", "/").rsplit("/", 1)[-1]
    where = f"{type(error).__name__} in {file}, line {place.lineno}"
    return f"internal error, please report it with the command: {where}: {error}"
