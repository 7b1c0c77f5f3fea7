"""The invariants computed from published braid words are the published invariants."""

import pytest

from braidsearch.invariants import invariant_named
from tests.knot_tables import iter_knots, iter_links

NAMES = ("alexander", "jones", "homfly", "signature", "determinant")


def disagreements(rows):
    """The words of rows for which some invariant is not what the row says, by name."""
    checked, wrong = 0, []
    for row in rows:
        for braid in row.braids:
            for name in NAMES:
                invariant = invariant_named(name)
                if not invariant.is_applicable(braid) or invariant.estimated_cost(braid) > 2:
                    continue
                checked += 1
                if invariant.compute(braid) != getattr(row, name):
                    wrong.append((row.name, name, braid))
    return checked, wrong


def test_knots_to_ten_crossings():
    """All 249 prime knots: Alexander, Jones, HOMFLY-PT, signature, determinant (KnotInfo)."""
    rows = list(iter_knots(10))
    assert len(rows) == 249
    checked, wrong = disagreements(rows)
    assert checked >= 5 * 249
    assert wrong == []


def test_links_to_eight_crossings():
    """All prime links, in each orientation listed (LinkInfo); both words of each row."""
    rows = list(iter_links(8))
    assert len(rows) > 100
    checked, wrong = disagreements(rows)
    assert checked >= 5 * len(rows)
    assert wrong == []


def test_linking_numbers_of_two_component_links():
    """With two components the linking number is the coefficient of z in the Conway polynomial.

    The theorem is Hoste's (The first coefficient of the Conway polynomial, 1985), the polynomials
    LinkInfo's.
    """
    compute = invariant_named("linking-numbers").compute
    rows = [row for row in iter_links(8) if row.braid.components == 2]
    assert len(rows) > 50
    for row in rows:
        first = dict(map(tuple, row.conway)).get(1, 0)
        assert compute(row.braid) == [first], row.name


@pytest.mark.slow
def test_every_row_of_the_tables():
    """All 12,965 knots to 13 crossings and 4,188 links to 11, and all words of each row."""
    rows = [*iter_knots(13), *iter_links(11)]
    checked, wrong = disagreements(rows)
    assert checked > 5 * len(rows)
    assert wrong == []
