"""braidsearch ledger proof LEDGER A B: the evidence about two entries as one certificate."""

from __future__ import annotations

from collections.abc import Sequence
from typing import TYPE_CHECKING, Any

from braidsearch.certificates import certificate_to_json
from braidsearch.certificates.explanation import IMAGES, explain_certificate
from braidsearch.command_line.answer import Answer, json_answer
from braidsearch.command_line.ledger.options import add_symmetries, ledger_parser, read_symmetries
from braidsearch.command_line.ledger.showing import (
    MOST_MOVES,
    STATUS,
    answer_with_certificate,
    check_output,
    plural,
    quoted,
    retry_command,
    show_entry,
    show_tried,
    write_output,
)

if TYPE_CHECKING:
    from braidsearch.ledger.ledger import Proof
    from braidsearch.ledger.store import StoredEntry

_DESCRIPTION = """Join the evidence in a ledger into one certificate about two entries: the moves
from the one to the other, or an invariant or a theorem that tells them apart. Nothing is searched
for. An entry is named by its name, by source/name, or by # and its number."""

_EXAMPLES = """  braidsearch ledger proof rings.ledger ring-17 gel-04
  braidsearch ledger proof rings.ledger simulation.csv/ring-17 "#4" --up-to any -o proof.json

exit status: 0 same, 1 different, 3 undecided, 2 for a mistake in the input."""


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for what cannot be read or written."""
    given = _parser().read(arguments)
    from braidsearch.ledger.ledger import Ledger  # noqa: PLC0415 - help comes faster
    from braidsearch.ledger.soundness import blaming_damage  # noqa: PLC0415 - the same

    check_output(given)
    up_to = read_symmetries(given.up_to)
    with Ledger(given.ledger) as ledger, blaming_damage(ledger.store):
        one, other = ledger.entry(given.left), ledger.entry(given.right)
        proof = ledger.proof(one, other, up_to=up_to)
    write_output(given, proof.certificate)
    status = STATUS[proof.outcome]
    if given.json:
        return json_answer(status, _to_json(proof))
    lines = _report(proof, one, other, given.ledger)
    return answer_with_certificate(status, lines, proof.certificate, given.output)


def _parser() -> Any:
    parser = ledger_parser("proof", _DESCRIPTION, _EXAMPLES)
    parser.add_text("left", metavar="A", explanation="an entry")
    parser.add_text("right", metavar="B", explanation="another entry")
    add_symmetries(parser, "images that count as the same too")
    parser.add_text("-o", "--output", metavar="FILE", explanation="certificate file (-: print it)")
    parser.add_json()
    return parser


def _report(proof: Proof, one: StoredEntry, other: StoredEntry, ledger: str) -> list[str]:
    lines = [_headline(proof), f"LEFT is {show_entry(one)}, RIGHT is {show_entry(other)}"]
    if proof.certificate is not None:
        return lines + explain_certificate(proof.certificate, most_moves=MOST_MOVES).splitlines()
    question = proof.question
    if question is None:
        return [*lines, f"to go on: braidsearch ledger sort {quoted(ledger)} --up-to any"]
    tried = f"{show_tried(question)}: {question.reason}"
    return [*lines, tried, f"to go on: {retry_command(ledger, [question])}"]


def _headline(proof: Proof) -> str:
    if proof.outcome == "same":
        if proof.symmetry == "identity":
            return "same link: LEFT and RIGHT close to the same oriented link"
        image = IMAGES[proof.symmetry or "identity"]
        return f"same link up to symmetry: the closure of LEFT is {image} of RIGHT"
    if proof.outcome == "different":
        return "different links: LEFT and RIGHT close to different oriented links"
    return "undecided: the ledger holds no proof of sameness or difference"


def _to_json(proof: Proof) -> dict[str, Any]:
    certificate, question = proof.certificate, proof.question
    return {
        "outcome": proof.outcome,
        "symmetry": proof.symmetry,
        "reason": _reason(proof),
        "certificate": None if certificate is None else certificate_to_json(certificate),
        "tried": None
        if question is None
        else {"nodes": question.tried.nodes, "max_strands": question.tried.max_strands},
    }


def _reason(proof: Proof) -> str:
    if proof.certificate is None:
        return "no evidence" if proof.question is None else proof.question.reason
    if proof.outcome == "same":
        return plural(len(proof.certificate.moves), "move")
    names = dict.fromkeys(item.invariant for item in proof.certificate.distinctions)
    return ", ".join(names)
