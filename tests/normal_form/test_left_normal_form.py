"""The left normal form is a unique name for a braid, and its factors are left-weighted."""

import random
from itertools import pairwise

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.normal_form import are_equal, left_normal_form
from braidsearch.normal_form.simple_elements import permutation_word, simple_elements
from braidsearch.words import Braid
from tests.artin_action import artin_images
from tests.normal_form.slow_normal_form import slow_normal_form
from tests.strategies import braids


def random_braid(generator: random.Random, strands: int, letters: int) -> Braid:
    signed = [i for i in range(1 - strands, strands) if i]
    return Braid(generator.choices(signed, k=letters) if signed else [], strands)


@settings(max_examples=3000)
@given(st.data())
def test_equality_agrees_with_artins_action(data):
    """Two words are equal by normal forms exactly when they act alike on the free group."""
    left = data.draw(braids(max_strands=5, max_letters=10))
    letters = st.sampled_from([i for i in range(1 - left.strands, left.strands) if i] or [0])
    if data.draw(st.booleans()) and left.strands > 1:
        right = Braid(data.draw(st.lists(letters, max_size=10)), left.strands)
    else:
        right = left_normal_form(left).to_braid()  # so that equal pairs occur, too
    assert are_equal(left, right) == (artin_images(left) == artin_images(right))


def test_equality_agrees_with_artins_action_on_short_words():
    """On 3 strands, where short words often meet, both oracles cut them into the same classes."""
    generator = random.Random(20)
    words = [random_braid(generator, 3, generator.randrange(7)) for _ in range(700)]
    by_action: dict[object, object] = {}
    forms = {}
    for braid in words:
        form, images = left_normal_form(braid), artin_images(braid)
        assert by_action.setdefault(images, form) == form
        assert forms.setdefault(form, images) == images
    assert len(forms) < len(words)


@settings(max_examples=150)
@given(braids(max_strands=4, max_letters=8))
def test_agrees_with_a_second_slow_implementation(braid):
    """Infimum, and the factors as braids, are those of division by word reversing."""
    infimum, factors = slow_normal_form(braid)
    form = left_normal_form(braid)
    assert form.infimum == infimum
    fast = [Braid(permutation_word(factor), braid.strands) for factor in form.factors]
    slow = [Braid(factor, braid.strands) for factor in factors]
    assert list(map(artin_images, fast)) == list(map(artin_images, slow))


@given(braids(max_strands=7, max_letters=40))
def test_factors_are_left_weighted(braid):
    """Every generator that starts a factor finishes the one before; none is trivial or delta."""
    form = left_normal_form(braid)
    elements = simple_elements(braid.strands)
    names = [elements.number(factor) for factor in form.factors]
    assert not {elements.identity, elements.delta} & set(names)
    for left, right in pairwise(names):
        assert not elements.starts[right] & ~elements.finishes[left]


@given(braids(max_strands=6, max_letters=30))
def test_the_word_of_a_normal_form_has_that_normal_form(braid):
    """Writing the form as a word and reading it again changes nothing."""
    form = left_normal_form(braid)
    assert left_normal_form(form.to_braid()) == form


@given(braids(max_strands=6, max_letters=20))
def test_the_inverse_cancels(braid):
    """A braid times its inverse has the empty normal form."""
    form = left_normal_form(braid * braid.inverse())
    assert (form.infimum, form.factors) == (0, ())


@pytest.mark.parametrize("strands", range(2, 8))
def test_the_full_twist_is_central(strands):
    """delta^2 = (sigma_1 ... sigma_(n-1))^n, and it commutes with every generator."""
    full_twist = Braid(list(range(1, strands)) * strands, strands)
    assert left_normal_form(full_twist).infimum == 2
    for index in range(1, strands):
        generator = Braid([index], strands)
        assert are_equal(full_twist * generator, generator * full_twist)


def test_longer_words_on_more_strands():
    """Words of hundreds of letters equal themselves after random relations are worked in."""
    generator = random.Random(5)
    for strands in (9, 14, 20):
        left, right = (random_braid(generator, strands, 150) for _ in range(2))
        middle = random_braid(generator, strands, 30)
        plain = left * right
        assert are_equal(plain, left * middle * middle.inverse() * right)
        assert not are_equal(plain, left * Braid([1, 1], strands) * right)
