"""Entries, classes and certificates as the actions on a ledger show them."""

from __future__ import annotations

import shlex
from argparse import Namespace
from collections.abc import Iterable, Sequence
from typing import TYPE_CHECKING, Any

from braidsearch.certificates import (
    braid_to_json,
    check_destination,
    format_certificate,
    write_certificate,
)
from braidsearch.certificates.explanation import count_of
from braidsearch.command_line.answer import Answer
from braidsearch.errors import InputError

if TYPE_CHECKING:
    from braidsearch.certificates import Certificate
    from braidsearch.ledger.reporting import Contradiction, OpenQuestion
    from braidsearch.ledger.store import StoredEntry

STATUS = {"same": 0, "different": 1, "undecided": 3}
OPEN, CONTRADICTED = 3, 1
MOST_MOVES = 12
MOST_LINES = 40

_MORE_NODES = 10
_MOST_NAMES = 5


def show_entry(entry: StoredEntry) -> str:
    """The name of an entry, with its source."""
    return f"{entry.name} ({entry.source})" if entry.source else entry.name


def show_entries(entries: Sequence[StoredEntry]) -> str:
    """The first names, and how many more there are."""
    shown = [show_entry(entry) for entry in entries[:_MOST_NAMES]]
    more = len(entries) - len(shown)
    return ", ".join(shown) + (f" and {more} more" if more else "")


def entry_to_json(entry: StoredEntry) -> dict[str, Any]:
    """An entry as --json prints it."""
    return {
        "number": entry.number,
        "name": entry.name,
        "source": entry.source,
        "note": entry.note,
        "given": entry.given,
        "remarks": list(entry.remarks),
        "braid": braid_to_json(entry.braid),
    }


def cut(lines: Sequence[str], is_whole: bool) -> list[str]:
    """The lines; of a long listing the first ones, and how many were left out."""
    if is_whole or len(lines) <= MOST_LINES:
        return list(lines)
    return [
        *lines[:MOST_LINES],
        f"  ... {plural(len(lines) - MOST_LINES, 'more line')} (--all shows them)",
    ]


def show_contradictions(contradictions: Iterable[Contradiction]) -> list[str]:
    """What contradicts what, to be read by everyone."""
    return [
        f"CONTRADICTION {one.number}: by proof {one.same} {show_entry(one.left)} and "
        f"{show_entry(one.right)} are one link, by {_show_difference(one)} they are not; the "
        "verifier accepts both, so that neither is to be believed: ledger export --certificates "
        "writes them out"
        for one in contradictions
    ]


def _show_difference(contradiction: Contradiction) -> str:
    if contradiction.different is None:
        return "the values of their classes"
    return f"proof {contradiction.different}"


def show_question(question: OpenQuestion) -> str:
    """An open question, with the limits that were tried."""
    between = f"{show_entry(question.left)} and {show_entry(question.right)}"
    if question.symmetry != "identity":
        between = f"{show_entry(question.left)} and the {question.symmetry} of "
        between += show_entry(question.right)
    return f"{between}: {show_tried(question)}: {question.reason}"


def show_tried(question: OpenQuestion) -> str:
    """The limits up to which an open question was tried."""
    tried = question.tried
    strands = "" if tried.max_strands is None else f", {count_of(tried.max_strands, 'strand')}"
    return f"tried with {count_of(tried.nodes, 'node')}{strands}"


def retry_command(ledger: str, questions: Sequence[OpenQuestion]) -> str:
    """The command that tries the open questions with more."""
    nodes = max(question.tried.nodes for question in questions)
    return f"braidsearch ledger sort {quoted(ledger)} --nodes {more_nodes(nodes)}"


def more_nodes(nodes: int) -> int:
    """The nodes to go on with, after so many did not do."""
    from braidsearch.ledger.ledger import DEFAULT_NODES  # noqa: PLC0415 - help comes faster

    return max(nodes * _MORE_NODES, DEFAULT_NODES)


def quoted(text: str) -> str:
    """A text as it may be typed in a shell."""
    return shlex.quote(text)


def plural(count: int, noun: str) -> str:
    """A count with its noun, of which the plural ends in s."""
    if noun.endswith("y"):
        return f"{count} {noun if count == 1 else noun[:-1] + 'ies'}"
    return f"{count} {noun}" + ("" if count == 1 else "es" if noun.endswith("ss") else "s")


# certificates


def check_output(given: Namespace) -> None:
    """Raise InputError for a certificate that cannot go where the options say."""
    if given.output == "-" and given.json:
        raise InputError("-o -: expected a file, since --json prints the certificate already")
    if given.output not in (None, "-"):
        check_destination(given.output)


def answer_with_certificate(
    status: int, lines: Sequence[str], certificate: Certificate | None, output: str | None
) -> Answer:
    """The answer in lines, the certificate written, printed, or neither."""
    if output == "-" and certificate is not None:
        report = [*lines, "certificate: on standard output"]
        return Answer(status, format_certificate(certificate).rstrip(), "\n".join(report))
    if output is None:
        said = "none" if certificate is None else "not written (add -o FILE)"
    elif certificate is None:
        said = f"none, so {quoted(output)} was not written"
    else:
        said = quoted(output)
    lines = [*lines, f"certificate: {said}"]
    if output is not None and certificate is not None:
        lines.append(f"check it: braidsearch verify {quoted(output)}")
    return Answer(status, "\n".join(lines))


def write_output(given: Namespace, certificate: Certificate | None) -> None:
    """Write the certificate to the file that the options name, if there are both."""
    if given.output not in (None, "-") and certificate is not None:
        write_certificate(certificate, given.output)
