"""A ledger whose making is killed at random moments and begun again, against an undisturbed one.

Run: python -m benchmarks.ledger_kill [--braids 600] [--crossings 7] [--kills 20] [--seed 7]

Random braids (3 to 6 strands, 6 to 20 letters), and knots of the package ``database-knotinfo``
(C. Livingston, A. H. Moore, KnotInfo), each as its word and as a scramble of it, are entered and
sorted up to symmetry by the commands of the command line. Every kill ends one command, with one
process or with two in turn, at a moment drawn at random from its whole time; what it has started
must end by itself. Then both commands are given again. The ledger must have the very rows, with
their numbers, of one that was not disturbed. Exit status 1 where one differs.

Measured on two cores that three to seven other processes shared; the last three kills were measured
in a run of their own, with the same moments:

    undisturbed, processes 1: 628 links, 227 classes, 1012 proofs,
      add 1.9 s, sort 47.0 s
    undisturbed, processes 2: 628 links, 227 classes, 1012 proofs,
      add 3.1 s, sort 60.8 s
    kill  processes  command  at second  braids placed  proofs  goes on for  result
       1          1  sort         13.94            388     256          83.0  identical
       2          2  sort          6.57              0       0          81.4  identical
       3          1  sort         29.94            864     639          56.8  identical
       4          2  sort          1.56              0       0          73.4  identical
       5          1  sort         24.31            388     256          62.3  identical
       6          2  sort         20.30              0       0          44.2  identical
       7          1  sort          0.94              0       0          34.2  identical
       8          2  sort         29.35            864     774          37.7  identical
       9          1  add           1.83              0       0          42.0  identical
      10          2  sort         24.64            388     256          55.8  identical
      11          1  sort          1.52              0       0          52.3  identical
      12          2  sort          2.73              0       0          52.6  identical
      13          1  sort         18.87            864     639          27.5  identical
      14          2  sort         49.76            864    1012           3.3  identical
      15          1  sort          4.16              0       0          34.0  identical
      16          2  sort         11.19              0       0          60.8  identical
      17          1  sort         28.79            864     639          49.1  identical
      18          2  sort         57.46            864     870          34.4  identical
      19          1  sort         26.32            864     870          15.7  identical
      20          2  sort         22.25            388     256          38.4  identical
"""

import argparse
import random
import shutil
import sys
import tempfile
import time
from dataclasses import dataclass
from pathlib import Path

from braidsearch.ledger.reading import Entry
from tests.knot_tables import iter_knots
from tests.ledger.robustness.ledgers import (
    count_rows,
    entry,
    is_intact,
    ledger_text,
    random_braid,
    write_table,
)
from tests.ledger.robustness.processes import finish, kill_after, start
from tests.scrambles import scramble

TITLES = "kill  processes  command  at second  braids placed  proofs  goes on for  result"


@dataclass(frozen=True)
class Kill:
    """One killed command and what came of it: the rows it left, and the seconds after it."""

    processes: int
    action: str
    moment: float
    placed: int
    proofs: int
    seconds: float
    is_identical: bool

    def line(self, number: int) -> str:
        """A line of the table."""
        result = "identical" if self.is_identical else "DIFFERENT"
        return (
            f"{number:4d}  {self.processes:9d}  {self.action:7s}  {self.moment:9.2f}  "
            f"{self.placed:13d}  {self.proofs:6d}  {self.seconds:12.1f}  {result}"
        )


def entries_of(braids: int, crossings: int, seed: int) -> list[Entry]:
    """The links to be entered, in an order that is drawn at random as well."""
    generator = random.Random(seed)
    found = [
        entry(f"drawn {place}", random_braid(generator, (3, 6), (6, 20))) for place in range(braids)
    ]
    for row in iter_knots(crossings):
        found.append(entry(row.name, row.braid, "table"))
        found.append(entry(row.name, scramble(row.braid, generator, 40, 2), "scrambled"))
    generator.shuffle(found)
    return found


@dataclass(frozen=True)
class Making:
    """The two commands that make a ledger of the links in a table."""

    path: Path
    table: Path
    processes: int

    @property
    def add(self) -> tuple[str, ...]:
        """The arguments of the command that enters the links."""
        return ("add", str(self.path), str(self.table), "--processes", str(self.processes))

    @property
    def sort(self) -> tuple[str, ...]:
        """The arguments of the command that sorts them."""
        return ("sort", str(self.path), "--up-to", "any", "--processes", str(self.processes))

    def complete(self) -> list[float]:
        """Give both commands; the seconds that each takes."""
        taken = []
        for arguments in (self.add, self.sort):
            begin = time.perf_counter()
            outcome = finish(start(*arguments), patience=None)
            if outcome.status not in {0, 3}:
                raise RuntimeError(f"{' '.join(arguments)}: {outcome.errors}")
            taken.append(time.perf_counter() - begin)
        return taken

    def rows(self) -> tuple[int, int]:
        """The braids placed and the proofs that are there; none while there are no tables."""
        path = self.path
        if not path.exists() or not count_rows(path, "sqlite_master"):
            return 0, 0
        return count_rows(path, "placed"), count_rows(path, "evidence")


def kill_once(making: Making, times: list[float], moment: float, text: str) -> Kill:
    """Kill what is under way at a moment of both commands' time, and give both again."""
    action = "add" if moment < times[0] else "sort"
    if action == "add":
        kill_after(start(*making.add), moment)
    else:
        finish(start(*making.add), patience=None)
        moment -= times[0]
        kill_after(start(*making.sort), moment)
    placed, proofs = making.rows()
    seconds = sum(making.complete())
    is_identical = is_intact(making.path) and ledger_text(making.path) == text
    return Kill(making.processes, action, moment, placed, proofs, seconds, is_identical)


def measure(folder: Path, given: argparse.Namespace) -> bool:
    """Print the table of all kills; whether every ledger came out as it should."""
    entries = entries_of(given.braids, given.crossings, given.seed)
    table = write_table(folder / "links.csv", entries)
    times, texts = {}, set()
    for processes in (1, 2):
        path = folder / f"undisturbed {processes}"
        times[processes] = Making(path, table, processes).complete()
        texts.add(ledger_text(path))
        print(
            f"undisturbed, processes {processes}: {len(entries)} links, "
            f"{count_rows(path, 'classes')} classes, {count_rows(path, 'evidence')} proofs, "
            f"add {times[processes][0]:.1f} s, sort {times[processes][1]:.1f} s"
        )
    if len(texts) > 1:
        print("one process and two make DIFFERENT ledgers")
        return False
    (text,) = texts
    generator = random.Random(given.seed)
    results = []
    print(TITLES)
    for number in range(1, given.kills + 1):
        processes = 2 - number % 2
        making = Making(folder / f"killed {number}", table, processes)
        moment = generator.uniform(0, sum(times[processes]))
        results.append(kill_once(making, times[processes], moment, text))
        print(results[-1].line(number), flush=True)
        making.path.unlink()
    return all(result.is_identical for result in results)


def main() -> None:
    """Make the ledgers in a folder that is removed afterwards."""
    parser = argparse.ArgumentParser(description=(__doc__ or "").splitlines()[0])
    parser.add_argument("--braids", type=int, default=600)
    parser.add_argument("--crossings", type=int, default=7)
    parser.add_argument("--kills", type=int, default=20)
    parser.add_argument("--seed", type=int, default=7)
    given = parser.parse_args()
    folder = Path(tempfile.mkdtemp())
    try:
        is_well = measure(folder, given)
    finally:
        shutil.rmtree(folder)
    sys.exit(0 if is_well else 1)


if __name__ == "__main__":
    main()
