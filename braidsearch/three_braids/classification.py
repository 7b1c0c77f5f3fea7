"""The classification of closed 3-braids by Birman and Menasco, as a value of the link."""

from __future__ import annotations

from braidsearch.errors import InputError
from braidsearch.moves import power
from braidsearch.three_braids.conjugacy import three_braid_class
from braidsearch.three_braids.flype_family import flype_exponents
from braidsearch.three_braids.torus_links import torus_link_classes, torus_twists
from braidsearch.words import Braid

MOST_STRANDS = 3


def link_classes(braid: Braid) -> list[list[int]]:
    """All conjugacy classes of 3-braids that close to the closure of the braid, sorted.

    Each is a list: the exponent sum, then the letters of the least rotation of the cyclic word of
    its image in Z_2 * Z_3, 0 for Delta, 1 for s1 s2, -1 for its inverse. Two braids of at most 3
    strands have the same oriented link as closures exactly when these values are equal: the unknot
    has three classes, a torus link (2, k) two, a link with a flype to another class these two, and
    every other link one (Birman, Menasco, Studying links via closed braids III, 1993). Cost: linear
    in the number of letters. Raises InputError for a braid on more than 3 strands.
    """
    named = three_braid_class(on_three_strands(braid))
    twists = torus_twists(named)
    if twists:
        return sorted(member.value for member in torus_link_classes(twists[0]))
    if flype_exponents(named) is not None:
        return sorted([named.value, named.reverse().value])
    return [named.value]


def on_three_strands(braid: Braid) -> Braid:
    """The braid, stabilized positively where it has fewer than 3 strands.

    Raises InputError for a braid on more.
    """
    check_strands(braid)
    if braid.strands == 3:
        return braid
    twists = braid.exponent_sum if braid.strands == 2 else 1
    return Braid.trusted((*power(1, twists), 2), 3)


def check_strands(braid: Braid) -> None:
    """Raise InputError for a braid that the classification does not speak of."""
    if braid.strands > MOST_STRANDS:
        raise InputError(
            f"a braid on {braid.strands} strands: expected {MOST_STRANDS} at most, for which "
            "closed braids are classified"
        )
