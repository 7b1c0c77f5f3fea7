"""Alexander modules modulo primes: laws, other presentations, colourings, published tables."""

import ast
import random
import re
from itertools import combinations, pairwise

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.errors import CapacityError, InputError
from braidsearch.invariants.alexander import alexander_polynomial
from braidsearch.invariants.alexander_module import (
    alexander_module_factors,
    estimated_cost,
    is_applicable,
)
from braidsearch.invariants.modular_matrices import divisor_chain, invariant_factors
from braidsearch.invariants.modular_polynomials import QuotientRing
from braidsearch.words import Braid
from tests.invariants.cover_oracles import (
    connected_seifert_matrix,
    count_linear_colourings,
    degree_in_common,
    direct_sum,
    module_by_minors,
    module_by_sympy,
    multiply_all,
)
from tests.knot_tables import iter_knots, iter_links
from tests.polynomial_text import parse_polynomial
from tests.scrambles import scramble
from tests.strategies import braids

PRIMES = (2, 3, 5, 7, 11, 13, 997)
primes = st.sampled_from(PRIMES)
FIGURE_EIGHT = Braid([1, -2, 1, -2])


@settings(max_examples=150)
@given(braid=braids(max_strands=5, max_letters=16), prime=primes)
def test_by_seifert_matrices(braid, prime):
    """t V - V^T for a Seifert matrix V presents the same module (sympy's Smith normal form)."""
    expected = module_by_sympy(connected_seifert_matrix(braid).tolist(), prime)
    assert alexander_module_factors(braid, prime) == expected


@settings(max_examples=25)
@given(
    braid=braids(max_strands=5, max_letters=9).filter(
        lambda braid: connected_seifert_matrix(braid).rows <= 4
    ),
    prime=st.sampled_from([2, 3, 5]),
)
def test_by_elementary_ideals(braid, prime):
    """The products of the first k factors are the common divisors of all minors of size k."""
    assert alexander_module_factors(braid, prime) == module_by_minors(braid, prime)


@settings(max_examples=60)
@given(braid=braids(max_strands=6, max_letters=30), prime=primes)
def test_product_is_the_alexander_polynomial(braid, prime):
    """The factors multiply to the Alexander polynomial modulo the prime, up to units."""
    coefficients = [0] * (1 + max((e for e, _ in alexander_polynomial(braid)), default=0))
    for exponent, c in alexander_polynomial(braid):
        coefficients[exponent] = c % prime
    product = multiply_all(alexander_module_factors(braid, prime), prime)
    assert product == units_removed(coefficients, prime)


def units_removed(coefficients, prime):
    places = [place for place, c in enumerate(coefficients) if c % prime]
    if not places:
        return []
    scale = pow(coefficients[places[-1]], -1, prime)
    return [c * scale % prime for c in coefficients[places[0] : places[-1] + 1]]


@settings(max_examples=60)
@given(braid=braids(max_strands=6, max_letters=24), prime=primes)
def test_shape_of_factors(braid, prime):
    """Each factor is monic, has a constant term, divides the next; zeros come last."""
    factors = alexander_module_factors(braid, prime)
    torsion = [factor for factor in factors if factor]
    assert factors == torsion + [[]] * (len(factors) - len(torsion))
    for factor in torsion:
        assert len(factor) > 1
        assert factor[-1] == 1
        assert 0 < factor[0] < prime
        assert all(0 <= c < prime for c in factor)
    for factor, following in pairwise(torsion):
        assert degree_in_common(factor, following, prime) == len(factor) - 1


@settings(max_examples=60)
@given(braid=braids(max_strands=6, max_letters=24), prime=primes)
def test_symmetries(braid, prime):
    """Mirror image and reverse have the same module, and each factor is its own reciprocal."""
    factors = alexander_module_factors(braid, prime)
    assert alexander_module_factors(braid.mirror(), prime) == factors
    assert alexander_module_factors(braid.reverse(), prime) == factors
    assert alexander_module_factors(braid.inverse(), prime) == factors
    assert [units_removed(factor[::-1], prime) for factor in factors] == factors


@settings(max_examples=60)
@given(braid=braids(max_strands=5, max_letters=16), prime=primes, seed=st.integers(0, 10**6))
def test_values_belong_to_the_link(braid, prime, seed):
    """Conjugations, relations and stabilizations change nothing."""
    other = scramble(braid, random.Random(seed), moves=20, more_strands=2)
    assert alexander_module_factors(other, prime) == alexander_module_factors(braid, prime)


@settings(max_examples=60)
@given(left=braids(4, 12), right=braids(4, 12), prime=primes, is_joined=st.booleans())
def test_sums(left, right, prime, is_joined):
    """The module of a connected sum is the direct sum; a split union adds one free one."""
    shift = left.strands
    moved = [letter + shift if letter > 0 else letter - shift for letter in right.word]
    word = [*left.word[:3], *moved, *([shift] if is_joined else []), *left.word[3:]]
    joined = alexander_module_factors(Braid(word, shift + right.strands), prime)
    parts = [*alexander_module_factors(left, prime), *alexander_module_factors(right, prime)]
    parts += [] if is_joined else [[]]
    assert joined == direct_sum(parts, prime)


@settings(max_examples=60)
@given(braid=braids(max_strands=3, max_letters=12), data=st.data())
def test_number_of_linear_colourings(braid, data):
    """Colourings by F_p[t] / f number p^(deg f + the degrees of what f and the factors share).

    All tuples are tried; f is any polynomial of degree 1 or 2 with a constant term. With t = -1
    these are the dihedral colourings (Fox 1970).
    """
    prime = data.draw(st.sampled_from([2, 3, 5]))
    degree = data.draw(st.integers(1, 2 if prime < 5 else 1))
    digits = st.integers(0, prime - 1)
    middle = data.draw(st.lists(digits, min_size=degree - 1, max_size=degree - 1))
    modulus = [data.draw(st.integers(1, prime - 1)), *middle, 1]
    factors = alexander_module_factors(braid, prime)
    shared = sum(degree_in_common(factor, modulus, prime) for factor in factors)
    assert count_linear_colourings(braid, modulus, prime) == prime ** (degree + shared)


def wrong_torsion_numbers(rows):
    """Where ranks of H_1 of the k-fold branched covers, k = 2 .. 9, are not those of the rows."""
    wrong = []
    for row in rows:
        for prime in (2, 3, 5, 7):
            factors = alexander_module_factors(row.braid, prime)
            for sheets, numbers in ast.literal_eval(row.columns["torsion_numbers"]):
                rank = sum(degree_in_common(factor, [1] * sheets, prime) for factor in factors)
                if rank != sum(number % prime == 0 for number in numbers):
                    wrong.append((row.name, prime, sheets))
    return wrong


def test_torsion_numbers_of_the_table():
    """H_1 of the k-fold branched covers has p-rank as KnotInfo's torsion numbers, for k to 9.

    With coefficients modulo p it is the module modulo 1 + t + ... + t^(k-1); a torsion number 0
    stands for an infinite cyclic summand.
    """
    rows = list(iter_knots(10))
    assert len(rows) == 249
    assert wrong_torsion_numbers(rows) == []


@pytest.mark.slow
def test_torsion_numbers_to_twelve_crossings():
    """The same for the 2,977 knots to 12 crossings."""
    rows = list(iter_knots(12))
    assert len(rows) == 2977
    assert wrong_torsion_numbers(rows) == []


def test_nakanishi_indices_and_second_polynomials_of_the_table():
    """No module needs more generators than KnotInfo's Nakanishi index.

    The second Alexander polynomial modulo p divides the product of all factors but the last.
    """
    checked = 0
    for row in iter_knots(11):
        second = row.columns["second_alexander_polynomial"].strip()
        index = max(map(int, re.findall("[0-9]+", row.columns["nakanishi_index"])), default=9)
        if second == "1" and index == 1:
            continue
        terms = parse_polynomial(second, ("t",))
        for prime in (2, 3, 5, 7):
            factors = alexander_module_factors(row.braid, prime)
            assert len(factors) <= index, row.name
            coefficients = [0] * (1 + max(exponent for exponent, _ in terms))
            for exponent, c in terms:
                coefficients[exponent] = c % prime
            divisor = units_removed(coefficients, prime)
            product = multiply_all(factors[:-1], prime)
            shared = degree_in_common(product, divisor, prime)
            assert shared == len(divisor) - 1, (row.name, prime)
            checked += len(divisor) > 1
    assert checked > 20


def test_modules_of_the_table_of_links():
    """LinkInfo's Seifert matrices of links to 8 crossings present the same modules (sympy)."""
    rows = list(iter_links(8))
    assert len(rows) > 100
    for row in rows:
        numbers = list(map(int, re.findall(r"-?[0-9]+", row.columns["seifert_matrix"])))
        matrix = np.reshape(numbers, (int(len(numbers) ** 0.5), -1)).tolist()
        prime = 3 if row.crossings % 2 else 2
        assert alexander_module_factors(row.braid, prime) == module_by_sympy(matrix, prime), (
            row.name
        )


def pairs_told_apart(max_crossings):
    """Pairs of rows with one HOMFLY-PT polynomial and signature (KnotInfo), and other modules."""
    groups = {}
    for row in iter_knots(max_crossings):
        key = (row.columns["homfly_polynomial"], row.signature)
        groups.setdefault(key, []).append(row)
    told_apart = []
    for group in groups.values():
        for first, second in combinations(group, 2):
            for prime in PRIMES[:5]:
                one, other = (alexander_module_factors(row.braid, prime) for row in (first, second))
                if one != other:
                    told_apart.append((first, second))
                    break
    return told_apart


def test_knots_that_polynomials_do_not_tell_apart():
    """To 11 crossings modules tell apart two pairs with one HOMFLY-PT polynomial and signature."""
    names = {(first.name, second.name) for first, second in pairs_told_apart(11)}
    assert {("10_40", "10_103"), ("10_155", "11n_37")} <= names


@pytest.mark.slow
def test_knots_to_twelve_crossings_that_polynomials_do_not_tell_apart():
    """To 12 crossings they are a dozen, and the Kauffman polynomials of KnotInfo differ for all."""
    pairs = pairs_told_apart(12)
    assert len(pairs) == 12
    for first, second in pairs:
        assert first.columns["kauffman_polynomial"] != second.columns["kauffman_polynomial"]


@settings(max_examples=80)
@given(data=st.data(), size=st.integers(1, 4), prime=st.sampled_from([2, 3, 5]))
def test_matrices_with_given_factors(data, size, prime):
    """Unimodular rows and columns operations do not change the factors that a diagonal matrix has.

    Diagonals of products of a few polynomials and zeros, so that factors are seldom coprime.
    """
    pieces = [[1], [1, 1], [1, 1, 1], [1, 0, 1], [prime - 1, 1]]
    choices = st.lists(st.sampled_from(pieces), max_size=3)
    diagonal = [
        multiply_all(data.draw(choices), prime) if data.draw(st.integers(0, 4)) else []
        for _ in range(size)
    ]
    width = 40
    matrix = np.zeros((size, size, width), dtype=np.int64)
    for place, polynomial in enumerate(diagonal):
        matrix[place, place, : len(polynomial)] = polynomial
    generator = random.Random(data.draw(st.integers(0, 10**6)))
    for _ in range(4 if size > 1 else 0):
        target, source = generator.sample(range(size), 2)
        factor = generator.randrange(1, prime)
        shift = generator.randrange(2)
        for view in (matrix, matrix.transpose(1, 0, 2)):
            view[target, :, shift:] += factor * view[source, :, : width - shift]
            matrix %= prime
    assert invariant_factors(matrix, 0, prime) == direct_sum(diagonal, prime)


@pytest.mark.parametrize("is_transposed", [False, True])
@pytest.mark.parametrize("prime", [3, 5, 997])
def test_entries_that_no_pivot_divides(prime, is_transposed):
    """With rows (t + 1, t - 1) and (0, (t + 1) (t - 1)^2) the entries have no common divisor.

    So there is one factor, the determinant, though each entry shares a factor with it.
    """
    plus, minus = [1, 1], [prime - 1, 1]
    determinant = multiply_all([plus, plus, minus, minus], prime)
    matrix = np.zeros((2, 2, 5), dtype=np.int64)
    matrix[0, 0, :2], matrix[0, 1, :2] = plus, minus
    matrix[1, 1, :4] = multiply_all([plus, minus, minus], prime)
    if is_transposed:
        matrix = matrix.transpose(1, 0, 2)
    assert invariant_factors(matrix, 0, prime) == [determinant]


@settings(max_examples=100)
@given(data=st.data(), prime=st.sampled_from([2, 3, 7, 997]))
def test_quotient_rings(data, prime):
    """Products, quotients and steps modulo a polynomial, beside sympy's arithmetic."""
    digits = st.integers(0, prime - 1)
    degree = data.draw(st.integers(1, 6))
    coefficients = st.lists(digits, min_size=degree, max_size=degree)
    modulus = np.array([*data.draw(coefficients), 1], dtype=np.int64)
    ring = QuotientRing(modulus, prime)
    left, right = (np.array(data.draw(coefficients), dtype=np.int64) for _ in range(2))
    t = sympy.Symbol("t")

    def read(array):
        return sympy.Poly([int(c) for c in array[::-1]], t, modulus=prime)

    product = ring.multiply(left, right)
    assert (read(left) * read(right) - read(product)).rem(read(modulus)).is_zero
    quotient = ring.quotient(product, left)
    assert quotient is not None
    assert ring.multiply(left, quotient).tolist() == product.tolist()
    common = sympy.gcd(read(modulus), read(left))
    assert (read(ring.common_divisor(left)) - common.monic()).is_zero
    has_quotient = read(right).rem(common).is_zero
    assert (ring.quotient(right, left) is not None) == has_quotient
    if left.any() or right.any():
        (a, b), (c, d) = ring.unimodular_step(left, right)
        bottom = (ring.multiply(left, c) + ring.multiply(right, d)) % prime
        determinant = (ring.multiply(a, d) - ring.multiply(b, c)) % prime
        assert not bottom.any()
        assert determinant.tolist() == ring.element(np.ones(1, dtype=np.int64)).tolist()


def test_divisor_chains():
    """F[t] / a + F[t] / b for coprime a and b is cyclic; two equal summands stay two."""
    one_plus_t, minus_one_plus_t = np.array([1, 1]), np.array([2, 1])
    chain = divisor_chain([one_plus_t, minus_one_plus_t, one_plus_t], 3)
    assert [factor.tolist() for factor in chain] == [[1], [1, 1], [2, 0, 1]]


@pytest.mark.parametrize("prime", [1, 0, -3, 4, 9, 1001, 1009])
def test_moduli_that_are_not_primes_below_1000(prime):
    """Only primes to 1000 are answered."""
    with pytest.raises(InputError, match="expected a prime from 2 to 1000"):
        alexander_module_factors(FIGURE_EIGHT, prime)


def test_too_large_braids():
    """Where the elimination would take hours the answer is an error, known beforehand."""
    braid = Braid([*range(1, 400)] * 200)
    assert not is_applicable(braid, 3)
    assert estimated_cost(braid, 3) > 3000
    with pytest.raises(CapacityError, match="expected a shorter word"):
        alexander_module_factors(braid, 3)
