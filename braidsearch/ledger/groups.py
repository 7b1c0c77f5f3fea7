"""What hangs together by proofs: classes, and groups of them up to symmetric images."""

from __future__ import annotations

from collections.abc import Collection, Iterable

from braidsearch.ledger.store import Store
from braidsearch.words import SYMMETRIES

_ELEMENTS = {"identity": 0, "mirror": 1, "reverse": 2, "mirror-reverse": 3}
"""The symmetries as two bits: to compose them is to add the bits, each is its own inverse."""


class ImageUnion:
    """A union of things, of which one may be told to be a symmetric image of another.

    Of every thing it is known by which symmetry it is an image of the least one that it hangs
    together with, and of that one, which symmetries lead back to itself.
    """

    def __init__(self) -> None:
        self._above: dict[int, tuple[int, int]] = {}
        self._own: dict[int, frozenset[int]] = {}

    def find(self, item: int) -> tuple[int, int]:
        """The least thing that an item hangs together with, and the element that leads there."""
        way = []
        while item in self._above:
            way.append(item)
            item = self._above[item][0]
        element = 0
        for passed in reversed(way):  # shorten the way, from its end on
            element ^= self._above[passed][1]
            self._above[passed] = item, element
        return item, element

    def join(self, one: int, other: int, symmetry: str = "identity") -> None:
        """Say that one is this image of the other."""
        (near, first), (far, second) = self.find(one), self.find(other)
        element = first ^ second ^ _ELEMENTS[symmetry]
        least, greatest = sorted((near, far))
        own = self._own.get(near, frozenset()) | self._own.pop(far, frozenset())
        if near == far:
            own |= {element}
        else:
            self._own.pop(near, None)
            self._above[greatest] = least, element
        if own - {0}:
            self._own[least] = own

    def place(self, item: int, symmetries: Collection[str] = ()) -> tuple[int, int]:
        """A name shared by all things that are images of this one under the symmetries given.

        These generate a group; with it go the symmetries that lead from the least thing to itself.
        """
        least, element = self.find(item)
        asked = {_ELEMENTS[symmetry] for symmetry in symmetries}
        around = _generated(asked | self._own.get(least, frozenset()))
        return least, min(element ^ other for other in around)


def _generated(elements: Iterable[int]) -> frozenset[int]:
    """The group that the elements generate."""
    found = {0}
    for element in elements:
        found |= {element ^ other for other in found}
    return frozenset(found)


def group_classes(store: Store, symmetries: Collection[str] = SYMMETRIES) -> list[list[int]]:
    """The classes in groups: those that proofs show to be images under these symmetries.

    Each group and the list of them are in the order of the oldest class.
    """
    union = ImageUnion()
    rows = store.rows(
        "SELECT one.class, other.class, symmetry FROM evidence "
        "JOIN forms AS one ON one.braid = evidence.left "
        "JOIN forms AS other ON other.braid = evidence.right WHERE verdict = 'same' "
        "AND (one.class != other.class OR symmetry != 'identity')"
    )
    for one, other, symmetry in rows:
        union.join(one, other, symmetry)
    groups: dict[tuple[int, int], list[int]] = {}
    for (number,) in store.rows("SELECT id FROM classes ORDER BY id"):
        groups.setdefault(union.place(number, symmetries), []).append(number)
    return list(groups.values())
