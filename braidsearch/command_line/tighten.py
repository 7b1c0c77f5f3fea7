"""braidsearch tighten WORD: the fewest strands, then the fewest letters, that a search reaches."""

from __future__ import annotations

from argparse import Namespace
from collections.abc import Sequence
from typing import TYPE_CHECKING, Any

from braidsearch.certificates import (
    braid_to_json,
    certificate_to_json,
    check_destination,
    explain_certificate,
    write_certificate,
)
from braidsearch.certificates.explanation import count_of
from braidsearch.command_line.answer import SUCCESS, Answer, json_answer
from braidsearch.command_line.arguments import CommandParser
from braidsearch.command_line.link_input import WORD_OR_DRAWING, read_link_argument
from braidsearch.command_line.progress import progress_line
from braidsearch.command_line.search_limits import add_limits, read_limits
from braidsearch.words import Braid, format_word

if TYPE_CHECKING:
    from braidsearch.search.tighten import Tightening

_DESCRIPTION = """Print a word on the fewest strands, and then with the fewest letters, that the
search reaches for the same oriented link, with the certificate from the word to the result.

The lower bound on strands is that of the Morton-Franks-Williams inequality, from the HOMFLY-PT
polynomial: "minimal" is said only where the strands reached meet it."""

_EXAMPLES = """  braidsearch tighten "4: 3 3 -2 3 -2 -1 -1 -1 2 -1 2"
  braidsearch tighten "1 1 1 2 -3" -o tight.json --seconds 10"""

_MOST_MOVES = 12


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for what cannot be read or written."""
    parser = CommandParser("tighten", _DESCRIPTION, _EXAMPLES)
    parser.add_word("word", WORD_OR_DRAWING)
    parser.add_text("-o", "--output", metavar="FILE", explanation="certificate file")
    parser.add_json()
    add_limits(parser)
    given = parser.read(arguments)
    braid, limits = read_link_argument("WORD", given.word), read_limits(given)
    if given.output is not None:
        check_destination(given.output)
    line = progress_line()
    try:
        from braidsearch.search.tighten import tighten  # noqa: PLC0415 - help and mistakes come faster

        found = tighten(braid, limits=limits, progress=line)
    finally:
        if line is not None:
            line.erase()
    if given.output is not None:
        write_certificate(found.certificate, given.output)
    if given.json:
        return json_answer(SUCCESS, _to_json(found))
    return Answer(SUCCESS, _report(braid, found, given))


def _to_json(found: Tightening) -> dict[str, Any]:
    return {
        "braid": braid_to_json(found.braid),
        "certificate": certificate_to_json(found.certificate),
        "lower_bound": found.lower_bound,
        "minimal": found.is_minimal,
        "explored": dict(found.explored),
    }


def _report(braid: Braid, found: Tightening, given: Namespace) -> str:
    explored = found.explored
    spent = f"{explored['nodes']} nodes"
    written = given.output or "not written (add -o FILE; then: braidsearch verify FILE)"
    return "\n".join(
        [
            f"tightened: {format_word(found.braid)}",
            f"from: {_size(braid)}",
            f"to: {_size(found.braid)}",
            f"strands: {_bound(found)}",
            f"explored: {spent}, ending: {explored['ending']}",
            explain_certificate(found.certificate, most_moves=_MOST_MOVES),
            f"certificate: {written}",
        ]
    )


def _size(braid: Braid) -> str:
    return f"{count_of(braid.strands, 'strand')}, {count_of(len(braid), 'letter')}"


def _bound(found: Tightening) -> str:
    if found.lower_bound is None:
        return "not shown minimal (the HOMFLY-PT polynomial is out of reach)"
    theorem = "by the Morton-Franks-Williams inequality"
    if found.is_minimal:
        return f"minimal, {theorem}"
    return f"not shown minimal: at least {found.lower_bound} {theorem}"
