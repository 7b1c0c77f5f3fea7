"""The conjugacy classes of some colours, reached step by step, and the meridians' centralisers."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from functools import cached_property, lru_cache
from itertools import pairwise

from braidsearch.errors import CapacityError, InputError
from braidsearch.invariants.colourings.colours import Colours
from braidsearch.invariants.colourings.permutations import (
    IDENTITY,
    Permutation,
    from_images,
    generated_group,
    inverse,
    product,
)

LARGEST_CLASSES = 2_000
LARGEST_CENTRALISER = 5_000


@dataclass(frozen=True)
class Classes:
    """The colours as permutations, class after class, each in the order of reaching.

    ``parents`` has (place of an earlier colour, number of a generator that takes it here), and
    (own place, -1) for a meridian; ``carriers`` has the product of the generators on the way.
    ``starts`` bounds the classes; ``actions`` says where each generator takes each colour.
    """

    colours: Colours
    generators: tuple[Permutation, ...]
    elements: list[Permutation]
    parents: list[tuple[int, int]]
    carriers: list[Permutation]
    starts: list[int]
    actions: list[list[int]]

    @cached_property
    def places(self) -> dict[Permutation, int]:
        """The place of each colour."""
        return {element: place for place, element in enumerate(self.elements)}

    @property
    def sizes(self) -> tuple[int, ...]:
        """The number of conjugates of each meridian."""
        return tuple(end - start for start, end in pairwise(self.starts))

    def orbits(self, acting: Sequence[Permutation]) -> list[tuple[int, int]]:
        """The orbits of a subgroup on the colours: the least place and the size of each."""
        found: list[tuple[int, int]] = []
        seen: set[Permutation] = set()
        for place, element in enumerate(self.elements):
            if element not in seen:
                orbit = conjugates(element, acting)
                seen.update(orbit)
                found.append((place, len(orbit)))
        return found


@dataclass(frozen=True)
class Centraliser:
    """The elements of the group that commute with a meridian, and some that generate them."""

    generators: tuple[Permutation, ...]
    elements: tuple[Permutation, ...]

    @cached_property
    def least_conjugates(self) -> dict[Permutation, Permutation]:
        """For each element the least of its conjugates in the centraliser."""
        least: dict[Permutation, Permutation] = {}
        for element in sorted(self.elements):
            if element not in least:
                least.update(dict.fromkeys(conjugates(element, self.generators), element))
        return least


def reach_classes(colours: Colours) -> Classes:
    """All conjugates of the meridians, by steps from one to the next.

    Raises CapacityError for more than LARGEST_CLASSES, InputError for conjugate meridians.
    """
    generators = tuple(map(from_images, colours.generators))
    classes = Classes(colours, generators, [], [], [], [0], [[] for _ in generators])
    places: dict[Permutation, int] = {}
    for meridian in colours.meridians:
        first = from_images(meridian)
        if first in places:
            raise InputError(f"meridian {meridian!r}: expected no conjugate of another one")
        places[first] = len(places)
        classes.parents.append((len(classes.elements), -1))
        classes.elements.append(first)
        classes.carriers.append(IDENTITY)
        _reach_class(classes, places)
        classes.starts.append(len(places))
    return classes


def _reach_class(classes: Classes, places: dict[Permutation, int]) -> None:
    pairs = [(inverse(generator), generator) for generator in classes.generators]
    elements = classes.elements
    place = classes.starts[-1]
    while place < len(elements):
        for number, (undone, done) in enumerate(pairs):
            image = undone.translate(elements[place]).translate(done)
            if image not in places:
                places[image] = len(elements)
                elements.append(image)
                classes.parents.append((place, number))
                classes.carriers.append(classes.carriers[place].translate(done))
            classes.actions[number].append(places[image])
        if len(elements) > LARGEST_CLASSES:
            name = classes.colours.name
            raise CapacityError(f"{name}: expected at most {LARGEST_CLASSES} colours")
        place += 1


def centraliser(classes: Classes, number: int) -> Centraliser:
    """The centraliser of a meridian, by Schreier's lemma.

    Where a generator g takes one conjugate to another, (carrier of the one) g (carrier of the
    other)^-1 commutes with the meridian, and these elements generate (O. Schreier, 1927).

    Raises CapacityError for more than LARGEST_CENTRALISER elements, and InputError for a meridian
    that is not in the group: it would be in its own centraliser.
    """
    span = range(classes.starts[number], classes.starts[number + 1])
    undone = {place: inverse(classes.carriers[place]) for place in span}
    candidates = dict.fromkeys(
        product(classes.carriers[place], generator, undone[action[place]])
        for place in span
        for generator, action in zip(classes.generators, classes.actions, strict=True)
    )
    elements = generated_group(candidates, LARGEST_CENTRALISER)
    if elements is None:
        raise CapacityError(
            f"{classes.colours.name}: expected a centraliser of at most {LARGEST_CENTRALISER}"
        )
    if classes.elements[span.start] not in elements:
        meridian = classes.colours.meridians[number]
        raise InputError(f"meridian {meridian!r}: expected an element of the group")
    return Centraliser(_few_generators(candidates, len(elements)), tuple(elements))


def _few_generators(candidates: Iterable[Permutation], order: int) -> tuple[Permutation, ...]:
    """The first candidates that together generate all."""
    used: list[Permutation] = []
    known = {IDENTITY}
    for candidate in candidates:
        if len(known) == order:
            break
        if candidate not in known:
            used.append(candidate)
            known = set(generated_group(used, order) or ())
    return tuple(used)


def conjugates(element: Permutation, acting: Sequence[Permutation]) -> list[Permutation]:
    """The conjugates of an element under the group that ``acting`` generates."""
    pairs = [(inverse(factor), factor) for factor in acting]
    orbit, seen = [element], {element}
    for member in orbit:
        for undone, done in pairs:
            image = undone.translate(member).translate(done)
            if image not in seen:
                seen.add(image)
                orbit.append(image)
    return orbit


@lru_cache(maxsize=1024)
def class_sizes(colours: Colours) -> tuple[int, ...]:
    """The number of conjugates of each meridian, counted unless the colours say it."""
    return colours.class_sizes or reach_classes(colours).sizes
