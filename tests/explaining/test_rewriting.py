"""Rewriting and conjugation by single relations: every route leads where it should."""

import random

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.errors import InputError
from braidsearch.moves.elementary_conjugation import conjugate_parts
from braidsearch.moves.elementary_handles import reduce_chain_handles
from braidsearch.moves.elementary_relations import RelationChain, apply_relation
from braidsearch.moves.elementary_rewriting import rewrite_relations
from braidsearch.moves.elementary_search import words_of_chain
from braidsearch.moves.elementary_vertices import iter_blocks
from braidsearch.normal_form import left_normal_form
from braidsearch.words import Braid
from tests.artin_action import artin_images
from tests.scrambles import apply_random_relation
from tests.strategies import braids, braids_on


def after(word: tuple[int, ...], parts: list[object]) -> tuple[int, ...]:
    """The word after relations and conjugations by letters."""
    for part in parts:
        word = (-part, *word, part) if isinstance(part, int) else apply_relation(word, part)
    return word


@given(braids(max_letters=14))
def test_a_word_is_rewritten_as_its_normal_form(braid: Braid) -> None:
    """Garside's normal form is a second word for the element; the relations lead to it and back."""
    target = left_normal_form(braid).to_braid().word
    assert words_of_chain(braid.word, rewrite_relations(braid.word, target))[-1] == target
    assert words_of_chain(target, rewrite_relations(target, braid.word))[-1] == braid.word


def test_long_words_are_rewritten_by_one_route() -> None:
    """Scrambled words of some two hundred letters are joined, by relations that hold."""
    generator = random.Random(5)
    word = [generator.choice([1, -1]) * generator.randrange(1, 6) for _ in range(180)]
    other = list(word)
    for _ in range(200):
        apply_random_relation(other, generator)
    relations = rewrite_relations(tuple(word), tuple(other))
    assert words_of_chain(tuple(word), relations)[-1] == tuple(other)


@given(braids(max_letters=10), braids(max_letters=10))
def test_two_elements_are_never_joined(one: Braid, other: Braid) -> None:
    """Relations are found exactly if Artin's action on the free group agrees."""
    strands = max(one.strands, other.strands)
    left, right = Braid(one.word, strands), Braid(other.word, strands)
    if artin_images(left) == artin_images(right):
        found = rewrite_relations(left.word, right.word)
        assert words_of_chain(left.word, found)[-1] == right.word
    else:
        with pytest.raises(InputError):
            rewrite_relations(left.word, right.word)


@given(braids(max_letters=14), st.sampled_from([1, -1]), st.integers(0, 14))
def test_trivial_words_have_handles_until_they_are_empty(
    braid: Braid, direction: int, first: int
) -> None:
    """Dehornoy, 1997: a word without handles is trivial only when empty, in either direction."""
    inverse = left_normal_form(braid).to_braid().inverse().word
    chain = RelationChain(braid.word + inverse)
    assert reduce_chain_handles(chain, direction, 10_000, first)
    assert chain.letters == []
    assert words_of_chain(braid.word + inverse, chain.relations)[-1] == ()


@given(braids(max_letters=14))
def test_blocks_are_pieces_of_both_words_for_one_element_each(braid: Braid) -> None:
    """Joined they are the words, and each pair is equal by Artin's action."""
    target = left_normal_form(braid).to_braid().word
    blocks = list(iter_blocks(braid.word, target))
    for side, word in enumerate((braid.word, target)):
        assert tuple(letter for block in blocks for letter in block[side]) == word
    for one, other in blocks:
        assert artin_images(Braid(one, braid.strands)) == artin_images(Braid(other, braid.strands))


@given(st.integers(2, 5).flatmap(lambda n: st.tuples(braids_on(n, 10), braids_on(n, 8))))
def test_conjugates_are_joined(pair: tuple[Braid, Braid]) -> None:
    """From a word to the normal form of a conjugate, by letters around and relations inside."""
    braid, by = pair
    target = left_normal_form(by.inverse() * braid * by).to_braid().word
    parts = conjugate_parts(braid.word, by.word, target, braid.strands)
    assert after(braid.word, parts) == target


@given(braids(max_letters=12), st.integers(0, 12))
def test_rotations_take_two_steps_a_letter(braid: Braid, number: int) -> None:
    """The shorter part of the word goes around, each letter by a conjugation and a cancellation."""
    size = min(number, len(braid))
    target = braid.word[size:] + braid.word[:size]
    parts = conjugate_parts(braid.word, braid.word[:size], target, braid.strands)
    assert after(braid.word, parts) == target
    assert len(parts) <= 2 * min(size, len(braid) - size)


def test_long_conjugators_go_letter_by_letter() -> None:
    """Beyond some hundred letters nothing is searched, and the way is found all the same."""
    generator = random.Random(6)
    by = tuple(generator.choice([1, -1]) * generator.randrange(1, 4) for _ in range(320))
    word = (1, 2, -3, 2)
    target = tuple(-letter for letter in reversed(by)) + word + by
    parts = conjugate_parts(word, by, target, 4)
    assert after(word, parts) == target
