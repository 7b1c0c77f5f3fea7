"""The Alexander module of a closed braid over a prime field, from the Burau matrix."""

from __future__ import annotations

import numpy as np

from braidsearch.errors import CapacityError, InputError
from braidsearch.invariants.modular_matrices import invariant_factors
from braidsearch.invariants.modular_polynomials import IntArray
from braidsearch.invariants.residues import is_prime
from braidsearch.words.braid import Braid
from braidsearch.words.reduction import cyclic_reduce

LARGEST_PRIME = 1000
_LARGEST_COST = 3e3


def alexander_module_factors(braid: Braid, prime: int) -> list[list[int]]:
    """The invariant factors of the Alexander module with coefficients modulo a prime.

    The module is H_1 of the infinite cyclic cover by the total linking number, with coefficients
    in the field F of p elements, over the principal ideal domain F[t, 1/t]. Each factor that is no
    unit is a list of coefficients 0 .. p - 1 from the constant term on, which is not 0, to the
    leading one, which is 1; [] stands for zero, a free summand. Each divides the next. The unknot
    has [], the unlink of two circles [[]], both trefoils [[1, p - 1, 1]].

    The module knows the numbers of linear colourings with p^k colours (Fox, Metacyclic
    invariants of knots and links, 1970), and it tells apart knots with equal polynomials
    (Kanenobu, Infinitely many knots with the same polynomial invariant, 1986). It is the same for
    the link's mirror image and reverse: a Seifert matrix V presents it as V - t V^T, the
    transpose of which has the same factors.

    Raises InputError unless ``prime`` is a prime below 1000, and CapacityError where the
    elimination would be too long.
    """
    if not (2 <= prime <= LARGEST_PRIME and is_prime(prime)):
        raise InputError(f"modulus {prime}: expected a prime from 2 to {LARGEST_PRIME}")
    if not is_applicable(braid, prime):
        raise CapacityError(
            f"the Alexander module of {len(braid)} letters on {braid.strands} strands: "
            "expected a shorter word or fewer strands"
        )
    matrix, low = burau_less_one(cyclic_reduce(braid)[0], prime)
    # All columns of B - 1 add up to zero, and its rows do with weights 1, 1/t, 1/t^2, ...: leaving
    # one of each out leaves the module without its one free summand from the choice of base point.
    return invariant_factors(matrix[1:, 1:], low, prime)


def estimated_cost(braid: Braid, prime: int) -> float:
    """Seconds that ``alexander_module_factors`` needs, to within a factor of a few."""
    letters, strands = len(cyclic_reduce(braid)[0]), braid.strands
    arrays = 2e-5 * strands * letters + 1e-7 * strands**3 * letters
    entries = 2e-9 * strands**2 * letters**2
    return 1e-4 + 1e-7 * len(braid) + (arrays + entries) * (1.0 if prime < 100 else 1.3)


def is_applicable(braid: Braid, prime: int) -> bool:
    """Whether ``alexander_module_factors`` answers for this braid modulo this prime."""
    return prime <= LARGEST_PRIME and estimated_cost(braid, prime) <= _LARGEST_COST


def burau_less_one(braid: Braid, prime: int) -> tuple[IntArray, int]:
    """The matrix B - 1 modulo the prime, shape (n, n, N + 1), and the power of t at place ``low``.

    Row i of B is the colour at the bottom of the strand at position i, as a combination of those
    at the top: a letter +i takes (a, b) at positions i, i + 1 to (b, t a + (1 - t) b), the
    abelianised action on meridians (a, b) -> (b, b^-1 a b), and -i undoes that (Burau, Ueber
    Zopfgruppen und gleichsinnig verdrillte Verkettungen, 1936). With P positive and M negative
    letters all exponents lie between -M and P; place k holds the coefficient of t^(k - M), and
    M is what is returned beside the matrix.
    """
    size, width = braid.strands, len(braid) + 1
    low = sum(1 for letter in braid.word if letter < 0)
    colours = [np.zeros((size, width), dtype=np.int64) for _ in range(size)]
    for position, colour in enumerate(colours):
        colour[position, low] = 1
    for letter in braid.word:
        index = abs(letter)
        left, right = colours[index - 1], colours[index]
        if letter > 0:
            colours[index - 1 : index + 1] = [right, _mix(left, right, 1, prime)]
        else:
            colours[index - 1 : index + 1] = [_mix(right, left, -1, prime), left]
    for position, colour in enumerate(colours):
        colour[position, low] = (colour[position, low] - 1) % prime
    return np.stack(colours), low


def _mix(under: IntArray, over: IntArray, power: int, prime: int) -> IntArray:
    """t^power under + (1 - t^power) over."""
    difference = under - over
    mixed = over.copy()
    if power > 0:
        mixed[:, 1:] += difference[:, :-1]
    else:
        mixed[:, :-1] += difference[:, 1:]
    mixed %= prime
    return mixed
