"""The ultra summit set of a braid on few strands, by compiled loops over tables."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from functools import cache
from typing import Any

import numpy as np

from braidsearch import compiling
from braidsearch.errors import OutOfTimeError
from braidsearch.normal_form import summit_kernel as kernel
from braidsearch.normal_form.found_summit import ClassKey, FoundSummit, Letters, PlainSummit
from braidsearch.normal_form.left_normal_form import ShouldStop, element_word, never
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
        tables, parents = self.tables, self.parents.tolist()
        for number, row in enumerate(self.members.tolist()):
            factors = tuple(tables.names[factor] for factor in row)
            word = element_word(tables.elements, (self.infimum, factors))
            yield Braid.trusted(word, tables.strands), self._conjugator_to(number, parents)

    def _conjugator_to(self, number: int, parents: list[list[int]]) -> Letters:
        path = []
        while number:
            number, by = parents[number]
            path.append(by)
        words = self.tables.words
        conjugators = (*self.to_summit, *reversed(path))
        return tuple(letter for by in conjugators for letter in words[by])


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
