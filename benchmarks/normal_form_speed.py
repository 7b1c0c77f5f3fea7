"""How fast normal forms and conjugacy classes are found: single words, batches, long words.

Run: python -m benchmarks.normal_form_speed

Four tables. Batch: 10,000 random words of 40 letters on 5 strands, as one array and one by one in
the same run, so that the ratio holds on a noisy machine. Long words: one random word on 20
strands, with nothing remembered from the one before; the last column is the growth exponent
between neighbouring lengths, which must not exceed 2. Classes: the canonical representative of a
random word's conjugacy class, each by the plain and by the compiled walk in turn, the better of
three rounds each; the ratios are the median of all and that of the sums. Start: what a process
pays for the compiled walk, on a machine that has it and on one that has to compile it once.

Measured on two shared cores, CPython 3.11, NumPy 2.4:

    10,000 words, 40 letters, 5 strands     ms    us a word
      as one array                         10.3       1.03
      one by one                          285.1      28.51
      ratio: median 27.6, 10.8 to 30.2
    one word on 20 strands     seconds   growth exponent
         625 letters             0.063
        1250 letters             0.167   1.39
        2500 letters             0.305   0.87
        5000 letters             0.715   1.23
       10000 letters             1.519   1.09

and, of the classes and the start, with the cores shared by four other processes:

    class of one word         plain us  nine in ten  compiled us  nine in ten  ratio  of sums
      10 letters, 3 strands           90          220          28           33    3.0      3.7
      12 letters, 4 strands          180          387          31           45    5.8      6.5
      15 letters, 4 strands          215          461          33           50    6.3      7.2
      15 letters, 5 strands          372         1139          53          108    7.8      9.2
      20 letters, 6 strands          702         2378          96          247    7.8     12.1
      24 letters, 7 strands         1034        82242
      30 letters, 8 strands          986         4416
    start of the compiled walk, in processes of their own   seconds
      nothing kept on disk: import, loops, tables of 6 strands       0.47     12.45      0.02
      machine code on disk: import, loops, tables of 6 strands       0.51      0.27      0.02

The median summit has 4 to 18 members, the largest 16, 32, 48, 96, 544 and, on 7 and 8 strands,
the cap. Some 20 us of a compiled class are calls and arrays around the loops, whatever its size.

The batch does 1.8 million left-weightings, 176 a word, in about 6 ms: two table look-ups and an
addition each, near the rate at which NumPy gathers from a table in cache (0.5 ns an entry). The
rest is cutting words into blocks and laying the result out.
"""

import math
import operator
import os
import random
import statistics
import subprocess
import sys
import tempfile
import time

import numpy as np

from braidsearch.normal_form import left_normal_form
from braidsearch.normal_form.batch import left_normal_forms
from braidsearch.normal_form.compiled_summit import compiled_summit, is_ready, is_small
from braidsearch.normal_form.conjugacy import DEFAULT_SUMMIT_CAP, plain_summit
from braidsearch.normal_form.left_normal_form import never
from braidsearch.normal_form.simple_elements import _collection
from braidsearch.words import Braid

ROUNDS = 5


def random_braid(generator: random.Random, strands: int, letters: int) -> Braid:
    """A word of random signed letters."""
    signed = [letter for letter in range(1 - strands, strands) if letter]
    return Braid(generator.choices(signed, k=letters), strands)


def seconds(action) -> float:
    """The time that one call takes."""
    start = time.perf_counter()
    action()
    return time.perf_counter() - start


def batch_table() -> None:
    """The batch against the words one by one, in turn, medians of ROUNDS."""
    generator = np.random.default_rng(1)
    words = generator.integers(1, 5, (10_000, 40)) * generator.choice([-1, 1], (10_000, 40))
    braids = [Braid(word, 5) for word in words.tolist()]
    left_normal_forms(words[:1], 5)
    rows = [
        (
            seconds(lambda: left_normal_forms(words, 5)),
            seconds(lambda: [left_normal_form(braid) for braid in braids]),
        )
        for _ in range(ROUNDS)
    ]
    batch, single = (statistics.median(column) for column in zip(*rows, strict=True))
    ratios = sorted(one / many for many, one in rows)
    print("10,000 words, 40 letters, 5 strands     ms    us a word")
    print(f"  as one array                     {batch * 1e3:8.1f} {batch * 100:10.2f}")
    print(f"  one by one                       {single * 1e3:8.1f} {single * 100:10.2f}")
    print(f"  ratio: median {statistics.median(ratios):.1f}, {ratios[0]:.1f} to {ratios[-1]:.1f}")


def length_table() -> None:
    """One long word on 20 strands."""
    generator = random.Random(2)
    print("one word on 20 strands     seconds   growth exponent")
    before = None
    for letters in (625, 1_250, 2_500, 5_000, 10_000):
        braid = random_braid(generator, 20, letters)
        _collection.cache_clear()  # each length starts without remembered products
        taken = seconds(lambda b=braid: left_normal_form(b))
        growth = "" if before is None else f"{math.log2(taken / before):.2f}"
        print(f"  {letters:6d} letters          {taken:8.3f}   {growth}")
        before = taken


def class_table() -> None:
    """Conjugacy classes of random words: both walks in turn, and the sizes of the summit sets."""
    generator = random.Random(3)
    if not is_ready():
        print("nothing is compiled here: the loops of both walks are plain")
    print(
        "class of one word         plain us  nine in ten  compiled us  nine in ten  ratio  of sums"
    )
    for strands, letters in ((3, 10), (4, 12), (4, 15), (5, 15), (6, 20), (7, 24), (8, 30)):
        count = 200 if strands < 7 else 60
        braids = [random_braid(generator, strands, letters) for _ in range(count)]
        plain, compiled = walks_of(braids, is_small(strands))
        line = f"  {letters} letters, {strands} strands {both(plain)}"
        if compiled:
            ratio = statistics.median(map(operator.truediv, plain, compiled))
            line += f"{both(compiled)}{ratio:7.1f}{sum(plain) / sum(compiled):9.1f}"
        sizes = [plain_summit(braid, DEFAULT_SUMMIT_CAP).size for braid in braids]
        print(f"{line}   members: {statistics.median(sizes):.0f}, at most {max(sizes)}")


def walks_of(braids: list[Braid], is_compiled: bool) -> tuple[list[float], list[float]]:
    """For each braid the seconds of the plain and of the compiled walk, the best of three."""
    walks = (plain_summit, compiled_summit) if is_compiled else (plain_summit,)
    best: tuple[list[float], list[float]] = ([], [])
    for braid in braids:
        rounds = [
            [
                seconds(lambda w=walk, b=braid: w(b, DEFAULT_SUMMIT_CAP, never).least())
                for walk in walks
            ]
            for _ in range(3)
        ]
        for column, times in zip(best, zip(*rounds, strict=True), strict=False):
            column.append(min(times))
    return best


def both(times: list[float]) -> str:
    """The median and the ninth decile, in microseconds."""
    return (
        f"{statistics.median(times) * 1e6:12.0f}{statistics.quantiles(times, n=10)[-1] * 1e6:13.0f}"
    )


def start_table() -> None:
    """What a process pays when it has met so many members that it loads the compiled walk."""
    print("start of the compiled walk, in processes of their own   seconds")
    program = (
        "import time; start = time.perf_counter()\n"
        "from braidsearch.normal_form.compiled_summit import is_ready, ranked_tables\n"
        "loaded = time.perf_counter(); is_ready(); ready = time.perf_counter()\n"
        "ranked_tables(6); end = time.perf_counter()\n"
        "print(f'{loaded - start:10.2f}{ready - loaded:10.2f}{end - ready:10.2f}')"
    )
    with tempfile.TemporaryDirectory() as folder:
        for title in ("nothing kept on disk", "machine code on disk"):
            result = subprocess.run(
                [sys.executable, "-c", program],
                env={**os.environ, "NUMBA_CACHE_DIR": folder},
                capture_output=True,
                text=True,
                check=True,
            )
            print(f"  {title}: import, loops, tables of 6 strands {result.stdout.rstrip()}")


if __name__ == "__main__":
    batch_table()
    length_table()
    class_table()
    start_table()
