"""Symmetry types of the published knots: each answer proven, each compared with the table.

Run: python -m benchmarks.symmetry_types [--crossings 12] [--seconds 60] [--processes 2]

For every knot of the package ``database-knotinfo`` (C. Livingston, A. H. Moore, KnotInfo) the three
questions of ``find_symmetries`` are asked of its first braid word, and the type that follows is put
beside the column ``symmetry_type``: reversible (the reverse alone is the same knot), chiral (no
image is), fully, positive and negative amphicheiral. An answer counts only with a certificate
that the verifier accepts.

Measured on two cores, of which others took two fifths:

    2977 knots in 43.8 minutes
    symmetry_type             knots  agree   open  against
    reversible                 1580   1580      0        0
    chiral                     1319   1319      0        0
    fully amphicheiral           30     30      0        0
    positive amphicheiral         1      1      0        0
    negative amphicheiral        47     47      0        0
      seconds       median 0.47, nine in ten 4.06, at most 36.67
      verification  median 0.01, nine in ten 0.16, at most 12.52
"""

import argparse
import time
from collections import Counter
from concurrent.futures import ProcessPoolExecutor
from dataclasses import dataclass

from benchmarks.tables import spread
from braidsearch import Braid, SearchLimits, find_symmetries, verify
from tests.knot_tables import iter_knots

SYMMETRIES = ("mirror", "reverse", "mirror-reverse")
TYPES = {
    "reversible": ("different", "same", "different"),
    "chiral": ("different", "different", "different"),
    "fully amphicheiral": ("same", "same", "same"),
    "positive amphicheiral": ("same", "different", "different"),
    "negative amphicheiral": ("different", "different", "same"),
}
"""The outcomes for mirror, reverse and mirror-reverse that each type means."""


@dataclass(frozen=True)
class Answer:
    """The three outcomes for a knot, what each rests on, and the seconds that they took."""

    name: str
    type: str
    outcomes: tuple[str, ...]
    evidence: tuple[str, ...]
    seconds: float
    verification: float


def examine_symmetries(task: tuple[str, str, Braid, float]) -> Answer:
    """Ask the three questions of one knot."""
    name, table_type, braid, seconds = task
    start = time.perf_counter()
    verdicts = find_symmetries(braid, limits=SearchLimits(seconds=seconds, nodes=None))
    taken = time.perf_counter() - start
    start = time.perf_counter()
    for verdict in verdicts.values():
        if verdict.certificate is not None and not verify(verdict.certificate).valid:
            raise AssertionError(f"{name}: a certificate is not accepted")
    checked = time.perf_counter() - start
    outcomes = tuple(verdicts[symmetry].outcome for symmetry in SYMMETRIES)
    evidence = tuple(verdicts[symmetry].reason for symmetry in SYMMETRIES)
    return Answer(name, table_type, outcomes, evidence, taken, checked)


def print_agreement(answers: list[Answer]) -> None:
    """For each type of the table: how many answers agree, are open or disagree."""
    print(f"{'symmetry_type':<24s} {'knots':>6s} {'agree':>6s} {'open':>6s} {'against':>8s}")
    for table_type, expected in TYPES.items():
        counts: Counter[str] = Counter(
            judgement(answer, expected) for answer in answers if answer.type == table_type
        )
        figures = (counts.total(), counts["agree"], counts["open"], counts["against"])
        print("{:<24s} {:6d} {:6d} {:6d} {:8d}".format(table_type, *figures))
    print("  seconds      ", spread([answer.seconds for answer in answers], ".2f"))
    print("  verification ", spread([answer.verification for answer in answers], ".2f"))


def judgement(answer: Answer, expected: tuple[str, ...]) -> str:
    """Whether the outcomes are as expected, some of them open, or one of them another."""
    pairs = list(zip(answer.outcomes, expected, strict=True))
    if any(outcome not in (wanted, "undecided") for outcome, wanted in pairs):
        return "against"
    return "open" if any(outcome == "undecided" for outcome, _ in pairs) else "agree"


def main() -> None:
    """Ask for every knot and print the agreement, and the knots that do not agree."""
    parser = argparse.ArgumentParser(description=(__doc__ or "").splitlines()[0])
    parser.add_argument("--crossings", type=int, default=12)
    parser.add_argument("--seconds", type=float, default=60.0)
    parser.add_argument("--every", type=int, default=1, help="take every so manieth knot only")
    parser.add_argument("--type", default=None, help="take the knots of this symmetry_type only")
    parser.add_argument("--processes", type=int, default=2)
    given = parser.parse_args()
    tasks = [
        (row.name, row.columns["symmetry_type"].strip(), row.braid, given.seconds)
        for row in list(iter_knots(given.crossings))[:: given.every]
        if given.type in (None, row.columns["symmetry_type"].strip())
    ]
    start = time.perf_counter()
    with ProcessPoolExecutor(given.processes) as pool:
        answers = list(pool.map(examine_symmetries, tasks, chunksize=4))
    print(f"{len(answers)} knots in {(time.perf_counter() - start) / 60:.1f} minutes")
    print_agreement(answers)
    for answer in answers:
        if judgement(answer, TYPES[answer.type]) != "agree":
            print(answer.name, answer.type, *answer.outcomes, sep="\t")


if __name__ == "__main__":
    main()
