"""Simplification keeps the link, writes down every step, and loses visible strands."""

import random

from hypothesis import given

from braidsearch.moves import MoveChain
from braidsearch.normal_form import are_equal
from braidsearch.search.limits import Budget, SearchLimits
from braidsearch.search.simplify import simplify
from braidsearch.words import Braid
from braidsearch.words.handles import reduce_handles, reduce_handles_turned
from tests.scrambles import scramble
from tests.strategies import braids

FREE = SearchLimits(seconds=None, nodes=None)


@given(braids(max_strands=6, max_letters=30))
def test_handle_reduction_keeps_the_element(braid):
    """Both reductions give words for the same element, never longer than the reduced word."""
    for reduced in (reduce_handles(braid), reduce_handles_turned(braid)):
        assert are_equal(braid, reduced)
        assert len(reduced) <= len(braid)


@given(braids(max_strands=6, max_letters=20), braids(max_strands=6, max_letters=20))
def test_handle_reduction_finds_the_empty_word(braid, other):
    """A word for the trivial braid that does not cancel freely reduces to nothing."""
    strands = max(braid.strands, other.strands, 3)
    one, two = Braid(braid.word, strands), Braid(other.word, strands)
    relation = Braid([1, 2, 1, -2, -1, -2], strands)
    trivial = one * two * relation * two.inverse() * one.inverse()
    assert reduce_handles(trivial).word == ()


@given(braids(max_strands=5, max_letters=20))
def test_the_chain_leads_to_fewer_strands_and_letters(braid):
    """Every drafted step holds when it is checked; no strand is added, and no circle lost."""
    chain = simplify(braid, Budget(FREE), summit_cap=50)
    checked = MoveChain(braid)
    checked.extend(chain.moves)
    assert checked.current == chain.current
    assert chain.start == braid
    assert chain.current.strands <= braid.strands
    assert chain.current.components == braid.components


def test_stabilizations_worked_into_the_word_are_taken_out():
    """Most scrambles of a torus knot on two strands come back to two strands by greed alone."""
    generator = random.Random(12)
    ends = [
        simplify(scramble(Braid([1] * 5), generator, 40, 3), Budget(FREE), 100).current
        for _ in range(20)
    ]
    assert sum(end == Braid([1] * 5) for end in ends) >= 15
