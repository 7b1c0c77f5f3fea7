"""Directions that show too little are noticed, and crossings that nearly coincide are ordered."""

import numpy as np
import pytest

from braidsearch.diagrams.polygons import passages, polygon_diagram, projection
from braidsearch.diagrams.polygons.arrays import check_polygons
from braidsearch.diagrams.polygons.edges import work_arrays
from braidsearch.diagrams.polygons.loops import load_loops

DOWN = (0, 0, 1)
FRAME = [[9, 0, 0], [9, 9, 1], [0, 9, 2]]  # closes a polygon far from what a case looks at


def edges_of(*polygons):
    _, edges = work_arrays(check_polygons(polygons))
    load_loops().build_tree(edges)
    assert load_loops().first_meeting(edges) == (-1, -1)
    return edges


def crossings_seen(direction, *polygons):
    """The number of crossings along a direction; None where the position is not general."""
    pairs = projection._crossing_pairs(edges_of(*polygons), direction, 100)
    return None if pairs is None else len(pairs)


@pytest.mark.parametrize(
    "polygons",
    [
        [[[0, 0, 0], [0, 0, 1], *FRAME]],  # an edge seen as a point
        [[[0, 0, 0], [4, 0, 0], [4, 4, 5], [2, 0, 5], [0, 4, 0]]],  # a vertex on an edge
        [[[0, 0, 0], [4, 0, 0], [4, 4, 5], [0, 0, 5], [-3, 4, 0]]],  # a vertex on a vertex
        [[[0, 0, 0], [4, 0, 0], [2, 0, 3], [0, 4, 0]]],  # folded back
        [[[0, 0, 0], [4, 0, 0], [5, 1, 0], [3, 0, 3], [1, 0, 3], [0, 4, 0]]],  # along an edge
        [[[0, 0, 0], [4, 0, 0], [0, 4, 0]], [[1, 0, 3], [3, 0, 3], [2, 5, 3]]],  # of two polygons
        [[[0, 0, 0], [4, 0, 0], [0, 4, 0]], [[0, 0, 3], [4, 0, 3], [0, 4, 3]]],  # all of them
        [[[0, 0, 0], [4, 0, 1], [8, 0, 0]]],  # a polygon seen as a segment
    ],
)
def test_positions_that_are_not_general(polygons):
    """Seen from above these show no diagram; seen along any seeded direction they do."""
    assert crossings_seen(DOWN, *polygons) is None
    diagram = polygon_diagram(polygons, is_simplified=False)
    assert diagram.component_count == len(polygons)
    tilted = [
        np.array(polygon) @ np.array([[1, 0, 0], [0, 1, 0], [3, 7, 1]]) for polygon in polygons
    ]
    assert crossings_seen((3, 7, 1), *tilted) is None


@pytest.mark.parametrize(
    ("polygons", "count"),
    [
        ([[[0, 0, 0], [2, 0, 0], [4, 0, 0], [4, 4, 0]]], 0),  # straight on
        ([[[0, 0, 0], [2, 0, 1], [4, 0, 0], [4, 4, 0]]], 0),  # straight on, as it is seen
        ([[[0, 0, 0], [1, 0, 0], [2, 2, 0], [3, 0, 0], [4, 0, 0], [2, 5, 0]]], 0),  # in line, apart
        ([[[0, 0, 0], [4, 4, 0], [4, 0, 1], [0, 4, 1]]], 1),
        ([[[0, 0, 0], [4, 0, 0], [0, 4, 0]], [[1, 1, 3], [5, 1, 3], [1, 5, 3]]], 2),
    ],
)
def test_positions_that_are_general(polygons, count):
    """Straight bends and edges in one line but apart hide nothing."""
    assert crossings_seen(DOWN, *polygons) == count


def test_one_unit_in_the_last_place_is_general():
    """A vertex beside an edge by the least possible counts as beside it, on either side."""
    beside = 2.0**-52
    tops = {}
    for shift in (-beside, 0.0, beside):
        polygon = [[-1, 1, 0], [3, 1, 0], [3, -5, 0], [1, -5, 1], [1, 1 + shift, 1], [0, -5, 1]]
        tops[shift] = crossings_seen(DOWN, polygon)
    assert tops == {-beside: 0, 0.0: None, beside: 2}


def three_rods(shift):
    """Three long triangles whose first edges are seen to cross near one point."""
    rods = [[[-4, 0, 0], [4, 0, 0], [0, -9, -9]]]
    rods += [
        [[0, -4, 1], [0, 4, 1], [9, 0.25, -9]],
        [[-4 + shift, -4, 2], [4 + shift, 4, 2], [9, -2, 9]],
    ]
    return rods


def order_seen(shift):
    edges = edges_of(*three_rods(shift))
    pairs = projection._crossing_pairs(edges, DOWN, 100)
    tops = np.zeros(len(pairs), np.int64)
    seen = projection.Projection(DOWN, pairs, tops, tops)
    found = passages.passages_in_order(edges, seen)
    if found is None:
        return None
    others = pairs[:, ::-1].ravel()
    return [int(others[p]) for owner, p in zip(*found, strict=True) if owner == 0]


def test_triple_points_are_noticed():
    """Crossings in one point have no order; a shift below what doubles resolve has one."""
    assert order_seen(0.0) is None
    left, right = order_seen(-0.5), order_seen(0.5)
    assert left == right[::-1]
    tiny = 2.0**-51
    assert order_seen(-tiny) == left
    assert order_seen(tiny) == right


def test_nearly_equal_places_are_ordered_by_fractions(monkeypatch):
    """Two rings one unit in the last place apart: the diagram is planar from every side."""
    asked = []
    exact_place = passages._exact_place
    monkeypatch.setattr(
        passages, "_exact_place", lambda *given: asked.append(given) or exact_place(*given)
    )
    ring = np.array([[1.0, -1, 0], [1, 1, 0], [-1, 1, 0.25], [-1, -1, 0.5]])
    first = np.array([[0.5, 0.125, -1], [0.5, 0.25, 1], [3, 0.5, 0.75]])
    second = first + np.array([2.0**-52, 0, 0])
    second[2] = [3, 0.5, 3]
    for seed in range(10):
        diagram = polygon_diagram([ring, first, second], seed, is_simplified=False, directions=1)
        assert diagram.component_count == 3
    assert asked
