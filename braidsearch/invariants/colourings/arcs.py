"""The arcs of a closed braid, its crossings, and what each component passes under."""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

from braidsearch.words.braid import Braid

Crossing = tuple[int, int, int]
"""Arcs (o, x, y) whose colours satisfy y = o^-1 x o: o goes over, x and y meet below it."""


@dataclass(frozen=True)
class Component:
    """One component, from its first strand at the top, downwards and around once.

    ``start`` is the arc at which it starts, ``passages`` the (over arc, sign of the letter) of
    each letter under which it goes, ``writhe`` the sum of the signs of those where the over arc
    is its own.
    """

    start: int
    passages: tuple[tuple[int, int], ...]
    writhe: int


@dataclass(frozen=True)
class ArcDiagram:
    """The arcs of a closed braid, numbered from 0, with crossings and components.

    Arcs that have the same colour in every colouring are one arc here. No crossing stands twice,
    and the over arc of a crossing is none of the arcs below it.
    """

    arcs: int
    crossings: tuple[Crossing, ...]
    components: tuple[Component, ...]


@lru_cache(maxsize=256)
def arc_diagram(braid: Braid) -> ArcDiagram:
    """The arcs of the closure of a braid.

    Letter +i takes the colours (a, b) at positions i, i+1 to (b, b^-1 a b), and -i takes (a, b)
    to (a b a^-1, a).
    """
    crossings, level = _crossings_of_word(braid)
    parents = list(range(braid.strands + len(braid)))
    for top, arc in enumerate(level):
        parents[_root(parents, arc)] = _root(parents, top)
    _merge_equal_colours(parents, crossings)
    numbers: dict[int, int] = {}
    for arc in range(len(parents)):
        numbers.setdefault(_root(parents, arc), len(numbers))
    number = [numbers[_root(parents, arc)] for arc in range(len(parents))]
    reduced = dict.fromkeys((number[o], number[x], number[y]) for o, x, y in crossings)
    kept = tuple(crossing for crossing in reduced if len(set(crossing)) > 1)
    return ArcDiagram(len(numbers), kept, _components(braid, crossings, number))


def _crossings_of_word(braid: Braid) -> tuple[list[Crossing], list[int]]:
    """The crossing of each letter, and the arcs at the bottom; a letter begins a new arc."""
    level = list(range(braid.strands))
    crossings = []
    for place, letter in enumerate(braid.word):
        new, index = braid.strands + place, abs(letter)
        left, right = level[index - 1], level[index]
        if letter > 0:
            crossings.append((right, left, new))
            level[index - 1], level[index] = right, new
        else:
            crossings.append((left, new, right))
            level[index - 1], level[index] = new, left
    return crossings, level


def _merge_equal_colours(parents: list[int], crossings: list[Crossing]) -> None:
    """Join arcs that agree in every colouring, as far as single crossings show it.

    An arc that passes over its own continuation commutes with itself; and two of the arcs
    (over, below) at two crossings being the same, so is the third.
    """
    changed = True
    while changed:
        changed = False
        after: dict[tuple[int, int], int] = {}
        before: dict[tuple[int, int], int] = {}
        for crossing in crossings:
            over, x, y = (_root(parents, arc) for arc in crossing)
            if over in (x, y):
                same = [(over, x), (over, y)]
            else:
                same = [(after.setdefault((over, x), y), y), (before.setdefault((over, y), x), x)]
            for one, other in same:
                if _root(parents, one) != _root(parents, other):
                    parents[_root(parents, one)] = _root(parents, other)
                    changed = True


def _root(parents: list[int], arc: int) -> int:
    while parents[arc] != arc:
        parents[arc] = parents[parents[arc]]
        arc = parents[arc]
    return arc


def _components(
    braid: Braid, crossings: list[Crossing], number: list[int]
) -> tuple[Component, ...]:
    """The components, from the passages of each strand and the cycles of the permutation."""
    cycles = braid.component_cycles
    owner = {position: place for place, cycle in enumerate(cycles) for position in cycle}
    strands = list(range(braid.strands))
    passages: list[list[tuple[int, int]]] = [[] for _ in strands]
    writhes = [0] * len(cycles)
    for letter, (over, _, _) in zip(braid.word, crossings, strict=True):
        index, sign = abs(letter), 1 if letter > 0 else -1
        left, right = strands[index - 1], strands[index]
        passages[left if sign > 0 else right].append((number[over], sign))
        if owner[left] == owner[right]:
            writhes[owner[left]] += sign
        strands[index - 1], strands[index] = right, left
    return tuple(
        Component(
            number[cycle[0]],
            tuple(passage for position in cycle for passage in passages[position]),
            writhes[place],
        )
        for place, cycle in enumerate(cycles)
    )
