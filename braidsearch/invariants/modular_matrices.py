"""Invariant factors of matrices of Laurent polynomials over the field of p elements."""

from __future__ import annotations

import numpy as np

from braidsearch.invariants.modular_polynomials import (
    IntArray,
    QuotientRing,
    divide_modulo,
    greatest_common_divisor,
    monic,
    multiply_modulo,
    split_repeated,
    trim,
    without_powers_of_t,
)


def invariant_factors(matrix: IntArray, low: int, prime: int) -> list[list[int]]:
    """The invariant factors over F[t, 1/t] of a square matrix, shape (m, m, width), units left out.

    Place k of an entry holds the coefficient of t^(k - low), a residue modulo the prime; every
    minor, of any size, has its exponents between -low and width - 1 - low. Each factor comes as
    its coefficients from the constant term, not 0, to the leading one, 1; [] is zero. Each divides
    the next.

    With D a minor of the largest size r that has one not zero, every torsion element of the
    cokernel is killed by D. So the cokernel modulo D, where degrees stay below that of D, has the
    same factors, but D itself for each of the m - r free summands.
    """
    rank, minor = largest_minor(matrix, low, prime)
    modulus = monic(without_powers_of_t(minor), prime)
    free = len(matrix) - rank
    single = modulus[:0]
    if not free:
        single, modulus = split_repeated(modulus, prime)
    torsion: list[IntArray] = []
    if len(modulus) > 1:
        divisors = _diagonal_divisors(matrix, QuotientRing(modulus, prime))
        torsion = divisor_chain(divisors, prime)[:rank]
    if len(single) > 1:
        last = torsion.pop() if torsion else single[-1:]
        torsion.append(multiply_modulo(last, single, prime))
    factors = [factor.tolist() for factor in torsion if len(factor) > 1]
    return factors + [[] for _ in range(free)]


def largest_minor(matrix: IntArray, low: int, prime: int) -> tuple[int, IntArray]:
    """The rank of the matrix, and a minor of that size that is not zero, up to a power of t.

    Every entry met is a minor of the matrix, and every division is exact (Bareiss, Sylvester's
    identity and multistep integer-preserving Gaussian elimination, 1968), so the bound on the
    exponents of minors holds throughout.
    """
    rest, rank = matrix, 0
    previous = np.zeros(matrix.shape[2], dtype=np.int64)
    previous[low] = 1
    while rest.any():
        row, column = _shortest_entry(rest)
        pivot = rest[row, column]
        rows = np.delete(rest, row, axis=0)
        others, in_column = np.delete(rows, column, axis=1), rows[:, column]
        in_row = np.delete(rest[row], column, axis=0)
        crossed = _products(others, pivot) - _products(in_row, in_column[:, None])
        rest = _exact_quotients(crossed % prime, previous, prime)
        previous, rank = pivot, rank + 1
    return rank, trim(previous)


def _shortest_entry(entries: IntArray) -> tuple[int, int]:
    """The place of an entry that is not zero with the least difference of exponents."""
    is_term = entries != 0
    first, after_last = is_term.argmax(axis=2), is_term[:, :, ::-1].argmax(axis=2)
    gaps = np.where(is_term.any(axis=2), first + after_last, -1)
    row, column = divmod(int(gaps.argmax()), gaps.shape[1])
    return row, column


def _products(left: IntArray, right: IntArray) -> IntArray:
    """Products of polynomials along the last axis, the other axes broadcast; not reduced."""
    shape = np.broadcast_shapes(left.shape[:-1], right.shape[:-1])
    width = left.shape[-1]
    result = np.zeros((*shape, 2 * width - 1), dtype=np.int64)
    for place in np.flatnonzero(right.reshape(-1, width).any(axis=0)):
        result[..., place : place + width] += right[..., place, None] * left
    return result


def _exact_quotients(products: IntArray, divisor: IntArray, prime: int) -> IntArray:
    """The polynomials whose products with the divisor these are, by division from the low end."""
    width = len(divisor)
    start = int(np.flatnonzero(divisor)[0])
    inverse = pow(int(divisor[start]), -1, prime)
    tail = divisor[start:]
    result = np.zeros((*products.shape[:-1], width), dtype=np.int64)
    for place in range(width):
        factor = products[..., place + start] % prime * inverse % prime
        result[..., place] = factor
        products[..., place + start : place + width] -= factor[..., None] * tail
    return result


def divisor_chain(divisors: list[IntArray], prime: int) -> list[IntArray]:
    """The divisors, each dividing the next, with the same sum of cyclic modules F[t] / g.

    F[t] / a + F[t] / b is F[t] / gcd + F[t] / lcm.
    """
    chain = list(divisors)
    for first in range(len(chain)):
        for second in range(first + 1, len(chain)):
            common = greatest_common_divisor(chain[first], chain[second], prime)
            cofactor = divide_modulo(chain[second], common, prime)[0]
            chain[second] = multiply_modulo(chain[first], cofactor, prime)
            chain[first] = common
    return chain


def _diagonal_divisors(matrix: IntArray, ring: QuotientRing) -> list[IntArray]:
    """Divisors g of the modulus D: the cokernel of the matrix modulo D is the sum of F[t] / g."""
    rest = ring.reduce(matrix)
    divisors = []
    while len(rest):
        row, column = _best_pivot(rest, ring)
        rest[[0, row]] = rest[[row, 0]]
        rest[:, [0, column]] = rest[:, [column, 0]]
        divisor, rest = _split_off(rest, ring)
        divisors.append(divisor)
    return divisors


def _best_pivot(entries: IntArray, ring: QuotientRing) -> tuple[int, int]:
    """The place of an entry that has the least in common with the modulus."""
    best, least = (0, 0), ring.degree + 2
    for row, column in np.ndindex(entries.shape[:2]):
        length = len(ring.common_divisor(entries[row, column]))
        if length < least:
            best, least = (row, column), length
        if length == 1:
            break
    return best


def _split_off(entries: IntArray, ring: QuotientRing) -> tuple[IntArray, IntArray]:
    """Bring first row and column to zero by unimodular steps; the pivot's divisor, and the rest.

    Where the pivot does not divide an entry modulo D, a step puts their greatest common divisor
    in its place. That has less in common with D, so this ends.
    """
    while True:
        for row in range(1, len(entries)):
            if entries[row, 0].any():
                _clear_entry(entries, row, ring)
        divisor = ring.common_divisor(entries[0, 0])
        if all(ring.divides(divisor, entry) for entry in entries[0, 1:]):
            # The column is zero, so clearing the row would change nothing else.
            return divisor, entries[1:, 1:]
        entries = entries.transpose(1, 0, 2).copy()


def _clear_entry(entries: IntArray, row: int, ring: QuotientRing) -> None:
    """Bring the first entry of a row to zero by a step with the first row."""
    pivot, entry = entries[0, 0], entries[row, 0]
    quotient = ring.quotient(entry, pivot)
    if quotient is not None:
        entries[row] = (entries[row] - ring.multiply(entries[0], quotient)) % ring.prime
        return
    (a, b), (c, d) = ring.unimodular_step(pivot, entry)
    upper, lower = entries[0].copy(), entries[row].copy()
    entries[0] = (ring.multiply(upper, a) + ring.multiply(lower, b)) % ring.prime
    entries[row] = (ring.multiply(upper, c) + ring.multiply(lower, d)) % ring.prime
