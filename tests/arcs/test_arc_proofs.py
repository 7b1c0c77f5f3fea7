"""Moves on arc presentations, written as Markov moves and accepted by the independent verifier."""

import random
from collections.abc import Iterable, Iterator
from itertools import pairwise

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.arc_walk import Phase, cool, cooled, find_short, walk
from braidsearch.certificates.values import Certificate
from braidsearch.certificates.writing import format_certificate
from braidsearch.diagrams import (
    ArcMove,
    ArcMoveKind,
    ArcPresentation,
    apply_arc_move,
    arcs_from_word,
    word_from_arcs,
)
from braidsearch.errors import InputError
from braidsearch.moves import MoveChain
from braidsearch.moves.arcs import (
    Conjugation,
    Destabilization,
    Exchange,
    Leg,
    Stabilization,
    composed,
    legs_from_arc_moves,
    reversed_leg,
    write_arc_moves,
    write_legs,
)
from braidsearch.moves.arcs.legs import exchange_as_conjugation, inverse_letters
from braidsearch.normal_form import are_equal
from braidsearch.normal_form.conjugators import short_conjugator
from braidsearch.verifier.verify import verify_text
from braidsearch.words import Braid
from tests.arcs.oracle import random_move
from tests.scrambles import scramble
from tests.strategies import braids, braids_on

MORTON = Braid([3, 3, -2, 3, -2, -1, -1, -1, 2, -1, 2])


def check_proof(arcs: ArcPresentation, moves: Iterable[ArcMove], end: Braid) -> MoveChain:
    """Write the moves as a chain, and have the verifier, which uses no normal form, accept it."""
    chain = MoveChain(word_from_arcs(arcs))
    write_arc_moves(chain, arcs, moves)
    assert chain.current == end
    certificate = Certificate.same(chain.start, end, "identity", chain.moves)
    report = verify_text(format_certificate(certificate))
    assert report.valid, report.reason
    return chain


def wandered(braid: Braid, rng: random.Random, steps: int) -> ArcPresentation:
    """A presentation some random moves away from the one of a word."""
    arcs = arcs_from_word(braid)
    for _ in range(steps):
        step = random_move(arcs, rng)
        if step is not None and step[1].strands <= 7:
            arcs = step[1]
    return arcs


def strand_changes(legs: list[Leg]) -> int:
    return sum(isinstance(leg, (Stabilization, Destabilization)) for leg in legs)


@pytest.mark.parametrize("kind", list(ArcMoveKind))
@given(
    braid=braids(max_strands=5, max_letters=16),
    seed=st.integers(0, 2**32),
    steps=st.integers(0, 8),
)
@settings(max_examples=60)
def test_every_kind_of_move_is_proven(
    kind: ArcMoveKind, braid: Braid, seed: int, steps: int
) -> None:
    """Each move has a proof, with one strand change for each strand gained or lost."""
    rng = random.Random(seed)
    arcs = wandered(braid, rng, steps)
    step = random_move(arcs, rng, (kind,))
    if step is not None:
        move, after = step
        legs = legs_from_arc_moves(arcs, [move])
        assert strand_changes(legs) == abs(after.strands - arcs.strands)
        check_proof(arcs, [move], word_from_arcs(after))


@pytest.mark.parametrize("seed", range(40))
def test_random_chains_are_proven(seed: int) -> None:
    """Forty random moves of all kinds in a row are one proof, and every kind of leg is met."""
    rng = random.Random(seed)
    strands = rng.randint(1, 6)
    letters = [sign * index for index in range(1, strands) for sign in (1, -1)]
    braid = Braid([rng.choice(letters) for _ in range(16)] if letters else [], strands=strands)
    arcs = start = arcs_from_word(braid)
    moves = []
    for _ in range(40):
        step = random_move(arcs, rng)
        if step is not None and step[1].strands <= 8 and step[1].size <= 50:
            moves.append(step[0])
            arcs = step[1]
    assert len(moves) > 10
    check_proof(start, moves, word_from_arcs(arcs))


def test_exchanges_are_proven_wherever_the_pair_lies() -> None:
    """Swaps of rows that cover the circle, cyclic ones included, are exchanges and are proven."""
    braid = Braid([1, 2, -1, 3, 2, -3, 1, 1, 3, -2] * 2)
    arcs = arcs_from_word(braid)
    found, at_the_cut = 0, 0
    for move in walk(arcs, 5, (Phase(15_000, 10, 0.0),)).iter_moves():
        after = apply_arc_move(arcs, move)
        if move.kind is ArcMoveKind.SWAP_ROWS:
            legs = legs_from_arc_moves(arcs, [move])
            if any(isinstance(leg, Exchange) for leg in legs):
                found += 1
                at_the_cut += move.position == arcs.size - 1
                check_proof(arcs, [move], word_from_arcs(after))
        arcs = after
    assert found > 30
    assert at_the_cut > 0


@pytest.mark.parametrize("seed", range(4))
def test_cooling_a_hundred_letters_is_proven(seed: int) -> None:
    """A walk of thousands of moves on a long word, exchanges included, is a checked chain."""
    rng = random.Random(seed)
    strands = rng.randint(4, 7)
    braid = Braid(
        [rng.choice([1, -1]) * rng.randint(1, strands - 1) for _ in range(100)], strands=strands
    )
    done = cooled(braid, seed, exchanges=0.5)
    assert done.moves > 1000
    check_proof(arcs_from_word(braid), done.iter_moves(), word_from_arcs(done.end))


@pytest.mark.parametrize("seed", range(4))
def test_heating_and_cooling_is_proven(seed: int) -> None:
    """Splits of all kinds, exchanges on many strands, and the merges after them are proven."""
    braid = Braid([1, -2, 3, 3, 1, -2, 2, 1, -3, 2])
    arcs = cool(arcs_from_word(braid), seed, 2_000).end
    done = walk(arcs, seed, (Phase(1_500, 6, merges=0.0), Phase(3_000)))
    legs = legs_from_arc_moves(arcs, done.iter_moves())
    assert strand_changes(legs) >= 4
    check_proof(arcs, done.iter_moves(), word_from_arcs(done.end))


@pytest.mark.parametrize("seed", range(3))
def test_mortons_unknot_is_proven(seed: int) -> None:
    """Morton's irreducible 4-braid of the unknot goes to one strand, with the proof checked.

    Morton, An irreducible 4-string braid with unknotted closure, 1983 (word from memory).
    """
    best = find_short(MORTON, seed, 300_000)[0]
    assert best.braid == Braid([], strands=1)
    check_proof(arcs_from_word(MORTON), best.iter_moves(), best.braid)


@pytest.mark.parametrize("seed", range(6))
def test_scrambled_unknots_cool_to_one_strand_with_short_proofs(seed: int) -> None:
    """Without exchanges in the cooling, one destabilization a strand proves an unknot."""
    rng = random.Random(seed)
    braid = scramble(Braid([], strands=1), rng, 150, 10)
    best = find_short(braid, seed, 300_000, exchanges=0.0)[0]
    assert best.arcs.strands == 1
    chain = check_proof(arcs_from_word(braid), best.iter_moves(), Braid([], strands=1))
    assert len(chain) <= 4 * braid.strands


@given(braid=braids(max_strands=4, max_letters=10), seed=st.integers(0, 2**32))
@settings(max_examples=30)
def test_reversed_legs_prove_the_way_back(braid: Braid, seed: int) -> None:
    """The legs of a walk, reversed, are a checked chain from its end to its start."""
    arcs = arcs_from_word(braid)
    done = walk(arcs, seed, (Phase(200), Phase(200, 3, merges=0.0), Phase(200)))
    legs = legs_from_arc_moves(arcs, done.iter_moves())
    back = [reversed_leg(leg) for leg in reversed(legs)]
    chain = MoveChain(word_from_arcs(done.end))
    write_legs(chain, back)
    assert chain.current == braid
    assert [reversed_leg(leg) for leg in reversed(back)] == legs


@given(braid=braids(max_strands=4, max_letters=10), seed=st.integers(0, 2**32))
@settings(max_examples=30)
def test_composed_legs_are_the_same_passage(braid: Braid, seed: int) -> None:
    """Composing keeps both ends and all strand changes, and leaves no two conjugations in a row."""
    arcs = arcs_from_word(braid)
    done = walk(arcs, seed, (Phase(150), Phase(200, 3, merges=0.0), Phase(200)))
    apart = [leg for move in _with_places(arcs, done.iter_moves()) for leg in move]
    for exchanges in (False, True):
        legs = composed(apart, exchanges=exchanges)
        hidden = 0 if exchanges else 2 * sum(isinstance(leg, Exchange) for leg in apart)
        assert strand_changes(legs) == strand_changes(apart) + hidden
        for before, after in pairwise(legs):
            assert before.target == after.source
            assert not (isinstance(before, Conjugation) and isinstance(after, Conjugation))
        ends = [legs[0].source, legs[-1].target] if legs else [braid, braid]
        assert ends == [braid, word_from_arcs(done.end)]


def _with_places(arcs: ArcPresentation, moves: Iterable[ArcMove]) -> Iterator[list[Leg]]:
    """The legs of each move by itself, with a trivial one in front of all of them."""
    start = word_from_arcs(arcs)
    yield [Conjugation(start, start, ())]
    for move in moves:
        yield legs_from_arc_moves(arcs, [move])
        arcs = apply_arc_move(arcs, move)


@given(strands=st.integers(2, 6), data=st.data())
def test_short_conjugator_conjugates_alike(strands: int, data: st.DataObject) -> None:
    """The shortened word conjugates every braid to the same element, and is never longer."""
    braid = data.draw(braids_on(strands))
    by = data.draw(braids_on(strands, max_letters=30))
    short = Braid(short_conjugator(by.word, strands), strands)
    assert len(short) <= len(by)
    assert are_equal(short.inverse() * braid * short, by.inverse() * braid * by)


@given(alpha=braids_on(4, max_letters=8), beta=braids_on(4, max_letters=8), data=st.data())
def test_exchange_over_commuting_part_is_a_conjugation(
    alpha: Braid, beta: Braid, data: st.DataObject
) -> None:
    """When alpha or beta avoids the neighbour of s, the exchange conjugates by the word stated."""
    sign = data.draw(st.sampled_from([1, -1]))
    few = tuple(letter for letter in alpha.word if abs(letter) < 3)
    for first, second in ((few, beta.word), (beta.word, few)):
        leg = Exchange(5, first, second, sign)
        by = exchange_as_conjugation(leg)
        assert by is not None
        element = Braid(by, 5)
        assert are_equal(element.inverse() * leg.source * element, leg.target)


def test_false_legs_are_refused() -> None:
    """A leg that does not hold raises where it is written, whatever its kind."""
    source = Braid([1, 2, -1], strands=3)
    false_legs: list[Leg] = [
        Conjugation(source, Braid([1, 2, 1], strands=3), ()),
        Conjugation(source, source, (1,)),
        Exchange(3, (1,), (-1,), 1),
        Destabilization(Braid([1], strands=2), 1),
    ]
    for leg in false_legs:
        with pytest.raises(InputError):
            write_legs(MoveChain(source), [leg])


@given(braid=braids(max_strands=5, max_letters=12))
def test_inverse_letters_cancel(braid: Braid) -> None:
    """A word followed by its inverse letters is the identity."""
    doubled = Braid(braid.word + inverse_letters(braid.word), braid.strands)
    assert are_equal(doubled, Braid([], strands=braid.strands))
