"""From polygons in space to a link diagram."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Any

import numpy as np

from braidsearch.diagrams.link_diagram import Crossing, LinkDiagram
from braidsearch.diagrams.polygons.arrays import Polygon, check_polygons
from braidsearch.diagrams.polygons.edges import Edges, work_arrays
from braidsearch.diagrams.polygons.loops import load_loops
from braidsearch.diagrams.polygons.passages import passages_in_order
from braidsearch.diagrams.polygons.projection import Projection, project_polygons
from braidsearch.errors import CapacityError, InputError

_MOST_SEEDS = 20
_MOVES, _LEAST_ROUNDS, _MOST_ROUNDS = 10_000, 5, 200
_MOST_EXAMINED = 20_000_000
_TRIANGLE = np.array([[0.0, 0.0, 0.0], [0.5, 0.0, 0.0], [0.0, 0.5, 0.0]])


def polygon_diagram(
    polygons: Iterable[Any], seed: int = 0, *, directions: int = 20, is_simplified: bool = True
) -> LinkDiagram:
    """The diagram of closed polygons in space: arrays of n x 3 coordinates, one a component.

    The polygons are simplified (see ``simplify_polygons``) unless ``is_simplified`` is False, and
    projected along ``directions`` seeded directions in general position; the fewest crossings
    are kept. Every decision is exact for the doubles given. The same seed gives the same diagram.

    Raises InputError for what is no polygon (see ``check_polygons``) and for polygons that meet
    themselves or each other, and CapacityError for too many crossings.
    """
    _, edges = embedded_edges(polygons)
    if is_simplified:
        _simplify(edges, seed, may_move=True)
    return _draw(edges, seed, max(1, directions))


def simplify_polygons(
    polygons: Iterable[Any], seed: int = 0, *, may_move: bool = True
) -> list[Polygon]:
    """The same link with fewer vertices, a component an array, in the order given.

    First every vertex is removed whose triangle with its neighbours no edge pierces (Koniaris,
    Muthukumar, Knottedness in ring polymers, 1991; the move is Reidemeister's, 1932). Then, unless
    ``may_move`` is False, vertices are moved at random where that shortens the polygon and the
    triangles swept are not pierced, and more can be removed; otherwise the vertices left are rows
    of the input, in order. A component that comes to span a triangle free of everything else is
    an unknot split from the rest: the others no longer see it, and it comes back as a triangle
    beside them.

    Raises InputError as ``polygon_diagram`` does.
    """
    power, edges = embedded_edges(polygons)
    _simplify(edges, seed, may_move)
    return [np.ldexp(polygon, power) for polygon in _polygons_left(edges)]


def _simplify(edges: Edges, seed: int, may_move: bool) -> None:
    loops = load_loops()
    loops.remove_all_vertices(edges)
    left = int((edges.follows >= 0).sum())
    if may_move and left:
        patience = min(max(_MOVES // left, _LEAST_ROUNDS), _MOST_ROUNDS)
        state = np.array([1 + seed % (2**31 - 2), 0])
        loops.shorten(edges, state, patience, _MOST_EXAMINED)


def embedded_edges(polygons: Iterable[Any]) -> tuple[int, Edges]:
    """As ``work_arrays``, for polygons that were found to meet neither themselves nor others."""
    power, edges = work_arrays(check_polygons(polygons))
    load_loops().build_tree(edges)
    first, second = load_loops().first_meeting(edges)
    if first >= 0:
        raise InputError(
            f"the edge from {_row(edges, first)} meets the one from {_row(edges, second)}: "
            "expected polygons that meet neither themselves nor each other"
        )
    return power, edges


def _row(edges: Edges, vertex: int) -> str:
    polygon = int(edges.polygon[vertex])
    row = vertex - int(np.searchsorted(edges.polygon, polygon)) + 1
    return f"row {row} of component {polygon + 1}"


def _polygons_left(edges: Edges) -> list[Polygon]:
    """The vertices of each polygon that are left; all but split unknots have sizes below 1."""
    points = edges.points.reshape(-1, 3)
    polygons = []
    for polygon, size in enumerate(edges.sizes.tolist()):
        if size > 0:
            alive = (edges.follows >= 0) & (edges.polygon == polygon)
            polygons.append(points[np.flatnonzero(alive)])
        elif len(edges.sizes) > 1:
            polygons.append(_TRIANGLE + np.array([2.0 + polygon, 0.0, 0.0]))
        else:
            last = -1 - size
            before = int(edges.precedes[last])
            polygons.append(points[sorted((last, before, int(edges.precedes[before])))])
    return polygons


def _draw(edges: Edges, seed: int, directions: int) -> LinkDiagram:
    for attempt in range(_MOST_SEEDS):
        projection = project_polygons(edges, seed + attempt * 1_000_003, directions)
        passages = passages_in_order(edges, projection)
        if passages is not None:
            return _diagram_of(edges, projection, passages[1].tolist())
    raise CapacityError("no direction tried shows all crossings in different points")


def _diagram_of(edges: Edges, projection: Projection, order: list[int]) -> LinkDiagram:
    """Number the arcs along the polygons and write every crossing counterclockwise."""
    enters, leaves = _arcs_at_passages(edges, projection, order)
    crossings = []
    for i, (sign, top) in enumerate(
        zip(projection.signs.tolist(), projection.tops.tolist(), strict=True)
    ):
        over, under = (2 * i, 2 * i + 1) if top else (2 * i + 1, 2 * i)
        if sign > 0:
            arcs = (enters[under], leaves[over], leaves[under], enters[over])
        else:
            arcs = (enters[under], enters[over], leaves[under], leaves[over])
        crossings.append(Crossing(arcs, sign))
    drawn = {int(edges.polygon[edge]) for edge in projection.pairs.ravel()}
    return LinkDiagram(tuple(crossings), len(edges.sizes) - len(drawn))


def _arcs_at_passages(
    edges: Edges, projection: Projection, order: list[int]
) -> tuple[list[int], list[int]]:
    """For each passage the arc by which it is entered, and the arc by which it is left.

    Vertices are numbered along the polygons, so the passages sorted by edge are those of the
    first polygon in order, then those of the next. Arc k leaves the k-th of them.
    """
    enters, leaves = [0] * len(order), [0] * len(order)
    polygons = edges.polygon[projection.pairs.ravel()[order]].tolist() if order else []
    start = 0
    for k, passage in enumerate(order):
        leaves[passage] = k
        is_last = k + 1 == len(order) or polygons[k + 1] != polygons[k]
        enters[order[start if is_last else k + 1]] = k
        start = k + 1 if is_last else start
    return enters, leaves
