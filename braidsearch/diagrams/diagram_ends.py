"""A diagram under change, for moves that take crossings out or put them in."""

from __future__ import annotations

from braidsearch.diagrams.link_diagram import Crossing, LinkDiagram, quadruple


class DiagramEnds:
    """A diagram under change: which end of an arc lies opposite to which, and what is left.

    End 4 x + p is at place p of crossing x, as in ``LinkDiagram.opposite_ends``; ends at odd
    places belong to over-strands. ``changes`` lists what ``remove`` overwrote, so that it can be
    undone.
    """

    def __init__(self, diagram: LinkDiagram) -> None:
        self.opposite = list(diagram.opposite_ends)
        self.signs = [crossing.sign for crossing in diagram.crossings]
        self.is_left = [True] * len(self.signs)
        self.circles = diagram.circles
        self.changes: list[tuple[int, int]] = []

    def over_entry(self, crossing: int) -> int:
        """The end at which the over-strand enters the crossing."""
        return 4 * crossing + (3 if self.signs[crossing] > 0 else 1)

    def is_exit(self, end: int) -> bool:
        """Whether the arc at this end leaves its crossing there."""
        return end % 4 != 0 and end != self.over_entry(end // 4)

    def remove(self, crossing: int) -> list[int]:
        """Take a crossing out and join its strands straight through; return its neighbours."""
        self.is_left[crossing] = False
        neighbours = []
        for end in (4 * crossing, 4 * crossing + 1):
            before, behind = self.opposite[end], self.opposite[end + 2]
            if before == end + 2:
                self.circles += 1
            else:
                self.join(before, behind)
                neighbours += [before // 4, behind // 4]
        return neighbours

    def join(self, one: int, other: int) -> None:
        """Make the two ends those of one arc."""
        self.changes += [(one, self.opposite[one]), (other, self.opposite[other])]
        self.opposite[one], self.opposite[other] = other, one

    def restore(self, crossings: list[int], circles: int) -> None:
        """Undo what was done since ``changes`` was empty: the removal of these crossings."""
        while self.changes:
            end, opposite = self.changes.pop()
            self.opposite[end] = opposite
        for crossing in crossings:
            self.is_left[crossing] = True
        self.circles = circles

    def add_crossing(self, sign: int) -> int:
        """Put a crossing in whose ends are yet to be joined; return its number."""
        self.signs.append(sign)
        self.is_left.append(True)
        self.opposite += [-1] * 4
        return len(self.signs) - 1

    def to_diagram(self) -> LinkDiagram:
        """What is left, as a value; its arcs are numbered in order along each component."""
        arc_at = [-1] * len(self.opposite)
        count = 0
        for end in range(len(self.opposite)):
            start = end
            while self.is_left[start // 4] and self.is_exit(start) and arc_at[start] < 0:
                arrived = self.opposite[start]
                arc_at[start] = arc_at[arrived] = count
                count += 1
                start = arrived ^ 2  # straight through the crossing
        crossings = (
            Crossing(quadruple(arc_at[4 * crossing : 4 * crossing + 4]), self.signs[crossing])
            for crossing, is_left in enumerate(self.is_left)
            if is_left
        )
        return LinkDiagram(tuple(crossings), self.circles)
