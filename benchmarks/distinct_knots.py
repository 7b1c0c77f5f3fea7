"""Distinct knots, both mirror images in: how many pairs are not proven different?

Run: python -m benchmarks.distinct_knots [--crossings 12] [--seconds 60] [--processes 2]

Two tables, from the words of the package ``database-knotinfo`` (C. Livingston, A. H. Moore,
KnotInfo):

1. the groups of knots that share HOMFLY-PT, Kauffman and Alexander polynomial and signature up to
   mirror image, by the table's own columns: every pair of a group is compared up to all symmetries;
2. all pairs of distinct knots, the second as it is and as its mirror image. Pairs whose HOMFLY-PT
   polynomials, computed here and again by the verifier's route, differ are different; every other
   pair is compared up to reversal.

The pairs that are not proven different are printed by name.

Measured on two cores that others used too:

    107 groups of 223 knots share all polynomials
    up to all symmetries: 126 pairs compared in 1.4 minutes
      different 126, not proven different 0
      seconds       median 1.09, nine in ten 1.48, at most 4.41
      verification  median 0.15, nine in ten 0.26, at most 0.53
    8859552 pairs, of which 8859183 differ in HOMFLY-PT polynomials
    equal HOMFLY-PT: 369 pairs compared in 3.0 minutes
      different 369, not proven different 0
      seconds       median 0.86, nine in ten 1.20, at most 1.91
      verification  median 0.06, nine in ten 0.15, at most 0.50
"""

import argparse
import time
from collections import defaultdict
from collections.abc import Iterator
from concurrent.futures import ProcessPoolExecutor
from functools import partial
from itertools import combinations

from benchmarks.tables import Result, examine, spread
from braidsearch import Braid
from braidsearch.invariants import homfly_polynomial, mirror_image
from braidsearch.verifier import verify
from tests.knot_tables import TableRow, iter_knots

Pair = tuple[str, Braid, Braid]


def iter_equal_polynomials(rows: list[TableRow]) -> Iterator[list[TableRow]]:
    """The groups of knots that share all four columns up to mirror image."""
    groups = defaultdict(list)
    for row in rows:
        groups[polynomials_up_to_mirror(row)].append(row)
    yield from (group for group in groups.values() if len(group) > 1)


def polynomials_up_to_mirror(row: TableRow) -> object:
    """The four columns of the knot or of its mirror image, whichever is less as text."""
    homfly, alexander = row.homfly, row.alexander
    kauffman = terms_of(row.columns["kauffman_polynomial"])
    plain = (homfly, kauffman, alexander, row.signature)
    mirrored = (
        mirror_image("homfly", homfly),
        sorted((-a, z, c) for a, z, c in kauffman),
        alexander,
        -row.signature,
    )
    return min(repr(plain), repr(mirrored))


def terms_of(text: str) -> list[tuple[int, int, int]]:
    """The Kauffman polynomial as terms (exponent of a, exponent of z, coefficient)."""
    from tests.polynomial_text import parse_polynomial  # noqa: PLC0415 - for this table alone

    return sorted((a, z, c) for a, z, c in parse_polynomial(text, ("a", "z")))


def homfly_by_both_routes(row: TableRow) -> list[list[int]]:
    """The polynomial of the knot, the verifier's route agreeing."""
    value = homfly_polynomial(row.braid)
    braid = verify.Braid(row.braid.strands, row.braid.word)
    if value != verify.homfly(verify.cyclically_reduced(braid), verify.Work()):
        raise AssertionError(f"{row.name}: two values of one polynomial")
    return value


def iter_equal_homfly(
    rows: list[TableRow], values: list[list[list[int]]]
) -> Iterator[tuple[str, Braid, Braid]]:
    """All pairs of distinct knots, the second perhaps mirrored, whose polynomials agree."""
    first, second = defaultdict(list), defaultdict(list)
    for place, value in enumerate(values):
        first[repr(value)].append(place)
        second[repr(mirror_image("homfly", value))].append(place)
    for places in first.values():
        for i, j in combinations(places, 2):
            yield f"{rows[i].name} {rows[j].name}", rows[i].braid, rows[j].braid
    for value, places in first.items():
        for i in places:
            for j in second[value]:
                if i < j:
                    mirrored = Braid([-x for x in rows[j].braid.word], rows[j].braid.strands)
                    yield f"{rows[i].name} mirror({rows[j].name})", rows[i].braid, mirrored


def print_table(title: str, results: list[Result], minutes: float) -> None:
    """How many are proven different, by what, and which are not."""
    open_pairs = [result for result in results if result.outcome != "different"]
    print(f"{title}: {len(results)} pairs compared in {minutes:.1f} minutes")
    print(f"  different {len(results) - len(open_pairs)}, not proven different {len(open_pairs)}")
    print("  seconds      ", spread([result.seconds for result in results], ".2f"))
    print("  verification ", spread([result.verification for result in results], ".2f"))
    for result in open_pairs:
        print("  open:", result.name, result.outcome, result.reason, flush=True)


def main() -> None:
    """Both tables."""
    parser = argparse.ArgumentParser(description=(__doc__ or "").splitlines()[0])
    parser.add_argument("--crossings", type=int, default=12)
    parser.add_argument("--seconds", type=float, default=60.0)
    parser.add_argument("--processes", type=int, default=2)
    given = parser.parse_args()
    rows = list(iter_knots(given.crossings))
    with ProcessPoolExecutor(given.processes) as pool:
        groups = list(iter_equal_polynomials(rows))
        print(f"{len(groups)} groups of {sum(map(len, groups))} knots share all polynomials")
        tasks = [
            (f"{one.name} {other.name}", one.braid, other.braid, given.seconds)
            for group in groups
            for one, other in combinations(group, 2)
        ]
        start = time.perf_counter()
        up_to_all = partial(examine, up_to=("mirror", "reverse", "mirror-reverse"))
        results = list(pool.map(up_to_all, tasks))
        print_table("up to all symmetries", results, (time.perf_counter() - start) / 60)
        values = list(pool.map(homfly_by_both_routes, rows, chunksize=20))
        pairs = [(*pair, given.seconds) for pair in iter_equal_homfly(rows, values)]
        count = len(rows) * (len(rows) - 1)
        print(f"{count} pairs, of which {count - len(pairs)} differ in HOMFLY-PT polynomials")
        start = time.perf_counter()
        results = list(pool.map(partial(examine, up_to=("reverse",)), pairs))
        print_table("equal HOMFLY-PT", results, (time.perf_counter() - start) / 60)


if __name__ == "__main__":
    main()
