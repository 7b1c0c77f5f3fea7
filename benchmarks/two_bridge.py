"""Two-bridge links against Schubert's classification, by compare.

Run: python -m benchmarks.two_bridge [--most 30] [--seconds 20] [--processes 1]

For every p from 2 to the largest, the links of p/q for all q that give different drawings: q from
1 to p - 1 for knots, odd q from 1 - p to p - 1 for links of two components, oriented. Two of them
are the same link when q' is q or its inverse, modulo p for knots and modulo 2 p for links
(Schubert, Knoten mit zwei Brücken, 1956). Every q is compared with the first of its class, and the
first ones of different classes with each other. A wrong outcome ends with status 1; open pairs
are listed.

Measured on one of two shared cores:

    same by the theorem: {'same': 131}
      seconds: median 0.17, nine in ten 4.25, at most 43.82
    different by the theorem: {'different': 1094}
      seconds: median 0.04, nine in ten 0.23, at most 8.63
    1225 pairs, 439 s
"""

import argparse
import time
from collections import Counter
from collections.abc import Iterator
from concurrent.futures import ProcessPoolExecutor
from functools import cache
from itertools import combinations
from math import gcd

from benchmarks.tables import examine, spread
from braidsearch import Braid
from braidsearch.diagrams.families import continued_fraction, two_bridge_link
from braidsearch.diagrams.vogel import braid_from_diagram

Case = tuple[str, int, int, int]


def classes(p: int) -> list[list[int]]:
    """The numerators q for p, those of the same oriented link together."""
    modulus = p if p % 2 else 2 * p
    first = 1 if p % 2 else 1 - p
    found: list[list[int]] = []
    for q in range(first, p):
        if gcd(p, q) != 1:
            continue
        known = [c for c in found if (q - c[0]) % modulus == 0 or (q * c[0] - 1) % modulus == 0]
        if known:
            known[0].append(q)
        else:
            found.append([q])
    return found


def iter_cases(most: int) -> Iterator[Case]:
    """The pairs to be compared: expected outcome, p, q, q'."""
    for p in range(2, most + 1):
        found = classes(p)
        for members in found:
            yield from (("same", p, members[0], q) for q in members[1:])
        for left, right in combinations(found, 2):
            yield "different", p, left[0], right[0]


@cache
def closed_braid(p: int, q: int) -> Braid:
    """A closed braid for the two-bridge link of p/q."""
    return braid_from_diagram(two_bridge_link(continued_fraction(p, q)))


def examine_case(task: tuple[Case, float]) -> tuple[Case, str, float]:
    """The outcome of a case, and the seconds that compare took."""
    case, seconds = task
    _, p, left, right = case
    row = (f"{p}/{left} {p}/{right}", closed_braid(p, left), closed_braid(p, right), seconds)
    result = examine(row)
    return case, result.outcome, result.seconds


def main() -> None:
    """Compare all pairs; count the outcomes, list what is open or wrong."""
    parser = argparse.ArgumentParser(description=(__doc__ or "").splitlines()[0])
    parser.add_argument("--most", type=int, default=30)
    parser.add_argument("--seconds", type=float, default=20.0)
    parser.add_argument("--processes", type=int, default=1)
    given = parser.parse_args()
    start = time.perf_counter()
    tasks = [(case, given.seconds) for case in iter_cases(given.most)]
    counts: Counter[tuple[str, str]] = Counter()
    times: dict[str, list[float]] = {"same": [], "different": []}
    wrong = 0
    with ProcessPoolExecutor(given.processes) as pool:
        for case, outcome, seconds in pool.map(examine_case, tasks, chunksize=4):
            counts[case[0], outcome] += 1
            if outcome == case[0]:
                times[outcome].append(seconds)
            else:
                wrong += outcome != "undecided"
                print(f"p = {case[1]}, q = {case[2]}, {case[3]}: {case[0]}, found {outcome}")
    for expected in ("same", "different"):
        found = {outcome: n for (wanted, outcome), n in counts.items() if wanted == expected}
        print(f"{expected} by the theorem: {found}")
        print("  seconds:", spread(times[expected], ".2f"))
    print(f"{len(tasks)} pairs, {time.perf_counter() - start:.0f} s")
    raise SystemExit(1 if wrong else 0)


if __name__ == "__main__":
    main()
