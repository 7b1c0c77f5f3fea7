"""A move is applied only when it is true, and every chain can be walked back."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.errors import InputError
from braidsearch.moves import (
    Conjugate,
    Destabilize,
    MoveChain,
    Rewrite,
    Stabilize,
    apply_move,
    exchange,
)
from braidsearch.normal_form import are_equal
from braidsearch.words import Braid
from tests.strategies import braids

FALSE_MOVES = [
    Rewrite((1, 2, 2)),  # another element
    Rewrite((1, 2, 1, 3)),  # a letter outside the group
    Conjugate((1,), (1, 2, 1)),  # not the conjugate
    Conjugate((3,), (1, 2, 1)),  # a conjugator outside the group
    Stabilize(1, 4, (1, 2, 1, -3)),  # the sign is not the letter's
    Stabilize(1, 5, (1, 2, 1, 3)),  # the strands do not fit
    Stabilize(2, 4, (1, 2, 1, 6)),  # no such sign
    Stabilize(1, 4, (2, 1, 2, 3)),  # equal in the group, but not literally
    Destabilize(1, 2, (1, 2)),  # the last letter is not sigma_2
    Destabilize(1, 2, ()),  # more than one letter taken
]


@pytest.mark.parametrize("move", FALSE_MOVES, ids=str)
def test_a_false_move_is_refused(move):
    """From 1 2 1 on three strands, none of these is a Markov move."""
    with pytest.raises(InputError):
        apply_move(Braid([1, 2, 1], 3), move)


def test_destabilizing_needs_the_last_generator_just_once():
    """1 2 1 2 ends in sigma_2 but uses it before: the strand cannot be taken away."""
    with pytest.raises(InputError):
        MoveChain(Braid([1, 2, 1, 2], 3)).destabilize()
    with pytest.raises(InputError):
        MoveChain(Braid([], 1)).destabilize()


def test_true_moves_state_their_results():
    """The right-handed trefoil on two strands becomes 1 2 1 2 on three."""
    chain = MoveChain(Braid([1, 1, 1]))
    chain.stabilize(1)
    chain.conjugate([1], [1, 2, 1, 2])
    chain.rewrite([2, 1, 2, 2])
    assert chain.moves == [
        Stabilize(1, 3, (1, 1, 1, 2)),
        Conjugate((1,), (1, 2, 1, 2)),
        Rewrite((2, 1, 2, 2)),
    ]
    back = MoveChain(chain.current)
    back.extend(chain.reversed_moves())
    assert back.current == chain.start


@settings(max_examples=60)
@given(
    braids(max_strands=4, max_letters=6),
    braids(max_strands=4, max_letters=6),
    st.sampled_from([1, -1]),
)
def test_the_exchange_move_is_a_chain_of_true_moves(alpha, beta, sign):
    """alpha s beta s^-1 leads to alpha s^-1 beta s through one stabilization, and back."""
    strands = max(alpha.strands, beta.strands) + 1
    s = sign * (strands - 1)
    chain = MoveChain(Braid((*alpha.word, s, *beta.word, -s), strands))
    exchange(chain, alpha.word, beta.word, sign)
    assert chain.current == Braid((*alpha.word, -s, *beta.word, s), strands)
    back = MoveChain(chain.current)
    back.extend(chain.reversed_moves())
    assert back.current == chain.start


def test_an_exchange_needs_its_form():
    """A word that is not alpha s beta s^-1 is refused."""
    with pytest.raises(InputError, match="expected alpha"):
        exchange(MoveChain(Braid([1, 2, 1, 2], 3)), (1,), (1,), 1)


@given(braids(max_strands=5, max_letters=12), braids(max_strands=5, max_letters=8))
def test_conjugation_computes_its_result(braid, by):
    """Without a stated word the chain writes by^-1 braid by itself."""
    by = Braid([letter for letter in by.word if abs(letter) < braid.strands], braid.strands)
    chain = MoveChain(braid)
    chain.conjugate(by.word)
    assert are_equal(chain.current, by.inverse() * braid * by)
