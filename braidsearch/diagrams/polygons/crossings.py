"""The crossings that polygons show when they are projected along a direction."""

from braidsearch.compiling import compiled
from braidsearch.diagrams.polygons.box_tree import ask_for_edge, edge_after, next_edge
from braidsearch.diagrams.polygons.edges import AXES, DIRECTION, EXTRA_POINTS, Edges, Numbers
from braidsearch.diagrams.polygons.exact_signs import determinant_sign

NOT_GENERAL = -1


@compiled
def image_order(points: Numbers, axis: int, p: int, q: int) -> int:
    """The sign of the difference q - p of the images, measured across ``axis``."""
    origin = len(points) // 3 - EXTRA_POINTS
    return determinant_sign(points, axis, origin, q, p, origin + DIRECTION, origin)


@compiled
def measuring_axis(points: Numbers, p: int, q: int) -> int:
    """A unit vector across which the images of p and q differ; -1 where they are the same."""
    origin = len(points) // 3 - EXTRA_POINTS
    for axis in range(origin + AXES, origin + AXES + 3):
        if image_order(points, axis, p, q) != 0:
            return axis
    return -1


@compiled
def is_bend_general(points: Numbers, a: int, b: int, c: int) -> bool:
    """Whether the images of the neighbouring edges a b and b c meet in b alone."""
    origin = len(points) // 3 - EXTRA_POINTS
    if determinant_sign(points, b, a, c, b, origin + DIRECTION, origin) != 0:
        return True
    axis = measuring_axis(points, a, b)
    return axis >= 0 and image_order(points, axis, a, b) == image_order(points, axis, b, c)


@compiled
def lie_apart_in_line(points: Numbers, a: int, b: int, p: int, q: int) -> bool:
    """Whether the images of a b and p q, all on one line, have no point in common."""
    axis = measuring_axis(points, a, b)
    if axis < 0:
        return False
    forwards = image_order(points, axis, a, b)
    is_before = (
        image_order(points, axis, a, p) == -forwards
        and image_order(points, axis, a, q) == -forwards
    )
    is_behind = (
        image_order(points, axis, b, p) == forwards and image_order(points, axis, b, q) == forwards
    )
    return is_before or is_behind


@compiled
def count_image_crossings(points: Numbers, a: int, b: int, p: int, q: int) -> int:
    """1 where the images of a b and p q cross, 0 where they are apart, NOT_GENERAL else."""
    origin = len(points) // 3 - EXTRA_POINTS
    along = origin + DIRECTION
    first = determinant_sign(points, b, a, p, a, along, origin)
    second = determinant_sign(points, b, a, q, a, along, origin)
    if first * second > 0:
        return 0
    third = determinant_sign(points, q, p, a, p, along, origin)
    fourth = determinant_sign(points, q, p, b, p, along, origin)
    if third * fourth > 0:
        return 0
    if first != 0 and second != 0 and third != 0 and fourth != 0:
        return 1
    if first == 0 and second == 0 and third == 0 and fourth == 0:
        return 0 if lie_apart_in_line(points, a, b, p, q) else NOT_GENERAL
    return NOT_GENERAL


@compiled
def examine_pair(edges: Edges, first: int, second: int) -> int:
    """As ``count_image_crossings``, for two edges that may be neighbours."""
    first_end, second_end = edges.follows[first], edges.follows[second]
    if first_end == second:
        return 0 if is_bend_general(edges.points, first, second, second_end) else NOT_GENERAL
    if second_end == first:
        return 0 if is_bend_general(edges.points, second, first, first_end) else NOT_GENERAL
    return count_image_crossings(edges.points, first, first_end, second, second_end)


@compiled
def find_crossings(edges: Edges, plane: Edges, pairs: Numbers) -> int:
    """Write the pairs of edges whose images cross into ``pairs``; how many there are.

    ``plane`` has a tree over the images, with boxes wide enough for any rounding. NOT_GENERAL is
    returned where an image meets another in other ways; one more than there is room for, where
    the pairs are more.
    """
    room, count = len(pairs) // 2, 0
    for first in range(len(edges.follows)):
        if edges.follows[first] < 0:
            continue
        ask_for_edge(plane, first)
        second = next_edge(plane, 1)
        while second >= 0:
            if second > first:
                found = examine_pair(edges, first, second)
                if found == NOT_GENERAL:
                    return NOT_GENERAL
                if found:
                    if count == room:
                        return room + 1
                    pairs[2 * count], pairs[2 * count + 1] = first, second
                    count += 1
            second = edge_after(plane, second)
    return count


@compiled
def find_heights(edges: Edges, pairs: Numbers, signs: Numbers, tops: Numbers) -> None:
    """For each crossing its sign, and 1 where the first edge of the pair is on top, else 0.

    With edges u = b - a and w = d - c the point of the first lies above that of the second, seen
    against the direction e, by det(u, w, a - c) / det(u, w, e). The over-strand turned to the
    left by less than a half turn meets the under-strand at a positive crossing, so its sign is
    that of det(u, w, a - c), whichever is on top.
    """
    origin = len(edges.points) // 3 - EXTRA_POINTS
    for i in range(len(signs)):
        a, c = pairs[2 * i], pairs[2 * i + 1]
        b, d = edges.follows[a], edges.follows[c]
        signs[i] = determinant_sign(edges.points, b, a, d, c, a, c)
        facing = determinant_sign(edges.points, b, a, d, c, origin + DIRECTION, origin)
        tops[i] = 1 if signs[i] == facing else 0
