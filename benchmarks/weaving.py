"""Published diagrams woven into closed braids: is each the link that the table says?

Run: python -m benchmarks.weaving [--every 1] [--processes 2] [--compare 300] [--seconds 60]

The knots up to 13 crossings and the oriented links up to 11 of the package ``database-knotinfo``
(C. Livingston, A. H. Moore, KnotInfo and LinkInfo). Every planar diagram code is read and woven,
cross-checks included, and the Jones polynomial of the braid is compared with the table's. Then so
many seeded knots and so many links are compared with the table's own braid words, up to reversing
all components; every certificate is verified once more.

Measured with one process on two shared cores, all 17,153 diagrams in 2 min 22 s:

    knots: 12965 woven in 127 s
      the table's Jones polynomial: 12965; not: none
      seconds  median 0.0016, nine in ten 0.0098, at most 2.0257
      strands  median 6, nine in ten 8, at most 12
      letters  median 21, nine in ten 35, at most 73
    links: 4188 woven in 15 s
      the table's Jones polynomial: 4188; not: none
      seconds  median 0.0012, nine in ten 0.0054, at most 0.0742
      strands  median 5, nine in ten 7, at most 10
      letters  median 17, nine in ten 27, at most 50

Every one is checked by the exact Jones polynomial, by a state sum over the diagram. With
--seconds 900, on a machine that gave this process a fifth of a core:

    knots compared with the table's braid words: 300
         224 same identity
          76 same reverse
      processor seconds median 0.41, nine in ten 2.43, at most 12.07
      moves    median 19, nine in ten 105, at most 229
    links compared with the table's braid words: 300
         257 same identity
          42 same reverse
           1 different
      processor seconds median 0.09, nine in ten 0.65, at most 4.97
      moves    median 10, nine in ten 65, at most 167

The one that differs is L10n99{0,0,0}: its drawing is proven to be the link of the row's second
word, and its two words are told apart by the sums of linking numbers.
"""

import argparse
import random
import time
from collections import Counter
from collections.abc import Iterator, Sequence
from concurrent.futures import ProcessPoolExecutor
from dataclasses import dataclass

from benchmarks.tables import spread
from braidsearch import Braid, SearchLimits, compare, verify
from braidsearch.diagrams import parse_planar_diagram_code
from braidsearch.invariants import jones_polynomial
from braidsearch.weaving import weave
from braidsearch.words import format_word
from tests.knot_tables import TableRow, iter_knots, iter_links

SEED = 1990


@dataclass(frozen=True)
class Drawing:
    """A row of a table: its name, its planar diagram code and its braid words."""

    name: str
    code: str
    row: TableRow


def iter_drawings(rows: Iterator[TableRow]) -> Iterator[Drawing]:
    """The rows with their codes; the knot and the link table name the column differently."""
    for row in rows:
        column = "pd_notation" if row.is_knot else "pd_notation_vector"
        yield Drawing(row.name, row.columns[column], row)


def examine_drawing(drawing: Drawing) -> tuple[str, bool, Braid, str, float]:
    """Weave a drawing: its name, whether the polynomial is the table's, braid, check, seconds."""
    start = time.perf_counter()
    woven = weave(parse_planar_diagram_code(drawing.code))
    taken = time.perf_counter() - start
    is_equal = jones_polynomial(woven.braid) == drawing.row.jones
    return drawing.name, is_equal, woven.braid, woven.checks[-1], taken


def print_woven(title: str, drawings: Sequence[Drawing], pool: ProcessPoolExecutor) -> None:
    """Weave all drawings, and print what does not agree, then times and sizes."""
    start = time.perf_counter()
    results = list(pool.map(examine_drawing, drawings, chunksize=32))
    print(f"{title}: {len(results)} woven in {time.perf_counter() - start:.0f} s")
    wrong = [name for name, is_equal, *_ in results if not is_equal]
    print(f"  the table's Jones polynomial: {len(results) - len(wrong)}; not: {wrong or 'none'}")
    print("  seconds ", spread([taken for *_, taken in results], ".4f"))
    print("  strands ", spread([float(braid.strands) for _, _, braid, _, _ in results], ".0f"))
    print("  letters ", spread([float(len(braid)) for _, _, braid, _, _ in results], ".0f"))
    for check, count in Counter(check for *_, check, _ in results).items():
        print(f"  {count:6d} {check}")


def examine_words(task: tuple[Drawing, float]) -> tuple[str, str, str, float, int]:
    """Compare the woven braid with the table's: name, outcome, symmetry, seconds, moves.

    The seconds are the processor's, which a busy machine does not stretch; the limit is not.
    """
    drawing, seconds = task
    woven = weave(parse_planar_diagram_code(drawing.code)).braid
    limits = SearchLimits(seconds=seconds, nodes=None)
    start = time.process_time()
    verdict = compare(woven, drawing.row.braid, up_to=("reverse",), limits=limits)
    taken = time.process_time() - start
    symmetry, moves = "", 0
    if verdict.certificate is not None:
        if not verify(verdict.certificate, left=woven, right=drawing.row.braid).valid:
            raise AssertionError(f"{drawing.name}: the certificate is not accepted")
        symmetry = verdict.symmetry or ""
        moves = len(verdict.certificate.moves)
    if verdict.outcome != "same":
        print(drawing.name, verdict.outcome, format_word(woven), "|", verdict.reason, flush=True)
    return drawing.name, verdict.outcome, symmetry, taken, moves


def print_compared(
    title: str, drawings: Sequence[Drawing], seconds: float, pool: ProcessPoolExecutor
) -> None:
    """Compare these drawings with the table's words, and print outcomes, times and lengths."""
    results = list(pool.map(examine_words, [(drawing, seconds) for drawing in drawings]))
    print(f"{title} compared with the table's braid words: {len(results)}")
    for (outcome, symmetry), count in Counter((r[1], r[2]) for r in results).items():
        print(f"  {count:6d} {outcome} {symmetry}")
    print("  processor seconds", spread([taken for *_, taken, _ in results], ".2f"))
    print("  moves   ", spread([float(moves) for *_, moves in results], ".0f"), flush=True)


def main() -> None:
    """Weave both tables, then compare a sample, and print what was found."""
    parser = argparse.ArgumentParser(description=(__doc__ or "").splitlines()[0])
    parser.add_argument("--every", type=int, default=1, help="take every so manieth row only")
    parser.add_argument("--processes", type=int, default=2)
    parser.add_argument(
        "--compare", type=int, default=300, help="so many of each table; 0 for none"
    )
    parser.add_argument("--seconds", type=float, default=60.0, help="for each comparison")
    given = parser.parse_args()
    tables = {
        "knots": list(iter_drawings(iter_knots(max_crossings=13))),
        "links": list(iter_drawings(iter_links(max_crossings=11))),
    }
    with ProcessPoolExecutor(given.processes) as pool:
        for title, drawings in tables.items():
            print_woven(title, drawings[:: given.every], pool)
        for title, drawings in tables.items() if given.compare else ():
            chosen = random.Random(SEED).sample(drawings, given.compare)
            print_compared(title, chosen, given.seconds, pool)


if __name__ == "__main__":
    main()
