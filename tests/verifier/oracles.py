"""Slow second routes to the invariants and to equality, from which the verifier is far.

Alexander polynomials by Burau's matrices, signatures by a Goeritz matrix, Jones by listing all
smoothings, HOMFLY-PT by skein resolution, equality by Artin's action. None of these is a method
of the verifier.
"""

from __future__ import annotations

from itertools import pairwise
from typing import Any

import sympy

from braidsearch.words import Braid
from tests.artin_action import artin_images
from tests.invariants import oracles
from tests.verifier import finer_oracles

_T = sympy.Symbol("t")


def is_equal(strands: int, first: Any, second: Any) -> bool:
    """Whether two words act in the same way on the free group (Artin, Theory of braids, 1947)."""
    return artin_images(Braid(first, strands)) == artin_images(Braid(second, strands))


def value(name: str, strands: int, word: Any, **parameters: Any) -> Any:
    """The invariant of the closure, in the form of certificates; None where it is not defined."""
    braid = Braid(word, strands)
    if name == "sublinks":
        inner, count = parameters.pop("invariant"), parameters.pop("components")
        parts = finer_oracles.sublink_braids(braid, count)
        values = [value(inner, part.strands, part.word, **parameters) for part in parts]
        return None if None in values else sorted(values)
    if name in ("colouring", "levine-tristram", "alexander-module", "three-braid"):
        return getattr(finer_oracles, name.replace("-", "_"))(braid, **parameters)
    if name == "components":
        return oracles.component_count(braid)
    if name == "linking-numbers":
        return oracles.linking_numbers(braid)
    if name == "linking-sums":
        return oracles.linking_sums(braid)
    if name == "alexander":
        return alexander_by_burau(braid)
    if name == "jones":
        return oracles.jones_by_states(braid)
    if name == "homfly":
        return [list(term) for term in oracles.homfly_by_skein(braid)]
    if name == "signature":
        return signature_by_goeritz(braid)
    raise ValueError(name)


def alexander_by_burau(braid: Braid) -> list[list[int]]:
    """det(1 - B) (1 - t) / (1 - t^n), B the reduced Burau matrix (Burau, 1935)."""
    size = braid.strands - 1
    product = sympy.eye(size)
    for letter in braid.word:
        product = product * _burau(abs(letter) - 1, size, letter > 0)
    determinant = sympy.together((sympy.eye(size) - product).det(method="berkowitz"))
    numerator, denominator = sympy.fraction(sympy.cancel(determinant))
    power = sympy.Poly(denominator, _T)  # a power of t, which is a unit
    assert len(power.terms()) == 1
    circle = sympy.Poly(sum(_T**k for k in range(braid.strands)), _T)
    quotient, remainder = sympy.div(sympy.Poly(numerator, _T), circle)
    assert remainder.is_zero
    terms = sorted((exponent, int(c)) for (exponent,), c in quotient.terms() if c)
    if not terms:
        return []
    lowest, sign = terms[0][0], 1 if terms[0][1] > 0 else -1
    return [[exponent - lowest, sign * c] for exponent, c in terms]


def _burau(i: int, size: int, is_positive: bool) -> sympy.Matrix:
    matrix = sympy.eye(size)
    matrix[i, i] = -_T if is_positive else -1 / _T
    if i > 0:
        matrix[i, i - 1] = _T if is_positive else 1
    if i + 1 < size:
        matrix[i, i + 1] = 1 if is_positive else 1 / _T
    return matrix


def signature_by_goeritz(braid: Braid) -> int:
    """The signature of a Goeritz matrix, corrected at the crossings of the second type.

    The theorem is Gordon's and Litherland's (On the signature of a link, 1978), for the surface
    that covers the regions of the columns 0, 2, 4, ... of the closed braid's diagram, a region
    lying between two successive letters of a column, with a half twisted band at each crossing.
    The matrix is the weighted Laplacian of the other, white regions, which meet at crossings. At
    letters of odd columns the band runs across the braid and is oriented as the link is; at
    letters of even columns it runs along the braid, and the crossing is of the second type.
    """
    used = [0] * (braid.strands + 1)
    for letter in braid.word:
        used[abs(letter)] += 1
    passed = [0] * (braid.strands + 1)
    edges = []
    correction = 0
    for letter in braid.word:
        column, sign = abs(letter), 1 if letter > 0 else -1
        above = (column, passed[column] % used[column])
        passed[column] += 1
        if column % 2:
            edges.append((above, (column, passed[column] % used[column]), -sign))
        else:
            sides = (column - 1, column + 1)
            left, right = ((side, passed[side] % max(1, used[side])) for side in sides)
            edges.append((left, right, sign))
            correction += sign
    return _laplacian_signature(edges) - correction


def _laplacian_signature(edges: list[tuple[Any, Any, int]]) -> int:
    """The signature of a weighted Laplacian, by Descartes' rule: all its roots are real."""
    number = {}
    for one, other, _ in edges:
        number.setdefault(one, len(number))
        number.setdefault(other, len(number))
    if not number:
        return 0
    matrix = sympy.zeros(len(number), len(number))
    for one, other, weight in edges:
        i, j = number[one], number[other]
        for row, column, entry in ((i, i, 1), (j, j, 1), (i, j, -1), (j, i, -1)):
            matrix[row, column] += weight * entry
    coefficients = [int(c) for c in matrix.charpoly().all_coeffs()]
    places = [place for place, c in enumerate(coefficients) if c]
    positive = sum(coefficients[i] * coefficients[j] < 0 for i, j in pairwise(places))
    return 2 * positive - places[-1]  # the last place is the number of roots other than zero
