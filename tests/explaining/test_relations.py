"""Single relations: which there are, that they hold, and chains of them read in every direction."""

from itertools import product

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.errors import InputError
from braidsearch.moves.elementary_relations import (
    Relation,
    apply_relation,
    backwards_chain,
    braid_relation,
    is_relation,
    iter_relations,
    reversed_chain,
)
from braidsearch.moves.elementary_search import words_of_chain
from braidsearch.words import Braid
from tests.artin_action import artin_images
from tests.strategies import braids


@given(braids(max_letters=12))
def test_relations_keep_the_braid(braid: Braid) -> None:
    """Artin's faithful action on the free group (Theory of braids, 1947) is the same after each."""
    for relation in iter_relations(braid.word):
        assert is_relation(relation)
        changed = apply_relation(braid.word, relation)
        assert artin_images(Braid(changed, braid.strands)) == artin_images(braid)
        assert apply_relation(changed, relation.reversed()) == braid.word


@pytest.mark.parametrize(("i", "j"), [(1, 2), (2, 1)])
def test_braid_relations_are_those_that_hold(i: int, j: int) -> None:
    """Of the eight choices of signs, i^e j^f i^g = j^g i^f j^e holds for six, by Artin's action."""
    holds = 0
    for e, f, g in product((1, -1), repeat=3):
        before, after = (e * i, f * j, g * i), (g * j, f * i, e * j)
        is_true = artin_images(Braid(before, 3)) == artin_images(Braid(after, 3))
        assert braid_relation(*before) == (after if is_true else None)
        holds += is_true
    assert holds == 6


@pytest.mark.parametrize(
    "relation",
    [
        Relation(0, (1, 2), (2, 1)),
        Relation(0, (1, -2, 1), (2, -1, 2)),
        Relation(0, (1, 3, 1), (3, 1, 3)),
        Relation(0, (), (1, 1)),
        Relation(0, (), (1,)),
        Relation(0, (1,), ()),
        Relation(0, (), ()),
        Relation(0, (1, 1), (1, 1)),
        Relation(0, (1, -1), (-1, 1)),
        Relation(1, (1, -1), ()),
        Relation(-1, (), (1, -1)),
        Relation(9, (), (1, -1)),
    ],
)
def test_false_relations_are_refused(relation: Relation) -> None:
    """What is no relation, or stands at another place, is never applied."""
    for word in ((1, 2), (1, -2, 1), (1, 3, 1), (1, -1), (1, 1), ()):
        with pytest.raises(InputError):
            apply_relation(word, relation)


@given(braids(max_letters=10), st.lists(st.integers(0, 99), max_size=8))
def test_chains_lead_back_and_backwards(braid: Braid, choices: list[int]) -> None:
    """A chain reversed leads back; read backwards it does to the word backwards what it did."""
    word, chain = braid.word, []
    for choice in choices:
        relations = list(iter_relations(word))
        if braid.strands > 1:
            relations.append(Relation(choice % (len(word) + 1), (), (1, -1)))
        if relations:
            chain.append(relations[choice % len(relations)])
            word = apply_relation(word, chain[-1])
    assert words_of_chain(word, reversed_chain(chain))[-1] == braid.word
    mirrored = words_of_chain(braid.word[::-1], backwards_chain(braid.word, chain))
    assert mirrored[-1] == word[::-1]
