"""Diagrams of polygons: the right knot, whatever the sampling, the frame or the direction."""

from math import gcd

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch import InputError, SearchLimits, compare
from braidsearch.diagrams.families import torus_link
from braidsearch.diagrams.polygons import polygon_diagram, simplify_polygons
from braidsearch.diagrams.vogel import braid_from_diagram
from braidsearch.invariants import (
    alexander_polynomial,
    jones_polynomial,
    link_determinant,
    pair_linking_numbers,
)
from braidsearch.words import Braid
from tests.diagrams.polygons.curves import (
    exact_determinant,
    gauss_linking_integral,
    lattice_walk,
    random_polygon,
    random_walk,
    torus_polygon,
)
from tests.diagrams.polygons.meeting_oracle import is_polygon_meeting_itself

TORUS_KNOTS = [(p, q) for p in range(2, 8) for q in range(2, 8) if gcd(p, q) == 1]


def closed_braid(polygons, **options):
    return braid_from_diagram(polygon_diagram(polygons, **options))


def shifted(polygon, x, y, z):
    return polygon + np.array([x, y, z])


def determinant(polygons, **options):
    return link_determinant(closed_braid(polygons, **options))


def linking_numbers(diagram):
    """For each pair of components of a diagram that cross, half the sum of the signs."""
    component = diagram.component_of_arc
    totals = {}
    for crossing in diagram.crossings:
        pair = frozenset(component[arc] for arc in crossing.arcs[:2])
        if len(pair) == 2:
            totals[pair] = totals.get(pair, 0) + crossing.sign
    return sorted(total // 2 for total in totals.values() if total)


@pytest.mark.parametrize(("p", "q"), TORUS_KNOTS)
@pytest.mark.parametrize("is_simplified", [True, False])
def test_torus_knots(p, q, is_simplified):
    """T(p, q) sampled at 20 points a crossing or so has the polynomials of the standard braid."""
    polygon = torus_polygon(p, q, 12 * (p + q) + 7)
    braid = closed_braid([polygon], is_simplified=is_simplified)
    standard = torus_link(p, q)
    assert alexander_polynomial(braid) == alexander_polynomial(standard)
    if braid.strands <= 8:
        assert jones_polynomial(braid) == jones_polynomial(standard)


@pytest.mark.parametrize(("p", "q"), [(2, 3), (3, 4), (5, 2), (3, 5), (-2, 5)])
def test_torus_knots_are_proven_same(p, q):
    """compare joins the knot of the coordinates to the standard braid."""
    braid = closed_braid([torus_polygon(p, q, 150)])
    verdict = compare(braid, torus_link(p, q), limits=SearchLimits(seconds=None, nodes=5000))
    assert verdict.outcome == "same"


@pytest.mark.parametrize("seed", range(6))
def test_determinants_in_another_projection(seed):
    """Random polygons of 50 vertices: the determinant counted by fractions, seen from elsewhere."""
    polygon = random_polygon(seed, 50)
    expected = exact_determinant(polygon, (0.3 + seed / 100, -0.2 - seed / 70))
    assert determinant([polygon], seed=seed) == expected


@settings(max_examples=25)
@given(seed=st.integers(0, 10**6), count=st.integers(3, 14), is_simplified=st.booleans())
def test_determinants_of_small_polygons(seed, count, is_simplified):
    """The same for few vertices, with and without triangle moves."""
    polygon = random_polygon(seed, count)
    expected = exact_determinant(polygon, (0.31, -0.22))
    assert determinant([polygon], is_simplified=is_simplified) == expected


@pytest.mark.parametrize("seed", range(4))
def test_walks_on_the_lattice(seed):
    """Closed walks on the cubic lattice, collinear and coplanar everywhere; determinants agree."""
    walk = lattice_walk(seed, 120)
    expected = exact_determinant(walk.astype(float), (0.1234, -0.2345))
    assert determinant([walk], is_simplified=False) == expected
    assert determinant([walk]) == expected


def rods_on_a_grid(starts, ends):
    """Columns from row starts[k] to row ends[k], in front of the rows that join them."""
    corners = []
    column = 0
    for _ in starts:
        corners += [(column, starts[column], 0), (column, starts[column], 1)]
        corners += [(column, ends[column], 1), (column, ends[column], 0)]
        column = starts.index(ends[column])
    return np.array(corners)


def test_a_trefoil_of_rods():
    """Five columns and five rows make a trefoil (Cromwell, 1995), every rod along an axis."""
    rods = rods_on_a_grid([0, 1, 2, 3, 4], [2, 3, 4, 0, 1])
    trefoils = [jones_polynomial(torus_link(2, q)) for q in (3, -3)]
    for is_simplified in (True, False):
        images = (rods, rods * [1, 1, -1])
        found = [jones_polynomial(closed_braid([x], is_simplified=is_simplified)) for x in images]
        assert found in (trefoils, trefoils[::-1])


rotations = st.tuples(*[st.floats(-1, 1)] * 4).filter(lambda q: sum(x * x for x in q) > 0.1)


def rotation_matrix(quaternion):
    w, x, y, z = np.array(quaternion) / np.linalg.norm(quaternion)
    return np.array(
        [
            [1 - 2 * (y * y + z * z), 2 * (x * y - z * w), 2 * (x * z + y * w)],
            [2 * (x * y + z * w), 1 - 2 * (x * x + z * z), 2 * (y * z - x * w)],
            [2 * (x * z - y * w), 2 * (y * z + x * w), 1 - 2 * (x * x + y * y)],
        ]
    )


@settings(max_examples=25)
@given(
    quaternion=rotations,
    scale=st.floats(1e-6, 1e6),
    shift=st.integers(0, 15),
    seed=st.integers(0, 100),
)
def test_the_frame_does_not_matter(quaternion, scale, shift, seed):
    """Rotation, scaling, translation, another first vertex, another seed: the same knot."""
    polygon = random_polygon(19, 16)
    moved = scale * (np.roll(polygon, shift, axis=0) @ rotation_matrix(quaternion).T) + scale
    expected = jones_polynomial(closed_braid([polygon]))
    assert jones_polynomial(closed_braid([moved], seed=seed)) == expected


def test_mirror_images_and_reverses():
    """Another sign of z gives the mirror image, rows backwards the reverse of every component."""
    polygons = [torus_polygon(2, 3, 40), shifted(torus_polygon(2, 3, 40), 0.3, 0.0, 0.2)]
    expected = jones_polynomial(closed_braid(polygons))
    mirrored = jones_polynomial(closed_braid([polygon * [1, 1, -1] for polygon in polygons]))
    assert mirrored == sorted([-exponent, c] for exponent, c in expected)
    assert jones_polynomial(closed_braid([polygon[::-1] for polygon in polygons])) == expected
    assert linking_numbers(polygon_diagram(polygons)) == [3]
    assert linking_numbers(polygon_diagram([polygons[0], polygons[1][::-1]])) == [-3]


@pytest.mark.parametrize("seed", range(8))
def test_linking_numbers(seed):
    """They are the Gauss integral, which is near an integer before it is rounded."""
    left, right = random_polygon(seed, 14), random_polygon(seed + 500, 11)
    integral = gauss_linking_integral(left, right)
    assert abs(integral - round(integral)) < 1e-9
    expected = [round(integral)] if round(integral) else []
    for is_simplified in (True, False):
        diagram = polygon_diagram([left, right], seed=seed, is_simplified=is_simplified)
        assert linking_numbers(diagram) == expected
        assert [n for n in pair_linking_numbers(braid_from_diagram(diagram)) if n] == expected


def test_circles_and_chains():
    """Circles apart have no crossings; a chain of three rings has four; order does not matter."""
    t = 2 * np.pi * np.arange(20) / 20
    flat = np.stack([np.cos(t), np.sin(t), 0 * t], axis=1)
    upright = np.stack([np.cos(t), 0 * t, np.sin(t)], axis=1)
    apart = polygon_diagram([flat, shifted(flat, 0, 0, 1), shifted(flat, 0, 0, 2)])
    assert (apart.circles, apart.crossings) == (3, ())
    chain = [flat, shifted(upright, 1.5, 0, 0), shifted(flat, 3, 0, 0)]
    for rings in (chain, chain[::-1], [chain[1], chain[0], chain[2]]):
        diagram = polygon_diagram(rings)
        assert len(diagram.crossings) == 4
        assert diagram.component_count == 3


SQUARE = np.array([[0, 0, 0], [4, 0, 0], [4, 4, 0], [0, 4, 0]])


@pytest.mark.parametrize(
    "polygons",
    [
        [[[0, 0, 0], [4, 4, 0], [4, 0, 0], [0, 4, 0]]],  # edge through edge
        [[[0, 0, 0], [4, 0, 0], [4, 4, 0], [2, 0, 0], [0, 4, 0]]],  # vertex on edge
        [[[0, 0, 0], [4, 0, 0], [4, 4, 4], [0, 0, 0], [0, 4, 0]]],  # vertex on vertex
        [[[0, 0, 0], [4, 0, 0], [2, 0, 0], [0, 4, 0]]],  # an edge folded back
        [[[0, 0, 0], [4, 0, 0], [2, 0, 0]]],  # no triangle at all
        [[[0, 0, 0], [4, 0, 0], [5, 1, 0], [3, 0, 0], [1, 0, 0], [0, 4, 0]]],  # along each other
        [SQUARE, shifted(SQUARE, 4, 0, 0)],  # a common edge
        [SQUARE, shifted(SQUARE, 4, 4, 0)],  # a common vertex
        [SQUARE, shifted(SQUARE, 2, 0, 0)[:, [0, 2, 1]]],  # edge through edge of another
        [SQUARE, [[2, 0, 0], [3, 0, 5], [1, 0, 5]]],  # vertex on an edge of another
        [SQUARE, SQUARE],
        [SQUARE * 0.1, [[0.1, 0.0, 0.0], [0.3, 0, 0.5], [0.1, 0, 0.5]]],
    ],
)
@pytest.mark.parametrize("is_simplified", [True, False])
def test_polygons_that_meet_are_refused(polygons, is_simplified):
    """Whatever meets is named by rows, in one line."""
    with pytest.raises(InputError, match=r"^the edge from row \d+ of component \d+ meets the one"):
        polygon_diagram(polygons, is_simplified=is_simplified)


corners = st.lists(st.tuples(*[st.integers(0, 4)] * 3), min_size=4, max_size=9, unique=True)


@settings(max_examples=150)
@given(rows=corners)
def test_polygons_with_small_integers(rows):
    """Refused exactly when two edges meet; else the determinant is that of another projection."""
    if is_polygon_meeting_itself(rows):
        with pytest.raises(InputError, match="meets the one"):
            polygon_diagram([rows])
        return
    expected = exact_determinant(np.array(rows, dtype=float), (0.1234, -0.2345))
    assert determinant([rows]) == expected
    assert determinant([rows], is_simplified=False) == expected


def test_nearly_meeting_is_not_meeting():
    """A gap of one unit in the last place keeps two rings linked, from either side."""
    ring = np.array([[-1, 0, 1.0], [1, 0, 1.0], [0, 0, -1.0]])
    gap = 2.0**-52
    through = [[0.5, -1, 1.0 - gap], [0.5, 1, 1.0 - gap], [9, 1, 9], [9, -1, 9]]
    past = [[0.5, -1, 1.0 + gap], [0.5, 1, 1.0 + gap], [9, 1, 9], [9, -1, 9]]
    assert abs(linking_numbers(polygon_diagram([ring, through]))[0]) == 1
    assert linking_numbers(polygon_diagram([ring, past])) == []
    on_it = [[0.5, -1, 1.0], [0.5, 1, 1.0], [9, 1, 9], [9, -1, 9]]
    with pytest.raises(InputError, match="meets"):
        polygon_diagram([ring, on_it])


def subdivided(polygon, parts):
    """Each edge cut into equal parts by further vertices, on it up to rounding."""
    steps = np.arange(parts)[:, None] / parts
    ends = np.roll(polygon, -1, axis=0)
    return np.concatenate([a + steps * (b - a) for a, b in zip(polygon, ends, strict=True)])


@pytest.mark.parametrize("parts", [2, 4])
@pytest.mark.parametrize("is_simplified", [True, False])
def test_collinear_vertices(parts, is_simplified):
    """Vertices on the edges, exactly for these parts, change nothing."""
    corners = np.round(torus_polygon(2, 3, 24) * 1024)
    expected = jones_polynomial(torus_link(2, 3))
    found = closed_braid([subdivided(corners, parts)], is_simplified=is_simplified)
    assert jones_polynomial(found) == expected


@pytest.mark.parametrize("is_simplified", [True, False])
def test_coincidences_in_the_coordinate_directions(is_simplified):
    """Rods along the axes, vertices above each other, equal heights: the Borromean rings."""
    rod = np.array([[3, 1, 0], [-3, 1, 0], [-3, -1, 0], [3, -1, 0]])
    rings = [rod, rod[:, [2, 0, 1]], rod[:, [1, 2, 0]]]
    diagram = polygon_diagram(rings, is_simplified=is_simplified)
    assert linking_numbers(diagram) == []
    borromean = jones_polynomial(Braid([1, -2, 1, -2, 1, -2]))
    assert jones_polynomial(braid_from_diagram(diagram)) == borromean


def test_simplified_polygons():
    """A subset of the rows, in order; about the fewest edges that will do; the same knot."""
    polygon = torus_polygon(2, 3, 2000)
    (rows,) = simplify_polygons([polygon], may_move=False)
    places = [int(np.flatnonzero((polygon == row).all(axis=1))[0]) for row in rows]
    assert places == sorted(places)
    for simplified in (rows, *simplify_polygons([polygon])):
        assert 6 <= len(simplified) <= 12  # no trefoil has fewer than six edges (Randell, 1994)
        assert jones_polynomial(closed_braid([simplified])) == jones_polynomial(torus_link(2, 3))
    assert [len(ring) for ring in simplify_polygons([SQUARE, shifted(SQUARE, 0, 0, 9)])] == [3, 3]


def length(polygon):
    return float(np.linalg.norm(polygon - np.roll(polygon, 1, axis=0), axis=1).sum())


@pytest.mark.parametrize("seed", range(4))
def test_simplification_keeps_the_determinant(seed):
    """Long walks: simplified by removing, by moving too, and not at all."""
    walk = random_walk(seed, 250)
    removed = simplify_polygons([walk], may_move=False)
    moved = simplify_polygons([walk], seed)
    assert len(moved[0]) <= len(removed[0]) < 100
    assert length(moved[0]) <= length(removed[0]) < length(walk)
    expected = determinant([walk], seed=1, is_simplified=False)
    assert determinant(removed, seed=2, is_simplified=False) == expected
    assert determinant(moved, seed=3, is_simplified=False) == expected


@settings(max_examples=40)
@given(
    seeds=st.lists(st.integers(0, 10**6), min_size=2, max_size=2, unique=True),
    scale=st.sampled_from([1, 1000]),
)
def test_simplification_keeps_links(seeds, scale):
    """Two entangled rings: linking number and Alexander polynomial do not notice the moves."""
    rings = [scale * random_polygon(seed, 9) for seed in seeds]  # many come apart
    given_diagram = polygon_diagram(rings, is_simplified=False)
    simplified = polygon_diagram(simplify_polygons(rings, seeds[0]), is_simplified=False)
    assert linking_numbers(simplified) == linking_numbers(given_diagram)
    expected = alexander_polynomial(braid_from_diagram(given_diagram))
    assert alexander_polynomial(braid_from_diagram(simplified)) == expected


def test_the_same_seed_gives_the_same_diagram():
    """Diagrams repeat; another seed may look from elsewhere, at most so many directions."""
    polygon = random_polygon(3, 20)
    assert polygon_diagram([polygon], seed=5) == polygon_diagram([polygon], seed=5)
    fewest = len(polygon_diagram([polygon], seed=5, directions=40).crossings)
    assert fewest <= len(polygon_diagram([polygon], seed=5, directions=1).crossings)


def test_ten_thousand_vertices():
    """A finely sampled torus knot comes down to nearly its fewest crossings."""
    diagram = polygon_diagram([torus_polygon(3, 4, 10_000)])
    assert len(diagram.crossings) <= 12
    assert jones_polynomial(braid_from_diagram(diagram)) == jones_polynomial(torus_link(3, 4))
