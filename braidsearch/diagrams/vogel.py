"""From a diagram to a closed braid: Seifert circles, and Vogel's moves to make them coherent."""

from __future__ import annotations

from collections.abc import Iterable

from braidsearch.diagrams.link_diagram import LinkDiagram
from braidsearch.diagrams.seifert_reading import read_coherent_circles
from braidsearch.errors import CapacityError
from braidsearch.words import MAX_LETTERS, MAX_STRANDS, Braid


def braid_from_diagram(diagram: LinkDiagram) -> Braid:
    """A braid whose closure is the oriented link of the diagram, a strand for each Seifert circle.

    The diagram is taken as it is; every pair of incoherent Seifert circles costs two letters.
    Pieces of the diagram lie beside each other, on strands of their own, the components without
    crossings on the last ones.

    Raises CapacityError for more than MAX_STRANDS Seifert circles, or a word of more than
    MAX_LETTERS letters.

    Source: Vogel, Representation of links by braids: a new algorithm, 1990; the number of
    strands, Yamada, The minimal number of Seifert circles equals the braid index of a link, 1987.
    """
    strands = diagram.seifert_circle_count
    if strands > MAX_STRANDS:
        raise CapacityError(
            f"a diagram with {strands} Seifert circles: expected at most {MAX_STRANDS}"
        )
    circles = SeifertCircles(diagram)
    circles.make_coherent()
    return read_coherent_circles(circles.opposite, circles.signs, diagram.circles)


class SeifertCircles:
    """The diagram under Vogel's moves, with the Seifert circle of every arc.

    ``opposite`` is as in ``LinkDiagram.opposite_ends``; ``is_exit`` tells the ends at which an
    arc leaves its crossing. Circles that a move joins are merged in ``parent``.

    A face's border is a sequence of ends where it leaves a crossing. Stretches of it that run in
    one direction along one circle alternate in direction, since at a crossing two neighbouring
    ends belong to one circle exactly when one enters and one leaves.
    """

    def __init__(self, diagram: LinkDiagram) -> None:
        self.opposite = list(diagram.opposite_ends)
        self.signs = [crossing.sign for crossing in diagram.crossings]
        self.is_exit = [
            place not in (0, crossing.over_enters)
            for crossing in diagram.crossings
            for place in range(4)
        ]
        circle_of_arc = [0] * diagram.arc_count
        for number, arcs in enumerate(diagram.seifert_circles):
            for arc in arcs:
                circle_of_arc[arc] = number
        self.circle = [
            circle_of_arc[arc] for crossing in diagram.crossings for arc in crossing.arcs
        ]
        self.strands = diagram.seifert_circle_count
        self.parent = list(range(len(diagram.seifert_circles)))

    def make_coherent(self) -> None:
        """Make Vogel's moves until no face has two incoherent circles on its border.

        A face is free of them exactly when the stretches before and behind each stretch are of
        one circle. Each waiting end stands for its stretch; a move changes these neighbours at
        five stretches only. Every move lowers the number of incoherent pairs of circles by one.
        """
        waiting = [end for end in range(len(self.opposite)) if self._begins_stretch(end)]
        while waiting:
            end = waiting.pop()
            before, behind = self._neighbours(end)
            if self._root(self.circle[before]) != self._root(self.circle[behind]):
                waiting += self._join(before, behind)

    def _begins_stretch(self, end: int) -> bool:
        return self.is_exit[end] != self.is_exit[self._previous(end)]

    def _previous(self, end: int) -> int:
        return self.opposite[end + 1 if end % 4 < 3 else end - 3]

    def _next(self, end: int) -> int:
        arrived = self.opposite[end]
        return arrived - 1 if arrived % 4 else arrived + 3

    def _neighbours(self, end: int) -> tuple[int, int]:
        """The last end of the stretch before, and the first of the stretch behind, this one's.

        Both are ``end`` itself where the whole border is one stretch.
        """
        direction = self.is_exit[end]
        before = self._previous(end)
        while self.is_exit[before] == direction:
            if before == end:
                return end, end
            before = self._previous(before)
        behind = self._next(end)
        while self.is_exit[behind] == direction:
            behind = self._next(behind)
        return before, behind

    def _root(self, circle: int) -> int:
        parent = self.parent
        while parent[circle] != circle:
            parent[circle] = parent[parent[circle]]
            circle = parent[circle]
        return circle

    def _join(self, right: int, left: int) -> Iterable[int]:
        """Push the arc at ``right`` across their face and over the arc at ``left``.

        Seen with the face in the middle, its border runs up along the right arc and down along
        the left one; both arcs run with it, or both against it. The finger of the right arc meets
        the left arc in a lower crossing and an upper one. The two circles become one around a
        circle of two arcs. Returns an end of each stretch whose neighbours have changed.
        """
        opposite = self.opposite
        far_right, far_left = opposite[right], opposite[left]
        lower = len(opposite)
        upper = lower + 4
        if len(self.signs) + 2 > MAX_LETTERS:
            raise CapacityError(
                f"a diagram whose braid on {self.strands} strands has more than "
                f"{MAX_LETTERS} letters: expected at most so many"
            )
        opposite += [-1] * 8
        # South, west, north, east of the under-strand, the left one: it runs down, or up.
        places = (2, 1, 0, 3) if self.is_exit[right] else (0, 3, 2, 1)
        south, west, north, east = places
        for one, other in (
            (right, lower + east),
            (lower + west, upper + west),
            (upper + east, far_right),
            (left, upper + north),
            (upper + south, lower + north),
            (lower + south, far_left),
        ):
            opposite[one], opposite[other] = other, one
        inner_places = ((west, north), (west, south))
        self._extend(inner_places, self._root(self.circle[right]), self._root(self.circle[left]))
        return right, far_right, lower + east, far_left, upper + north

    def _extend(self, inner_places: tuple[tuple[int, int], ...], right: int, left: int) -> None:
        """Enter the two crossings: signs, directions and circles of their eight ends.

        ``inner_places`` are the places of the new circle's arcs at the lower crossing, which is
        positive, and at the upper one, which is negative.
        """
        inner = len(self.parent)
        self.parent.append(inner)
        self.parent[left] = right
        for sign, places in zip((1, -1), inner_places, strict=True):
            self.signs.append(sign)
            self.is_exit += [False, sign > 0, True, sign < 0]
            self.circle += [inner if place in places else right for place in range(4)]
