"""braidsearch ledger add LEDGER FILE...: links from files, and proofs found elsewhere."""

from __future__ import annotations

import os
from argparse import Namespace
from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass, field
from itertools import islice
from typing import TYPE_CHECKING, Any

from braidsearch.certificates import read_certificate
from braidsearch.command_line.answer import SUCCESS, USAGE_ERROR, Answer, json_answer
from braidsearch.command_line.ledger.options import add_workers, ledger_parser, read_processes
from braidsearch.command_line.ledger.progress import Display, shown_progress
from braidsearch.command_line.ledger.showing import CONTRADICTED, plural, quoted
from braidsearch.errors import InputError

if TYPE_CHECKING:
    from concurrent.futures import Executor

    from braidsearch.certificates import Certificate
    from braidsearch.ledger.ledger import AddSummary, Ledger
    from braidsearch.ledger.reading import Entry, Problem, Reading, Row

_DESCRIPTION = """Enter the links in files into a ledger, which is made when there is none.

A file is a table (.csv, .tsv; columns name, source, note, link), JSON (.json, .jsonl), codes of
diagrams (.pd, .gauss, .dt), a polygon in space (.xyz), or one link a line, as "name = 1 -2 1".
Drawings are woven into closed braids. When anything in the files is mistaken, nothing is entered.
What is there already stays as it is, so that the same command may be given again.

A certificate among the files is a proof found elsewhere about links that are sorted already: once
the verifier has accepted it, it is kept as evidence, and joins classes where it says so."""

_EXAMPLES = """  braidsearch ledger add rings.ledger simulation.csv
  braidsearch ledger add rings.ledger table.jsonl --source "Table 3" --ignore-columns
  braidsearch ledger add rings.ledger codes.txt --notation pd --keep-good
  braidsearch ledger add rings.ledger proof.json

exit status: 0 all entered, 1 some rows left out (--keep-good) or a proof that contradicts the
ledger, 2 for a mistake in the input: nothing was entered."""

LEFT_OUT = 1

_CHUNK = 64  # rows of one task
_AHEAD = 32
_MANY_DRAWINGS = 200  # fewer are woven before another process has started
_CONTRADICTS = "it contradicts"


@dataclass
class _Contents:
    """What stands in the files: entries, mistakes, proofs with the files that they come from."""

    entries: list[Entry] = field(default_factory=list)
    problems: list[str] = field(default_factory=list)
    problem_count: int = 0
    repeated: int = 0
    proofs: list[tuple[str, Certificate]] = field(default_factory=list)


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for what cannot be read or written."""
    given = _parser().read(arguments)
    from braidsearch.ledger.ledger import Ledger  # noqa: PLC0415 - help comes faster

    processes = read_processes(given)
    _check_ledger(given.ledger)
    contents = _read_files(given, processes)
    is_new = not os.path.exists(given.ledger)
    if is_new and contents.proofs:
        file = contents.proofs[0][0]
        raise InputError(f"{file}: a certificate: expected a ledger that has its links")
    _take_out_conflicts(given.ledger, contents)
    if contents.problem_count and not given.keep_good:
        return _refuse(given, contents)
    with Ledger(given.ledger, create=True) as ledger:
        _check_proofs(ledger, contents.proofs)
        summary = ledger.add(contents.entries)
        recorded = [(file, ledger.record(proof)) for file, proof in contents.proofs]
    return _answer(given, contents, summary, recorded, is_new)


def _parser() -> Any:
    parser = ledger_parser("add", _DESCRIPTION, _EXAMPLES)
    parser.add_argument(
        "files", metavar="FILE", nargs="+", type=_plain, help="links, or a certificate"
    )
    parser.add_text("--source", metavar="NAME", explanation="source of links that name none")
    parser.add_text(
        "--notation",
        metavar="NAME",
        explanation="how links are written that do not say it: word, pd, gauss, dt or polygon",
    )
    for flag, explanation in (
        ("--ignore-columns", "leave out the columns that are none of a catalogue"),
        ("--keep-good", "enter what is right when other rows are mistaken"),
    ):
        parser.add_argument(flag, action="store_true", help=explanation)
    parser.add_json()
    add_workers(parser)
    return parser


def _plain(argument: str) -> str:
    return argument.replace("\0", "")  # marks what begins with a minus sign; no file's name has it


def _check_ledger(path: str) -> None:
    """Raise InputError for a ledger that cannot be used, before work is put into reading."""
    from braidsearch.ledger.ledger import Ledger  # noqa: PLC0415 - help comes faster

    if os.path.exists(path):
        Ledger(path, create=True).close()
    elif not os.path.isdir(os.path.dirname(os.path.abspath(path))):
        raise InputError(f"{path}: its folder does not exist: expected an existing one")


# reading


def _read_files(given: Namespace, processes: int | None) -> _Contents:
    from braidsearch.ledger.reading import (  # noqa: PLC0415 - help comes faster
        format_problems,
        is_certificate_file,
    )

    contents = _Contents()
    with shown_progress("braidsearch ledger add") as display:
        for file in given.files:
            try:
                if is_certificate_file(file):
                    contents.proofs.append((file, read_certificate(file)))
                    continue
                reading = _read_links(file, given, processes, display)
            except InputError as error:  # what makes all of the file unreadable
                contents.problems.append(str(error))
                contents.problem_count += 1
                continue
            contents.entries += reading.entries
            contents.problem_count += reading.problem_count
            contents.repeated += reading.repeated
            if reading.problems:
                contents.problems += format_problems(reading).splitlines()
    return contents


def _read_links(file: str, given: Namespace, processes: int | None, display: Display) -> Reading:
    from braidsearch.ledger.exporting import is_exported  # noqa: PLC0415 - help comes faster
    from braidsearch.ledger.reading import (  # noqa: PLC0415 - help comes faster
        Problem,
        gather_entries,
        iter_distinct,
        iter_rows,
    )
    from braidsearch.words.link_notation import WORD  # noqa: PLC0415 - the same

    rows = list(
        iter_rows(
            file,
            source=given.source,
            notation=given.notation,
            ignore_columns=given.ignore_columns or is_exported(file),
        )
    )
    drawings = sum(not isinstance(row, Problem) and row.notation != WORD for row in rows)
    scheduler = given.scheduler
    if drawings < _MANY_DRAWINGS:
        processes, scheduler = 1, None
    from braidsearch.ledger.executors import open_executor  # noqa: PLC0415 - help comes faster

    with open_executor(processes, scheduler) as executor:
        outcomes = _iter_outcomes(
            rows, executor, lambda done: display.tell("reading", done, len(rows))
        )
        return gather_entries(iter_distinct(outcomes))


def read_rows(rows: Sequence[Row | Problem]) -> list[Entry | Problem]:
    """The entries of some rows, or what is wrong with them, in order."""
    from braidsearch.ledger.reading import outcome_of  # noqa: PLC0415 - in another process

    return [outcome_of(row) for row in rows]


def _iter_outcomes(
    rows: Sequence[Row | Problem], executor: Executor, tell: Any
) -> Iterator[Entry | Problem]:
    """The outcomes in the order of the rows, a few chunks being worked on at a time."""
    chunks = iter([rows[start : start + _CHUNK] for start in range(0, len(rows), _CHUNK)])
    tasks = [executor.submit(read_rows, chunk) for chunk in islice(chunks, _AHEAD)]
    done = 0
    while tasks:
        outcomes = tasks.pop(0).result()
        tasks += [executor.submit(read_rows, chunk) for chunk in islice(chunks, 1)]
        yield from outcomes
        done += len(outcomes)
        tell(done)


def _take_out_conflicts(path: str, contents: _Contents) -> None:
    """Make mistakes of the entries whose names other links have."""
    from braidsearch.ledger.ledger import Ledger, find_conflicts  # noqa: PLC0415 - help comes faster
    from braidsearch.ledger.reading.values import PROBLEMS_SHOWN, place_of  # noqa: PLC0415 - late

    if os.path.exists(path):
        with Ledger(path, create=True) as ledger:
            conflicts = ledger.conflicts(contents.entries)
    else:
        conflicts = find_conflicts(contents.entries)
    wrong = {id(entry) for entry, _ in conflicts}
    contents.entries = [entry for entry in contents.entries if id(entry) not in wrong]
    contents.problem_count += len(conflicts)
    contents.problems += [f"{place_of(one)}: {said}" for one, said in conflicts[:PROBLEMS_SHOWN]]
    if len(conflicts) > PROBLEMS_SHOWN:
        contents.problems.append(f"and {len(conflicts) - PROBLEMS_SHOWN} more")


def _check_proofs(ledger: Ledger, proofs: Iterable[tuple[str, Certificate]]) -> None:
    for file, proof in proofs:
        try:
            ledger.check_recordable(proof)
        except InputError as error:
            raise InputError(f"{file}: {error}") from None


# answers


def _refuse(given: Namespace, contents: _Contents) -> Answer:
    """All mistakes, and that nothing was entered."""
    good = len(contents.entries)
    hint = f"; --keep-good enters the other {plural(good, 'link')}" * (good > 0)
    count = plural(contents.problem_count, "mistake")
    last = f"braidsearch ledger add: {count}: nothing was entered{hint}"
    lines = "\n".join([*map(_printable, contents.problems), last])
    if given.json:
        return json_answer(USAGE_ERROR, _to_json(contents, None, []), lines)
    return Answer(USAGE_ERROR, "", lines)


def _printable(line: str) -> str:
    return "".join(character if character.isprintable() else " " for character in line)


def _answer(
    given: Namespace,
    contents: _Contents,
    summary: AddSummary,
    recorded: list[tuple[str, str]],
    is_new: bool,
) -> Answer:
    is_contradicted = any(said.startswith(_CONTRADICTS) for _, said in recorded)
    status = CONTRADICTED if is_contradicted else SUCCESS
    status = LEFT_OUT if contents.problem_count else status
    left_out = [f"braidsearch ledger add: {plural(contents.problem_count, 'mistake')} left out"]
    hint = "\n".join([*map(_printable, contents.problems), *left_out] * (status == LEFT_OUT))
    if is_contradicted:
        hint += "\n" * bool(hint) + "braidsearch ledger add: CONTRADICTION: see ledger report"
    if given.json:
        return json_answer(status, _to_json(contents, summary, recorded), hint)
    lines = [f"new ledger: {given.ledger}"] if is_new else []
    if contents.entries or not recorded:
        lines.append(f"{summary.added} new, {summary.known} there already")
    if contents.repeated:
        lines.append(f"{plural(contents.repeated, 'row')} repeated in the files")
    if summary.doubled:
        lines.append(
            f"{summary.doubled} of the new ones: same name, same word in another source: expected "
            "--source with the name of before, if the file is the same"
        )
    lines += [f"{file}: {said}" for file, said in recorded]
    if summary.added:
        lines.append(f"next: braidsearch ledger sort {quoted(given.ledger)}")
    return Answer(status, "\n".join(lines), hint)


def _to_json(
    contents: _Contents, summary: AddSummary | None, recorded: list[tuple[str, str]]
) -> dict[str, Any]:
    return {
        "added": summary.added if summary else 0,
        "known": summary.known if summary else 0,
        "doubled": summary.doubled if summary else 0,
        "repeated": contents.repeated,
        "mistakes": contents.problem_count,
        "problems": contents.problems,
        "recorded": [{"file": file, "outcome": said} for file, said in recorded],
    }
