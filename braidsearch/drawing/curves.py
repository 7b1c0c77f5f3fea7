"""Points and cubic curves in the plane: cutting, measuring, moving them."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass

Point = tuple[float, float]
"""A place on the page: x to the right, y downwards, in user units of the picture."""

_QUARTER = 4 / 3 * (math.sqrt(2) - 1)
"""How far along their tangents the inner control points of a quarter circle lie."""

_SAMPLES = 16


@dataclass(frozen=True, slots=True)
class Cubic:
    """A cubic Bezier curve by its four control points, from ``start`` to ``end``."""

    start: Point
    first_control: Point
    second_control: Point
    end: Point

    @property
    def points(self) -> tuple[Point, Point, Point, Point]:
        """The four control points in order."""
        return self.start, self.first_control, self.second_control, self.end

    @property
    def is_straight(self) -> bool:
        """Whether it was made by ``straight``: upright or level, its controls on the segment."""
        (x0, y0), (x1, y1), (x2, y2), (x3, y3) = self.points
        return x0 == x1 == x2 == x3 or y0 == y1 == y2 == y3

    def point_at(self, time: float) -> Point:
        """The point at a time from 0 to 1, by the Bernstein polynomials."""
        (x0, y0), (x1, y1), (x2, y2), (x3, y3) = self.points
        rest = 1 - time
        a, b, c, d = rest**3, 3 * rest**2 * time, 3 * rest * time**2, time**3
        return a * x0 + b * x1 + c * x2 + d * x3, a * y0 + b * y1 + c * y2 + d * y3

    def split(self, time: float) -> tuple[Cubic, Cubic]:
        """The parts before and after a time from 0 to 1, by de Casteljau's construction."""
        a, b, c, d = self.points
        ab, bc, cd = _between(a, b, time), _between(b, c, time), _between(c, d, time)
        abc, bcd = _between(ab, bc, time), _between(bc, cd, time)
        middle = _between(abc, bcd, time)
        return Cubic(a, ab, abc, middle), Cubic(middle, bcd, cd, d)

    def backwards(self) -> Cubic:
        """The same curve from its end to its start."""
        return Cubic(self.end, self.second_control, self.first_control, self.start)

    def mapped(self, place: Callable[[Point], Point]) -> Cubic:
        """The curve with each control point moved; for an affine map this moves the curve."""
        return Cubic(*(place(point) for point in self.points))

    def time_of_length(self, length: float) -> float:
        """The time at which the curve has run so far from its start; 1 where it is shorter."""
        before, run = self.start, 0.0
        for step in range(1, _SAMPLES + 1):
            after = self.point_at(step / _SAMPLES)
            chord = math.dist(before, after)
            if run + chord >= length:
                return (step - 1 + (length - run) / chord) / _SAMPLES
            before, run = after, run + chord
        return 1.0


def straight(start: Point, end: Point) -> Cubic:
    """The segment from start to end as a cubic with its controls at the thirds."""
    return Cubic(start, _between(start, end, 1 / 3), _between(start, end, 2 / 3), end)


def quarter(start: Point, corner: Point, end: Point) -> Cubic:
    """A quarter of an ellipse with upright axes, from start to end, which bends at the corner."""
    return Cubic(start, _between(start, corner, _QUARTER), _between(end, corner, _QUARTER), end)


def _between(start: Point, end: Point, time: float) -> Point:
    (x0, y0), (x1, y1) = start, end
    # Equal coordinates stay exactly equal, so that what is upright is seen to be.
    x = x0 if x0 == x1 else x0 + (x1 - x0) * time
    y = y0 if y0 == y1 else y0 + (y1 - y0) * time
    return x, y
