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

    For the sign +1 let r = 2 1 3 2, x = u - 1 and y = w - 1. Up to conjugation in B_4
      2 1^v 2^w 1 2^x 3  is  1^v 3^x 2^y r,    since 2^x 3 2 = 3 2 3^x;
                             3^v 1^x 2^y r,    turned over by the half twist, which keeps r;
                             2^y 1^v 3^x r,    since r 3 = 1 r and r 1 = 3 r;
                             2^x 1 2^w 1^v 2 3 by the first line read backwards.
    The first is a stabilization of 1^u 2^v 1^w 2 turned over, the last one of its flype, and the
    product of the four conjugators is 3^-1 2^(2-u) 3 1^-w 2^(2-u). With all crossings changed the
    same holds for the sign -1.
    """
    if chain.current.strands != 3 or chain.current.word != flype_word(u, v, w, sign):
        expected = list(flype_word(u, v, w, sign))
        raise InputError(f"flype in {list(chain.current.word)}: expected {expected} on 3 strands")
    i, j, k = sign * u, sign * v, sign * w  # the exponents in the picture for the sign +1
    one, two, half_twist = power(1, i - 1), power(2, i - 1), (1, 2, 1)
    stabilized = _signed(sign, 2, *power(1, j), *power(2, k), 1, *two)
    flyped = _signed(sign, *two, 1, *power(2, k), *power(1, j), 2)
    across = (-3, *power(2, 2 - i), 3, *power(1, -k), *power(2, 2 - i))
    chain.conjugate(_signed(sign, *one, *half_twist), stabilized)
    chain.stabilize(sign)
    chain.conjugate(_signed(sign, *across), (*flyped, 3 * sign))
    chain.destabilize()
    chain.conjugate(_signed(sign, *half_twist, *one, 2), flype_word(w, v, u, sign))


def _signed(sign: int, *letters: int) -> Letters:
    return tuple(sign * letter for letter in letters)
