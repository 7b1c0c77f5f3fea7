"""Dowker-Thistlethwaite codes: the even number that meets each odd one at a crossing."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from braidsearch.diagrams.codes.groups import checked_groups, parse_integer_groups
from braidsearch.diagrams.codes.passages import (
    Passage,
    diagram_from_passages,
    passages_of_diagram,
    planar_signs,
)
from braidsearch.diagrams.link_diagram import LinkDiagram
from braidsearch.errors import InputError

_EXPECTED = "even numbers such as 4 6 2, or [4] [2] for several components"


def parse_dowker_thistlethwaite_code(text: str) -> LinkDiagram:
    """Read a Dowker-Thistlethwaite code from text: ``4 6 2``, ``[4, 6, 2]`` or ``[{4}, {2}]``.

    Components are lists in brackets of any kind, or lines.
    """
    return dowker_thistlethwaite_code(parse_integer_groups(text, _EXPECTED))


def format_dowker_thistlethwaite_code(diagram: LinkDiagram) -> str:
    """Write the code: one list a component, in brackets where there are several.

    A component starts at its least arc, or at the next one where otherwise two odd numbers would
    meet. Components without crossings are empty lists at the end.
    """
    components = [" ".join(map(str, entries)) for entries in _entries(diagram)]
    if len(components) == 1 and components[0]:
        return components[0]
    return " ".join(f"[{entries}]" for entries in components)


def dowker_thistlethwaite_code(components: Iterable[Iterable[int]]) -> LinkDiagram:
    """The diagram with this code.

    Passages through crossings are numbered 1, 2, 3, ... along one component after the other. At
    every crossing an odd and an even number meet; the code lists the even ones in the order of
    the odd ones, 1, 3, 5, ..., with a minus sign where the even-numbered passage is over. A
    component has an even number of passages, two for each of its entries.

    The code forgets the mirror image of the drawing plane, as a Gauss code without signs does:
    which of two mirror images is meant, of the whole, and of every summand of a composite link
    and every split part by itself. The first crossing of each connected piece becomes positive.

    Raises InputError for an odd entry, one that stands twice or is out of range, and for a code
    that no planar diagram has.

    Source: Dowker, Thistlethwaite, Classification of knot projections, 1983.
    """
    lists = checked_groups(components, _EXPECTED, entries_per_crossing=1)
    entries = [entry for component in lists for entry in component]
    _check_entries(entries)
    passage: dict[int, Passage] = {}
    for crossing, entry in enumerate(entries):
        passage[2 * crossing + 1] = (crossing, entry > 0)
        passage[abs(entry)] = (crossing, entry < 0)
    passages = []
    number = 1
    for component in lists:
        passages.append([passage[number + step] for step in range(2 * len(component))])
        number += 2 * len(component)
    return diagram_from_passages(passages, planar_signs(passages, len(entries)))


def _check_entries(entries: Sequence[int]) -> None:
    seen: set[int] = set()
    largest = 2 * len(entries)
    for entry in entries:
        if entry % 2:
            raise InputError(f"{entry}: expected {_EXPECTED}")
        if not 2 <= abs(entry) <= largest:
            raise InputError(
                f"{entry}: expected even numbers from 2 to {largest}, as there are "
                f"{len(entries)} entries"
            )
        if abs(entry) in seen:
            raise InputError(f"{entry}: expected every even number once, found {abs(entry)} twice")
        seen.add(abs(entry))


def _entries(diagram: LinkDiagram) -> list[list[int]]:
    components = passages_of_diagram(diagram)
    places: dict[int, list[tuple[int, int]]] = {}
    for number, passages in enumerate(components):
        for place, (crossing, _) in enumerate(passages):
            places.setdefault(crossing, []).append((number, place))
    shifts = _alternating_shifts(len(components), places)
    labels: dict[Passage, int] = {}
    for shift, passages in zip(shifts, components, strict=True):
        for passage in passages[shift:] + passages[:shift]:
            labels[passage] = len(labels) + 1
    entry_of = {}
    for crossing in places:
        over, under = labels[crossing, True], labels[crossing, False]
        entry_of[over if over % 2 else under] = under if over % 2 else -over
    ordered = [entry_of[label] for label in sorted(entry_of)]
    result = []
    for passages in components:
        result.append(ordered[: len(passages) // 2])
        ordered = ordered[len(passages) // 2 :]
    return result


def _alternating_shifts(count: int, places: dict[int, list[tuple[int, int]]]) -> list[int]:
    """For each component 0 or 1, how far its start moves so that odd meets even everywhere.

    The parity of a passage is the colour of the face on its left, so the shifts of components
    that meet determine each other, and all crossings agree.
    """
    related: list[list[tuple[int, int]]] = [[] for _ in range(count)]
    for (one, place), (other, other_place) in places.values():
        parity = (place + other_place + 1) % 2
        related[one].append((other, parity))
        related[other].append((one, parity))
    shifts = [-1] * count
    for start in range(count):
        waiting = [] if shifts[start] >= 0 else [start]
        shifts[start] = max(shifts[start], 0)
        for component in waiting:
            for other, parity in related[component]:
                if shifts[other] < 0:
                    shifts[other] = (shifts[component] + parity) % 2
                    waiting.append(other)
    return shifts
