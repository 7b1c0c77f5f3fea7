"""How long colourings take to count: python -m benchmarks.colouring_speed [--every 150]

Knots to 12 crossings of the package ``database-knotinfo`` (C. Livingston, A. H. Moore, KnotInfo),
every so manieth, by some rungs of the ladder of groups. "tables" is the time to make the class's
tables, once for each process; then median and maximum over the knots; "guess" is the median of
the estimate over the time taken.

Measured on one of two shared cores of a server, both busy, Python 3.11, processor time in ms:

    20 words; a plan: median 2.20 ms, at most 3.70 ms
      2 seeds: 6 words, without choices 2
      3 seeds: 14 words, without choices 18
    colours                               size    tables    median   slowest   guess
    A5, meridian of order 5                 12      0.90      0.12      0.52     1.8
    S6, meridian of order 6                120      3.78      1.26      1.60     1.1
    PGammaL(2, 8), meridian of order 6     252      8.63      4.34      4.79     1.3
    A7, meridian of order 5                504     16.94     19.32     24.30     1.2
    M11, meridian of order 11              720     23.85     18.66     29.95     1.4
    PSL(2, 27):3, meridian of order 3      819     32.99      9.68     14.85     8.4
    M11, meridian of order 8               990     38.05     44.93     74.37     1.3
    Sz(8), meridian of order 4            1820    140.03     89.70    174.83     3.1
    the whole ladder: 0.52 s for a knot, tables included

Where two seeds are enough, M11's class of 720 takes 0.2 ms. Loading the compiled loops takes 0.35 s
in each process, compiling them 2.6 s once; without a compiler 240 ms instead of 18 for three seeds.
"""

from __future__ import annotations

import argparse
import statistics
import time
from collections.abc import Sequence

from braidsearch.invariants.colourings import (
    Colours,
    count_colourings,
    estimated_cost,
    group_ladder,
)
from braidsearch.invariants.colourings.class_tables import class_tables
from braidsearch.invariants.colourings.planning import colouring_plan
from braidsearch.words import Braid
from tests.knot_tables import iter_knots

RUNGS = (
    "A5, meridian of order 5",
    "S6, meridian of order 6",
    "PGammaL(2, 8), meridian of order 6",
    "A7, meridian of order 5",
    "M11, meridian of order 11",
    "PSL(2, 27):3, meridian of order 3",
    "M11, meridian of order 8",
    "Sz(8), meridian of order 4",
)


def seconds_for(colours: Colours, braid: Braid) -> float:
    """Processor time of one count."""
    start = time.process_time()
    count_colourings(braid, colours)
    return time.process_time() - start


def measure_plans(braids: Sequence[Braid]) -> None:
    """Time to find seeds, and how many there are."""
    times = []
    for braid in braids:
        start = time.process_time()
        colouring_plan(braid)
        times.append(time.process_time() - start)
    seeds = [colouring_plan(braid).seeds for braid in braids]
    strict = [colouring_plan(braid, may_choose=False).seeds for braid in braids]
    print(
        f"{len(braids)} words; a plan: median {1000 * statistics.median(times):.2f} ms, "
        f"at most {1000 * max(times):.2f} ms"
    )
    for count in sorted({*seeds, *strict}):
        print(f"  {count} seeds: {seeds.count(count)} words, without choices {strict.count(count)}")


def measure(colours: Colours, braids: Sequence[Braid]) -> str:
    """One line of the table."""
    start = time.process_time()
    class_tables(colours)
    tables = time.process_time() - start
    times = [seconds_for(colours, braid) for braid in braids]
    ratios = [estimated_cost(b, colours) / taken for b, taken in zip(braids, times, strict=True)]
    size = sum(colours.class_sizes or ())
    figures = (1000 * tables, 1000 * statistics.median(times), 1000 * max(times))
    columns = "".join(f"{figure:10.2f}" for figure in figures)
    return f"{colours.name:36s}{size:6d}{columns}{statistics.median(ratios):8.1f}"


def main() -> None:
    """Print the tables."""
    parser = argparse.ArgumentParser(description=(__doc__ or "").splitlines()[0])
    parser.add_argument("--every", type=int, default=150, help="take every so manieth knot only")
    given = parser.parse_args()
    braids = [row.braid for row in iter_knots(12)][:: given.every]
    start = time.process_time()
    count_colourings(Braid([1, 1, 1]), group_ladder()[0])
    print(f"loading the loops: {time.process_time() - start:.2f} s of processor time")
    measure_plans(braids)
    print(
        f"{'colours':36s}{'size':>6}{'tables':>10}{'median':>10}{'slowest':>10}{'guess':>8}   (ms)"
    )
    for colours in group_ladder():
        if colours.name in RUNGS:
            print(measure(colours, braids), flush=True)
    values = 0.0
    for braid in braids[::5]:
        values += sum(seconds_for(colours, braid) for colours in group_ladder())
    print(f"the whole ladder: {values / len(braids[::5]):.2f} s for a knot, tables included")


if __name__ == "__main__":
    main()
