"""The linking numbers of a diagram, counted at its crossings."""

from __future__ import annotations

from braidsearch.diagrams.link_diagram import LinkDiagram


def diagram_linking_matrix(diagram: LinkDiagram) -> dict[tuple[int, int], int]:
    """The linking numbers of components that cross, by pairs (i, j) with i < j.

    Components are numbered from 0 as in ``LinkDiagram.components``; pairs that do not cross are
    left out. A linking number is the sum of the signs of the crossings where the first passes
    over the second.
    """
    component = diagram.component_of_arc
    numbers: dict[tuple[int, int], int] = {}
    for crossing in diagram.crossings:
        under, over = component[crossing.arcs[0]], component[crossing.arcs[1]]
        if under != over:
            pair = (min(under, over), max(under, over))
            counted = crossing.sign if over < under else 0
            numbers[pair] = numbers.get(pair, 0) + counted
    return numbers


def diagram_linking_numbers(diagram: LinkDiagram) -> list[int]:
    """The linking numbers of all pairs of components, sorted, zeros included."""
    numbers = sorted(diagram_linking_matrix(diagram).values())
    components = diagram.component_count
    return sorted(numbers + [0] * (components * (components - 1) // 2 - len(numbers)))
