"""Reading the braid word off a diagram whose Seifert circles are nested coherently."""

from __future__ import annotations

from collections.abc import Sequence

from braidsearch.diagrams.link_diagram import connected_pieces, cycles, next_in_face
from braidsearch.words import Braid


def read_coherent_circles(opposite: Sequence[int], signs: Sequence[int], circles: int) -> Braid:
    """The braid of a diagram no face of which has incoherent Seifert circles on its border.

    The diagram is given by ``opposite``, for each end the other end of its arc, and the signs of
    its crossings; ``circles`` is the number of further components, without crossings. In each
    connected piece the circles lie around each other in a row, and each becomes a strand.

    Raises ArithmeticError where the circles of a piece are not in a row.
    """
    reading = _Reading(opposite, signs)
    letters: list[int] = []
    strands = 0
    for piece in connected_pieces(opposite):
        row = reading.circles_in_row(piece)
        letters += reading.word_of_row(row, reading.cut_through(row), strands)
        strands += len(row)
    return Braid(letters, strands + circles)


class _Reading:
    """Seifert circles as cycles of the ends at which their arcs leave a crossing."""

    def __init__(self, opposite: Sequence[int], signs: Sequence[int]) -> None:
        self.opposite = opposite
        self.signs = signs
        self.next_in_face = next_in_face(opposite)
        self.following = list(range(len(opposite)))  # ends that enter a crossing stay alone
        for crossing, sign in enumerate(signs):
            first = 4 * crossing
            # Cut open, the strands run 0 to 1 and 3 to 2, or 0 to 3 and 1 to 2.
            for enters, leaves in ((0, 1), (3, 2)) if sign > 0 else ((0, 3), (1, 2)):
                self.following[opposite[first + enters]] = first + leaves
        self.circle_of = [-1] * len(opposite)
        self.circles = [cycle for cycle in cycles(self.following) if self._is_exit(cycle[0])]
        for number, circle in enumerate(self.circles):
            for end in circle:
                self.circle_of[end] = self.circle_of[opposite[end]] = number

    def _is_exit(self, end: int) -> bool:
        return end % 4 == 2 or end % 4 == (1 if self.signs[end // 4] > 0 else 3)

    def _circles_at(self, crossing: int) -> tuple[int, int]:
        return self.circle_of[4 * crossing], self.circle_of[4 * crossing + 2]

    def circles_in_row(self, piece: Sequence[int]) -> list[int]:
        """The circles of a connected piece, from one that has a single neighbour to the other."""
        neighbours: dict[int, set[int]] = {}
        for crossing in piece:
            one, other = self._circles_at(crossing)
            neighbours.setdefault(one, set()).add(other)
            neighbours.setdefault(other, set()).add(one)
        row = [min(circle for circle in neighbours if len(neighbours[circle]) == 1)]
        seen = {row[0]}
        while further := neighbours[row[-1]] - seen:
            row.append(further.pop())
            seen.add(row[-1])
        if len(row) != len(neighbours) or max(map(len, neighbours.values())) > 2:
            raise ArithmeticError("the Seifert circles of a piece do not lie in a row")
        return row

    def cut_through(self, row: Sequence[int]) -> list[int]:
        """One arc of each circle, by its first end, that a ray from inside to outside crosses.

        Neighbours in the row have a face between them, on whose border both of their arcs lie; it
        is beyond the face between the circles before, or the row does not lead outwards.
        """
        start = self.circles[row[0]][0]
        if self._find_in_face(start, row[1]) < 0:
            start = self.opposite[start]
        ends = [start]
        for circle in row[1:]:
            found = self._find_in_face(ends[-1], circle)
            if found < 0:
                raise ArithmeticError("the Seifert circles of a piece do not lie in a row")
            ends.append(self.opposite[found])  # seen from the face beyond
        return [end if self._is_exit(end) else self.opposite[end] for end in ends]

    def _find_in_face(self, start: int, circle: int) -> int:
        """An end on the border of the face left of ``start`` that is of the circle, or -1."""
        end = self.next_in_face[start]
        while end != start:
            if self.circle_of[end] == circle:
                return end
            end = self.next_in_face[end]
        return -1

    def word_of_row(self, row: Sequence[int], cut: Sequence[int], strands: int) -> list[int]:
        """The letters, in an order in which every circle passes its crossings from the cut on.

        The circle with place p in the row becomes strand ``strands + p``, counted from 0.
        """
        place_of = {circle: place for place, circle in enumerate(row)}
        upcoming = list(cut)
        to_pass = [len(self.circles[circle]) for circle in row]
        letters: list[int] = []
        waiting = list(range(len(row)))
        while waiting:
            place = waiting.pop()
            crossing = self.opposite[upcoming[place]] // 4
            partner = sum(place_of[circle] for circle in self._circles_at(crossing)) - place
            # Otherwise the partner has other crossings to pass first, and will come to this one.
            is_next = self.opposite[upcoming[partner]] // 4 == crossing
            if to_pass[place] and to_pass[partner] and is_next:
                letters.append(self.signs[crossing] * (strands + min(place, partner) + 1))
                for passed in (place, partner):
                    upcoming[passed] = self.following[upcoming[passed]]
                    to_pass[passed] -= 1
                waiting += [partner, place]
        if any(to_pass):
            raise ArithmeticError("the crossings of a closed braid have no order along its strands")
        return letters
