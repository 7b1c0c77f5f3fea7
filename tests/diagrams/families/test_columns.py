"""Two-bridge and pretzel links: determinants, linking numbers, classifications, coincidences."""

from fractions import Fraction
from math import gcd

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch import InputError, SearchLimits, compare
from braidsearch.diagrams.families import continued_fraction, pretzel_link, two_bridge_link
from braidsearch.diagrams.vogel import braid_from_diagram
from braidsearch.invariants import alexander_polynomial, jones_polynomial, link_determinant
from braidsearch.words import Braid

LEHMER = [1, 1, 0, -1, -1, -1, -1, -1, 0, 1, 1]
"""Lehmer's polynomial (Lehmer, 1933), coefficients from memory."""


def evaluated(terms):
    """Numerator and denominator of c1 + 1/(c2 + ...), coprime, as a projective number."""
    numerator, denominator = 1, 0
    for term in reversed(terms):
        numerator, denominator = term * numerator + denominator, numerator
    return numerator, denominator


def linking_number(diagram):
    """Half the signed count of the crossings between different components."""
    component = diagram.component_of_arc
    between = [c.sign for c in diagram.crossings if component[c.arcs[0]] != component[c.arcs[1]]]
    return sum(between) // 2


def outcome(left, right):
    """The outcome of comparing two diagrams."""
    braids = braid_from_diagram(left), braid_from_diagram(right)
    return compare(*braids, limits=SearchLimits(seconds=None, nodes=5000)).outcome


@given(terms=st.lists(st.integers(-4, 4), min_size=1, max_size=6))
@settings(max_examples=60)
def test_determinants_of_two_bridge_links(terms):
    """The determinant of the two-bridge link of p/q is |p|; two components exactly for even p."""
    p, _ = evaluated(terms)
    diagram = two_bridge_link(terms)
    assert diagram.component_count == (1 if p % 2 else 2)
    assert link_determinant(braid_from_diagram(diagram)) == abs(p)


@given(p=st.integers(-200, 200).filter(bool), q=st.integers(-200, 200).filter(bool))
def test_continued_fractions(p, q):
    """The terms give p/q back; a common divisor is refused."""
    if gcd(p, q) > 1:
        with pytest.raises(InputError, match="expected coprime"):
            continued_fraction(p, q)
        return
    numerator, denominator = evaluated(continued_fraction(p, q))
    assert Fraction(numerator, denominator) == Fraction(p, q)


@pytest.mark.parametrize("p", range(2, 31, 2))
def test_linking_numbers_of_two_bridge_links(p):
    """lk = sum over odd k < p of (-1)^floor(k q / p) (Tuler, 1981), so the orientation is fixed."""
    for q in range(1 - p, p, 2):
        if gcd(p, q) == 1:
            diagram = two_bridge_link(continued_fraction(p, q))
            assert linking_number(diagram) == sum((-1) ** (k * q // p % 2) for k in range(1, p, 2))


def test_small_two_bridge_links():
    """[3] is the right-handed trefoil, [2, 2] the figure-eight knot, [2] a positive Hopf link."""
    assert braid_from_diagram(two_bridge_link([2])).components == 2
    assert outcome(two_bridge_link([3]), two_bridge_link([0, -2, 1])) == "different"
    for terms, word in [([3], [1, 1, 1]), ([2, 2], [1, -2, 1, -2]), ([2], [1, 1]), ([0], None)]:
        expected = Braid([], strands=2) if word is None else Braid(word)
        made = braid_from_diagram(two_bridge_link(terms))
        assert jones_polynomial(made) == jones_polynomial(expected)


@pytest.mark.parametrize("p", range(2, 10))
def test_schubert_classification(p):
    """Same exactly when q' is q or its inverse, modulo p for knots and 2 p for links."""
    modulus = p if p % 2 else 2 * p
    numerators = [q for q in range(1 - p, p) if gcd(p, q) == 1 and (q > 0 or p % 2 == 0)]
    for i, left in enumerate(numerators):
        for right in numerators[i:]:
            is_same = (left - right) % modulus == 0 or (left * right - 1) % modulus == 0
            diagrams = (two_bridge_link(continued_fraction(p, q)) for q in (left, right))
            assert outcome(*diagrams) == ("same" if is_same else "different"), (p, left, right)


def test_the_pretzel_of_lehmer():
    """The Alexander polynomial of the (-2, 3, 7) pretzel is Lehmer's at -t (Reidemeister, 1932)."""
    expected = [[k, c * (-1) ** k] for k, c in enumerate(LEHMER) if c]
    diagram = pretzel_link(-2, 3, 7)
    assert alexander_polynomial(braid_from_diagram(diagram)) == expected
    assert diagram.writhe == len(diagram.crossings) == 12


@pytest.mark.parametrize("columns", [(-2, 3, 3), (3, 3, -3), (-2, 3, 5), (2, 3, 1), (3, -3, 1, 2)])
def test_pretzel_knots_may_be_turned(columns):
    """Cyclic rotation and reversal of the columns leave a pretzel knot alone (Conway, 1970)."""
    knot = pretzel_link(*columns)
    assert knot.component_count == 1
    assert outcome(knot, pretzel_link(*columns[1:], columns[0])) == "same"
    assert outcome(knot, pretzel_link(*reversed(columns))) == "same"


@given(columns=st.lists(st.integers(-4, 4), min_size=1, max_size=4))
@settings(max_examples=40)
def test_determinants_of_pretzel_links(columns):
    """det P(c1, ..., ck) = |sum over i of the product of the other columns|."""
    total = 0
    for i in range(len(columns)):
        product = 1
        for j, column in enumerate(columns):
            product *= column if j != i else 1
        total += product
    assert link_determinant(braid_from_diagram(pretzel_link(*columns))) == abs(total)


def test_pretzels_with_few_columns():
    """One column is the unknot, two are a torus link, 1 1 1 is the left-handed trefoil."""
    assert outcome(pretzel_link(5), two_bridge_link([1])) == "same"
    assert outcome(pretzel_link(1, 2), two_bridge_link([3])) == "same"
    assert outcome(pretzel_link(1, 1, 1), two_bridge_link([-3])) == "same"
    assert outcome(pretzel_link(1, 1, 1), two_bridge_link([3])) == "different"
    assert pretzel_link(0, 0) == two_bridge_link([0])


@pytest.mark.parametrize(
    ("make", "words"),
    [
        (lambda: two_bridge_link([]), "two-bridge link without twists"),
        (lambda: two_bridge_link([1, 2.5]), "two-bridge link: 2.5: expected integers"),
        (lambda: two_bridge_link([10**9]), "at most 100000 crossings"),
        (pretzel_link, "pretzel link without twists"),
        (lambda: pretzel_link(1, "3"), "pretzel link: '3': expected integers"),
        (lambda: continued_fraction(3, 0), "fraction 3/0"),
    ],
)
def test_what_cannot_be_drawn(make, words):
    """Bad numbers: one line that names them."""
    with pytest.raises(InputError, match=words):
        make()
