"""Moves between closed 3-braids: replayed, put into a certificate, verified, and damaged."""

import random
from itertools import pairwise, product

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.certificates import Certificate, Distinction, format_certificate
from braidsearch.errors import InputError
from braidsearch.moves import Destabilize, Move, MoveChain, Stabilize, flype_word, power
from braidsearch.three_braids import link_classes, moves_between
from braidsearch.verifier import Report, verify_text
from braidsearch.words import Braid
from tests.scrambles import scramble
from tests.strategies import braids, braids_on

exponents = st.integers(-12, 12)
signs = st.sampled_from([1, -1])


def report(left: Braid, right: Braid, moves: list[Move]) -> Report:
    certificate = Certificate.same(left, right, "identity", moves)
    return verify_text(format_certificate(certificate))


def assert_proven(left: Braid, right: Braid) -> list[Move]:
    """The moves between the two, replayed on a checked chain and accepted by the verifier.

    The same moves between the left braid and a wrong one, and with the last of them left out, are
    rejected.
    """
    moves = moves_between(left, right)
    assert moves is not None
    chain = MoveChain(left)
    chain.extend(moves)
    assert chain.current == right
    assert report(left, right, moves).valid
    wrong = Braid((*right.word, 1), max(right.strands, 2))
    assert report(left, wrong, moves).status == "rejected"
    if moves and chain.braids[-2] != right:
        assert report(left, right, moves[:-1]).status == "rejected"
    return moves


def report_of_difference(left: Braid, right: Braid) -> Report:
    """The verifier's report on the two lists of classes, which it computes for itself."""
    lists = link_classes(left), link_classes(right)
    distinction = Distinction("identity", "three-braid", {}, (), (), *lists)
    return verify_text(format_certificate(Certificate.different(left, right, [distinction])))


def conjugate(word: tuple[int, ...], generator: random.Random, letters: int = 12) -> Braid:
    by = tuple(generator.choice([1, -1, 2, -2]) for _ in range(letters))
    return Braid((*(-letter for letter in reversed(by)), *word, *by), 3)


@given(braids_on(3, 30), braids_on(3, 20))
def test_conjugates_take_one_move(braid, by):
    """A conjugation, or a rewriting where that is enough; nothing for the word itself."""
    moves = assert_proven(braid, by.inverse() * braid * by)
    assert len(moves) <= 1
    assert moves_between(braid, braid) == []


def test_flype_partners_are_joined_for_all_small_exponents():
    """Exponents to 4 and both signs, 1,458 pairs: proven, with one stabilization at most."""
    for u, v, w, sign in product(*[range(-4, 5)] * 3, (1, -1)):
        left, right = (Braid(flype_word(*e), 3) for e in ((u, v, w, sign), (w, v, u, sign)))
        moves = assert_proven(left, right)
        assert sum(isinstance(move, Stabilize) for move in moves) <= 1
        assert link_classes(left) == link_classes(right)


@given(exponents, exponents, exponents, signs, st.integers(0, 1_000))
def test_flype_partners_in_disguise_are_joined(u, v, w, sign, seed):
    """Both conjugated at random: seven moves at most."""
    generator = random.Random(seed)
    left = conjugate(flype_word(u, v, w, sign), generator)
    right = conjugate(flype_word(w, v, u, sign), generator)
    assert len(assert_proven(left, right)) <= 7


@pytest.mark.parametrize("twists", range(-7, 8))
def test_words_of_torus_links_are_joined(twists):
    """1^k on two strands, 1^k 2 and 1^k 2^-1, in disguise: any two lead to each other."""
    generator = random.Random(twists)
    words = [Braid((-1, *power(1, twists), 1), 2)]
    words += [conjugate((*power(1, twists), letter), generator) for letter in (2, -2)]
    for left, right in product(words, repeat=2):
        moves = assert_proven(left, right)
        stabilizations = [move for move in moves if isinstance(move, Stabilize | Destabilize)]
        assert len(stabilizations) <= (4 if twists in (1, -1) else 2)


UNKNOTS = [[], [1], [-1], [1, 2], [1, -2], [-1, 2], [-2, -1], [-2, -2, -1, 1, -2, 1, 2, 2]]


@pytest.mark.parametrize("left", UNKNOTS, ids=str)
@pytest.mark.parametrize("right", UNKNOTS, ids=str)
def test_words_of_the_unknot_are_joined(left, right):
    """On one, two and three strands, in all three classes: six moves at most."""
    assert len(assert_proven(Braid(left), Braid(right))) <= 6


@given(braids(max_strands=3, max_letters=9), braids(max_strands=3, max_letters=9))
def test_there_are_moves_exactly_when_the_lists_agree(left, right):
    """Never undecided, on any numbers of strands up to three."""
    if link_classes(left) == link_classes(right):
        assert_proven(left, right)
    else:
        assert moves_between(left, right) is None
        assert report_of_difference(left, right).valid


def test_lists_are_those_of_the_verifier():
    """Members of the flype family, torus links and random words, each against the next one.

    The verifier has its own code, and accepts only values that it finds itself.
    """
    generator = random.Random(24)
    words = [flype_word(*e) for e in product(*[(-5, -3, -2, 1, 3, 4, 6)] * 3, (1, -1))]
    words += [(*power(1, twists), letter) for twists in range(-9, 10) for letter in (2, -2)]
    words += [tuple(generator.choices((1, -1, 2, -2), k=count % 40)) for count in range(800)]
    generator.shuffle(words)
    different = 0
    for one, other in pairwise(words):
        left, right = Braid(one, 3), conjugate(other, generator)
        if link_classes(left) != link_classes(right):
            assert report_of_difference(left, right).valid
            different += 1
        else:
            assert report_of_difference(left, right).status == "rejected"
    assert different > 1_000


def test_all_pairs_of_short_words_are_decided():
    """Of all words of up to 4 letters every pair that shares a list is joined by true moves."""
    words = [Braid(w, 3) for n in range(5) for w in product((1, -1, 2, -2), repeat=n)]
    by_list: dict[str, list[Braid]] = {}
    for braid in words:
        by_list.setdefault(str(link_classes(braid)), []).append(braid)
    for alike in by_list.values():
        for left, right in zip(alike, [*alike[1:], alike[0]], strict=True):
            assert_proven(left, right)
    heads = [alike[0] for alike in by_list.values()]
    for left, right in product(heads, repeat=2):
        assert (moves_between(left, right) is None) == (left is not right)


@given(st.integers(0, 10_000))
def test_scrambles_are_joined(seed):
    """Words on 1, 2 and 3 strands after 40 random moves, with strands added."""
    generator = random.Random(seed)
    strands = generator.randint(1, 3)
    letters = [i for i in (1, -1, 2, -2) if abs(i) < strands]
    word = [generator.choice(letters) for _ in range(8 if letters else 0)]
    braid = Braid(word, strands)
    assert_proven(braid, scramble(braid, generator, 40, 3 - strands))


@pytest.mark.parametrize("strands", [4, 7])
def test_more_strands_are_refused(strands):
    """Neither side may have them."""
    large, small = Braid([1], strands), Braid([1], 3)
    for pair in [(large, small), (small, large)]:
        with pytest.raises(InputError, match=f"{strands} strands: expected 3 at most"):
            moves_between(*pair)


def test_ten_thousand_letters():
    """Conjugate words, flype partners and torus links of 10,000 letters: proven and verified."""
    generator = random.Random(23)
    word = tuple(generator.choice([1, -1, 2, -2]) for _ in range(9_000))
    flypes = [flype_word(*e) for e in ((3_000, -2_500, 4_000, 1), (4_000, -2_500, 3_000, 1))]
    torus = [(*power(1, 9_000), letter) for letter in (2, -2)]
    for left, right in ((word, word), flypes, torus):
        one, other = Braid(left, 3), conjugate(right, generator, 250)
        moves = moves_between(one, other)
        assert moves is not None
        assert report(one, other, moves).valid
    assert moves_between(Braid(word, 3), Braid(flypes[0], 3)) is None
