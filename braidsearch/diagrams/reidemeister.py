"""Simplification of diagrams: Reidemeister's first and second moves, and nugatory crossings."""

from __future__ import annotations

from braidsearch.diagrams.link_diagram import Crossing, LinkDiagram, cycles, next_in_face, quadruple


def simplify_diagram(diagram: LinkDiagram) -> LinkDiagram:
    """A diagram of the same oriented link without kinks, two-sided clasps that come apart, or
    nugatory crossings.

    Crossings go away, none arises; where the diagram has nothing to simplify it is returned as
    it is. Otherwise the arcs are numbered anew, in order along each component.

    A loop (Reidemeister I) or a pair of crossings where one strand lies over the other
    (Reidemeister II) is removed as long as there is one; then all crossings that meet some face
    twice. Such a crossing joins two diagrams that lie on two sides of a circle, and turning one
    of them over undoes it. What arises is their connected sum, which is well defined however it
    is drawn, so the strands are only joined straight through.

    Source: Reidemeister, Elementare Begründung der Knotentheorie, 1927; Tait, On knots, 1877.
    """
    ends = DiagramEnds(diagram)
    ends.remove_loops_and_clasps(list(range(len(diagram.crossings))))
    while nugatory := ends.find_nugatory_crossings():
        neighbours = [neighbour for crossing in nugatory for neighbour in ends.remove(crossing)]
        ends.remove_loops_and_clasps(neighbours)
    if all(ends.is_left):
        return diagram
    return ends.to_diagram()


class DiagramEnds:
    """A diagram under change: which end of an arc lies opposite to which, and what is left.

    End 4 x + p is at place p of crossing x, as in ``LinkDiagram.opposite_ends``.
    """

    def __init__(self, diagram: LinkDiagram) -> None:
        self.opposite = list(diagram.opposite_ends)
        self.signs = [crossing.sign for crossing in diagram.crossings]
        self.is_left = [True] * len(self.signs)
        self.circles = diagram.circles

    def remove(self, crossing: int) -> list[int]:
        """Take a crossing out and join its strands straight through; return its neighbours."""
        self.is_left[crossing] = False
        neighbours = []
        for end in (4 * crossing, 4 * crossing + 1):
            before, behind = self.opposite[end], self.opposite[end + 2]
            if before == end + 2:
                self.circles += 1
            else:
                self.opposite[before], self.opposite[behind] = behind, before
                neighbours += [before // 4, behind // 4]
        return neighbours

    def remove_loops_and_clasps(self, waiting: list[int]) -> None:
        """Make Reidemeister's first and second moves as long as the waiting crossings allow."""
        while waiting:
            crossing = waiting.pop()
            if not self.is_left[crossing]:
                continue
            for removed in self._find_removable(crossing):
                waiting += self.remove(removed)

    def _find_removable(self, crossing: int) -> tuple[int, ...]:
        """The crossing alone if it closes a loop, with the other one of a clasp, or none."""
        first = 4 * crossing
        for end in range(first, first + 4):
            following = end + 1 if end < first + 3 else first
            arrived = self.opposite[end]
            if arrived == following:
                return (crossing,)
            back = self.opposite[arrived - 1 if arrived % 4 else arrived + 3]
            # A face of two sides; a side that is over at both its ends, or under at both.
            if back == following and (arrived - end) % 2 == 0:
                return (crossing, arrived // 4)
        return ()

    def find_nugatory_crossings(self) -> list[int]:
        """The crossings that have one face at two opposite corners."""
        face_of = [0] * len(self.opposite)
        for number, face in enumerate(cycles(next_in_face(self.opposite))):
            for end in face:
                face_of[end] = number
        return [
            crossing
            for crossing, is_left in enumerate(self.is_left)
            if is_left
            and (
                face_of[4 * crossing] == face_of[4 * crossing + 2]
                or face_of[4 * crossing + 1] == face_of[4 * crossing + 3]
            )
        ]

    def to_diagram(self) -> LinkDiagram:
        """What is left, as a value; its arcs are numbered in order along each component."""
        arc_at = [-1] * len(self.opposite)
        count = 0
        for crossing, is_left in enumerate(self.is_left):
            for start in (4 * crossing + 2, 4 * crossing + (1 if self.signs[crossing] > 0 else 3)):
                end = start
                while is_left and arc_at[end] < 0:
                    arrived = self.opposite[end]
                    arc_at[end] = arc_at[arrived] = count
                    count += 1
                    end = arrived ^ 2  # the other end of the strand: place p + 2
        crossings = (
            Crossing(quadruple(arc_at[4 * crossing : 4 * crossing + 4]), self.signs[crossing])
            for crossing, is_left in enumerate(self.is_left)
            if is_left
        )
        return LinkDiagram(tuple(crossings), self.circles)
