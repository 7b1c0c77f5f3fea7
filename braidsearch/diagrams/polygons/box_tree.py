"""A binary tree of bounding boxes over the edges of polygons.

Edge i runs from vertex i to the vertex that follows it and is leaf ``leaves + i``; node k has the
children 2 k and 2 k + 1, and its box holds theirs. Neighbours along a curve are neighbours in
space, so the boxes are small, and an edge that changes costs one path to the root. Boxes are
least and largest coordinates, which no rounding touches; the box of a missing edge is empty.
"""

from math import inf

from braidsearch.compiling import compiled
from braidsearch.diagrams.polygons.edges import Edges


@compiled
def set_edge_box(edges: Edges, node: int, start: int, end: int) -> None:
    """Write the box of the segment from ``start`` to ``end`` into a leaf."""
    for k in range(3):
        first, second = edges.points[3 * start + k], edges.points[3 * end + k]
        edges.low[3 * node + k] = min(first, second)
        edges.high[3 * node + k] = max(first, second)


@compiled
def clear_box(edges: Edges, node: int) -> None:
    """Make the box of a leaf empty."""
    for k in range(3):
        edges.low[3 * node + k] = inf
        edges.high[3 * node + k] = -inf


@compiled
def join_boxes(edges: Edges, node: int) -> None:
    """Recompute the box of an inner node from its children."""
    for k in range(3):
        left, right = 6 * node + k, 6 * node + 3 + k
        edges.low[3 * node + k] = min(edges.low[left], edges.low[right])
        edges.high[3 * node + k] = max(edges.high[left], edges.high[right])


@compiled
def update_edge(edges: Edges, start: int) -> None:
    """Recompute the box of the edge that begins at a vertex, and those above it."""
    node = len(edges.low) // 6 + start
    if edges.follows[start] >= 0:
        set_edge_box(edges, node, start, edges.follows[start])
    else:
        clear_box(edges, node)
    node >>= 1
    while node > 0:
        join_boxes(edges, node)
        node >>= 1


@compiled
def build_tree(edges: Edges) -> None:
    """Fill the tree from the points and their order."""
    leaves = len(edges.low) // 6
    for i in range(leaves):
        if i < len(edges.follows) and edges.follows[i] >= 0:
            set_edge_box(edges, leaves + i, i, edges.follows[i])
        else:
            clear_box(edges, leaves + i)
    for node in range(leaves - 1, 0, -1):
        join_boxes(edges, node)


@compiled
def ask_for_edge(edges: Edges, start: int) -> None:
    """Make the box of an edge the box asked for."""
    node = len(edges.low) // 6 + start
    for k in range(3):
        edges.query_low[k] = edges.low[3 * node + k]
        edges.query_high[k] = edges.high[3 * node + k]


@compiled
def node_after(node: int) -> int:
    """The next node in preorder that is not below this one; 0 at the end."""
    while node & 1:
        node >>= 1
    return node + 1 if node else 0


@compiled
def is_met(edges: Edges, node: int) -> bool:
    """Whether the box of a node meets the box asked for."""
    for k in range(3):
        if edges.low[3 * node + k] > edges.query_high[k]:
            return False
        if edges.high[3 * node + k] < edges.query_low[k]:
            return False
    return True


@compiled
def next_edge(edges: Edges, node: int) -> int:
    """The first edge at or after ``node`` in preorder whose box meets the box asked for, or -1.

    Begin with node 1; go on behind edge i with ``node_after(leaves + i)``.
    """
    leaves = len(edges.low) // 6
    while node > 0:
        if not is_met(edges, node):
            node = node_after(node)
        elif node >= leaves:
            return node - leaves
        else:
            node = 2 * node
    return -1


@compiled
def edge_after(edges: Edges, edge: int) -> int:
    """The next edge behind ``edge`` whose box meets the box asked for, or -1."""
    return next_edge(edges, node_after(len(edges.low) // 6 + edge))
