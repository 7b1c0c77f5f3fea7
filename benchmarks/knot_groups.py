"""What colourings by finite groups tell apart where polynomials do not.

Run: python -m benchmarks.knot_groups [TABLE ...] [--every 1] [--processes 2] [--cost SECONDS]

The tables, all by default, are of the knots to 12 crossings in the package ``database-knotinfo``
(C. Livingston, A. H. Moore, KnotInfo), each with the first braid word there:

pairs             knots that share HOMFLY-PT, Kauffman and Alexander polynomial and signature, up
                  to mirror image: each pair in all four symmetries, and by which colours
chirality         seven knots whose HOMFLY-PT polynomial is that of the mirror image
non-invertibility knots whose symmetry_type is not reversible or fully amphicheiral: reverses
agreement         all knots and images: where symmetry_type says that a knot equals its image, no
                  colours of the whole ladder may tell them apart

For each claim the ladder of groups is climbed until colours differ. Claims that no colours prove
are printed one by one. ``--cost`` leaves out colours that are estimated to take longer.
"""

from __future__ import annotations

import argparse
import time
from collections import Counter, defaultdict
from collections.abc import Callable, Iterable, Iterator, Sequence
from concurrent.futures import Executor, ProcessPoolExecutor
from dataclasses import dataclass
from functools import lru_cache

from benchmarks.tables import spread
from braidsearch.invariants import mirror_image
from braidsearch.invariants.colourings import (
    Colours,
    count_colourings,
    estimated_cost,
    group_ladder,
    verification_seconds,
)
from braidsearch.words import SYMMETRIES, Braid, apply_symmetry
from tests.knot_tables import TableRow, iter_knots
from tests.polynomial_text import parse_polynomial

CHIRAL_KNOTS = ("9_42", "10_71", "12a_126", "12a_132", "12a_214", "12a_222", "12a_697")
SAME_IMAGES = {
    "reversible": {"reverse"},
    "chiral": set(),
    "negative amphicheiral": {"mirror-reverse"},
    "positive amphicheiral": {"mirror"},
    "fully amphicheiral": {"mirror", "reverse", "mirror-reverse"},
}
"""For each symmetry_type the images that are the knot itself."""


@dataclass(frozen=True)
class Claim:
    """That the first knot is not the image of the second one under a symmetry."""

    left: str
    right: str
    symmetry: str
    words: tuple[Braid, Braid]


@dataclass(frozen=True)
class Answer:
    """The colours that prove a claim, None where none do; seconds, and the verifier's estimate."""

    claim: Claim
    colours: str | None
    seconds: float
    verification: float


def answer(task: tuple[Claim, float]) -> Answer:
    """Climb the ladder until the numbers of colourings differ."""
    claim, most = task
    left, right = claim.words
    image = apply_symmetry(right, claim.symmetry)
    start = time.perf_counter()
    for colours in group_ladder():
        if max(estimated_cost(left, colours), estimated_cost(image, colours)) > most:
            continue
        if _value(left, colours) != _value(image, colours):
            taken = time.perf_counter() - start
            checked = sum(verification_seconds(braid, colours) for braid in (left, image))
            return Answer(claim, colours.name, taken, checked)
    return Answer(claim, None, time.perf_counter() - start, 0.0)


@lru_cache(maxsize=2048)
def _value(braid: Braid, colours: Colours) -> str:
    """The value as text, so that the images of one knot are not counted again."""
    return str(count_colourings(braid, colours))


def iter_groups(rows: Iterable[TableRow]) -> Iterator[list[TableRow]]:
    """Knots that polynomials and signature do not tell apart up to mirror image, if several."""
    found = defaultdict(list)
    for row in rows:
        found[_shared_values(row)].append(row)
    yield from (group for group in found.values() if len(group) > 1)


def _shared_values(row: TableRow) -> str:
    """The lesser of the knot's values and those of its mirror image, as text."""
    kauffman = parse_polynomial(row.columns["kauffman_polynomial"], ("a", "z"))
    own = (row.homfly, kauffman, row.signature)
    mirrored = (
        mirror_image("homfly", row.homfly),
        sorted([-exponent, *rest] for exponent, *rest in kauffman),
        -row.signature,
    )
    return str((min(own, mirrored), row.alexander))


def pair_claims(rows: Sequence[TableRow], symmetries: Iterable[str]) -> list[Claim]:
    """Claims that all rows are different knots, in these symmetries."""
    return [
        Claim(left.name, right.name, symmetry, (left.braid, right.braid))
        for place, right in enumerate(rows)
        for left in rows[:place]
        for symmetry in symmetries
    ]


def image_claims(row: TableRow, symmetries: Iterable[str]) -> list[Claim]:
    """Claims that a knot is none of these images of itself."""
    return [Claim(row.name, row.name, symmetry, (row.braid, row.braid)) for symmetry in symmetries]


def same_images(row: TableRow) -> set[str]:
    """The images that are the knot itself, as the table has it."""
    return SAME_IMAGES[row.columns["symmetry_type"].strip()]


def climb(pool: Executor, claims: Iterable[Claim], most: float) -> list[Answer]:
    """The answers to all claims."""
    return list(pool.map(answer, [(claim, most) for claim in claims], chunksize=4))


def print_answers(title: str, answers: Sequence[Answer]) -> None:
    """Which colours prove how many claims, times, and the claims that none prove."""
    proven = [one for one in answers if one.colours]
    print(f"\n{title}: {len(proven)} of {len(answers)} claims proven")
    for name, count in Counter(one.colours for one in proven).most_common():
        print(f"  {count:6d}  {name}")
    if proven:
        print("  seconds     ", spread([one.seconds for one in proven], ".3f"))
        print("  verification", spread([one.verification for one in proven], ".2f"), "(estimate)")
    for one in answers:
        if not one.colours:
            claim = one.claim
            print(f"  open: {claim.left} against the {claim.symmetry} of {claim.right}")


def examine_pairs(rows: Sequence[TableRow], pool: Executor, most: float) -> None:
    """Table (a): each pair of knots that share polynomials and signature, in every symmetry."""
    groups = list(iter_groups(rows))
    claims = [claim for group in groups for claim in pair_claims(group, SYMMETRIES)]
    answers = climb(pool, claims, most)
    by_pair = defaultdict(list)
    for one in answers:
        by_pair[one.claim.left, one.claim.right].append(one)
    for (left, right), found in by_pair.items():
        named = ", ".join(f"{one.claim.symmetry}: {one.colours}" for one in found)
        print(f"  {left} {right}  {named}")
    told = sum(all(one.colours for one in found) for found in by_pair.values())
    knots = sum(map(len, groups))
    print_answers("knots that share polynomials and signature", answers)
    print(f"  {len(groups)} groups, {knots} knots, {len(by_pair)} pairs; told apart: {told}")


def examine_chirality(rows: Sequence[TableRow], pool: Executor, most: float) -> None:
    """Table (b): neither the mirror image nor its reverse is the knot."""
    found = [row for row in rows if row.name in CHIRAL_KNOTS]
    claims = [claim for row in found for claim in image_claims(row, ("mirror", "mirror-reverse"))]
    answers = climb(pool, claims, most)
    for one in answers:
        print(f"  {one.claim.left} {one.claim.symmetry}: {one.colours}")
    print_answers("chirality", answers)


def examine_reverses(rows: Sequence[TableRow], pool: Executor, most: float) -> None:
    """Table (c): knots that the table calls not invertible."""
    for title, least, greatest in (("to 10 crossings", 3, 10), ("11 and 12 crossings", 11, 12)):
        claims = [
            claim
            for row in rows
            if least <= row.crossings <= greatest and "reverse" not in same_images(row)
            for claim in image_claims(row, ("reverse",))
        ]
        print_answers(f"non-invertibility, {title}", climb(pool, claims, most))


def examine_agreement(rows: Sequence[TableRow], pool: Executor, most: float) -> None:
    """Table (d): what the table calls the knot itself, no colours tell from it."""
    images = [symmetry for symmetry in SYMMETRIES if symmetry != "identity"]
    claims = [claim for row in rows for claim in image_claims(row, images)]
    same = {(row.name, image) for row in rows for image in same_images(row)}
    table: Counter[tuple[str, bool, bool]] = Counter()
    for one in climb(pool, claims, most):
        claim, is_same = one.claim, (one.claim.left, one.claim.symmetry) in same
        table[claim.symmetry, is_same, one.colours is not None] += 1
        if is_same and one.colours:
            print(f"  CONTRADICTION: {claim.left} and its {claim.symmetry}: {one.colours}")
    print(f"\nagreement with symmetry_type, {len(rows)} knots")
    print("  image            table says   told apart   not told apart")
    for image in images:
        for is_same in (True, False):
            told, not_told = (table[image, is_same, flag] for flag in (True, False))
            said = "the knot" if is_same else "another"
            print(f"  {image:15s}  {said:10s}  {told:11d}  {not_told:15d}")


TABLES: dict[str, Callable[[Sequence[TableRow], Executor, float], None]] = {
    "pairs": examine_pairs,
    "chirality": examine_chirality,
    "non-invertibility": examine_reverses,
    "agreement": examine_agreement,
}


def main() -> None:
    """Print the tables."""
    parser = argparse.ArgumentParser(description=(__doc__ or "").splitlines()[0])
    parser.add_argument("tables", nargs="*", metavar="TABLE", help=", ".join(TABLES))
    parser.add_argument("--every", type=int, default=1, help="take every so manieth knot only")
    parser.add_argument("--processes", type=int, default=2)
    parser.add_argument("--cost", type=float, default=60.0, help="most seconds for one value")
    given = parser.parse_args()
    unknown = set(given.tables) - set(TABLES)
    if unknown:
        parser.error(f"{', '.join(sorted(unknown))}: expected {', '.join(TABLES)}")
    rows = list(iter_knots(12))[:: given.every]
    with ProcessPoolExecutor(given.processes) as pool:
        for name in given.tables or TABLES:
            start = time.perf_counter()
            TABLES[name](rows, pool, given.cost)
            print(f"  {time.perf_counter() - start:.0f} s", flush=True)


if __name__ == "__main__":
    main()
