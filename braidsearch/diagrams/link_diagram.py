"""The value of a drawing: an oriented link diagram on the sphere, as crossings and their arcs."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from functools import cached_property

from braidsearch.errors import InputError

Arcs = tuple[int, ...]


@dataclass(frozen=True, slots=True)
class Crossing:
    """Four arcs, counterclockwise from the incoming under-arc, and the sign of the crossing.

    The under-strand runs from the first arc to the third. At a positive (right-handed) crossing,
    sign 1, the over-strand enters by the fourth arc and leaves by the second; at a negative one,
    sign -1, it enters by the second and leaves by the fourth.
    """

    arcs: tuple[int, int, int, int]
    sign: int

    @property
    def over_enters(self) -> int:
        """The place, 1 or 3, of the arc by which the over-strand enters."""
        return 3 if self.sign > 0 else 1

    @property
    def passages(self) -> tuple[tuple[int, int], tuple[int, int]]:
        """The under-strand and the over-strand, each as (arc that enters, arc that leaves)."""
        first, second, third, fourth = self.arcs
        over = (fourth, second) if self.sign > 0 else (second, fourth)
        return (first, third), over

    @property
    def smoothed_passages(self) -> tuple[tuple[int, int], tuple[int, int]]:
        """The two strands that remain when the crossing is cut open along the orientation."""
        first, second, third, fourth = self.arcs
        if self.sign > 0:
            return (first, second), (fourth, third)
        return (first, fourth), (second, third)

    def mirrored(self) -> Crossing:
        """The crossing with the other strand on top."""
        start = self.over_enters
        return Crossing(quadruple(self.arcs[start:] + self.arcs[:start]), -self.sign)

    def reversed_strands(self, is_under: bool, is_over: bool) -> Crossing:
        """The crossing with its under-strand, its over-strand or both running backwards."""
        arcs = self.arcs[2:] + self.arcs[:2] if is_under else self.arcs
        return Crossing(quadruple(arcs), -self.sign if is_under != is_over else self.sign)


def quadruple(values: Sequence[int]) -> tuple[int, int, int, int]:
    """Four values as a tuple of four."""
    first, second, third, fourth = values
    return first, second, third, fourth


@dataclass(frozen=True)
class LinkDiagram:
    """An oriented link diagram on the sphere: crossings, and components without any.

    With c crossings there are arcs 0 .. 2c-1; each leaves one crossing and enters one, which may
    be the same. ``circles`` is the number of components that meet no crossing. Where the diagram
    falls into several pieces, each lies in a region of the others, in no matter which.

    Raises InputError where an arc does not leave one crossing and enter one, for a sign other
    than 1 and -1, for a piece that is not planar (Euler's formula), and for an empty diagram.
    """

    crossings: tuple[Crossing, ...]
    circles: int = 0

    def __post_init__(self) -> None:
        if self.circles < 0 or not (self.circles or self.crossings):
            raise InputError(
                f"{len(self.crossings)} crossings and {self.circles} circles: "
                "expected a link of at least one component"
            )
        _check_crossings(self.crossings)
        for piece, genus in zip(self.pieces, self.genera, strict=True):
            if genus:
                plural = "s" * (len(piece) != 1)
                raise InputError(
                    f"the piece of crossing {piece[0] + 1}, {len(piece)} crossing{plural} in all: "
                    f"expected a planar diagram, found one of genus {genus}"
                )

    @property
    def arc_count(self) -> int:
        """Two for each crossing."""
        return 2 * len(self.crossings)

    @cached_property
    def successors(self) -> tuple[int, ...]:
        """For each arc the arc that follows it, straight through the crossing."""
        following = [0] * self.arc_count
        for crossing in self.crossings:
            for enters, leaves in crossing.passages:
                following[enters] = leaves
        return tuple(following)

    @cached_property
    def components(self) -> tuple[Arcs, ...]:
        """The arcs of each component in order, from its least; components by their least arc.

        The ``circles`` have no arcs; they are thought of behind these, as further components.
        """
        return cycles(self.successors)

    @property
    def component_count(self) -> int:
        """The number of components, those without crossings included."""
        return len(self.components) + self.circles

    @cached_property
    def component_of_arc(self) -> tuple[int, ...]:
        """For each arc the place of its component in ``components``."""
        result = [0] * self.arc_count
        for number, arcs in enumerate(self.components):
            for arc in arcs:
                result[arc] = number
        return tuple(result)

    @cached_property
    def seifert_circles(self) -> tuple[Arcs, ...]:
        """The arcs of each circle that remains when every crossing is cut open, in order.

        The components without crossings are Seifert circles too, and not among these.
        """
        following = [0] * self.arc_count
        for crossing in self.crossings:
            for enters, leaves in crossing.smoothed_passages:
                following[enters] = leaves
        return cycles(following)

    @property
    def seifert_circle_count(self) -> int:
        """The number of Seifert circles, the components without crossings included."""
        return len(self.seifert_circles) + self.circles

    @property
    def writhe(self) -> int:
        """Positive crossings minus negative crossings."""
        return sum(crossing.sign for crossing in self.crossings)

    @cached_property
    def opposite_ends(self) -> tuple[int, ...]:
        """For each end of an arc the other end of that arc.

        End 4 x + p is at place p, counted from 0, of crossing x.
        """
        return opposite_ends([arc for crossing in self.crossings for arc in crossing.arcs])

    @cached_property
    def face_cycles(self) -> tuple[tuple[int, ...], ...]:
        """The faces, each as the ends at which its border leaves a crossing, counterclockwise."""
        return cycles(next_in_face(self.opposite_ends))

    @cached_property
    def faces(self) -> tuple[tuple[tuple[int, int], ...], ...]:
        """The faces of the pieces, each with its border counterclockwise, the face to the left.

        A border is a sequence of (arc, direction), the direction 1 where it runs along the arc
        and -1 where it runs against it. A piece of c crossings has c + 2 faces.
        """
        return tuple(tuple(self._directed(end) for end in face) for face in self.face_cycles)

    def _directed(self, end: int) -> tuple[int, int]:
        crossing = self.crossings[end // 4]
        place = end % 4
        leaves = place not in (0, crossing.over_enters)
        return crossing.arcs[place], 1 if leaves else -1

    @cached_property
    def pieces(self) -> tuple[tuple[int, ...], ...]:
        """The connected pieces: for each its crossings, counted from 0, in ascending order."""
        return connected_pieces(self.opposite_ends)

    @cached_property
    def genera(self) -> tuple[int, ...]:
        """For each piece the genus of the surface on which it is drawn: V - E + F = 2 - 2 g."""
        number = [0] * len(self.crossings)
        for place, piece in enumerate(self.pieces):
            for crossing in piece:
                number[crossing] = place
        faces = [0] * len(self.pieces)
        for face in self.face_cycles:
            faces[number[face[0] // 4]] += 1
        return tuple(
            (2 + len(piece) - count) // 2 for piece, count in zip(self.pieces, faces, strict=True)
        )

    @property
    def is_planar(self) -> bool:
        """Whether every piece is drawn on a sphere, as the constructor has made sure."""
        return not any(self.genera)

    @property
    def is_connected(self) -> bool:
        """Whether the diagram is one piece, a circle being a piece of its own."""
        return len(self.pieces) + self.circles == 1

    def renumbered(self) -> LinkDiagram:
        """The same diagram with its arcs numbered in order along each component.

        Components keep their order and start at their least arc; one of two arcs starts at the
        arc that enters the earlier of its crossings.
        """
        entered = {
            enters: number
            for number, crossing in reversed(list(enumerate(self.crossings)))
            for enters, _ in crossing.passages
        }
        number_of = [0] * self.arc_count
        count = 0
        for arcs in self.components:
            ordered = sorted(arcs, key=entered.__getitem__) if len(arcs) == 2 else arcs
            for arc in ordered:
                number_of[arc] = count
                count += 1
        crossings = (
            Crossing(quadruple([number_of[arc] for arc in crossing.arcs]), crossing.sign)
            for crossing in self.crossings
        )
        return LinkDiagram(tuple(crossings), self.circles)

    def mirrored(self) -> LinkDiagram:
        """The mirror image: every crossing with the other strand on top, the arcs as they are."""
        return LinkDiagram(tuple(crossing.mirrored() for crossing in self.crossings), self.circles)

    def reversed(self) -> LinkDiagram:
        """The diagram with every component running backwards."""
        return self.reversed_components(range(self.component_count))

    def reversed_components(self, numbers: Iterable[int]) -> LinkDiagram:
        """The diagram with the chosen components running backwards.

        They are numbered from 0 as in ``components``, the circles behind them. Raises InputError
        for a number that belongs to no component.
        """
        chosen = set(numbers)
        for number in chosen:
            if not 0 <= number < self.component_count:
                raise InputError(
                    f"component {number}: expected a number from 0 to {self.component_count - 1}"
                )
        turned = [number in chosen for number in self.component_of_arc]
        crossings = (
            crossing.reversed_strands(turned[crossing.arcs[0]], turned[crossing.arcs[1]])
            for crossing in self.crossings
        )
        return LinkDiagram(tuple(crossings), self.circles)


def cycles(following: Sequence[int]) -> tuple[tuple[int, ...], ...]:
    """The cycles of a permutation of 0, 1, 2, ..., each from its least member."""
    seen = [False] * len(following)
    found = []
    for first in range(len(following)):
        cycle = []
        place = first
        while not seen[place]:
            seen[place] = True
            cycle.append(place)
            place = following[place]
        if cycle:
            found.append(tuple(cycle))
    return tuple(found)


def opposite_ends(arc_at_end: Sequence[int]) -> tuple[int, ...]:
    """For each end the other end with the same arc; every arc has two ends."""
    first_end: dict[int, int] = {}
    opposite = [0] * len(arc_at_end)
    for end, arc in enumerate(arc_at_end):
        other = first_end.setdefault(arc, end)
        opposite[end], opposite[other] = other, end
    return tuple(opposite)


def next_in_face(opposite: Sequence[int]) -> list[int]:
    """For each end where a face's border leaves a crossing, the end where it leaves the next.

    The face lies to the left, so the border turns left at every crossing: from the end where it
    arrives to the one before it, counterclockwise.
    """
    return [arrived - 1 if arrived % 4 else arrived + 3 for arrived in opposite]


def connected_pieces(opposite: Sequence[int]) -> tuple[tuple[int, ...], ...]:
    """The crossings, by number, of each connected piece, in ascending order."""
    seen = [False] * (len(opposite) // 4)
    pieces = []
    for first in range(len(seen)):
        piece = [] if seen[first] else [first]
        seen[first] = True
        for crossing in piece:  # grows while it is walked
            for end in range(4 * crossing, 4 * crossing + 4):
                neighbour = opposite[end] // 4
                if not seen[neighbour]:
                    seen[neighbour] = True
                    piece.append(neighbour)
        if piece:
            pieces.append(tuple(sorted(piece)))
    return tuple(pieces)


def _check_crossings(crossings: Sequence[Crossing]) -> None:
    count = 2 * len(crossings)
    enters, leaves = [0] * count, [0] * count
    for number, crossing in enumerate(crossings, start=1):
        if crossing.sign not in (1, -1):
            raise InputError(f"sign {crossing.sign!r} at crossing {number}: expected 1 or -1")
        for arc in crossing.arcs:
            if not 0 <= arc < count:
                raise InputError(
                    f"arc {arc} at crossing {number}: expected a number from 0 to {count - 1}"
                )
        for enters_by, leaves_by in crossing.passages:
            enters[enters_by] += 1
            leaves[leaves_by] += 1
    for arc in range(count):
        if (enters[arc], leaves[arc]) != (1, 1):
            raise InputError(
                f"arc {arc}: expected it to leave one crossing and enter one, found that it "
                f"leaves {leaves[arc]} and enters {enters[arc]}"
            )
