"""Sublinks of a closed braid: the braids that are left when components are taken away."""

from collections.abc import Callable, Iterator
from itertools import chain, combinations
from typing import Any

from braidsearch.errors import InputError
from braidsearch.words.braid import Braid


def iter_sublinks(braid: Braid, components: int) -> Iterator[Braid]:
    """The sublinks of so many components, as closed braids; none where the link has fewer.

    One for each choice among the components, in the lexicographic order of the choices, where
    components are ordered as in ``component_cycles``. Each has the strands of its components, in
    their order from left to right, and the letters at which two of them cross: taking a closed
    curve away leaves the crossings of the other curves as they are.

    Raises InputError for less than one component.
    """
    if components < 1:
        raise InputError(f"sublinks of {components} components: expected at least 1")
    cycles = braid.component_cycles
    crossings = _crossings(braid)
    for chosen in combinations(cycles, components):
        yield _sublink(sorted(chain.from_iterable(chosen)), crossings)


def sublink_values(braid: Braid, components: int, compute: Callable[[Braid], Any]) -> list[Any]:
    """The values of ``compute`` for all sublinks of so many components, sorted.

    The list belongs to the link: an equivalence of two links carries their components to each
    other, and with them the sublinks, in some order that sorting forgets.
    """
    return sorted(compute(sublink) for sublink in iter_sublinks(braid, components))


def _crossings(braid: Braid) -> list[tuple[int, int, int]]:
    """For each letter, where the strands on its left and right start, and the letter."""
    strands = list(range(braid.strands))
    found = []
    for letter in braid.word:
        index = abs(letter)
        left, right = strands[index - 1], strands[index]
        strands[index - 1], strands[index] = right, left
        found.append((left, right, letter))
    return found


def _sublink(kept: list[int], crossings: list[tuple[int, int, int]]) -> Braid:
    """The braid of the strands that start at the positions ``kept``, in ascending order."""
    place = {start: position for position, start in enumerate(kept, start=1)}
    word = []
    for left, right, letter in crossings:
        if left in place and right in place:
            # What lay between the two when they cross is gone, so they are neighbours.
            index = place[left]
            word.append(index if letter > 0 else -index)
            place[left], place[right] = place[right], place[left]
    return Braid.trusted(tuple(word), len(kept))
