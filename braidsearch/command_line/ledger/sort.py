"""braidsearch ledger sort LEDGER: every entry into the class of its link, with proofs."""

from __future__ import annotations

import time
from argparse import Namespace
from collections.abc import Sequence
from concurrent.futures import BrokenExecutor, CancelledError
from typing import TYPE_CHECKING, Any

from braidsearch.command_line.answer import INTERRUPTED, SUCCESS, Answer, json_answer
from braidsearch.command_line.ledger.options import (
    add_nodes,
    add_symmetries,
    add_workers,
    ledger_parser,
    read_nodes,
    read_processes,
    read_symmetries,
)
from braidsearch.command_line.ledger.progress import shown_progress
from braidsearch.command_line.ledger.showing import CONTRADICTED, OPEN, more_nodes, plural, quoted
from braidsearch.errors import InputError

if TYPE_CHECKING:
    from braidsearch.ledger.ledger import Ledger
    from braidsearch.ledger.sorting import SortProgress, SortSummary

_DESCRIPTION = """Put every entry into the class of its oriented link. Entries of one class are
joined by moves, classes are told apart by invariants, and each proof is kept once the independent
verifier has accepted it. What the limits leave open is listed, and is tried again first when the
limits are higher. Limits are counted, never timed: the same entries make the same ledger.

Ctrl-C ends a sorting, and so may anything else: all that was sorted before is kept, and the same
command goes on from there."""

_EXAMPLES = """  braidsearch ledger sort rings.ledger
  braidsearch ledger sort rings.ledger --nodes 20000 --processes 2
  braidsearch ledger sort rings.ledger --up-to any
  braidsearch ledger sort rings.ledger --scheduler tcp://127.0.0.1:8786

exit status: 0 all decided, 3 with open questions left, 1 with contradictions, 2 for a mistake in
the input, 130 when interrupted."""

_FEW = 100  # braids that are sorted before other processes have started


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for what cannot be read or written."""
    given = _parser().read(arguments)
    from braidsearch.ledger.ledger import Ledger  # noqa: PLC0415 - help comes faster

    limits = {"nodes": read_nodes(given), "max_strands": getattr(given, "max_strands", None)}
    processes, up_to = read_processes(given), read_symmetries(given.up_to)
    with Ledger(given.ledger) as ledger:
        begin = time.monotonic()
        try:
            summary = _sort(ledger, given, processes, up_to, limits)
        except KeyboardInterrupt:
            return _interrupted(ledger)
        return _answer(ledger, given, summary, time.monotonic() - begin)


def _parser() -> Any:
    parser = ledger_parser("sort", _DESCRIPTION, _EXAMPLES)
    add_symmetries(parser, "look for classes that are such images of each other too")
    add_nodes(parser)
    parser.add_number(
        "--max-strands",
        int,
        "a count or none",
        "most strands of a class on the way (two more than the larger word has)",
    )
    parser.add_json()
    add_workers(parser)
    return parser


def _sort(
    ledger: Ledger,
    given: Namespace,
    processes: int | None,
    up_to: Sequence[str],
    limits: dict[str, Any],
) -> SortSummary:
    from braidsearch.ledger.executors import open_executor  # noqa: PLC0415 - help comes faster

    store = ledger.store
    is_little = not up_to and store.count_unsorted() < _FEW and store.count("undecided") < 2
    if is_little and processes is None and given.scheduler is None:
        processes = 1
    try:
        with (
            open_executor(processes, given.scheduler) as executor,
            shown_progress("braidsearch ledger sort") as display,
        ):

            def show(progress: SortProgress) -> None:
                detail = f"{plural(progress.classes, 'class')}, {progress.undecided} open"
                display.tell(progress.doing, progress.done, progress.total, detail)

            return ledger.sort(**limits, up_to=up_to, executor=executor, progress=show)
    except (BrokenExecutor, CancelledError) as error:
        raise InputError(
            f"{given.ledger}: a worker has ended ({type(error).__name__}), all that was sorted "
            "before is kept: expected it to stay: run the command again to go on"
        ) from None


def _interrupted(ledger: Ledger) -> Answer:
    total = ledger.store.count("braids", "id IN (SELECT braid FROM entries)")
    done = total - ledger.store.count_unsorted()
    said = f"{done} of {plural(total, 'braid')} sorted, all kept: run the command again to go on"
    return Answer(INTERRUPTED, "", f"braidsearch ledger sort: interrupted: {said}")


def _answer(ledger: Ledger, given: Namespace, summary: SortSummary, seconds: float) -> Answer:
    store = ledger.store
    open_count, contradictions = store.count("undecided"), store.count("contradictions")
    counts = {
        "entries": store.count("entries"),
        "classes": store.count("classes"),
        "groups": _count_groups(ledger),
        "open_questions": open_count,
        "contradictions": contradictions,
    }
    status = CONTRADICTED if contradictions else OPEN if open_count else SUCCESS
    hint = (
        f"braidsearch ledger sort: {plural(contradictions, 'CONTRADICTION')}: proofs that cannot "
        "all be true: see braidsearch ledger report"
    ) * (contradictions > 0)
    if given.json:
        done = {
            "placed": summary.placed,
            "retried": summary.retried,
            "settled": summary.settled,
            "seconds": round(seconds, 3),
        }
        return json_answer(status, done | counts, hint)
    lines = _report(given, summary, counts, seconds)
    return Answer(status, "\n".join(lines), hint)


def _count_groups(ledger: Ledger) -> int | None:
    """The groups up to symmetry; None where nobody has looked for images yet."""
    from braidsearch.ledger.groups import group_classes  # noqa: PLC0415 - help comes faster

    if ledger.store.one("SELECT 1 FROM imaged") is None:
        return None
    return len(group_classes(ledger.store))


def _report(
    given: Namespace, summary: SortSummary, counts: dict[str, int | None], seconds: float
) -> list[str]:
    ledger = quoted(given.ledger)
    rate = f", {summary.placed / seconds:.0f} a second" if summary.placed and seconds else ""
    groups = counts["groups"]
    lines = [
        f"sorted: {plural(summary.placed, 'braid')} in {seconds:.1f} s{rate}",
        f"entries: {counts['entries']}",
        f"classes: {counts['classes']} oriented links",
    ]
    if groups is not None:
        lines.append(f"groups: {groups} up to mirror images and reverses, as far as asked")
    if summary.retried:
        lines.append(
            f"tried again: {plural(summary.retried, 'question')}, {summary.settled} settled"
        )
    lines.append(f"open questions: {counts['open_questions'] or 'none'}")
    lines.append(f"contradictions: {counts['contradictions'] or 'none'}")
    if counts["open_questions"]:
        more = more_nodes(read_nodes(given))
        lines.append(f"to go on: braidsearch ledger sort {ledger} --nodes {more}")
    lines.append(f"next: braidsearch ledger report {ledger}")
    return lines
