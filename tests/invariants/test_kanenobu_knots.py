"""Kanenobu's knots: infinitely many with one polynomial, told apart by modules modulo primes."""

from collections import Counter

import pytest

from braidsearch.invariants.alexander_module import alexander_module_factors
from braidsearch.invariants.homfly import homfly_polynomial
from braidsearch.invariants.jones import jones_polynomial
from braidsearch.invariants.laurent import multiply
from braidsearch.words import Braid
from tests.invariants.cover_oracles import multiply_all, with_full_twists
from tests.knot_tables import iter_knots

FIGURE_EIGHT = Braid([1, -2, 1, -2])


def kanenobu_homfly(twists):
    """The HOMFLY-PT polynomial of Kanenobu's knots K(p, q) with p + q full twists.

    P - 1 is v^(2 (p + q)) times that of K(0, 0), the sum of two figure eights: smoothing a
    crossing of the twists gives an unlink of two components.
    """
    single = homfly_polynomial(FIGURE_EIGHT)
    terms = Counter({(v + 2 * twists, z): c for v, z, c in multiply(single, single)})
    terms[2 * twists, 0] -= 1
    terms[0, 0] += 1
    return sorted([v, z, c] for (v, z), c in terms.items() if c)


def kanenobu_module(difference, prime):
    """The invariant factors modulo the prime of the matrix with rows (f, (p - q) t) and (0, f).

    f = t^2 - 3t + 1: this presents the module of K(p, q) (Kanenobu, Infinitely many knots with
    the same polynomial invariant, 1986; from memory).
    """
    f = [1, -3 % prime, 1]
    return [f, f] if difference % prime == 0 else [multiply_all([f, f], prime)]


def kanenobu_knot(p, q):
    """K(p, q) for p >= 1 and q <= -1: more twists in a positive and a negative band of K(1, -1)."""
    braid = Braid([-1, 2, 3, 4, -1, -2, -3, 4, 3, -2, 3, -4])
    return with_full_twists(with_full_twists(braid, 5, -1 - q), 3, p - 1)


@pytest.mark.parametrize("place", [3, 5])
def test_smoothing_a_twisted_band_gives_an_unlink(place):
    """So the skein relation gives the polynomials of K(p, q) from those of K(0, 0)."""
    braid = kanenobu_knot(1, -1)
    smoothed = Braid([*braid.word[:place], *braid.word[place + 1 :]], braid.strands)
    assert homfly_polynomial(smoothed) == [[-1, -1, 1], [1, -1, -1]]


@pytest.mark.parametrize(
    ("p", "q"), [(1, -1), (2, -1), (1, -2), (1, -3), (3, -1), (2, -2), (3, -2)]
)
def test_polynomials_of_kanenobu_knots(p, q):
    """The braids of ``kanenobu_knot`` have polynomials that depend on p + q alone.

    On more than eight strands only the Jones polynomial is computed, v = t, z = t^(1/2) - t^(-1/2).
    """
    braid = kanenobu_knot(p, q)
    if braid.strands <= 8:
        assert homfly_polynomial(braid) == kanenobu_homfly(p + q)
    single = jones_polynomial(FIGURE_EIGHT)
    terms = Counter({(exponent + 4 * (p + q)): c for exponent, c in multiply(single, single)})
    terms[4 * (p + q)] -= 1
    terms[0] += 1
    expected = sorted([exponent, c] for exponent, c in terms.items() if c)
    assert jones_polynomial(braid) == expected


@pytest.mark.parametrize(("p", "q"), sorted({(p, q) for p in range(1, 5) for q in (-1, -2, -p)}))
def test_modules_of_kanenobu_knots(p, q):
    """Modules know which primes divide p - q, so those of K(1, -1) and K(3, -3) differ."""
    for prime in (2, 3, 5, 7, 11):
        factors = alexander_module_factors(kanenobu_knot(p, q), prime)
        assert factors == kanenobu_module(p - q, prime)


def test_kanenobu_knots_of_the_table():
    """Knots to 12 crossings with polynomials of K(p, q) have modules with p - q = p + q mod 2.

    The sum of two figure eights, K(0, 0), shares its polynomial with 12n_462, not its module.
    """
    figure_eights = Braid([1, -2, 1, -2, 3, -4, 3, -4])
    assert homfly_polynomial(figure_eights) == kanenobu_homfly(0)
    twisted = {str(kanenobu_homfly(twists)): twists for twists in range(-4, 5)}
    names = set()
    for row in iter_knots(12):
        if str(row.homfly) in twisted:
            names.add(row.name)
            modules = [alexander_module_factors(row.braid, prime) for prime in (2, 3, 5, 7)]
            parity = twisted[str(row.homfly)] % 2
            assert modules in [
                [kanenobu_module(difference, prime) for prime in (2, 3, 5, 7)]
                for difference in range(parity, 7, 2)
            ]
            if row.name == "12n_462":
                assert row.homfly == kanenobu_homfly(0)
                assert modules[1] != alexander_module_factors(figure_eights, 3)
    assert names >= {"10_137", "12n_462", "12n_145", "12n_838"}
