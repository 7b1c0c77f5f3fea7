"""Exact signs of determinants of differences of points: every geometric question asks these.

``points`` holds x y z of one point after the other. A row of a determinant is the difference of
two points, named by their numbers. Behind the vertices stand more points: the origin, the three
unit vectors, the direction of projection and a spare point; so a direction is a difference too.

Each coordinate is a double of size at most 1 and a multiple of 2^-340; then no product of three
differences underflows, and the arithmetic below is exact where it says so.
"""

# ruff: noqa: PLR0913, PLR0917 - loose arguments, since compiled loops take no objects of ours

import numpy as np

from braidsearch.compiling import compiled
from braidsearch.diagrams.polygons.edges import AXES, Numbers

_SPLITTER = 134217729.0  # 2^27 + 1
_ROUNDING = 2.0**-49
_MOST_PARTS = 256
_EVEN = np.array([0, 1, 2, 1, 2, 0, 2, 0, 1, 1, 0, 2, 0, 2, 1, 2, 1, 0])


@compiled
def add_exactly(expansion: Numbers, length: int, value: float) -> int:
    """Add a double to an expansion of doubles in place; the new length.

    Grow-expansion (Shewchuk, Adaptive precision floating-point arithmetic, 1997, theorem 10):
    the parts do not overlap and grow in size, so the last one has the sign of the sum.
    """
    kept = 0
    total = value
    for i in range(length):
        part = expansion[i]
        rounded = total + part
        virtual = rounded - total
        error = (total - (rounded - virtual)) + (part - virtual)
        total = rounded
        if error != 0.0:
            expansion[kept] = error
            kept += 1
    if total != 0.0:
        expansion[kept] = total
        kept += 1
    return kept


@compiled
def product_error(left: float, right: float) -> float:
    """What rounding takes from left * right (Dekker, A floating-point technique, 1971)."""
    product = left * right
    wide = _SPLITTER * left
    left_high = wide - (wide - left)
    wide = _SPLITTER * right
    right_high = wide - (wide - right)
    left_low, right_low = left - left_high, right - right_high
    rest = product - left_high * right_high
    rest = rest - left_low * right_high
    rest = rest - left_high * right_low
    return left_low * right_low - rest


@compiled
def exact_sign(points: Numbers, rows: Numbers) -> int:
    """The sign of the determinant whose row r is point rows[2 r] minus point rows[2 r + 1].

    Each difference is a rounded double and its error; the 48 products of three, with the errors
    of their roundings, are added up without loss.
    """
    parts = np.zeros(18)
    for row in range(3):
        for k in range(3):
            minuend = points[3 * rows[2 * row] + k]
            subtrahend = points[3 * rows[2 * row + 1] + k]
            rounded = minuend - subtrahend
            virtual = rounded - minuend
            parts[6 * row + 2 * k] = rounded
            parts[6 * row + 2 * k + 1] = (minuend - (rounded - virtual)) - (subtrahend + virtual)
    expansion = np.zeros(_MOST_PARTS)
    length = 0
    for term in range(6):
        for choice in range(8):
            x = parts[2 * _EVEN[3 * term] + (choice & 1)]
            y = parts[6 + 2 * _EVEN[3 * term + 1] + (choice >> 1 & 1)]
            z = parts[12 + 2 * _EVEN[3 * term + 2] + (choice >> 2)]
            if x == 0.0 or y == 0.0 or z == 0.0:
                continue
            if term > 2:
                x = -x
            product = x * y
            error = product_error(x, y)
            length = add_exactly(expansion, length, product_error(error, z))
            length = add_exactly(expansion, length, error * z)
            length = add_exactly(expansion, length, product_error(product, z))
            length = add_exactly(expansion, length, product * z)
    if length == 0:
        return 0
    return 1 if expansion[length - 1] > 0.0 else -1


@compiled
def determinant_sign(points: Numbers, p: int, p0: int, q: int, q0: int, r: int, r0: int) -> int:
    """The sign of det(p - p0, q - q0, r - r0).

    Rounding takes at most 16 units of 2^-53 of the sum of the absolute products: three
    differences, three roundings in each product, two sums. Within that, ``exact_sign`` decides.
    """
    px, py = points[3 * p] - points[3 * p0], points[3 * p + 1] - points[3 * p0 + 1]
    pz = points[3 * p + 2] - points[3 * p0 + 2]
    qx, qy = points[3 * q] - points[3 * q0], points[3 * q + 1] - points[3 * q0 + 1]
    qz = points[3 * q + 2] - points[3 * q0 + 2]
    rx, ry = points[3 * r] - points[3 * r0], points[3 * r + 1] - points[3 * r0 + 1]
    rz = points[3 * r + 2] - points[3 * r0 + 2]
    value = px * (qy * rz - qz * ry) + py * (qz * rx - qx * rz) + pz * (qx * ry - qy * rx)
    size = (
        abs(px) * (abs(qy * rz) + abs(qz * ry))
        + abs(py) * (abs(qz * rx) + abs(qx * rz))
        + abs(pz) * (abs(qx * ry) + abs(qy * rx))
    )
    if value > _ROUNDING * size:
        return 1
    if value < -_ROUNDING * size:
        return -1
    if size == 0.0:
        return 0
    return exact_sign(points, (p, p0, q, q0, r, r0))


@compiled
def side(points: Numbers, a: int, b: int, c: int, p: int) -> int:
    """On which side of the plane through a, b, c the point p lies; 0 in the plane."""
    return determinant_sign(points, b, a, c, a, p, a)


@compiled
def turn(points: Numbers, origin: int, along: int, a: int, b: int, c: int) -> int:
    """Which way a, b, c turn as seen against ``along``: 1 to the left, -1 right, 0 straight."""
    return determinant_sign(points, b, a, c, a, along, origin)


@compiled
def facing_axis(points: Numbers, origin: int, a: int, b: int, c: int) -> int:
    """A unit vector that is not in the plane of a, b, c; -1 where the three are collinear."""
    for axis in range(origin + AXES, origin + AXES + 3):
        if turn(points, origin, axis, a, b, c) != 0:
            return axis
    return -1
