"""The value on which everything works: a braid word together with its number of strands."""

from __future__ import annotations

import operator
from collections.abc import Iterable, Iterator
from typing import Any

from braidsearch.errors import CapacityError, InputError

MAX_LETTERS = 100_000
MAX_STRANDS = 1_000


class Braid:
    """A word in the generators sigma_1 .. sigma_(n-1) of the braid group on n strands.

    ``word`` holds the letters, a tuple of non-zero integers: ``+i`` is sigma_i, the positive
    (right-handed) crossing of the strands at positions i and i+1, and ``-i`` its inverse. Words
    compose left to right. ``strands`` is n; left out, it is one more than the largest index in
    the word (1 for the empty word). Two values are equal when strands and letters are: equality
    in the group is asked of the normal form.

    Raises InputError for a letter that is not a non-zero integer or lies outside the group, and
    for more than MAX_LETTERS letters or MAX_STRANDS strands.
    """

    __slots__ = ("strands", "word")

    word: tuple[int, ...]
    strands: int

    def __init__(self, word: Iterable[int] = (), strands: int | None = None) -> None:
        letters = _checked_letters(word)
        needed = max((abs(letter) for letter in letters), default=0) + 1
        count = needed if strands is None else _checked_strands(strands)
        if count > MAX_STRANDS:
            raise InputError(f"{count} strands: expected at most {MAX_STRANDS}")
        if count < needed:
            outside = next(letter for letter in letters if abs(letter) >= count)
            raise InputError(_outside_message(outside, count))
        object.__setattr__(self, "word", letters)
        object.__setattr__(self, "strands", count)

    @classmethod
    def trusted(cls, word: tuple[int, ...], strands: int) -> Braid:
        """The same value without the checks, for inner loops that build words from braids."""
        self = object.__new__(cls)
        object.__setattr__(self, "word", word)
        object.__setattr__(self, "strands", strands)
        return self

    def __setattr__(self, name: str, value: object) -> None:
        raise AttributeError(f"a Braid is frozen: {name} cannot be set")

    def __delattr__(self, name: str) -> None:
        raise AttributeError(f"a Braid is frozen: {name} cannot be deleted")

    def __reduce__(self) -> tuple[Any, ...]:
        return (Braid, (self.word, self.strands))

    def __eq__(self, other: object) -> bool:
        if not isinstance(other, Braid):
            return NotImplemented
        return self.word == other.word and self.strands == other.strands

    def __hash__(self) -> int:
        return hash((self.word, self.strands))

    def __repr__(self) -> str:
        return f"Braid({list(self.word)}, strands={self.strands})"

    def _repr_svg_(self) -> str | None:
        """The picture for a notebook; None for a braid that is too large for one."""
        from braidsearch.drawing import draw_braid  # noqa: PLC0415 - upwards, see the test of imports

        try:
            return draw_braid(self)
        except CapacityError:
            return None

    def __len__(self) -> int:
        return len(self.word)

    def __iter__(self) -> Iterator[int]:
        return iter(self.word)

    def __mul__(self, other: Braid) -> Braid:
        """The product, self first; both must have the same number of strands."""
        if not isinstance(other, Braid):
            return NotImplemented
        if other.strands != self.strands:
            raise InputError(
                f"a braid on {other.strands} strands as a factor: expected {self.strands} strands"
            )
        return Braid(self.word + other.word, self.strands)

    def inverse(self) -> Braid:
        """The inverse element; its closure is the mirror-reverse of the closure."""
        return Braid.trusted(tuple(-letter for letter in reversed(self.word)), self.strands)

    def mirror(self) -> Braid:
        """Every crossing changed; the closure becomes its mirror image."""
        return Braid.trusted(tuple(-letter for letter in self.word), self.strands)

    def reverse(self) -> Braid:
        """The word read backwards; every component of the closure is reversed."""
        return Braid.trusted(self.word[::-1], self.strands)

    @property
    def exponent_sum(self) -> int:
        """Positive letters minus negative letters: the writhe of the closed braid's diagram."""
        return sum(1 if letter > 0 else -1 for letter in self.word)

    @property
    def permutation(self) -> tuple[int, ...]:
        """Where the strands end: the strand that starts at position i ends at permutation[i].

        Positions count from 0; the tuple has one entry for each strand.
        """
        starts = list(range(self.strands))
        for letter in self.word:
            index = abs(letter)
            starts[index - 1], starts[index] = starts[index], starts[index - 1]
        ends = [0] * self.strands
        for position, start in enumerate(starts):
            ends[start] = position
        return tuple(ends)

    @property
    def component_cycles(self) -> tuple[tuple[int, ...], ...]:
        """The components of the closure: for each, the start positions that it passes, in order.

        Components are ordered by their least position; positions count from 0.
        """
        ends = self.permutation
        seen: set[int] = set()
        cycles = []
        for first in range(self.strands):
            cycle: list[int] = []
            position = first
            while position not in seen:
                seen.add(position)
                cycle.append(position)
                position = ends[position]
            if cycle:
                cycles.append(tuple(cycle))
        return tuple(cycles)

    @property
    def components(self) -> int:
        """The number of components of the closure."""
        return len(self.component_cycles)


def _checked_letters(word: Iterable[int]) -> tuple[int, ...]:
    letters: list[int] = []
    try:
        items = iter(word)
    except TypeError:
        raise InputError(f"{word!r} as a braid word: expected a sequence of integers") from None
    for item in items:
        letters.append(_checked_letter(item))
        if len(letters) > MAX_LETTERS:
            raise InputError(
                f"letter number {len(letters)} ({item}): expected at most {MAX_LETTERS} letters"
            )
    return tuple(letters)


def _checked_letter(item: object) -> int:
    expected = "expected a non-zero integer, +i for sigma_i or -i for its inverse"
    if isinstance(item, bool):
        raise InputError(f"letter {item!r}: {expected}")
    try:
        letter = operator.index(item)  # type: ignore[arg-type]
    except TypeError:
        raise InputError(f"letter {item!r}: {expected}") from None
    if letter == 0:
        raise InputError(f"letter 0: {expected}")
    return letter


def _checked_strands(strands: object) -> int:
    try:
        count = operator.index(strands)  # type: ignore[arg-type]
    except TypeError:
        count = 0
    if isinstance(strands, bool) or count < 1:
        raise InputError(f"strand count {strands!r}: expected an integer of at least 1")
    return count


def _outside_message(letter: int, strands: int) -> str:
    if strands == 1:
        return f"letter {letter}: expected the empty word: a braid on 1 strand has no crossing"
    return f"letter {letter}: expected an index from 1 to {strands - 1} on {strands} strands"
