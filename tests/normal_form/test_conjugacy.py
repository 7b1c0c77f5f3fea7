"""The ultra summit set is whole, and names a conjugacy class."""

import random
from itertools import permutations

import pytest
from hypothesis import given, settings

from braidsearch.normal_form import are_equal
from braidsearch.normal_form.conjugacy import conjugacy_class, find_conjugator, iter_summit
from braidsearch.normal_form.conjugation import (
    conjugate_by_simple,
    conjugator_word,
    cycle,
    inverse_element,
    slide_to_circuit,
)
from braidsearch.normal_form.left_normal_form import element_of_word, element_word
from braidsearch.normal_form.simple_elements import simple_elements
from braidsearch.normal_form.summit import ultra_summit_set
from braidsearch.words import Braid
from tests.normal_form.test_left_normal_form import random_braid
from tests.strategies import braids


def is_conjugated(braid: Braid, by: tuple[int, ...], result: Braid) -> bool:
    conjugator = Braid(by, braid.strands)
    return are_equal(braid * conjugator, conjugator * result)


def exhaustive_ultra_summit_set(elements, start):
    """All members, by conjugation with every simple element and a walk along cycling orbits."""
    simple = [elements.number(ends) for ends in permutations(range(elements.strands))]
    found, waiting = {start}, [start]
    while waiting:
        member = waiting.pop()
        for by in simple:
            other = conjugate_by_simple(elements, member, by)
            in_summit = other[0] == start[0] and len(other[1]) == len(start[1])
            if in_summit and other not in found and _returns(elements, other):
                found.add(other)
                waiting.append(other)
    return found


def _returns(elements, member) -> bool:
    seen = set()
    current = member
    while current not in seen:
        seen.add(current)
        current = cycle(elements, current)
    return current == member


@pytest.mark.parametrize(("strands", "letters", "rounds"), [(3, 10, 150), (4, 11, 250), (5, 6, 40)])
def test_the_walk_finds_the_whole_ultra_summit_set(strands, letters, rounds):
    """Minimal simple elements at one member of each orbit reach what all simple elements reach."""
    generator = random.Random(strands)
    elements = simple_elements(strands)
    for round_number in range(rounds):
        braid = random_braid(generator, strands, generator.randrange(letters + 1))
        if round_number % 3 == 0:
            braid = braid * braid  # powers and reducible braids have the larger sets
        start, _ = slide_to_circuit(elements, element_of_word(elements, braid.word))
        summit = ultra_summit_set(elements, start, cap=10**6)
        assert summit.is_complete
        assert set(summit.parents) == exhaustive_ultra_summit_set(elements, start), braid


@settings(max_examples=60)
@given(braids(max_strands=5, max_letters=14), braids(max_strands=5, max_letters=8))
def test_conjugate_braids_have_one_name(braid, other):
    """The key of a class does not depend on the member, and the conjugators lead where they say."""
    by = Braid([g for g in other.word if abs(g) < braid.strands], braid.strands)
    conjugate = by.inverse() * braid * by
    one, two = conjugacy_class(braid), conjugacy_class(conjugate)
    assert one.key == two.key
    assert is_conjugated(braid, one.conjugator, one.representative)
    found = find_conjugator(braid, conjugate)
    assert found is not None
    assert is_conjugated(braid, found, conjugate)


def test_braids_that_are_not_conjugate_have_two_names():
    """sigma_1^k sigma_2^(6-k) on three strands: equal exponent sums, one class for k and 6-k."""
    names = {k: conjugacy_class(Braid([1] * k + [2] * (6 - k), 3)).key for k in range(7)}
    assert all(names[k] == names[6 - k] for k in range(7))
    assert len({names[k] for k in range(4)}) == 4


@given(braids(max_strands=5, max_letters=12))
@settings(max_examples=50)
def test_every_member_of_the_summit_is_a_conjugate(braid):
    """The words given for the members are reached by the conjugators given with them."""
    for count, (member, by) in enumerate(iter_summit(braid, cap=50)):
        assert is_conjugated(braid, by, member)
        if count > 20:
            break


@given(braids(max_strands=6, max_letters=16))
@settings(max_examples=60)
def test_operations_on_normal_forms_are_what_they_say(braid):
    """Inverse, cycling and sliding give the normal forms of the words that define them."""
    elements = simple_elements(braid.strands)
    element = element_of_word(elements, braid.word)
    inverse = inverse_element(elements, element)
    assert inverse == element_of_word(elements, braid.inverse().word)
    slid, conjugators = slide_to_circuit(elements, element)
    result = Braid(element_word(elements, slid), braid.strands)
    assert is_conjugated(braid, conjugator_word(elements, conjugators), result)
    assert element_of_word(elements, result.word) == slid


def test_a_cap_is_admitted():
    """A class whose set is larger than the cap says that it is not complete."""
    braid = Braid([1, 2, 3, 4, 5] * 3 + [1, -4, 4, 1, 5, 3], 6)
    assert conjugacy_class(braid, cap=10**6).summit_size > 4
    small = conjugacy_class(braid, cap=3)
    assert not small.is_complete
    assert is_conjugated(braid, small.conjugator, small.representative)
