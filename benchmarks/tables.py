"""What the benchmarks share: spreads of figures, and pairs examined by several processes."""

import statistics
import time
from collections.abc import Sequence
from dataclasses import dataclass

from braidsearch import Braid, SearchLimits, compare, verify


@dataclass(frozen=True)
class Result:
    """A comparison: outcome, seconds taken, moves in the proof, seconds to verify it, nodes."""

    name: str
    left: Braid
    right: Braid
    outcome: str
    reason: str
    seconds: float
    moves: int
    verification: float
    nodes: int


def examine(task: tuple[str, Braid, Braid, float], up_to: Sequence[str] = ()) -> Result:
    """Compare two braids within so many seconds; the certificate is verified once more, timed."""
    name, left, right, seconds = task
    start = time.perf_counter()
    limits = SearchLimits(seconds=seconds, nodes=None)
    verdict = compare(left, right, up_to=up_to, limits=limits)
    taken = time.perf_counter() - start
    moves, verification = 0, 0.0
    if verdict.certificate is not None:
        start = time.perf_counter()
        if not verify(verdict.certificate).valid:
            raise AssertionError(f"{name}: the certificate is not accepted")
        verification = time.perf_counter() - start
        moves = len(verdict.certificate.moves)
    nodes = verdict.explored["nodes"]
    return Result(
        name, left, right, verdict.outcome, verdict.reason, taken, moves, verification, nodes
    )


def spread(values: Sequence[float], form: str) -> str:
    """Median, nine in ten, and the most."""
    if len(values) < 2:
        return ", ".join(format(value, form) for value in values)
    ninth = statistics.quantiles(values, n=10)[-1]
    figures = (statistics.median(values), ninth, max(values))
    return "median {}, nine in ten {}, at most {}".format(*(format(f, form) for f in figures))


def print_results(title: str, results: Sequence[Result]) -> None:
    """Outcomes, and the spread of times and proof lengths of those proven same."""
    print(f"{title}: {len(results)}")
    for outcome in ("same", "different", "undecided"):
        count = sum(result.outcome == outcome for result in results)
        print(f"  {outcome:10s} {count:6d}  {100 * count / len(results):6.2f} %")
    same = [result for result in results if result.outcome == "same"]
    print("  seconds     ", spread([result.seconds for result in same], ".2f"))
    print("  moves       ", spread([float(result.moves) for result in same], ".0f"))
    print("  verification", spread([result.verification for result in same], ".3f"), flush=True)
