"""Levine-Tristram signatures: laws, other routes, published tables, and the arithmetic below."""

import random
import re
from fractions import Fraction

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.errors import CapacityError, InputError
from braidsearch.invariants import levine_tristram
from braidsearch.invariants.alexander import alexander_polynomial
from braidsearch.invariants.determinant import link_determinant
from braidsearch.invariants.interval_front import IntervalFront
from braidsearch.invariants.levine_tristram import (
    LARGEST_ORDER,
    estimated_cost,
    is_applicable,
    levine_tristram_signature,
)
from braidsearch.invariants.roots_of_unity import (
    fixed_point_cosine,
    root_modulo_prime,
    totient,
)
from braidsearch.invariants.signature import link_signature
from braidsearch.words import Braid
from tests.invariants.cover_oracles import (
    levine_tristram_by_seifert,
    levine_tristram_of_torus_link,
    primitive_powers,
    signature_of_seifert_matrix,
)
from tests.knot_tables import iter_knots, iter_links
from tests.scrambles import scramble
from tests.strategies import braids

ALL_ROOTS = [
    (order, power) for order in range(2, LARGEST_ORDER + 1) for power in primitive_powers(order)
]
COMMON_ROOTS = [root for root in ALL_ROOTS if root[0] in (2, 3, 4, 5, 6, 8, 10, 12)]
roots = st.one_of(st.sampled_from(COMMON_ROOTS), st.sampled_from(ALL_ROOTS))
words = braids(max_strands=5, max_letters=16)


def full_twists(strands, count):
    return Braid([*range(1, strands)] * (strands * count), strands)


@settings(max_examples=300)
@given(braid=words, root=roots)
def test_by_seifert_matrices(braid, root):
    """The Hermitian form of a Seifert matrix has the same signature and nullity, at any root."""
    assert levine_tristram_signature(braid, *root) == levine_tristram_by_seifert(braid, *root)


@pytest.mark.parametrize("order", range(2, LARGEST_ORDER + 1))
def test_every_order(order):
    """At each primitive root of each order, on words in which roots of polynomials abound."""
    generator = random.Random(order)
    for power in primitive_powers(order):
        strands = generator.randint(2, 4)
        letters = [generator.randrange(1, strands) for _ in range(12)]
        braid = Braid([letter * generator.choice([1, 1, 1, -1]) for letter in letters], strands)
        expected = levine_tristram_by_seifert(braid, order, power)
        assert levine_tristram_signature(braid, order, power) == expected, (braid, order, power)


@settings(max_examples=100)
@given(braid=braids(max_strands=8, max_letters=60))
def test_minus_one_has_the_signature(braid):
    """At omega = -1 it is the signature, and the nullity is positive if the determinant is 0."""
    signature, nullity = levine_tristram_signature(braid, 2, 1)
    assert signature == link_signature(braid)
    assert (nullity > 0) == (link_determinant(braid) == 0)


@settings(max_examples=60)
@given(braid=words, root=roots)
def test_symmetries(braid, root):
    """Mirror images have the negative, reverses the same; so has the complex-conjugate root."""
    signature, nullity = levine_tristram_signature(braid, *root)
    assert levine_tristram_signature(braid.mirror(), *root) == [-signature, nullity]
    assert levine_tristram_signature(braid.reverse(), *root) == [signature, nullity]
    assert levine_tristram_signature(braid.inverse(), *root) == [-signature, nullity]
    order, power = root
    assert levine_tristram_signature(braid, order, order - power) == [signature, nullity]


@settings(max_examples=60)
@given(braid=words, root=roots, seed=st.integers(0, 10**6))
def test_values_belong_to_the_link(braid, root, seed):
    """Conjugations, relations and stabilizations change nothing."""
    other = scramble(braid, random.Random(seed), moves=20, more_strands=2)
    assert levine_tristram_signature(other, *root) == levine_tristram_signature(braid, *root)


@settings(max_examples=60)
@given(left=braids(4, 12), right=braids(4, 12), root=roots, is_joined=st.booleans())
def test_sums(left, right, root, is_joined):
    """Both numbers add up over connected sums; a split union adds one to the nullity."""
    shift = left.strands
    moved = [letter + shift if letter > 0 else letter - shift for letter in right.word]
    word = [*left.word[:3], *moved, *([shift] if is_joined else []), *left.word[3:]]
    first, second = (levine_tristram_signature(part, *root) for part in (left, right))
    expected = [first[0] + second[0], first[1] + second[1] + (not is_joined)]
    assert levine_tristram_signature(Braid(word, shift + right.strands), *root) == expected


@settings(max_examples=100)
@given(braid=words, order=st.integers(2, 30))
def test_nullity_tells_roots_of_the_alexander_polynomial(braid, order):
    """It is positive exactly if the cyclotomic polynomial divides (sympy's division).

    It is at most the multiplicity, and signature and nullity of a knot add up to an even number.
    """
    t = sympy.Symbol("t")
    terms = {(exponent,): c for exponent, c in alexander_polynomial(braid)}
    rest, multiplicity = sympy.Poly(terms or {(0,): 0}, t), 0
    cyclotomic = sympy.Poly(sympy.cyclotomic_poly(order, t), t)
    while not rest.is_zero and (rest % cyclotomic).is_zero:
        rest, multiplicity = sympy.quo(rest, cyclotomic), multiplicity + 1
    signature, nullity = levine_tristram_signature(braid, order, 1)
    assert (nullity > 0) == (rest.is_zero or multiplicity > 0)
    assert rest.is_zero or nullity <= multiplicity
    assert (signature + nullity + braid.components) % 2 == 1


@pytest.mark.parametrize("strands", range(2, 7))
def test_torus_links(strands):
    """Torus links have as many squares of each sign as lattice points say (Litherland 1979)."""
    generator = random.Random(strands)
    nullities = 0
    for turns in range(2, 9):
        braid = Braid([*range(1, strands)] * turns, strands)
        for order, power in generator.sample(ALL_ROOTS, 20) + generator.sample(COMMON_ROOTS, 10):
            expected = levine_tristram_of_torus_link(strands, turns, order, power)
            assert levine_tristram_signature(braid, order, power) == expected
            nullities += expected[1]
    assert nullities > 0


@pytest.mark.parametrize(("strands", "twists"), [(3, 12), (4, 4), (6, 2), (8, 1)])
def test_long_torus_links(strands, twists):
    """The same for full twists of 56 to 72 letters, where the nullity is large at some roots."""
    braid = full_twists(strands, twists)
    for order, power in [*COMMON_ROOTS, (7, 3), (24, 5), (48, 7), (59, 20)]:
        expected = levine_tristram_of_torus_link(strands, strands * twists, order, power)
        assert levine_tristram_signature(braid, order, power) == expected


def test_signature_functions_of_the_table():
    """At roots of six of fifteen orders the values for 249 knots to 10 crossings are KnotInfo's.

    Its ``signature_function`` lists x with the values before, at and after exp(pi i x), for x in
    ascending order, the value starting at 0.
    """
    rows = list(iter_knots(10))
    assert len(rows) == 249
    orders = (3, 4, 5, 6, 7, 8, 9, 10, 12, 15, 18, 20, 30, 42, 60)
    wrong = []
    for row in rows:
        generator = random.Random(row.name)
        for order in generator.sample(orders, 6):
            power = generator.choice(primitive_powers(order))
            place = 2 * min(power, order - power) / order
            expected = published_signature(row.columns["signature_function"], place)
            if levine_tristram_signature(row.braid, order, power)[0] != expected:
                wrong.append((row.name, order, power))
    assert wrong == []


def published_signature(text, place):
    """The value of the signature function at exp(pi i place)."""
    number = r"(-?[0-9.]+)"
    jump = rf"\[\s*{number},\s*\[{number},\s*{number},\s*{number}\]"
    value = 0
    for jump_place, before, at, after in re.findall(jump, text):
        if abs(float(jump_place) - place) < 1e-8:
            return int(at)
        if float(jump_place) < place:
            value = int(after)
        else:
            return int(before)
    return value


def test_seifert_matrices_and_nullities_of_the_table():
    """LinkInfo's Seifert matrices of links to 8 crossings give the values, and its nullities."""
    rows = list(iter_links(8))
    assert len(rows) > 100
    wrong, nullities = [], 0
    for row in rows:
        nullity = int(row.columns["nullity"])
        nullities += nullity
        if levine_tristram_signature(row.braid, 2, 1)[1] != nullity:
            wrong.append((row.name, "nullity"))
        numbers = list(map(int, re.findall(r"-?[0-9]+", row.columns["seifert_matrix"])))
        matrix = np.reshape(numbers, (int(len(numbers) ** 0.5), -1)).tolist()
        for root in ((2, 1), (3, 1), (5, 2), (8, 3)):
            expected = signature_of_seifert_matrix(matrix, *root)
            if levine_tristram_signature(row.braid, *root) != expected:
                wrong.append((row.name, root))
    assert wrong == []
    assert nullities > 0


@settings(max_examples=80)
@given(
    size=st.integers(1, 7), seed=st.integers(0, 10**6), precision=st.sampled_from([2, 5, 10, 40])
)
def test_fronts_count_no_sign_that_is_not_there(size, seed, precision):
    """Whatever the precision, no front finds more squares of a sign than the form has.

    The form is an integer matrix of random rank over 2^precision, each entry off by up to a unit.
    """
    generator = random.Random(seed)
    rank = generator.randint(0, size)
    factor = np.array([[generator.randint(-2, 2) for _ in range(rank)] for _ in range(size)])
    signs = [generator.choice([1, -1]) for _ in range(rank)]
    form = factor.reshape(size, rank) @ np.diag(signs).reshape(rank, rank) @ factor.T
    front = IntervalFront(precision)
    vertices = [front.add_vertex() for _ in range(size)]
    front.add_terms(
        (
            vertices[row],
            vertices[column],
            (int(form[row, column]) << precision) + generator.choice([-1, 0, 1]),
        )
        for row in range(size)
        for column in range(row, size)
    )
    for vertex in vertices:
        front.complete(vertex)
    values = np.linalg.eigvalsh(form.astype(float))
    assert front.positive <= (values > 1e-9).sum()
    assert front.negative <= (values < -1e-9).sum()
    if precision == 40:
        assert front.positive + front.negative == (abs(values) > 1e-9).sum()


@pytest.mark.parametrize("order", [2, 3, 4, 5, 8, 10, 12])
def test_nullities_are_no_accident_of_a_prime(order):
    """With the least primes, modulo which ranks do fall, so many are asked that none is missed."""
    primes = [p for p in sympy.primerange(2, 20_000) if p % order == 1]
    roots = [pow(int(sympy.primitive_root(p)), (p - 1) // order, p) for p in primes]
    falls = 0
    for row in [*iter_knots(8), *iter_links(6)]:
        expected = levine_tristram.nullity_at_root(row.braid, order)
        with pytest.MonkeyPatch.context() as patch:
            patch.setattr(
                levine_tristram,
                "root_modulo_prime",
                lambda _, number: (primes[number], roots[number]),
            )
            assert levine_tristram.nullity_at_root(row.braid, order) == expected
            # As if the norms of minors were bounded by 1: then one prime is enough.
            patch.setattr(levine_tristram, "log2", lambda bound: 0.0 if bound == 6 else 1e9)
            falls += levine_tristram.nullity_at_root(row.braid, order) > expected
    assert falls > 0


class ShadowedFront(IntervalFront):
    """A front beside which the same steps are made with exact fractions, the error checked."""

    def __init__(self, precision, exact):
        super().__init__(precision)
        self.exact = exact

    def check(self):
        scale = Fraction(1, 1 << self.precision)
        size = len(self.exact)
        bound = self._error * scale
        for row in range(size):
            for column in range(size):
                difference = self._matrix[row, column] * scale - self.exact[row, column]
                assert abs(difference) <= bound, (row, column)

    def _add_to(self, vertex, partner):
        super()._add_to(vertex, partner)
        self.exact[vertex] += self.exact[partner]
        self.exact[:, vertex] += self.exact[:, partner]
        self.check()

    def _eliminate(self, vertex):
        pivot = self.exact[vertex, vertex]
        assert (pivot > 0) == (self._matrix[vertex, vertex] > 0)
        assert pivot != 0
        super()._eliminate(vertex)
        self.exact -= np.outer(self.exact[:, vertex], self.exact[vertex]) / pivot
        self.check()


@settings(max_examples=150)
@given(size=st.integers(1, 6), seed=st.integers(0, 10**6), precision=st.integers(4, 24))
def test_errors_of_fronts_are_bounds(size, seed, precision):
    """Beside exact elimination with fractions no entry is ever further off than the front says.

    Forms with many zeros on the diagonal, so that pivots from products of variables are needed;
    every entry is given one unit off, up or down.
    """
    generator = random.Random(seed)
    exact = np.full((8, 8), Fraction(0), dtype=object)
    front = ShadowedFront(precision, exact)
    vertices = [front.add_vertex() for _ in range(size)]
    terms = []
    for first in range(size):
        for second in range(first, size):
            choices = [-2, -1, 0, 1, 2] if first < second else [0, 0, 0, -1, 1, 3]
            entry = generator.choice(choices)
            row, column = vertices[first], vertices[second]
            exact[row, column] = exact[column, row] = Fraction(entry)
            terms.append((row, column, (entry << precision) + generator.choice([-1, 1])))
    front.add_terms(terms)
    front.check()
    for vertex in vertices:
        front.complete(vertex)


@settings(max_examples=40)
@given(braid=words, root=roots)
def test_precision_rises_until_all_signs_are_certain(braid, root):
    """Elimination that starts with two bits ends with the same value."""
    expected = levine_tristram_signature(braid, *root)
    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(levine_tristram, "_FIRST_BITS", 2)
        assert levine_tristram_signature(braid, *root) == expected


@pytest.mark.parametrize("precision", [1, 40, 64, 333, 2000])
def test_cosines(precision):
    """Fixed-point cosines are within one unit of sympy's evaluation, for all roots."""
    for order, power in ALL_ROOTS[:: 1 if precision == 64 else 40]:
        exact = sympy.cos(2 * sympy.pi * power / order).evalf(precision // 3 + 30)
        found = fixed_point_cosine(power, order, precision)
        assert abs(sympy.Integer(found) - exact * 2**precision) <= 1


@pytest.mark.parametrize("order", [2, 3, 12, 59, 60])
def test_roots_modulo_primes(order):
    """The primes are different, and each root has exactly the order (sympy)."""
    pairs = [root_modulo_prime(order, number) for number in range(5)]
    assert len({prime for prime, _ in pairs}) == 5
    for prime, root in pairs:
        assert sympy.isprime(prime)
        assert sympy.n_order(root, prime) == order
    assert totient(order) == sympy.totient(order)


@pytest.mark.parametrize(("order", "power"), [(1, 1), (0, 0), (61, 1), (-3, 1)])
def test_orders_out_of_range(order, power):
    """Orders from 2 to 60 are answered."""
    with pytest.raises(InputError, match="expected 2 to 60"):
        levine_tristram_signature(Braid([1, 1, 1]), order, power)


@pytest.mark.parametrize(("order", "power"), [(6, 2), (5, 0), (5, 5), (5, 6), (5, -1)])
def test_powers_that_are_not_primitive(order, power):
    """The power is one of 1 to order - 1 without a common divisor."""
    with pytest.raises(InputError, match="without a common divisor"):
        levine_tristram_signature(Braid([1, 1, 1]), order, power)


def test_too_large_braids():
    """Where the elimination would take hours the answer is an error, known beforehand."""
    braid = Braid([1, -2, 3, -4, 5, -6] * 15_000)
    assert not is_applicable(braid, 3)
    assert estimated_cost(braid, 3) > 3600
    with pytest.raises(CapacityError, match="expected a shorter word"):
        levine_tristram_signature(braid, 3, 1)
