"""Conjugacy classes in the braid group: a canonical representative, with the conjugator."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from braidsearch.normal_form.conjugation import conjugator_word, slide_to_circuit
from braidsearch.normal_form.left_normal_form import (
    Element,
    ShouldStop,
    are_equal,
    element_of_word,
    element_word,
    never,
)
from braidsearch.normal_form.simple_elements import Permutation, SimpleElements, simple_elements
from braidsearch.normal_form.summit import Summit, ultra_summit_set
from braidsearch.words import Braid

DEFAULT_SUMMIT_CAP = 2_000

ClassKey = tuple[int, int, tuple[Permutation, ...]]
"""Strands, infimum and factors of the canonical representative: equal for conjugate braids."""


@dataclass(frozen=True)
class ConjugacyClass:
    """The conjugacy class of ``braid``, named by the least member of its ultra summit set.

    ``representative`` equals by^-1 * braid * by for ``by`` = ``conjugator``. When the ultra summit
    set has more members than the cap, ``is_complete`` is False: the representative is then least
    among the members met, so two equal keys still prove conjugacy, while different ones prove
    nothing.
    """

    braid: Braid
    key: ClassKey
    conjugator: tuple[int, ...]
    is_complete: bool
    summit_size: int

    @property
    def representative(self) -> Braid:
        """A word for the canonical representative."""
        strands, infimum, factors = self.key
        elements = simple_elements(strands)
        names = tuple(elements.number(factor) for factor in factors)
        return Braid.trusted(element_word(elements, (infimum, names)), strands)


def conjugacy_class(
    braid: Braid, cap: int = DEFAULT_SUMMIT_CAP, should_stop: ShouldStop = never
) -> ConjugacyClass:
    """The class of a braid: cyclic sliding, then the ultra summit set up to ``cap`` members.

    ``should_stop`` is asked on the way; once it says so, the class is returned as incomplete,
    or, where not even the normal form is found by then, OutOfTimeError is raised.
    """
    elements = simple_elements(braid.strands)
    to_summit, summit = _find_summit(elements, braid, cap, should_stop)
    least = min(summit.parents, key=lambda member: _sort_key(elements, member))
    conjugators = to_summit + summit.conjugators_to(least)
    infimum, factors = _sort_key(elements, least)
    return ConjugacyClass(
        braid=braid,
        key=(braid.strands, infimum, factors),
        conjugator=conjugator_word(elements, conjugators),
        is_complete=summit.is_complete,
        summit_size=len(summit.parents),
    )


def iter_summit(
    braid: Braid, cap: int = DEFAULT_SUMMIT_CAP, should_stop: ShouldStop = never
) -> Iterator[tuple[Braid, tuple[int, ...]]]:
    """The members of the ultra summit set, as words, each with a conjugator from ``braid``."""
    elements = simple_elements(braid.strands)
    to_summit, summit = _find_summit(elements, braid, cap, should_stop)
    for member in summit.parents:
        by = conjugator_word(elements, to_summit + summit.conjugators_to(member))
        yield Braid.trusted(element_word(elements, member), braid.strands), by


def find_conjugator(
    left: Braid, right: Braid, cap: int = DEFAULT_SUMMIT_CAP, should_stop: ShouldStop = never
) -> tuple[int, ...] | None:
    """A word ``by`` with right = by^-1 * left * by; None when none was found.

    None proves that the two are not conjugate only when both classes are complete.
    """
    if left.strands != right.strands or left.exponent_sum != right.exponent_sum:
        return None
    if are_equal(left, right, should_stop):
        return ()
    one, other = (conjugacy_class(braid, cap, should_stop) for braid in (left, right))
    if one.key != other.key:
        return None
    return one.conjugator + tuple(-letter for letter in reversed(other.conjugator))


def _find_summit(
    elements: SimpleElements, braid: Braid, cap: int, should_stop: ShouldStop
) -> tuple[tuple[int, ...], Summit]:
    element = element_of_word(elements, braid.word, should_stop)
    start, to_summit = slide_to_circuit(elements, element, should_stop)
    return to_summit, ultra_summit_set(elements, start, cap, should_stop)


def _sort_key(elements: SimpleElements, member: Element) -> tuple[int, tuple[Permutation, ...]]:
    infimum, factors = member
    return infimum, tuple(elements.permutations[factor] for factor in factors)
