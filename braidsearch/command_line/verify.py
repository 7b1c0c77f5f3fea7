"""braidsearch verify FILE: replay a certificate with the independent verifier."""

from __future__ import annotations

import sys
from argparse import Namespace
from collections.abc import Sequence

from braidsearch.command_line.answer import Answer, is_on_terminal, json_answer, one_line
from braidsearch.command_line.arguments import CommandParser, read_word_argument
from braidsearch.errors import InputError
from braidsearch.verifier import Report, verify_text
from braidsearch.verifier.verify import MAX_FILE_BYTES

STATUS = {"valid": 0, "rejected": 1, "unreadable": 2}

_DESCRIPTION = """Replay a certificate: every move is checked, every invariant computed again, by
other methods than the search has. The file that does it, braidsearch/verifier/verify.py, needs
nothing but Python and can be read and run alone: python -I verify.py FILE.

--left and --right bind the claim: a certificate about other braids than these is rejected."""

_EXAMPLES = """  braidsearch verify proof.json
  braidsearch verify proof.json --left "1 1 1" --right "1 2 1 2"
  braidsearch compare "1 1 1" "1 2 1 2" -o - | braidsearch verify - --json

exit status: 0 valid, 1 rejected, 2 for a file that cannot be read or a mistake in the input."""


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for what cannot be read."""
    parser = CommandParser("verify", _DESCRIPTION, _EXAMPLES)
    parser.add_text("file", metavar="FILE", explanation="a certificate (-: standard input)")
    parser.add_text("--left", metavar="WORD", explanation="the left braid that must be claimed")
    parser.add_text("--right", metavar="WORD", explanation="the right braid that must be claimed")
    parser.add_json()
    given = parser.read(arguments)
    report = _verify(given)
    status, unreadable = STATUS[report.status], report.status == "unreadable"
    hint = one_line(f"braidsearch verify: {given.file}: {report.reason}") if unreadable else ""
    if given.json:
        keys = {"valid": report.valid, "claim": report.claim, "reason": report.reason}
        return json_answer(status, keys, hint)
    if unreadable:
        return Answer(status, "", hint)
    if is_on_terminal():
        return Answer(status, _set_out(report))
    return Answer(status, f"{report.status}\nclaim: {report.claim}\nreason: {report.reason}")


def _set_out(report: Report) -> str:
    from braidsearch.command_line.terminal import read_terminal  # noqa: PLC0415 - not for pipes

    terminal = read_terminal()
    lines = terminal.headline(report.status, report.status, report.claim)
    return "\n".join([*lines, "", *terminal.item("reason", report.reason)])


def _verify(given: Namespace) -> Report:
    left, right = _binding("--left", given.left), _binding("--right", given.right)
    try:
        return verify_text(_read_bytes(given.file), left, right)
    except OSError as error:
        return Report("unreadable", "", f"{error.strerror}: expected a certificate file")


def _read_bytes(file: str) -> bytes:
    """The content, with one byte more than allowed where it is too long."""
    if file != "-":
        with open(file, "rb") as opened:
            return opened.read(MAX_FILE_BYTES + 1)
    if sys.stdin is None:
        raise InputError("standard input: it is closed: expected a certificate")
    return sys.stdin.buffer.read(MAX_FILE_BYTES + 1)


def _binding(name: str, text: str | None) -> tuple[int, tuple[int, ...]] | None:
    if text is None:
        return None
    braid = read_word_argument(name, text)
    return braid.strands, braid.word
