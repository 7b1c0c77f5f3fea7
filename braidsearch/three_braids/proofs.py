"""Chains of Markov moves between closed 3-braids that the classification calls the same link."""

from __future__ import annotations

from braidsearch.moves import Move, MoveChain, flype, flype_word, power
from braidsearch.three_braids.classification import check_strands
from braidsearch.three_braids.conjugacy import find_three_braid_conjugator, three_braid_class
from braidsearch.three_braids.flype_family import flype_exponents
from braidsearch.three_braids.torus_links import SIGNS, UNKNOTS, torus_twists, torus_word
from braidsearch.words import Braid


def moves_between(left: Braid, right: Braid) -> list[Move] | None:
    """A chain of Markov moves from left to right; None says that the closures differ.

    Both are on at most 3 strands and of any length; the chain has seven moves at most. It is a
    draft, as the stretches of a search are: what makes a proof of it replays it on a checked
    chain. None rests on the theorem of Birman and Menasco that ``link_classes`` names. Raises
    InputError for braids on more strands.
    """
    check_strands(left)
    check_strands(right)
    for connect in (_by_conjugation, _by_fewer_strands, _by_flype):
        chain = connect(left, right)
        if chain is not None:
            return chain.moves
    return None


def _by_conjugation(left: Braid, right: Braid) -> MoveChain | None:
    chain = MoveChain(left, is_checked=False)
    if left.strands != right.strands:
        return None
    if left.strands == 3:
        return chain if _conjugate(chain, right.word) else None
    if left.exponent_sum != right.exponent_sum:
        return None
    chain.rewrite(right.word)
    return chain


def _conjugate(chain: MoveChain, word: tuple[int, ...]) -> bool:
    """Conjugate on 3 strands to this word, if the current braid is conjugate to it."""
    by = find_three_braid_conjugator(chain.current, Braid.trusted(word, 3))
    if by is not None:
        chain.conjugate(by, word)
    return by is not None


def _by_fewer_strands(left: Braid, right: Braid) -> MoveChain | None:
    """Through the 2-braid of a torus link (2, k), or through one strand for the unknot."""
    one, other = _twists(left), _twists(right)
    common = [twists for twists in one if twists in other]
    if common:
        return min((_through(left, right, k, k) for k in common), key=len)
    if one and other and one[0] in UNKNOTS and other[0] in UNKNOTS:
        return _through(left, right, one[0], other[0])
    return None


def _through(left: Braid, right: Braid, one: int, other: int) -> MoveChain:
    """From left to the 2-braid 1^one, and back from 1^other; over one strand where they differ."""
    chain, back = _to_two_strands(left, one), _to_two_strands(right, other)
    if one != other:
        chain.destabilize()
        back.destabilize()
    chain.extend(back.reversed_moves())
    return chain


def _twists(braid: Braid) -> list[int]:
    """Every k such that the braid leads to the 2-braid 1^k by one destabilization, or is one."""
    if braid.strands == 3:
        return torus_twists(three_braid_class(braid))
    return [braid.exponent_sum] if braid.strands == 2 else list(UNKNOTS)


def _to_two_strands(braid: Braid, twists: int) -> MoveChain:
    chain = MoveChain(braid, is_checked=False)
    if braid.strands == 1:
        chain.stabilize(twists)
    elif braid.strands == 2:
        chain.rewrite(power(1, twists))
    else:
        next(sign for sign in SIGNS if _conjugate(chain, torus_word(twists, sign)))
        chain.destabilize()
    return chain


def _by_flype(left: Braid, right: Braid) -> MoveChain | None:
    if left.strands != 3 or right.strands != 3:
        return None
    named = three_braid_class(left)
    exponents = flype_exponents(named)
    if exponents is None or three_braid_class(right) != named.reverse():
        return None
    chain = MoveChain(left, is_checked=False)
    _conjugate(chain, flype_word(*exponents))
    flype(chain, *exponents)
    _conjugate(chain, right.word)
    return chain
