"""Every invariant agrees with a second, slow implementation by another route."""

import pytest
from hypothesis import given, settings

from braidsearch.invariants import invariant_named
from braidsearch.words import Braid
from tests.invariants import oracles
from tests.strategies import braids

ORACLES = {
    "components": oracles.component_count,
    "linking-numbers": oracles.linking_numbers,
    "linking-sums": oracles.linking_sums,
    "determinant": oracles.determinant_by_seifert,
    "signature": oracles.signature_by_seifert,
    "alexander": oracles.alexander_by_seifert,
    "jones": oracles.jones_by_states,
    "homfly": lambda braid: [list(term) for term in oracles.homfly_by_skein(braid)],
}


@pytest.mark.parametrize("name", ORACLES)
@settings(max_examples=150)
@given(braid=braids(max_strands=6, max_letters=9))
def test_small_words(name, braid):
    """On any short word, empty and split ones among them, the two routes give one value."""
    assert invariant_named(name).compute(braid) == ORACLES[name](braid)


@pytest.mark.parametrize(
    "name", ["components", "linking-numbers", "linking-sums", "determinant", "signature"]
)
@settings(max_examples=60)
@given(braid=braids(max_strands=7, max_letters=30))
def test_numbers_of_longer_words(name, braid):
    """The invariants that are numbers agree with the slow routes on longer words too."""
    assert invariant_named(name).compute(braid) == ORACLES[name](braid)


@settings(max_examples=20)
@given(braid=braids(max_strands=5, max_letters=20))
def test_alexander_polynomials_of_longer_words(braid):
    """The Burau matrix modulo primes agrees with sympy's determinant of V - t V^T."""
    assert invariant_named("alexander").compute(braid) == oracles.alexander_by_seifert(braid)


def test_the_trefoil_and_the_hopf_link():
    """The values that fix the conventions: Jones 1985, HOMFLY-PT 1985, signature -2."""
    trefoil, hopf = Braid([1, 1, 1]), Braid([1, 1])
    assert invariant_named("jones").compute(trefoil) == [[2, 1], [6, 1], [8, -1]]
    assert invariant_named("homfly").compute(trefoil) == [[2, 0, 2], [2, 2, 1], [4, 0, -1]]
    assert invariant_named("signature").compute(trefoil) == -2
    assert invariant_named("alexander").compute(trefoil) == [[0, 1], [1, -1], [2, 1]]
    assert invariant_named("alexander").compute(hopf) == [[0, 1], [1, -1]]
    assert invariant_named("linking-numbers").compute(hopf) == [1]
