"""Arithmetic modulo primes, against sympy and the definitions."""

import numpy as np
import pytest
import sympy
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.invariants.residues import (
    combine_residues,
    determinants,
    inverse_transform,
    is_prime,
    prime_modulus,
    transform,
    transform_length,
)

LENGTHS = [1, 2, 3, 4, 6, 8, 12, 16, 48, 64]


@given(st.integers(0, 2**31))
def test_primes(number):
    """The four bases decide primality as sympy does."""
    assert is_prime(number) == sympy.isprime(number)


def test_small_numbers_and_strong_pseudoprimes():
    """All small numbers, and 2047, 1373653, 25326001: strong pseudoprimes to 1, 2, 3 bases."""
    assert [n for n in range(2000) if is_prime(n)] == list(sympy.primerange(2000))
    assert not any(map(is_prime, (2047, 1_373_653, 25_326_001)))


@pytest.mark.parametrize("length", LENGTHS)
def test_moduli(length):
    """The moduli are different primes of 31 bits with a root of exactly the order asked for."""
    found = [prime_modulus(length, number) for number in range(6)]
    assert len({prime for prime, _ in found}) == 6
    for prime, root in found:
        assert sympy.isprime(prime)
        assert 2**30 < prime < 2**31
        assert sympy.n_order(root, prime) == length


@given(st.integers(1, 5000))
def test_transform_lengths(number):
    """The length is the least of the form 2^a or 3 * 2^a that suffices."""
    allowed = sorted({2**a for a in range(15)} | {3 * 2**a for a in range(14)})
    assert transform_length(number) == next(length for length in allowed if length >= number)


@pytest.mark.parametrize("length", LENGTHS)
def test_transforms(length):
    """A transform is the values of the polynomial at the powers of the root, and invertible."""
    prime, root = prime_modulus(length, 1)
    values = np.random.default_rng(length).integers(0, prime, length)
    transformed = transform(values, root, prime)
    for k in range(length):
        point = pow(root, k, prime)
        wanted = sum(int(value) * pow(point, j, prime) for j, value in enumerate(values)) % prime
        assert transformed[k] == wanted
    assert np.array_equal(inverse_transform(transformed, root, prime), values)


@given(st.data(), st.integers(0, 5), st.sampled_from([2**31 - 1, 7]))
def test_determinants(data, size, prime):
    """Many determinants at once are sympy's, singular matrices and zero pivots among them."""
    entries = st.one_of(st.integers(0, 2), st.integers(0, prime - 1))
    matrices = [[[data.draw(entries) for _ in range(size)] for _ in range(size)] for _ in range(3)]
    stacked = np.array(matrices, dtype=np.int64).reshape(3, size, size).transpose(1, 2, 0)
    wanted = [
        int(sympy.Matrix(size, size, [c for row in m for c in row]).det()) % prime for m in matrices
    ]
    assert determinants(stacked, prime).tolist() == wanted


@given(st.lists(st.integers(-(2**91), 2**91), max_size=6))
def test_recombination(values):
    """Three primes of 31 bits determine every integer of up to 91 bits, negative ones too."""
    primes = [prime_modulus(8, number)[0] for number in range(3)]
    residues = [np.array([value % p for value in values], dtype=np.int64) for p in primes]
    assert combine_residues(residues, primes) == values
