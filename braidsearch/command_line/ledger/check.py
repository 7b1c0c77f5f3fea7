"""braidsearch ledger check LEDGER: verify everything that a ledger rests on."""

from __future__ import annotations

from collections.abc import Sequence
from concurrent.futures import BrokenExecutor, CancelledError
from typing import Any

from braidsearch.command_line.answer import SUCCESS, Answer, json_answer
from braidsearch.command_line.ledger.options import add_workers, ledger_parser, read_processes
from braidsearch.command_line.ledger.progress import shown_progress
from braidsearch.command_line.ledger.showing import plural
from braidsearch.errors import InputError

FAULTY = 1

_DESCRIPTION = """Verify everything that the classes of a ledger rest on, with the independent
verifier: each proof, each value by which classes are told apart, that every class hangs together,
that every two classes are told apart or listed as open, and that the file itself is intact."""

_EXAMPLES = """  braidsearch ledger check rings.ledger
  braidsearch ledger check rings.ledger --processes 2 --json

exit status: 0 everything holds, 1 with faults, 2 for a mistake in the input."""

_FEW = 1_000  # proofs and classes that are checked before other processes have started


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for what cannot be read."""
    parser = ledger_parser("check", _DESCRIPTION, _EXAMPLES)
    parser.add_json()
    add_workers(parser)
    given = parser.read(arguments)
    from braidsearch.ledger.executors import open_executor  # noqa: PLC0415 - help comes faster
    from braidsearch.ledger.ledger import Ledger  # noqa: PLC0415 - the same

    processes = read_processes(given)
    with Ledger(given.ledger) as ledger:
        size = ledger.store.count("evidence") + ledger.store.count("classes")
        if processes is None and given.scheduler is None and size < _FEW:
            processes = 1
        try:
            with (
                open_executor(processes, given.scheduler) as executor,
                shown_progress("braidsearch ledger check") as display,
            ):
                report = ledger.check(
                    executor=executor,
                    progress=lambda done, total: display.tell("checking", done, total),
                )
        except (BrokenExecutor, CancelledError) as error:
            raise InputError(
                f"{given.ledger}: a worker has ended ({type(error).__name__}): expected it to stay"
            ) from None
    status = SUCCESS if report.valid else FAULTY
    if given.json:
        return json_answer(status, _to_json(report))
    return Answer(status, "\n".join(_lines(report)))


def _to_json(report: Any) -> dict[str, Any]:
    return {
        "valid": report.valid,
        "proofs": report.proofs,
        "values": report.values,
        "classes": report.classes,
        "unsorted": report.unsorted,
        "faults": list(report.faults),
    }


def _lines(report: Any) -> list[str]:
    looked = ", ".join(
        plural(count, noun)
        for count, noun in (
            (report.proofs, "proof"),
            (report.values, "value"),
            (report.classes, "class"),
        )
    )
    headline = "valid: everything holds" if report.valid else f"{len(report.faults)} FAULTS"
    if len(report.faults) == 1:
        headline = "1 FAULT"
    lines = [headline, *(f"  {fault}" for fault in report.faults), f"checked: {looked}"]
    if report.unsorted:
        lines.append(
            f"not sorted yet: {plural(report.unsorted, 'entry')}, of which nothing is said"
        )
    return lines
