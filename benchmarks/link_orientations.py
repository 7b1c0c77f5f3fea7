"""Links against themselves with one component reversed: the same oriented link, or another?

Run: python -m benchmarks.link_orientations [--rows 200] [--seed 4] [--seconds 60] [--processes 2]

The link table of the package ``database-knotinfo`` (C. Livingston, A. H. Moore, LinkInfo) gives a
row to each orientation of a link that has a name of its own. A seeded sample of rows is compared
with another orientation row of the same unoriented link that differs from it in one component, the
other orientations counted relative to the first component. Rows that stay undecided are listed.
"""

import argparse
import random
import re
from collections import Counter, defaultdict
from collections.abc import Iterator
from concurrent.futures import ProcessPoolExecutor

from benchmarks.tables import examine, print_results
from braidsearch import Braid
from tests.knot_tables import TableRow, iter_links

Pair = tuple[str, Braid, Braid]
NAME = re.compile(r"(.*)\{(.*)\}")


def orientation(row: TableRow) -> tuple[str, tuple[int, ...]]:
    """The name of the unoriented link, and the bits of its components after the first."""
    match = NAME.fullmatch(row.name)
    assert match is not None
    return match[1], tuple(int(bit) for bit in match[2].split(","))


def iter_reversals(rows: list[TableRow]) -> Iterator[Pair]:
    """All pairs of rows of one unoriented link that differ in one component (or all but one)."""
    families = defaultdict(list)
    for row in rows:
        name, bits = orientation(row)
        families[name].append((bits, row))
    for family in families.values():
        for bits, row in family:
            for others, other in family:
                changed = sum(one != two for one, two in zip(bits, others, strict=True))
                # All components but one reversed is one reversed, up to reversing everything.
                if changed == 1 and bits < others:
                    yield f"{row.name} {other.name}", row.braid, other.braid


def main() -> None:
    """Compare a seeded sample, print what was found, and list what stays undecided."""
    parser = argparse.ArgumentParser(description=(__doc__ or "").splitlines()[0])
    parser.add_argument("--rows", type=int, default=200)
    parser.add_argument("--seed", type=int, default=4)
    parser.add_argument("--seconds", type=float, default=60.0)
    parser.add_argument("--processes", type=int, default=2)
    given = parser.parse_args()
    pairs = list(iter_reversals(list(iter_links(11))))
    sample = random.Random(given.seed).sample(pairs, min(given.rows, len(pairs)))
    print(f"{len(sample)} of {len(pairs)} pairs of rows")
    with ProcessPoolExecutor(given.processes) as pool:
        results = list(pool.map(examine, [(*pair, given.seconds) for pair in sample]))
    print_results("orientations", results)
    reasons = Counter(result.reason for result in results if result.outcome == "different")
    for reason, count in reasons.most_common():
        print(f"  {count:4d} {reason}")
    for result in results:
        if result.outcome == "undecided":
            print("  open:", result.name, result.reason)


if __name__ == "__main__":
    main()
