"""Signs of determinants and meetings of segments and triangles, against fractions."""

from fractions import Fraction

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.diagrams.polygons.exact_signs import determinant_sign, exact_sign
from braidsearch.diagrams.polygons.meetings import segment_meets_triangle, segments_meet
from tests.diagrams.polygons.meeting_oracle import is_meeting_by_fractions

EXTRA = [0.0, 0.0, 0.0, 1.0, 0.0, 0.0, 0.0, 1.0, 0.0, 0.0, 0.0, 1.0, 0.0, 0.0, 0.0]

lattice = st.integers(-3, 3).map(lambda n: n / 8)
tiny = st.sampled_from([0.0, 2.0**-52, -(2.0**-53), 2.0**-100, -1e-60])
near_lattice = st.builds(lambda x, y: x * (1 - 2.0**-40) + y, lattice, tiny)
anywhere = st.floats(-1, 1, allow_subnormal=False).map(lambda x: float(np.float32(x)))
decimals = st.integers(-99, 99).map(lambda n: n / 100)
coordinates = st.one_of(lattice, near_lattice, decimals, anywhere.filter(lambda x: abs(x) > 1e-30))


def row(points, p, q):
    return [Fraction(points[3 * p + k]) - Fraction(points[3 * q + k]) for k in range(3)]


def determinant(u, v, w):
    return sum(
        u[i] * (v[(i + 1) % 3] * w[(i + 2) % 3] - v[(i + 2) % 3] * w[(i + 1) % 3]) for i in range(3)
    )


def sign(value):
    return (value > 0) - (value < 0)


@settings(max_examples=400)
@given(
    points=st.lists(coordinates, min_size=12, max_size=12),
    rows=st.lists(st.integers(0, 3), min_size=6, max_size=6),
)
def test_signs(points, rows):
    """Filtered and unfiltered sign are that of the determinant computed with fractions."""
    expected = sign(determinant(*(row(points, *rows[i : i + 2]) for i in (0, 2, 4))))
    array = np.array(points)
    assert determinant_sign(array, *rows) == expected
    assert exact_sign(array, tuple(rows)) == expected


@settings(max_examples=200)
@given(
    points=st.lists(coordinates, min_size=9, max_size=9),
    weights=st.tuples(st.floats(-1, 2), st.floats(-1, 2)),
)
def test_signs_of_nearly_coplanar_points(points, weights):
    """The same for a point rounded from the plane of three others, where doubles go astray."""
    s, t = weights
    rounded = [
        float(np.clip(a + s * (b - a) + t * (c - a), -1, 1)) if abs(a) + abs(s) > 1e-60 else a
        for a, b, c in zip(points[:3], points[3:6], points[6:], strict=True)
    ]
    points = [*points, *(x if abs(x) > 1e-60 else 0.0 for x in rounded)]
    expected = sign(determinant(row(points, 1, 0), row(points, 2, 0), row(points, 3, 0)))
    assert determinant_sign(np.array(points), 1, 0, 2, 0, 3, 0) == expected


def test_a_double_determinant_would_be_wrong():
    """The filter is needed: the plain formula says 0 or worse where the truth is not 0."""
    rng = np.random.default_rng(5)
    wrong = 0
    for _ in range(200):
        a, b, c = rng.uniform(-1, 1, size=(3, 3))
        points = np.concatenate([a, b, c, (a + b) / 2 + (c - a) / 4])
        exact = determinant_sign(points, 1, 0, 2, 0, 3, 0)
        plain = np.linalg.det(np.array([b - a, c - a, points[9:] - a]))
        wrong += exact != np.sign(plain)
    assert wrong > 10


def solved(u, v, w, target):
    """Coefficients x, y, z with x u + y v + z w = target, by Cramer's rule; None if singular."""
    lower = determinant(u, v, w)
    if lower == 0:
        return None
    return (
        determinant(target, v, w) / lower,
        determinant(u, target, w) / lower,
        determinant(u, v, target) / lower,
    )


def meets_by_solving(points, triangle, segment):
    """Whether segment and triangle meet, for a segment not parallel to the triangle."""
    a, b, c = triangle
    p, q = segment
    found = solved(row(points, b, a), row(points, c, a), row(points, p, q), row(points, p, a))
    if found is None:
        return None
    x, y, t = found
    return x >= 0 and y >= 0 and x + y <= 1 and 0 <= t <= 1


@settings(max_examples=400)
@given(points=st.lists(coordinates, min_size=15, max_size=15))
def test_segments_and_triangles(points):
    """The closed sets meet exactly when the linear equations have a solution in range."""
    expected = meets_by_solving(points, (0, 1, 2), (3, 4))
    if expected is not None:
        array = np.array(points + EXTRA)
        assert segment_meets_triangle(array, 5, 0, 1, 2, 3, 4) == expected


@settings(max_examples=200)
@given(
    corners=st.lists(st.tuples(st.integers(0, 4), st.integers(0, 4)), min_size=5, max_size=5),
    plane=st.sampled_from([(0, 0), (1, 0), (2, 1), (-1, 3)]),
)
def test_segments_in_the_plane_of_a_triangle(corners, plane):
    """Coplanar ones, tilted: they meet when the segment has a point in the triangle, by halves."""
    points = [x for u, v in corners for x in (u / 8, v / 8, (plane[0] * u + plane[1] * v) / 64)]
    (ax, ay), (bx, by), (cx, cy) = corners[:3]
    if (bx - ax) * (cy - ay) == (by - ay) * (cx - ax):
        return
    array = np.array(points + EXTRA)
    expected = _flat_meeting(corners)
    assert segment_meets_triangle(array, 5, 0, 1, 2, 3, 4) == expected


def _flat_meeting(corners):
    """Clip the segment by the triangle's three half planes; is anything left?"""
    (ax, ay), (bx, by), (cx, cy), p, q = corners
    low, high = Fraction(0), Fraction(1)
    around = sign((bx - ax) * (cy - ay) - (by - ay) * (cx - ax))
    for (x, y), (u, v) in (((ax, ay), (bx, by)), ((bx, by), (cx, cy)), ((cx, cy), (ax, ay))):
        start = around * ((u - x) * (p[1] - y) - (v - y) * (p[0] - x))
        end = around * ((u - x) * (q[1] - y) - (v - y) * (q[0] - x))
        if start < 0 and end < 0:
            return False
        if start < 0 <= end:
            low = max(low, Fraction(start, start - end))
        elif end < 0 <= start:
            high = min(high, Fraction(start, start - end))
    return low <= high


@settings(max_examples=300)
@given(points=st.lists(st.integers(0, 2), min_size=12, max_size=12))
def test_segments_meet(points):
    """Two segments meet exactly when their least distance, found with fractions, is 0."""
    points = [n / 4 for n in points]
    ends = [tuple(Fraction(x) for x in points[3 * i : 3 * i + 3]) for i in range(4)]
    if ends[0] == ends[1] or ends[2] == ends[3]:
        return
    array = np.array(points + EXTRA)
    assert segments_meet(array, 4, 0, 1, 2, 3) == is_meeting_by_fractions(*ends)


@pytest.mark.parametrize("scale", [1.0, 2.0**-300])
def test_small_differences_are_not_lost(scale):
    """Coordinates of 300 binary digits below 1 still have their exact sign."""
    points = np.array([0, 0, 0, 1, 0, 0, 0, 1, 0, 0, 0, scale], dtype=float)
    assert determinant_sign(points, 1, 0, 2, 0, 3, 0) == 1
    points[9:] = [0.5, 0.5, -scale]
    assert determinant_sign(points, 1, 0, 2, 0, 3, 0) == -1
