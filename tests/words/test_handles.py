"""Handle reduction and the half twist, held against Artin's action on the free group.

Artin, Theory of braids, 1947: the action is faithful, and shares nothing with either.
"""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.words import Braid, free_reduce
from braidsearch.words.half_twist import flip_letters, half_twist
from braidsearch.words.handles import reduce_handles, reduce_handles_turned
from tests.artin_action import artin_images
from tests.strategies import braids

REDUCTIONS = [reduce_handles, reduce_handles_turned]


@pytest.mark.parametrize("reduction", REDUCTIONS)
@given(braid=braids(max_strands=5, max_letters=14))
def test_reduction_keeps_the_element(reduction, braid: Braid) -> None:  # type: ignore[no-untyped-def]
    """The word changes, the braid does not; it is never longer than the freely reduced word."""
    reduced = reduction(braid)
    assert artin_images(reduced) == artin_images(braid)
    assert len(reduced) <= len(free_reduce(braid))
    assert free_reduce(reduced) == reduced


@pytest.mark.parametrize("reduction", REDUCTIONS)
@given(word=braids(max_strands=4, max_letters=10), data=st.data())
def test_trivial_braids_become_the_empty_word(reduction, word: Braid, data) -> None:  # type: ignore[no-untyped-def]
    """w relation w^-1 is the identity, and a braid is it exactly when its word reduces to nothing.

    Dehornoy, A fast method for comparing braids, 1997.
    """
    wide = Braid(word.word, 4)
    relation = data.draw(
        st.sampled_from([(1, 2, 1, -2, -1, -2), (1, 3, -1, -3), (-2, -3, -2, 3, 2, 3)])
    )
    assert reduction(wide * Braid(relation, 4) * wide.inverse()).word == ()


@pytest.mark.parametrize("strands", range(1, 8))
def test_half_twist_crosses_every_two_strands_once(strands: int) -> None:
    """Its length is n(n-1)/2, and it turns the order of the strands round."""
    delta = Braid(half_twist(strands), strands)
    assert len(delta) == strands * (strands - 1) // 2
    assert delta.permutation == tuple(reversed(range(strands)))
    assert all(letter > 0 for letter in delta.word)


@given(braids(max_strands=5, max_letters=12))
def test_turning_over_is_conjugation_by_the_half_twist(braid: Braid) -> None:
    """delta * flip(b) = b * delta (Garside, The braid group and other groups, 1969)."""
    delta = Braid(half_twist(braid.strands), braid.strands)
    turned = Braid(flip_letters(braid.word, braid.strands), braid.strands)
    assert artin_images(delta * turned) == artin_images(braid * delta)
    assert flip_letters(turned.word, braid.strands) == braid.word
