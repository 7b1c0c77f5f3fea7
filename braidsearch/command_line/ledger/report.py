"""braidsearch ledger report LEDGER: the classes, what is open, what is contradictory."""

from __future__ import annotations

from argparse import Namespace
from collections.abc import Sequence
from dataclasses import replace
from typing import TYPE_CHECKING, Any

from braidsearch.certificates import braid_to_json
from braidsearch.command_line.answer import SUCCESS, Answer, json_answer
from braidsearch.command_line.ledger.listing import list_classes, list_groups, list_one_class
from braidsearch.command_line.ledger.options import add_symmetries, ledger_parser, read_symmetries
from braidsearch.command_line.ledger.showing import (
    CONTRADICTED,
    cut,
    entry_to_json,
    plural,
    quoted,
    retry_command,
    show_contradictions,
    show_question,
)
from braidsearch.errors import InputError
from braidsearch.words import SYMMETRIES

if TYPE_CHECKING:
    from braidsearch.ledger.ledger import Ledger
    from braidsearch.ledger.reporting import LedgerReport, OpenQuestion

_DESCRIPTION = """Show what a ledger holds: how many classes; those with more than one entry, with
the moves by which each entry is joined to the first; what is open, with the limits tried; and
contradictions, if there are any. Long listings are cut unless --all is given.

--up-to shows classes that are images of each other together, as far as ledger sort --up-to has
looked. --class shows one class with its invariants."""

_EXAMPLES = """  braidsearch ledger report rings.ledger
  braidsearch ledger report rings.ledger --up-to any
  braidsearch ledger report rings.ledger --class gel-04
  braidsearch ledger report rings.ledger --json --all

exit status: 0, 1 with contradictions, 2 for a mistake in the input."""


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for what cannot be read."""
    given = _parser().read(arguments)
    from braidsearch.ledger.ledger import Ledger  # noqa: PLC0415 - help comes faster
    from braidsearch.ledger.soundness import blaming_damage  # noqa: PLC0415 - the same

    asked = read_symmetries(given.up_to)
    with Ledger(given.ledger) as ledger, blaming_damage(ledger.store):
        report = ledger.report(asked or SYMMETRIES[1:])
        wanted = _asked_class(given)
        if wanted is not None:
            report = _of_one_class(ledger, report, wanted)
        status = CONTRADICTED if report.contradictions else SUCCESS
        count = len(report.contradictions)
        hint = f"braidsearch ledger report: {plural(count, 'CONTRADICTION')}" * (count > 0)
        if given.json:
            return json_answer(status, _to_json(report), hint)
        lines = _lines(ledger, given, report, asked)
    return Answer(status, "\n".join(lines), hint)


def _parser() -> Any:
    parser = ledger_parser("report", _DESCRIPTION, _EXAMPLES)
    add_symmetries(parser, "show such images together")
    parser.add_text(
        "--class", metavar="CLASS", explanation="one class: its number, or one of its entries"
    )
    parser.add_argument("--all", action="store_true", help="list everything, also single entries")
    parser.add_json()
    return parser


def _asked_class(given: Namespace) -> str | None:
    value: str | None = getattr(given, "class")
    return value


def _of_one_class(ledger: Ledger, report: LedgerReport, reference: str) -> LedgerReport:
    """The report on one class alone."""
    number = _class_number(ledger, report, reference)
    return replace(
        report,
        classes=tuple(one for one in report.classes if one.number == number),
        groups=tuple(group for group in report.groups if number in group),
        open_questions=tuple(
            question
            for question in report.open_questions
            if number in (question.left.class_number, question.right.class_number)
        ),
    )


def _class_number(ledger: Ledger, report: LedgerReport, reference: str) -> int:
    if reference.isdecimal() and int(reference) in {one.number for one in report.classes}:
        return int(reference)
    try:
        entry = ledger.entry(reference)
    except InputError as error:
        raise InputError(f"--class: {error}, or the number of a class") from None
    if entry.class_number is None:
        raise InputError(f"--class: {reference}: not sorted yet: expected ledger sort before")
    return entry.class_number


def _lines(
    ledger: Ledger, given: Namespace, report: LedgerReport, asked: Sequence[str]
) -> list[str]:
    lines = show_contradictions(report.contradictions)
    is_one = _asked_class(given) is not None
    if not is_one:
        lines += _totals(ledger, given, report, asked)
    if is_one:
        lines += cut(list_one_class(ledger, report.classes[0]), given.all)
    elif not asked:
        lines += cut(list_classes(ledger, report.classes, is_whole=given.all), given.all)
    if asked or any(len(group) > 1 for group in report.groups):
        lines += cut(list_groups(ledger, report.groups, is_whole=given.all), given.all)
    if report.open_questions:
        lines.append(f"open questions: {len(report.open_questions)}")
        questions = [f"  {show_question(question)}" for question in report.open_questions]
        lines += cut(questions, given.all)
        lines.append(f"to try them again: {retry_command(given.ledger, report.open_questions)}")
    return lines


def _totals(
    ledger: Ledger, given: Namespace, report: LedgerReport, asked: Sequence[str]
) -> list[str]:
    entries = sum(len(one.entries) for one in report.classes)
    many = sum(len(one.entries) > 1 for one in report.classes)
    lines = [
        f"entries: {entries + report.unsorted}",
        f"classes: {plural(len(report.classes), 'oriented link')}, {many} with more than one entry",
        f"groups: {_groups(ledger, given, report, asked)}",
        f"proofs: {report.proofs}",
    ]
    if report.unsorted:
        lines.insert(1, f"not sorted yet: {report.unsorted}: {_sort_command(given.ledger)}")
    if not report.open_questions:
        lines.append("open questions: none")
    lines.append(f"contradictions: {len(report.contradictions) or 'none'}")
    return lines


def _groups(ledger: Ledger, given: Namespace, report: LedgerReport, asked: Sequence[str]) -> str:
    """How many groups there are, and how many classes were not asked for all these images."""
    wanted = asked or SYMMETRIES[1:]
    marks = ", ".join("?" * len(wanted))
    waiting = ledger.store.one(
        "SELECT count(*) FROM classes WHERE (SELECT count(*) FROM imaged "
        f"WHERE imaged.form = classes.form AND symmetry IN ({marks})) < ?",
        [*wanted, len(wanted)],
    )
    up_to = f"up to {', '.join(asked)}" if asked else "up to mirror images and reverses"
    count = f"{len(report.groups)} {up_to}"
    if not waiting:
        return count
    command = f"{_sort_command(given.ledger)} --up-to {','.join(asked) or 'any'}"
    return f"{count}, so far; {plural(waiting, 'class')} not asked for all: {command}"


def _sort_command(ledger: str) -> str:
    return f"braidsearch ledger sort {quoted(ledger)}"


def _to_json(report: LedgerReport) -> dict[str, Any]:
    return {
        "entries": sum(len(one.entries) for one in report.classes) + report.unsorted,
        "unsorted": report.unsorted,
        "proofs": report.proofs,
        "classes": [
            {
                "number": one.number,
                "form": braid_to_json(one.form),
                "entries": [entry_to_json(entry) for entry in one.entries],
            }
            for one in report.classes
        ],
        "groups": [list(group) for group in report.groups],
        "open_questions": [_question_to_json(question) for question in report.open_questions],
        "contradictions": [
            {
                "number": one.number,
                "same": one.same,
                "different": one.different,
                "left": entry_to_json(one.left),
                "right": entry_to_json(one.right),
            }
            for one in report.contradictions
        ],
    }


def _question_to_json(question: OpenQuestion) -> dict[str, Any]:
    return {
        "left": entry_to_json(question.left),
        "right": entry_to_json(question.right),
        "symmetry": question.symmetry,
        "tried": {"nodes": question.tried.nodes, "max_strands": question.tried.max_strands},
        "reason": question.reason,
    }
