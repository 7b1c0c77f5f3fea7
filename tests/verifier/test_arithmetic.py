"""The arithmetic under the verifier's invariants, against sympy and against definitions."""

import itertools
import random

import pytest
import sympy

from braidsearch.verifier import verify


@pytest.mark.parametrize("exponent", verify.MERSENNE_EXPONENTS)
def test_the_moduli_are_primes(exponent):
    """2^p - 1 is prime if and only if it divides s_(p-2), s_0 = 4, s_(k+1) = s_k^2 - 2.

    Lucas 1878, Lehmer, An extended theory of Lucas' functions, 1930.
    """
    modulus, s = (1 << exponent) - 1, 4
    for _ in range(exponent - 2):
        s = s * s - 2
        while s >> exponent:  # 2^p is 1 modulo 2^p - 1
            s = (s & modulus) + (s >> exponent)
    assert s in (0, modulus)


def test_the_prime_is_large_enough():
    """Numbers of at most bits - 1 bits and of both signs are different modulo the prime."""
    for bits in (1, 64, 126, 127, 128, 520, 521, 3000):
        assert verify.mersenne_prime(bits) > 1 << bits
    with pytest.raises(verify.RejectedError, match="too large for this verifier"):
        verify.mersenne_prime(20_000)


def test_determinants():
    """Sparse matrices of up to 7 rows, singular ones among them, against sympy."""
    generator = random.Random(1)
    prime = verify.mersenne_prime(60)
    zeros = 0
    for size in [0, 1, 2, 3, 4, 5, 6, 7] * 12:
        dense = [
            [generator.choice([0, 0, 0, 1, -1, 2, 5]) for _ in range(size)] for _ in range(size)
        ]
        rows = [{j: x % prime for j, x in enumerate(row) if x} for row in dense]
        value = int(sympy.Matrix(size, size, list(itertools.chain(*dense))).det(method="bareiss"))
        assert verify.determinant(rows, prime, verify.Work()) == value % prime
        zeros += value == 0
    assert 10 < zeros < 90


def test_permutation_signs():
    """All permutations of up to five places, by counting inversions."""
    for size in range(6):
        for places in itertools.permutations(range(size)):
            inversions = sum(a > b for a, b in itertools.combinations(places, 2))
            assert verify.permutation_sign(list(places)) == (-1) ** inversions


def test_interpolation():
    """A polynomial with coefficients of both signs comes back from its values."""
    generator = random.Random(2)
    prime = verify.mersenne_prime(60)
    for size in range(1, 12):
        coefficients = [generator.randrange(-(2**50), 2**50) for _ in range(size)]
        points = generator.sample(range(2, 10**9), size)
        values = [
            sum(c * pow(x, k, prime) for k, c in enumerate(coefficients)) % prime for x in points
        ]
        assert verify.interpolate(points, values, prime, verify.Work()) == coefficients


def test_packed_polynomials():
    """Coefficients of both signs, as large as the width allows, are told apart."""
    generator = random.Random(3)
    for width in (2, 5, 40):
        most = (1 << width - 1) - 1
        for _ in range(50):
            coefficients = [generator.randint(-most, most) for _ in range(6)] + [most]
            value = sum(c << width * k for k, c in enumerate(coefficients))
            assert verify.unpack(value, width, verify.Work()) == coefficients


def test_division_by_a_circle():
    """(1 + q^2) times a polynomial is divided; what is no multiple is refused."""
    assert verify.divide_by_circle([-3, 2, 5]) == [3, -5]
    assert verify.divide_by_circle([]) == []
    with pytest.raises(verify.RejectedError):
        verify.divide_by_circle([1, 0, 1])


def test_seminormal_modules_satisfy_the_relations():
    """On every module: the braid relations, g - 1/g = z, and all dimensions squared sum to n!."""
    prime, strands, q = verify.mersenne_prime(60), 4, 5
    powers = {k: pow(q, k, prime) for k in range(-4, 5)}
    z = powers[1] - powers[-1]
    diagonal = {d: z * pow(1 - pow(q, -2 * d, prime), -1, prime) for d in range(-4, 5) if d}
    modules = [verify.module(*item) for item in verify.lattice_words(strands).items()]
    assert sum(len(item.actions[0]) ** 2 for item in modules) == 24

    def traces(*word):
        braid = verify.Braid(strands, word)
        return [verify.character(item, braid, diagonal, powers, prime) for item in modules]

    generator = random.Random(4)
    for _ in range(40):
        rest = tuple(generator.choice([1, -1, 2, -2, 3, -3]) for _ in range(5))
        assert traces(1, 2, 1, *rest) == traces(2, 1, 2, *rest)
        assert traces(2, 3, 2, *rest) == traces(3, 2, 3, *rest)
        assert traces(1, 3, *rest) == traces(3, 1, *rest)
        for i in (1, 2, 3):
            assert traces(i, -i, *rest) == traces(*rest)
            differences = zip(traces(i, *rest), traces(-i, *rest), traces(*rest), strict=True)
            assert all((a - b - z * c) % prime == 0 for a, b, c in differences)
