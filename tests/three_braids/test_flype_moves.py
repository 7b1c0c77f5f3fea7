"""The flype written out in primitive moves: true for all exponents, and in both directions."""

from itertools import product

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.errors import InputError
from braidsearch.moves import MoveChain, Stabilize, flype, flype_word, power
from braidsearch.words import Braid

exponents = st.integers(-40, 40)
signs = st.sampled_from([1, -1])


def flyped_chain(u: int, v: int, w: int, sign: int) -> MoveChain:
    """The chain of a flype, every move checked by the normal form when it is made."""
    chain = MoveChain(Braid(flype_word(u, v, w, sign), 3))
    flype(chain, u, v, w, sign)
    return chain


def test_small_exponents():
    """All exponents to 4 and both signs: five moves at most, each of them true."""
    for u, v, w, sign in product(*[range(-4, 5)] * 3, (1, -1)):
        chain = flyped_chain(u, v, w, sign)
        assert chain.current == Braid(flype_word(w, v, u, sign), 3)
        assert len(chain) <= 5


@given(exponents, exponents, exponents, signs)
def test_any_exponents_and_back(u, v, w, sign):
    """The chain leads to the flype, through one stabilization of the sign, and back again."""
    chain = flyped_chain(u, v, w, sign)
    assert chain.current.word == power(1, w) + power(2, v) + power(1, u) + (2 * sign,)
    stabilizations = [move.sign for move in chain.moves if isinstance(move, Stabilize)]
    assert stabilizations == [sign]
    back = MoveChain(chain.current)
    back.extend(chain.reversed_moves())
    assert back.current == chain.start


@pytest.mark.parametrize("at", [(900, -400, -700, 1), (-500, 600, 800, -1)])
def test_exponents_of_hundreds(at):
    """Words of two thousand letters: the same five moves."""
    u, v, w, sign = at
    assert flyped_chain(*at).current == Braid(flype_word(w, v, u, sign), 3)


def test_a_flype_needs_its_form():
    """Another word, and the right one on more strands, are refused."""
    with pytest.raises(InputError, match="expected"):
        flype(MoveChain(Braid([1, 2, 1, 2, 2], 3)), 1, 1, 1, 1)
    with pytest.raises(InputError, match="on 3 strands"):
        flype(MoveChain(Braid(flype_word(3, 2, 4, 1), 4)), 3, 2, 4, 1)
