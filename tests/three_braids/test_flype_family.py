"""The recognition of the flype family: sound, complete, and the condition of Ko and Lee."""

from itertools import product

import pytest

from braidsearch.moves import flype_word
from braidsearch.normal_form.conjugacy import conjugacy_class
from braidsearch.three_braids.conjugacy import ThreeBraidClass, three_braid_class
from braidsearch.three_braids.flype_family import flype_exponents
from braidsearch.three_braids.torus_links import torus_word
from braidsearch.words import Braid

Exponents = tuple[int, int, int, int]

LARGEST = 9
LETTERS = 9  # cyclic words with so many letters b are all looked at
REDUCTION = 5  # by the table the cyclic word has at least |u| + |v| + |w| - 5 letters b


def exponents_up_to(largest: int) -> list[Exponents]:
    triples = product(range(-largest, largest + 1), repeat=3)
    return [(*triple, sign) for triple in triples for sign in (1, -1)]


def class_of(exponents: Exponents) -> ThreeBraidClass:
    return three_braid_class(Braid(flype_word(*exponents), 3))


def flyped(exponents: Exponents) -> Exponents:
    u, v, w, sign = exponents
    return w, v, u, sign


def is_proper(exponents: Exponents) -> bool:
    """The condition of Ko and Lee (from memory): the flype leads to another class."""
    u, v, w, e = exponents
    return u != w and abs(v) >= 2 and {u, w}.isdisjoint({0, e, 2 * e, v + e})


def line_of_table(u: int, v: int, w: int) -> tuple[int, list[tuple[int, int]]] | None:
    """The line of the table beside the recognition, for e = 1: full twists and runs of signs."""
    if u > 2 and w < 0:
        line = line_of_table(w, v, u)
        return line and (line[0], line[1][::-1])
    if u < 0 and w < 0:
        if v > 0:
            return 0, [(1, -u), (-1, v), (1, -w), (-1, 1)]
        return -1, [(1, -u - 1), (-1, 1), (1, -v - 2), (-1, 1), (1, -w - 1), (-1, 1)]
    if u < 0 and w > 2:
        if v < 0:
            return 0, [(1, -u), (-1, 1), (1, -v - 1), (-1, w - 1)]
        return 1, [(1, 1 - u), (-1, v - 1), (1, 1), (-1, w - 2)]
    if u > 2 and w > 2:
        if v < 0:
            return 1, [(-1, u - 2), (1, -v), (-1, w - 2), (1, 1)]
        return 2, [(-1, u - 3), (1, 1), (-1, v - 2), (1, 1), (-1, w - 3), (1, 1)]
    return None


def class_with(full_twists: int, signs: tuple[int, ...]) -> ThreeBraidClass:
    """The class of a word written in full twists and the signs, by its braid word."""
    twists = (1, 2) * 3 if full_twists > 0 else (-2, -1) * 3
    word = twists * abs(full_twists) + tuple(1 if sign < 0 else -2 for sign in signs)
    return three_braid_class(Braid(word, 3))


def test_the_table_of_the_proof_holds():
    """Every line of the table, for exponents up to 9, both signs by the mirror image."""
    lines = 0
    for u, v, w, sign in exponents_up_to(LARGEST):
        line = line_of_table(sign * u, sign * v, sign * w) if abs(v) >= 2 else None
        if line is not None:
            full_twists, runs = line
            signs = tuple(sign * kind for kind, length in runs for _ in range(length))
            assert class_with(sign * full_twists, signs) == class_of((u, v, w, sign))
            lines += 1
    assert lines > 5_000


def test_the_flype_reads_the_class_backwards_and_leads_out_under_the_condition():
    """For all exponents up to 9 the classes differ exactly when Ko and Lee say so."""
    for exponents in exponents_up_to(LARGEST):
        named, other = class_of(exponents), class_of(flyped(exponents))
        assert other == named.reverse()
        assert (named != other) == is_proper(exponents), exponents


def test_the_condition_holds_for_summit_sets():
    """The same by ultra summit sets, which share no code with cyclic words, to 4."""
    for exponents in exponents_up_to(4):
        keys = [
            conjugacy_class(Braid(flype_word(*e), 3)).key for e in (exponents, flyped(exponents))
        ]
        assert (keys[0] != keys[1]) == is_proper(exponents), exponents


def test_the_recognition_finds_every_proper_member():
    """The exponents found are proper and give the class again; of other classes none are found."""
    for exponents in exponents_up_to(LARGEST):
        found = flype_exponents(class_of(exponents))
        assert (found is not None) == is_proper(exponents), exponents
        if found is not None:
            assert is_proper(found)
            assert class_of(found) == class_of(exponents)


def test_the_recognition_misses_no_class():
    """Of all cyclic words with up to 9 letters b, it finds those that a list of members has.

    A member whose cyclic word has N letters b has |u| + |v| + |w| <= N + 5, so the list is
    finite, and it is made from the definition of the family alone.
    """
    bound = LETTERS + REDUCTION
    members = set()
    for u, v in product(range(-bound, bound + 1), repeat=2):
        rest = bound - abs(u) - abs(v)
        for w, sign in product(range(-rest, rest + 1), (1, -1)):
            if is_proper((u, v, w, sign)):
                members.add(class_of((u, v, w, sign)))
    found = 0
    for length in range(1, LETTERS + 1):
        for signs, full_twists in product(product((1, -1), repeat=length), range(-3, 4)):
            named = class_with(full_twists, signs)
            assert (flype_exponents(named) is not None) == (named in members)
            found += named in members
    assert found > 500


@pytest.mark.parametrize("sign", [1, -1])
def test_no_torus_link_has_a_proper_flype(sign):
    """The words 1^k 2 and 1^k 2^-1 read the same backwards."""
    for twists in range(-30, 31):
        named = three_braid_class(Braid(torus_word(twists, sign), 3))
        assert named == named.reverse()
        assert flype_exponents(named) is None


@pytest.mark.parametrize("word", [[], [1, 2], [1, 2, 1], [1, 1, 1], [-1, -1], [1, 2] * 3, [1, -2]])
def test_classes_of_finite_order_and_of_one_run_have_no_flype(word):
    """Powers of Delta, of s1 s2 and of s1 are not in the family."""
    assert flype_exponents(three_braid_class(Braid(word, 3))) is None


def test_large_exponents_are_read_off():
    """With exponents of thousands the recognition gives a word as long as the one it was given."""
    for exponents in [(3_000, -2_000, 4_000, 1), (-2_000, -3_000, -900, 1), (700, 800, 900, -1)]:
        found = flype_exponents(class_of(exponents))
        assert found is not None
        assert class_of(found) == class_of(exponents)
        assert len(flype_word(*found)) <= len(flype_word(*exponents))
