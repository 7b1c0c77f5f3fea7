"""The order in which a projected polygon passes its crossings."""

from __future__ import annotations

from fractions import Fraction

import numpy as np
from numpy.typing import NDArray

from braidsearch.diagrams.polygons.edges import Edges
from braidsearch.diagrams.polygons.projection import Projection

_ROUNDING = 2.0**-49
Reals = NDArray[np.float64]
Integers = NDArray[np.int64]


def passages_in_order(edges: Edges, projection: Projection) -> tuple[Integers, Integers] | None:
    """The 2 c passages of crossings, sorted by edge and along each edge.

    Returns the edges and the passages; passage p belongs to crossing p // 2 and to the edge at
    place p % 2 of its pair. None where two crossings lie in one point of an edge. On edge a b the
    crossing with c d lies at det(c - a, d - c, e) / det(b - a, d - c, e), which rounding shifts by
    no more than a bound; where that leaves the order open, fractions decide.
    """
    owners = projection.pairs.ravel()
    others = projection.pairs[:, ::-1].ravel()
    places, errors = _approximate_places(edges, projection.direction, owners, others)
    order = np.lexsort((places, owners))
    sorted_owners = owners[order]
    gaps = np.diff(places[order])
    open_gaps = gaps <= errors[order][1:] + errors[order][:-1]
    unsure = open_gaps & (sorted_owners[1:] == sorted_owners[:-1])
    for owner in np.unique(sorted_owners[1:][unsure]):
        span = np.flatnonzero(sorted_owners == owner)
        exact = [(_exact_place(edges, projection, p), int(p)) for p in order[span]]
        if len({place for place, _ in exact}) < len(exact):
            return None
        order[span] = [p for _, p in sorted(exact)]
    return sorted_owners, order


def _approximate_places(
    edges: Edges, direction: tuple[int, int, int], owners: Integers, others: Integers
) -> tuple[Reals, Reals]:
    """Where on its edge each passage lies, from 0 to 1, and by how much rounding may shift it."""
    points, along = edges.points.reshape(-1, 3), np.array(direction, dtype=np.float64)
    start, other_start = points[owners], points[others]
    along_edge, across = points[edges.follows[owners]] - start, points[edges.follows[others]]
    across = across - other_start
    upper, upper_error = _determinants(other_start - start, across, along)
    lower, lower_error = _determinants(along_edge, across, along)
    room = np.abs(lower) - lower_error
    with np.errstate(divide="ignore", invalid="ignore"):
        places = upper / lower
        errors = (upper_error + np.abs(places) * lower_error) / room + _ROUNDING * np.abs(places)
    unsure = ~(room > 0) | ~np.isfinite(places) | ~np.isfinite(errors)
    return np.where(unsure, 0.5, places), np.where(unsure, np.inf, errors)


def _determinants(first: Reals, second: Reals, along: Reals) -> tuple[Reals, Reals]:
    """det(first, second, along) row by row, and a bound of its error as in ``exact_signs``."""
    u, v, w = first.T
    x, y, z = second.T
    e, f, g = along
    value = e * (v * z - w * y) + f * (w * x - u * z) + g * (u * y - v * x)
    size = abs(e) * (abs(v * z) + abs(w * y)) + abs(f) * (abs(w * x) + abs(u * z))
    size = size + abs(g) * (abs(u * y) + abs(v * x))
    return value, _ROUNDING * size


def _exact_place(edges: Edges, projection: Projection, passage: int) -> Fraction:
    pair = projection.pairs[passage // 2]
    a, c = pair[passage % 2], pair[1 - passage % 2]
    start, end = _exact_point(edges, a), _exact_point(edges, edges.follows[a])
    other_start, other_end = _exact_point(edges, c), _exact_point(edges, edges.follows[c])
    across = _difference(other_end, other_start)
    upper = _exact_determinant(_difference(other_start, start), across, projection.direction)
    return upper / _exact_determinant(_difference(end, start), across, projection.direction)


def _exact_point(edges: Edges, vertex: int) -> list[Fraction]:
    return [Fraction(float(value)) for value in edges.points[3 * vertex : 3 * vertex + 3]]


def _difference(left: list[Fraction], right: list[Fraction]) -> list[Fraction]:
    return [x - y for x, y in zip(left, right, strict=True)]


def _exact_determinant(
    first: list[Fraction], second: list[Fraction], along: tuple[int, int, int]
) -> Fraction:
    (u, v, w), (x, y, z), (e, f, g) = first, second, along
    return e * (v * z - w * y) + f * (w * x - u * z) + g * (u * y - v * x)
