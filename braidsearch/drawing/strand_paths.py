"""Where the strands of a braid and of its closure run, crossing by crossing.

sigma_i is drawn as a positive crossing: the strand that comes from the right, from position i + 1,
passes over. For then, strands running downwards, the over-strand runs to the lower left, (-1, -1)
in coordinates with y upwards, and the under-strand to the lower right, (1, -1); the first is turned
into the second by a quarter turn counterclockwise, which makes the crossing right-handed.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass
from itertools import pairwise

from braidsearch.drawing.curves import Cubic, Point, quarter, straight
from braidsearch.drawing.geometry import (
    ARROW_LENGTH,
    LEAD,
    LEVEL_HEIGHT,
    STRAND_SPACING,
    Arrow,
    CrossingPlace,
    Curve,
    Geometry,
    Segment,
)
from braidsearch.drawing.levels import Level
from braidsearch.words import Braid

CLOSING_GAP = 34.0
"""From the last strand to the first of those that lead back; letters fit in between."""

_NARROW_RETURN = 14.0
_MOST_WIDE_RETURNS = 6
_STEEPNESS = 0.4  # of the level's height, to the control points: crossings at right angles
_SLANT = 1.15  # between levels, against the straight line: the strand sways least


def components_of_positions(braid: Braid) -> list[int]:
    """For each start position the number of its component in the closure."""
    numbers = [0] * braid.strands
    for number, cycle in enumerate(braid.component_cycles):
        for position in cycle:
            numbers[position] = number
    return numbers


def components_at_levels(
    braid: Braid, levels: Sequence[Level], components: Sequence[int]
) -> Iterator[list[int]]:
    """For each level, and then for the end, the component at each position above it.

    ``components`` are those of the start positions.
    """
    current = list(components)
    for level in levels:
        yield list(current)
        for number in level:
            left = abs(braid.word[number]) - 1
            current[left], current[left + 1] = current[left + 1], current[left]
    yield list(current)


def braid_geometry(
    braid: Braid, levels: Sequence[Level], components: Sequence[int], is_end: bool = True
) -> Geometry:
    """The geometry of some consecutive levels; ``components`` are those at their top.

    Where the braid ends with them, every strand ends in an arrow head.
    """
    strands, _ = _trace(braid, levels)
    tops, bottoms = _ends(braid, levels)
    curves, arrows = [], []
    for component, strand in zip(components, strands, strict=True):
        if is_end:
            start, (x, height) = strand[-1].cubic.start, strand[-1].cubic.end
            strand[-1] = Segment(straight(start, (x, height - 0.7 * ARROW_LENGTH)))
            arrows.append(Arrow(component, (x, height - ARROW_LENGTH / 2), (0.0, 1.0)))
        curves.append(Curve(component, tuple(strand)))
    places = _places(braid, levels, curves)
    return Geometry(tuple(curves), places, tuple(arrows), tops, bottoms)


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
    places = _places(braid, levels, curves)
    return Geometry(tuple(curves), places, tuple(arrows), *_ends(braid, levels))


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


@dataclass(frozen=True, slots=True)
class _Step:
    """How a strand passes a level at a crossing: from one position to the one beside it."""

    number: int
    row: int
    start: int
    end: int
    is_over: bool

    def leads_on_to(self, following: _Step) -> bool:
        """Whether the following step is on the next level and goes the same way."""
        is_next = following.row == self.row + 1
        return is_next and following.end - following.start == self.end - self.start


def _walk(braid: Braid, levels: Sequence[Level]) -> tuple[list[list[_Step]], list[int]]:
    """For each start position the steps of its strand, and the position where it ends."""
    steps: list[list[_Step]] = [[] for _ in range(braid.strands)]
    at = list(range(braid.strands))  # which strand is at each position
    for row, level in enumerate(levels):
        for number in level:
            letter = braid.word[number]
            left = abs(letter) - 1
            right = left + 1
            steps[at[left]].append(_Step(number, row, left, right, letter < 0))
            steps[at[right]].append(_Step(number, row, right, left, letter > 0))
            at[left], at[right] = at[right], at[left]
    ends = [0] * braid.strands
    for position, strand in enumerate(at):
        ends[strand] = position
    return steps, ends


def _trace(braid: Braid, levels: Sequence[Level]) -> tuple[list[list[Segment]], list[int]]:
    """For each start position its segments down to the bottom, and the position where it ends."""
    steps, ends = _walk(braid, levels)
    passages = [_passages(strand) for strand in steps]
    meeting: dict[int, list[Cubic]] = {}
    for strand, cubics in zip(steps, passages, strict=True):
        for step, cubic in zip(strand, cubics, strict=True):
            meeting.setdefault(step.number, []).append(cubic)
    times = {number: _meeting_time(*cubics) for number, cubics in meeting.items()}
    height = length_of(levels)
    paths = []
    for position, (strand, cubics) in enumerate(zip(steps, passages, strict=True)):
        path: list[Segment] = []
        at = (position * STRAND_SPACING, 0.0)
        for step, cubic in zip(strand, cubics, strict=True):
            if cubic.start != at:
                path.append(Segment(straight(at, cubic.start)))
            path.append(Segment(cubic, step.number, step.is_over, times[step.number]))
            at = cubic.end
        path.append(Segment(straight(at, (at[0], height))))
        paths.append(path)
    return paths, ends


def _passages(steps: Sequence[_Step]) -> list[Cubic]:
    """The curve of each step: upright at its ends, or slanting where it leads on to the next."""
    slants = [before.leads_on_to(after) for before, after in pairwise(steps)]
    starts, ends = [False, *slants], [*slants, False]
    return [_through(*step) for step in zip(steps, starts, ends, strict=False)]


def _through(step: _Step, is_slanting_at_start: bool, is_slanting_at_end: bool) -> Cubic:
    top, bend = LEAD + LEVEL_HEIGHT * step.row, _STEEPNESS * LEVEL_HEIGHT
    bottom = top + LEVEL_HEIGHT
    start, end = step.start * STRAND_SPACING, step.end * STRAND_SPACING
    slant = _SLANT * _STEEPNESS * (end - start)
    return Cubic(
        (start, top),
        (start + slant * is_slanting_at_start, top + bend),
        (end - slant * is_slanting_at_end, bottom - bend),
        (end, bottom),
    )


def _meeting_time(first: Cubic, second: Cubic) -> float:
    """The time at which both strands of a crossing are at the same place.

    Both have the same heights at the same times, so it is the zero of the difference of their x.
    Its four Bernstein coefficients change sign once, hence there is exactly one (the variation of
    a Bernstein polynomial is at most that of its coefficients).
    """
    a, b, c, d = (p[0] - q[0] for p, q in zip(first.points, second.points, strict=True))
    if a + d == 0 == b + c:
        return 0.5  # both strands are alike
    low, high = 0.0, 1.0
    for _ in range(32):
        middle = (low + high) / 2
        rest = 1 - middle
        value = (a * rest + 3 * b * middle) * rest**2 + (3 * c * rest + d * middle) * middle**2
        low, high = (middle, high) if (value > 0) == (a > 0) else (low, middle)
    return (low + high) / 2


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


def _ends(braid: Braid, levels: Sequence[Level]) -> tuple[tuple[Point, ...], tuple[Point, ...]]:
    tops = tuple((position * STRAND_SPACING, 0.0) for position in range(braid.strands))
    return tops, tuple((x, length_of(levels)) for x, _ in tops)


def _places(
    braid: Braid, levels: Sequence[Level], curves: Iterable[Curve]
) -> tuple[CrossingPlace, ...]:
    meetings = {
        segment.crossing: segment.cubic.point_at(segment.time)
        for curve in curves
        for segment in curve.segments
        if segment.crossing is not None
    }
    return tuple(
        CrossingPlace(number, braid.word[number], _cell(braid.word[number], row), meetings[number])
        for row, level in enumerate(levels)
        for number in level
    )


def _cell(letter: int, row: int) -> Point:
    return (abs(letter) - 0.5) * STRAND_SPACING, LEAD + LEVEL_HEIGHT * (row + 0.5)
