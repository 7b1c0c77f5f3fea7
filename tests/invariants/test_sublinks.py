"""Sublinks: what is left of a link without some components, and the multisets of their values."""

import random
import re
from collections import Counter
from itertools import combinations

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.errors import InputError
from braidsearch.invariants import INVARIANTS, mirror_image
from braidsearch.invariants.homfly import homfly_polynomial
from braidsearch.invariants.jones import jones_polynomial
from braidsearch.invariants.linking_numbers import pair_linking_numbers
from braidsearch.invariants.sublinks import iter_sublinks, sublink_values
from braidsearch.words import Braid
from tests.invariants.cover_oracles import linking_of_components
from tests.knot_tables import iter_links
from tests.scrambles import scramble
from tests.strategies import braids

links = braids(max_strands=6, max_letters=24)
BORROMEAN_RINGS = Braid([1, -2, 1, -2, 1, -2])
UNLINK_OF_TWO = [[-1, -1, 1], [1, -1, -1]]


@given(braid=links, components=st.integers(1, 4))
def test_linking_numbers_of_sublinks(braid, components):
    """The linking numbers of the sublinks are those of the components chosen, counted apart."""
    matrix = linking_of_components(braid)
    expected = sorted(
        sorted(matrix[first][second] for first, second in combinations(chosen, 2))
        for chosen in combinations(range(len(matrix)), components)
    )
    assert sublink_values(braid, components, pair_linking_numbers) == expected


@given(braid=links)
def test_all_components_and_more_than_all(braid):
    """The only sublink of all components is the link; there is none with more."""
    count = braid.components
    assert list(iter_sublinks(braid, count)) == [braid]
    assert list(iter_sublinks(braid, count + 1)) == []
    assert sublink_values(braid, count + 1, homfly_polynomial) == []


@given(braid=links, data=st.data())
def test_sublinks_of_sublinks(braid, data):
    """Each sublink of j of m components lies in (m - j choose k - j) of those of k components."""
    more = data.draw(st.integers(1, braid.components))
    fewer = data.draw(st.integers(1, more))
    nested = Counter(
        inner for outer in iter_sublinks(braid, more) for inner in iter_sublinks(outer, fewer)
    )
    direct = Counter(iter_sublinks(braid, fewer))
    times = len(list(combinations(range(braid.components - fewer), more - fewer)))
    assert nested == Counter({sublink: times * count for sublink, count in direct.items()})


@given(braid=links)
def test_strands_and_letters_are_shared_out(braid):
    """Components share the strands; each crossing lies in one component or between two."""
    single = list(iter_sublinks(braid, 1))
    assert sum(sublink.strands for sublink in single) == braid.strands
    own = sum(len(sublink) for sublink in single)
    pairs = list(iter_sublinks(braid, 2))
    between = sum(len(sublink) for sublink in pairs) - own * (len(single) - 1)
    assert own + between == len(braid)
    assert all(sublink.components == 1 for sublink in single)
    assert all(sublink.components == 2 for sublink in pairs)


@settings(max_examples=60)
@given(braid=braids(max_strands=4, max_letters=12), seed=st.integers(0, 10**6))
def test_values_belong_to_the_link(braid, seed):
    """Conjugations, relations and stabilizations leave the multisets as they are."""
    other = scramble(braid, random.Random(seed), moves=20, more_strands=2)
    for components in (1, 2, 3):
        values = sublink_values(braid, components, jones_polynomial)
        assert sublink_values(other, components, jones_polynomial) == values


@pytest.mark.parametrize("invariant", INVARIANTS, ids=lambda invariant: invariant.name)
@settings(max_examples=25)
@given(braid=braids(max_strands=5, max_letters=16), components=st.integers(1, 3))
def test_symmetries(invariant, braid, components):
    """Sublinks of the mirror image are the mirror images; those of the reverse, the reverses."""
    values = sublink_values(braid, components, invariant.compute)
    mirrored = sorted(mirror_image(invariant.name, value) for value in values)
    assert sublink_values(braid.mirror(), components, invariant.compute) == mirrored
    assert sublink_values(braid.reverse(), components, invariant.compute) == values


@given(left=braids(4, 12), right=braids(4, 12))
def test_components_of_split_unions(left, right):
    """Side by side, the components are those of both."""
    shift = left.strands
    moved = [letter + shift if letter > 0 else letter - shift for letter in right.word]
    union = Braid([*left.word, *moved], shift + right.strands)
    both = [*iter_sublinks(left, 1), *iter_sublinks(right, 1)]
    assert Counter(iter_sublinks(union, 1)) == Counter(both)


def test_borromean_rings():
    """No two of the three rings are linked."""
    assert sublink_values(BORROMEAN_RINGS, 2, homfly_polynomial) == [UNLINK_OF_TWO] * 3
    assert sublink_values(BORROMEAN_RINGS, 1, homfly_polynomial) == [[[0, 0, 1]]] * 3


def test_linking_matrices_of_the_table():
    """Two-component sublinks have the entries of the linking matrices that LinkInfo prints."""
    rows = [row for row in iter_links(9) if row.braid.components > 2]
    assert len(rows) > 100
    wrong = []
    for row in rows:
        numbers = list(map(int, re.findall(r"-?[0-9]+", row.columns["linking_matrix"])))
        size = row.braid.components
        expected = sorted([numbers[size * j + i]] for i in range(size) for j in range(i))
        if sublink_values(row.braid, 2, pair_linking_numbers) != expected:
            wrong.append(row.name)
    assert wrong == []


def test_sublinks_tell_apart_what_polynomials_do_not():
    """Links of the table with equal HOMFLY-PT polynomials and linking numbers have other sublinks.

    The polynomials by which rows are grouped are LinkInfo's.
    """
    groups = {}
    for row in iter_links(10):
        if row.braid.components > 2:
            key = str((row.homfly, pair_linking_numbers(row.braid)))
            groups.setdefault(key, []).append(row.braid)
    told_apart = sum(
        sublink_values(first, 2, homfly_polynomial) != sublink_values(second, 2, homfly_polynomial)
        for group in groups.values()
        for first, second in combinations(group, 2)
    )
    assert told_apart > 0


@pytest.mark.parametrize("components", [0, -1])
def test_no_sublinks_of_no_components(components):
    """A sublink has at least one component."""
    with pytest.raises(InputError, match="expected at least 1"):
        list(iter_sublinks(BORROMEAN_RINGS, components))
