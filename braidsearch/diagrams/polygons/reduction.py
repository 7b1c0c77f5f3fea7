"""Triangle moves on polygons in space, and whether polygons meet themselves or each other."""

from braidsearch.compiling import compiled
from braidsearch.diagrams.polygons.box_tree import (
    ask_for_edge,
    edge_after,
    next_edge,
    update_edge,
)
from braidsearch.diagrams.polygons.edges import EXTRA_POINTS, Edges
from braidsearch.diagrams.polygons.exact_signs import facing_axis
from braidsearch.diagrams.polygons.meetings import (
    is_between,
    leads_into_corner,
    segment_meets_triangle,
    segments_meet,
)


@compiled
def folds_back(edges: Edges, a: int, b: int, c: int) -> bool:
    """Whether the edges a b and b c, neighbours at b, have more than b in common."""
    origin = len(edges.points) // 3 - EXTRA_POINTS
    return facing_axis(edges.points, origin, a, b, c) < 0 and not is_between(edges.points, a, b, c)


@compiled
def meets_wrongly(edges: Edges, first: int, second: int) -> bool:
    """Whether two different edges meet elsewhere than in the end that neighbours share."""
    first_end, second_end = edges.follows[first], edges.follows[second]
    if first_end == second:
        return folds_back(edges, first, second, second_end)
    if second_end == first:
        return folds_back(edges, second, first, first_end)
    origin = len(edges.points) // 3 - EXTRA_POINTS
    return segments_meet(edges.points, origin, first, first_end, second, second_end)


@compiled
def first_meeting(edges: Edges) -> tuple[int, int]:
    """Two edges that meet where they must not, or (-1, -1) where no polygon meets any."""
    for edge in range(len(edges.follows)):
        if edges.follows[edge] < 0:
            continue
        ask_for_edge(edges, edge)
        other = next_edge(edges, 1)
        while other >= 0:
            if other > edge and meets_wrongly(edges, edge, other):
                return edge, other
            other = edge_after(edges, other)
    return -1, -1


@compiled
def ask_for_triangle(edges: Edges, a: int, b: int, c: int) -> None:
    """Make the box of a triangle the box asked for."""
    for k in range(3):
        x, y, z = edges.points[3 * a + k], edges.points[3 * b + k], edges.points[3 * c + k]
        edges.query_low[k] = min(x, y, z)
        edges.query_high[k] = max(x, y, z)


@compiled
def pierces(edges: Edges, a: int, b: int, c: int, edge: int) -> bool:
    """Whether an edge meets the triangle of three neighbours where it must not.

    It must not meet it at all, but in a or c where it ends there; the edges from a to b, from b
    to c and, in a polygon of three vertices, from c to a are the triangle's own.
    """
    end = edges.follows[edge]
    if edge in (a, b) or (edge == c and end == a):
        return False
    origin = len(edges.points) // 3 - EXTRA_POINTS
    if end == a:
        return leads_into_corner(edges.points, origin, a, b, c, edge)
    if edge == c:
        return leads_into_corner(edges.points, origin, c, b, a, end)
    return segment_meets_triangle(edges.points, origin, a, b, c, edge, end)


@compiled
def is_triangle_free(edges: Edges, b: int) -> bool:
    """Whether no edge pierces the triangle of b and its neighbours.

    Where b lies on the segment between its neighbours there is nothing to pierce.
    """
    a, c = edges.precedes[b], edges.follows[b]
    if facing_axis(edges.points, len(edges.points) // 3 - EXTRA_POINTS, a, b, c) < 0:
        return True
    ask_for_triangle(edges, a, b, c)
    edge = next_edge(edges, 1)
    while edge >= 0:
        if pierces(edges, a, b, c, edge):
            return False
        edge = edge_after(edges, edge)
    return True


@compiled
def remove_vertex(edges: Edges, b: int) -> None:
    """Join the neighbours of b by an edge; in a polygon of three vertices, remove all three.

    The size of that polygon becomes -1 - b: its vertices are still b, the one that precedes b,
    and the one that precedes that.
    """
    a, c = edges.precedes[b], edges.follows[b]
    if edges.sizes[edges.polygon[b]] == 3:
        edges.sizes[edges.polygon[b]] = -1 - b
        edges.follows[a] = edges.follows[b] = edges.follows[c] = -1
        update_edge(edges, c)
    else:
        edges.sizes[edges.polygon[b]] -= 1
        edges.follows[a], edges.precedes[c] = c, a
        edges.follows[b] = -1
    update_edge(edges, a)
    update_edge(edges, b)


@compiled
def remove_vertices(edges: Edges) -> int:
    """Go once round all polygons and remove vertices whose triangles are free; how many.

    The move is Reidemeister's (Knotentheorie, 1932): the two edges are pulled straight through
    their triangle. The vertex after a removed one waits for the next round, so that no edge grows
    long before the others. A polygon of three vertices that spans a free triangle is an unknot,
    split from all the rest; it disappears.
    """
    removed, waits = 0, -1
    for b in range(len(edges.follows)):
        if edges.follows[b] < 0:
            continue
        if b == waits:
            waits = -1
        elif is_triangle_free(edges, b):
            waits = edges.follows[b]
            remove_vertex(edges, b)
            removed += 1
    return removed


@compiled
def remove_all_vertices(edges: Edges) -> None:
    """Go round until no triangle is free."""
    while remove_vertices(edges) > 0:
        pass
