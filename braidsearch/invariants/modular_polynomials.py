"""Polynomials over the field of p elements, and their residues modulo one of them."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

IntArray = NDArray[np.int64]


def trim(coefficients: IntArray) -> IntArray:
    """The polynomial without leading zeros; coefficients count from the constant term.

    A polynomial is an array of residues 0 .. p - 1 whose last entry is not 0; the empty array is
    zero.
    """
    used = np.flatnonzero(coefficients)
    return coefficients[: used[-1] + 1 if len(used) else 0]


def multiply_modulo(left: IntArray, right: IntArray, prime: int) -> IntArray:
    """The product of two polynomials."""
    if not len(left) or not len(right):
        return left[:0]
    product: IntArray = np.convolve(left, right) % prime
    return product


def divide_modulo(left: IntArray, right: IntArray, prime: int) -> tuple[IntArray, IntArray]:
    """Quotient and remainder of a polynomial by another one, which is not zero."""
    degree = len(right) - 1
    if len(left) <= degree:
        return left[:0], left
    rest = left.copy()
    quotient = np.zeros(len(left) - degree, dtype=np.int64)
    inverse = pow(int(right[-1]), -1, prime)
    for place in range(len(quotient) - 1, -1, -1):
        factor = int(rest[place + degree]) * inverse % prime
        if factor:
            quotient[place] = factor
            window = rest[place : place + degree + 1]
            window -= factor * right
            window %= prime
    return quotient, trim(rest[:degree])


def monic(polynomial: IntArray, prime: int) -> IntArray:
    """The multiple by a constant with leading coefficient 1; zero for zero."""
    if not len(polynomial):
        return polynomial
    return polynomial * pow(int(polynomial[-1]), -1, prime) % prime


def greatest_common_divisor(left: IntArray, right: IntArray, prime: int) -> IntArray:
    """The monic polynomial that generates the ideal of both; zero if both are."""
    while len(right):
        left, right = right, divide_modulo(left, right, prime)[1]
    return monic(left, prime)


def bezout(left: IntArray, right: IntArray, prime: int) -> tuple[IntArray, IntArray, IntArray]:
    """(g, s, t) with g = s * left + t * right their monic greatest common divisor.

    Euclid's algorithm; ``left`` and ``right`` are not both zero.
    """
    one = np.ones(1, dtype=np.int64)
    rows = [(left, one, one[:0]), (right, one[:0], one)]
    while len(rows[1][0]):
        quotient, rest = divide_modulo(rows[0][0], rows[1][0], prime)
        combined = [
            subtract_modulo(old, multiply_modulo(quotient, new, prime), prime)
            for old, new in zip(rows[0][1:], rows[1][1:], strict=True)
        ]
        rows = [rows[1], (rest, combined[0], combined[1])]
    scale = pow(int(rows[0][0][-1]), -1, prime)
    divisor, first, second = (polynomial * scale % prime for polynomial in rows[0])
    return divisor, first, second


def subtract_modulo(left: IntArray, right: IntArray, prime: int) -> IntArray:
    """The difference of two polynomials."""
    result = np.zeros(max(len(left), len(right)), dtype=np.int64)
    result[: len(left)] = left
    result[: len(right)] -= right
    return trim(result % prime)


def without_powers_of_t(polynomial: IntArray) -> IntArray:
    """The polynomial divided by the power of t that it contains."""
    used = np.flatnonzero(polynomial)
    return polynomial[used[0] :] if len(used) else polynomial


def split_repeated(polynomial: IntArray, prime: int) -> tuple[IntArray, IntArray]:
    """The products of the powers of irreducibles that divide it once, and more than once.

    What divides it more than once divides its derivative too, in any characteristic. The
    polynomial is monic and not zero.
    """
    derivative = trim(np.arange(len(polynomial)) * polynomial % prime)[1:]
    common = greatest_common_divisor(polynomial, derivative, prime)
    single = polynomial
    while len(common) > 1:
        single = divide_modulo(single, common, prime)[0]
        common = greatest_common_divisor(single, common, prime)
    return single, divide_modulo(polynomial, single, prime)[0]


class QuotientRing:
    """The ring of polynomials modulo a monic one of positive degree, over the field of p elements.

    Its elements are arrays of exactly ``degree`` coefficients, so that whole rows of a matrix can
    be multiplied at once; sums below degree * p^2 fit in 64 bits.
    """

    def __init__(self, modulus: IntArray, prime: int) -> None:
        self.modulus = modulus
        self.prime = prime
        self.degree = len(modulus) - 1
        self._powers = self._reduced_powers(self.degree - 1)

    def _reduced_powers(self, count: int) -> IntArray:
        """The rows t^degree, t^(degree + 1), ... modulo the modulus."""
        rows = np.zeros((count, self.degree), dtype=np.int64)
        power = -self.modulus[:-1] % self.prime
        first = power
        for row in rows:
            row[:] = power
            carried = power[-1]
            power = np.concatenate([power[:0], [0], power[:-1]])
            power = (power + carried * first) % self.prime
        return rows

    def reduce(self, entries: IntArray) -> IntArray:
        """The residues of polynomials along the last axis, up to one common power of t."""
        missing = self.degree - entries.shape[-1]
        if missing > 0:
            return np.pad(entries, [(0, 0)] * (entries.ndim - 1) + [(0, missing)])
        rest = entries.copy()
        for place in range(entries.shape[-1] - 1, self.degree - 1, -1):
            window = rest[..., place - self.degree : place + 1]
            window -= window[..., -1:] * self.modulus
            window %= self.prime
        return rest[..., : self.degree].copy()

    def multiply(self, entries: IntArray, factor: IntArray) -> IntArray:
        """The products of elements, shape (..., degree), by one element."""
        shifted = np.concatenate([factor, np.zeros(self.degree, dtype=np.int64)])
        length = 2 * self.degree - 1
        table = np.tile(shifted, self.degree)[: self.degree * length]
        products = entries @ table.reshape(self.degree, length) % self.prime
        reduced = products[..., self.degree :] @ self._powers
        residues: IntArray = (products[..., : self.degree] + reduced) % self.prime
        return residues

    def common_divisor(self, element: IntArray) -> IntArray:
        """The monic greatest common divisor with the modulus; the modulus itself for zero."""
        return greatest_common_divisor(self.modulus, trim(element), self.prime)

    def divides(self, divisor: IntArray, element: IntArray) -> bool:
        """Whether a polynomial divides an element."""
        return not len(divide_modulo(trim(element), divisor, self.prime)[1])

    def quotient(self, element: IntArray, divisor: IntArray) -> IntArray | None:
        """Some element whose product with ``divisor`` is ``element``; None if there is none."""
        if not divisor.any():
            return None if element.any() else divisor
        common, inverse, _ = bezout(trim(divisor), self.modulus, self.prime)
        cofactor, rest = divide_modulo(trim(element), common, self.prime)
        if len(rest):
            return None
        return self.element(multiply_modulo(inverse, cofactor, self.prime))

    def element(self, polynomial: IntArray) -> IntArray:
        """The residue of one polynomial."""
        rest = divide_modulo(polynomial, self.modulus, self.prime)[1]
        return np.concatenate([rest, np.zeros(self.degree - len(rest), dtype=np.int64)])

    def unimodular_step(
        self, pivot: IntArray, entry: IntArray
    ) -> tuple[tuple[IntArray, IntArray], tuple[IntArray, IntArray]]:
        """A matrix with determinant 1 that takes (pivot, entry) to (greatest common divisor, 0)."""
        common, first, second = bezout(trim(pivot), trim(entry), self.prime)
        down = divide_modulo(trim(entry), common, self.prime)[0]
        across = divide_modulo(trim(pivot), common, self.prime)[0]
        return (
            (self.element(first), self.element(second)),
            (self.element(-down % self.prime), self.element(across)),
        )
