"""braidsearch compare LEFT RIGHT: same link, different links, or undecided."""

from __future__ import annotations

from argparse import Namespace
from collections.abc import Sequence
from typing import TYPE_CHECKING

from braidsearch.certificates import (
    certificate_to_json,
    check_destination,
    format_certificate,
    write_certificate,
)
from braidsearch.command_line.answer import Answer, is_on_terminal, json_answer
from braidsearch.command_line.arguments import CommandParser
from braidsearch.command_line.compare_report import report_verdict
from braidsearch.command_line.link_input import (
    WORD_OR_DRAWING,
    is_standard_input,
    read_link_argument,
)
from braidsearch.command_line.progress import progress_line
from braidsearch.command_line.search_limits import add_limits, read_limits
from braidsearch.errors import BraidsearchError, InputError
from braidsearch.words import SYMMETRIES, Braid

if TYPE_CHECKING:
    from braidsearch.search.limits import SearchLimits
    from braidsearch.search.verdict import Verdict

UNDECIDED = 3
STATUS = {"same": 0, "different": 1, "undecided": UNDECIDED}

_DESCRIPTION = """Say whether the closures of two braids are the same oriented link.

The answer is "same link" with the moves that prove it, "different links" with an invariant that
differs, or "undecided" with what was tried: undecided is not different. A verdict is given only
after the independent verifier has accepted its certificate.

On a terminal the report is short and set to its width, and braidsearch explain shows a proof in
full; in a pipe or a file it is complete and plain. NO_COLOR takes the colour away."""

_EXAMPLES = """  braidsearch compare "1 1 1" "1 2 1 2"
  braidsearch compare "1 1 1" "-1 -1 -1" --up-to mirror
  braidsearch compare "4: 1 -2 1 -2" "s1 s2^-1 s1 s2^-1" --up-to any -o proof.json
  braidsearch compare "1 1 1" "1 2 1 2" -o - | braidsearch verify -

exit status: 0 same, 1 different, 3 undecided, 2 for a mistake in the input."""


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for what cannot be read or written."""
    given = _parser().read(arguments)
    if given.output == "-" and given.json:
        raise InputError("-o -: expected a file, since --json prints the certificate already")
    left, right = _read_braids(given)
    up_to, limits = _read_symmetries(given.up_to or []), read_limits(given)
    if given.output not in (None, "-"):
        check_destination(given.output)
    verdict = _compare(left, right, up_to, limits)
    return _answer_verdict(verdict, left, right, given, limits)


def _parser() -> CommandParser:
    parser = CommandParser("compare", _DESCRIPTION, _EXAMPLES)
    parser.add_word("left", WORD_OR_DRAWING)
    parser.add_word("right", WORD_OR_DRAWING)
    parser.add_text(
        "--up-to",
        metavar="SYMMETRIES",
        explanation="links that count as the same too: mirror,reverse,mirror-reverse or any",
        is_repeatable=True,
    )
    parser.add_text("-o", "--output", metavar="FILE", explanation="certificate file (-: print it)")
    parser.add_json()
    add_limits(parser)
    return parser


def _read_braids(given: Namespace) -> tuple[Braid, Braid]:
    if is_standard_input(given.left) and is_standard_input(given.right):
        raise InputError(
            f"RIGHT: {given.right}: expected a word, since LEFT reads standard input already"
        )
    return read_link_argument("LEFT", given.left), read_link_argument("RIGHT", given.right)


def _read_symmetries(values: Sequence[str]) -> tuple[str, ...]:
    """The symmetries asked for beside the identity, in the order of SYMMETRIES."""
    names = [name.strip() for value in values for name in value.split(",")]
    for name in names:
        if name not in (*SYMMETRIES, "any"):
            raise InputError(f"--up-to: {name!r}: expected any, or {', '.join(SYMMETRIES[1:])}")
    wanted = SYMMETRIES if "any" in names else names
    return tuple(symmetry for symmetry in SYMMETRIES[1:] if symmetry in wanted)


def _compare(left: Braid, right: Braid, up_to: Sequence[str], limits: SearchLimits) -> Verdict:
    line = progress_line()
    try:
        from braidsearch.search.driver import compare  # noqa: PLC0415 - help and mistakes come faster

        return compare(left, right, up_to=up_to, limits=limits, progress=line)
    except KeyboardInterrupt:  # outside the search, which has its own answer to it
        return _broken_off("interrupted")
    except MemoryError:
        return _broken_off("out of memory")
    except BraidsearchError as error:  # the words were read, so this is a bound that was met
        return _broken_off(str(error))
    finally:
        if line is not None:
            line.erase()


def _broken_off(ending: str) -> Verdict:
    """Undecided without a word on what was tried: it is lost with the search."""
    from braidsearch.search.verdict import Verdict  # noqa: PLC0415 - help and mistakes come faster

    explored = {"nodes": 0, "seconds": 0.0, "ending": ending, "tried": []}
    return Verdict("undecided", None, f"the search was broken off: {ending}", None, explored)


def _answer_verdict(
    verdict: Verdict, left: Braid, right: Braid, given: Namespace, limits: SearchLimits
) -> Answer:
    status, certificate = STATUS[verdict.outcome], verdict.certificate
    missing = ""
    if given.output is not None and certificate is None:
        missing = f"braidsearch compare: undecided, so no certificate was written to {given.output}"
    elif given.output not in (None, "-") and certificate is not None:
        write_certificate(certificate, given.output)
    if given.json:
        return json_answer(status, verdict_to_json(verdict), missing)
    if given.output != "-" and is_on_terminal():
        from braidsearch.command_line.compare_steps import Question  # noqa: PLC0415 - not for pipes
        from braidsearch.command_line.compare_summary import summarize_verdict  # noqa: PLC0415

        return Answer(status, summarize_verdict(verdict, Question(left, right, given, limits)))
    report = report_verdict(verdict, left, right, given.output)
    if given.output != "-":
        return Answer(status, report)
    text = "" if certificate is None else format_certificate(certificate).rstrip()
    return Answer(status, text, report)  # the certificate takes standard output


def verdict_to_json(verdict: Verdict) -> dict[str, object]:
    """The verdict as --json prints it."""
    certificate, explored = verdict.certificate, dict(verdict.explored)
    if verdict.image is not None:  # a symmetric image that was not asked for
        explored["image"] = certificate_to_json(verdict.image)
    return {
        "outcome": verdict.outcome,
        "symmetry": verdict.symmetry,
        "reason": verdict.reason,
        "certificate": None if certificate is None else certificate_to_json(certificate),
        "explored": explored,
    }
