"""braidsearch ledger find LEDGER LINK: the class of a link, or what it differs from and how."""

from __future__ import annotations

from argparse import Namespace
from collections.abc import Sequence
from typing import TYPE_CHECKING, Any

from braidsearch.certificates import certificate_to_json
from braidsearch.certificates.display import show_value
from braidsearch.certificates.explanation import describe_evidence, explain_certificate
from braidsearch.command_line.answer import Answer, json_answer
from braidsearch.command_line.ledger.options import add_nodes, ledger_parser, read_nodes
from braidsearch.command_line.ledger.showing import (
    MOST_MOVES,
    STATUS,
    answer_with_certificate,
    check_output,
    entry_to_json,
    more_nodes,
    plural,
    quoted,
    show_entries,
    show_entry,
    write_output,
)
from braidsearch.command_line.link_input import INPUTS, WORD_OR_DRAWING, read_link_argument
from braidsearch.errors import InputError

if TYPE_CHECKING:
    from braidsearch.ledger.finding import Comparison, Found
    from braidsearch.ledger.ledger import Ledger
    from braidsearch.ledger.store import StoredEntry
    from braidsearch.words import Braid

_DESCRIPTION = f"""Say which class of a ledger a link belongs to, with the moves that lead to its
first entry; or that it is none of them, with what it differs from and how. Nothing is entered.

{INPUTS}"""

_EXAMPLES = """  braidsearch ledger find rings.ledger "1 2 1 2"
  braidsearch ledger find rings.ledger "pd: @ring.pd" -o proof.json
  braidsearch ledger find rings.ledger "1 -2 1 -2" --nodes 20000 --json

exit status: 0 the link of a class, 1 different from all, 3 undecided, 2 for a mistake in the
input."""


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for what cannot be read or written."""
    given = _parser().read(arguments)
    check_output(given)
    nodes = read_nodes(given)
    from braidsearch.ledger.ledger import Ledger  # noqa: PLC0415 - help comes faster
    from braidsearch.ledger.soundness import blaming_damage  # noqa: PLC0415 - the same

    with Ledger(given.ledger) as ledger, blaming_damage(ledger.store):
        _check_sorted(ledger, given.ledger)
        found = ledger.find(_read_link(ledger, given.link), nodes=nodes)
        entries = _entries_of(ledger, found)
    return _answer(given, found, entries)


def _parser() -> Any:
    parser = ledger_parser("find", _DESCRIPTION, _EXAMPLES)
    parser.add_word("link", WORD_OR_DRAWING)
    parser.add_text("-o", "--output", metavar="FILE", explanation="certificate file (-: print it)")
    add_nodes(parser)
    parser.add_json()
    return parser


def _check_sorted(ledger: Ledger, path: str) -> None:
    if ledger.store.one("SELECT 1 FROM classes LIMIT 1") is not None:
        return
    if ledger.store.one("SELECT 1 FROM entries LIMIT 1") is None:
        raise InputError(f"{path}: it has no entries: expected ledger add before")
    raise InputError(f"{path}: nothing in it is sorted: expected ledger sort before")


def _read_link(ledger: Ledger, text: str) -> Braid:
    """The link that is meant. Raises InputError, which says so of the name of an entry."""
    try:
        return read_link_argument("LINK", text)
    except InputError:
        if not ledger.store.entries("name = ?", [text], 1):
            raise
    raise InputError(
        f"LINK: {text!r}: an entry of the ledger: expected a braid word or a drawing; "
        "of an entry, ledger report --class tells what is known"
    )


def _entries_of(ledger: Ledger, found: Found) -> list[StoredEntry]:
    """The entries of the class that the link was found in."""
    if found.outcome != "same":
        return []
    return ledger.store.entries("forms.class = ?", [found.comparisons[0].class_number])


def _answer(given: Namespace, found: Found, entries: Sequence[StoredEntry]) -> Answer:
    status = STATUS[found.outcome]
    certificate = found.comparisons[0].certificate if found.comparisons else None
    if found.outcome == "undecided":
        certificate = None
    write_output(given, certificate)
    warning = ""
    if found.unsorted:
        count = plural(found.unsorted, "entry") + (" is" if found.unsorted == 1 else " are")
        warning = (
            f"braidsearch ledger find: warning: {count} not sorted yet and not asked: "
            f"braidsearch ledger sort {quoted(given.ledger)}"
        )
    if given.json:
        return json_answer(status, _to_json(found, entries), warning)
    lines = _REPORTS[found.outcome](given, found, entries)
    answer = answer_with_certificate(status, lines, certificate, given.output)
    hint = "\n".join(part for part in (warning, answer.hint) if part)
    return Answer(answer.status, answer.text, hint)


def _report_same(given: Namespace, found: Found, entries: Sequence[StoredEntry]) -> list[str]:
    (one,) = found.comparisons
    lines = [
        f"same link: class {one.class_number}, of {plural(len(entries), 'entry')}",
        f"entries: {show_entries(entries)}",
        f"found by: {one.reason}",
    ]
    return lines + _explained(one)


def _report_different(given: Namespace, found: Found, entries: Sequence[StoredEntry]) -> list[str]:
    of_what = "sorted so far" if found.unsorted else "of the ledger"
    lines = [f"new link: different from all {plural(found.classes, 'class')} {of_what}"]
    lines += _funnel(found)
    for one in found.comparisons:
        lines += _values(one)
    return lines + (_explained(found.comparisons[0]) if found.comparisons else [])


def _report_undecided(given: Namespace, found: Found, entries: Sequence[StoredEntry]) -> list[str]:
    open_ones = [one for one in found.comparisons if one.outcome == "undecided"]
    lines = [
        "undecided: neither sameness with a class nor difference from all was proven",
        f"classes: {found.classes}, of which {len(open_ones)} may be this link",
    ]
    for one in open_ones:
        lines += [f"class {one.class_number}, {show_entry(one.entry)}: {one.reason}"]
    lines += [
        f"told apart: class {one.class_number}, {show_entry(one.entry)}: {one.reason}"
        for one in found.comparisons
        if one.outcome == "different"
    ]
    ledger, link = quoted(given.ledger), quoted(given.link)
    more = more_nodes(read_nodes(given))
    lines.append(f"to go on: braidsearch ledger find {ledger} {link} --nodes {more}")
    word = quoted(_typed(open_ones[0].entry))
    return [*lines, f"  or: braidsearch compare {link} {word} --seconds 600 --nodes none"]


def _typed(entry: StoredEntry) -> str:
    from braidsearch.words import format_word  # noqa: PLC0415 - for this answer alone

    return format_word(entry.braid)


_REPORTS = {
    "same": _report_same,
    "different": _report_different,
    "undecided": _report_undecided,
}


def _funnel(found: Found) -> list[str]:
    """How many classes are left when all values up to an invariant must be those of the link."""
    from braidsearch.invariants import TITLES  # noqa: PLC0415 - for this answer alone

    lines = [f"classes that agree, of {found.classes}:"] if found.remaining else []
    for place, (name, count) in enumerate(found.remaining):
        words = "in the" if place == 0 else "and in the"
        lines.append(f"  {words} {TITLES.get(name, name)}: {count or 'none'}")
        if count == 0:
            break
    return lines


def _explained(one: Comparison) -> list[str]:
    if one.certificate is None:
        return []
    names = f"LEFT is LINK, RIGHT is {show_entry(one.entry)}"
    explained = explain_certificate(one.certificate, most_moves=MOST_MOVES)
    return [f"proof: {names}", *explained.splitlines()]


def _values(one: Comparison) -> list[str]:
    """A class that is near, with the value by which it differs."""
    head = f"not class {one.class_number}, {show_entry(one.entry)}"
    if one.certificate is None:
        return [f"{head}: {one.reason}"]
    (item,) = one.certificate.distinctions
    parameters = dict(item.parameters)
    mine, theirs = (
        show_value(item.invariant, side, parameters) for side in (item.left, item.right)
    )
    return [
        f"{head}, by the {describe_evidence(item.invariant, parameters)}:",
        f"  LINK:  {mine}",
        f"  class: {theirs}",
    ]


def _to_json(found: Found, entries: Sequence[StoredEntry]) -> dict[str, Any]:
    is_same = found.outcome == "same"
    return {
        "outcome": found.outcome,
        "class": found.comparisons[0].class_number if is_same else None,
        "entries": [entry_to_json(entry) for entry in entries],
        "classes": found.classes,
        "unsorted": found.unsorted,
        "remaining": [{"invariant": name, "classes": count} for name, count in found.remaining],
        "compared": [_comparison_to_json(one) for one in found.comparisons],
    }


def _comparison_to_json(one: Comparison) -> dict[str, Any]:
    certificate = one.certificate
    return {
        "class": one.class_number,
        "entry": entry_to_json(one.entry),
        "outcome": one.outcome,
        "reason": one.reason,
        "certificate": None if certificate is None else certificate_to_json(certificate),
    }
