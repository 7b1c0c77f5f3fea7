"""A ledger of every knot of the table, each entered four times: are the classes the knots?

Run: python -m benchmarks.ledger_knots [--crossings 12] [--every 1] [--nodes 2000]
     [--more-nodes 50000] [--processes 2] [--ledger FILE]

Each knot is entered as the word of the table, as two seeded scrambles of it (40 moves, up to two
more strands), and as the braid woven from the planar diagram code of the table. The code of a
knot that is not invertible may draw it in either direction, so that it may be the reverse; that
of a negative amphicheiral one as well its mirror image, which is then the reverse. So the classes
of oriented knots that must come out are: one for each knot that is invertible, one or two for
each of the others, and two of these are reverses of one another. Up to symmetry there must be one
group for each knot.

What is open after the first sorting is asked again with more nodes, as a user would.

Source of the words, codes and symmetry types: the package ``database-knotinfo`` (C. Livingston,
A. H. Moore, KnotInfo). Exits with status 1 when a class holds two knots, when an invertible knot
has two classes, when a group is not one knot, or when the check finds a fault.

Measured on two cores of a cloud machine, which little else used:

    entered: 11908, 7.3 s
    open after 572 s: 124
    sorted in 572 s, open ones again in 92 s, images in 436 s, checked in 36 s
    knots 2977, classes 2977, groups 2977
    proofs 15610, values 20839, faults 0
    undecided 0

So the classes are the knots; every code drew its knot in the direction of the word, or the knot is
invertible. With --crossings 10 all takes 37 s, and nothing is open after the first sorting.
"""

from __future__ import annotations

import argparse
import random
import sys
import tempfile
import time
from collections import defaultdict
from collections.abc import Iterator
from pathlib import Path

from braidsearch.diagrams.codes import parse_code
from braidsearch.ledger.executors import open_executor
from braidsearch.ledger.ledger import Ledger
from braidsearch.ledger.reading import Entry
from braidsearch.ledger.reporting import LedgerReport
from braidsearch.ledger.sorting import SortProgress
from braidsearch.weaving import weave
from braidsearch.words import SYMMETRIES, format_word
from tests.knot_tables import TableRow, iter_knots
from tests.scrambles import scramble

MOVES, MORE_STRANDS = 40, 2


def entries_of(row: TableRow) -> Iterator[Entry]:
    """The knot entered four times."""
    generator = random.Random(row.name)
    words = [("word", row.braid)]
    words += [
        (f"scramble {number}", scramble(row.braid, generator, MOVES, MORE_STRANDS))
        for number in (1, 2)
    ]
    diagram, notes = parse_code("planar-diagram", row.columns["pd_notation"])
    words.append(("diagram", weave(diagram, notes).braid))
    for source, braid in words:
        yield Entry(row.name, source, "", braid, format_word(braid))


def is_invertible(row: TableRow) -> bool:
    """Whether the table says that the knot is its own reverse."""
    kind = row.columns["symmetry_type"].strip()
    return kind in {"reversible", "fully amphicheiral", "fully amphichiral"}


def faults_of(report: LedgerReport, rows: dict[str, TableRow]) -> Iterator[str]:
    """Where classes and groups are not those of the table."""
    classes = defaultdict(set)
    for found in report.classes:
        names = {entry.name for entry in found.entries}
        if len(names) > 1:
            yield f"class {found.number} holds {', '.join(sorted(names))}"
        for name in names:
            classes[name].add(found.number)
    for name, row in rows.items():
        most = 1 if is_invertible(row) else 2
        if not 1 <= len(classes[name]) <= most:
            yield f"{name}: {len(classes[name])} classes, expected at most {most}"
    for group in report.groups:
        names = {name for name, numbers in classes.items() if numbers & set(group)}
        if len(names) > 1:
            yield f"a group holds {', '.join(sorted(names))}"
    if len(report.groups) != len(rows):
        yield f"{len(report.groups)} groups, expected {len(rows)}"


def tell(progress: SortProgress) -> None:
    """Progress in a line, on standard error."""
    print(
        f"\r{progress.doing}: {progress.done} of {progress.total}, {progress.classes} classes, "
        f"{progress.undecided} undecided   ",
        end="",
        file=sys.stderr,
    )


def main() -> int:
    """Enter, sort, check, compare with the table."""
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--crossings", type=int, default=12)
    parser.add_argument("--every", type=int, default=1)
    parser.add_argument("--nodes", type=int, default=2_000)
    parser.add_argument("--more-nodes", type=int, default=50_000)
    parser.add_argument("--processes", type=int, default=2)
    parser.add_argument("--ledger")
    options = parser.parse_args()
    chosen = list(iter_knots(options.crossings))[:: options.every]
    rows = {row.name: row for row in chosen}
    with tempfile.TemporaryDirectory() as folder:
        path = options.ledger or str(Path(folder) / "knots.ledger")
        with Ledger(path, create=True) as ledger:
            start = time.perf_counter()
            added = ledger.add(entry for row in chosen for entry in entries_of(row))
            print(f"entered: {added.added}, {time.perf_counter() - start:.1f} s")
            return sort_and_check(ledger, rows, options)


def sort_and_check(ledger: Ledger, rows: dict[str, TableRow], options: argparse.Namespace) -> int:
    """Sort and check, with the times of both; the exit status."""
    with open_executor(options.processes) as executor:
        start = time.perf_counter()
        ledger.sort(nodes=options.nodes, executor=executor, progress=tell)
        oriented = time.perf_counter() - start
        print(f"\nopen after {oriented:.0f} s: {len(ledger.report().open_questions)}")
        start = time.perf_counter()
        ledger.sort(nodes=options.more_nodes, executor=executor, progress=tell)
        again = time.perf_counter() - start
        start = time.perf_counter()
        ledger.sort(
            nodes=options.more_nodes, up_to=SYMMETRIES[1:], executor=executor, progress=tell
        )
        images = time.perf_counter() - start
        start = time.perf_counter()
        check = ledger.check(executor=executor)
        checked = time.perf_counter() - start
    print(
        f"\nsorted in {oriented:.0f} s, open ones again in {again:.0f} s, "
        f"images in {images:.0f} s, checked in {checked:.0f} s"
    )
    report = ledger.report()
    print(f"knots {len(rows)}, classes {len(report.classes)}, groups {len(report.groups)}")
    print(f"proofs {check.proofs}, values {check.values}, faults {len(check.faults)}")
    print(f"undecided {len(report.open_questions)}")
    for question in report.open_questions[:40]:
        print(f"  {question.left.title} and {question.right.title}, {question.symmetry}")
    faults = [*faults_of(report, rows), *check.faults]
    for fault in faults[:40]:
        print(f"  {fault}")
    return 1 if faults else 0


if __name__ == "__main__":
    sys.exit(main())
