"""Drawings put together from top to bottom: maxima, crossings and minima of vertical strands."""

from __future__ import annotations

from braidsearch.diagrams.link_diagram import Crossing, LinkDiagram

# The corners of a crossing, counterclockwise; a strand goes straight on to the corner opposite.
_NORTHWEST, _SOUTHWEST, _SOUTHEAST, _NORTHEAST = range(4)


class Sketch:
    """A drawing in the making; positions of the strands count from 1, as in braid words.

    Points are the legs of maxima and the corners of crossings. Each is joined to one other by a
    line of the drawing, and to one by going straight on through its maximum or crossing. A
    component is oriented by its first maximum, of which the named leg runs down.
    """

    def __init__(self) -> None:
        self._open: list[int] = []  # for each position the point from which its line comes
        self._line: list[int] = []
        self._straight_on: list[int] = []
        self._crossing: list[tuple[int, int] | None] = []  # number and corner; None for a leg
        self._signs: list[int] = []
        self._starts: list[int] = []

    def add_maximum(self, position: int, is_right_down: bool = False) -> None:
        """Open two strands, at ``position`` and the next one."""
        left = len(self._line)
        self._line += [left, left]
        self._straight_on += [left + 1, left]
        self._crossing += [None, None]
        self._open[position - 1 : position - 1] = [left, left + 1]
        self._starts.append(left + is_right_down)

    def add_twists(self, position: int, twists: int) -> None:
        """Twist the strands at ``position`` and the next one around each other.

        Each crossing is sigma of the position for twists above 0, its inverse below 0, as it is
        where both strands run down: of sigma the strand from top right to bottom left is on top.
        """
        for _ in range(abs(twists)):
            first = len(self._line)
            number = len(self._signs)
            self._line += [first] * 4
            self._straight_on += [first + 2, first + 3, first, first + 1]
            self._crossing += [(number, corner) for corner in range(4)]
            self._signs.append(1 if twists > 0 else -1)
            self._join(self._open[position - 1], first + _NORTHWEST)
            self._join(self._open[position], first + _NORTHEAST)
            self._open[position - 1 : position + 1] = [first + _SOUTHWEST, first + _SOUTHEAST]

    def add_minimum(self, position: int) -> None:
        """Close the strands at ``position`` and the next one."""
        self._join(*self._open[position - 1 : position + 1])
        del self._open[position - 1 : position + 1]

    def diagram(self) -> LinkDiagram:
        """The diagram of the finished drawing, all of whose strands are closed."""
        circles, arcs = 0, 0
        entered = [[-1] * 4 for _ in self._signs]  # the arc at each corner
        arriving: list[set[int]] = [set() for _ in self._signs]
        seen: set[int] = set()
        for start in self._starts:
            if start in seen:
                continue
            corners = self._component(start, seen)
            circles += not corners
            for k, (number, corner) in enumerate(corners):
                arriving[number].add(corner)
                entered[number][corner] = arcs + k
                entered[number][(corner + 2) % 4] = arcs + (k + 1) % len(corners)
            arcs += len(corners)
        crossings = map(_oriented_crossing, entered, arriving, self._signs)
        return LinkDiagram(tuple(crossings), circles)

    def _join(self, left: int, right: int) -> None:
        self._line[left], self._line[right] = right, left

    def _component(self, start: int, seen: set[int]) -> list[tuple[int, int]]:
        """The corners by which a component arrives at crossings, in order."""
        corners = []
        point = start
        while point not in seen:
            arrived = self._line[point]
            seen |= {point, arrived}
            place = self._crossing[arrived]
            if place is not None:
                corners.append(place)
            point = self._straight_on[arrived]
        return corners


def _oriented_crossing(arcs: list[int], arriving: set[int], sign: int) -> Crossing:
    """The crossing, counterclockwise from where the lower strand arrives."""
    under = {_NORTHWEST, _SOUTHEAST} if sign > 0 else {_NORTHEAST, _SOUTHWEST}
    (start,) = arriving & under
    first, second, third, fourth = arcs[start:] + arcs[:start]
    return Crossing((first, second, third, fourth), 1 if (start + 3) % 4 in arriving else -1)
