"""Colourings, signatures at roots of unity and modules against published values and formulas."""

from fractions import Fraction
from itertools import product

import pytest

from braidsearch.words import Braid
from tests.knot_tables import iter_knots
from tests.verifier.closures import invariant
from tests.verifier.permutation_groups import (
    A5,
    ELEVEN,
    MATHIEU,
    S3,
    alternating,
    cycles,
    dihedral,
    projective,
)

UNKNOT, TREFOIL, FIGURE_EIGHT = Braid([], strands=1), Braid([1, 1, 1]), Braid([1, -2, 1, -2])
HOPF, UNLINK = Braid([1, 1]), Braid([], strands=2)

# From the definitions in FORMAT.md, by hand.
KNOWN = [
    ("colouring", S3, UNKNOT, [[1, 1, 2, 3, 3]]),
    ("colouring", S3, TREFOIL, [[1, 1, 2, 3, 9]]),
    ("colouring", S3, FIGURE_EIGHT, [[1, 1, 2, 3, 3]]),
    ("colouring", S3, UNLINK, [[1, 1, 2, 3, 1, 1, 2, 3, 9]]),
    ("colouring", S3, HOPF, [[1, 2, 1, 3, 1, 2, 1, 3, 3]]),
    ("colouring", A5, TREFOIL, [[1, 1, 2, 3, 4, 5, 12], [1, 5, 1, 2, 3, 4, 60]]),
    ("colouring", A5, TREFOIL.mirror(), [[1, 1, 2, 3, 4, 5, 12], [1, 2, 3, 4, 5, 1, 60]]),
    ("levine-tristram", {"order": 2, "power": 1}, TREFOIL, [-2, 0]),
    ("levine-tristram", {"order": 5, "power": 1}, TREFOIL, [-2, 0]),
    ("levine-tristram", {"order": 6, "power": 1}, TREFOIL, [-1, 1]),
    ("levine-tristram", {"order": 7, "power": 1}, TREFOIL, [0, 0]),
    ("levine-tristram", {"order": 7, "power": 1}, UNLINK, [0, 1]),
    ("alexander-module", {"prime": 3}, UNKNOT, []),
    ("alexander-module", {"prime": 3}, TREFOIL, [[1, 2, 1]]),
    ("alexander-module", {"prime": 3}, UNLINK, [[]]),
    (
        "alexander-module",
        {"prime": 5},
        Braid([1, 1, 1, 2, 3, 3, 3]),
        [[1, 4, 1], [1, 4, 1]],
    ),
    (
        "sublinks",
        {"components": 2, "invariant": "alexander"},
        Braid([1, 1, 2, 2]),
        [[], [[0, 1], [1, -1]], [[0, 1], [1, -1]]],
    ),
]


@pytest.mark.parametrize(("name", "parameters", "braid", "value"), KNOWN)
def test_known_values(name, parameters, braid, value):
    """The value that FORMAT.md gives."""
    assert invariant(name, braid, **parameters) == value


@pytest.mark.parametrize(
    ("p", "q"), [(2, 3), (2, 7), (3, 4), (3, 5), (3, 6), (4, 4), (4, 5), (2, 6)]
)
def test_signatures_of_torus_links(p, q):
    """Between the roots: minus the points (i/p, j/q) with i/p + j/q in (x, x + 1), plus the others.

    Litherland, Signatures of iterated torus knots, 1979, from memory; omega = exp(2 pi i x). The
    nullity counts the points with i/p + j/q = x or x + 1.
    """
    torus = Braid([*range(1, p)] * q, strands=p)
    for order, power in ((2, 1), (3, 1), (5, 1), (5, 2), (7, 3), (12, 1), (12, 5), (30, 1)):
        x = Fraction(power, order)
        signature = nullity = 0
        for i, j in product(range(1, p), range(1, q)):
            height = Fraction(i, p) + Fraction(j, q)
            if height in (x, x + 1):
                nullity += 1
            else:
                signature += -1 if x < height < x + 1 else 1
        assert invariant("levine-tristram", torus, order=order, power=power) == [signature, nullity]


def test_dihedral_colourings():
    """p of a 2-bridge knot, p^2 if p divides its determinant (Fox 1961; determinants: KnotInfo).

    All knots to seven crossings are 2-bridge, so the first homology of their double branched
    cover is cyclic.
    """
    for prime in (3, 5, 7, 11):
        generators, reflection = dihedral(prime)
        for row in iter_knots(7):
            value = invariant("colouring", row.braid, generators=generators, meridians=[reflection])
            expected = prime * prime if row.determinant % prime == 0 else prime
            assert sum(entry[-1] for entry in value) == expected, row.name


def test_the_module_counts_dihedral_colourings():
    """p^(1 + number of factors that t + 1 divides) colourings, for knots to nine crossings."""
    for prime in (3, 5, 7):
        generators, reflection = dihedral(prime)
        for row in iter_knots(9):
            module = invariant("alexander-module", row.braid, prime=prime)
            at_minus_one = [sum(c * (-1) ** k for k, c in enumerate(f)) % prime for f in module]
            value = invariant("colouring", row.braid, generators=generators, meridians=[reflection])
            counted = sum(entry[-1] for entry in value)
            assert counted == prime ** (1 + at_minus_one.count(0)), row.name


def test_8_17_and_its_reverse():
    """M11, x of order 11: 1 homomorphism sends a meridian to x, and 23 for the reverse.

    8_17 is the first knot that is not invertible (Trotter's pretzels 1963; Kawauchi 1979).
    """
    braid = Braid([-1, -1, 2, -1, 2, -1, 2, 2])
    counts = []
    for one in (braid, braid.reverse()):
        value = invariant("colouring", one, generators=MATHIEU, meridians=[ELEVEN])
        counts.append(sum(entry[-1] for entry in value) // 720)
    assert sorted(counts) == [1, 23]


def test_the_mutants_of_kinoshita_terasaka_and_conway():
    """11n_42 and 11n_34 (KnotInfo): one HOMFLY-PT polynomial, other colourings by A7."""
    rows = {row.name: row for row in iter_knots(11) if row.name in ("11n_34", "11n_42")}
    one, other = (rows[name].braid for name in ("11n_34", "11n_42"))
    assert rows["11n_34"].homfly == rows["11n_42"].homfly
    seven = {"generators": alternating(7), "meridians": [cycles(7, (1, 2, 3, 4, 5, 6, 7))]}
    values = [invariant("colouring", braid, **seven) for braid in (one, other)]
    assert values[0] != values[1]
    small = {"generators": projective(7), "meridians": projective(7)[:1]}
    for braid in (one, other):
        assert sum(e[-1] for e in invariant("colouring", braid, **small)) == 360


def test_chirality_of_9_42():
    """9_42 has the polynomials of its mirror image, and other colourings (KnotInfo: chiral)."""
    row = next(row for row in iter_knots(9) if row.name == "9_42")
    assert invariant("homfly", row.braid) == invariant("homfly", row.braid.mirror())
    values = [
        invariant("levine-tristram", one, order=2, power=1)
        for one in (row.braid, row.braid.mirror())
    ]
    assert values[0] != values[1]


@pytest.mark.slow
def test_signatures_of_the_table():
    """At -1 the signature of every knot to ten crossings is the table's (KnotInfo)."""
    for row in iter_knots(10):
        value = invariant("levine-tristram", row.braid, order=2, power=1)
        assert value == [row.signature, 0], row.name
