"""braidsearch ledger ACTION: a catalogue of links that keeps the evidence for every decision."""

from __future__ import annotations

from collections.abc import Sequence
from importlib import import_module

from braidsearch.command_line.answer import SUCCESS, USAGE_ERROR, Answer
from braidsearch.command_line.choices import list_choices, unknown_choice
from braidsearch.errors import InputError

ACTIONS: dict[str, str] = {
    "add": "enter links from files, and proofs found elsewhere",
    "sort": "put every entry into the class of its link, with proofs",
    "find": "the class of a link, or what it differs from and how",
    "proof": "what the evidence says of two entries, joined into one certificate",
    "report": "the classes with their entries, what is open, what is contradictory",
    "export": "entries with their classes as a table or JSON lines, proofs as files",
    "check": "verify everything that the ledger rests on",
}
"""Each action and its summary; the action NAME is ``answer`` in the file NAME.py here."""

_HELP = """usage: braidsearch ledger ACTION LEDGER ...

Keep a catalogue of links in one file. Entries are sorted into classes, one for each oriented link.
For every two braids in one class there is a chain of moves, and for every two classes a value or a
theorem that tells them apart; what was not decided is listed as open. Each proof is accepted by the
independent verifier before it is kept, and is kept in the file.

actions:
{actions}

examples:
  braidsearch ledger add rings.ledger simulation.csv microscope.json
  braidsearch ledger sort rings.ledger
  braidsearch ledger find rings.ledger "1 2 1 2"
  braidsearch ledger report rings.ledger
  braidsearch ledger proof rings.ledger ring-17 gel-04 -o proof.json
  braidsearch ledger export rings.ledger --csv classes.csv --certificates proofs
  braidsearch ledger check rings.ledger

braidsearch ledger ACTION --help tells more of an action. A ledger may be stopped at any moment:
what was kept stays, and the same command goes on from there.
exit status: 0 done; find and proof 0 same, 1 different, 3 undecided; sort 3 with open questions;
sort, report and check 1 for contradictions and faults; all: 2 for a mistake in the input."""


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for what cannot be read or written."""
    action = arguments[0] if arguments else "--help"
    if action in ("-h", "--help", "help"):
        text = _help_text()
        return Answer(SUCCESS, text) if arguments else Answer(USAGE_ERROR, "", text)
    if action not in ACTIONS:
        raise InputError(unknown_choice(action, "an action", ACTIONS))
    module = import_module(f"braidsearch.command_line.ledger.{action}")
    answer: Answer = module.answer(arguments[1:])
    return answer


def _help_text() -> str:
    return _HELP.format(actions=list_choices(ACTIONS))
