"""Slow second routes to the finer invariants, written from FORMAT.md.

Colourings by trying all tuples at the top, sublinks by tracing strands, nullities and modules
from Burau's matrices, classes of 3-braids by rewriting text and by listing the families. None of
these is a method of the verifier; only signatures at roots of unity share its Seifert matrix,
which Goeritz matrices and Burau's polynomials confirm elsewhere.
"""

from __future__ import annotations

import cmath
from collections import Counter
from functools import cache
from itertools import combinations, pairwise, product
from typing import Any

import numpy as np
import sympy
from sympy import ZZ
from sympy.polys import galoistools as tools

from braidsearch.verifier import verify
from braidsearch.words import Braid

Permutation = tuple[int, ...]
MAX_TUPLES = 5_000
MAX_MINOR = 6


class TooLargeError(Exception):
    """More tuples of colours, or larger minors, than this route can take."""


def then(*factors: Permutation) -> Permutation:
    """The product, read from left to right, of permutations of 0, 1, 2, ..."""
    result = tuple(range(len(factors[0])))
    for factor in factors:
        result = tuple(factor[i] for i in result)
    return result


def power(element: Permutation, exponent: int) -> Permutation:
    base = element if exponent > 0 else inverse(element)
    return then(tuple(range(len(element))), *[base] * abs(exponent))


def inverse(element: Permutation) -> Permutation:
    return tuple(element.index(i) for i in range(len(element)))


def conjugate(element: Permutation, by: Permutation) -> Permutation:
    return then(inverse(by), element, by)


@cache
def group(generators: tuple[Permutation, ...]) -> frozenset[Permutation]:
    elements = {tuple(range(len(generators[0])))}
    size = 0
    while size < len(elements):
        size = len(elements)
        elements |= {then(one, other) for one in elements for other in generators}
    return frozenset(elements)


@cache
def least_longitude(
    generators: tuple[Permutation, ...], x: Permutation, colour: Permutation, longitude: Permutation
) -> list[int]:
    """The least conjugate of a longitude, by elements that bring the colour to x."""
    bringing = (g for g in group(generators) if conjugate(colour, g) == x)
    return [i + 1 for i in min(conjugate(longitude, g) for g in bringing)]


def colouring(braid: Braid, generators: Any, meridians: Any) -> list[list[int]] | None:
    """All tuples that the braid fixes; None when the parameters are not as they must be."""
    degree = len(meridians[0])
    if any(len(images) != degree for images in [*generators, *meridians]):
        return None
    steps = tuple(tuple(i - 1 for i in images) for images in generators) or (tuple(range(degree)),)
    xs = [tuple(i - 1 for i in images) for images in meridians]
    elements = group(steps)
    classes = [sorted({conjugate(x, g) for g in elements}) for x in xs]
    kinds = {colour: kind for kind, one in enumerate(classes) for colour in one}
    if not elements.issuperset(xs) or len(kinds) < sum(map(len, classes)):
        return None
    if len(kinds) ** braid.strands > MAX_TUPLES:
        raise TooLargeError
    counts: Counter[tuple[int, ...]] = Counter()
    for top in product(kinds, repeat=braid.strands):
        if act(top, braid.word)[0] == list(top):
            entries = []
            for colour, longitude in peripheral_pairs(braid, top):
                kind = kinds[colour]
                images = least_longitude(steps, xs[kind], colour, longitude)
                entries.append([kind + 1, *images])
            counts[tuple(number for entry in sorted(entries) for number in entry)] += 1
    return sorted([*entries, count] for entries, count in counts.items())


def act(top: Any, word: Any) -> tuple[list[Permutation], list[Any]]:
    """The colours at the bottom, and for each letter the colours before it."""
    colours, before = list(top), []
    for letter in word:
        i = abs(letter) - 1
        a, b = colours[i], colours[i + 1]
        before.append((a, b))
        colours[i : i + 2] = (b, conjugate(a, b)) if letter > 0 else (conjugate(b, inverse(a)), a)
    return colours, before


def peripheral_pairs(braid: Braid, top: Any) -> list[tuple[Permutation, Permutation]]:
    """Meridian and longitude of each component, from the first strand of it at the top."""
    before = act(top, braid.word)[1]
    cycles = component_cycles(braid)
    pairs = []
    for cycle in cycles:
        longitude, twists = tuple(range(len(top[0]))), 0
        for start in cycle:
            position = start
            for number, (letter, (a, b)) in enumerate(zip(braid.word, before, strict=True)):
                i = abs(letter) - 1
                if position not in (i, i + 1):
                    continue
                if letter > 0 and position == i:
                    longitude = then(longitude, b)
                    twists += strand_at(braid, number, i + 1) in cycle
                elif letter < 0 and position == i + 1:
                    longitude = then(longitude, inverse(a))
                    twists -= strand_at(braid, number, i) in cycle
                position = 2 * i + 1 - position
        meridian = top[cycle[0]]
        pairs.append((meridian, then(longitude, power(meridian, -twists))))
    return pairs


def strand_at(braid: Braid, number: int, position: int) -> int:
    """The place at the top of the strand that stands at a position before a letter."""
    for letter in reversed(braid.word[:number]):
        i = abs(letter) - 1
        if position in (i, i + 1):
            position = 2 * i + 1 - position
    return position


def component_cycles(braid: Braid) -> list[list[int]]:
    """The places at the top of each component's strands, in the order in which one meets them."""
    end = {strand_at(braid, len(braid.word), place): place for place in range(braid.strands)}
    cycles: list[list[int]] = []
    for start in range(braid.strands):
        if not any(start in cycle for cycle in cycles):
            cycle = [start]
            while end[cycle[-1]] != start:
                cycle.append(end[cycle[-1]])
            cycles.append(cycle)
    return cycles


def sublink_braids(braid: Braid, count: int) -> list[Braid]:
    """The braids of the sublinks with so many components."""
    result = []
    for cycles in combinations(component_cycles(braid), count):
        kept = sorted(place for cycle in cycles for place in cycle)
        order, word = list(range(braid.strands)), []
        for letter in braid.word:
            i = abs(letter) - 1
            if order[i] in kept and order[i + 1] in kept:
                rank = [place for place in order if place in kept].index(order[i]) + 1
                word.append(rank if letter > 0 else -rank)
            order[i], order[i + 1] = order[i + 1], order[i]
        result.append(Braid(word, strands=len(kept)))
    return result


def seifert_matrix(braid: Braid) -> Any:
    """A Seifert matrix of a connected surface."""
    missing = set(range(1, braid.strands)) - {abs(letter) for letter in braid.word}
    word = (*braid.word, *(letter for i in missing for letter in (i, -i)))
    form = verify.seifert_form(verify.Braid(braid.strands, word), verify.Work())
    matrix = np.zeros((len(form), len(form)))
    for i, row in enumerate(form):
        for j, entry in row.items():
            matrix[i, j] = entry
    return matrix


def levine_tristram(braid: Braid, order: int, power: int) -> list[int] | None:
    """Signature from eigenvalues, nullity from Burau's matrix; both with a gap around zero."""
    if sympy.gcd(order, power) != 1 or power > order:
        return None
    root = cmath.exp(2j * cmath.pi * power / order)
    matrix = seifert_matrix(braid)
    hermitian = (1 - root) * matrix + (1 - root.conjugate()) * matrix.T
    eigenvalues = np.linalg.eigvalsh(hermitian)
    values = np.linalg.svd(burau_at(braid, root) - np.eye(braid.strands), compute_uv=False)
    zero = [value for value in (*abs(eigenvalues), *values) if 1e-9 < value < 1e-6]
    assert not zero, "eigenvalues too near to zero for this route"
    nullity = int(sum(values < 1e-9)) - 1
    assert nullity == int(sum(abs(eigenvalues) < 1e-9))
    return [int(sum(eigenvalues > 1e-9) - sum(eigenvalues < -1e-9)), nullity]


def burau_at(braid: Braid, t: complex) -> Any:
    """The matrix of a' = t a + (1 - t) b at a letter i, b' = b / t + (1 - 1 / t) a at -i."""
    matrix = np.eye(braid.strands, dtype=complex)
    for letter in braid.word:
        i = abs(letter) - 1
        a, b = matrix[i].copy(), matrix[i + 1].copy()
        under = t * a + (1 - t) * b if letter > 0 else b / t + (1 - 1 / t) * a
        matrix[i], matrix[i + 1] = (b, under) if letter > 0 else (under, a)
    return matrix


def alexander_module(braid: Braid, prime: int) -> list[list[int]] | None:
    """Quotients of the gcds of minors of Burau's matrix less 1, without one factor of zero.

    Polynomials are as sympy's functions for finite fields have them, highest power first.
    """
    if not sympy.isprime(prime):
        return None
    if braid.strands > MAX_MINOR:
        raise TooLargeError
    matrix, size = burau_less_one(braid, prime), braid.strands
    ideals = [[ZZ(1)]]
    minors = {((), ()): [ZZ(1)]}
    for order in range(1, size + 1):
        minors = {
            (rows, columns): expanded(matrix, minors, rows, columns, prime)
            for rows in combinations(range(size), order)
            for columns in combinations(range(size), order)
        }
        total: list[Any] = []
        for minor in minors.values():
            total = tools.gf_gcd(total, minor, prime, ZZ)
        ideals.append(total)
    factors = []
    for one, other in pairwise(ideals):
        factor = [int(c) for c in reversed(tools.gf_quo(other, one, prime, ZZ) if other else [])]
        while factor and factor[0] == 0:
            factor.pop(0)
        if len(factor) != 1:
            factors.append(factor)  # gcds and their quotients have leading coefficient 1
    return factors[:-1]  # the last is zero, for the rows of Burau's matrix sum to 1


def burau_less_one(braid: Braid, prime: int) -> list[list[Any]]:
    """Burau's matrix less 1, multiplied by t for each negative letter."""
    one, t, difference = [ZZ(1)], [ZZ(1), ZZ(0)], [ZZ(prime - 1), ZZ(1)]  # 1, t, 1 - t
    size = braid.strands

    def combined(*parts: tuple[Any, Any]) -> Any:
        rows = [[tools.gf_mul(c, entry, prime, ZZ) for entry in row] for c, row in parts]
        total = rows[0]
        for row in rows[1:]:
            pairs = zip(total, row, strict=True)
            total = [tools.gf_add(x, y, prime, ZZ) for x, y in pairs]
        return total

    matrix = [[one if i == j else [] for j in range(size)] for i in range(size)]
    shift = one
    for letter in braid.word:
        i = abs(letter) - 1
        a, b = matrix[i], matrix[i + 1]
        if letter > 0:
            matrix[i], matrix[i + 1] = b, combined((t, a), (difference, b))
        else:
            matrix = [combined((t, row)) for row in matrix]
            minus = tools.gf_neg(difference, prime, ZZ)
            matrix[i], matrix[i + 1] = combined((one, b), (minus, a)), combined((t, a))
            shift = tools.gf_mul(shift, t, prime, ZZ)
    for i in range(size):
        matrix[i][i] = tools.gf_sub(matrix[i][i], shift, prime, ZZ)
    return matrix


def expanded(matrix: Any, minors: Any, rows: Any, columns: Any, prime: int) -> Any:
    """A minor from those of one row less, by Laplace's expansion along the last row."""
    total: list[Any] = []
    for place, column in enumerate(columns):
        rest = minors[rows[:-1], columns[:place] + columns[place + 1 :]]
        term = tools.gf_mul(matrix[rows[-1]][column], rest, prime, ZZ)
        odd = (len(columns) - 1 - place) % 2
        total = (tools.gf_sub if odd else tools.gf_add)(total, term, prime, ZZ)
    return total


def cyclic_word(word: Any) -> list[int]:
    """Exponent sum and cyclic word in Z_2 * Z_3, by rewriting text until nothing changes."""
    text = "".join({1: "Ba", -1: "ab", 2: "aB", -2: "ba"}[letter] for letter in word)
    for _ in range(4 * len(text) + 4):
        for old, new in (("aa", ""), ("bB", ""), ("Bb", ""), ("bb", "B"), ("BB", "b")):
            text = text.replace(old, new)
        if len(text) > 1 and (text[0] == "a") == (text[-1] == "a"):
            text = text[1:] + text[0]
    values = {"a": 0, "b": 1, "B": -1}
    letters = [values[c] for c in text]
    rotations = [letters[k:] + letters[:k] for k in range(len(letters))] or [[]]
    return [sum(1 if letter > 0 else -1 for letter in word), *min(rotations)]


def word_of(*powers: tuple[int, int]) -> tuple[int, ...]:
    """The word of a product of powers (generator, exponent)."""
    return tuple(i if k > 0 else -i for i, k in powers for _ in range(abs(k)))


@cache
def families(largest: int = 8) -> dict[tuple[int, ...], list[list[int]]]:
    """For each class of a family with exponents up to ``largest``, all classes of its link."""
    span = range(-largest, largest + 1)
    members = [[(1, 2), (1, -2), (-1, -2)]]
    members += [
        [word_of((1, k), (2, s)) for s in (1, -1)] for k in range(-30, 31) if k not in (1, -1)
    ]
    members += [
        [word_of((1, u), (2, v), (1, w), (2, e)), word_of((1, w), (2, v), (1, u), (2, e))]
        for u, v, w, e in product(span, span, span, (1, -1))
    ]
    links: dict[tuple[int, ...], list[list[int]]] = {}
    for words in members:
        classes = [tuple(cyclic_word(word)) for word in words]
        together = {tuple(c) for one in classes for c in links.get(one, [one])}
        links.update({one: sorted(map(list, together)) for one in together})
    return links


def three_braid(braid: Braid) -> list[list[int]] | None:
    """All classes, for words of up to eight letters: no exponent of theirs is above eight."""
    if braid.strands > 3:
        return None
    own = cyclic_word((*braid.word, *range(braid.strands, 3)))
    return families().get(tuple(own), [own])
