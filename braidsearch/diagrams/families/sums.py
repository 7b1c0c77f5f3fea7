"""Connected sums and split unions, of closed braids and of diagrams."""

from __future__ import annotations

from typing import overload

from braidsearch.diagrams.link_diagram import Crossing, LinkDiagram
from braidsearch.errors import InputError
from braidsearch.words.braid import Braid


@overload
def split_union(left: Braid, right: Braid) -> Braid: ...
@overload
def split_union(left: LinkDiagram, right: LinkDiagram) -> LinkDiagram: ...
def split_union(left: Braid | LinkDiagram, right: Braid | LinkDiagram) -> Braid | LinkDiagram:
    """The two links side by side, with a sphere between them.

    Braids give a braid on the strands of both, diagrams a diagram. Raises InputError for one of
    each.
    """
    if isinstance(left, Braid) and isinstance(right, Braid):
        word = left.word + _shifted(right, left.strands)
        return Braid(word, left.strands + right.strands)
    if isinstance(left, LinkDiagram) and isinstance(right, LinkDiagram):
        crossings = left.crossings + _renumbered(right, left.arc_count)
        return LinkDiagram(crossings, left.circles + right.circles)
    raise _unlike(left, right)


@overload
def connected_sum(
    left: Braid, right: Braid, *, left_component: int = 0, right_component: int = 0
) -> Braid: ...
@overload
def connected_sum(
    left: LinkDiagram, right: LinkDiagram, *, left_component: int = 0, right_component: int = 0
) -> LinkDiagram: ...
def connected_sum(
    left: Braid | LinkDiagram,
    right: Braid | LinkDiagram,
    *,
    left_component: int = 0,
    right_component: int = 0,
) -> Braid | LinkDiagram:
    """The connected sum along one component of each, orientations respected.

    Braids on n and m strands give a braid on n + m - 1, diagrams a diagram. Components are
    numbered from 0, those of a braid as in ``Braid.component_cycles``, those of a diagram as in
    ``LinkDiagram.components``. Raises InputError for a number that belongs to no component, and
    for a braid together with a diagram.
    """
    if isinstance(left, Braid) and isinstance(right, Braid):
        last = _with_component_at(left, left_component, left.strands)
        first = _with_component_at(right, right_component, 1)
        word = last.word + _shifted(first, left.strands - 1)
        return Braid(word, left.strands + right.strands - 1)
    if isinstance(left, LinkDiagram) and isinstance(right, LinkDiagram):
        return _sum_of_diagrams(left, right, left_component, right_component)
    raise _unlike(left, right)


def _unlike(left: object, right: object) -> InputError:
    kinds = f"{type(left).__name__} and {type(right).__name__}"
    return InputError(f"{kinds}: expected two braids or two diagrams")


def _shifted(braid: Braid, by: int) -> tuple[int, ...]:
    return tuple(letter + by if letter > 0 else letter - by for letter in braid.word)


def _check_component(number: int, count: int) -> None:
    if not 0 <= number < count:
        raise InputError(f"component {number}: expected a number from 0 to {count - 1}")


def _with_component_at(braid: Braid, component: int, position: int) -> Braid:
    """A conjugate in which the component passes the position: its strand is led there and back."""
    _check_component(component, braid.components)
    cycle = braid.component_cycles[component]
    start = position if position - 1 in cycle else cycle[0] + 1
    if start <= position:
        back = tuple(range(start, position))
    else:
        back = tuple(range(start - 1, position - 1, -1))
    lead = tuple(-index for index in reversed(back))
    return Braid(lead + braid.word + back, braid.strands)


def _renumbered(diagram: LinkDiagram, by: int) -> tuple[Crossing, ...]:
    return tuple(
        Crossing((a + by, b + by, c + by, d + by), crossing.sign)
        for crossing in diagram.crossings
        for a, b, c, d in [crossing.arcs]
    )


def _sum_of_diagrams(
    left: LinkDiagram, right: LinkDiagram, left_component: int, right_component: int
) -> LinkDiagram:
    """Cut an arc of each and join the ends: the union with the ends of the two arcs exchanged.

    Both arcs lie beside the common region on the same hand, so the two joins do not cross.
    """
    _check_component(left_component, left.component_count)
    _check_component(right_component, right.component_count)
    union = split_union(left, right)
    if left_component >= len(left.components) or right_component >= len(right.components):
        return LinkDiagram(union.crossings, union.circles - 1)  # a circle is swallowed
    first = left.components[left_component][0]
    second = right.components[right_component][0] + left.arc_count
    exchanged = {first: second, second: first}
    crossings = tuple(_with_ends_exchanged(crossing, exchanged) for crossing in union.crossings)
    return LinkDiagram(crossings, union.circles)


def _with_ends_exchanged(crossing: Crossing, exchanged: dict[int, int]) -> Crossing:
    """The crossing with other names for the arcs that enter it."""
    entering = (0, crossing.over_enters)
    first, second, third, fourth = (
        exchanged.get(arc, arc) if place in entering else arc
        for place, arc in enumerate(crossing.arcs)
    )
    return Crossing((first, second, third, fourth), crossing.sign)
