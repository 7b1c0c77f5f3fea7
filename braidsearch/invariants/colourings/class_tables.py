"""The tables of some colours for the inner loop: conjugation, and the names of longitudes."""

from __future__ import annotations

from collections import OrderedDict
from collections.abc import Sequence
from dataclasses import dataclass
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from braidsearch.errors import CapacityError
from braidsearch.invariants.colourings.classes import (
    Centraliser,
    Classes,
    centraliser,
    reach_classes,
)
from braidsearch.invariants.colourings.colours import Colours, Images
from braidsearch.invariants.colourings.permutations import (
    Permutation,
    images,
    inverse,
    order,
)

IntegerArray = NDArray[np.int64]
SmallArray = NDArray[np.int16]

_LARGEST_KEY = 1 << 62
_CACHED_PLACES = 14_000_000  # of each of four square tables, 2 bytes a place: the whole ladder


class ClassArrays(NamedTuple):
    """The colours numbered, 0 to size - 1, class after class, and their products.

    ``conjugate[o, x]`` is o^-1 x o, ``unconjugate[o, y]`` is o y o^-1. The colours o with
    o^-1 x o = y are ``first_over[x, y]``, then ``next_over[o, x]`` and so on until -1.
    ``meridians``, ``class_sizes`` and ``class_orders`` belong to the classes; ``orbit_starts[j]``
    bounds the orbits of the centraliser of meridian j on all colours, each with a member and its
    size.

    ``images``, ``inverse_images`` have a row for each colour; ``to_class`` has the element h with
    h^-1 c h = the meridian of c's class, and ``from_class`` its inverse. An element z of the
    centraliser of meridian j is known by its key, the images of the points from
    ``base_starts[j]`` on read as digits; keys are sorted between ``key_starts``, and beside each
    stands the number of the entry that z is written as.
    """

    class_of: SmallArray
    meridians: SmallArray
    class_sizes: IntegerArray
    class_orders: IntegerArray
    conjugate: SmallArray
    unconjugate: SmallArray
    first_over: SmallArray
    next_over: SmallArray
    orbit_starts: IntegerArray
    orbit_members: SmallArray
    orbit_sizes: IntegerArray
    images: SmallArray
    inverse_images: SmallArray
    to_class: SmallArray
    from_class: SmallArray
    base_starts: IntegerArray
    base_points: SmallArray
    key_starts: IntegerArray
    keys: IntegerArray
    key_entries: NDArray[np.int32]


@dataclass(frozen=True)
class ClassTables:
    """The arrays for the inner loop, and the entries that its numbers stand for, sorted."""

    arrays: ClassArrays
    entries: tuple[tuple[int, ...], ...]


def class_tables(colours: Colours) -> ClassTables:
    """The tables of these colours, made once and kept as long as there is room.

    Raises CapacityError for colours and centralisers that are too many, InputError for meridians
    that are conjugate or not in the group.
    """
    key = (colours.generators, colours.meridians)
    if key in _kept:
        _kept.move_to_end(key)
        return _kept[key]
    tables = _kept[key] = _build(colours)
    while len(_kept) > 1 and sum(map(_places, _kept.values())) > _CACHED_PLACES:
        _kept.popitem(last=False)
    return tables


_kept: OrderedDict[tuple[tuple[Images, ...], ...], ClassTables] = OrderedDict()


def _places(tables: ClassTables) -> int:
    return tables.arrays.conjugate.size


def _build(colours: Colours) -> ClassTables:
    classes, degree = reach_classes(colours), colours.degree
    count, elements = len(classes.sizes), classes.elements
    conjugate = _conjugation_table(classes)
    first_over, next_over = _over_chains(conjugate)
    centralisers = [centraliser(classes, number) for number in range(count)]
    orbits = [classes.orbits(one.generators) for one in centralisers]
    names = [_names(number, one, degree) for number, one in enumerate(centralisers)]
    entries = sorted({entry for one in names for entry in one.values()})
    bases = [_base_points(one.elements, degree) for one in centralisers]
    keyed = [_keyed(one, base, degree, entries) for one, base in zip(names, bases, strict=True)]
    arrays = ClassArrays(
        class_of=np.repeat(np.arange(count, dtype=np.int16), classes.sizes),
        meridians=np.array(classes.starts[:-1], dtype=np.int16),
        class_sizes=np.array(classes.sizes, dtype=np.int64),
        class_orders=np.array([order(elements[start]) for start in classes.starts[:-1]], np.int64),
        conjugate=conjugate,
        unconjugate=_inverse_rows(conjugate),
        first_over=first_over,
        next_over=next_over,
        orbit_starts=_starts(orbits),
        orbit_members=np.array([place for one in orbits for place, _ in one], dtype=np.int16),
        orbit_sizes=np.array([size for one in orbits for _, size in one], dtype=np.int64),
        images=_rows(elements, degree),
        inverse_images=_rows(list(map(inverse, elements)), degree),
        to_class=_rows(list(map(inverse, classes.carriers)), degree),
        from_class=_rows(classes.carriers, degree),
        base_starts=_starts(bases),
        base_points=np.array([point for base in bases for point in base], dtype=np.int16),
        key_starts=_starts(keyed),
        keys=np.array([key for one in keyed for key, _ in one], dtype=np.int64),
        key_entries=np.array([entry for one in keyed for _, entry in one], dtype=np.int32),
    )
    return ClassTables(arrays, tuple(entries))


def _conjugation_table(classes: Classes) -> SmallArray:
    """The row of o is how conjugation by o moves the colours; rows follow from parents' rows.

    With o = g^-1 p g it is the action of g^-1, then of p, then of g.
    """
    size = len(classes.elements)
    table = np.empty((size, size), dtype=np.int16)
    actions = [np.array(action, dtype=np.int16) for action in classes.actions]
    backwards = [np.argsort(action) for action in actions]
    for place, (parent, number) in enumerate(classes.parents):
        if number >= 0:
            table[place] = actions[number][table[parent][backwards[number]]]
            continue
        done = classes.elements[place]
        undone = inverse(done)
        table[place] = [
            classes.places[undone.translate(element).translate(done)]
            for element in classes.elements
        ]
    return table


def _inverse_rows(table: SmallArray) -> SmallArray:
    """The inverse permutation of each row."""
    inverted = np.empty_like(table)
    numbers = np.arange(len(table), dtype=np.int16)
    for row, images_of_row in enumerate(table):
        inverted[row, images_of_row] = numbers
    return inverted


def _over_chains(conjugate: SmallArray) -> tuple[SmallArray, SmallArray]:
    """``first_over`` and ``next_over``: each o is put in front of the chains of all its (x, y)."""
    size = len(conjugate)
    first = np.full(size * size, -1, dtype=np.int16)
    following = np.empty((size, size), dtype=np.int16)
    rows = np.arange(size, dtype=np.int64) * size
    for over in range(size - 1, -1, -1):
        places = rows + conjugate[over]
        following[over] = first[places]
        first[places] = over
    return first.reshape(size, size), following


def _names(number: int, group: Centraliser, degree: int) -> dict[Permutation, tuple[int, ...]]:
    """What each element of the centraliser of a class's meridian is written as."""
    return {
        element: (number + 1, *images(least, degree))
        for element, least in group.least_conjugates.items()
    }


def _keyed(
    names: dict[Permutation, tuple[int, ...]],
    base: Sequence[int],
    degree: int,
    entries: Sequence[tuple[int, ...]],
) -> list[tuple[int, int]]:
    """For each element, sorted, its key and the number of its entry."""
    numbers = {entry: number for number, entry in enumerate(entries)}
    pairs = []
    for element, entry in names.items():
        key = 0
        for point in base:
            key = key * degree + element[point]
        pairs.append((key, numbers[entry]))
    return sorted(pairs)


def _base_points(group: Sequence[Permutation], degree: int) -> list[int]:
    """Points by whose images the elements are told apart, each the best one after those before."""
    table = _rows(group, degree).astype(np.int64)
    base: list[int] = []
    keys = np.zeros(len(group), dtype=np.int64)
    while len(np.unique(keys)) < len(group):
        counts = [len(np.unique(keys * degree + table[:, point])) for point in range(degree)]
        base.append(int(np.argmax(counts)))
        if degree ** len(base) > _LARGEST_KEY:
            raise CapacityError(f"{len(base)} points of {degree} to tell a centraliser apart")
        keys = keys * degree + table[:, base[-1]]
    return base


def _rows(elements: Sequence[Permutation], degree: int) -> SmallArray:
    """Permutations as an array, images counted from 0, shape (elements, degree)."""
    joined = b"".join(element[:degree] for element in elements)
    return np.frombuffer(joined, dtype=np.uint8).reshape(-1, degree).astype(np.int16)


def _starts(parts: Sequence[Sequence[object]]) -> IntegerArray:
    """Where each part begins in all of them joined, and the end."""
    return np.cumsum([0, *map(len, parts)], dtype=np.int64)
