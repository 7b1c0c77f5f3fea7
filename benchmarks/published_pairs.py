"""Two published words for one link: are they proven to close to the same oriented link?

Run: python -m benchmarks.published_pairs [--seconds 60] [--every 1] [--processes 2] [--out DIR]

The link table of the package ``database-knotinfo`` (C. Livingston, A. H. Moore, LinkInfo; links up
to 11 crossings) has two columns of braid words; the knot table has rows with two words. Each row
with two different words is compared as it stands. The rows that stay undecided, and those that
differ, are written to DIR/published_pairs_open.txt: name, outcome, reason and both words.

Measured on two cores that others used too, 60 s a row:

    knots: 74
      same           48   64.86 %
      different      26   35.14 %
      undecided       0    0.00 %
      seconds      median 0.85, nine in ten 3.33, at most 12.50
      moves        median 45, nine in ten 88, at most 219
      verification median 0.006, nine in ten 0.016, at most 0.038
    links: 2703
      same         2701   99.93 %
      different       2    0.07 %
      undecided       0    0.00 %
      seconds      median 0.15, nine in ten 1.86, at most 18.69
      moves        median 5, nine in ten 55, at most 281
      verification median 0.001, nine in ten 0.011, at most 0.101

The second word of the 26 knots, and of the link L11n369{0,1}, is the reverse of the first, told
from it by colourings (the table calls all these knots not invertible). The words of L10n99{0,0,0}
are two links, told apart by the sums of linking numbers.
"""

import argparse
import re
from collections.abc import Iterator
from concurrent.futures import ProcessPoolExecutor
from pathlib import Path

from database_knotinfo import link_list

from benchmarks.tables import examine, print_results
from braidsearch import Braid
from braidsearch.words import format_word

Pair = tuple[str, Braid, Braid]


def integers(text: str) -> list[int]:
    """All integers of a table's cell, whatever stands between them."""
    return [int(number) for number in re.findall(r"-?\d+", text)]


def iter_link_pairs() -> Iterator[Pair]:
    """Links whose new and old word differ; the strand count is the first integer."""
    for row in link_list(proper_links=True)[1:]:
        new, old = integers(row["braid_notation"]), integers(row["braid_notation_old"])
        if new and old and new != old:
            yield row["name"], Braid(new[1:], new[0]), Braid(old[1:], old[0])


def iter_knot_pairs() -> Iterator[Pair]:
    """Knots with two words in one cell."""
    for row in link_list()[1:]:
        words = [integers(part) for part in re.split(r"\]\s*,\s*\[", row["braid_notation"])]
        if len(words) == 2:
            yield row["name"], Braid(words[0]), Braid(words[1])


def main() -> None:
    """Examine both tables and print what was found."""
    parser = argparse.ArgumentParser(description=(__doc__ or "").splitlines()[0])
    parser.add_argument("--seconds", type=float, default=60.0)
    parser.add_argument("--every", type=int, default=1, help="take every so manieth row only")
    parser.add_argument("--processes", type=int, default=2)
    parser.add_argument("--out", type=Path, default=Path(__file__).parent / "out")
    given = parser.parse_args()
    open_rows = []
    with ProcessPoolExecutor(given.processes) as pool:
        for title, pairs in (("knots", iter_knot_pairs()), ("links", iter_link_pairs())):
            tasks = [(*pair, given.seconds) for pair in list(pairs)[:: given.every]]
            results = list(pool.map(examine, tasks))
            print_results(title, results)
            open_rows += [result for result in results if result.outcome != "same"]
    given.out.mkdir(exist_ok=True)
    path = given.out / "published_pairs_open.txt"
    with path.open("w") as file:
        for result in open_rows:
            words = f"{format_word(result.left)} | {format_word(result.right)}"
            print(result.name, result.outcome, result.reason, words, sep="\t", file=file)
    print(f"{len(open_rows)} rows that are not proven same: {path}")


if __name__ == "__main__":
    main()
