"""The verifier's invariants against known values, second routes and the published tables."""

import random

import pytest
from hypothesis import given, settings

from braidsearch.words import Braid
from tests.knot_tables import iter_knots, iter_links
from tests.strategies import braids
from tests.verifier import oracles
from tests.verifier.closures import NAMES, invariant

UNKNOT = Braid([], strands=1)
TREFOIL = Braid([1, 1, 1])
FIGURE_EIGHT = Braid([1, -2, 1, -2])
HOPF = Braid([1, 1])
UNLINK = Braid([], strands=2)
BORROMEAN = Braid([1, -2, 1, -2, 1, -2])

# From the definitions in FORMAT.md: by hand for unknot, unlink, Hopf link and trefoil; Borromean
# linking numbers and the figure-eight knot's polynomials as in any table.
KNOWN = [
    ("components", UNKNOT, 1),
    ("components", HOPF, 2),
    ("components", BORROMEAN, 3),
    ("components", Braid([2], strands=5), 4),
    ("linking-numbers", TREFOIL, []),
    ("linking-numbers", HOPF, [1]),
    ("linking-numbers", Braid([-1, -1, -1, -1]), [-2]),
    ("linking-numbers", BORROMEAN, [0, 0, 0]),
    ("linking-numbers", Braid([1, 1, -2, -2]), [-1, 0, 1]),
    ("linking-sums", TREFOIL, [0]),
    ("linking-sums", HOPF, [1, 1]),
    ("linking-sums", BORROMEAN, [0, 0, 0]),
    ("linking-sums", Braid([1, 1, -2, -2]), [-1, 0, 1]),
    ("linking-sums", Braid([1, 1, 2, 2]), [1, 1, 2]),
    ("alexander", UNKNOT, [[0, 1]]),
    ("alexander", Braid([1]), [[0, 1]]),
    ("alexander", TREFOIL, [[0, 1], [1, -1], [2, 1]]),
    ("alexander", HOPF, [[0, 1], [1, -1]]),
    ("alexander", UNLINK, []),
    ("alexander", Braid([1, 1, 2, -2]), []),
    ("alexander", FIGURE_EIGHT, [[0, 1], [1, -3], [2, 1]]),
    ("jones", UNKNOT, [[0, 1]]),
    ("jones", UNLINK, [[-1, -1], [1, -1]]),
    ("jones", Braid([], strands=3), [[-2, 1], [0, 2], [2, 1]]),
    ("jones", TREFOIL, [[2, 1], [6, 1], [8, -1]]),
    ("jones", HOPF, [[1, -1], [5, -1]]),
    ("jones", FIGURE_EIGHT, [[-4, 1], [-2, -1], [0, 1], [2, -1], [4, 1]]),
    ("homfly", UNKNOT, [[0, 0, 1]]),
    ("homfly", UNLINK, [[-1, -1, 1], [1, -1, -1]]),
    ("homfly", TREFOIL, [[2, 0, 2], [2, 2, 1], [4, 0, -1]]),
    ("homfly", HOPF, [[1, -1, 1], [1, 1, 1], [3, -1, -1]]),
    ("homfly", FIGURE_EIGHT, [[-2, 0, 1], [0, 0, -1], [0, 2, -1], [2, 0, 1]]),
    ("signature", UNKNOT, 0),
    ("signature", TREFOIL, -2),
    ("signature", TREFOIL.mirror(), 2),
    ("signature", HOPF, -1),
    ("signature", FIGURE_EIGHT, 0),
    ("signature", Braid([1, 1, 1, 3, 3, 3]), -4),
    ("signature", UNLINK, 0),
]


@pytest.mark.parametrize(("name", "braid", "value"), KNOWN)
def test_known_values(name, braid, value):
    """The value that FORMAT.md and every table give."""
    assert invariant(name, braid) == value


@pytest.mark.parametrize("name", NAMES)
@settings(max_examples=120)
@given(braid=braids(max_strands=5, max_letters=8))
def test_second_routes(name, braid):
    """Burau, Goeritz, listed smoothings, skein resolution: all give what the verifier computes."""
    assert invariant(name, braid) == oracles.value(name, braid.strands, braid.word)


@settings(max_examples=60)
@given(braid=braids(max_strands=6, max_letters=14))
def test_second_routes_for_longer_words(braid):
    """The same for the invariants whose second route is not exponential."""
    for name in ("components", "linking-numbers", "alexander", "signature"):
        assert invariant(name, braid) == oracles.value(name, braid.strands, braid.word)


def table_rows():
    """A seeded sample of the knots and links of up to nine crossings."""
    generator = random.Random(9)
    return generator.sample(list(iter_knots(9)), 40) + generator.sample(list(iter_links(9)), 60)


@pytest.mark.parametrize("name", ["alexander", "jones", "homfly", "signature"])
def test_published_tables(name):
    """KnotInfo and LinkInfo give the same for the words that they print."""
    for row in table_rows():
        for braid in row.braids:
            if name != "homfly" or braid.strands <= 6:  # the rest takes seconds for each
                assert invariant(name, braid) == getattr(row, name), (row.name, braid)


@pytest.mark.slow
@pytest.mark.parametrize("name", ["alexander", "jones", "homfly", "signature"])
def test_all_published_rows(name):
    """The same for every knot to 12 and every link to 11 crossings; HOMFLY-PT to 6 strands."""
    for row in [*iter_knots(12), *iter_links(11)]:
        for braid in row.braids:
            if name != "homfly" or braid.strands <= 6:
                assert invariant(name, braid) == getattr(row, name), (row.name, braid)
