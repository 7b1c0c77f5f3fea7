"""Rows of one array, each entered once: a hash table for loops that are compiled.

``slots`` holds numbers of rows, with linear probing, -1 where a slot is free.
"""

from typing import Any

from braidsearch.compiling import compiled

_SPREAD, _MASK = 1_000_003, (1 << 30) - 1


@compiled
def is_same(one: Any, other: Any, length: int) -> bool:
    """Whether two rows agree in so many factors."""
    for place in range(length):  # noqa: SIM110 - the compiler knows no all()
        if one[place] != other[place]:
            return False
    return True


@compiled
def slot_of(rows: Any, slots: Any, row: Any) -> int:
    """The slot that holds the number of the row, or the free one where its number would go."""
    length = rows.shape[1]
    mixed = 0
    for place in range(length):
        mixed = (mixed * _SPREAD + int(row[place])) & _MASK
    slot = (mixed ^ (mixed >> 15)) % len(slots)
    while slots[slot] >= 0 and not is_same(rows[slots[slot]], row, length):
        slot = (slot + 1) % len(slots)
    return slot


@compiled
def fill_slots(rows: Any, slots: Any, count: int) -> None:
    """Enter the first rows into a fresh hash table."""
    slots[:] = -1
    for number in range(count):
        slots[slot_of(rows, slots, rows[number])] = number


@compiled
def least_row(rows: Any, count: int) -> int:
    """The number of the least row, compared factor by factor."""
    least = 0
    for number in range(1, count):
        for place in range(rows.shape[1]):
            if rows[number, place] != rows[least, place]:
                if rows[number, place] < rows[least, place]:
                    least = number
                break
    return least
