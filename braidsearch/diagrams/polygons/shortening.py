"""Vertices that cannot be removed are moved, which frees others: random moves that shorten.

``state`` holds the state of the random numbers and the number of edges looked at so far.
"""

from math import sqrt

from braidsearch.compiling import compiled
from braidsearch.diagrams.polygons.box_tree import edge_after, next_edge, update_edge
from braidsearch.diagrams.polygons.edges import EXTRA_POINTS, SPARE, Edges, Numbers
from braidsearch.diagrams.polygons.exact_signs import facing_axis
from braidsearch.diagrams.polygons.meetings import leads_into_corner, segment_meets_triangle
from braidsearch.diagrams.polygons.reduction import (
    ask_for_triangle,
    is_triangle_free,
    remove_vertex,
)

RANDOM, EXAMINED = 0, 1


@compiled
def pierces_beside(edges: Edges, a: int, b: int, apex: int, edge: int) -> bool:
    """Whether an edge meets the triangle of the edge a b and a new point, but where it may.

    It may where it is a b itself, and in a or b where it ends there.
    """
    origin = len(edges.points) // 3 - EXTRA_POINTS
    end = edges.follows[edge]
    if edge == a:
        return False
    if end == a:
        return leads_into_corner(edges.points, origin, a, b, apex, edge)
    if edge == b:
        return leads_into_corner(edges.points, origin, b, a, apex, end)
    return segment_meets_triangle(edges.points, origin, a, b, apex, edge, end)


@compiled
def pierces_behind(edges: Edges, a: int, b: int, apex: int, edge: int) -> bool:
    """The same for the triangle of b, the vertex c that follows it and the new point.

    The edge from a to b has already given way to those from a over the new point to b.
    """
    origin = len(edges.points) // 3 - EXTRA_POINTS
    c, end = edges.follows[b], edges.follows[edge]
    if edge in (a, b):
        return False
    if edge == c:
        return leads_into_corner(edges.points, origin, c, b, apex, end)
    return segment_meets_triangle(edges.points, origin, apex, b, c, edge, end)


@compiled
def next_random(state: Numbers) -> float:
    """The next number between 0 and 1 (Lehmer's generator modulo 2^31 - 1, 1951)."""
    state[RANDOM] = state[RANDOM] * 48271 % 2147483647
    return float(state[RANDOM]) / 2147483647.0


@compiled
def distance(edges: Edges, p: int, q: int) -> float:
    """The distance of two points, rounded."""
    total = 0.0
    for k in range(3):
        difference = edges.points[3 * q + k] - edges.points[3 * p + k]
        total += difference * difference
    return sqrt(total)


@compiled
def is_place_shorter(edges: Edges, b: int, state: Numbers) -> bool:
    """Put the spare point near b at random; whether the way over it is shorter than over b.

    A goal is drawn on the line between the neighbours of b, then somewhere in a cube around it,
    then a point on the way there. Coordinates are rounded to multiples of 2^-51, so that they
    stay short however often it is done.
    """
    spare = len(edges.points) // 3 - EXTRA_POINTS + SPARE
    a, c = edges.precedes[b], edges.follows[b]
    share, along, spread = next_random(state), next_random(state), next_random(state)
    spread *= min(distance(edges, a, b), distance(edges, b, c))
    for k in range(3):
        value, start = edges.points[3 * b + k], edges.points[3 * a + k]
        goal = start + along * (edges.points[3 * c + k] - start)
        goal += spread * (2.0 * next_random(state) - 1.0)
        place = ((value + share * (goal - value)) + 3.0) - 3.0
        if abs(place) > 1.0:
            return False
        edges.points[3 * spare + k] = place
    before = distance(edges, a, b) + distance(edges, b, c)
    return distance(edges, a, spare) + distance(edges, spare, c) < before


@compiled
def may_move(edges: Edges, b: int, state: Numbers) -> bool:
    """Whether b can move to the spare point by two triangle moves that nothing pierces.

    The first leads the edge from the vertex a before b over the spare point, the second takes b
    out. Of their own edges only a to the spare point can pierce the second triangle.
    """
    origin = len(edges.points) // 3 - EXTRA_POINTS
    a, c, spare = edges.precedes[b], edges.follows[b], origin + SPARE
    if facing_axis(edges.points, origin, a, b, spare) < 0:
        return False
    if facing_axis(edges.points, origin, spare, b, c) < 0:
        return False
    if leads_into_corner(edges.points, origin, spare, b, c, a):
        return False
    for is_second in range(2):
        ask_for_triangle(edges, c if is_second else a, b, spare)
        edge = next_edge(edges, 1)
        while edge >= 0:
            state[EXAMINED] += 1
            if is_second:
                if pierces_behind(edges, a, b, spare, edge):
                    return False
            elif pierces_beside(edges, a, b, spare, edge):
                return False
            edge = edge_after(edges, edge)
    return True


@compiled
def move_vertex(edges: Edges, b: int) -> None:
    """Move b to the spare point."""
    spare = len(edges.points) // 3 - EXTRA_POINTS + SPARE
    for k in range(3):
        edges.points[3 * b + k] = edges.points[3 * spare + k]
    update_edge(edges, edges.precedes[b])
    update_edge(edges, b)


@compiled
def shorten_once(edges: Edges, state: Numbers) -> int:
    """Go once round all polygons; remove vertices, move the others; how many were removed."""
    removed = 0
    for b in range(len(edges.follows)):
        if edges.follows[b] < 0:
            continue
        if is_triangle_free(edges, b):
            remove_vertex(edges, b)
            removed += 1
        elif (
            edges.sizes[edges.polygon[b]] > 3
            and is_place_shorter(edges, b, state)
            and may_move(edges, b, state)
        ):
            move_vertex(edges, b)
    return removed


@compiled
def shorten(edges: Edges, state: Numbers, patience: int, most_examined: int) -> None:
    """Go round until so many rounds remove nothing, or so many edges have been looked at."""
    idle = 0
    while idle < patience and state[EXAMINED] < most_examined:
        idle = 0 if shorten_once(edges, state) > 0 else idle + 1
