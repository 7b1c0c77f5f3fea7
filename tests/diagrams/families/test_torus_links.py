"""Torus links and cables: published polynomials, and Seifert's and Burau's formulas."""

from math import gcd

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch import InputError, SearchLimits, compare
from braidsearch.diagrams.families import cable, torus_link
from braidsearch.invariants import (
    alexander_polynomial,
    component_count,
    jones_polynomial,
    pair_linking_numbers,
)
from braidsearch.invariants.laurent import multiply, normalise_units
from braidsearch.words import Braid
from tests.strategies import braids

KNOTS = [(p, q) for p in range(2, 8) for q in range(2, 8) if gcd(p, q) == 1]


def one_minus_power(power):
    return [[0, 1], [power, -1]]


def stretched(polynomial, factor):
    """The polynomial in t^factor."""
    return [[exponent * factor, coefficient] for exponent, coefficient in polynomial]


@pytest.mark.parametrize(("p", "q"), KNOTS)
def test_alexander_polynomials(p, q):
    """Delta (1 - t^p)(1 - t^q) = (1 - t)(1 - t^pq) for T(p, q) (Burau, 1932)."""
    left = multiply(alexander_polynomial(torus_link(p, q)), one_minus_power(p))
    right = multiply(one_minus_power(1), one_minus_power(p * q))
    assert normalise_units(multiply(left, one_minus_power(q))) == normalise_units(right)


@pytest.mark.parametrize(("p", "q"), KNOTS)
def test_jones_polynomials(p, q):
    """V (1 - t^2) = t^((p-1)(q-1)/2) (1 - t^(p+1) - t^(q+1) + t^(p+q)) (Jones, 1987)."""
    shift = (p - 1) * (q - 1)
    terms = {shift: 1, shift + 2 * (p + q): 1}
    for exponent in (shift + 2 * (p + 1), shift + 2 * (q + 1)):
        terms[exponent] = terms.get(exponent, 0) - 1
    expected = sorted([e, c] for e, c in terms.items() if c)
    assert multiply(jones_polynomial(torus_link(p, q)), [[0, 1], [4, -1]]) == expected


@pytest.mark.parametrize(("p", "q"), [(2, 3), (2, 4), (3, 5), (2, 7), (3, 6), (4, 6), (5, 4)])
def test_the_two_numbers_may_be_exchanged(p, q):
    """T(p, q) and T(q, p) are the same oriented link."""
    verdict = compare(
        torus_link(p, q), torus_link(q, p), limits=SearchLimits(seconds=None, nodes=5000)
    )
    assert verdict.outcome == "same"


def test_signs_and_components():
    """T(-p, q) and T(p, -q) are the mirror image; gcd(p, q) components link pq/d^2 times."""
    assert torus_link(2, 3) == Braid([1, 1, 1])
    assert torus_link(-3, 4) == torus_link(3, -4)
    assert jones_polynomial(torus_link(3, -4)) == jones_polynomial(torus_link(3, 4).mirror())
    assert torus_link(4, 0) == Braid([], strands=4)
    assert torus_link(1, 9) == Braid([], strands=1)
    assert component_count(torus_link(6, 4)) == 2
    assert pair_linking_numbers(torus_link(6, 4)) == [6]
    assert pair_linking_numbers(torus_link(3, 6)) == [2, 2, 2]


@settings(max_examples=30)
@given(
    braid=braids(max_strands=3, max_letters=6).filter(lambda braid: braid.components == 1),
    strands=st.integers(1, 3),
    twists=st.integers(-3, 3),
)
def test_alexander_polynomials_of_cables(braid, strands, twists):
    """The (k, m) cable of K has Delta_K(t^k) times that of T(k, m) (Seifert, 1950)."""
    made = cable(braid, strands, twists)
    expected = multiply(
        stretched(alexander_polynomial(braid), strands),
        alexander_polynomial(torus_link(strands, twists)),
    )
    if gcd(strands, twists) == 1:
        assert component_count(made) == 1
        assert alexander_polynomial(made) == normalise_units(expected)


@settings(max_examples=30)
@given(braid=braids(max_strands=4, max_letters=10))
def test_parallel_strands_are_not_linked(braid):
    """Without twists the two strands of a component have linking number 0, whatever it does."""
    numbers = sorted(pair_linking_numbers(braid))
    doubled = sorted([*([0] * braid.components), *(n for n in numbers for _ in range(4))])
    assert sorted(pair_linking_numbers(cable(braid, 2, 0))) == doubled


def test_cables_of_the_circle_are_torus_links():
    """One strand gives T(k, m), one strand of a cable gives the braid back."""
    assert cable(Braid([]), 3, 4) == torus_link(3, 4)
    assert cable(Braid([]), 3, -4) == torus_link(3, -4)
    assert cable(Braid([1, -2, 1, -2]), 1, 5) == Braid([1, -2, 1, -2])


@pytest.mark.parametrize(
    ("make", "words"),
    [
        (lambda: torus_link(0, 3), "torus link with p = 0"),
        (lambda: torus_link(400, 400), "torus link T.400, 400.: 159600 letters"),
        (lambda: torus_link(2000, 1), "2000 strands"),
        (lambda: cable(Braid([1]), 0, 1), "0 strands of a cable"),
        (lambda: cable(Braid([1]), 400, 1), "cable of 400 strands"),
    ],
)
def test_what_cannot_be_made(make, words):
    """Bad numbers and words beyond the limits: one line."""
    with pytest.raises(InputError, match=words):
        make()
