"""Closed 3-braids, of which no pair is left undecided.

Run: python -m benchmarks.three_braids [--count 3000] [--pairs 10000] [--flypes 500] [--every 20]
     [--direct] [--processes 2] [--seconds 60]

Three samples by seed: pairs of random 3-braids of up to 40 letters; flypes 1^u 2^v 1^w 2^e against
1^w 2^v 1^u 2^e in disguise; and all pairs among ``count`` random closed 3-braids of up to 12
letters whose polynomials agree. With --direct the classification alone is asked for every pair,
and its moves are verified; otherwise the whole of ``compare`` is, for every 20th of the pairs alike
and for all of those whose lists of classes differ.

Measured with --processes 1 --every 1 on a machine that others used too:

    210160 pairs among 3000 braids share every polynomial
    random pairs: 10000
      same           55  milliseconds median 5.11, nine in ten 7.75, at most 13.66
      different    9945  milliseconds median 1.02, nine in ten 8.67, at most 40.50
      undecided       0
          6141  told apart by the number of components
          2455  told apart by the linking numbers
          1334  told apart by the Alexander polynomial
            14  told apart by the Jones polynomial
             1  told apart by the classification of closed 3-braids (Birman, Menasco, 1993)
      median of all 1.02 milliseconds; moves median 4, nine in ten 5, at most 6
    flype partners: 500
      same          500  milliseconds median 7.48, nine in ten 11.51, at most 20.40
      different       0
      undecided       0
      median of all 7.48 milliseconds; moves median 1, nine in ten 5, at most 6
    pairs alike in every polynomial: 210160
      same       210152  milliseconds median 1.28, nine in ten 5.82, at most 37.78
      different       8  milliseconds median 3.28, nine in ten 15.74, at most 15.32
      undecided       0
             8  told apart by the classification of closed 3-braids (Birman, Menasco, 1993)
      median of all 1.28 milliseconds; moves median 3, nine in ten 6, at most 8

and with --direct:

    random pairs: 10000
      same           55  milliseconds median 0.11, nine in ten 0.18, at most 12.16
      different    9945  milliseconds median 0.08, nine in ten 0.11, at most 29.92
      undecided       0
      median of all 0.08 milliseconds; moves median 3, nine in ten 4, at most 7
    pairs alike in every polynomial: 210160
      same       210152  milliseconds median 0.07, nine in ten 0.10, at most 40.28
      different       8  milliseconds median 0.08, nine in ten 0.14, at most 0.13
      undecided       0
      median of all 0.07 milliseconds; moves median 3, nine in ten 4, at most 7
"""

import argparse
import random
import statistics
import time
from collections import defaultdict
from collections.abc import Iterable, Sequence
from concurrent.futures import ProcessPoolExecutor
from itertools import combinations

from benchmarks.tables import Result, examine, spread
from braidsearch import Braid
from braidsearch.certificates import Certificate, format_certificate
from braidsearch.invariants import compute_invariants
from braidsearch.moves import flype_word
from braidsearch.three_braids import link_classes, moves_between
from braidsearch.verifier import verify_text

Task = tuple[str, Braid, Braid, float]

SHORT, LONG = 12, 40
LARGEST_EXPONENT = 7
DISGUISE = 8  # letters by which both sides of a flype are conjugated


def random_braid(generator: random.Random, most_letters: int) -> Braid:
    """A freely reduced word on 3 strands, of 1 to so many letters."""
    word: list[int] = []
    for _ in range(generator.randint(1, most_letters)):
        word.append(generator.choice([i for i in (1, -1, 2, -2) if word[-1:] != [-i]]))
    return Braid(word, 3)


def alike_pairs(count: int, every: int, seconds: float) -> list[Task]:
    """Pairs of ``count`` short braids that share every polynomial and the signature.

    All pairs with different lists of classes, and of the others each one in ``every``.
    """
    generator = random.Random(41)
    groups: dict[str, list[Braid]] = defaultdict(list)
    for _ in range(count):
        braid = random_braid(generator, SHORT)
        groups[repr(compute_invariants(braid))].append(braid)
    pairs = [pair for group in groups.values() for pair in combinations(group, 2)]
    print(f"{len(pairs)} pairs among {count} braids share every polynomial", flush=True)
    taken = (
        pair
        for place, pair in enumerate(pairs)
        if place % every == 0 or link_classes(pair[0]) != link_classes(pair[1])
    )
    return [("alike", left, right, seconds) for left, right in taken]


def flype_pairs(count: int, seconds: float) -> list[Task]:
    """Flype partners with random exponents, each conjugated at random."""
    generator = random.Random(42)
    tasks = []
    for _ in range(count):
        u, v, w = (generator.randint(-LARGEST_EXPONENT, LARGEST_EXPONENT) for _ in range(3))
        sign = generator.choice([1, -1])
        left, right = flype_word(u, v, w, sign), flype_word(w, v, u, sign)
        name = f"1^{u} 2^{v} 1^{w} 2^{sign}"
        tasks.append((name, _disguised(left, generator), _disguised(right, generator), seconds))
    return tasks


def _disguised(word: tuple[int, ...], generator: random.Random) -> Braid:
    by = random_braid(generator, DISGUISE)
    return by.inverse() * Braid(word, 3) * by


def random_pairs(count: int, seconds: float) -> list[Task]:
    """Pairs of braids of up to 40 letters, which mostly are different links."""
    generator = random.Random(43)
    braids = [random_braid(generator, LONG) for _ in range(2 * count)]
    return [("random", *pair, seconds) for pair in zip(braids[::2], braids[1::2], strict=True)]


def decide(task: Task) -> Result:
    """Ask the classification alone: moves, or two lists of classes that differ."""
    name, left, right, _ = task
    start = time.perf_counter()
    moves = moves_between(left, right)
    taken, verification = time.perf_counter() - start, 0.0
    if moves is None:
        if link_classes(left) == link_classes(right):
            raise AssertionError(f"{left!r} and {right!r}: equal lists, but no moves")
        return Result(name, left, right, "different", "", taken, 0, verification, 0)
    certificate = Certificate.same(left, right, "identity", moves)
    start = time.perf_counter()
    if not verify_text(format_certificate(certificate)).valid:
        raise AssertionError(f"{left!r} and {right!r}: the moves are not accepted")
    verification = time.perf_counter() - start
    return Result(name, left, right, "same", "", taken, len(moves), verification, 0)


def print_decided(title: str, results: Sequence[Result]) -> None:
    """How many are decided and how, by what, and the spread of times in milliseconds."""
    print(f"{title}: {len(results)}")
    for outcome in ("same", "different", "undecided"):
        found = [result for result in results if result.outcome == outcome]
        times = spread([1000 * result.seconds for result in found], ".2f")
        print(f"  {outcome:10s} {len(found):6d}", f" milliseconds {times}" if found else "")
    for reason, count in _reasons(results):
        print(f"    {count:6d}  {reason}")
    if results:
        median = 1000 * statistics.median(result.seconds for result in results)
        moves = [float(result.moves) for result in results if result.outcome == "same"]
        print(
            f"  median of all {median:.2f} milliseconds; moves {spread(moves, '.0f')}", flush=True
        )


def _reasons(results: Iterable[Result]) -> list[tuple[str, int]]:
    counts: dict[str, int] = defaultdict(int)
    for result in results:
        if result.outcome == "different" and result.reason:
            counts[result.reason.split(";")[0]] += 1
    return sorted(counts.items(), key=lambda item: -item[1])


def main() -> None:
    """Decide all three samples."""
    parser = argparse.ArgumentParser(description=(__doc__ or "").splitlines()[0])
    parser.add_argument("--count", type=int, default=3000)
    parser.add_argument("--pairs", type=int, default=10_000)
    parser.add_argument("--flypes", type=int, default=500)
    parser.add_argument("--every", type=int, default=20)
    parser.add_argument("--direct", action="store_true")
    parser.add_argument("--processes", type=int, default=2)
    parser.add_argument("--seconds", type=float, default=60.0)
    given = parser.parse_args()
    samples = {
        "random pairs": random_pairs(given.pairs, given.seconds),
        "flype partners": flype_pairs(given.flypes, given.seconds),
        "pairs alike in every polynomial": alike_pairs(
            given.count, 1 if given.direct else given.every, given.seconds
        ),
    }
    answer = decide if given.direct else examine
    with ProcessPoolExecutor(given.processes) as pool:
        for title, tasks in samples.items():
            results = list(pool.map(answer, tasks, chunksize=20))
            print_decided(title, results)
            for result in results:
                if result.outcome == "undecided":
                    print(f"    {result.name}: {result.left!r} {result.right!r} {result.reason}")


if __name__ == "__main__":
    main()
