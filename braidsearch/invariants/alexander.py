"""The Alexander polynomial of a closed braid, from the Burau matrix modulo several primes."""

import numpy as np

from braidsearch.errors import CapacityError
from braidsearch.invariants.kauffman_states import state_count_bound
from braidsearch.invariants.laurent import (
    Polynomial,
    normalise_units,
    polynomial_from_coefficients,
    product,
)
from braidsearch.invariants.pieces import closure_pieces
from braidsearch.invariants.residues import (
    combine_residues,
    determinants,
    inverse_transform,
    powers,
    prime_modulus,
    reduce_modulo,
    transform_length,
)
from braidsearch.invariants.wide_integers import IntArray
from braidsearch.words.braid import Braid

_LARGEST_COST = 3e3
_BLOCK_ENTRIES = 1 << 22


def alexander_polynomial(braid: Braid) -> Polynomial:
    """The Alexander polynomial in one variable, as sorted terms [exponent, coefficient].

    Of the polynomials equal up to units, the one with lowest exponent 0 and positive lowest
    coefficient; [] for zero, as for every split link. The Hopf link has [[0, 1], [1, -1]].

    Raises CapacityError for words so long that the computation would take hours.
    """
    pieces = closure_pieces(braid)
    if pieces.splits:
        return []
    return normalise_units(product(map(_alexander_of_factor, pieces.factors)))


def estimated_cost(braid: Braid) -> float:
    """Seconds that ``alexander_polynomial`` needs, to within a factor of a few."""
    pieces = closure_pieces(braid)
    return 2e-5 + (0.0 if pieces.splits else sum(map(_factor_cost, pieces.factors)))


def is_applicable(braid: Braid) -> bool:
    """Whether ``alexander_polynomial`` answers for this braid."""
    pieces = closure_pieces(braid)
    return bool(pieces.splits) or all(map(_is_within_capacity, pieces.factors))


def _factor_cost(braid: Braid) -> float:
    letters, strands = len(braid), braid.strands
    primes = 1 + letters / 33
    points = 1 + letters / 2
    return primes * (1.5e-4 + 1e-5 * letters + 4e-9 * points * strands * (letters + strands**2))


def _is_within_capacity(braid: Braid) -> bool:
    return _factor_cost(braid) <= _LARGEST_COST


def _alexander_of_factor(braid: Braid) -> Polynomial:
    """The polynomial of a braid with a connected diagram, from its values at roots of unity.

    With n strands, N letters and D = N - n + 1, the discs and bands of the closed braid make a
    Seifert surface whose homology has rank D, so the polynomial has the D + 1 coefficients
    c_0 .. c_D, and c_(D-k) = c_k or -c_k, by the parity of the components (Seifert, Ueber das
    Geschlecht von Knoten, 1934). Their absolute values add up to at most the bound of
    ``state_count_bound``, so so many primes determine them that their product exceeds twice that.
    """
    if not _is_within_capacity(braid):
        raise CapacityError(
            f"the Alexander polynomial of {len(braid)} letters on {braid.strands} strands: "
            "expected a shorter word"
        )
    degree = len(braid) - braid.strands + 1
    length = transform_length(degree + 1)
    bound = 2 * state_count_bound(braid) + 1
    primes: list[int] = []
    residues: list[IntArray] = []
    modulus = 1
    while modulus <= bound:
        prime, root = prime_modulus(length, len(primes))
        values = _values_at_roots(braid, degree, length, prime, root)
        residues.append(inverse_transform(values, root, prime)[: degree + 1])
        primes.append(prime)
        modulus *= prime
    return polynomial_from_coefficients(combine_residues(residues, primes))


def _values_at_roots(braid: Braid, degree: int, length: int, prime: int, root: int) -> IntArray:
    """The values at 1, root, ..., root^(length - 1), of which symmetry gives the second half.

    F(1/t) = (-1)^(components - 1) t^-degree F(t).
    """
    points = powers(root, length, prime)
    needed = length // 2 + 1
    block = max(1, _BLOCK_ENTRIES // braid.strands**2)
    values = np.zeros(length, dtype=np.int64)
    for start in range(0, needed, block):
        chosen = np.arange(start, min(start + block, needed))
        minors = _burau_minors(braid, points[chosen], points[-chosen % length], prime)
        values[chosen] = minors * points[chosen * _negative_letters(braid) % length] % prime
    mirrored = np.arange(needed, length)
    sources = length - mirrored
    sign = -1 if braid.components % 2 == 0 else 1
    units = points[-sources * degree % length]
    values[mirrored] = sign * (values[sources] * units % prime) % prime
    return values


def _burau_minors(braid: Braid, points: IntArray, inverses: IntArray, prime: int) -> IntArray:
    """A first minor of the Burau matrix less 1 at the points, whose inverses are given too.

    The unreduced Burau matrix B (Burau, Ueber Zopfgruppen und gleichsinnig verdrillte
    Verkettungen, 1936) takes the colours (x, y) at a letter sigma_i to (x + t (y - x), x), and at
    its inverse to (y, y + (x - y) / t). B fixes the column (1, ..., 1) and the row
    (1, t, ..., t^(n-1)), so the minors of B - 1 without row r and some column are equal up to
    sign and the unit t^r. Without row 0 the minor is, up to sign, F(t) / t^m for m negative
    letters and the polynomial F with exponents 0 to N - n + 1: B(1/t) is conjugate to the
    transpose of the inverse (Squier, The Burau representation is unitary, 1984), whose
    determinant is a sign times t^(2m - N), so the minor's exponents lie symmetrically about
    (N - 2m - n + 1) / 2, and those of F about (N - n + 1) / 2.
    """

    def under(over: IntArray, colour: IntArray, unit: IntArray) -> IntArray:
        return reduce_modulo(over + unit * (colour - over), prime)

    colours = list(np.eye(braid.strands, dtype=np.int64)[:, 1:, None].repeat(len(points), axis=2))
    for letter in braid.word:
        index = abs(letter)
        left, right = colours[index - 1], colours[index]
        if letter > 0:
            colours[index - 1 : index + 1] = [under(left, right, points), left]
        else:
            colours[index - 1 : index + 1] = [right, under(right, left, inverses)]
    matrices = np.stack(colours[1:])
    diagonal = np.arange(braid.strands - 1)
    matrices[diagonal, diagonal] -= 1
    return determinants(matrices, prime)


def _negative_letters(braid: Braid) -> int:
    return sum(1 for letter in braid.word if letter < 0)
