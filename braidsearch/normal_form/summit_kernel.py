"""The loops of conjugacy classes, compiled: normal form, cyclic sliding, ultra summit set.

They do, step for step, what ``left_normal_form``, ``conjugation`` and ``summit`` do, where the
theorems stand. Simple elements are their names in ``RankedTables``: 0 the identity, the last name
delta. A braid is its infimum with an array of factors.

Machine code is kept for each file by itself: after a change to ``row_table`` or ``ranked_tables``
alone remove that of this file, ``__pycache__/summit_kernel*.nb*``.
"""

# ruff: noqa: PLR0913, PLR0917 - loose arguments, since compiled loops take no objects of ours

from typing import Any, NamedTuple

import numpy as np

from braidsearch.compiling import compiled
from braidsearch.normal_form.ranked_tables import (
    COMPLEMENT,
    FLIP,
    LEFT,
    RIGHT,
    Group,
    flipped,
    meet,
    product,
    residue,
)
from braidsearch.normal_form.row_table import is_same, slot_of

# How a loop ended: at its end, at the end of its share of work, for want of room, or with a member
# of another infimum or length, which a member of the super summit set does not lead to.
DONE, PAUSED, FULL, STRAYED = range(4)

# The entries of ``numbers``. Of a word being read: its factors lie at FIRST .. LAST - 1, and are
# those of the braid after as many flips as TURNS says. Of a slide: the elements on its trail, and
# the conjugators that lead to its circuit. Of a summit: members, orbits, the orbit and the atom
# that come next, whether nothing was left out.
INFIMUM, FIRST, LAST, TURNS, TRAIL, KEPT, MEMBERS, ORBITS, ORBIT, ATOM, IS_COMPLETE = range(11)
NUMBERS = 11


class Walked(NamedTuple):
    """The members of a summit that were met, in this order, each a row of factors.

    ``parents`` holds for each the number of the member that it was reached from, and the
    conjugator; ``slots`` is a hash table of members with linear probing, -1 where a slot is free;
    ``orbits`` the first member and the size of each cycling orbit, whose members are neighbours.
    """

    members: Any
    parents: Any
    slots: Any
    orbits: Any
    numbers: Any


class Orbit(NamedTuple):
    """A cycling orbit of members with one infimum, and their inverses.

    There is room for one element, and for the values of an iteration of arrows.
    """

    members: Any
    inverses: Any
    infimum: int
    room: Any
    values: Any


@compiled
def push(group: Group, factors: Any, first: int, last: int, factor: int) -> tuple[int, int]:
    """Multiply the factors at first .. last - 1 on the right; the new first and last.

    A delta that comes out in front is left behind: ``first`` is then greater by one.
    """
    factors[last] = factor
    place = last
    while place > first:
        left, right = factors[place - 1], factors[place]
        new_left = group.pairs[left, right, LEFT]
        if new_left == left:
            break
        factors[place - 1], factors[place] = new_left, group.pairs[left, right, RIGHT]
        place -= 1
    if factors[last] != 0:
        last += 1
    if first < last and factors[first] == group.pairs.shape[0] - 1:
        first += 1
    return first, last


@compiled
def read_letters(
    pairs: Any, singles: Any, atoms: Any, letters: Any, factors: Any, numbers: Any
) -> None:
    """Multiply by the letters: sigma_i^-1 is delta^-1 times a simple element.

    Moving the delta^-1 to the front flips every factor before it, which TURNS keeps count of.
    """
    group = Group(pairs, singles)
    first, last = numbers[FIRST], numbers[LAST]
    for letter in letters:
        before = first
        if letter > 0:
            factor = flipped(group, atoms[letter - 1], numbers[TURNS])
        else:
            numbers[TURNS] += 1
            numbers[INFIMUM] -= 1
            complement = singles[COMPLEMENT, atoms[-letter - 1]]
            factor = flipped(group, complement, numbers[TURNS] + 1)
        first, last = push(group, factors, first, last, factor)
        numbers[INFIMUM] += first - before
    numbers[FIRST], numbers[LAST] = first, last


@compiled
def conjugate(
    group: Group, factors: Any, length: int, infimum: int, by: int, result: Any
) -> tuple[int, int]:
    """by^-1 * element * by in ``result``, which is longer by two; the infimum and the length."""
    for place in range(length):
        result[place + 1] = factors[place]
    first, last = push(group, result, 1, length + 1, by)
    infimum += first - 2
    carried = flipped(group, group.singles[COMPLEMENT, by], infimum)
    for place in range(first, last):
        right = result[place]
        result[place - 1] = group.pairs[carried, right, LEFT]
        carried = np.int64(group.pairs[carried, right, RIGHT])
    result[last - 1] = carried
    if carried == 0:
        last -= 1
    start = first - 1
    while start < last and result[start] == group.pairs.shape[0] - 1:
        start += 1
        infimum += 1
    for place in range(start, last):
        result[place - start] = result[place]
    return infimum, last - start


@compiled
def cycle(group: Group, factors: Any, length: int, infimum: int) -> tuple[int, int]:
    """Cycling in place, with room for one factor more; the infimum and the length."""
    if length == 0:
        return infimum, length
    first, last = push(group, factors, 1, length, flipped(group, factors[0], infimum))
    for place in range(first, last):
        factors[place - first] = factors[place]
    return infimum + first - 1, last - first


@compiled
def slide(
    pairs: Any, singles: Any, trail: Any, extents: Any, conjugators: Any, numbers: Any, slides: int
) -> int:
    """Slide on from the last element of ``trail`` until one is met again, so many times at most.

    ``extents`` holds the infimum and the length of each element of the trail.
    """
    group = Group(pairs, singles)
    room = np.zeros(trail.shape[1] + 2, np.uint16)
    while True:
        last = numbers[TRAIL] - 1
        infimum, length = extents[last, 0], extents[last, 1]
        for earlier in range(last):
            is_as_large = extents[earlier, 0] == infimum and extents[earlier, 1] == length
            if is_as_large and is_same(trail[earlier], trail[last], length):
                numbers[KEPT] = earlier
                return DONE
        numbers[KEPT] = last
        if length == 0:
            return DONE
        initial = flipped(group, trail[last, 0], infimum)
        prefix = meet(group, initial, singles[COMPLEMENT, trail[last, length - 1]])
        if prefix == 0:
            return DONE
        if last + 1 == len(trail):
            return FULL
        if slides == 0:
            return PAUSED
        slides -= 1
        infimum, length = conjugate(group, trail[last], length, infimum, prefix, room)
        for place in range(length):
            trail[last + 1, place] = room[place]
        extents[last + 1, 0], extents[last + 1, 1] = infimum, length
        conjugators[last] = prefix
        numbers[TRAIL] += 1


@compiled
def enter(walked: Walked, slot: int, row: Any, parent: int, by: int) -> bool:
    """Enter a new member, reached from ``parent``, at its slot; False when there is no room."""
    count = walked.numbers[MEMBERS]
    if count == len(walked.members):
        return False
    for place in range(walked.members.shape[1]):
        walked.members[count, place] = row[place]
    walked.parents[count, 0], walked.parents[count, 1] = parent, by
    walked.slots[slot] = count
    walked.numbers[MEMBERS] = count + 1
    return True


@compiled
def add_orbit(group: Group, walked: Walked, start: int, cap: int) -> int:
    """Enter the cycling orbit of the last member, number ``start``, and its flipped orbit."""
    members, slots, numbers = walked.members, walked.slots, walked.numbers
    length, infimum = members.shape[1], numbers[INFIMUM]
    row = np.zeros(length + 1, np.uint16)
    for place in range(length):
        row[place] = members[start, place]
    size = 1
    while length > 0:
        by = flipped(group, row[0], infimum)
        if cycle(group, row, length, infimum) != (infimum, length):
            return STRAYED
        if is_same(row, members[start], length):
            break
        slot = slot_of(members, slots, row)
        if slots[slot] >= 0 or size > cap:
            numbers[IS_COMPLETE] = 0
            break
        if not enter(walked, slot, row, start + size - 1, by):
            return FULL
        size += 1
    for number in range(start, start + size):
        for place in range(length):
            row[place] = group.singles[FLIP, members[number, place]]
        slot = slot_of(members, slots, row)
        if slots[slot] < 0 and not enter(walked, slot, row, number, group.pairs.shape[0] - 1):
            return FULL
    walked.orbits[numbers[ORBITS], 0], walked.orbits[numbers[ORBITS], 1] = start, size
    numbers[ORBITS] += 1
    return DONE


@compiled
def keep_infimum(group: Group, factors: Any, infimum: int, arrow: int) -> int:
    """The least multiple of the arrow whose conjugate has the infimum of the element."""
    while True:
        missing = flipped(group, arrow, infimum)
        for factor in factors:
            missing = residue(group, factor, missing)
            if missing == 0:
                return arrow
        missing = residue(group, arrow, missing)
        if missing == 0:
            return arrow
        arrow = product(group, arrow, missing)


@compiled
def least_summit_arrow(group: Group, member: Any, inverse: Any, infimum: int, arrow: int) -> int:
    """The least multiple of the arrow whose conjugate lies in the super summit set."""
    while True:
        larger = keep_infimum(group, member, infimum, arrow)
        larger = keep_infimum(group, inverse, -infimum - len(member), larger)
        if larger == arrow:
            return arrow
        arrow = larger


@compiled
def transport(group: Group, orbit: Orbit, arrow: int) -> int:
    """The arrow carried once around the cycling orbit."""
    pairs, length, infimum, target = group.pairs, orbit.members.shape[1], orbit.infimum, orbit.room
    if length == 0:
        return arrow
    now, new_length = conjugate(group, orbit.members[0], length, infimum, arrow, target)
    for position in range(len(orbit.members)):
        initial = flipped(group, target[0], now)
        head, tail = pairs[arrow, initial, LEFT], pairs[arrow, initial, RIGHT]
        first = flipped(group, orbit.members[position, 0], infimum)
        arrow = product(group, residue(group, first, head), tail)
        now, new_length = cycle(group, target, new_length, now)
    return arrow


@compiled
def pull_back(group: Group, orbit: Orbit, arrow: int) -> int:
    """The least arrow whose transport around the orbit the given one divides."""
    pairs = group.pairs
    for position in range(len(orbit.members) - 1, -1, -1):
        member = orbit.members[position]
        first = flipped(group, member[0], orbit.infimum)
        head, tail = pairs[first, arrow, LEFT], pairs[first, arrow, RIGHT]
        one = group.singles[FLIP, residue(group, group.singles[COMPLEMENT, head], tail)]
        other = flipped(group, arrow, orbit.infimum)
        for place in range(1, len(member)):
            other = residue(group, member[place], other)
        join = product(group, one, residue(group, one, other))
        arrow = least_summit_arrow(group, member, orbit.inverses[position], orbit.infimum, join)
    return arrow


@compiled
def settle(group: Group, orbit: Orbit, arrow: int, is_forward: bool) -> Any:
    """The value on the final cycle of the iteration whose index is a multiple of its length."""
    values, count = orbit.values, 0
    while True:
        for entry in range(count):
            if values[entry] == arrow:
                length = count - entry
                return values[-(-entry // length) * length]
        values[count] = arrow
        count += 1
        arrow = transport(group, orbit, arrow) if is_forward else pull_back(group, orbit, arrow)


@compiled
def minimal_arrow(group: Group, orbit: Orbit, atom: int) -> Any:
    """The least arrow that the atom divides, or 0 when it is a product of shorter ones."""
    member, inverse = orbit.members[0], orbit.inverses[0]
    least = least_summit_arrow(group, member, inverse, orbit.infimum, atom)
    settled = settle(group, orbit, least, True)
    if meet(group, atom, settled) == atom:
        return settled
    if settled != 0:
        return 0
    settled = settle(group, orbit, settle(group, orbit, atom, False), True)
    return settled if meet(group, atom, settled) == atom else 0


@compiled
def orbit_of(group: Group, walked: Walked, number: int) -> Orbit:
    """An orbit with the factors of the inverses of its members."""
    infimum = walked.numbers[INFIMUM]
    start, size = walked.orbits[number, 0], walked.orbits[number, 1]
    members = walked.members[start : start + size]
    length = members.shape[1]
    inverses = np.zeros((size, length), np.uint16)
    for position in range(size):
        for place in range(length):
            complement = group.singles[COMPLEMENT, members[position, place]]
            turned = flipped(group, complement, infimum + place + 1)
            inverses[position, length - 1 - place] = turned
    values = np.empty(group.pairs.shape[0] + 1, np.int64)
    return Orbit(members, inverses, infimum, np.zeros(length + 2, np.uint16), values)


@compiled
def walk(
    pairs: Any,
    singles: Any,
    atoms: Any,
    members: Any,
    parents: Any,
    slots: Any,
    orbits: Any,
    numbers: Any,
    cap: int,
    work: int,
) -> int:
    """Walk on through the ultra summit set; FULL leaves all as before the step without room."""
    group, walked = Group(pairs, singles), Walked(members, parents, slots, orbits, numbers)
    if numbers[ORBITS] == 0:
        ending = add_orbit(group, walked, numbers[MEMBERS] - 1, cap)
        if ending != DONE:
            numbers[MEMBERS], numbers[IS_COMPLETE] = 1, 1
            return ending
    while numbers[IS_COMPLETE] and numbers[ORBIT] < numbers[ORBITS]:
        orbit = orbit_of(group, walked, numbers[ORBIT])
        while numbers[ATOM] < len(atoms):
            if numbers[MEMBERS] > cap:
                numbers[IS_COMPLETE] = 0
                break
            if work < 0:
                return PAUSED
            work -= orbit.members.size
            arrow = minimal_arrow(group, orbit, atoms[numbers[ATOM]])
            if arrow != 0:
                ending = follow(group, walked, orbit, arrow, cap)
                if ending != DONE:
                    return ending
            numbers[ATOM] += 1
        numbers[ORBIT] += 1
        numbers[ATOM] = 0
    return DONE


@compiled
def follow(group: Group, walked: Walked, orbit: Orbit, arrow: int, cap: int) -> int:
    """Enter what the arrow leads to from the first member of an orbit, with its own, if new."""
    numbers, length = walked.numbers, orbit.members.shape[1]
    count, is_complete = numbers[MEMBERS], numbers[IS_COMPLETE]
    extent = conjugate(group, orbit.members[0], length, orbit.infimum, arrow, orbit.room)
    if extent != (orbit.infimum, length):
        return STRAYED
    slot = slot_of(walked.members, walked.slots, orbit.room)
    if walked.slots[slot] >= 0:
        return DONE
    ending = FULL
    if enter(walked, slot, orbit.room, walked.orbits[numbers[ORBIT], 0], arrow):
        ending = add_orbit(group, walked, count, cap)
    if ending != DONE:
        numbers[MEMBERS], numbers[IS_COMPLETE] = count, is_complete
    return ending
