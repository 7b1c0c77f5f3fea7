"""The arrays on which the loops over polygons work."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any, NamedTuple

import numpy as np

from braidsearch.diagrams.polygons.arrays import Polygon
from braidsearch.errors import InputError

Numbers = Any  # arrays for the compiled loops; anything with an index for the plain ones

AXES = 1  # the unit vectors, counted from the origin
DIRECTION = 4  # the direction of projection, counted from the origin
SPARE = 5  # a point that a vertex may move to, counted from the origin
EXTRA_POINTS = 6

_LOWEST_BIT = -340


class Edges(NamedTuple):
    """The arrays that the loops work on; v vertices, in p polygons.

    ``points``: 3 (v + 6) coordinates, see ``exact_signs``; ``follows`` and ``precedes``: for each
    vertex its neighbours, -1 once it is removed; ``polygon``: for each vertex the number of its
    polygon; ``sizes``: for each polygon its vertices; ``low`` and ``high``: the boxes of the
    tree, 6 numbers for each leaf; ``query_low`` and ``query_high``: the box asked for.
    """

    points: Numbers
    follows: Numbers
    precedes: Numbers
    polygon: Numbers
    sizes: Numbers
    low: Numbers
    high: Numbers
    query_low: Numbers
    query_high: Numbers


def work_arrays(polygons: Sequence[Polygon]) -> tuple[int, Edges]:
    """The power of two by which coordinates were divided, and the arrays, the tree not yet built.

    Afterwards the largest is less than 1, and every difference of two is exact to the last bit
    that ``exact_signs`` asks for. Raises InputError for coordinates so different in size that
    this cannot be.
    """
    coordinates = np.concatenate(polygons)
    power = _power_above(coordinates)
    count = len(coordinates)
    points = np.zeros((count + EXTRA_POINTS, 3))
    points[:count] = np.ldexp(coordinates, -power)
    points[count + 1 : count + 4] = np.eye(3)
    follows, precedes = np.arange(1, count + 1), np.arange(-1, count - 1)
    sizes = np.array([len(polygon) for polygon in polygons])
    ends = np.cumsum(sizes)
    follows[ends - 1], precedes[ends - sizes] = ends - sizes, ends - 1
    leaves = 1 << (count - 1).bit_length()
    return power, Edges(
        points.ravel(),
        follows,
        precedes,
        np.repeat(np.arange(len(sizes)), sizes),
        sizes,
        np.zeros(6 * leaves),
        np.zeros(6 * leaves),
        np.zeros(3),
        np.zeros(3),
    )


def _power_above(coordinates: Polygon) -> int:
    """The least power of two above all sizes; checks how far below it the last bits lie."""
    significands, powers = np.frexp(coordinates)
    digits = np.abs(np.ldexp(significands, 53)).astype(np.int64)
    used = digits > 0
    if not used.any():
        return 0
    power = int(powers[used].max())
    last = np.frexp((digits & -digits).astype(np.float64))[1] - 1  # trailing zeros
    lowest = np.where(used, powers - 53 + last, power)
    place = np.unravel_index(int(lowest.argmin()), lowest.shape)
    if lowest[place] - power < _LOWEST_BIT:
        largest = float(np.abs(coordinates).max())
        raise InputError(
            f"coordinates {float(coordinates[place])!r} and {largest!r} together: "
            "expected sizes within a factor of 10^80 of each other"
        )
    return power
