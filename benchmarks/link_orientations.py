"""Links against themselves with one component reversed: the same oriented link, or another?

Run: python -m benchmarks.link_orientations [--rows 200] [--seed 4] [--seconds 60] [--processes 2]

The link table of the package ``database-knotinfo`` (C. Livingston, A. H. Moore, LinkInfo) gives a
row to each orientation of a link that has a name of its own. A seeded sample of rows is compared
with another orientation row of the same unoriented link that differs from it in one component, the
other orientations counted relative to the first component. A second sample is compared with the
braid woven from its own diagram, in which one component is turned around. Rows that stay undecided
are listed.

Measured on two cores that others used too:

    200 of 3610 pairs of rows
    other rows: 200
      same           30   15.00 %
      different     170   85.00 %
      undecided       0    0.00 %
       132 told apart by the linking numbers
        11 told apart by the Alexander polynomial
        11 told apart by the colourings
         7 told apart by the sums of linking numbers
         7 told apart by the Jones polynomial of all sublinks of 2 components
         2 told apart by the Jones polynomial of all sublinks of 3 components
    one component turned: 200
      same           34   17.00 %
      different     166   83.00 %
      undecided       0    0.00 %
      seconds      median 0.90, nine in ten 4.81, at most 6.09
      moves        median 20, nine in ten 95, at most 201
      verification median 0.004, nine in ten 0.020, at most 0.053
       132 told apart by the linking numbers
        14 told apart by the colourings
         9 told apart by the Alexander polynomial
         6 told apart by the Jones polynomial of all sublinks of 2 components
         5 told apart by the sums of linking numbers
"""

import argparse
import random
import re
from collections import Counter, defaultdict
from collections.abc import Iterator
from concurrent.futures import ProcessPoolExecutor

from benchmarks.tables import Result, examine, print_results
from braidsearch import Braid, weave
from braidsearch.diagrams import closed_braid_diagram
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


def iter_turned(rows: list[TableRow]) -> Iterator[Pair]:
    """Each row against its own diagram with its last component turned around, woven anew."""
    for row in rows:
        diagram = closed_braid_diagram(row.braid)
        last = diagram.component_count - 1
        woven = weave(diagram.reversed_components([last])).braid
        yield f"{row.name} with component {last + 1} turned", row.braid, woven


def print_table(title: str, results: list[Result]) -> None:
    """Outcomes, by what links are told apart, and what stays undecided."""
    print_results(title, results)
    reasons = Counter(
        re.sub("(;| in ).*", "", result.reason)
        for result in results
        if result.outcome == "different"
    )
    for reason, count in reasons.most_common():
        print(f"  {count:4d} {reason}")
    for result in results:
        if result.outcome == "undecided":
            print("  open:", result.name, result.reason, flush=True)


def main() -> None:
    """Compare both samples and print what was found."""
    parser = argparse.ArgumentParser(description=(__doc__ or "").splitlines()[0])
    parser.add_argument("--rows", type=int, default=200)
    parser.add_argument("--seed", type=int, default=4)
    parser.add_argument("--seconds", type=float, default=60.0)
    parser.add_argument("--processes", type=int, default=2)
    given = parser.parse_args()
    rows = list(iter_links(11))
    pairs = list(iter_reversals(rows))
    generator = random.Random(given.seed)
    sample = generator.sample(pairs, min(given.rows, len(pairs)))
    turned = list(iter_turned(generator.sample(rows, min(given.rows, len(rows)))))
    print(f"{len(sample)} of {len(pairs)} pairs of rows")
    with ProcessPoolExecutor(given.processes) as pool:
        for title, tasks in (("other rows", sample), ("one component turned", turned)):
            results = list(pool.map(examine, [(*pair, given.seconds) for pair in tasks]))
            print_table(title, results)


if __name__ == "__main__":
    main()
