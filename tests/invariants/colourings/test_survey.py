"""Samples of the survey in benchmarks/knot_groups.py; the whole of its first table when slow."""

import pytest

from benchmarks.knot_groups import (
    answer,
    image_claims,
    iter_groups,
    pair_claims,
    same_images,
)
from braidsearch.words import SYMMETRIES
from tests.knot_tables import iter_knots

QUICK = 0.05
"""Most seconds that one value may be estimated to take."""


@pytest.fixture(scope="module")
def rows():
    """The knots to 12 crossings (KnotInfo)."""
    return list(iter_knots(12))


def test_pairs_to_eleven_crossings(rows):
    """Knots that share HOMFLY-PT, Kauffman, Alexander and signature up to mirror image differ.

    In all four symmetries, by classes of some hundreds at most.
    """
    groups = list(iter_groups(row for row in rows if row.crossings <= 11))
    claims = [claim for group in groups for claim in pair_claims(group, SYMMETRIES)]
    assert len(claims) == 4 * 18
    assert [claim for claim in claims if answer((claim, QUICK)).colours is None] == []


def test_a_sample_of_reverses(rows):
    """One in 150 of the knots that the table calls not invertible is told from its reverse."""
    found = [row for row in rows if "reverse" not in same_images(row)]
    assert len(found) == 36 + 1331
    claims = [claim for row in found[::150] for claim in image_claims(row, ("reverse",))]
    assert [claim for claim in claims if answer((claim, QUICK)).colours is None] == []


@pytest.mark.slow
def test_all_pairs(rows):
    """107 groups of 223 knots: all 126 pairs, in all four symmetries."""
    groups = list(iter_groups(rows))
    assert (len(groups), sum(map(len, groups))) == (107, 223)
    claims = [claim for group in groups for claim in pair_claims(group, SYMMETRIES)]
    assert len(claims) == 4 * 126
    assert [claim for claim in claims if answer((claim, 60.0)).colours is None] == []


@pytest.mark.slow
def test_all_reverses_to_eleven_crossings(rows):
    """Every knot to 11 crossings that the table calls not invertible, and no other one.

    The others are asked by the quick colours of the ladder only.
    """
    for row in rows:
        if row.crossings <= 11:
            [claim] = image_claims(row, ("reverse",))
            is_same = "reverse" in same_images(row)
            proven = answer((claim, 0.01 if is_same else 60.0)).colours is not None
            assert proven != is_same, row.name
