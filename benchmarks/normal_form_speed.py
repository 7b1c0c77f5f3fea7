"""How fast normal forms and conjugacy classes are found: single words, batches, long words.

Run: python -m benchmarks.normal_form_speed

Three tables. Batch: 10,000 random words of 40 letters on 5 strands, as one array and one by one in
the same run, so that the ratio holds on a noisy machine. Long words: one random word on 20
strands, with nothing remembered from the one before; the last column is the growth exponent
between neighbouring lengths, which must not exceed 2. Classes: the canonical representative of a
random word's conjugacy class.

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
    class of one word          median ms   nine in ten   median size   largest
      10 letters, 3 strands            0.05          0.12             4        16
      12 letters, 4 strands            0.12          0.22             8        32
      15 letters, 5 strands            0.28          0.78            12       140
      20 letters, 6 strands            0.69          2.35            16      1080
      24 letters, 7 strands            1.86          5.60            19      2004
      30 letters, 8 strands            2.63         19.86            18      2004

The batch does 1.8 million left-weightings, 176 a word, in about 6 ms: two table look-ups and an
addition each, near the rate at which NumPy gathers from a table in cache (0.5 ns an entry). The
rest is cutting words into blocks and laying the result out.
"""

import math
import random
import statistics
import time

import numpy as np

from braidsearch.normal_form import left_normal_form
from braidsearch.normal_form.batch import left_normal_forms
from braidsearch.normal_form.conjugacy import conjugacy_class
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
    """Conjugacy classes of random words, with the sizes of the ultra summit sets."""
    generator = random.Random(3)
    print("class of one word          median ms   nine in ten   median size   largest")
    for strands, letters in ((3, 10), (4, 12), (5, 15), (6, 20), (7, 24), (8, 30)):
        times, sizes = [], []
        for _ in range(200 if strands < 7 else 60):
            braid = random_braid(generator, strands, letters)
            start = time.perf_counter()
            sizes.append(conjugacy_class(braid).summit_size)
            times.append(time.perf_counter() - start)
        ninth = statistics.quantiles(times, n=10)[-1]
        print(
            f"  {letters} letters, {strands} strands {statistics.median(times) * 1e3:15.2f}"
            f"{ninth * 1e3:14.2f}{statistics.median(sizes):14.0f}{max(sizes):10d}"
        )


if __name__ == "__main__":
    batch_table()
    length_table()
    class_table()
