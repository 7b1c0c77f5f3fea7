"""Permutation groups as certificates give them: generators and meridians, images of 1, 2, ..."""

from __future__ import annotations

from typing import Any


def cycles(degree: int, *moved: tuple[int, ...]) -> list[int]:
    """The images of 1, ..., degree under a product of disjoint cycles."""
    images = list(range(1, degree + 1))
    for cycle in moved:
        for one, other in zip(cycle, cycle[1:] + cycle[:1], strict=True):
            images[one - 1] = other
    return images


def alternating(degree: int) -> list[list[int]]:
    """Generators of the alternating group: the cycles (1 2 k)."""
    return [cycles(degree, (1, 2, k)) for k in range(3, degree + 1)]


def symmetric(degree: int) -> list[list[int]]:
    """Generators of the symmetric group."""
    return [cycles(degree, (1, 2)), cycles(degree, tuple(range(1, degree + 1)))]


def dihedral(degree: int) -> tuple[list[list[int]], list[int]]:
    """Generators of the symmetries of a polygon, and a reflection."""
    rotation = cycles(degree, tuple(range(1, degree + 1)))
    reflection = [1, *range(degree, 1, -1)]
    return [rotation, reflection], reflection


def projective(prime: int) -> list[list[int]]:
    """Generators z + 1 and -1/z of PSL(2, p) on the projective line 0, ..., p - 1, infinity."""
    shift = [*((z + 1) % prime + 1 for z in range(prime)), prime + 1]
    finite = [(-pow(z, -1, prime)) % prime + 1 for z in range(1, prime)]
    return [shift, [prime + 1, *finite, 1]]


# The Mathieu group of order 7,920, and in it an element of order 11.
ELEVEN = cycles(11, tuple(range(1, 12)))
MATHIEU = [ELEVEN, cycles(11, (3, 7, 11, 8), (4, 10, 5, 6))]

S3 = {"generators": symmetric(3), "meridians": [cycles(3, (1, 2))]}
S3_ROTATIONS = {"generators": symmetric(3), "meridians": [cycles(3, (1, 2)), cycles(3, (1, 2, 3))]}
A4 = {"generators": alternating(4), "meridians": [cycles(4, (1, 2, 3))]}
A4_BOTH = {
    "generators": alternating(4),
    "meridians": [cycles(4, (1, 3, 2)), cycles(4, (2, 4, 3)), cycles(4, (1, 2), (3, 4))],
}
A5: dict[str, Any] = {"generators": alternating(5), "meridians": [cycles(5, (1, 2, 3, 4, 5))]}
