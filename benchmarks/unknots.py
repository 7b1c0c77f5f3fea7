"""Words for the unknot, compared with the one-strand braid.

Run: python -m benchmarks.unknots [--count 200] [--seconds 60] [--processes 2]

Morton's braid and the family made from it by exchange moves (m to 6), then seeded random unknots
of 100 to 400 letters on 5 to 15 strands.

Measured on two shared cores:

    m = 0: same, 0.13 s, 9 moves
    m = 1: same, 0.01 s, 5 moves
    m = 2: same, 0.12 s, 9 moves
    m = 3: same, 0.37 s, 13 moves
    m = 4: same, 0.42 s, 17 moves
    m = 5: same, 0.17 s, 21 moves
    m = 6: same, 0.26 s, 25 moves
    random unknots: 200
      same          200  100.00 %
      different       0    0.00 %
      undecided       0    0.00 %
      seconds      median 0.05, nine in ten 0.48, at most 0.99
      moves        median 14, nine in ten 23, at most 27
      verification median 0.001, nine in ten 0.001, at most 0.002
"""

import argparse
from concurrent.futures import ProcessPoolExecutor

from benchmarks.tables import examine, print_results
from braidsearch import Braid
from tests.unknots import morton_family, random_unknots


def main() -> None:
    """Examine the family row by row, then the random unknots as a whole."""
    parser = argparse.ArgumentParser(description=(__doc__ or "").splitlines()[0])
    parser.add_argument("--count", type=int, default=200)
    parser.add_argument("--seconds", type=float, default=60.0)
    parser.add_argument("--processes", type=int, default=2)
    given = parser.parse_args()
    circle = Braid([])
    family = [(f"m = {m}", morton_family(m), circle, given.seconds) for m in range(7)]
    unknots = random_unknots(given.count, seed=15)
    tasks = [(str(i), braid, circle, given.seconds) for i, braid in enumerate(unknots)]
    with ProcessPoolExecutor(given.processes) as pool:
        for row in pool.map(examine, family):
            print(f"{row.name}: {row.outcome}, {row.seconds:.2f} s, {row.moves} moves")
        print_results("random unknots", list(pool.map(examine, tasks)))


if __name__ == "__main__":
    main()
