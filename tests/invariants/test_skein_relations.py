"""The skein relations, and what the HOMFLY-PT polynomial specialises to."""

from collections import Counter

from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.invariants import alexander_polynomial, homfly_polynomial, jones_polynomial
from braidsearch.words import Braid
from tests.knot_tables import alexander_from_conway
from tests.strategies import braids, braids_on


def combination(*parts):
    """The sum of polynomials, each given with its coefficient and its shift of exponents."""
    terms = Counter()
    for coefficient, shift, polynomial in parts:
        for *exponents, c in polynomial:
            terms[tuple(map(int.__add__, exponents, shift))] += coefficient * c
    return {exponents: c for exponents, c in terms.items() if c}


def draw_skein_triple(data):
    strands = data.draw(st.integers(2, 6))
    before, after = data.draw(braids_on(strands, 12)), data.draw(braids_on(strands, 12))
    index = data.draw(st.integers(1, strands - 1))
    middles = ([index], [-index], [])
    return [Braid([*before.word, *middle, *after.word], strands) for middle in middles]


@settings(max_examples=100)
@given(st.data())
def test_jones(data):
    """t^-1 V(L+) - t V(L-) = (t^(1/2) - t^(-1/2)) V(L0)."""
    plus, minus, smooth = map(jones_polynomial, draw_skein_triple(data))
    right = combination((1, (1,), smooth), (-1, (-1,), smooth))
    assert combination((1, (-2,), plus), (-1, (2,), minus)) == right


@settings(max_examples=100)
@given(st.data())
def test_homfly(data):
    """v^-1 P(L+) - v P(L-) = z P(L0)."""
    plus, minus, smooth = map(homfly_polynomial, draw_skein_triple(data))
    right = combination((1, (0, 1), smooth))
    assert combination((1, (-1, 0), plus), (-1, (1, 0), minus)) == right


def power_of_difference(power):
    """(s - 1/s)^power as terms in s."""
    terms = {0: 1}
    for _ in range(power):
        following = Counter()
        for exponent, c in terms.items():
            following[exponent + 1] += c
            following[exponent - 1] -= c
        terms = following
    return terms


@settings(max_examples=100)
@given(braids(max_strands=6, max_letters=30))
def test_homfly_specialises_to_jones(braid):
    """V(t) = P(v = t, z = t^(1/2) - t^(-1/2)), both times z^(components - 1)."""
    raised = braid.components - 1
    left, right = Counter(), Counter()
    for v, z, c in homfly_polynomial(braid):
        for exponent, d in power_of_difference(z + raised).items():
            left[2 * v + exponent] += c * d
    for half, c in jones_polynomial(braid):
        for exponent, d in power_of_difference(raised).items():
            right[half + exponent] += c * d
    assert +left == +right
    assert -left == -right


@settings(max_examples=100)
@given(braids(max_strands=6, max_letters=30))
def test_homfly_specialises_to_alexander(braid):
    """Delta = P(v = 1, z = t^(1/2) - t^(-1/2)) up to units; negative powers of z cancel."""
    conway = Counter()
    for _, z, c in homfly_polynomial(braid):
        conway[z] += c
    terms = sorted([z, c] for z, c in conway.items() if c)
    assert all(z >= 0 for z, _ in terms)
    assert alexander_polynomial(braid) == alexander_from_conway(terms)
