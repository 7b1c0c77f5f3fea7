"""The loops of conjugacy classes, compiled: normal form, cyclic sliding, ultra summit set.

They do, step for step, what ``left_normal_form``, ``conjugation`` and ``summit`` do, where the
theorems stand. Simple elements are their names in ``RankedTables``: 0 the identity, the last name
delta. A braid is its infimum with an array of factors. Each array handed to a function is counted
as a reference, which costs as much as ten look-ups: so the innermost loops call none.

Machine code is kept for each file by itself: after a change to ``row_table`` or ``ranked_tables``
alone remove that of this file, ``__pycache__/summit_kernel*.nb*``.
"""

# ruff: noqa: PLR0913, PLR0917 - loose arguments, since compiled loops take no objects of ours

from typing import Any, NamedTuple

import numpy as np

from braidsearch.compiling import compiled
from braidsearch.normal_form.ranked_tables import COMPLEMENT, FLIP, LEFT, MEET, RESIDUE, RIGHT
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
    """A cycling orbit of members with one infimum.

    ``sides``, shape (2, size, length), holds their factors and those of their inverses. There is
    room for one element, and for the values of an iteration of arrows.
    """

    sides: Any
    infimum: int
    room: Any
    values: Any


@compiled
def push(pairs: Any, factors: Any, first: int, last: int, factor: Any) -> tuple[int, int]:
    """Multiply the factors at first .. last - 1 on the right; the new first and last.

    A delta that comes out in front is left behind: ``first`` is then greater by one.
    """
    factors[last] = factor
    place = last
    while place > first:
        left, right = factors[place - 1], factors[place]
        new_left = pairs[left, right, LEFT]
        if new_left == left:
            break
        factors[place - 1], factors[place] = new_left, pairs[left, right, RIGHT]
        place -= 1
    if factors[last] != 0:
        last += 1
    if first < last and factors[first] == pairs.shape[0] - 1:
        first += 1
    return first, last


@compiled
def read_letters(
    pairs: Any, singles: Any, atoms: Any, letters: Any, factors: Any, numbers: Any
) -> None:
    """Multiply by the letters: sigma_i^-1 is delta^-1 times a simple element.

    Moving the delta^-1 to the front flips every factor before it, which TURNS keeps count of.
    """
    first, last = numbers[FIRST], numbers[LAST]
    for letter in letters:
        before = first
        if letter > 0:
            factor = singles[numbers[TURNS] % 2, atoms[letter - 1]]
        else:
            numbers[TURNS] += 1
            numbers[INFIMUM] -= 1
            complement = singles[COMPLEMENT, atoms[-letter - 1]]
            factor = singles[(numbers[TURNS] + 1) % 2, complement]
        first, last = push(pairs, factors, first, last, np.int64(factor))
        numbers[INFIMUM] += first - before
    numbers[FIRST], numbers[LAST] = first, last


@compiled
def conjugate(
    pairs: Any, singles: Any, factors: Any, length: int, infimum: int, by: Any, result: Any
) -> tuple[int, int]:
    """by^-1 * element * by in ``result``, which is longer by two; the infimum and the length."""
    for place in range(length):
        result[place + 1] = factors[place]
    first, last = push(pairs, result, 1, length + 1, by)
    infimum += first - 2
    carried = singles[infimum % 2, singles[COMPLEMENT, by]]
    for place in range(first, last):
        right = result[place]
        result[place - 1] = pairs[carried, right, LEFT]
        carried = np.int64(pairs[carried, right, RIGHT])
    result[last - 1] = carried
    if carried == 0:
        last -= 1
    start = first - 1
    while start < last and result[start] == pairs.shape[0] - 1:
        start += 1
        infimum += 1
    for place in range(start, last):
        result[place - start] = result[place]
    return infimum, last - start


@compiled
def cycle(pairs: Any, singles: Any, factors: Any, length: int, infimum: int) -> tuple[int, int]:
    """Cycling in place, with room for one factor more; the infimum and the length."""
    if length == 0:
        return infimum, length
    initial = np.int64(singles[infimum % 2, factors[0]])
    first, last = push(pairs, factors, 1, length, initial)
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
        initial = singles[infimum % 2, trail[last, 0]]
        prefix = np.int64(pairs[initial, singles[COMPLEMENT, trail[last, length - 1]], MEET])
        if prefix == 0:
            return DONE
        if last + 1 == len(trail):
            return FULL
        if slides == 0:
            return PAUSED
        slides -= 1
        infimum, length = conjugate(pairs, singles, trail[last], length, infimum, prefix, room)
        for place in range(length):
            trail[last + 1, place] = room[place]
        extents[last + 1, 0], extents[last + 1, 1] = infimum, length
        conjugators[last] = prefix
        numbers[TRAIL] += 1


@compiled
def enter(walked: Walked, slot: int, row: Any, parent: int, by: Any) -> bool:
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
def add_orbit(pairs: Any, singles: Any, walked: Walked, start: int, cap: int) -> int:
    """Enter the cycling orbit of the last member, number ``start``, and its flipped orbit."""
    members, slots, numbers = walked.members, walked.slots, walked.numbers
    length, infimum = members.shape[1], numbers[INFIMUM]
    row = np.zeros(length + 1, np.uint16)
    for place in range(length):
        row[place] = members[start, place]
    size = 1
    while length > 0:
        by = np.int64(singles[infimum % 2, row[0]])
        if cycle(pairs, singles, row, length, infimum) != (infimum, length):
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
            row[place] = singles[FLIP, members[number, place]]
        slot = slot_of(members, slots, row)
        if slots[slot] < 0 and not enter(walked, slot, row, number, pairs.shape[0] - 1):
            return FULL
    walked.orbits[numbers[ORBITS], 0], walked.orbits[numbers[ORBITS], 1] = start, size
    numbers[ORBITS] += 1
    return DONE


@compiled
def least_summit_arrow(
    pairs: Any, singles: Any, sides: Any, position: int, infimum: int, arrow: Any
) -> Any:
    """The least multiple of the arrow whose conjugate lies in the super summit set.

    The member of the orbit and its inverse are to keep their infima: see ``summit``.
    """
    length = sides.shape[2]
    side, kept = 0, 0
    while kept < 2:
        missing = singles[(infimum + side * length) % 2, arrow]
        for place in range(length):
            if missing == 0:
                break
            missing = pairs[sides[side, position, place], missing, RESIDUE]
        missing = pairs[arrow, missing, RESIDUE]
        if missing == 0:
            side, kept = 1 - side, kept + 1
        else:
            arrow, kept = np.int64(pairs[arrow, missing, LEFT]), 0
    return arrow


@compiled
def transport(pairs: Any, singles: Any, orbit: Orbit, arrow: Any) -> Any:
    """The arrow carried once around the cycling orbit."""
    members, turn, target = orbit.sides[0], orbit.infimum % 2, orbit.room
    size, length = members.shape
    if length == 0:
        return arrow
    conjugate(pairs, singles, members[0], length, orbit.infimum, arrow, target)
    for position in range(size):
        first, initial = singles[turn, members[position, 0]], singles[turn, target[0]]
        head, tail = pairs[arrow, initial, LEFT], pairs[arrow, initial, RIGHT]
        arrow = np.int64(pairs[pairs[first, head, RESIDUE], tail, LEFT])
        # Cycling keeps the infimum and the length of a member of the super summit set.
        for place in range(1, length):
            target[place - 1] = target[place]
        pushed = initial
        place = length - 1
        while place > 0:
            left = target[place - 1]
            target[place] = pairs[left, pushed, RIGHT]
            pushed = pairs[left, pushed, LEFT]
            if pushed == left:
                break
            place -= 1
        if place == 0:
            target[0] = pushed
    return arrow


@compiled
def pull_back(pairs: Any, singles: Any, orbit: Orbit, arrow: int) -> Any:
    """The least arrow whose transport around the orbit the given one divides."""
    sides, turn = orbit.sides, orbit.infimum % 2
    for position in range(sides.shape[1] - 1, -1, -1):
        first = singles[turn, sides[0, position, 0]]
        head, tail = pairs[first, arrow, LEFT], pairs[first, arrow, RIGHT]
        one = singles[FLIP, pairs[singles[COMPLEMENT, head], tail, RESIDUE]]
        other = singles[turn, arrow]
        for place in range(1, sides.shape[2]):
            other = pairs[sides[0, position, place], other, RESIDUE]
        join = np.int64(pairs[one, pairs[one, other, RESIDUE], LEFT])
        arrow = least_summit_arrow(pairs, singles, sides, position, orbit.infimum, join)
    return arrow


@compiled
def settle(pairs: Any, singles: Any, orbit: Orbit, arrow: int, is_forward: bool) -> Any:
    """The value on the final cycle of the iteration whose index is a multiple of its length."""
    values, count = orbit.values, 0
    while True:
        for entry in range(count):
            if values[entry] == arrow:
                length = count - entry
                return values[-(-entry // length) * length]
        values[count] = arrow
        count += 1
        if is_forward:
            arrow = transport(pairs, singles, orbit, arrow)
        else:
            arrow = pull_back(pairs, singles, orbit, arrow)


@compiled
def minimal_arrow(pairs: Any, singles: Any, orbit: Orbit, atom: int) -> Any:
    """The least arrow that the atom divides, or 0 when it is a product of shorter ones."""
    least = least_summit_arrow(pairs, singles, orbit.sides, 0, orbit.infimum, atom)
    settled = settle(pairs, singles, orbit, least, True)
    if pairs[atom, settled, MEET] == atom:
        return settled
    if settled != 0:
        return 0
    pulled = settle(pairs, singles, orbit, atom, False)
    settled = settle(pairs, singles, orbit, pulled, True)
    return settled if pairs[atom, settled, MEET] == atom else 0


@compiled
def orbit_of(singles: Any, walked: Walked, number: int, count: int) -> Orbit:
    """An orbit with the factors of the inverses of its members, of ``count`` simple elements."""
    infimum, length = walked.numbers[INFIMUM], walked.members.shape[1]
    start, size = walked.orbits[number, 0], walked.orbits[number, 1]
    sides = np.empty((2, size, length), np.uint16)
    for position in range(size):
        for place in range(length):
            factor = walked.members[start + position, place]
            turned = singles[(infimum + place + 1) % 2, singles[COMPLEMENT, factor]]
            sides[0, position, place] = factor
            sides[1, position, length - 1 - place] = turned
    return Orbit(sides, infimum, np.empty(length + 2, np.uint16), np.empty(count + 1, np.int64))


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
    walked = Walked(members, parents, slots, orbits, numbers)
    if numbers[ORBITS] == 0:
        ending = add_orbit(pairs, singles, walked, numbers[MEMBERS] - 1, cap)
        if ending != DONE:
            numbers[MEMBERS], numbers[IS_COMPLETE] = 1, 1
            return ending
    while numbers[IS_COMPLETE] and numbers[ORBIT] < numbers[ORBITS]:
        orbit = orbit_of(singles, walked, numbers[ORBIT], len(pairs))
        while numbers[ATOM] < len(atoms):
            if numbers[MEMBERS] > cap:
                numbers[IS_COMPLETE] = 0
                break
            if work < 0:
                return PAUSED
            work -= orbit.sides.size
            arrow = minimal_arrow(pairs, singles, orbit, atoms[numbers[ATOM]])
            if arrow != 0:
                ending = follow(pairs, singles, walked, orbit, arrow, cap)
                if ending != DONE:
                    return ending
            numbers[ATOM] += 1
        numbers[ORBIT] += 1
        numbers[ATOM] = 0
    return DONE


@compiled
def follow(pairs: Any, singles: Any, walked: Walked, orbit: Orbit, arrow: int, cap: int) -> int:
    """Enter what the arrow leads to from the first member of an orbit, with its own, if new."""
    numbers, length = walked.numbers, orbit.sides.shape[2]
    count, is_complete = numbers[MEMBERS], numbers[IS_COMPLETE]
    extent = conjugate(pairs, singles, orbit.sides[0, 0], length, orbit.infimum, arrow, orbit.room)
    if extent != (orbit.infimum, length):
        return STRAYED
    slot = slot_of(walked.members, walked.slots, orbit.room)
    if walked.slots[slot] >= 0:
        return DONE
    ending = FULL
    if enter(walked, slot, orbit.room, walked.orbits[numbers[ORBIT], 0], arrow):
        ending = add_orbit(pairs, singles, walked, count, cap)
    if ending != DONE:
        numbers[MEMBERS], numbers[IS_COMPLETE] = count, is_complete
    return ending
