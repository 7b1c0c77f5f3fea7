"""The flype of a closed 3-braid, written out in the four moves that a proof may hold."""

from __future__ import annotations

from braidsearch.errors import InputError
from braidsearch.moves.chain import MoveChain

Letters = tuple[int, ...]


def power(letter: int, exponent: int) -> Letters:
    """The letter as often as the exponent says, inverted where that is negative."""
    return (letter,) * exponent if exponent >= 0 else (-letter,) * -exponent


def flype_word(u: int, v: int, w: int, sign: int) -> Letters:
    """The word 1^u 2^v 1^w 2^sign."""
    return (*power(1, u), *power(2, v), *power(1, w), 2 * sign)


def flype(chain: MoveChain, u: int, v: int, w: int, sign: int) -> None:
    """Flype 1^u 2^v 1^w 2^sign to 1^w 2^v 1^u 2^sign at the end of the chain.

    The current word must be literally the first, on 3 strands; the exponents are any integers.
    Birman, Menasco, Studying links via closed braids III, 1993; written out through one
    stabilization and one destabilization, both of the given sign. Raises InputError when the
    current word is another.

    For the sign +1 let r = 2 1 3 2, k = w - 1 and x = u - 1. Up to conjugation in B_4
      2 1^v 2^w 1 2^x 3  is  1^v 3^x 2^k r,    since 2^x 3 2 = 3 2 3^x;
                             3^v 1^x 2^k r,    turned over by the half twist, which r survives;
                             2^k 1^v 3^x r,    since r 1 = 3 r and r 3 = 1 r;
                             2^x 1 2^w 1^v 2 3 by the first line read backwards.
    The first is a stabilization of 1^u 2^v 1^w 2 turned over, the last one of its flype. All
    crossings changed, the same holds for the sign -1.
    """
    if chain.current.strands != 3 or chain.current.word != flype_word(u, v, w, sign):
        expected = list(flype_word(u, v, w, sign))
        raise InputError(f"flype in {list(chain.current.word)}: expected {expected} on 3 strands")
    first, last, around = sign * u, sign * w, sign * u - 1  # exponents of the positive picture
    half_twist = (1, 2, 1)
    one, other = power(1, around), power(2, around)
    middle, turned = power(1, sign * v), power(2, last)

    def conjugate(by: Letters, word: Letters) -> None:
        chain.conjugate((sign * letter for letter in by), (sign * letter for letter in word))

    conjugate((*one, *half_twist), (2, *middle, *turned, 1, *other))
    chain.stabilize(sign)
    by = (-3, *power(2, 2 - first), 3, *power(1, -last), *power(2, 2 - first))
    conjugate(by, (*other, 1, *turned, *middle, 2, 3))
    chain.destabilize()
    chain.conjugate([sign * letter for letter in (*half_twist, *one, 2)], flype_word(w, v, u, sign))
