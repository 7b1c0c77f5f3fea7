"""braidsearch symmetry WORD: which symmetric images of a closed braid are the same link again."""

from __future__ import annotations

import os
from argparse import Namespace
from collections.abc import Mapping, Sequence
from typing import TYPE_CHECKING

from braidsearch.certificates import check_destination, explain_certificate, write_certificate
from braidsearch.command_line.answer import Answer, json_answer
from braidsearch.command_line.arguments import CommandParser
from braidsearch.command_line.compare import UNDECIDED, verdict_to_json
from braidsearch.command_line.link_input import WORD_OR_DRAWING, read_link_argument
from braidsearch.command_line.progress import progress_line
from braidsearch.command_line.search_limits import add_limits, read_limits
from braidsearch.words import SYMMETRIES

if TYPE_CHECKING:
    from braidsearch.search.verdict import Verdict

_DESCRIPTION = """Say which symmetric images of the closure of a braid are the same oriented link:
its mirror image, its reverse (every component reversed), its reversed mirror image.

Each answer has a certificate of its own, with WORD on both sides: moves where the image is the
same link, an invariant that differs where it is not. With -o the three are written beside each
other: -o proof.json gives proof.mirror.json, proof.reverse.json and proof.mirror-reverse.json."""

_EXAMPLES = """  braidsearch symmetry "1 -2 1 -2"
  braidsearch symmetry "1 1 1" -o trefoil.json

exit status: 0 all three decided, 3 one or more undecided, 2 for a mistake in the input."""

_MOST_MOVES = 6
_ANSWERS = {
    ("mirror", "same"): "the same link as its mirror image",
    ("mirror", "different"): "not its mirror image",
    ("reverse", "same"): "the same link as its reverse",
    ("reverse", "different"): "not its reverse",
    ("mirror-reverse", "same"): "the same link as its reversed mirror image",
    ("mirror-reverse", "different"): "not its reversed mirror image",
}


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for what cannot be read or written."""
    given = _parser().read(arguments)
    braid, limits = read_link_argument("WORD", given.word), read_limits(given)
    paths = {} if given.output is None else _paths(given.output)
    for path in paths.values():
        check_destination(path)
    line = progress_line()
    try:
        from braidsearch.search.symmetries import find_symmetries  # noqa: PLC0415 - help comes faster

        verdicts = find_symmetries(braid, limits=limits, progress=line)
    finally:
        if line is not None:
            line.erase()
    for symmetry, path in paths.items():
        certificate = verdicts[symmetry].certificate
        if certificate is not None:
            write_certificate(certificate, path)
    outcomes = [verdict.outcome for verdict in verdicts.values()]
    status = UNDECIDED if "undecided" in outcomes else 0
    if given.json:
        found = {symmetry: verdict_to_json(verdict) for symmetry, verdict in verdicts.items()}
        return json_answer(status, found)
    return Answer(status, _report(verdicts, paths, given))


def _parser() -> CommandParser:
    parser = CommandParser("symmetry", _DESCRIPTION, _EXAMPLES)
    parser.add_word("word", WORD_OR_DRAWING)
    parser.add_text(
        "-o", "--output", metavar="FILE", explanation="certificate files, named after it"
    )
    parser.add_json()
    add_limits(parser)
    return parser


def _paths(output: str) -> dict[str, str]:
    """Where each certificate goes: the symmetry's name stands before the ending of the name."""
    stem, ending = os.path.splitext(output)
    return {symmetry: f"{stem}.{symmetry}{ending}" for symmetry in SYMMETRIES[1:]}


def _report(verdicts: Mapping[str, Verdict], paths: Mapping[str, str], given: Namespace) -> str:
    lines = [f"symmetry: {describe_type(verdicts)}"]
    for symmetry, verdict in verdicts.items():
        said = _ANSWERS.get((symmetry, verdict.outcome), "undecided (which is not different)")
        lines += [f"{symmetry}: {said}", f"  reason: {verdict.reason}"]
        if verdict.certificate is None:
            lines += [f"  tried: {item}" for item in verdict.explored["tried"]]
            lines += [f"  to go on: {item}" for item in verdict.suggestions]
            continue
        explained = explain_certificate(verdict.certificate, most_moves=_MOST_MOVES)
        lines += ["  " + line for line in explained.splitlines()]
        if symmetry in paths:
            lines.append(f"  certificate: {paths[symmetry]}")
    if given.output is None:
        lines.append("certificates: not written (add -o FILE; then: braidsearch verify FILE)")
    return "\n".join(lines)


def describe_type(verdicts: Mapping[str, Verdict]) -> str:
    """The type of symmetry in the words of the tables of knots, as far as it is decided."""
    outcomes = {symmetry: verdict.outcome for symmetry, verdict in verdicts.items()}
    same = [symmetry for symmetry, outcome in outcomes.items() if outcome == "same"]
    if len(same) > 1:  # two of the symmetries generate the third
        return "fully amphicheiral (all three images are the same link)"
    if "undecided" in outcomes.values():
        return "not decided in full"
    return {
        (): "chiral and not invertible (no image is the same link)",
        ("mirror",): "positive amphicheiral (the mirror image alone is the same link)",
        ("reverse",): "chiral and invertible (the reverse alone is the same link)",
        ("mirror-reverse",): "negative amphicheiral (the reversed mirror image alone is the same)",
    }[tuple(same)]
