"""A ledger of random braids: how fast it sorts from beginning to end, and how fast it finds.

Run: python -m benchmarks.ledger_random [--entries 100000] [--processes 2] [--finds 200]
     [--ledger FILE]

Seeded random words on 3 to 6 strands, of 6 to 20 letters. The rate is printed for each tenth of
the sorting; memory is the most that the process and its workers held at one time, from the
operating system. ``find`` is asked for longer random words, of 22 to 30 letters, as a command from
start to exit: status 1 says that the invariants told the link from every class. Exits with status
1 when a tenth is sorted below 300 entries a second, when memory reaches 2 GiB, or when the median
find that the invariants decide takes 0.5 s.

Measured on two quiet cores of a cloud machine, compilation of all loops included:

    entered in 4.8 s
      10240 entries,   1603 classes,    2 undecided:   317 a second
      20480 entries,   2613 classes,    8 undecided:   450 a second
      30720 entries,   3424 classes,   12 undecided:   440 a second
      40960 entries,   4159 classes,   17 undecided:   396 a second
      51200 entries,   4785 classes,   22 undecided:   369 a second
      61440 entries,   5374 classes,   31 undecided:   319 a second
      71680 entries,   5917 classes,   37 undecided:   385 a second
      81920 entries,   6464 classes,   46 undecided:   309 a second
      92160 entries,   6986 classes,   55 undecided:   370 a second
    sorted in 276 s
    memory at most 1207 MiB, file 117 MiB

Finds there: of 64 links that were different from every class, 63 were told so by their
fingerprints, median 0.36 s, at most 0.47 s; one took 1.65 s, since a search and colourings had to
decide it. With one process and with two, 24,000 entries were sorted in 100 s and in 56 s.
"""

from __future__ import annotations

import argparse
import random
import resource
import statistics
import subprocess
import sys
import tempfile
import time
from collections.abc import Iterator
from pathlib import Path

from braidsearch.ledger.executors import open_executor
from braidsearch.ledger.ledger import Ledger
from braidsearch.ledger.reading import Entry
from braidsearch.ledger.sorting import SortProgress
from braidsearch.words import Braid, format_word

LEAST_RATE = 300
MOST_MEMORY = 2 << 30
MOST_SECONDS = 0.5


def random_braid(generator: random.Random, letters_range: tuple[int, int] = (6, 20)) -> Braid:
    """A random word on 3 to 6 strands, of 6 to 20 letters where not said otherwise."""
    strands, letters = generator.randint(3, 6), generator.randint(*letters_range)
    word = [generator.choice((1, -1)) * generator.randrange(1, strands) for _ in range(letters)]
    return Braid(word, strands)


def random_entries(count: int, seed: int) -> Iterator[Entry]:
    """So many entries."""
    generator = random.Random(seed)
    for number in range(1, count + 1):
        braid = random_braid(generator)
        yield Entry(f"braid {number}", "random", "", braid, format_word(braid))


class Tenths:
    """Takes the progress of a sorting, and the rate of each tenth of it."""

    def __init__(self, total: int) -> None:
        self.total = total
        self.done, self.since = 0, time.perf_counter()
        self.rates: list[float] = []

    def __call__(self, progress: SortProgress) -> None:
        """Take note of how far the sorting is."""
        if progress.doing != "sorting" or progress.done == 0:
            return
        if progress.done - self.done < self.total // 10 and progress.done < progress.total:
            return
        now = time.perf_counter()
        self.rates.append((progress.done - self.done) / (now - self.since))
        print(
            f"  {progress.done:7} entries, {progress.classes:6} classes, "
            f"{progress.undecided:4} undecided: {self.rates[-1]:5.0f} a second",
            flush=True,
        )
        self.done, self.since = progress.done, now


def peak_memory() -> int:
    """Bytes that this process and its largest worker held at most, together."""
    own = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss
    largest = resource.getrusage(resource.RUSAGE_CHILDREN).ru_maxrss
    return (own + 2 * largest) * 1024


def time_finds(path: str, count: int) -> tuple[list[float], list[float]]:
    """Seconds of finds from start to exit: those that the invariants decide, and the others."""
    generator = random.Random(2)
    decided, others = [], []
    for _ in range(count):
        word = format_word(random_braid(generator, (22, 30)))
        command = [sys.executable, "-m", "braidsearch", "ledger", "find", path, word]
        start = time.perf_counter()
        done = subprocess.run(command, capture_output=True, text=True, check=False)
        seconds = time.perf_counter() - start
        (decided if done.returncode == 1 else others).append(seconds)
    return decided, others


def main() -> int:
    """Enter, sort, find."""
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--entries", type=int, default=100_000)
    parser.add_argument("--processes", type=int, default=2)
    parser.add_argument("--finds", type=int, default=200)
    parser.add_argument("--ledger")
    options = parser.parse_args()
    with tempfile.TemporaryDirectory() as folder:
        path = options.ledger or str(Path(folder) / "random.ledger")
        with Ledger(path, create=True) as ledger:
            start = time.perf_counter()
            ledger.add(random_entries(options.entries, 1))
            print(f"entered in {time.perf_counter() - start:.1f} s")
            tenths = Tenths(options.entries)
            start = time.perf_counter()
            with open_executor(options.processes) as executor:
                ledger.sort(executor=executor, progress=tenths)
            print(f"sorted in {time.perf_counter() - start:.0f} s")
        memory = peak_memory()
        print(
            f"memory at most {memory / 2**20:.0f} MiB, file {Path(path).stat().st_size >> 20} MiB"
        )
        decided, others = time_finds(path, options.finds)
    for title, seconds in (("by invariants", decided), ("same, or searched for", others)):
        if seconds:
            middle, most = statistics.median(seconds), max(seconds)
            print(f"find, {title}: {len(seconds)}, median {middle:.2f} s, at most {most:.2f} s")
    slow = min(tenths.rates) < LEAST_RATE or memory >= MOST_MEMORY
    return int(slow or (bool(decided) and statistics.median(decided) >= MOST_SECONDS))


if __name__ == "__main__":
    sys.exit(main())
