"""Whether segments and triangles in space meet: closed sets, exact answers."""

# ruff: noqa: PLR0913, PLR0917 - loose arguments, since compiled loops take no objects of ours

from braidsearch.compiling import compiled
from braidsearch.diagrams.polygons.edges import Numbers
from braidsearch.diagrams.polygons.exact_signs import facing_axis, side, turn


@compiled
def is_between(points: Numbers, a: int, b: int, c: int) -> bool:
    """Whether b, collinear with a and c, lies on the closed segment from a to c."""
    for k in range(3):
        first, value, second = points[3 * a + k], points[3 * b + k], points[3 * c + k]
        if value < min(first, second) or value > max(first, second):
            return False
    return True


@compiled
def flat_segments_meet(
    points: Numbers, origin: int, axis: int, a: int, b: int, p: int, q: int
) -> bool:
    """Whether a b and p q meet, all in one plane that ``axis`` does not lie in."""
    first, second = turn(points, origin, axis, a, b, p), turn(points, origin, axis, a, b, q)
    if first * second > 0:
        return False
    third, fourth = turn(points, origin, axis, p, q, a), turn(points, origin, axis, p, q, b)
    if third * fourth > 0:
        return False
    if first == 0 and second == 0 and third == 0 and fourth == 0:
        return (
            is_between(points, a, p, b)
            or is_between(points, a, q, b)
            or is_between(points, p, a, q)
        )
    return True


@compiled
def segments_meet(points: Numbers, origin: int, a: int, b: int, p: int, q: int) -> bool:
    """Whether the closed segments a b and p q have a point in common."""
    if side(points, a, b, p, q) != 0:
        return False
    axis = facing_axis(points, origin, a, b, p)
    if axis < 0:
        axis = facing_axis(points, origin, a, b, q)
    if axis < 0:  # all on one line, which some coordinate plane shows as a line
        axis = origin + 1
    return flat_segments_meet(points, origin, axis, a, b, p, q)


@compiled
def flat_triangle_holds(
    points: Numbers, origin: int, axis: int, a: int, b: int, c: int, p: int
) -> bool:
    """Whether p, in the plane of the triangle, lies in it or on its boundary."""
    around = turn(points, origin, axis, a, b, c)
    return (
        around * turn(points, origin, axis, a, b, p) >= 0
        and around * turn(points, origin, axis, b, c, p) >= 0
        and around * turn(points, origin, axis, c, a, p) >= 0
    )


@compiled
def segment_meets_triangle(
    points: Numbers, origin: int, a: int, b: int, c: int, p: int, q: int
) -> bool:
    """Whether the segment p q meets the closed triangle a b c, which is not degenerate."""
    first, second = side(points, a, b, c, p), side(points, a, b, c, q)
    if first * second > 0:
        return False
    if first == 0 and second == 0:
        axis = facing_axis(points, origin, a, b, c)
        return (
            flat_triangle_holds(points, origin, axis, a, b, c, p)
            or flat_segments_meet(points, origin, axis, a, b, p, q)
            or flat_segments_meet(points, origin, axis, b, c, p, q)
            or flat_segments_meet(points, origin, axis, c, a, p, q)
        )
    # The line through p and q leaves the plane, and meets it in the triangle when the three
    # sides are passed the same way round.
    along = side(points, p, q, a, b)
    past = side(points, p, q, b, c)
    if along * past < 0:
        return False
    last = side(points, p, q, c, a)
    return along * last >= 0 and past * last >= 0


@compiled
def leads_into_corner(points: Numbers, origin: int, a: int, b: int, c: int, z: int) -> bool:
    """Whether the segment from the corner a to z meets the triangle a b c elsewhere too."""
    if side(points, a, b, c, z) != 0:
        return False
    axis = facing_axis(points, origin, a, b, c)
    around = turn(points, origin, axis, a, b, c)
    return (
        around * turn(points, origin, axis, a, b, z) >= 0
        and around * turn(points, origin, axis, a, z, c) >= 0
    )
