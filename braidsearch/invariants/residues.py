"""Arithmetic modulo primes of 31 bits: the primes, transforms, determinants, recombination."""

from functools import lru_cache
from itertools import count

import numpy as np

from braidsearch.invariants.wide_integers import IntArray

_PRIME_BOUND = 2**31
"""Products of two residues stay below 2^62, so they fit in 64 bits."""


def transform_length(at_least: int) -> int:
    """The least length 2^a or 3 * 2^a that is not below ``at_least``."""
    power = 1 << max(at_least - 1, 0).bit_length()
    shorter = power // 4 * 3
    return shorter if shorter >= max(at_least, 3) else power


@lru_cache(maxsize=1024)
def prime_modulus(order: int, number: int) -> tuple[int, int]:
    """The prime p = 1 mod ``order`` with this number, counted down from 2^31, and a root.

    The root has exactly the multiplicative order ``order``, which is 2^a or 3 * 2^a.
    """
    before = _PRIME_BOUND - 1 if number == 0 else prime_modulus(order, number - 1)[0] - 1
    candidate = (before - 1) // order * order + 1
    while not is_prime(candidate):
        candidate -= order
    return candidate, _root_of_order(order, candidate)


def is_prime(number: int) -> bool:
    """Whether a number below 3,215,031,751 is prime.

    Four strong-pseudoprime tests decide up to there (Pomerance, Selfridge, Wagstaff, The
    pseudoprimes to 25 * 10^9, 1980).
    """
    if number < 8 or number % 2 == 0:
        return number in (2, 3, 5, 7)
    odd, twos = number - 1, 0
    while odd % 2 == 0:
        odd, twos = odd // 2, twos + 1
    return all(_is_strong_probable_prime(number, base, odd, twos) for base in (2, 3, 5, 7))


def _is_strong_probable_prime(number: int, base: int, odd: int, twos: int) -> bool:
    power = pow(base, odd, number)
    if power in (1, number - 1):
        return True
    for _ in range(twos - 1):
        power = power * power % number
        if power == number - 1:
            return True
    return False


def _root_of_order(order: int, prime: int) -> int:
    for base in count(2):
        root = pow(base, (prime - 1) // order, prime)
        halved = order % 2 == 0 and pow(root, order // 2, prime) == 1
        thirded = order % 3 == 0 and pow(root, order // 3, prime) == 1
        if not halved and not thirded:
            return root
    raise AssertionError("count() does not end")


def reduce_modulo(values: IntArray, prime: int) -> IntArray:
    """The residues 0 .. prime - 1; floor division by one number is several times faster than %."""
    return values - values // prime * prime


def powers(root: int, length: int, prime: int) -> IntArray:
    """The residues 1, root, root^2, ... as an array of this length."""
    result = np.ones(length, dtype=np.int64)
    known = 1
    while known < length:
        step = pow(root, known, prime)
        more = min(known, length - known)
        result[known : known + more] = result[:more] * step % prime
        known += more
    return result


def transform(values: IntArray, root: int, prime: int) -> IntArray:
    """The sums over j of values[..., j] * root^(j k), for all k, modulo the prime.

    ``root`` has the order of the last axis's length. Even and odd places are transformed apart
    (Cooley, Tukey, An algorithm for the machine calculation of complex Fourier series, 1965).
    """
    length = values.shape[-1]
    if length <= 3:
        place = np.arange(length)
        matrix = powers(root, length, prime)[np.outer(place, place) % length]
        return reduce_modulo((values[..., None, :] * matrix % prime).sum(axis=-1), prime)
    halves = np.stack([values[..., 0::2], values[..., 1::2]])
    even, odd = transform(halves, root * root % prime, prime)
    twisted = reduce_modulo(odd * powers(root, length // 2, prime), prime)
    return reduce_modulo(np.concatenate([even + twisted, even - twisted], axis=-1), prime)


def inverse_transform(values: IntArray, root: int, prime: int) -> IntArray:
    """The array whose ``transform`` is ``values``."""
    spread = transform(values, pow(root, -1, prime), prime)
    return reduce_modulo(spread * pow(len(values), -1, prime), prime)


def determinants(matrices: IntArray, prime: int) -> IntArray:
    """The determinants modulo the prime of matrices given as an array of shape (m, m, count)."""
    rest = reduce_modulo(matrices, prime)
    result = np.ones(rest.shape[2], dtype=np.int64)
    while len(rest):
        rest, pivot = _eliminate_column(rest, prime)
        result = reduce_modulo(result * pivot, prime)
    return result


def _eliminate_column(matrices: IntArray, prime: int) -> tuple[IntArray, IntArray]:
    """The first pivots, signed, and what elimination leaves of the other rows and columns.

    Where a first column is zero the pivot is 0, and with it the determinant.
    """
    which = np.arange(matrices.shape[2])
    place = np.argmax(matrices[:, 0] != 0, axis=0)
    pivot_rows = matrices[place, :, which].T
    rest = matrices[1:].copy()
    moved = np.flatnonzero(place)
    rest[place[moved] - 1, :, moved] = matrices[0][:, moved].T
    pivot = pivot_rows[0]
    scaled = reduce_modulo(rest[:, 0] * _inverses(pivot, prime), prime)
    rest = reduce_modulo(rest[:, 1:] - scaled[:, None] * pivot_rows[1:], prime)
    return rest, reduce_modulo(np.where(place > 0, -pivot, pivot), prime)


def _inverses(values: IntArray, prime: int) -> IntArray:
    """The inverses modulo the prime, 0 for 0, by Fermat's theorem."""
    result = np.ones_like(values)
    for bit in bin(prime - 2)[2:]:
        result = reduce_modulo(result * result, prime)
        if bit == "1":
            result = reduce_modulo(result * values, prime)
    return result


def combine_residues(residues: list[IntArray], primes: list[int]) -> list[int]:
    """The integers below half the product of the primes, in absolute value, with these residues.

    Chinese remainder theorem, one prime at a time.
    """
    values = [0] * len(residues[0])
    modulus = 1
    for residue, prime in zip(residues, primes, strict=True):
        inverse = pow(modulus, -1, prime)
        values = [
            value + modulus * ((wanted - value) * inverse % prime)
            for value, wanted in zip(values, residue.tolist(), strict=True)
        ]
        modulus *= prime
    return [value - modulus if 2 * value > modulus else value for value in values]
