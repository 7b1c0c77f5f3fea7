"""Colourings by the definition: all tuples of colours that the braid's action fixes.

Everything is done with tuples of images, by loops over whole groups; nothing of the package is
used but the values.
"""

from collections import Counter
from functools import cache
from itertools import product

from braidsearch.invariants.colourings import Colours
from braidsearch.words import Braid

Permutation = tuple[int, ...]


def times(p: Permutation, q: Permutation) -> Permutation:
    """First p, then q; images count from 1."""
    return tuple(q[image - 1] for image in p)


def inverse(p: Permutation) -> Permutation:
    return tuple(p.index(point) + 1 for point in range(1, len(p) + 1))


def conjugate(x: Permutation, g: Permutation) -> Permutation:
    """g^-1 x g."""
    return times(times(inverse(g), x), g)


@cache
def elements(generators: tuple[Permutation, ...]) -> list[Permutation]:
    """The group, the identity first."""
    found = [tuple(range(1, len(generators[0]) + 1))]
    seen = set(found)
    for element in found:
        new = {times(element, g) for g in generators} - seen
        seen |= new
        found += sorted(new)
    return found


@cache
def carriers(generators: tuple[Permutation, ...], x: Permutation) -> dict[Permutation, Permutation]:
    """For each conjugate c of x an element h with h^-1 c h = x."""
    return {conjugate(x, inverse(h)): h for h in elements(generators)}


@cache
def centraliser(generators: tuple[Permutation, ...], x: Permutation) -> list[Permutation]:
    return [z for z in elements(generators) if conjugate(x, z) == x]


def least_conjugate(generators, x: Permutation, y: Permutation) -> Permutation:
    """The least of the conjugates of y under the centraliser of x."""
    return min(conjugate(y, z) for z in centraliser(generators, x))


def value(braid: Braid, colours: Colours) -> list[list[int]]:
    """The value that ``count_colourings`` should have."""
    everything = sorted(c for x in colours.meridians for c in carriers(colours.generators, x))
    counts: Counter[tuple[int, ...]] = Counter()
    for top in product(everything, repeat=braid.strands):
        passages = act(braid, top)
        if passages is not None:
            entries = [entry(cycle, top, passages, colours) for cycle in braid.component_cycles]
            counts[tuple(integer for one in sorted(entries) for integer in one)] += 1
    return sorted([*entries, count] for entries, count in counts.items())


def act(braid: Braid, top: tuple[Permutation, ...]) -> dict | None:
    """What each strand passes under, as (factor, other strand, sign); None if not fixed."""
    colours, strands = list(top), list(range(braid.strands))
    passages: dict[int, list[tuple[Permutation, int, int]]] = {s: [] for s in strands}
    for letter in braid.word:
        i = abs(letter) - 1
        a, b = colours[i : i + 2]
        left, right = strands[i : i + 2]
        if letter > 0:
            passages[left].append((b, right, 1))
            colours[i : i + 2] = b, conjugate(a, b)
        else:
            passages[right].append((inverse(a), left, -1))
            colours[i : i + 2] = conjugate(b, inverse(a)), a
        strands[i : i + 2] = right, left
    return passages if tuple(colours) == top else None


def entry(cycle, top, passages, colours: Colours) -> tuple[int, ...]:
    """The class and the least conjugate of the longitude, for the component of a cycle."""
    meridian = top[cycle[0]]
    longitude = elements(colours.generators)[0]
    for strand in cycle:
        for factor, _, _ in passages[strand]:
            longitude = times(longitude, factor)
    writhe = sum(sign for s in cycle for _, other, sign in passages[s] if other in cycle)
    for _ in range(abs(writhe)):
        longitude = times(longitude, inverse(meridian) if writhe > 0 else meridian)
    assert times(longitude, meridian) == times(meridian, longitude)
    for number, x in enumerate(colours.meridians, 1):
        carrier = carriers(colours.generators, x).get(meridian)
        if carrier is not None:
            moved = conjugate(longitude, carrier)
            return number, *least_conjugate(colours.generators, x, moved)
    raise AssertionError("a colour is in one of the classes")
