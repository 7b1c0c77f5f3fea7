"""What is asked of the ultra summit set of a braid, whichever way it was found."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from typing import Protocol

from braidsearch.normal_form.conjugation import Conjugators, conjugator_word
from braidsearch.normal_form.left_normal_form import Element, element_word
from braidsearch.normal_form.simple_elements import Permutation, SimpleElements
from braidsearch.normal_form.summit import Summit
from braidsearch.words import Braid

Letters = tuple[int, ...]

ClassKey = tuple[int, int, tuple[Permutation, ...]]
"""Strands, infimum and factors of the canonical representative: equal for conjugate braids."""


class FoundSummit(Protocol):
    """The ultra summit set of a braid, or the part of it that was met."""

    @property
    def size(self) -> int:
        """How many members were met."""

    @property
    def is_complete(self) -> bool:
        """Whether these are all."""

    def least(self) -> tuple[ClassKey, Letters]:
        """The least member, with a conjugator from the braid."""

    def iter_members(self) -> Iterator[tuple[Braid, Letters]]:
        """The members in the order in which they were met, each with a conjugator."""


@dataclass(frozen=True)
class PlainSummit:
    """A summit as ``ultra_summit_set`` gives it, with the conjugators that lead to its first."""

    elements: SimpleElements
    to_summit: Conjugators
    summit: Summit

    @property
    def size(self) -> int:
        """How many members were met."""
        return len(self.summit.parents)

    @property
    def is_complete(self) -> bool:
        """Whether these are all."""
        return self.summit.is_complete

    def least(self) -> tuple[ClassKey, Letters]:
        """The least member: by the infimum, then by the permutations."""
        member = min(self.summit.parents, key=self._sort_key)
        infimum, factors = self._sort_key(member)
        return (self.elements.strands, infimum, factors), self._conjugator_to(member)

    def iter_members(self) -> Iterator[tuple[Braid, Letters]]:
        """The members in the order in which they were met, each with a conjugator."""
        for member in self.summit.parents:
            word = element_word(self.elements, member)
            yield Braid.trusted(word, self.elements.strands), self._conjugator_to(member)

    def _sort_key(self, member: Element) -> tuple[int, tuple[Permutation, ...]]:
        infimum, factors = member
        return infimum, tuple(self.elements.permutations[factor] for factor in factors)

    def _conjugator_to(self, member: Element) -> Letters:
        conjugators = self.to_summit + self.summit.conjugators_to(member)
        return conjugator_word(self.elements, conjugators)
