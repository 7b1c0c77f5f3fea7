"""Permutations as byte strings, for orbits and small groups before any array is made.

A permutation of degree d is a byte string of 256 places: the images of 0, ..., 255, those from d
on fixed. Products are read from left to right, so ``p.translate(q)`` is the product pq.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence

Permutation = bytes

PLACES = 256
LARGEST_DEGREE = 200
IDENTITY: Permutation = bytes(range(PLACES))


def from_images(images: Sequence[int]) -> Permutation:
    """The permutation with these images of 1, ..., d."""
    return bytes(image - 1 for image in images) + IDENTITY[len(images) :]


def images(permutation: Permutation, degree: int) -> tuple[int, ...]:
    """The images of 1, ..., d, counted from 1."""
    return tuple(place + 1 for place in permutation[:degree])


def inverse(permutation: Permutation) -> Permutation:
    """The permutation that takes each image back."""
    places = bytearray(PLACES)
    for place, image in enumerate(permutation):
        places[image] = place
    return bytes(places)


def product(*factors: Permutation) -> Permutation:
    """The factors carried out one after the other, the first one first."""
    result = IDENTITY
    for factor in factors:
        result = result.translate(factor)
    return result


def order(permutation: Permutation) -> int:
    """The least positive power that is the identity."""
    power, exponent = permutation, 1
    while power != IDENTITY:
        power, exponent = power.translate(permutation), exponent + 1
    return exponent


def generated_group(generators: Iterable[Permutation], most: int) -> list[Permutation] | None:
    """The elements of the group, the identity first; None when there are more than ``most``.

    A generator that lies in the group of those before it costs one look, so many may be given.
    """
    elements = [IDENTITY]
    known = {IDENTITY}
    used: list[Permutation] = []
    for generator in generators:
        if generator in known:
            continue
        used.append(generator)
        place = 0
        while place < len(elements):
            for factor in used:
                element = elements[place].translate(factor)
                if element not in known:
                    known.add(element)
                    elements.append(element)
            place += 1
            if len(elements) > most:
                return None
    return elements
