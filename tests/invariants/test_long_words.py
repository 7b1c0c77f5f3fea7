"""Words of a thousand letters, whose coefficients do not fit in 64 bits."""

import random
from fractions import Fraction

import pytest

from braidsearch.errors import CapacityError
from braidsearch.invariants import (
    alexander_polynomial,
    homfly_polynomial,
    invariant_named,
    jones_polynomial,
    link_determinant,
    link_signature,
)
from braidsearch.words import Braid
from tests.invariants.big_integer_routes import (
    alexander_value,
    homfly_values_on_three_strands,
    jones_value,
)
from tests.scrambles import scramble


def random_braid(strands, letters, seed):
    generator = random.Random(seed)
    word = [generator.choice([1, -1]) * generator.randrange(1, strands) for _ in range(letters)]
    return Braid(word, strands)


def at(polynomial, value):
    """The value of a polynomial in one variable at a fraction."""
    return sum((c * value**exponent for exponent, c in polynomial), Fraction(0))


def largest_bits(polynomial):
    return max(abs(term[-1]) for term in polynomial).bit_length()


@pytest.mark.parametrize(("strands", "letters"), [(2, 40), (3, 100), (4, 60), (5, 40)])
def test_the_routes_agree_on_short_words(strands, letters):
    """The evaluation at a power of two is the polynomial's value there."""
    braid = random_braid(strands, letters, seed=1)
    bits = letters + strands + 2
    half_power = Fraction(1, 1 << 2 * bits)
    assert jones_value(braid, bits) == at(jones_polynomial(braid), half_power)
    check_alexander(braid, bits)


def check_alexander(braid, bits):
    """The independent value is the polynomial's up to sign and a power of t = 2^bits."""
    own = abs(at(alexander_polynomial(braid), Fraction(1 << bits)))
    other = abs(alexander_value(braid, bits))
    assert (own == 0) == (other == 0)
    if own:
        ratio = own / other
        numerator, denominator = ratio.numerator, ratio.denominator
        power = (numerator * denominator).bit_length() - 1
        assert 1 in (numerator, denominator)
        assert numerator * denominator == 1 << power
        assert power % bits == 0


def test_jones_polynomial_of_a_thousand_letters():
    """Digits of the bracket at A = 2^bits, in Python's integers.

    Each of the 2^1000 states adds at most 2^2 (the bracket of 3 circles, less one) in absolute
    values, so the true coefficients are below 2^1002. The exponents of t^(1/2) are of one parity,
    so the digits are those to the base 1/t = 2^(4 bits), and 4 bits = 1008 separate them.
    """
    braid = random_braid(3, 1000, seed=5)
    polynomial = jones_polynomial(braid)
    assert largest_bits(polynomial) > 64
    assert len({exponent % 2 for exponent, _ in polynomial}) == 1
    assert jones_value(braid, 252) == at(polynomial, Fraction(1, 1 << 504))


def test_alexander_polynomial_of_a_thousand_letters():
    """Digits of the reduced Burau matrix's determinant at t = 2^1008.

    The coefficients add up to at most the number of Kauffman states, so to less than 2^1000.
    """
    braid = random_braid(4, 1000, seed=7)
    assert largest_bits(alexander_polynomial(braid)) > 64
    check_alexander(braid, 1008)


def test_homfly_polynomial_of_a_thousand_letters():
    """Digits of the six coefficients in the Hecke algebra of S_3 at z = 2^1008.

    A letter doubles the largest coefficient at most, and the trace adds six of them.
    """
    braid = random_braid(3, 1000, seed=11)
    polynomial = homfly_polynomial(braid)
    assert largest_bits(polynomial) > 64
    expected = homfly_values_on_three_strands(braid, 1008)
    assert {v for v, _, _ in polynomial} == set(expected)
    for v, wanted in expected.items():
        in_z = [[z, c] for v_exponent, z, c in polynomial if v_exponent == v]
        assert at(in_z, Fraction(1 << 1008)) == wanted


@pytest.mark.parametrize(("strands", "letters"), [(4, 400), (6, 300), (12, 60)])
def test_scrambled_long_words(strands, letters):
    """A long word and a scramble of it, on one strand more, have the same invariants."""
    braid = random_braid(strands, letters, seed=strands)
    other = scramble(braid, random.Random(3), moves=40, more_strands=min(1, 12 - strands))
    assert other != braid
    for name in ("alexander", "jones", "homfly", "signature", "determinant"):
        invariant = invariant_named(name)
        if invariant.is_applicable(braid):
            assert invariant.compute(braid) == invariant.compute(other), name


def test_twelve_strands_and_a_thousand_letters():
    """|Delta(-1)| from the Burau matrix modulo primes is the colouring matrix's determinant."""
    braid = random_braid(12, 1000, seed=2)
    polynomial = alexander_polynomial(braid)
    assert largest_bits(polynomial) > 64
    assert abs(sum(c * (-1) ** exponent for exponent, c in polynomial)) == link_determinant(braid)
    assert link_determinant(braid) > 2**64


@pytest.mark.parametrize("crossings", [101, 100_000])
def test_signature_and_determinant_of_long_torus_links(crossings):
    """The closure of sigma_1^k has signature -(k - 1) and determinant k."""
    braid = Braid([1] * crossings)
    assert link_determinant(braid) == crossings
    assert link_signature(braid) == 1 - crossings


def test_torus_links_on_two_strands():
    """Delta of the closure of sigma_1^k is 1 - t + t^2 - ... (Alexander 1928)."""
    assert alexander_polynomial(Braid([1] * 301)) == [[k, (-1) ** k] for k in range(301)]
    # V = t^((k-1)/2) (1 - t^3 - t^(k+1) + t^(k+2)) / (1 - t^2) for a (2, k) torus knot (Jones 1985)
    value = jones_polynomial(Braid([1] * 301))
    assert value[:3] == [[300, 1], [304, 1], [306, -1]]
    assert len(value) == 301


@pytest.mark.parametrize("name", ["alexander", "jones", "homfly"])
def test_what_is_too_large_is_refused_in_words(name):
    """A hundred thousand letters on eight strands: CapacityError, and said beforehand."""
    invariant = invariant_named(name)
    braid = random_braid(8, 100_000, seed=4)
    assert not invariant.is_applicable(braid)
    with pytest.raises(CapacityError, match=r"polynomial of \d+ letters on 8 strands: expected"):
        invariant.compute(braid)


@pytest.mark.parametrize(("name", "most"), [("jones", 12), ("homfly", 8)])
def test_too_many_strands_are_refused_in_words(name, most):
    """More strands than the tables hold, in one connected factor: CapacityError."""
    invariant = invariant_named(name)
    for strands in (most, most + 1):
        braid = Braid([*range(1, strands), *range(1, strands)], strands)
        assert invariant.is_applicable(braid) == (strands == most)
    with pytest.raises(CapacityError, match=f"on {most + 1} strands: expected at most {most}"):
        invariant.compute(braid)
