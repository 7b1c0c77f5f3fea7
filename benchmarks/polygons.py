"""Closed polygons in space: torus knots, random polygons, and ten thousand vertices.

Run: python -m benchmarks.polygons [--count 1000] [--seconds 20]

First the torus knots T(p, q) with p and q to 7, sampled as polygons, are compared with the standard
braids. Then random polygons of 50 vertices, evenly spread in a cube: the determinant of the
diagram's closed braid against a count of the tests' own, with fractions and along another
direction. Last, polygons of ten thousand vertices, timed from the array to the diagram; the bound
is 20 seconds. A wrong answer or a bound not kept ends with status 1.

Measured on one of two shared cores, the loops compiled before (11 s, once):

    torus knot T(3, 4), 10000 vertices: 9 left, 8 crossings, 0.11 s
    torus knot T(7, 6), 10000 vertices: 20 left, 49 crossings, 0.17 s
    closed walk of normal steps, 10000 vertices: 203 left, 213 crossings, 0.33 s
    closed walk on the lattice, 10000 vertices: 3 left, 0 crossings, 0.10 s
    circle with noise, 10000 vertices: 12 left, 6 crossings, 0.13 s
    torus knots: 22 of 22 same; seconds median 0.08, nine in ten 0.71, at most 2.14
    random polygons of 50 vertices: 1000 of 1000 determinants agree
      crossings median 74, nine in ten 115, at most 211
      seconds to the braid median 0.111, nine in ten 0.412, at most 1.183
"""

import argparse
import time
from math import gcd

import numpy as np

from benchmarks.tables import examine, spread
from braidsearch.diagrams.families import torus_link
from braidsearch.diagrams.polygons import polygon_diagram, simplify_polygons
from braidsearch.diagrams.vogel import braid_from_diagram
from braidsearch.invariants import link_determinant
from tests.diagrams.polygons.curves import (
    exact_determinant,
    lattice_walk,
    random_polygon,
    random_walk,
    torus_polygon,
)

LARGEST = 10_000
BOUND = 20.0


def torus_knots(seconds: float) -> int:
    """Compare sampled torus knots with the standard braids; the number not proven same."""
    failures, times = 0, []
    pairs = [(p, q) for p in range(2, 8) for q in range(2, 8) if gcd(p, q) == 1]
    for p, q in pairs:
        diagram = polygon_diagram([torus_polygon(p, q, 40 * (p + q))])
        braid = braid_from_diagram(diagram)
        result = examine((f"T({p}, {q})", braid, torus_link(p, q), seconds))
        times.append(result.seconds)
        if result.outcome != "same":
            failures += 1
            print(
                f"  {result.name}: {result.outcome}, {braid.strands} strands, {len(braid)} letters"
            )
    print(
        f"torus knots: {len(pairs) - failures} of {len(pairs)} same; seconds {spread(times, '.2f')}"
    )
    return failures


def random_polygons(count: int) -> int:
    """Count determinants twice; the number of polygons whose two determinants differ."""
    wrong, crossings, times = 0, [], []
    for seed in range(count):
        polygon = random_polygon(seed, 50)
        start = time.perf_counter()
        diagram = polygon_diagram([polygon], seed=seed)
        braid = braid_from_diagram(diagram)
        times.append(time.perf_counter() - start)
        crossings.append(float(len(diagram.crossings)))
        expected = exact_determinant(polygon, (0.3 + seed / 7919, -0.2 - seed / 6007))
        if link_determinant(braid) != expected:
            wrong += 1
            print(f"  seed {seed}: another determinant than {expected}")
    print(f"random polygons of 50 vertices: {count - wrong} of {count} determinants agree")
    print("  crossings", spread(crossings, ".0f"))
    print("  seconds to the braid", spread(times, ".3f"))
    return wrong


def large_polygons() -> int:
    """Time polygons of ten thousand vertices; the number that take longer than the bound."""
    late = 0
    for name, polygon in (
        ("torus knot T(3, 4)", torus_polygon(3, 4, LARGEST)),
        ("torus knot T(7, 6)", torus_polygon(7, 6, LARGEST)),
        ("closed walk of normal steps", random_walk(1, LARGEST)),
        ("closed walk on the lattice", lattice_walk(1, LARGEST).astype(float)),
        (
            "circle with noise",
            np.round(random_walk(2, LARGEST), 3) + 300 * torus_polygon(1, 0, LARGEST),
        ),
    ):
        start = time.perf_counter()
        diagram = polygon_diagram([polygon])
        taken = time.perf_counter() - start
        left = len(simplify_polygons([polygon])[0])
        late += taken > BOUND
        shown = f"{left} left, {len(diagram.crossings)} crossings, {taken:.2f} s"
        print(f"{name}, {LARGEST} vertices: {shown}")
    return late


def main() -> None:
    """Run the three parts one after the other."""
    parser = argparse.ArgumentParser(description=(__doc__ or "").splitlines()[0])
    parser.add_argument("--count", type=int, default=1000)
    parser.add_argument("--seconds", type=float, default=20.0)
    given = parser.parse_args()
    polygon_diagram([torus_polygon(2, 3, 30)])  # compiles the loops
    bad = large_polygons() + torus_knots(given.seconds) + random_polygons(given.count)
    raise SystemExit(1 if bad else 0)


if __name__ == "__main__":
    main()
