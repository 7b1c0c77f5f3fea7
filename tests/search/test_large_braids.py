"""Large braids get an answer in the time allowed, and what is plain to see is seen at once."""

import random
import time

import pytest

from braidsearch.errors import CapacityError
from braidsearch.invariants import invariant_named
from braidsearch.moves import Conjugate, MoveChain, apply_move
from braidsearch.search.driver import compare
from braidsearch.search.limits import SearchLimits
from braidsearch.search.verification_cost import verification_seconds
from braidsearch.words import MAX_LETTERS, Braid, parse_word
from braidsearch.words.reduction import find_rotation
from tests.normal_form.test_left_normal_form import random_braid
from tests.scrambles import scramble

SLACK = 8.0  # seconds beside the limit: a busy machine, the first walk's compilation, a last step


@pytest.mark.parametrize(
    ("left", "right", "outcome"),
    [
        ("s1^5001", "s1^5003", "different"),  # only the signature is quick to verify
        ("s1^5001 s2", "s1^5001", "same"),  # a visible destabilization
        ("1000: 1 999", "1000: 999 1", "same"),  # a rotation
        ("1000: 1 1 999", "1000: 1 999", "different"),
    ],
)
def test_what_is_plain_to_see_takes_no_search(left, right, outcome):
    """Long words and many strands are settled without entering a single class."""
    verdict = compare(parse_word(left), parse_word(right), limits=SearchLimits(seconds=20, nodes=0))
    assert verdict.outcome == outcome


def test_a_conjugation_of_a_long_word_is_seen():
    """3,000 letters on 20 strands against the word conjugated by one letter and rotated."""
    word = random_braid(random.Random(8), 20, 3_000)
    other = Braid([5, *word.word[700:], *word.word[:700], -5], 20)
    assert compare(word, other, limits=SearchLimits(seconds=20, nodes=0)).outcome == "same"


@pytest.mark.parametrize(("strands", "letters"), [(12, 1_500), (20, 800), (60, 300)])
def test_the_seconds_hold(strands, letters):
    """Scrambles too large to be joined in two seconds are undecided soon after two seconds."""
    generator = random.Random(strands)
    braid = random_braid(generator, strands, letters)
    start = time.monotonic()
    verdict = compare(
        braid, scramble(braid, generator, 150, 2), limits=SearchLimits(seconds=2, nodes=None)
    )
    assert verdict.outcome != "different"
    assert time.monotonic() - start < 2 + SLACK


def test_random_large_braids_are_joined():
    """Eight strands and a hundred letters, scrambled: the walk finds the way back."""
    generator = random.Random(31)
    for strands, letters in ((6, 60), (8, 100), (10, 200)):
        braid = random_braid(generator, strands, letters)
        scrambled = scramble(braid, generator, 60, 2)
        limits = SearchLimits(seconds=None, nodes=3_000)
        assert compare(braid, scrambled, limits=limits).outcome == "same"


def test_a_move_that_no_certificate_holds_is_refused():
    """More letters than a certificate may hold are refused as too large, not as a mistake."""
    long_word = tuple([1, 2] * (MAX_LETTERS // 2 + 1))
    with pytest.raises(CapacityError):
        apply_move(Braid([1, 2]), Conjugate(long_word, (1, 2)))
    with pytest.raises(CapacityError):
        MoveChain(Braid([1, 2])).rewrite(long_word)


def test_rotations_are_found_by_whole_letters():
    """A word is searched for by letters: 1 11 is no rotation of 11 1 2, nor 2 of 12."""
    assert find_rotation(Braid([11, 1, 2], 12), Braid([1, 2, 11], 12)) == 1
    assert find_rotation(Braid([12, 1], 13), Braid([1, 2], 13)) is None
    assert find_rotation(Braid([-1, 1, 2]), Braid([1, 2, -1])) == 1
    assert find_rotation(Braid([1, 2]), Braid([1, 2], 4)) is None
    assert find_rotation(Braid([], 2), Braid([], 2)) == 0


def test_verification_costs_grow_with_the_word():
    """More letters and more strands never cost the verifier less."""
    for name in ("alexander", "jones", "homfly", "signature"):
        costs = [
            verification_seconds(invariant_named(name), Braid([1, 2, 3, 4] * k, 5))
            for k in (1, 10, 100)
        ]
        assert costs == sorted(costs)
        assert costs[0] < costs[-1]
    assert verification_seconds(invariant_named("components"), Braid([1] * 50)) == 0


@pytest.mark.parametrize(("strands", "letters"), [(30, 200), (25, 150)])
def test_links_of_many_components_keep_to_their_time(strands, letters):
    """Finer invariants of large links, and of their many sublinks, end with the time allowed."""
    generator = random.Random(strands)
    word = random_braid(generator, strands, letters)
    other = Braid([*word.word[letters // 2 :], *word.word[: letters // 2], 1, -2, 1], strands)
    start = time.monotonic()
    verdict = compare(word, other, up_to=["mirror", "reverse"], limits=SearchLimits(seconds=2))
    assert verdict.outcome in ("different", "undecided", "same")
    assert time.monotonic() - start < 2 + SLACK
