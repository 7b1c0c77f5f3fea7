"""Where the strands of a braid and of its closure run: cubic curves, crossing by crossing.

Everything here is in a frame of its own: strands run downwards, position 1 lies at x = 0 and
position p at x = (p - 1) ``STRAND_SPACING``, the first level begins at y = 0. sigma_i is drawn as a
positive crossing: the strand that comes from the right, from position i + 1, passes over. For then
the over-strand runs to the lower left, (-1, -1) in coordinates with y upwards, and the
under-strand to the lower right, (1, -1); the first is turned into the second by a quarter turn
counterclockwise, which makes the crossing right-handed.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from dataclasses import dataclass, replace

from braidsearch.drawing.curves import Cubic, Point, quarter, straight
from braidsearch.drawing.levels import Level
from braidsearch.words import Braid

STRAND_SPACING = 24.0
LEVEL_HEIGHT = 36.0
LEAD = 14.0
"""How far strands run straight before the first level and after the last."""

STROKE = 3.6
GAP = 4.6
"""How far from the middle of a crossing the under-strand stops, along the curve."""

CLOSING_GAP = 34.0
"""From the last strand to the first of those that lead back; letters fit in between."""

_NARROW_RETURN = 14.0
_MOST_WIDE_RETURNS = 6
_STEEPNESS = 0.4  # of the level's height, to the control points: crossings at right angles
_SHORTEST_FOR_ARROW = 8.0


@dataclass(frozen=True, slots=True)
class Segment:
    """A piece of a strand: between levels, or through one crossing.

    ``crossing`` is the number of the letter from 0, None where there is none.
    """

    cubic: Cubic
    crossing: int | None = None
    is_over: bool = True


@dataclass(frozen=True, slots=True)
class Curve:
    """A strand from its beginning to its end, along its orientation.

    ``component`` counts as ``Braid.component_cycles``; a closed curve ends where it begins.
    """

    component: int
    segments: tuple[Segment, ...]
    is_closed: bool = False


@dataclass(frozen=True, slots=True)
class CrossingPlace:
    """The middle of a crossing, with the number of its letter from 0."""

    number: int
    letter: int
    centre: Point


@dataclass(frozen=True, slots=True)
class Arrow:
    """An arrow head on a strand: where its middle lies, and the unit vector along the strand."""

    component: int
    centre: Point
    direction: Point


@dataclass(frozen=True)
class Geometry:
    """Curves and crossings of one picture, or of one part of a picture that is cut into parts."""

    curves: tuple[Curve, ...]
    crossings: tuple[CrossingPlace, ...]
    arrows: tuple[Arrow, ...]
    tops: tuple[Point, ...]
    bottoms: tuple[Point, ...]

    def mapped(self, place: Callable[[Point], Point]) -> Geometry:
        """The same moved by an affine map that keeps lengths."""
        return Geometry(
            tuple(_mapped_curve(curve, place) for curve in self.curves),
            tuple(replace(each, centre=place(each.centre)) for each in self.crossings),
            tuple(_mapped_arrow(arrow, place) for arrow in self.arrows),
            tuple(map(place, self.tops)),
            tuple(map(place, self.bottoms)),
        )


def components_of_positions(braid: Braid) -> list[int]:
    """For each start position the number of its component in the closure."""
    numbers = [0] * braid.strands
    for number, cycle in enumerate(braid.component_cycles):
        for position in cycle:
            numbers[position] = number
    return numbers


def components_at_levels(braid: Braid, levels: Sequence[Level]) -> Iterator[list[int]]:
    """For each level, and then for the end, the component at each position above it."""
    current = components_of_positions(braid)
    for level in levels:
        yield list(current)
        for number in level:
            left = abs(braid.word[number]) - 1
            current[left], current[left + 1] = current[left + 1], current[left]
    yield list(current)


def braid_geometry(braid: Braid, levels: Sequence[Level], components: Sequence[int]) -> Geometry:
    """The geometry of some consecutive levels; ``components`` are those at their top."""
    strands, _ = _trace(braid, levels)
    height = length_of(levels)
    curves = tuple(
        Curve(component, tuple(strand))
        for component, strand in zip(components, strands, strict=True)
    )
    arrows = [
        Arrow(curve.component, _shifted(curve.segments[-1].cubic.end, -LEAD / 2), (0.0, 1.0))
        for curve in curves
    ]
    tops = tuple((position * STRAND_SPACING, 0.0) for position in range(braid.strands))
    bottoms = tuple((x, height) for x, _ in tops)
    return Geometry(curves, tuple(_iter_places(braid, levels)), tuple(arrows), tops, bottoms)


def closure_geometry(braid: Braid, levels: Sequence[Level]) -> Geometry:
    """The geometry of the closure: strands lead back on the right, the last one innermost."""
    strands, ends = _trace(braid, levels)
    height = length_of(levels)
    curves, arrows = [], []
    for component, cycle in enumerate(braid.component_cycles):
        segments: list[Segment] = []
        for position in cycle:
            segments += strands[position]
            back = _closing_segments(ends[position], braid.strands, height)
            segments += back
            arrows.append(Arrow(component, back[2].cubic.point_at(0.5), (0.0, -1.0)))
        curves.append(Curve(component, tuple(segments), is_closed=True))
    tops = tuple((position * STRAND_SPACING, 0.0) for position in range(braid.strands))
    bottoms = tuple((x, height) for x, _ in tops)
    places = tuple(_iter_places(braid, levels))
    return Geometry(tuple(curves), places, tuple(arrows), tops, bottoms)


def length_of(levels: Sequence[Level]) -> float:
    """From the top of the strands to their bottom."""
    return 2 * LEAD + LEVEL_HEIGHT * len(levels)


def closing_reach(position: int, strands: int) -> tuple[float, float]:
    """How far the strand at a position leads back beyond the braid: to the right of its last
    strand, and above its top.
    """
    return_spacing = STRAND_SPACING if strands <= _MOST_WIDE_RETURNS else _NARROW_RETURN
    outwards = (strands - 1 - position) * return_spacing
    return CLOSING_GAP + outwards, CLOSING_GAP / 2 + outwards


def visible_runs(curve: Curve) -> list[list[Cubic]]:
    """The curve cut at its undercrossings: each run is what lies between two of them.

    Where a closed curve passes under somewhere, its first run begins behind an undercrossing.
    """
    runs: list[list[Cubic]] = [[]]
    for segment in curve.segments:
        if segment.is_over:
            runs[-1].append(segment.cubic)
            continue
        before, after = _cut_open(segment.cubic)
        runs[-1].append(before)
        runs.append([after])
    if curve.is_closed and len(runs) > 1:
        runs[0] = runs.pop() + runs[0]
    return runs


def _cut_open(cubic: Cubic) -> tuple[Cubic, Cubic]:
    """The halves of a crossing's under-strand, each without its part near the middle."""
    first, second = cubic.split(0.5)
    backwards = Cubic(*first.points[::-1])
    kept = backwards.split(backwards.time_of_length(GAP))[1]
    return Cubic(*kept.points[::-1]), second.split(second.time_of_length(GAP))[1]


def _trace(braid: Braid, levels: Sequence[Level]) -> tuple[list[list[Segment]], list[int]]:
    """For each start position its segments down to the bottom, and the position where it ends."""
    paths: list[list[Segment]] = [[] for _ in range(braid.strands)]
    begun = [0.0] * braid.strands
    at = list(range(braid.strands))  # which strand is at each position
    for row, level in enumerate(levels):
        top = LEAD + LEVEL_HEIGHT * row
        for number in level:
            letter = braid.word[number]
            left = abs(letter) - 1
            for side, other in ((0, 1), (1, 0)):
                strand, x = at[left + side], (left + side) * STRAND_SPACING
                if begun[strand] < top:
                    paths[strand].append(Segment(straight((x, begun[strand]), (x, top))))
                is_over = (side == 1) == (letter > 0)
                cubic = _through((x, top), (left + other) * STRAND_SPACING)
                paths[strand].append(Segment(cubic, number, is_over))
                begun[strand] = top + LEVEL_HEIGHT
            at[left], at[left + 1] = at[left + 1], at[left]
    ends = [0] * braid.strands
    for position, strand in enumerate(at):
        x = position * STRAND_SPACING
        paths[strand].append(Segment(straight((x, begun[strand]), (x, length_of(levels)))))
        ends[strand] = position
    return paths, ends


def _through(start: Point, x: float) -> Cubic:
    """A strand through one level, upright at both ends."""
    top, bend = start[1], _STEEPNESS * LEVEL_HEIGHT
    bottom = top + LEVEL_HEIGHT
    return Cubic(start, (start[0], top + bend), (x, bottom - bend), (x, bottom))


def _closing_segments(position: int, strands: int, height: float) -> list[Segment]:
    """From the bottom at a position around the right back to the top at the same position."""
    x, last = position * STRAND_SPACING, (strands - 1) * STRAND_SPACING
    middle = last + CLOSING_GAP / 2
    reach, rise = closing_reach(position, strands)
    right = last + reach
    cubics = (
        quarter((x, height), (x, height + rise), (middle, height + rise)),
        quarter((middle, height + rise), (right, height + rise), (right, height)),
        straight((right, height), (right, 0.0)),
        quarter((right, 0.0), (right, -rise), (middle, -rise)),
        quarter((middle, -rise), (x, -rise), (x, 0.0)),
    )
    return [Segment(cubic) for cubic in cubics]


def _iter_places(braid: Braid, levels: Sequence[Level]) -> Iterator[CrossingPlace]:
    for row, level in enumerate(levels):
        middle = LEAD + LEVEL_HEIGHT * (row + 0.5)
        for number in level:
            letter = braid.word[number]
            yield CrossingPlace(number, letter, ((abs(letter) - 0.5) * STRAND_SPACING, middle))


def _mapped_curve(curve: Curve, place: Callable[[Point], Point]) -> Curve:
    segments = (replace(each, cubic=each.cubic.mapped(place)) for each in curve.segments)
    return replace(curve, segments=tuple(segments))


def _mapped_arrow(arrow: Arrow, place: Callable[[Point], Point]) -> Arrow:
    (x0, y0), (x1, y1) = place((0.0, 0.0)), place(arrow.direction)
    return replace(arrow, centre=place(arrow.centre), direction=(x1 - x0, y1 - y0))


def _shifted(point: Point, down: float) -> Point:
    return point[0], point[1] + down
