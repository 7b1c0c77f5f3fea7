"""Second, slow implementations for signatures at roots of unity, modules and sublinks.

They start from Seifert matrices, from colourings tried one by one, or from lattice points, where
the package starts from regions of the diagram and from the Burau matrix. Polynomials modulo p are
sympy's.
"""

from __future__ import annotations

import cmath
from collections.abc import Sequence
from itertools import combinations, product
from math import gcd

import numpy as np
import sympy
from sympy.polys.matrices import DomainMatrix
from sympy.polys.matrices.normalforms import invariant_factors

from braidsearch.words import Braid
from tests.invariants.oracles import seifert_matrix, strand_paths

T = sympy.Symbol("t")


def connected_seifert_matrix(braid: Braid) -> sympy.Matrix:
    """The Seifert matrix after the letters i, -i for every generator i that does not occur."""
    missing = set(range(1, braid.strands)) - set(map(abs, braid.word))
    more = [letter for index in sorted(missing) for letter in (index, -index)]
    return seifert_matrix(Braid([*braid.word, *more], braid.strands))


def signature_of_seifert_matrix(
    matrix: Sequence[Sequence[int]], order: int, power: int
) -> list[int]:
    """[signature, nullity] of (1 - omega) V + (1 - conjugate) V^T by eigenvalues in floating point.

    An eigenvalue counts as zero below 1e-9; none may lie between that and 1e-6.
    """
    V = np.array(matrix, dtype=float).reshape(len(matrix), len(matrix))
    omega = cmath.exp(2j * cmath.pi * power / order)
    values = np.linalg.eigvalsh((1 - omega) * V + (1 - omega.conjugate()) * V.T)
    is_zero = abs(values) < 1e-9
    assert (is_zero | (abs(values) > 1e-6)).all(), values
    return [int((np.sign(values) * ~is_zero).sum()), int(is_zero.sum())]


def levine_tristram_by_seifert(braid: Braid, order: int, power: int) -> list[int]:
    """[signature, nullity] from the surface of discs and bands."""
    return signature_of_seifert_matrix(connected_seifert_matrix(braid).tolist(), order, power)


def levine_tristram_of_torus_link(p: int, q: int, order: int, power: int) -> list[int]:
    """[signature, nullity] of the positive torus link of type (p, q) by counting lattice points.

    Each i/p + j/q with 0 < i < p, 0 < j < q gives -1 if it lies between power/order and
    1 + power/order, 1 if it lies outside, and 1 to the nullity if it is one of the two
    (Litherland, Signatures of iterated torus knots, 1979; for links Brieskorn, Beispiele zur
    Differentialtopologie von Singularitaeten, 1966).
    """
    signature = nullity = 0
    for i, j in product(range(1, p), range(1, q)):
        place, low = (i * q + j * p) * order, power * p * q
        high = low + p * q * order
        if place in (low, high):
            nullity += 1
        else:
            signature += -1 if low < place < high else 1
    return [signature, nullity]


def module_by_minors(braid: Braid, prime: int) -> list[list[int]]:
    """The invariant factors of t V - V^T, as quotients of common divisors of its minors."""
    V = connected_seifert_matrix(braid)
    size = V.rows
    matrix = sympy.Matrix(size, size, lambda i, j: T * V[i, j] - V[j, i])
    previous, factors = _modular(sympy.Integer(1), prime), []
    for count in range(1, size + 1):
        common = _modular(sympy.Integer(0), prime)
        for rows in combinations(range(size), count):
            for columns in combinations(range(size), count):
                minor = matrix[list(rows), list(columns)].det(method="berkowitz")
                common = sympy.gcd(common, _modular(minor, prime))
        if common.is_zero:
            return factors + [[] for _ in range(size - count + 1)]
        factor = _without_units(sympy.quo(common, previous), prime)
        if len(factor) > 1:
            factors.append(factor)
        previous = common
    return factors


def module_by_sympy(matrix: Sequence[Sequence[int]], prime: int) -> list[list[int]]:
    """The invariant factors of t V - V^T for a Seifert matrix V, by sympy's Smith normal form."""
    ring = sympy.GF(prime)[T]
    t = ring.from_sympy(T)
    size = range(len(matrix))
    entries = [[t * ring(matrix[i][j]) - ring(matrix[j][i]) for j in size] for i in size]
    found = invariant_factors(DomainMatrix(entries, (len(matrix), len(matrix)), ring))
    factors = [_without_units(_modular(ring.to_sympy(factor), prime), prime) for factor in found]
    return [factor for factor in factors if len(factor) != 1]


def _modular(expression: sympy.Expr, prime: int) -> sympy.Poly:
    return sympy.Poly(expression, T, modulus=prime)


def _without_units(polynomial: sympy.Poly, prime: int) -> list[int]:
    """Coefficients from the first that is not zero; the leading one made 1."""
    coefficients = [int(c) % prime for c in reversed(polynomial.all_coeffs())]
    while coefficients and not coefficients[0]:
        coefficients.pop(0)
    scale = pow(coefficients[-1], -1, prime) if coefficients else 1
    return [c * scale % prime for c in coefficients]


def multiply_all(factors: list[list[int]], prime: int) -> list[int]:
    """The product of polynomials modulo the prime, coefficients from the constant term on."""
    result = [1]
    for factor in factors:
        terms = [0] * (len(result) + len(factor) - 1 if factor else 0)
        for i, c in enumerate(result if factor else []):
            for j, d in enumerate(factor):
                terms[i + j] = (terms[i + j] + c * d) % prime
        result = terms
    return result


def degree_in_common(factor: list[int], other: list[int], prime: int) -> int:
    """The degree of the greatest common divisor modulo the prime, by Euclid; [] is zero."""
    while factor:
        scale = pow(factor[-1], -1, prime)
        rest = list(other)
        while len(rest) >= len(factor):
            multiple, shift = rest[-1] * scale, len(rest) - len(factor)
            for place, c in enumerate(factor):
                rest[shift + place] = (rest[shift + place] - multiple * c) % prime
            while rest and not rest[-1]:
                rest.pop()
        factor, other = rest, factor
    return len(other) - 1


def direct_sum(factors: list[list[int]], prime: int) -> list[list[int]]:
    """The invariant factors of the sum of cyclic modules, by powers of irreducibles (sympy)."""
    torsion = [factor for factor in factors if factor]
    exponents: dict[sympy.Poly, list[int]] = {}
    for place, factor in enumerate(torsion):
        polynomial = sympy.Poly(factor[::-1], T, modulus=prime)
        for irreducible, power in polynomial.factor_list()[1]:
            exponents.setdefault(irreducible, [0] * len(torsion))[place] = power
    products = [sympy.Poly(1, T, modulus=prime) for _ in torsion]
    for irreducible, powers in exponents.items():
        for place, power in enumerate(sorted(powers)):
            products[place] *= irreducible**power
    chain = [_without_units(product, prime) for product in products]
    return [factor for factor in chain if len(factor) > 1] + [[]] * (len(factors) - len(torsion))


def count_linear_colourings(braid: Braid, modulus: list[int], prime: int) -> int:
    """How many ways there are to colour the strands by residues modulo a polynomial over F_p.

    A letter +i takes (a, b) to (b, t a + (1 - t) b), and -i back; every tuple at the top is tried.
    """
    degree = len(modulus) - 1
    elements = list(product(range(prime), repeat=degree))
    scale = pow(modulus[-1], -1, prime)
    lower = [-c * scale % prime for c in modulus[:-1]]

    def times_t(element: tuple[int, ...]) -> tuple[int, ...]:
        shifted = (0, *element[:-1])
        return tuple((c + element[-1] * d) % prime for c, d in zip(shifted, lower, strict=True))

    over_t = {times_t(element): element for element in elements}

    def mix(unit, under, over):  # unit * under + (1 - unit) * over
        difference = tuple((c - d) % prime for c, d in zip(under, over, strict=True))
        moved = times_t(difference) if unit > 0 else over_t[difference]
        return tuple((c + d) % prime for c, d in zip(over, moved, strict=True))

    count = 0
    for top in product(elements, repeat=braid.strands):
        colours = list(top)
        for letter in braid.word:
            index = abs(letter)
            a, b = colours[index - 1 : index + 1]
            colours[index - 1 : index + 1] = [b, mix(1, a, b)] if letter > 0 else [mix(-1, b, a), a]
        count += tuple(colours) == top
    return count


def with_full_twists(braid: Braid, place: int, count: int) -> Braid:
    """The closed braid whose letter at a place is 2 ``count`` + 1 half twists of its band.

    The letter is a half twisted band between two discs of a spanning surface. Two more discs
    stacked beyond all others and half twisted bands of the same sign to, between and from them,
    the first and last passing in front of the discs in between, make three half twists of it.
    """
    for _ in range(count):
        letter, strands = braid.word[place], braid.strands
        index, sign = abs(letter), 1 if letter > 0 else -1
        there = _band(index, strands + 1, sign)
        back = _band(index + 1, strands + 2, sign)
        chain = [*there, sign * (strands + 1), *back]
        word = [*braid.word[:place], *chain, *braid.word[place + 1 :]]
        braid = Braid(word, strands + 2)
        place += len(there)
    return braid


def _band(low: int, high: int, sign: int) -> list[int]:
    """The letters of a half twisted band between the discs ``low`` and ``high``."""
    way = list(range(high - 1, low, -1))
    return [*way, sign * low, *(-letter for letter in reversed(way))]


def linking_of_components(braid: Braid) -> list[list[int]]:
    """The symmetric matrix of linking numbers of the components, zeros on the diagonal.

    Signs of the crossings where the row's component goes over the column's.
    """
    paths = strand_paths(braid)
    over = {place: n for n, path in enumerate(paths) for place, is_over in path if is_over}
    under = {place: n for n, path in enumerate(paths) for place, is_over in path if not is_over}
    matrix = [[0] * len(paths) for _ in paths]
    for place, letter in enumerate(braid.word):
        if over[place] != under[place]:
            matrix[over[place]][under[place]] += 1 if letter > 0 else -1
    return matrix


def primitive_powers(order: int) -> list[int]:
    """The powers of exp(2 pi i / order) that have exactly this order."""
    return [power for power in range(1, order) if gcd(power, order) == 1]
