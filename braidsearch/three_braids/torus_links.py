"""Closed 3-braids that are closures of fewer strands: the unknot and the torus links (2, k)."""

from __future__ import annotations

from braidsearch.moves import power
from braidsearch.three_braids.conjugacy import ThreeBraidClass, three_braid_class
from braidsearch.words import Braid

SIGNS = (1, -1)
UNKNOTS = (1, -1)


def torus_word(twists: int, sign: int) -> tuple[int, ...]:
    """The word 1^twists 2^sign, a stabilization of the 2-braid 1^twists."""
    return (*power(1, twists), 2 * sign)


def torus_twists(named: ThreeBraidClass) -> list[int]:
    """Every k such that 1^k 2 or 1^k 2^-1 is in the class: its closure is the torus link (2, k).

    The exponent sum leaves one candidate for either sign, and each is looked at. There are two
    only for 1 2^-1 and 1^-1 2, which are conjugate: the unknot.
    """
    candidates = [(named.exponent_sum - sign, sign) for sign in SIGNS]
    return [k for k, sign in candidates if _torus_class(k, sign) == named]


def torus_link_classes(twists: int) -> list[ThreeBraidClass]:
    """All classes of 3-braids with this torus link as closure, 1^k 2 and 1^k 2^-1; k = +-1 joins.

    The torus links (2, 1) and (2, -1) are the unknot, with the classes 1 2, 1 2^-1 and 1^-1 2^-1.
    Birman, Menasco, Studying links via closed braids III, 1993.
    """
    equal = UNKNOTS if twists in UNKNOTS else (twists,)
    return list(dict.fromkeys(_torus_class(k, sign) for k in equal for sign in SIGNS))


def _torus_class(twists: int, sign: int) -> ThreeBraidClass:
    return three_braid_class(Braid.trusted(torus_word(twists, sign), 3))
