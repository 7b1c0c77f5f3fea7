"""Projections of polygons in general position: several directions, the fewest crossings kept."""

from __future__ import annotations

import random
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from braidsearch.diagrams.polygons.edges import DIRECTION, EXTRA_POINTS, Edges
from braidsearch.diagrams.polygons.loops import load_loops
from braidsearch.errors import CapacityError

Integers = NDArray[np.int64]

MAX_CROSSINGS = 200_000

_DIRECTION_SIZE = 1 << 15
_WIDENING = 2.0**-45
_MOST_FAILURES = 200


@dataclass(frozen=True)
class Projection:
    """The crossings that are seen against one direction, c of them.

    ``direction``: three integers; ``pairs``: c x 2 edges, each named by the vertex in which it
    begins; ``signs``: 1 or -1 for each; ``tops``: 1 where the first edge of the pair lies on top.
    """

    direction: tuple[int, int, int]
    pairs: Integers
    signs: Integers
    tops: Integers


def project_polygons(edges: Edges, seed: int, directions: int) -> Projection:
    """The projection with the fewest crossings among so many seeded directions.

    The polygons meet neither themselves nor each other. A direction that shows a vertex on an
    edge, two vertices in one point or an edge as a point does not count; another one is drawn.
    Raises CapacityError when no direction shows at most MAX_CROSSINGS crossings.
    """
    generator = random.Random(seed)
    best: Integers | None = None
    best_direction, tried, failures = (0, 0, 1), 0, 0
    while tried < directions and failures < _MOST_FAILURES and (best is None or len(best)):
        direction = _random_direction(generator)
        pairs = _crossing_pairs(edges, direction, MAX_CROSSINGS if best is None else len(best) - 1)
        if pairs is None:
            failures += 1
            continue
        tried += 1
        if best is None and len(pairs) > MAX_CROSSINGS:
            failures += _MOST_FAILURES // 3
            continue
        if best is None or len(pairs) < len(best):
            best, best_direction = pairs, direction
    if best is None:
        left = int((edges.follows >= 0).sum())
        raise CapacityError(
            f"polygons of {left} vertices after simplification: expected at most "
            f"{MAX_CROSSINGS} crossings in a projection"
        )
    _set_direction(edges, best_direction)
    signs, tops = np.zeros(len(best), np.int64), np.zeros(len(best), np.int64)
    load_loops().find_heights(edges, best.ravel(), signs, tops)
    return Projection(best_direction, best, signs, tops)


def _random_direction(generator: random.Random) -> tuple[int, int, int]:
    """A direction that is not horizontal or along an axis plane, evenly spread on the sphere."""
    while True:
        entries = [generator.randint(-_DIRECTION_SIZE, _DIRECTION_SIZE) for _ in range(3)]
        x, y, z = entries
        if x and y and z and x * x + y * y + z * z <= _DIRECTION_SIZE**2:
            return x, y, z


def _set_direction(edges: Edges, direction: tuple[int, int, int]) -> None:
    """Write the direction behind the vertices, divided by a power of two."""
    place = len(edges.points) - 3 * EXTRA_POINTS + 3 * DIRECTION
    edges.points[place : place + 3] = np.array(direction) / _DIRECTION_SIZE


def _crossing_pairs(edges: Edges, direction: tuple[int, int, int], most: int) -> Integers | None:
    """The pairs of edges that cross; one row more than ``most`` stands for all larger numbers.

    None where the direction is not in general position, as far as that was looked at.
    """
    _set_direction(edges, direction)
    plane = _image_tree(edges, direction)
    room = min(most, 1 << 12)
    while True:
        pairs = np.zeros(2 * room, np.int64)
        count = load_loops().find_crossings(edges, plane, pairs)
        if count < 0:
            return None
        if count <= room:
            return pairs[: 2 * count].reshape(-1, 2)
        if room == most:
            return np.zeros((most + 1, 2), np.int64)
        room = min(8 * room, most)


def _image_tree(edges: Edges, direction: tuple[int, int, int]) -> Edges:
    """A tree over the images, their boxes widened.

    Coordinates and the vectors onto which they are projected have sizes of at most 2, so rounding
    moves an image by less than 2^-48; boxes 2^-45 wider therefore meet wherever images do.
    """
    normal = np.array(direction) / np.linalg.norm(direction)
    across = np.cross(normal, np.eye(3)[int(np.abs(normal).argmin())])
    across /= np.linalg.norm(across)
    points = edges.points.reshape(-1, 3)
    images = np.zeros_like(points)
    images[:, 0], images[:, 1] = points @ across, points @ np.cross(normal, across)
    plane = edges._replace(
        points=images.ravel(),
        low=np.zeros_like(edges.low),
        high=np.zeros_like(edges.high),
        query_low=np.zeros(3),
        query_high=np.zeros(3),
    )
    load_loops().build_tree(plane)
    plane.low[:] -= _WIDENING
    plane.high[:] += _WIDENING
    return plane
