"""How long signatures at roots of unity and modules take: python -m benchmarks.module_speed

Knots of the table with 12 crossings, random braid words, seeded, and torus links, whose modules
are far from cyclic and whose signatures have large nullities. Each figure is the median and the
most over a few words, in milliseconds of processor time; "guess" is the median of the estimates
by which the ladder of invariants is ordered. Needs ``database-knotinfo`` for the knots.

Measured on two shared cores of a server, Python 3.11, NumPy 2.4, medians in milliseconds:

    strands x letters      order 3   order 12   order 59   modulo 2   modulo 13   modulo 997
    knots, 12 crossings       0.32       0.32       0.32       0.62        0.60         0.54
          4 x 15              0.28       0.22       0.21       0.70        0.77         0.71
          5 x 20              0.41       0.46        1.5       0.52        0.71         0.62
          8 x 100              6.2        5.7        5.8        9.3         7.3          5.7
         12 x 100              6.9        6.0        6.3         27          25           20
          8 x 200               23         24         24         15          11           11
         30 x 200               38         45         46        320         360          330
          8 x 1000            1900       1900

A word of which the form is singular at a root of large order takes longer there, since ranks are
asked modulo many primes: up to 4 ms among those of 5 x 20 at order 59.
"""

from __future__ import annotations

import argparse
import random
import statistics
import sys
import time
from collections.abc import Callable, Sequence

from braidsearch.invariants import alexander_module, levine_tristram
from braidsearch.words import Braid

SIZES = [(4, 15), (5, 20), (8, 100), (12, 100), (8, 200), (30, 200), (8, 1000)]
TORUS_LINKS = [(4, 60), (8, 24), (12, 12)]
ORDERS = (3, 5, 12, 59)
PRIMES = (2, 13, 997)
MOST_MILLISECONDS = 1000.0
"""The bound for words of 200 letters on 8 strands; the script exits with 1 where one is above."""


def random_braid(strands: int, letters: int, generator: random.Random) -> Braid:
    """A word with independent letters, each generator and sign equally likely."""
    word = [generator.choice([1, -1]) * generator.randrange(1, strands) for _ in range(letters)]
    return Braid(word, strands)


def iter_subjects(words: int) -> list[tuple[str, list[Braid]]]:
    """What is measured: a title and braids of about one size."""
    subjects = [("knots, 12 crossings", table_knots(20 * words))]
    for strands, letters in SIZES:
        generator = random.Random(1000 * strands + letters)
        braids = [random_braid(strands, letters, generator) for _ in range(words)]
        subjects.append((f"{strands} x {letters}", braids))
    for strands, turns in TORUS_LINKS:
        subjects.append((f"torus ({strands}, {turns})", [Braid([*range(1, strands)] * turns)]))
    return [(title, braids) for title, braids in subjects if braids]


def table_knots(count: int) -> list[Braid]:
    """Knots with 12 crossings at even distances in the table; none where it is not installed."""
    try:
        from database_knotinfo import link_list  # noqa: PLC0415 - an optional table
    except ImportError:
        return []
    rows = [row for row in link_list()[1:] if row["crossing_number"] == "12"]
    words = [row["braid_notation"].strip("[]").split("]")[0] for row in rows]
    return [Braid(map(int, word.split(","))) for word in words[:: max(1, len(words) // count)]]


def measure(
    compute: Callable[[Braid], object], guess: Callable[[Braid], float], braids: Sequence[Braid]
) -> tuple[float, float, float]:
    """Median and most milliseconds, and the median guess, over the braids."""
    times = []
    for braid in braids:
        start = time.process_time()
        compute(braid)
        times.append(1000 * (time.process_time() - start))
    return statistics.median(times), max(times), 1000 * statistics.median(map(guess, braids))


def iter_invariants() -> list[tuple[str, Callable[[Braid], object], Callable[[Braid], float]]]:
    """The name, the function and the estimate of each invariant that is measured."""
    found: list[tuple[str, Callable[[Braid], object], Callable[[Braid], float]]] = []
    for order in ORDERS:
        found.append(
            (
                f"order {order}",
                lambda braid, order=order: levine_tristram.levine_tristram_signature(
                    braid, order, 1
                ),
                lambda braid, order=order: levine_tristram.estimated_cost(braid, order),
            )
        )
    for prime in PRIMES:
        found.append(
            (
                f"modulo {prime}",
                lambda braid, prime=prime: alexander_module.alexander_module_factors(braid, prime),
                lambda braid, prime=prime: alexander_module.estimated_cost(braid, prime),
            )
        )
    return found


def main() -> None:
    """Print the table."""
    parser = argparse.ArgumentParser(description=__doc__)
    parser.add_argument("--words", type=int, default=5, help="words for each figure")
    given = parser.parse_args()
    print(f"{'':<22}{'':<13}{'median':>10}{'most':>10}{'guess':>10}   (ms)")
    is_slow = False
    for title, braids in iter_subjects(given.words):
        for name, compute, guess in iter_invariants():
            median, most, guessed = measure(compute, guess, braids)
            print(f"{title:<22}{name:<13}{median:>10.2f}{most:>10.2f}{guessed:>10.2f}", flush=True)
            is_slow = is_slow or (title == "8 x 200" and most > MOST_MILLISECONDS)
    sys.exit(int(is_slow))


if __name__ == "__main__":
    main()
