"""Classes of closed 3-braids: complete families, conjugacy, moves that join them, long words."""

import random
from itertools import product

import pytest
from hypothesis import given, settings

from braidsearch.normal_form.conjugacy import find_conjugator
from braidsearch.verifier import verify
from braidsearch.words import Braid
from tests.scrambles import apply_random_relation
from tests.strategies import braids_on
from tests.verifier import finer_oracles
from tests.verifier.closures import invariant
from tests.verifier.finer_oracles import cyclic_word, word_of


def classes(word):
    return invariant("three-braid", Braid(word, strands=3))


def own_class(word):
    return list(verify.conjugacy_class(tuple(word), verify.Work()))


@settings(max_examples=150)
@given(braids_on(3, 12))
def test_the_cyclic_word(braid):
    """Rewriting text in Z_2 * Z_3 gives the same cyclic word."""
    assert own_class(braid.word) == cyclic_word(braid.word)


def test_conjugacy():
    """Two braids have one class exactly if the normal form's summits find a conjugator."""
    generator = random.Random(5)
    conjugate = 0
    for _ in range(60):
        left = [generator.choice([1, -1, 2, -2]) for _ in range(6)]
        by = [generator.choice([1, 2]) for _ in range(2)]
        right = (
            [-letter for letter in by[::-1]]
            + generator.choice([left, [*left[:4], 2, 1], left[::-1]])
            + by
        )
        for _ in range(6):
            apply_random_relation(right, generator)
        found = find_conjugator(Braid(left, strands=3), Braid(right, strands=3)) is not None
        assert (own_class(left) == own_class(right)) == found, (left, right)
        conjugate += found
    assert 10 < conjugate < 60


def test_every_member_of_the_families_is_recognised():
    """All flypes with exponents up to five, and the torus family: exactly the classes listed."""
    span = range(-5, 6)
    found = 0
    for u, v, w, e in product(span, span, span, (1, -1)):
        word, flype = (word_of((1, k), (2, v), (1, u + w - k), (2, e)) for k in (u, w))
        stated = classes(word)
        assert own_class(word) in stated
        assert own_class(flype) in stated
        assert stated == finer_oracles.families().get(tuple(own_class(word)))
        # Ko and Lee, Flypes of closed 3-braids in the standard contact space, 1999
        distinct = u != w and abs(v) >= 2 and not {u, w} & {0, e, 2 * e, v + e}
        assert (own_class(word) != own_class(flype)) == distinct
        found += distinct
    assert found > 500


@settings(max_examples=200)
@given(braids_on(3, 8))
def test_second_route(braid):
    """A list of all families with exponents up to eight gives the same classes."""
    assert classes(braid.word) == finer_oracles.three_braid(braid)


def test_flypes_found_in_scrambled_words():
    """Conjugated and rewritten members of the family have both classes, and none more."""
    generator = random.Random(6)
    for u, v, w, e in (
        (3, 3, 5, 1),
        (-2, 3, 5, 1),
        (7, -3, -5, -1),
        (-3, -5, 4, -1),
        (30, 20, -9, 1),
    ):
        word = list(word_of((1, u), (2, v), (1, w), (2, e)))
        pair = sorted([own_class(word), own_class(word_of((1, w), (2, v), (1, u), (2, e)))])
        assert pair[0] != pair[1]
        for _ in range(30):
            letter = generator.choice([1, -1, 2, -2])
            word = [letter, *word, -letter]
            apply_random_relation(word, generator)
        assert classes(word) == pair


@pytest.mark.parametrize(
    ("words", "count"),
    [
        ([[1, 2], [1, -2], [-1, -2], [-1, 2]], 3),
        ([[1, 1, 1, 2], [1, 1, 1, -2]], 2),
        ([[2], [-2], [1]], 2),
        ([[1, 1, 2], [1, 1, -2]], 2),
        ([[1, -2, 1, -2]], 1),
        ([[]], 1),
        ([[1, 1]], 1),
    ],
)
def test_small_links(words, count):
    """Unknot, trefoil, unlinks, Hopf link, figure-eight knot, Hopf link with a circle."""
    values = [classes(word) for word in words]
    assert all(value == values[0] for value in values)
    assert len(values[0]) == count


def test_links_of_one_class_differ_from_their_mirror_images():
    """Only the amphicheiral ones of the closed alternating 3-braids (1 -2)^k are their mirrors."""
    for k in range(2, 8):
        assert classes([1, -2] * k) == classes([-1, 2] * k)
    assert classes([1, 1, -2]) != classes([-1, -1, 2])


@pytest.mark.parametrize("word", [[1, -2] * 5_000, [1] * 5_000 + [2] * 3_000 + [-1] * 1_990 + [2]])
def test_long_words(word):
    """Ten thousand letters take a small part of the work."""
    work = verify.Work()
    value = verify.three_braid(verify.Braid(3, tuple(word)), work)
    assert len(value) == (1 if -2 in word else 2)
    assert work.left > verify.MAX_WORK * 4 // 5
