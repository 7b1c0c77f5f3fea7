"""Cubic curves: cutting them changes no point, and lengths are measured along them."""

import math

from hypothesis import given
from hypothesis import strategies as st

from braidsearch.drawing.curves import Cubic, quarter, straight

coordinates = st.floats(-100, 100)
points = st.tuples(coordinates, coordinates)
cubics = st.builds(Cubic, points, points, points, points)
times = st.floats(0, 1)


@given(cubics, times, times)
def test_the_parts_of_a_cut_curve_lie_on_it(cubic: Cubic, time: float, later: float) -> None:
    """A point of the first part at time s is one of the curve at s t, and so for the second."""
    before, after = cubic.split(time)
    assert before.end == after.start
    assert math.dist(before.point_at(later), cubic.point_at(later * time)) < 1e-6
    assert math.dist(after.point_at(later), cubic.point_at(time + later * (1 - time))) < 1e-6


@given(cubics, times)
def test_a_curve_backwards_has_the_same_points(cubic: Cubic, time: float) -> None:
    """At the same distance from the other end, and twice backwards is forwards."""
    assert math.dist(cubic.backwards().point_at(1 - time), cubic.point_at(time)) < 1e-6
    assert cubic.backwards().backwards() == cubic


@given(points, points, times)
def test_lengths_of_segments_are_distances(start: tuple, end: tuple, part: float) -> None:
    """Of a straight curve the time after some length is that part of its whole length."""
    length = math.dist(start, end)
    if length > 1e-3:
        time = straight(start, end).time_of_length(part * length)
        assert abs(time - part) < 1e-6
    assert straight(start, end).time_of_length(2 * length + 1) == 1


@given(points, st.floats(1, 50), times)
def test_quarters_are_round(centre: tuple, radius: float, time: float) -> None:
    """A quarter of a circle keeps to its radius by three in ten thousand."""
    x, y = centre
    arc = quarter((x + radius, y), (x + radius, y + radius), (x, y + radius))
    assert abs(math.dist(arc.point_at(time), centre) - radius) < 3e-4 * radius
