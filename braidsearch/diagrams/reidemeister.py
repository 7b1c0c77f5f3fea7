"""Moves that take crossings away: Reidemeister's first and second, and nugatory crossings."""

from __future__ import annotations

from braidsearch.diagrams.diagram_ends import DiagramEnds


def remove_loops_and_clasps(ends: DiagramEnds, waiting: list[int]) -> None:
    """Make Reidemeister's first and second moves as long as the waiting crossings allow.

    The first removes a crossing that closes a loop, the second two crossings between which one
    strand lies over the other; what is next to them is looked at again. ``waiting`` is used up.

    Source: Reidemeister, Elementare Begründung der Knotentheorie, 1927.
    """
    while waiting:
        crossing = waiting.pop()
        if ends.is_left[crossing]:
            for removed in _find_removable(ends, crossing):
                waiting += ends.remove(removed)


def _find_removable(ends: DiagramEnds, crossing: int) -> tuple[int, ...]:
    """The crossing alone if it closes a loop, with the other one of a clasp, or none."""
    first = 4 * crossing
    for end in range(first, first + 4):
        following = end + 1 if end < first + 3 else first
        arrived = ends.opposite[end]
        if arrived == following:
            return (crossing,)
        back = ends.opposite[arrived - 1 if arrived % 4 else arrived + 3]
        # A face of two sides; a side that is over at both its ends, or under at both.
        if back == following and (arrived - end) % 2 == 0:
            return (crossing, arrived // 4)
    return ()


def remove_nugatory_crossings(ends: DiagramEnds) -> bool:
    """Remove all crossings that meet some face twice; return whether there was one.

    Such a crossing joins two diagrams that lie on two sides of a circle, and turning one of them
    over undoes it. What arises is their connected sum, which is well defined however it is drawn,
    so the strands are only joined straight through. Others stay nugatory, and go as well.

    Source: Tait, On knots, 1877.
    """
    face_of = _face_numbers(ends)
    nugatory = [
        crossing
        for crossing, is_left in enumerate(ends.is_left)
        if is_left
        and (
            face_of[4 * crossing] == face_of[4 * crossing + 2]
            or face_of[4 * crossing + 1] == face_of[4 * crossing + 3]
        )
    ]
    neighbours = [neighbour for crossing in nugatory for neighbour in ends.remove(crossing)]
    remove_loops_and_clasps(ends, neighbours)
    return bool(nugatory)


def _face_numbers(ends: DiagramEnds) -> list[int]:
    """For each end of what is left the face on the left where an arc leaves its crossing there."""
    numbers = [-1] * len(ends.opposite)
    for start in range(len(numbers)):
        end = start
        while ends.is_left[end // 4] and numbers[end] < 0:
            numbers[end] = start
            arrived = ends.opposite[end]
            end = arrived - 1 if arrived % 4 else arrived + 3
    return numbers
