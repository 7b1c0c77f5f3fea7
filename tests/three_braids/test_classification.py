"""The list of classes of a link against brute force, against polynomials and against tables."""

import random
import re
from collections import defaultdict
from itertools import combinations, product

import networkx as nx
import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.errors import InputError
from braidsearch.invariants import compute_invariants
from braidsearch.normal_form.conjugacy import conjugacy_class
from braidsearch.three_braids import link_classes
from braidsearch.three_braids.conjugacy import ThreeBraidClass, three_braid_class
from braidsearch.words import SYMMETRIES, Braid, apply_symmetry
from tests.knot_tables import iter_knots, iter_links
from tests.strategies import braids, braids_on

Value = tuple[tuple[int, ...], ...]


def frozen_classes(braid: Braid) -> Value:
    return tuple(map(tuple, link_classes(braid)))


def all_words(most_letters: int) -> list[Braid]:
    lengths = range(most_letters + 1)
    return [Braid(word, 3) for n in lengths for word in product((1, -1, 2, -2), repeat=n)]


UNKNOT = [[-2, -1], [0, -1, 0, 1, 0], [2, 1]]


@pytest.mark.parametrize(
    ("braid", "classes"),
    [
        (Braid([], 1), UNKNOT),
        (Braid([-1], 2), UNKNOT),
        (Braid([2, -1], 3), UNKNOT),
        (Braid([-2, -1], 3), UNKNOT),
        (Braid([], 3), [[0]]),
        (Braid([], 2), [[-1, 0, 1], [1, -1, 0]]),
        (Braid([1], 3), [[-1, 0, 1], [1, -1, 0]]),
        (Braid([1, 1], 2), [[1, -1, 0, -1, 0, 1, 0], [3, 0]]),
        (Braid([1, 1, 1], 2), [[2, -1, 0, -1, 0, -1, 0, 1, 0], [4, -1]]),
        (Braid([1, -2, 1, -2], 3), [[0, -1, 0, 1, 0, -1, 0, 1, 0]]),
    ],
)
def test_classes_by_hand(braid, classes):
    """The unknot; the trivial links; the Hopf link; the trefoil; the figure-eight knot."""
    assert link_classes(braid) == classes


def test_more_strands_are_refused():
    """The classification does not speak of four strands."""
    with pytest.raises(InputError, match="4 strands: expected 3 at most"):
        link_classes(Braid([1, 2, 3]))


@given(braids(max_strands=3, max_letters=12), st.sampled_from([1, -1]))
def test_markov_moves_keep_the_list(braid, sign):
    """Conjugation by a generator, and stabilization by either sign where there is a strand left."""
    classes = link_classes(braid)
    if braid.strands > 1:
        turned = Braid((-sign, *braid.word, sign), braid.strands)
        assert link_classes(turned) == classes
    if braid.strands < 3:
        stabilized = Braid((*braid.word, sign * braid.strands), braid.strands + 1)
        assert link_classes(stabilized) == classes


@given(braids_on(3, 14))
def test_the_list_holds_the_class_itself_and_is_sorted(braid):
    """One to three classes, all of links with this list."""
    classes = link_classes(braid)
    assert three_braid_class(braid).value in classes
    assert classes == sorted(classes)
    assert len(classes) <= 3


def test_lists_are_what_one_stabilization_joins():
    """All words of up to 6 letters, stabilized both ways and joined where conjugate in B_4.

    Conjugacy in B_4 is by ultra summit sets, and nothing of the classification is used: the
    classes of 3-braids joined so are exactly those that share a list.
    """
    graph: nx.Graph[object] = nx.Graph()
    members: dict[ThreeBraidClass, Braid] = {}
    for braid in all_words(6):
        named = three_braid_class(braid)
        members.setdefault(named, braid)
        for letter in (3, -3):
            graph.add_edge(named, conjugacy_class(Braid((*braid.word, letter))).key)
    joined = {
        frozenset(member for member in component if isinstance(member, ThreeBraidClass))
        for component in nx.connected_components(graph)
    }
    listed = defaultdict(set)
    for named, braid in members.items():
        listed[frozen_classes(braid)].add(named)
    assert joined == {frozenset(classes) for classes in listed.values()}
    sums = [sorted(c.exponent_sum for c in classes) for classes in joined if len(classes) > 1]
    assert any(low == high for low, high, *_ in sums), "a flype keeps the exponent sum"
    assert len(sums) > 10


def invariants_of(braid: Braid) -> str:
    """All polynomials and numbers that the searcher has, as one text."""
    return repr(compute_invariants(braid))


def reduced_three_braid(generator: random.Random, letters: int) -> Braid:
    """A word without i -i, so that few of them are short links in disguise."""
    word = [1]
    while len(word) < letters:
        word.append(generator.choice([i for i in (1, -1, 2, -2) if i != -word[-1]]))
    return Braid(word, 3)


def test_lists_tell_apart_more_than_polynomials_do():
    """Seeded words of 6 to 14 letters: what shares a list shares every invariant.

    The theorem's other direction is counted and printed: pairs that share every polynomial, the
    signature and the linking numbers, and are told apart by their lists. Most are reverses of each
    other, which no polynomial tells apart; the others are as in Birman, On the Jones polynomial of
    closed 3-braids, 1985.
    """
    generator = random.Random(22)
    sample = [reduced_three_braid(generator, 6 + count % 9) for count in range(1_500)]
    braid_with = {frozen_classes(braid): braid for braid in sample}
    invariants_with = {classes: invariants_of(braid) for classes, braid in braid_with.items()}
    for braid in sample:
        assert invariants_of(braid) == invariants_with[frozen_classes(braid)], braid
    alike = [
        pair
        for pair in combinations(braid_with, 2)
        if invariants_with[pair[0]] == invariants_with[pair[1]]
    ]
    reverses = [pair for pair in alike if frozen_classes(braid_with[pair[0]].reverse()) == pair[1]]
    print(f"\n{len(braid_with)} links among {len(sample)} closed 3-braids;", end=" ")
    print(f"{len(alike)} pairs alike in every polynomial, {len(reverses)} of them reverses")
    assert len(braid_with) > 300
    assert 0 < len(reverses) < len(alike)


@given(braids_on(3, 9), braids_on(3, 9))
def test_what_polynomials_tell_apart_the_lists_tell_apart(left, right):
    """For any two: equal lists, equal invariants."""
    if link_classes(left) == link_classes(right):
        assert invariants_of(left) == invariants_of(right)


def symmetry_type(braid: Braid) -> str:
    """What a table calls the symmetries of a knot, by its lists."""
    classes = link_classes(braid)
    kept = [name for name in SYMMETRIES if link_classes(apply_symmetry(braid, name)) == classes]
    return {
        ("identity",): "chiral",
        ("identity", "reverse"): "reversible",
        ("identity", "mirror-reverse"): "negative amphicheiral",
        ("identity", "mirror"): "positive amphicheiral",
        tuple(SYMMETRIES): "fully amphicheiral",
    }[tuple(kept)]


def test_the_knots_of_the_table_are_distinct_and_as_symmetric_as_it_says():
    """Every knot to 13 crossings with a word on 3 strands, against the column symmetry_type.

    Source: the package ``database-knotinfo``. Both answers of the classification are tried: the
    reverse of a knot is the same or another one, as the table has it from elsewhere.
    """
    names: dict[frozenset[Value], str] = {}
    for row in iter_knots(13):
        if row.braid.strands <= 3:
            assert symmetry_type(row.braid) == row.columns["symmetry_type"].strip(), row.name
            images = frozenset(frozen_classes(apply_symmetry(row.braid, s)) for s in SYMMETRIES)
            assert images not in names, (row.name, names[images])
            names[images] = row.name
    assert len(names) == 200


def test_both_words_of_a_link_have_one_list():
    """Every row of the table of links with two words on 3 strands at most; same source."""
    rows = [row for row in iter_links(11) if len(row.braids) == 2]
    rows = [row for row in rows if max(braid.strands for braid in row.braids) <= 3]
    for row in rows:
        left, right = row.braids
        assert link_classes(left) == link_classes(right), row.name
    assert len(rows) == 216
    assert not [row for row in rows if not re.match(r"L\d+[an]\d+", row.name)]
