"""The values of which a picture's geometry consists: curves cut at crossings, arrows, places.

In a frame of its own strands run downwards, position 1 lies at x = 0 and position p at
x = (p - 1) ``STRAND_SPACING``, and strands begin at y = 0; ``mapped`` takes all to a page.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

from braidsearch.drawing.curves import Cubic, Point

STRAND_SPACING = 24.0
LEVEL_HEIGHT = 36.0
LEAD = 16.0
"""How far strands run straight before the first level and after the last."""

STROKE = 3.6
GAP = 4.6
"""How far from the middle of a crossing the under-strand stops, along the curve."""

ARROW_LENGTH = 11.0


@dataclass(frozen=True, slots=True)
class Segment:
    """A piece of a strand: between levels, or through one crossing.

    ``crossing`` is the number of the letter from 0, None where there is none; ``time`` is when the
    two strands of the crossing meet, the same on both.
    """

    cubic: Cubic
    crossing: int | None = None
    is_over: bool = True
    time: float = 0.5


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
    """Where a letter stands: the middle of its cell in the level, and where its strands meet.

    ``number`` counts the letters of the word from 0.
    """

    number: int
    letter: int
    centre: Point
    meeting: Point


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
            tuple(_mapped_place(crossing, place) for crossing in self.crossings),
            tuple(_mapped_arrow(arrow, place) for arrow in self.arrows),
            tuple(map(place, self.tops)),
            tuple(map(place, self.bottoms)),
        )


def visible_runs(curve: Curve) -> list[list[Cubic]]:
    """The curve cut at its undercrossings: each run is what lies between two of them.

    Where a closed curve passes under somewhere, its first run begins behind an undercrossing.
    """
    runs: list[list[Cubic]] = [[]]
    for segment in curve.segments:
        if segment.is_over:
            runs[-1].append(segment.cubic)
            continue
        before, after = _cut_open(segment)
        runs[-1].append(before)
        runs.append([after])
    if curve.is_closed and len(runs) > 1:
        runs[0] = runs.pop() + runs[0]
    return runs


def _cut_open(segment: Segment) -> tuple[Cubic, Cubic]:
    """An under-strand before and after its crossing, each without its part near the crossing."""
    first, second = segment.cubic.split(segment.time)
    backwards = first.backwards()
    kept = backwards.split(backwards.time_of_length(GAP))[1]
    return kept.backwards(), second.split(second.time_of_length(GAP))[1]


def _mapped_curve(curve: Curve, place: Callable[[Point], Point]) -> Curve:
    segments = (
        Segment(each.cubic.mapped(place), each.crossing, each.is_over, each.time)
        for each in curve.segments
    )
    return Curve(curve.component, tuple(segments), curve.is_closed)


def _mapped_place(crossing: CrossingPlace, place: Callable[[Point], Point]) -> CrossingPlace:
    centre, meeting = place(crossing.centre), place(crossing.meeting)
    return CrossingPlace(crossing.number, crossing.letter, centre, meeting)


def _mapped_arrow(arrow: Arrow, place: Callable[[Point], Point]) -> Arrow:
    (x0, y0), (x1, y1) = place((0.0, 0.0)), place(arrow.direction)
    return Arrow(arrow.component, place(arrow.centre), (x1 - x0, y1 - y0))
