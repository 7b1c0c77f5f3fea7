"""How long each invariant takes: python -m benchmarks.invariant_speed [--long]

Random braid words, seeded; each figure is the median over a few words, in milliseconds, with
the tables for the number of strands already built. "first" is the time of the first call on that
number of strands, which builds them. "guess" is the estimate by which the ladder is ordered.

Measured on two shared cores of a server, Python 3.11, NumPy 2.4, medians in milliseconds:

    strands x letters   signature   alexander   jones    homfly
          4 x 20             0.06        0.48    0.17      0.18
          6 x 40             0.13        0.85    0.45      1.0
          8 x 100            0.69        7.7       10       290
         12 x 100            0.8         9.5     1760
          8 x 1000            26         515     2700    64200
         12 x 1000            42         805
          3 x 5000            28        2560      436      323

A process that tells two trefoils apart: 0.24 s with the machine busy, of which NumPy's import is
the larger part.
"""

from __future__ import annotations

import argparse
import random
import statistics
import subprocess
import sys
import time

from braidsearch.invariants import INVARIANTS, Invariant
from braidsearch.words import Braid

SIZES = [(3, 15), (4, 20), (5, 30), (6, 40), (8, 60), (8, 100), (12, 40), (12, 100)]
LONG_SIZES = [(8, 1000), (12, 1000), (3, 5000), (30, 300)]
MOST_SECONDS = 20.0


def random_braid(strands: int, letters: int, generator: random.Random) -> Braid:
    """A word with independent letters, each generator and sign equally likely."""
    word = [generator.choice([1, -1]) * generator.randrange(1, strands) for _ in range(letters)]
    return Braid(word, strands)


def seconds_for(invariant: Invariant, braid: Braid) -> float:
    """The wall time of one computation."""
    start = time.perf_counter()
    invariant.compute(braid)
    return time.perf_counter() - start


def measure(invariant: Invariant, strands: int, letters: int, words: int) -> str | None:
    """One line of the table, or None where the invariant is not applicable or takes too long."""
    generator = random.Random(1000 * strands + letters)
    braids = [random_braid(strands, letters, generator) for _ in range(words + 1)]
    if not all(map(invariant.is_applicable, braids)):
        return None
    if max(map(invariant.estimated_cost, braids)) > MOST_SECONDS:
        return None
    first = seconds_for(invariant, braids[0])
    times = [seconds_for(invariant, braid) for braid in braids[1:]]
    guesses = [invariant.estimated_cost(braid) for braid in braids[1:]]
    figures = (first, statistics.median(times), max(times), statistics.median(guesses))
    columns = "".join(f"{1000 * figure:11.2f}" for figure in figures)
    return f"{strands:>7} {letters:>7}  {invariant.name:<16}{columns}"


def measure_process() -> float:
    """Seconds for a new Python process to tell two knots apart by the ladder."""
    program = (
        "from braidsearch.words import Braid\n"
        "from braidsearch.invariants import ladder\n"
        "left, right = Braid([1, 1, 1]), Braid([-1, -1, -1])\n"
        "print(next(i.name for i in ladder(left, right) if i.compute(left) != i.compute(right)))\n"
    )
    times = []
    for _ in range(5):
        start = time.perf_counter()
        subprocess.run([sys.executable, "-c", program], check=True, capture_output=True)
        times.append(time.perf_counter() - start)
    return statistics.median(times)


def main() -> None:
    """Print the table."""
    parser = argparse.ArgumentParser(description=__doc__)
    parser.add_argument("--long", action="store_true", help="words of hundreds of letters too")
    parser.add_argument("--words", type=int, default=9, help="words for each figure")
    given = parser.parse_args()
    print(f"a process that tells two trefoils apart: {measure_process():.3f} s\n")
    print(
        f"{'strands':>7} {'letters':>7}  {'invariant':<16}"
        f"{'first':>11}{'median':>11}{'slowest':>11}{'guess':>11}   (ms)"
    )
    for strands, letters in SIZES + (LONG_SIZES if given.long else []):
        words = given.words if letters < 1000 else min(3, given.words)
        for invariant in INVARIANTS:
            line = measure(invariant, strands, letters, words)
            if line is not None:
                print(line, flush=True)


if __name__ == "__main__":
    main()
