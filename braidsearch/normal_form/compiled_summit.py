"""The ultra summit set of a braid on few strands, by compiled loops over tables."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from functools import cache
from itertools import chain
from typing import Any

import numpy as np

from braidsearch import compiling
from braidsearch.errors import OutOfTimeError
from braidsearch.normal_form import summit_kernel as kernel
from braidsearch.normal_form.found_summit import ClassKey, FoundSummit, Letters, PlainSummit
from braidsearch.normal_form.left_normal_form import ShouldStop, never
from braidsearch.normal_form.pair_tables import LARGEST_TABLE
from braidsearch.normal_form.ranked_tables import FLIP, RankedTables, ranked_tables
from braidsearch.normal_form.row_table import fill_slots, least_row
from braidsearch.normal_form.summit import ultra_summit_set
from braidsearch.words import Braid

# Work between two questions whether to stop: about a millisecond each.
_LETTERS_A_QUESTION = 2_000
_SLIDES_A_QUESTION = 500
_FACTORS_A_QUESTION = 10_000
_ROOM = 48  # members, and elements on the trail of a slide, that have room at first
_SLOTS_A_MEMBER = 4


@cache
def is_ready() -> bool:
    """Whether the loops are compiled; the first call compiles, or loads what was compiled before.

    Where the compiler is present but fails, it is switched off.
    """
    if not compiling.is_compiled():
        return False
    try:
        with compiling.interrupts_deferred():
            compiled_summit(Braid((1, 1), 2), 1, never).least()
    except Exception:  # whatever the compiler raises, the plain path needs none of it
        compiling.switch_off()
        return False
    return True


def is_small(strands: int) -> bool:
    """Whether the group has tables, and an atom that is not already all of it."""
    return 2 <= strands <= LARGEST_TABLE


def compiled_summit(braid: Braid, cap: int, should_stop: ShouldStop) -> FoundSummit:
    """The same members, in the same order, with the same conjugators as the plain path finds.

    ``should_stop`` is asked less often. Raises OutOfTimeError when it says so before the normal
    form is found.
    """
    tables = ranked_tables(braid.strands)
    infimum, factors = _read(tables, braid.word, should_stop)
    slid, is_at_end = _slide(tables, infimum, factors, should_stop)
    found = _walk(slid, cap, should_stop) if is_at_end else None
    return found or _plain_summit(slid, cap, should_stop)


@dataclass(frozen=True, eq=False)
class _Slid:
    """Where a braid slid to, with the conjugators that lead there."""

    tables: RankedTables
    infimum: int
    factors: Any
    conjugators: list[int]


@dataclass(frozen=True, eq=False)
class CompiledSummit:
    """The members that a compiled walk met, rows of factors, and where each was reached from."""

    tables: RankedTables
    infimum: int
    to_summit: Sequence[int]
    members: Any
    parents: Any
    is_complete: bool

    @property
    def size(self) -> int:
        """How many members were met."""
        return len(self.members)

    def least(self) -> tuple[ClassKey, Letters]:
        """The least member, with a conjugator from the braid."""
        number = least_row(self.members, self.size)
        permutations = self.tables.permutations
        factors = tuple(permutations[factor] for factor in self.members[number].tolist())
        conjugator = self._conjugator_to(number, self.parents[: number + 1].tolist())
        return (self.tables.strands, self.infimum, factors), conjugator

    def iter_members(self) -> Iterator[tuple[Braid, Letters]]:
        """The members in the order in which they were met, each with a conjugator."""
        parents = self.parents.tolist()
        before, spellings, after = self._spellings()
        for number, row in enumerate(self.members.tolist()):
            factors = chain.from_iterable(map(tuple.__getitem__, spellings, row))
            word = (*before, *factors, *after)
            yield Braid.trusted(word, self.tables.strands), self._conjugator_to(number, parents)

    def _spellings(self) -> tuple[Letters, list[tuple[Letters, ...]], Letters]:
        """How members are spelled, as ``element_word`` does: a start, words by place, an end.

        Negative powers of delta are worked into the first factors; one that still has k of them
        before it is flipped by all but its own.
        """
        tables, length = self.tables, self.members.shape[1]
        half_twist = tables.words[-1]
        waiting = range(-self.infimum, -self.infimum - length, -1)
        spellings = [tables.undoing[(k - 1) % 2] if k > 0 else tables.words for k in waiting]
        surplus = max(-self.infimum - length, 0)
        return half_twist * max(self.infimum, 0), spellings, tables.undoing[0][0] * surplus

    def _conjugator_to(self, number: int, parents: list[list[int]]) -> Letters:
        path = []
        while number:
            number, by = parents[number]
            path.append(by)
        conjugators = (*self.to_summit, *reversed(path))
        return tuple(chain.from_iterable(map(self.tables.words.__getitem__, conjugators)))


def _read(tables: RankedTables, word: Letters, should_stop: ShouldStop) -> tuple[int, Any]:
    """The infimum and the factors of the normal form."""
    letters = np.array(word, dtype=np.int64)
    factors = np.empty(len(word) + 1, dtype=np.uint16)
    numbers = np.zeros(kernel.NUMBERS, dtype=np.int64)
    for start in range(0, len(word), _LETTERS_A_QUESTION):
        part = letters[start : start + _LETTERS_A_QUESTION]
        kernel.read_letters(tables.pairs, tables.singles, tables.atoms, part, factors, numbers)
        if should_stop():
            raise OutOfTimeError("a normal form was not finished in time")
    factors = factors[numbers[kernel.FIRST] : numbers[kernel.LAST]]
    if numbers[kernel.TURNS] % 2:
        factors = tables.singles[FLIP][factors]
    return int(numbers[kernel.INFIMUM]), factors


def _slide(
    tables: RankedTables, infimum: int, factors: Any, should_stop: ShouldStop
) -> tuple[_Slid, bool]:
    """A member of the sliding circuit, or where the sliding was when it was stopped; which."""
    room, length = _ROOM, len(factors)
    trail = np.zeros((room, length), dtype=np.uint16)
    extents = np.zeros((room, 2), dtype=np.int64)
    conjugators = np.zeros(room, dtype=np.uint16)
    numbers = np.zeros(kernel.NUMBERS, dtype=np.int64)
    trail[0], extents[0], numbers[kernel.TRAIL] = factors, (infimum, length), 1
    ending = kernel.PAUSED
    while ending != kernel.DONE and not should_stop():
        ending = kernel.slide(
            tables.pairs,
            tables.singles,
            trail,
            extents,
            conjugators,
            numbers,
            _SLIDES_A_QUESTION,
        )
        if ending == kernel.FULL:
            trail, extents, conjugators = map(_with_more_room, (trail, extents, conjugators))
    last = numbers[kernel.TRAIL] - 1
    infimum, length = extents[last].tolist()
    kept = conjugators[: numbers[kernel.KEPT]].tolist()
    return _Slid(tables, infimum, trail[last, :length], kept), ending == kernel.DONE


def _walk(slid: _Slid, cap: int, should_stop: ShouldStop) -> CompiledSummit | None:
    """The ultra summit set from a member; None where that was none."""
    tables, start = slid.tables, slid.factors
    members = np.zeros((_ROOM, len(start)), dtype=np.uint16)
    parents = np.zeros((_ROOM, 2), dtype=np.int64)
    orbits = np.zeros((_ROOM, 2), dtype=np.int64)
    slots = np.empty(_SLOTS_A_MEMBER * _ROOM, dtype=np.int64)
    numbers = np.zeros(kernel.NUMBERS, dtype=np.int64)
    members[0], numbers[kernel.INFIMUM] = start, slid.infimum
    numbers[kernel.MEMBERS] = numbers[kernel.IS_COMPLETE] = 1
    fill_slots(members, slots, 1)
    while True:
        is_stopped = should_stop()
        ending = kernel.walk(
            tables.pairs,
            tables.singles,
            tables.atoms,
            members,
            parents,
            slots,
            orbits,
            numbers,
            cap,
            -1 if is_stopped else _FACTORS_A_QUESTION,
        )
        if ending == kernel.FULL:
            members, parents, orbits = map(_with_more_room, (members, parents, orbits))
            slots = np.empty(_SLOTS_A_MEMBER * len(members), dtype=np.int64)
            fill_slots(members, slots, numbers[kernel.MEMBERS])
        elif ending != kernel.PAUSED or is_stopped:
            break
    if ending == kernel.STRAYED:
        return None
    count = numbers[kernel.MEMBERS]
    is_complete = bool(numbers[kernel.IS_COMPLETE]) and ending == kernel.DONE
    found = members[:count], parents[:count]
    return CompiledSummit(tables, slid.infimum, slid.conjugators, *found, is_complete)


def _with_more_room(array: Any) -> Any:
    larger = np.zeros((4 * len(array), *array.shape[1:]), dtype=array.dtype)
    larger[: len(array)] = array
    return larger


def _plain_summit(slid: _Slid, cap: int, should_stop: ShouldStop) -> PlainSummit:
    """What the plain walk finds from there: it knows what to do with one that is no member."""
    elements, names = slid.tables.elements, slid.tables.names
    element = slid.infimum, tuple(names[factor] for factor in slid.factors.tolist())
    conjugators = tuple(names[conjugator] for conjugator in slid.conjugators)
    summit = ultra_summit_set(elements, element, cap, should_stop)
    return PlainSummit(elements, conjugators, summit)
