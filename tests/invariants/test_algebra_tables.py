"""The tables by which Temperley-Lieb and Hecke algebras act obey the algebras' relations."""

from collections import Counter
from itertools import pairwise
from itertools import permutations as all_permutations
from math import comb

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st
from sympy.combinatorics import Permutation

from braidsearch.invariants.alexander import alexander_polynomial
from braidsearch.invariants.determinant import fraction_free_determinant
from braidsearch.invariants.kauffman_states import state_count_bound
from braidsearch.invariants.link_states import link_states
from braidsearch.invariants.permutation_tables import ascents, parities, permutations, row_numbers
from braidsearch.invariants.pieces import closure_pieces
from braidsearch.invariants.signature import SymmetricFront
from braidsearch.words import Braid
from tests.strategies import braids


def generator_matrix(states, index, t):
    """E_i on all modules at once: x goes to t^parity times its target, or to (1 + t) x."""
    size = len(states.parity)
    matrix = np.zeros((size, size), dtype=object)
    for x, target in enumerate(states.target[index]):
        if target == x:
            matrix[x, x] = 1 + t
        elif target >= 0:
            matrix[target, x] = t ** int(states.parity[x])
    return matrix


@pytest.mark.parametrize("strands", [1, 2, 3, 4, 5, 6, 7])
def test_temperley_lieb_relations(strands):
    """E_i^2 = (1 + t) E_i, E_i E_j E_i = t E_i for neighbours, distant ones commute; at t = 7."""
    states, t = link_states(strands), 7
    matrices = [generator_matrix(states, index, t) for index in range(strands - 1)]
    for i, first in enumerate(matrices):
        assert np.array_equal(first @ first, (1 + t) * first)
        for j, second in enumerate(matrices):
            if abs(i - j) == 1:
                assert np.array_equal(first @ second @ first, t * first)
            else:
                assert np.array_equal(first @ second, second @ first)


@pytest.mark.parametrize("strands", range(1, 13))
def test_dimensions_of_the_modules(strands):
    """The squares of the dimensions add up to the Catalan number; moves change the parity."""
    states = link_states(strands)
    sizes = Counter(states.through.tolist())
    assert set(sizes) == set(range(strands % 2, strands + 1, 2))
    squares = sum(size**2 for size in sizes.values())
    assert squares == comb(2 * strands, strands) // (strands + 1)
    x = np.arange(len(states.parity))
    for target in states.target:
        moves = (target >= 0) & (target != x)
        assert np.all(states.parity[target[moves]] != states.parity[x[moves]])
        assert np.all(states.through[target[moves]] == states.through[x[moves]])


@pytest.mark.parametrize("size", range(6))
def test_permutation_rows(size):
    """Every permutation once, in order read from the last position; parities are sympy's."""
    rows = [tuple(row) for row in permutations(size).tolist()]
    assert rows == sorted(all_permutations(range(size)), key=lambda row: row[::-1])
    assert np.array_equal(row_numbers(permutations(size)), np.arange(len(rows)))
    assert parities(size).tolist() == [Permutation(list(row)).parity() for row in rows]


@pytest.mark.parametrize("pair", [(0, 1), (0, 4), (2, 3), (1, 3)])
def test_ascents(pair):
    """Each row rising at the pair stands beside the row with the two values exchanged."""
    rows, table = permutations(5).tolist(), ascents(5, *pair)
    low = [*table.even.tolist(), *table.odd.tolist()]
    high = [*table.odd_partners.tolist(), *table.even_partners.tolist()]
    assert sorted(low + high) == list(range(120))
    for one, other in zip(low, high, strict=True):
        exchanged = list(rows[one])
        exchanged[pair[0]], exchanged[pair[1]] = exchanged[pair[1]], exchanged[pair[0]]
        assert exchanged == rows[other]
        assert rows[one][pair[0]] < rows[one][pair[1]]
    assert {parities(5)[row] for row in table.even} == {0}
    assert {parities(5)[row] for row in table.even_partners} == {0}


def spanning_trees(braid, colour):
    """The spanning trees of one checkerboard graph, by the matrix-tree theorem."""
    first = {column: (column, -1) for column in range(colour, braid.strands + 1, 2)}
    last_place = {abs(letter): place for place, letter in enumerate(braid.word)}
    current, edges = dict(first), []
    for place, letter in enumerate(braid.word):
        column = abs(letter)
        if column % 2 != colour:
            edges.append((current[column - 1], current[column + 1]))
            continue
        below = first[column] if last_place[column] == place else (column, place)
        edges.append((current[column], below))
        current[column] = below
    regions = sorted({*first.values(), *(end for edge in edges for end in edge)})
    laplacian = sympy.zeros(len(regions), len(regions))
    for u, w in edges:
        for row, column in ((u, w), (w, u)):
            laplacian[regions.index(row), regions.index(row)] += 1
            laplacian[regions.index(row), regions.index(column)] -= 1
    return int(laplacian[1:, 1:].det(method="bareiss")) if len(regions) > 1 else 1


@settings(max_examples=60)
@given(braids(max_strands=5, max_letters=16))
def test_kauffman_states_bound_the_alexander_polynomial(braid):
    """Absolute coefficients add up to at most the spanning trees, and these to at most the bound.

    Both checkerboard graphs have as many spanning trees, being dual.
    """
    for factor in closure_pieces(braid).factors:
        trees = spanning_trees(factor, 0)
        assert trees == spanning_trees(factor, 1)
        assert sum(abs(c) for _, c in alexander_polynomial(factor)) <= trees
        assert trees <= state_count_bound(factor)


def test_pieces_of_a_word():
    """A generator without a letter splits, one with a single letter joins by a band."""
    word = [1, 5, 1, 7, 3, 1, 5, 3, -5, 3, 4, 7]
    pieces = closure_pieces(Braid(word, strands=9))
    assert pieces.splits == 3  # generators 2, 6 and 8
    assert sorted(pieces.factors, key=lambda factor: (len(factor), factor.word)) == [
        Braid([1, 1]),
        Braid([1, 1, 1]),
        Braid([1, 1, 1]),
    ]


@given(braids(max_strands=8, max_letters=25))
def test_pieces_leave_nothing_to_cut(braid):
    """In each factor every generator has two letters, and components are accounted for."""
    pieces = closure_pieces(braid)
    for factor in pieces.factors:
        counts = Counter(map(abs, factor.word))
        assert set(counts) == set(range(1, factor.strands))
        assert min(counts.values()) >= 2
    separate = sum(factor.components - 1 for factor in pieces.factors)
    assert braid.components == 1 + pieces.splits + separate


small_entries = st.integers(-2, 2)


@given(st.data(), st.integers(1, 6))
def test_fraction_free_determinants(data, size):
    """The elimination without fractions gives sympy's determinant."""
    rows = [[data.draw(small_entries) for _ in range(size)] for _ in range(size)]
    expected = int(sympy.Matrix(rows).det())
    assert fraction_free_determinant(np.array(rows, dtype=object)) == expected


@given(st.data(), st.integers(1, 7))
def test_signatures_of_forms(data, size):
    """A form added square by square has the signature of its matrix, singular or not.

    Variables are completed in any order; sympy's characteristic polynomial has real roots only,
    so Descartes' rule counts them exactly.
    """
    weights = {
        (u, w): data.draw(small_entries) for u in range(size + 1) for w in range(u + 1, size + 1)
    }
    front, matrix = SymmetricFront(), sympy.zeros(size + 1, size + 1)
    names = [front.add_vertex() for _ in range(size + 1)]
    front.ground(names[-1])
    for (u, w), weight in weights.items():
        front.add_square(names[u], names[w], weight)
        matrix[u, u] += weight
        matrix[w, w] += weight
        matrix[u, w] -= weight
        matrix[w, u] -= weight
    for place in data.draw(st.permutations(range(size))):
        front.complete(names[place])
    assert front.signature == descartes_signature(matrix[:size, :size])


def test_signature_of_a_form_without_squares():
    """2 (xy + xz + yz) has the eigenvalues 2, -1, -1: no variable is a pivot until they mix."""
    front = SymmetricFront()
    names = [front.add_vertex() for _ in range(4)]
    front.ground(names[3])
    for first, second in [(0, 1), (0, 2), (1, 2)]:
        front.add_square(names[first], names[second], -1)
    for name in names[:3]:
        front.add_square(name, names[3], 2)
    for name in names[:3]:
        front.complete(name)
    assert front.signature == -1


def descartes_signature(matrix):
    coefficients = matrix.charpoly().all_coeffs()
    mirrored = [c * (-1) ** place for place, c in enumerate(coefficients)]
    return sign_changes(coefficients) - sign_changes(mirrored)


def sign_changes(coefficients):
    signs = [c > 0 for c in coefficients if c]
    return sum(1 for first, second in pairwise(signs) if first != second)
