"""Simple elements of the braid group: permutation braids with their lattice operations."""

from __future__ import annotations

from functools import lru_cache
from typing import Any

Permutation = tuple[int, ...]
_MEMO_LIMIT = 250_000  # answers of one operation that are remembered
_MOST_NAMES = 1 << 19  # elements named in one collection before a fresh one is begun
_SHIFT = 32  # two names make one key


class SimpleElements:
    """The simple elements (positive permutation braids) of the braid group on n strands.

    A simple element is named by a small integer. Its permutation ``ends`` sends the position,
    from 0, where a strand starts to the one where it ends; every pair of strands crosses at most
    once. Elements are met one by one, so any number of strands is possible; each operation
    remembers its answers, which for up to six strands soon become plain tables. ``1`` divides
    everything, and everything divides ``delta``, the half twist (Garside, The braid group and
    other groups, 1969; Epstein and others, Word processing in groups, 1992, chapter 9).

    Masks are integers whose bit i stands for sigma_(i+1).
    """

    def __init__(self, strands: int) -> None:
        self.strands = strands
        self.permutations: list[Permutation] = []
        self.inverses: list[Permutation] = []
        self.starts: list[int] = []
        self.finishes: list[int] = []
        self._numbers: dict[Permutation, int] = {}
        self._pairs: dict[int, tuple[int, int]] = {}
        self._meets: dict[int, int] = {}
        self._joins: dict[int, int] = {}
        self._residues: dict[int, int] = {}
        self._complements: dict[int, int] = {}
        self._flips: dict[int, int] = {}
        self._words: dict[int, tuple[int, ...]] = {}
        self.identity = self.number(tuple(range(strands)))
        self.delta = self.number(tuple(range(strands - 1, -1, -1)))
        self.atoms = [self._atom(index) for index in range(strands - 1)]

    def number(self, ends: Permutation) -> int:
        """The integer that names the simple element with this permutation."""
        known = self._numbers.get(ends)
        if known is not None:
            return known
        self._numbers[ends] = name = len(self.permutations)
        inverse = invert(ends)
        self.permutations.append(ends)
        self.inverses.append(inverse)
        self.starts.append(descents(ends))
        self.finishes.append(descents(inverse))
        return name

    def _atom(self, index: int) -> int:
        ends = list(range(self.strands))
        ends[index], ends[index + 1] = ends[index + 1], ends[index]
        return self.number(tuple(ends))

    def left_weighted(self, left: int, right: int) -> tuple[int, int]:
        """The left-weighted pair with the same product: all that can move left has moved."""
        if not self.starts[right] & ~self.finishes[left]:
            return left, right
        key = left << _SHIFT | right
        found = self._pairs.get(key)
        if found is None:
            found = self._left_weighted(left, right)
            _remember(self._pairs, key, found)
        return found

    def _left_weighted(self, left: int, right: int) -> tuple[int, int]:
        """Move sigma_i across while it starts ``right`` and does not finish ``left``."""
        before, after = list(self.inverses[left]), list(self.permutations[right])
        index, last = 0, self.strands - 1
        while index < last:
            if after[index] > after[index + 1] and before[index] < before[index + 1]:
                before[index], before[index + 1] = before[index + 1], before[index]
                after[index], after[index + 1] = after[index + 1], after[index]
                index = max(index - 1, 0)
            else:
                index += 1
        return self.number(invert(tuple(before))), self.number(tuple(after))

    def complement(self, element: int) -> int:
        """The c with element * c = delta."""
        found = self._complements.get(element)
        if found is None:
            last = self.strands - 1
            inverse = self.inverses[element]
            found = self.number(tuple(last - position for position in inverse))
            self._complements[element] = found
        return found

    def left_complement(self, element: int) -> int:
        """The c with c * element = delta."""
        return self.flip(self.complement(element))

    def flip(self, element: int) -> int:
        """The conjugate by delta: sigma_i becomes sigma_(n-i)."""
        found = self._flips.get(element)
        if found is None:
            last = self.strands - 1
            ends = self.permutations[element]
            found = self.number(tuple(last - ends[last - i] for i in range(self.strands)))
            self._flips[element] = found
        return found

    def flip_power(self, element: int, power: int) -> int:
        """The conjugate by that power of delta; only the parity matters."""
        return self.flip(element) if power % 2 else element

    def product(self, left: int, right: int) -> int:
        """The product, which the caller knows to be simple."""
        product, rest = self.left_weighted(left, right)
        if rest != self.identity:
            raise ValueError("the product is not a simple element")
        return product

    def quotient(self, left: int, element: int) -> int:
        """The q with left * q = element; the caller knows that ``left`` divides ``element``."""
        inverse, ends = self.inverses[left], self.permutations[element]
        return self.number(tuple(ends[start] for start in inverse))

    def divides(self, left: int, element: int) -> bool:
        """Whether ``element`` = ``left`` * (a positive braid)."""
        return self.meet(left, element) == left

    def meet(self, first: int, second: int) -> int:
        """The greatest common left divisor."""
        if not self.starts[first] & self.starts[second]:
            return self.identity
        key = first << _SHIFT | second if first < second else second << _SHIFT | first
        found = self._meets.get(key)
        if found is None:
            found = self._common_prefix(self.permutations[first], self.permutations[second])
            _remember(self._meets, key, found)
        return found

    def join(self, first: int, second: int) -> int:
        """The least common right multiple: delta divided by a common right divisor."""
        key = first << _SHIFT | second if first < second else second << _SHIFT | first
        found = self._joins.get(key)
        if found is None:
            one, other = self.complement(first), self.complement(second)
            suffix = self._common_prefix(self.inverses[one], self.inverses[other])
            found = self.left_complement(self.number(self.inverses[suffix]))
            _remember(self._joins, key, found)
        return found

    def residue(self, left: int, element: int) -> int:
        """The least r such that ``element`` divides ``left`` * r."""
        if element == self.identity:
            return element
        key = left << _SHIFT | element
        found = self._residues.get(key)
        if found is None:
            found = self.quotient(left, self.join(left, element))
            _remember(self._residues, key, found)
        return found

    def _common_prefix(self, first: Permutation, second: Permutation) -> int:
        one, other = list(first), list(second)
        prefix = list(range(self.strands))  # the inverse permutation of the prefix found so far
        index, last = 0, self.strands - 1
        while index < last:
            if one[index] > one[index + 1] and other[index] > other[index + 1]:
                for column in (one, other, prefix):
                    column[index], column[index + 1] = column[index + 1], column[index]
                index = max(index - 1, 0)
            else:
                index += 1
        return self.number(invert(tuple(prefix)))

    def word(self, element: int) -> tuple[int, ...]:
        """A shortest positive word for the element: each crossing of two strands once."""
        found = self._words.get(element)
        if found is None:
            found = permutation_word(self.permutations[element])
            self._words[element] = found
        return found


def simple_elements(strands: int) -> SimpleElements:
    """The shared collection for this number of strands; a very large one is begun afresh.

    So names hold within one computation, and are not kept from one to the next.
    """
    shared = _collection(strands)
    if len(shared.permutations) > _MOST_NAMES:
        _collection.cache_clear()
        shared = _collection(strands)
    return shared


@lru_cache(maxsize=32)
def _collection(strands: int) -> SimpleElements:
    return SimpleElements(strands)


def invert(permutation: Permutation) -> Permutation:
    """The inverse permutation."""
    inverse = [0] * len(permutation)
    for position, image in enumerate(permutation):
        inverse[image] = position
    return tuple(inverse)


def descents(permutation: Permutation) -> int:
    """The mask of the positions i where entry i exceeds entry i+1."""
    mask = 0
    for index in range(len(permutation) - 1):
        if permutation[index] > permutation[index + 1]:
            mask |= 1 << index
    return mask


def permutation_word(ends: Permutation) -> tuple[int, ...]:
    """A shortest positive word whose strands end as stated, by insertion sort."""
    remaining = list(ends)
    letters: list[int] = []
    index = 0
    while index < len(remaining) - 1:
        if remaining[index] > remaining[index + 1]:
            remaining[index], remaining[index + 1] = remaining[index + 1], remaining[index]
            letters.append(index + 1)
            index = max(index - 1, 0)
        else:
            index += 1
    return tuple(letters)


def _remember(memo: dict[Any, Any], key: Any, value: Any) -> None:
    """Keep an answer; a full memory starts afresh rather than growing without bound."""
    if len(memo) >= _MEMO_LIMIT:
        memo.clear()
    memo[key] = value
