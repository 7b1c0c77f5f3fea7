"""Strands that pass over several crossings, or under several, laid anew along a shorter way."""

from __future__ import annotations

from collections.abc import Sequence

from braidsearch.diagrams.diagram_ends import DiagramEnds
from braidsearch.diagrams.reidemeister import remove_loops_and_clasps


def shorten_passes(ends: DiagramEnds) -> bool:
    """Try every strand once, and lay it anew where that saves crossings; return whether it did.

    A strand that passes over k crossings one after the other lies above all others between its
    two ends, so it may be laid across any other faces, over every arc that it meets; likewise
    below. The shortest way is sought face by face. A component that passes over all its
    crossings, or under all, comes off.
    """
    is_shorter = _remove_components_on_one_level(ends)
    for crossing in range(len(ends.signs)):
        for first in (4 * crossing, ends.over_entry(crossing)):
            if ends.is_left[crossing] and (ends.opposite[first] - first) % 2:
                is_shorter |= _shorten(ends, first)
    return is_shorter


def _remove_components_on_one_level(ends: DiagramEnds) -> bool:
    """Take off every component that is over, or under, wherever it crosses."""
    seen = [False] * len(ends.opposite)
    removable: set[int] = set()
    for crossing, is_left in enumerate(ends.is_left):
        for first in (4 * crossing, ends.over_entry(crossing)):
            end, passed = first, []
            while is_left and not seen[end]:
                seen[end] = True
                passed.append(end)
                end = ends.opposite[end ^ 2]
            if len({end % 2 for end in passed}) == 1:
                removable.update(end // 4 for end in passed)
    neighbours = [
        neighbour for crossing in sorted(removable) for neighbour in ends.remove(crossing)
    ]
    remove_loops_and_clasps(ends, neighbours)
    return bool(removable)


def _shorten(ends: DiagramEnds, first: int) -> bool:
    """Lay the strand anew that begins where it enters a crossing at ``first``."""
    start = ends.opposite[first]
    crossings = []
    goal = first
    while (goal - first) % 2 == 0:
        crossings.append(goal // 4)
        goal = ends.opposite[goal ^ 2]
    # Where the strand passes itself on the other level, that crossing stays: leave out one end.
    if goal // 4 in crossings:
        goal = _entry_on_level(ends, crossings.pop(), first)
    if start // 4 in crossings:
        start = _entry_on_level(ends, crossings.pop(0), first) ^ 2
    # A single crossing can only be saved where it is nugatory, and these are dealt with elsewhere.
    return len(crossings) > 1 and _lay_anew(ends, crossings, start, goal, first % 2 == 1)


def _entry_on_level(ends: DiagramEnds, crossing: int, first: int) -> int:
    return ends.over_entry(crossing) if first % 2 else 4 * crossing


def _lay_anew(
    ends: DiagramEnds, crossings: list[int], start: int, goal: int, is_over: bool
) -> bool:
    """Lay the strand between two ends, now through these crossings, along a way with fewer."""
    circles = ends.circles
    ends.changes.clear()
    waiting = [neighbour for crossing in crossings for neighbour in ends.remove(crossing)]
    way = _find_way(ends, start, goal, len(crossings) - 1)
    if way is None:
        ends.restore(crossings, circles)
        return False
    for crossed in way:
        start = _cross(ends, start, crossed, is_over)
        waiting.append(start // 4)
    ends.join(start, goal)
    remove_loops_and_clasps(ends, waiting)
    return True


def _find_way(ends: DiagramEnds, start: int, goal: int, longest: int) -> Sequence[int] | None:
    """The arcs to cross from the face at one loose end to the face at the other, fewest first.

    An arc is given by the end at which it leaves a crossing with the face that one comes from on
    its left. None where more than ``longest`` arcs would have to be crossed. The search goes step
    by step from both ends, each time on the side where there is less to look at.
    """
    here, there = (_Front(ends.opposite, (start, goal), loose) for loose in (start, goal))
    if there.border[0] in here.way_to:
        return ()
    for _ in range(longest):
        front, other = (here, there) if len(here.border) <= len(there.border) else (there, here)
        met = front.advance(other)
        if met is not None:
            side, beyond = (met, ends.opposite[met]) if front is here else (ends.opposite[met], met)
            back = [ends.opposite[end] for end in reversed(there.way_to[beyond])]
            return [*here.way_to[side], side, *back]
    return None


class _Front:
    """The faces reached from the face at a loose end, and the arcs crossed on the way to each.

    The strand between the two loose ends is taken to be away, so its ends border no face.
    ``way_to`` has the way for each end at which a border of these faces leaves a crossing;
    ``border`` has those of the faces that were reached last.
    """

    def __init__(self, opposite: Sequence[int], loose: tuple[int, int], start: int) -> None:
        self.opposite = opposite
        self.loose = loose
        self.way_to: dict[int, tuple[int, ...]] = {}
        self.border: list[int] = []
        self._reach(self._clockwise_from(start), ())

    def _clockwise_from(self, end: int) -> int:
        """The next end clockwise that is not loose."""
        end = end - 1 if end % 4 else end + 3
        while end in self.loose:
            end = end - 1 if end % 4 else end + 3
        return end

    def _reach(self, end: int, way: tuple[int, ...]) -> None:
        while end not in self.way_to:
            self.way_to[end] = way
            self.border.append(end)
            end = self._clockwise_from(self.opposite[end])

    def advance(self, other: _Front) -> int | None:
        """Cross every arc of the border; stop at one with a face of the other front beyond it."""
        sides, self.border = self.border, []
        for side in sides:
            beyond = self.opposite[side]
            if beyond in other.way_to:
                return side
            self._reach(beyond, (*self.way_to[side], side))
        return None


def _cross(ends: DiagramEnds, start: int, crossed: int, is_over: bool) -> int:
    """Lead the strand from a loose end across an arc, from its left; return the new loose end.

    ``crossed`` is one end of the arc, the south end where the strand runs from west to east.
    """
    runs_north = ends.is_exit(crossed)
    crossing = ends.add_crossing(1 if runs_north == is_over else -1)
    if not is_over:
        west, south, east, north = range(4)
    elif runs_north:
        south, east, north, west = range(4)
    else:
        north, west, south, east = range(4)
    beyond = ends.opposite[crossed]
    first = 4 * crossing
    ends.join(start, first + west)
    ends.join(crossed, first + south)
    ends.join(first + north, beyond)
    return first + east
