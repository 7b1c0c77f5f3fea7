"""How fast walks over arc presentations go: compiled, plain, and NumPy over many walkers at once.

Run: python benchmarks/arc_walk_speed.py

A try is a proposed pair of neighbouring columns or rows, swapped, merged or not; all are counted.
Compilation is timed in processes of their own, with an empty cache folder and then with the full
one. The NumPy walk does a try for each of 10,000 walkers at a time, swaps only.

Measured on two shared cores under load, CPython 3.11, numba 0.68, NumPy 2.4; speeds of walks in
processor time, the start of a process by the clock (2.2 and 0.5 seconds on idle cores):

    start of a process          seconds in all   first walk   million tries a second
      cold: all is compiled               7.63         6.07               61.6
      warm: loaded from disk              1.77         0.41              102.4
      plain, not compiled                 1.22         0.00                0.9
    one core, compiled          size   phase          M tries/s   tries a move   recorded
       12 letters,  3 strands        7   cool               145.8            4.7      110.4
       12 letters,  3 strands        7   heat               102.8            2.1       58.2
       12 letters,  3 strands        7   no exchanges       127.6            4.7      100.2
       30 letters,  4 strands        8   cool                88.9            1.9       61.5
       30 letters,  4 strands        8   heat                99.9            1.7       57.9
       30 letters,  4 strands        8   no exchanges        69.0            2.2       43.6
       50 letters,  5 strands       18   cool               127.4            3.4       95.5
       50 letters,  5 strands       18   heat               100.5            1.9       63.5
       50 letters,  5 strands       18   no exchanges       107.1            3.5       87.3
      100 letters,  8 strands       42   cool               101.0            2.2       70.5
      100 letters,  8 strands       42   heat               103.1            1.6       56.3
      100 letters,  8 strands       42   no exchanges        82.3            2.2       66.0
      400 letters, 15 strands      233   cool               110.4            1.4       52.0
      400 letters, 15 strands      233   heat               124.2            1.2       46.1
      400 letters, 15 strands      233   no exchanges        78.1            1.4       51.5
    NumPy, 10,000 walkers       size   M tries/s
       12 letters,  3 strands        7        46.5
       50 letters,  5 strands       18        35.9
      100 letters,  8 strands       42        19.5

NumPy comes near only by holding 10,000 walkers of one size, without merges, splits or a record; a
heat of 600 tries from one presentation is what the search asks for, so the compiled walk is kept,
and the same source uncompiled where there is no compiler. The count of moves is kept in a register
while nothing is recorded: counting in memory, as a recording walk must, costs up to half.
"""

import os
import random
import subprocess
import sys
import tempfile
import time
from pathlib import Path

import numpy as np

from braidsearch.arc_walk import Phase, Walk, cool, walk
from braidsearch.diagrams import ArcPresentation, arcs_from_word
from braidsearch.words import Braid

ROOT = Path(__file__).resolve().parents[1]
WALKERS = 10_000
REPEATS = 5
SPEEDS = """
import random, time
from braidsearch.arc_walk import Phase, walk
from braidsearch.diagrams import arcs_from_word
from braidsearch.words import Braid
begin = time.perf_counter()
arcs = arcs_from_word(Braid([1, -2] * 25))
walk(arcs, 0, (Phase(10),))
first = time.perf_counter() - begin
begin = time.perf_counter()
walk(arcs, 0, (Phase(300_000, 20, 0.0),))
print(first, 0.3 / (time.perf_counter() - begin))
"""


def random_word(strands: int, letters: int, seed: int) -> Braid:
    """A word of independent random letters."""
    rng = random.Random(seed)
    return Braid(
        [rng.choice([1, -1]) * rng.randint(1, strands - 1) for _ in range(letters)], strands
    )


def in_process(**environment: str) -> tuple[float, float, float]:
    """A new process: seconds of all of it, of its first walk, and million tries a second."""
    begin = time.perf_counter()
    done = subprocess.run(
        [sys.executable, "-c", SPEEDS],
        env={**os.environ, **environment},
        capture_output=True,
        text=True,
        check=True,
        cwd=ROOT,
    )
    first, speed = map(float, done.stdout.split())
    return time.perf_counter() - begin, first, speed


def print_start() -> None:
    """What a user waits for on a fresh machine, then every time, and on the plain path."""
    print("    start of a process          seconds in all   first walk   million tries a second")
    with tempfile.TemporaryDirectory() as folder:
        for name, environment in (
            ("cold: all is compiled", {"NUMBA_CACHE_DIR": folder}),
            ("warm: loaded from disk", {"NUMBA_CACHE_DIR": folder}),
            ("plain, not compiled", {"NUMBA_DISABLE_JIT": "1"}),
        ):
            total, first, speed = in_process(**environment)
            print(f"      {name:<28}{total:12.2f}{first:13.2f}{speed:19.1f}")


def best_speed(arcs: ArcPresentation, phase: Phase) -> tuple[float, Walk]:
    """Million tries a second, the best of a few runs, in processor time."""
    speeds = []
    for _ in range(REPEATS):
        begin = time.process_time()
        done = walk(arcs, 1, (phase,))
        speeds.append(phase.tries / (time.process_time() - begin) / 1e6)
    return max(speeds), done


def print_walks() -> None:
    """Cooling, heating and recording, from small presentations to large ones."""
    tries = 4_000_000
    phases = {
        "cool": Phase(tries),
        "heat": Phase(tries, 10, merges=0.0),
        "no exchanges": Phase(tries, exchanges=0.0),
    }
    print(
        "    one core, compiled          size   phase          M tries/s   tries a move   recorded"
    )
    for strands, letters in ((3, 12), (4, 30), (5, 50), (8, 100), (15, 400)):
        arcs = cool(arcs_from_word(random_word(strands, letters, 5)), 0, 20_000).end
        for name, phase in phases.items():
            speed, done = best_speed(arcs, phase)
            begin = time.process_time()
            next(done.iter_moves(), None)
            recorded = tries / (time.process_time() - begin) / 1e6
            print(
                f"      {letters:3} letters, {strands:2} strands {arcs.size:8}   {name:<14}"
                f"{speed:10.1f}{tries / max(done.moves, 1):15.1f}{recorded:11.1f}"
            )


def many_walkers(arcs: ArcPresentation, rounds: int) -> float:
    """Million tries a second of NumPy walking 10,000 walkers at once, swaps only."""
    rng = np.random.default_rng(1)
    size = arcs.size
    parts = np.array([arcs.starts, arcs.ends, arcs.leaves, arcs.enters], dtype=np.int32)
    cells = np.tile(parts.ravel(), WALKERS)
    origin = np.arange(WALKERS, dtype=np.int32) * (4 * size)
    begin = time.process_time()
    for _ in range(rounds):
        place = rng.integers(0, 2 * size, WALKERS, dtype=np.int32)
        axis, p = np.divmod(place, size)
        base = origin + axis * (2 * size)
        other = origin + (1 - axis) * (2 * size)
        q = np.where(p == size - 1, 0, p + 1)
        a, b = cells[base + p], cells[base + size + p]
        c, d = cells[base + q], cells[base + size + q]
        apart = np.flatnonzero((a - c) * (a - d) * (b - c) * (b - d) > 0)
        base, other, p, q = base[apart], other[apart], p[apart], q[apart]
        a, b, c, d = a[apart], b[apart], c[apart], d[apart]
        cells[base + p], cells[base + size + p] = c, d
        cells[base + q], cells[base + size + q] = a, b
        cells[other + c], cells[other + size + d] = p, p
        cells[other + a], cells[other + size + b] = q, q
    taken = time.process_time() - begin
    check_walkers(cells.reshape(WALKERS, 4, size))
    return rounds * WALKERS / taken / 1e6


def check_walkers(cells: np.ndarray) -> None:
    """Raise RuntimeError unless sections 0 and 2, 1 and 3 are still inverse permutations."""
    for section in (0, 1):
        back = np.take_along_axis(cells[:, section + 2], cells[:, section], axis=1)
        if not (back == np.arange(cells.shape[2])).all():
            raise RuntimeError("the NumPy walk has damaged its presentations")


def print_many_walkers() -> None:
    """The NumPy walk beside the compiled one, from the same presentations."""
    print("    NumPy, 10,000 walkers       size   M tries/s")
    for strands, letters in ((3, 12), (5, 50), (8, 100)):
        arcs = cool(arcs_from_word(random_word(strands, letters, 5)), 0, 20_000).end
        speed = max(many_walkers(arcs, 100) for _ in range(3))
        print(f"      {letters:3} letters, {strands:2} strands {arcs.size:8}{speed:12.1f}")


def main() -> None:
    """Print the three tables."""
    print_start()
    print_walks()
    print_many_walkers()


if __name__ == "__main__":
    main()
