"""Certificates of sameness turned round and joined are certificates that the verifier accepts."""

import random
import time
from itertools import pairwise

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.certificates import Certificate
from braidsearch.certificates.grammar import MAX_MOVES
from braidsearch.certificates.joining import (
    apply_symmetry_to_moves,
    compose_symmetries,
    join_chain,
    join_different,
    join_same,
    reverse_certificate,
)
from braidsearch.errors import CapacityError, InputError
from braidsearch.moves import Conjugate, MoveChain, Rewrite, Stabilize
from braidsearch.words import SYMMETRIES, Braid, apply_symmetry, parse_word
from tests.certificates.evidence import (
    certificate_between,
    certificate_of,
    holds_for,
    is_accepted,
    paths,
    symmetries,
)
from tests.strategies import braids, move_chains

TREFOIL, EIGHT = Braid([1, 1, 1]), Braid([1, -2, 1, -2])


@settings(max_examples=60)
@given(move_chains())
def test_the_chains_of_these_tests(chain):
    """What is joined here is true to begin with, and damage to it is seen."""
    assert holds_for(certificate_of(chain, "identity"), chain.start, chain.current)


@settings(max_examples=60)
@given(move_chains(), symmetries)
def test_moves_of_the_images(chain, symmetry):
    """Moves from one braid to another become moves from image to image, for each symmetry."""
    start, end = (apply_symmetry(braid, symmetry) for braid in (chain.start, chain.current))
    moves = apply_symmetry_to_moves(chain.start, chain.moves, symmetry)
    replayed = MoveChain(start)
    replayed.extend(moves)
    assert replayed.current == end
    assert holds_for(Certificate.same(start, end, "identity", moves), start, end)


@settings(max_examples=60)
@given(move_chains(), symmetries)
def test_images_of_images(chain, symmetry):
    """The images of the images are the moves; two conjugations added on the way cancel."""
    image = apply_symmetry(chain.start, symmetry)
    once = apply_symmetry_to_moves(chain.start, chain.moves, symmetry)
    twice = apply_symmetry_to_moves(image, once, symmetry)
    if symmetry in ("identity", "mirror"):
        assert twice == tuple(chain.moves)
    else:
        kinds = [
            [type(move) for move in moves if not isinstance(move, Rewrite | Conjugate)]
            for moves in (twice, chain.moves)
        ]
        assert kinds[0] == kinds[1]
        assert len(twice) <= len(chain.moves)


@settings(max_examples=60)
@given(move_chains(), symmetries)
def test_sameness_turned_round(chain, symmetry):
    """closure(left) = s(closure(right)) turned round holds as well; twice is the claim itself."""
    certificate = certificate_of(chain, symmetry)
    left, right = certificate.left, certificate.right
    turned = reverse_certificate(certificate)
    assert turned.symmetry == symmetry
    assert holds_for(turned, right, left)
    again = reverse_certificate(turned)
    assert again.symmetry == symmetry
    assert holds_for(again, left, right)
    if symmetry in ("identity", "mirror"):
        assert again == certificate


@given(symmetries, symmetries, braids())
def test_symmetries_compose(first, second, braid):
    """One after the other acts as the composed one; each is its own inverse; order is free."""
    composed = compose_symmetries(first, second)
    twice = apply_symmetry(apply_symmetry(braid, first), second)
    assert apply_symmetry(braid, composed) == twice
    assert compose_symmetries(second, first) == composed
    assert (composed == "identity") == (first == second)


@settings(max_examples=60)
@given(st.data(), move_chains(), symmetries, symmetries)
def test_two_joined(data, chain, one, other):
    """A ~ s(B) and B ~ t(C) make A ~ st(C), with the moves of both."""
    first = certificate_of(chain, one)
    second = certificate_of(data.draw(move_chains(first.right)), other)
    joined = join_same(first, second)
    assert joined.symmetry == compose_symmetries(one, other)
    assert joined.moves[: len(first.moves)] == first.moves
    assert holds_for(joined, first.left, second.right)


@settings(max_examples=60)
@given(paths())
def test_a_path_joined(path):
    """A path makes one certificate, no longer than it, that meets no word twice."""
    joined = join_chain(path)
    assert holds_for(joined, path[0].left, path[-1].right)
    plain = path[0]
    for one in path[1:]:
        plain = join_same(plain, one)
    assert joined.symmetry == plain.symmetry
    assert len(joined.moves) <= len(plain.moves)
    chain = MoveChain(joined.left, is_checked=False)
    chain.extend(joined.moves)
    assert len(set(chain.braids)) == len(chain.braids)
    staying = [isinstance(move, Rewrite | Conjugate) for move in joined.moves]
    assert (True, True) not in pairwise(staying)


@settings(max_examples=60)
@given(paths())
def test_there_and_back(path):
    """A path walked back leaves nothing, and walked a third time the path itself."""
    back = [reverse_certificate(one) for one in reversed(path)]
    home = join_chain([*path, *back])
    assert (home.left, home.right, home.symmetry) == (path[0].left, path[0].left, "identity")
    assert home.moves == ()
    assert join_chain([*path, *back, *path]) == join_chain(path)


@pytest.mark.parametrize(
    ("words", "symmetries_found"),
    [
        (["1 1 1", "1 2 1 2", "-1 -1 -1", "-1 -2 -1 -2"], ["identity", "mirror", "identity"]),
        # 8_17 three times: each way round but one
        (
            [
                "-1 -1 2 -1 2 -1 2 2",
                "2 2 -1 2 -1 2 -1 -1",
                "1 1 -2 1 -2 1 -2 -2",
                "4: -1 -1 2 -1 2 -1 2 2 3",
            ],
            ["reverse", "mirror-reverse", "mirror"],
        ),
    ],
)
def test_sameness_that_was_searched_for(words, symmetries_found):
    """Certificates of compare, up to symmetries, make one path that is accepted both ways."""
    stops = list(map(parse_word, words))
    path = [certificate_between(*pair, *SYMMETRIES[1:]) for pair in pairwise(stops)]
    assert [one.symmetry for one in path] == symmetries_found
    joined = join_chain(path)
    assert holds_for(joined, stops[0], stops[-1])
    assert holds_for(reverse_certificate(joined), stops[-1], stops[0])
    unlike = certificate_between(stops[-1], EIGHT, *SYMMETRIES[1:])
    assert holds_for(join_chain([*path, unlike]), stops[0], EIGHT)


def test_runs_of_conjugations_become_one():
    """Conjugators are multiplied and freely reduced; a rewriting on the way costs no move."""
    chain = MoveChain(Braid([1, 2, 2, 1, 3]))
    chain.conjugate([1, 3])
    chain.rewrite([2, -2, *chain.current.word])
    chain.conjugate([-3, -1, 2])
    joined = join_chain([certificate_of(chain, "identity")])
    assert joined.moves == (Conjugate((2,), chain.current.word),)
    assert is_accepted(joined, chain.start, chain.current)


def test_long_conjugators_stay_in_parts():
    """Six hundred conjugations, no word twice: two are left, of at most a thousand letters."""
    chain = MoveChain(Braid([1, 2, 3]), is_checked=False)
    for place in range(600):
        chain.conjugate([1, 2, -3] if place % 2 else [2, -3, 1])
    assert len(set(chain.braids)) == 601
    joined = join_chain([certificate_of(chain, "reverse")])
    assert is_accepted(joined, chain.start, chain.current.reverse())
    assert [len(move.by) for move in joined.moves] == [999, 801]


def long_chain(moves):
    """So many moves of all kinds, unchecked, on a braid that keeps its size."""
    chain = MoveChain(Braid([1, -2, 3, -4, 2, 1] * 5), is_checked=False)
    generator = random.Random(617)
    while len(chain) < moves:
        word = chain.current.word
        cut = generator.randrange(1, len(word))
        chain.conjugate(word[:cut], word[cut:] + word[:cut])
        if generator.random() < 0.2:
            chain.stabilize(1)
            chain.conjugate([5], [5, *chain.current.word[:-1]])
            chain.conjugate([-5], [*chain.current.word[1:], 5])
            chain.destabilize()
    return chain


def test_ten_thousand_moves():
    """Turning, joining and shortening take a fraction of a second, and the result holds.

    The bound is far above the tenth of a second that was measured, for a noisy machine.
    """
    chain = long_chain(10_000)
    certificate = certificate_of(chain, "mirror-reverse")
    left, right = certificate.left, certificate.right
    other = reverse_certificate(certificate_of(chain, "reverse"))
    before = time.process_time()
    turned = reverse_certificate(certificate)
    joined = join_same(turned, certificate_of(chain, "reverse"))
    path = join_chain([turned, certificate_of(chain, "reverse"), other])
    assert time.process_time() - before < 3
    assert is_accepted(joined, right, chain.current.reverse())
    assert path.right == left
    assert is_accepted(path, right, left)
    unlike = certificate_between(left, EIGHT)
    assert is_accepted(join_chain([path, unlike]), right, EIGHT)


def test_more_moves_than_a_certificate_holds():
    """A hundred thousand moves can be written, one more cannot; a shortened chain fits again."""
    moves = [Rewrite((1, 1, 1))] * MAX_MOVES
    full = Certificate.same(TREFOIL, TREFOIL, "identity", moves)
    one = Certificate.same(TREFOIL, TREFOIL, "identity", moves[:1])
    with pytest.raises(CapacityError, match="100001 moves: expected at most 100000"):
        join_same(full, one)
    assert join_chain([full, one]).moves == ()


def test_what_does_not_fit_is_refused():
    """Paths that are interrupted, empty, or hold a second difference; certificates of one kind."""
    same = Certificate.same(TREFOIL, TREFOIL, "identity", [])
    other = Certificate.same(EIGHT, EIGHT, "identity", [])
    unlike = certificate_between(TREFOIL, EIGHT)
    with pytest.raises(InputError, match='left braid "1 -2 1 -2": expected "1 1 1"'):
        join_same(same, other)
    with pytest.raises(InputError, match="left braid"):
        join_different(other, unlike, None)
    with pytest.raises(InputError, match="left braid"):
        join_chain([same, other])
    with pytest.raises(InputError, match="certificate of sameness: expected one of difference"):
        join_different(None, same, None)
    with pytest.raises(InputError, match="certificate of difference: expected one of sameness"):
        join_different(None, unlike, reverse_certificate(unlike))
    with pytest.raises(InputError, match="certificate of difference: expected one of sameness"):
        join_same(same, unlike)
    with pytest.raises(InputError, match="empty chain"):
        join_chain([])
    with pytest.raises(InputError, match="2 differences in one chain"):
        join_chain([unlike, reverse_certificate(unlike)])
    with pytest.raises(InputError, match="'turn'"):
        compose_symmetries("turn", "mirror")
    with pytest.raises(InputError, match="'turn'"):
        apply_symmetry_to_moves(TREFOIL, [], "turn")


@pytest.mark.parametrize("symmetry", SYMMETRIES)
@pytest.mark.parametrize(
    "move", [Rewrite((1, 2, 2, 2)), Conjugate((1,), (1, 2)), Stabilize(1, 4, (1, 2, 1, 3, 3))]
)
def test_a_false_claim_is_not_mended(move, symmetry):
    """Nothing is checked here, and the verifier sees through all of it.

    The left side closes to a Hopf link, the right one to another link.
    """
    left = Braid([1, 2, 1])
    end = Braid(move.word, move.strands if isinstance(move, Stabilize) else 3)
    right = apply_symmetry(end, symmetry)
    assert certificate_between(left, end).verdict == "different"
    false = Certificate.same(left, right, symmetry, [move])
    home = Certificate.same(right, right, "identity", [])
    assert not is_accepted(false, left, right)
    assert not is_accepted(reverse_certificate(false), right, left)
    assert not is_accepted(join_same(false, home), left, right)
    assert not is_accepted(join_chain([false]), left, right)
