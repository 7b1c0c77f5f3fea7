"""Tightening reaches the braid index of the tables, and says minimal only where a theorem does."""

import random

import pytest

from braidsearch.certificates import format_certificate
from braidsearch.search.limits import SearchLimits
from braidsearch.search.tighten import strands_lower_bound, tighten
from braidsearch.verifier import verify_text
from braidsearch.words import Braid
from tests.knot_tables import iter_knots
from tests.scrambles import scramble
from tests.unknots import MORTON

LIMITS = SearchLimits(seconds=None, nodes=1_500)

# Where the Morton-Franks-Williams inequality is not sharp, up to 10 crossings (Jones, Hecke
# algebra representations of braid groups and link polynomials, 1987).
EXCEPTIONS = {"9_42", "9_49", "10_132", "10_150", "10_156"}


def test_the_lower_bound_is_sharp_but_for_five_knots():
    """Up to 10 crossings the bound equals the table's braid index, except for the known five."""
    unmet = {
        row.name
        for row in iter_knots(10)
        if strands_lower_bound(row.braid) != int(row.columns["braid_index"])
    }
    assert unmet == EXCEPTIONS


def test_tightening_reaches_the_braid_index():
    """Scrambles come back to the table's braid index, with an accepted certificate."""
    generator = random.Random(9)
    for row in list(iter_knots(11))[5::130]:
        scrambled = scramble(row.braid, generator, 200, 4)
        found = tighten(scrambled, limits=LIMITS)
        assert found.braid.strands == int(row.columns["braid_index"]), row.name
        assert found.certificate.left == scrambled
        assert found.certificate.right == found.braid
        assert verify_text(format_certificate(found.certificate)).valid


@pytest.mark.parametrize("name", sorted(EXCEPTIONS))
def test_exceptions_are_not_shown_minimal(name):
    """Four strands are reached where the bound allows three: not shown minimal."""
    row = next(row for row in iter_knots(10) if row.name == name)
    found = tighten(row.braid, limits=SearchLimits(seconds=None, nodes=300))
    assert found.braid.strands == int(row.columns["braid_index"])
    assert not found.is_minimal


def test_the_unknot_tightens_to_nothing():
    """Morton's braid comes down to one strand without letters, which is minimal."""
    found = tighten(MORTON, limits=LIMITS)
    assert found.braid == Braid([])
    assert found.is_minimal


def test_an_unlink_of_three_circles():
    """Three circles need three strands; the bound says so."""
    found = tighten(Braid([1, 2, -2, -1, 3], 4), limits=LIMITS)
    assert found.braid == Braid([], 3)
    assert found.is_minimal
