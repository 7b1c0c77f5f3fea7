"""Conjugacy classes in the braid group: a canonical representative, with the conjugator."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from braidsearch.normal_form.conjugation import slide_to_circuit
from braidsearch.normal_form.found_summit import ClassKey, FoundSummit, PlainSummit
from braidsearch.normal_form.left_normal_form import (
    ShouldStop,
    are_equal,
    element_of_word,
    element_word,
    never,
)
from braidsearch.normal_form.simple_elements import simple_elements
from braidsearch.normal_form.summit import ultra_summit_set
from braidsearch.words import Braid

__all__ = ["ClassKey", "ConjugacyClass", "conjugacy_class", "find_conjugator", "iter_summit"]

DEFAULT_SUMMIT_CAP = 2_000

_MEMBERS_BEFORE_COMPILING = 20_000  # a process that meets so many has time to load the compiler
_members = 0


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
    summit = find_summit(braid, cap, should_stop)
    key, conjugator = summit.least()
    return ConjugacyClass(braid, key, conjugator, summit.is_complete, summit.size)


def iter_summit(
    braid: Braid, cap: int = DEFAULT_SUMMIT_CAP, should_stop: ShouldStop = never
) -> Iterator[tuple[Braid, tuple[int, ...]]]:
    """The members of the ultra summit set, as words, each with a conjugator from ``braid``."""
    yield from find_summit(braid, cap, should_stop).iter_members()


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


def find_summit(braid: Braid, cap: int, should_stop: ShouldStop = never) -> FoundSummit:
    """The ultra summit set, up to ``cap`` members: compiled once that is worth its start."""
    global _members  # noqa: PLW0603 - how many members this process has met
    if _members > _MEMBERS_BEFORE_COMPILING:
        from braidsearch.normal_form import compiled_summit  # noqa: PLC0415

        if compiled_summit.is_small(braid.strands) and compiled_summit.is_ready():
            return compiled_summit.compiled_summit(braid, cap, should_stop)
    summit = plain_summit(braid, cap, should_stop)
    _members += summit.size
    return summit


def plain_summit(braid: Braid, cap: int, should_stop: ShouldStop = never) -> PlainSummit:
    """The ultra summit set by the plain path, which knows any number of strands."""
    elements = simple_elements(braid.strands)
    element = element_of_word(elements, braid.word, should_stop)
    start, to_summit = slide_to_circuit(elements, element, should_stop)
    summit = ultra_summit_set(elements, start, cap, should_stop)
    return PlainSummit(elements, to_summit, summit)
