"""Polygons for the tests, and an independent count of what their projections show.

The crossings here are found by fractions along a direction of the test's own,
edge against edge, without the trees, filters and moves of the package.
"""

from fractions import Fraction
from functools import cache
from itertools import combinations

import numpy as np


def torus_polygon(p, q, count):
    """The torus knot T(p, q), right-handed for p q > 0, sampled at ``count`` points."""
    t = 2 * np.pi * np.arange(count) / count
    radius = 2 + np.cos(q * t)
    return np.stack([radius * np.cos(p * t), radius * np.sin(p * t), -np.sin(q * t)], axis=1)


def random_polygon(seed, count):
    """Points spread evenly in a cube, joined in order: knotted more often than not."""
    return np.random.default_rng(seed).uniform(size=(count, 3))


def random_walk(seed, count):
    """A closed walk of normally distributed steps."""
    steps = np.random.default_rng(seed).normal(size=(count, 3))
    return np.cumsum(steps - steps.mean(axis=0), axis=0)


def lattice_walk(seed, count):
    """A self-avoiding closed walk on the cubic lattice, grown by pushing edges sideways."""
    generator = np.random.default_rng(seed)
    walk = [(0, 0, 0), (1, 0, 0), (1, 1, 0), (0, 1, 0)]
    taken = set(walk)
    while len(walk) < count:
        i = int(generator.integers(len(walk)))
        a, b = walk[i], walk[(i + 1) % len(walk)]
        push = [0, 0, 0]
        push[int(generator.integers(3))] = int(generator.choice([-1, 1]))
        above = tuple(x + y for x, y in zip(a, push, strict=True))
        beside = tuple(x + y for x, y in zip(b, push, strict=True))
        if above not in taken and beside not in taken and above != b:
            walk[i + 1 : i + 1] = [above, beside]
            taken |= {above, beside}
    return np.array(walk)


def gauss_linking_integral(left, right):
    """The linking number by Gauss's integral, edge by edge in closed form.

    Two edges contribute the signed area, over 4 pi, of the directions from one to the other: a
    spherical quadrilateral (Klenin, Langowski, Computation of writhe, 2000).
    """
    total = 0.0
    for a, b in zip(left, np.roll(left, -1, axis=0), strict=True):
        for c, d in zip(right, np.roll(right, -1, axis=0), strict=True):
            corners = [c - a, d - a, d - b, c - b]
            normals = [np.cross(corners[i], corners[(i + 1) % 4]) for i in range(4)]
            sizes = [np.linalg.norm(normal) for normal in normals]
            if min(sizes) == 0:
                continue
            units = [normal / size for normal, size in zip(normals, sizes, strict=True)]
            cosines = [np.clip(units[i] @ units[(i + 1) % 4], -1, 1) for i in range(4)]
            area = float(np.arcsin(cosines).sum())
            total += area * np.sign(np.cross(d - c, b - a) @ (c - a))
    return total / (4 * np.pi)


def exact_crossings(polygon, direction):
    """The crossings of one polygon along a direction: (over edge, place, under edge, place).

    Places are fractions between 0 and 1 along the edges. The caller picks a direction that shows
    no vertex on an edge, and that is checked.
    """
    points = [_turned(row, direction) for row in polygon.tolist()]
    count = len(points)
    found = []
    for i, j in combinations(range(count), 2):
        if j - i in (1, count - 1):
            continue
        a, b, c, d = points[i], points[(i + 1) % count], points[j], points[(j + 1) % count]
        if _are_apart(a, b, c, d):
            continue
        u, w = (b[0] - a[0], b[1] - a[1]), (d[0] - c[0], d[1] - c[1])
        lower = u[0] * w[1] - u[1] * w[0]
        if lower == 0:
            assert u[0] * (c[1] - a[1]) != u[1] * (c[0] - a[0]), "edges in one line"
            continue
        s = ((c[0] - a[0]) * w[1] - (c[1] - a[1]) * w[0]) / lower
        t = ((c[0] - a[0]) * u[1] - (c[1] - a[1]) * u[0]) / lower
        if 0 <= s <= 1 and 0 <= t <= 1:
            assert not {s, t} & {0, 1}, "a vertex on an edge: another direction is wanted"
            above = a[2] + s * (b[2] - a[2]) > c[2] + t * (d[2] - c[2])
            found.append((i, s, j, t) if above else (j, t, i, s))
    return found


def exact_determinant(polygon, direction):
    """The determinant of a knot: a minor of the colouring matrix of one of its projections.

    Each crossing says that twice the colour of the over-strand is the sum of those of the two
    under-strands (Fox, 1962); the strands run from one under-passage to the next.
    """
    crossings = exact_crossings(polygon, direction)
    unders = sorted((edge, place) for _, _, edge, place in crossings)
    if len(unders) < 2:
        return 1
    rows = []
    for over, over_place, under, place in crossings:
        row = [0] * len(unders)
        at = unders.index((under, place))
        row[_strand(unders, over, over_place)] += 2
        row[at] -= 1
        row[(at + 1) % len(unders)] -= 1
        rows.append(row[1:])
    return abs(_integer_determinant(rows[1:]))


def _turned(row, direction):
    """The point in coordinates whose third runs along the direction (x, y, 1), of determinant 1."""
    x, y, z = map(Fraction, row)
    return x - Fraction(direction[0]) * z, y - Fraction(direction[1]) * z, z


def _are_apart(a, b, c, d):
    return any(
        max(a[k], b[k]) < min(c[k], d[k]) or max(c[k], d[k]) < min(a[k], b[k]) for k in range(2)
    )


def _strand(unders, edge, place):
    """The number of the strand that passes the place: it ends at the next under-passage."""
    return next((i for i, under in enumerate(unders) if under > (edge, place)), 0)


def _integer_determinant(rows):
    """The determinant, from its residues modulo primes whose product is beyond twice its bound.

    Hadamard's bound for rows 2, -1, -1 is sqrt(6) each.
    """
    residue, modulus, prime = 0, 1, 2**31
    while modulus**2 <= 4 * 6 ** len(rows):
        prime = _prime_below(prime)
        found = _determinant_modulo(np.array(rows, dtype=np.int64).reshape(len(rows), -1), prime)
        residue += modulus * ((found - residue) * pow(modulus, -1, prime) % prime)
        modulus *= prime
    return residue if 2 * residue < modulus else residue - modulus


@cache
def _prime_below(number):
    number -= 1
    while any(number % k == 0 for k in range(2, 46341)):
        number -= 1
    return number


def _determinant_modulo(rows, prime):
    rows, result = rows % prime, 1
    for k in range(len(rows)):
        pivots = np.flatnonzero(rows[k:, k])
        if not len(pivots):
            return 0
        pivot = k + int(pivots[0])
        if pivot != k:
            rows[[k, pivot]] = rows[[pivot, k]]
            result = -result
        head = int(rows[k, k])
        result = result * head % prime
        factors = rows[k + 1 :, k] * pow(head, -1, prime) % prime
        used = np.flatnonzero(factors) + k + 1
        rows[used] = (rows[used] - factors[used - k - 1, None] * rows[k]) % prime
    return result % prime
