"""braidsearch ledger export LEDGER: entries as a table or JSON lines, proofs as files."""

from __future__ import annotations

from argparse import Namespace
from collections.abc import Sequence
from typing import Any

from braidsearch.command_line.answer import SUCCESS, Answer
from braidsearch.command_line.ledger.options import ledger_parser
from braidsearch.command_line.ledger.showing import plural, quoted
from braidsearch.errors import InputError

_DESCRIPTION = """Write a ledger out. --csv and --json-lines give all entries with name, source,
note, braid word, the link as it was entered, the number and the name of its class, the word that
represents it, and the number of its group up to mirror images and reverses. Both can be added to
another ledger again. --certificates gives a folder with a file for each proof and an index.

Files appear whole or not at all, and the same ledger gives the same files."""

_EXAMPLES = """  braidsearch ledger export rings.ledger --csv classes.csv
  braidsearch ledger export rings.ledger --json-lines - | head
  braidsearch ledger export rings.ledger --certificates proofs"""

_TEXTS = ("csv", "json_lines")


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for what cannot be read or written."""
    given = _parser().read(arguments)
    from braidsearch.ledger import exporting  # noqa: PLC0415 - help comes faster
    from braidsearch.ledger.ledger import Ledger  # noqa: PLC0415 - the same
    from braidsearch.ledger.soundness import blaming_damage  # noqa: PLC0415 - the same

    _check_choices(given)
    for path in (given.csv, given.json_lines):
        if path not in (None, "-"):
            exporting.check_output(path)
    if given.certificates is not None:
        exporting.check_proofs_folder(given.certificates)
    with Ledger(given.ledger) as ledger, blaming_damage(ledger.store), ledger.store.reading():
        entries = list(exporting.iter_exported(ledger.store))
        makers = {"csv": exporting.iter_table_lines, "json_lines": exporting.iter_json_lines}
        text, written = _write_texts(given, {name: make(entries) for name, make in makers.items()})
        said = [f"{quoted(path)}: {plural(len(entries), 'entry')}" for path in written]
        if given.certificates is not None:
            count = exporting.write_proofs(ledger.store, given.certificates)
            said.append(f"{quoted(given.certificates)}: {plural(count, 'proof')}")
    if text is None:
        return Answer(SUCCESS, "\n".join(said))
    return Answer(SUCCESS, text, "\n".join(said))


def _parser() -> Any:
    parser = ledger_parser("export", _DESCRIPTION, _EXAMPLES)
    parser.add_text("--csv", metavar="FILE", explanation="a table of all entries (-: print it)")
    parser.add_text(
        "--json-lines", metavar="FILE", explanation="an object a line for all entries (-: print it)"
    )
    parser.add_text("--certificates", metavar="FOLDER", explanation="all proofs as files")
    return parser


def _check_choices(given: Namespace) -> None:
    if given.csv is given.json_lines is given.certificates is None:
        raise InputError("nothing to write: expected --csv, --json-lines or --certificates")
    if given.csv == given.json_lines == "-":
        raise InputError("--json-lines: '-': expected a file, since --csv prints already")
    if given.certificates == "-":
        raise InputError("--certificates: '-': expected the name of a folder")


def _write_texts(given: Namespace, made: dict[str, Any]) -> tuple[str | None, list[str]]:
    """What is to be printed, None where nothing is; and what was written where."""
    from braidsearch.ledger.exporting import write_lines  # noqa: PLC0415 - help comes faster

    printed: str | None = None
    written: list[str] = []
    for name in _TEXTS:
        path = getattr(given, name)
        if path == "-":
            printed = "".join(made[name]).rstrip("\n")
        elif path is not None:
            write_lines(path, made[name])
            written.append(path)
    return printed, written
