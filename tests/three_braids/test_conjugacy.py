"""Conjugacy in B_3 by cyclic words against ultra summit sets, which share no code with it."""

import random

import pytest
from hypothesis import given

from braidsearch.normal_form import are_equal
from braidsearch.normal_form.conjugacy import conjugacy_class
from braidsearch.three_braids.conjugacy import find_three_braid_conjugator, three_braid_class
from braidsearch.words import Braid
from tests.strategies import braids_on


def random_three_braid(generator: random.Random, letters: int) -> Braid:
    return Braid([generator.choice([1, -1, 2, -2]) for _ in range(letters)], 3)


def test_classes_are_those_of_the_summit_sets():
    """Of 6,000 seeded words, two share a cyclic word when they share an ultra summit set."""
    generator = random.Random(20)
    summit_of, word_of = {}, {}
    for count in range(6_000):
        braid = random_three_braid(generator, count % 11)
        summit, word = conjugacy_class(braid), three_braid_class(braid)
        assert summit.is_complete
        assert word_of.setdefault(summit.key, word) == word, braid
        assert summit_of.setdefault(word, summit.key) == summit.key, braid
    assert 100 < len(word_of) < 3_000


@given(braids_on(3, 30), braids_on(3, 20))
def test_conjugates_are_found_with_a_conjugator(braid, by):
    """The conjugator that is found conjugates, and is no longer than what it undoes."""
    right = by.inverse() * braid * by
    found = find_three_braid_conjugator(braid, right)
    assert found is not None
    conjugator = Braid(found, 3)
    assert are_equal(braid * conjugator, conjugator * right)
    assert len(found) <= len(by) + 3


@given(braids_on(3, 8), braids_on(3, 8))
def test_the_conjugator_is_there_exactly_when_the_classes_agree(left, right):
    """Two words at random: rarely conjugate, and then proven so."""
    found = find_three_braid_conjugator(left, right)
    assert (found is None) == (conjugacy_class(left).key != conjugacy_class(right).key)
    if found is not None:
        assert are_equal(left * Braid(found, 3), Braid(found, 3) * right)


@pytest.mark.parametrize("copies", [1, 2, 3, 7])
def test_a_periodic_word_is_turned_by_less_than_half_its_period(copies):
    """Rotations of a power need at most half a root: the word commutes with its root."""
    root = (1, 1, 1, -2, -2, 1, -2, -2, -2, -2)
    left = Braid(root * copies, 3)
    for cut in range(len(root) + 1):
        right = Braid(left.word[cut:] + left.word[:cut], 3)
        found = find_three_braid_conjugator(left, right)
        assert found is not None
        assert len(found) <= len(root) // 2
        assert are_equal(left * Braid(found, 3), Braid(found, 3) * right)


@given(braids_on(3, 30))
def test_classes_follow_the_symmetries(braid):
    """Mirror and reverse of the class are the classes of mirror and reverse of the word."""
    named = three_braid_class(braid)
    assert named.mirror() == three_braid_class(braid.mirror())
    assert named.reverse() == three_braid_class(braid.reverse())
    assert named.mirror().reverse() == three_braid_class(braid.inverse())


@given(braids_on(3, 30))
def test_a_class_of_infinite_order_is_full_twists_times_an_alternating_word(braid):
    """Murasugi's form: Delta^(2d) times s1 for each sign -1 and s2^-1 for each sign +1."""
    named = three_braid_class(braid)
    if named.signs:
        full_twists = (1, 2) * 3 if named.full_twists > 0 else (-2, -1) * 3
        alternating = tuple(1 if sign < 0 else -2 for sign in named.signs)
        word = full_twists * abs(named.full_twists) + alternating
        assert three_braid_class(Braid(word, 3)) == named
        assert conjugacy_class(Braid(word, 3)).key == conjugacy_class(braid).key
        assert sum(length for _, length in named.runs) == len(named.signs)


@pytest.mark.parametrize(
    ("word", "value"),
    [
        ([], [0]),
        ([1, 2, 1], [3, 0]),
        ([1, 2], [2, 1]),
        ([-2, -1], [-2, -1]),
        ([1, 2] * 3, [6]),
        ([1, 2] * 2, [4, -1]),
        ([1], [1, -1, 0]),
        ([2], [1, -1, 0]),
        ([-1], [-1, 0, 1]),
        ([1, -2], [0, -1, 0, 1, 0]),
    ],
)
def test_values_by_hand(word, value):
    """Delta, s1 s2 and their powers; a generator; the word of the figure-eight knot's root."""
    assert three_braid_class(Braid(word, 3)).value == value


def test_ten_thousand_letters():
    """A word of 10,000 letters and a conjugate of it: the conjugator is found and is short."""
    generator = random.Random(21)
    left, by = random_three_braid(generator, 10_000), random_three_braid(generator, 300)
    found = find_three_braid_conjugator(left, by.inverse() * left * by)
    assert found is not None
    assert len(found) <= 300
    assert find_three_braid_conjugator(left, by.inverse() * left.mirror() * by) is None
