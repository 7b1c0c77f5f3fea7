"""The published knots up to 10 crossings: each is itself, and none is another.

Source of the words: the package ``database-knotinfo`` (C. Livingston, A. H. Moore, KnotInfo),
read at test time.
"""

import random
from itertools import combinations

import pytest

from braidsearch.search.driver import compare
from braidsearch.search.limits import SearchLimits
from tests.knot_tables import iter_knots
from tests.scrambles import scramble

MOVES, MORE_STRANDS = 40, 2
LIMITS = SearchLimits(seconds=None, nodes=20_000)

# They share every polynomial, signature and linking number: colourings see them.
EQUAL_IN_POLYNOMIALS = {("10_25", "10_56"), ("10_40", "10_103")}


def scrambled_pairs():
    generator = random.Random(249)
    return [(row, scramble(row.braid, generator, MOVES, MORE_STRANDS)) for row in iter_knots(10)]


@pytest.mark.parametrize("share", range(8))
def test_every_knot_is_the_same_as_a_scramble_of_itself(share):
    """Each of the 249 prime knots of 3 to 10 crossings is found again after 40 random moves.

    ``compare`` hands out only certificates that the verifier has accepted.
    """
    pairs = scrambled_pairs()
    assert len(pairs) == 249
    for row, scrambled in pairs[share::8]:
        verdict = compare(row.braid, scrambled, limits=LIMITS)
        assert verdict.outcome == "same", row.name


def pairs_of_equal_crossing_number():
    rows = list(iter_knots(10))
    return [
        (one, other) for one, other in combinations(rows, 2) if one.crossings == other.crossings
    ]


def check_told_apart(pairs):
    for one, other in pairs:
        verdict = compare(one.braid, other.braid, limits=SearchLimits(seconds=None, nodes=50))
        assert verdict.outcome == "different", (one.name, other.name)


def test_knots_of_equal_crossing_number_are_different():
    """A seeded sample of the pairs of distinct knots, each proven different."""
    check_told_apart(random.Random(10).sample(pairs_of_equal_crossing_number(), 300))


def test_pairs_equal_in_polynomials_are_different():
    """The two pairs up to 10 crossings that no polynomial tells apart."""
    pairs = pairs_of_equal_crossing_number()
    chosen = [pair for pair in pairs if (pair[0].name, pair[1].name) in EQUAL_IN_POLYNOMIALS]
    assert len(chosen) == 2
    check_told_apart(chosen)


@pytest.mark.slow
def test_all_knots_of_equal_crossing_number_are_different():
    """All pairs of distinct knots with equal crossing number are proven different."""
    check_told_apart(pairs_of_equal_crossing_number())
