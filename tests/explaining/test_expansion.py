"""Expansions into elementary steps: certificates of the same claim, accepted unless damaged."""

import random
from dataclasses import replace
from functools import cache

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch import SearchLimits, compare, verify
from braidsearch.certificates import Certificate, format_certificate, parse_certificate
from braidsearch.errors import CapacityError, InputError
from braidsearch.explaining import expand_certificate
from braidsearch.moves import Conjugate, Move, MoveChain, Rewrite, elementary_relations, exchange
from braidsearch.words import Braid
from tests.explaining.reading import ACCEPTED, accepted, chains, check_steps, last_braid
from tests.knot_tables import iter_knots, iter_links
from tests.strategies import braids

LIMITS = SearchLimits(seconds=None, nodes=2_000)


def check_expansion(certificate: Certificate) -> int:
    """Expand, check every step and every end, and have the verifier accept; the number of steps."""
    expansion = expand_certificate(certificate)
    expanded = expansion.certificate
    check_steps(expansion)
    for (start, moves), (same_start, steps) in zip(
        chains(certificate), chains(expanded), strict=True
    ):
        assert same_start == start
        assert last_braid(start, steps) == last_braid(start, moves)
    kept = replace(expanded, moves=certificate.moves, distinctions=certificate.distinctions)
    assert kept == certificate
    for old, new in zip(certificate.distinctions, expanded.distinctions, strict=True):
        assert (old.invariant, old.parameters) == (new.invariant, new.parameters)
        assert (old.symmetry, old.left, old.right) == (new.symmetry, new.left, new.right)
    report = verify(expanded, left=certificate.left, right=certificate.right)
    assert report.valid, report.reason
    return len(expansion.steps)


@pytest.mark.parametrize("name", ACCEPTED)
def test_accepted_certificates_expand(name: str) -> None:
    """Every certificate that the verifier must accept is accepted in elementary steps too."""
    check_expansion(accepted(name))


@given(braids(max_strands=4, max_letters=8), braids(max_strands=4, max_letters=6))
def test_conjugations_and_stabilizations_expand(braid: Braid, by: Braid) -> None:
    """A chain of every kind of move, made at random, is accepted after it is expanded."""
    chain = MoveChain(braid)
    chain.stabilize(1)
    chain.conjugate([letter for letter in by.word if abs(letter) < chain.current.strands])
    chain.rewrite((*chain.current.word, 1, -1))
    chain.stabilize(-1)
    chain.destabilize()
    certificate = Certificate.same(braid, chain.current, "identity", chain.moves)
    assert check_expansion(certificate) >= 2


def test_an_exchange_takes_a_few_dozen_steps() -> None:
    """The exchange move of Birman and Menasco (1990), with a stabilization in its middle."""
    chain = MoveChain(Braid([1, 2, 2, 3, -1, 2, -1, -3]))
    exchange(chain, (1, 2, 2), (-1, 2, -1), 1)
    certificate = Certificate.same(chain.start, chain.current, "identity", chain.moves)
    assert len(certificate.moves) < check_expansion(certificate) <= 60


def test_powers_and_twists_are_taken_out_of_conjugators() -> None:
    """A conjugator of hundreds of letters that is a short one behind powers of the braid and full
    twists, which commute with it, takes no more than a few hundred steps.
    """
    word, short = (1, -2, 3, 4, -3, 2, -1, 4, 2, -3), (2, -1, 3)
    twist = (1, 2, 3, 4) * 5
    by = word * 12 + twist * 9 + short
    inverse = tuple(-letter for letter in reversed(short))
    target = inverse + word + short
    certificate = Certificate.same(
        Braid(word, 5), Braid(target, 5), "identity", [Conjugate(by, target)]
    )
    assert len(by) > 300
    assert check_expansion(certificate) <= 200


def test_loops_are_left_out() -> None:
    """A chain that comes back to a word needs nothing in between."""
    braid = Braid([1, 2])
    moves = [Conjugate((1,), (2, 1)), Conjugate((2,), (1, 2)), Rewrite((1, 2, 2, -2))]
    certificate = Certificate.same(braid, Braid([1, 2, 2, -2]), "identity", moves)
    assert check_expansion(certificate) == 1


def test_false_moves_are_refused() -> None:
    """A rewriting to another element, or a false conjugate, has no expansion."""
    for move in (Rewrite((2, 1)), Conjugate((1,), (1, 2, 2))):
        certificate = Certificate.same(Braid([1, 2]), Braid(move.word), "identity", [move])
        with pytest.raises(InputError):
            expand_certificate(certificate)


def test_more_steps_than_a_certificate_holds_are_refused(monkeypatch: pytest.MonkeyPatch) -> None:
    """The bounds on steps and on letters in all each end in one line."""
    certificate = accepted("same-exchange-written-out.json")
    for name, bound in (("MAX_RELATIONS", 20), ("MAX_LETTERS_IN_ALL", 100)):
        with monkeypatch.context() as changed:
            changed.setattr(elementary_relations, name, bound)
            with pytest.raises(CapacityError, match="expected no more") as refused:
                expand_certificate(certificate)
        assert "\n" not in str(refused.value)


@pytest.mark.parametrize("length", [3_000, 50_000])
def test_long_rewritings_end_soon(length: int) -> None:
    """Words of tens of thousands of letters are written anew, or refused, within seconds."""
    generator = random.Random(9)
    word = [generator.choice([1, -1]) * generator.randrange(1, 9) for _ in range(length)]
    other = [1, *word, -1] if length < 10_000 else [*word[::-1], 3]
    moves = [Rewrite(tuple(other))]
    certificate = Certificate.same(Braid(word), Braid(other), "identity", moves)
    with pytest.raises((CapacityError, InputError)):
        expand_certificate(certificate)


def test_a_long_way_around_does_not_fit() -> None:
    """Half of a word of thousands of letters, one by one around, is more than a file holds."""
    word = (*(1, 2) * 1000, *(1, 1, 2) * 300)
    moves = [Conjugate(word[:1450], word[1450:] + word[:1450])]
    certificate = Certificate.same(Braid(word), Braid(moves[0].word), "identity", moves)
    with pytest.raises(CapacityError, match="letters in all elementary steps"):
        expand_certificate(certificate)


@cache
def expanded_moves(name: str) -> tuple[Move, ...]:
    """The elementary moves of an accepted certificate."""
    return expand_certificate(accepted(name)).certificate.moves


@settings(max_examples=25)
@given(st.integers(0, 10**6))
def test_damaged_expansions_are_rejected(seed: int) -> None:
    """A letter changed in one step, or a step left out that changes the word, is noticed."""
    generator = random.Random(seed)
    certificate = accepted("same-morton-unknot.json")
    moves = list(expanded_moves("same-morton-unknot.json"))
    place = generator.randrange(len(moves))
    word = list(moves[place].word)
    if word and generator.random() < 0.5:
        at = generator.randrange(len(word))
        word[at] = -word[at]
        moves[place] = replace(moves[place], word=tuple(word))
    else:
        del moves[place : place + 1 + generator.randrange(2)]
        kinds = {type(move).__name__ for move in moves}
        if {"Stabilize", "Destabilize"} <= kinds and place + 1 < len(moves):
            moves[place] = replace(moves[place], word=(*moves[place].word, 1))
        else:
            moves = moves[:place]
    assert not verify(replace(certificate, moves=tuple(moves))).valid


def test_the_same_certificate_expands_to_the_same_bytes() -> None:
    """Nothing depends on the order of sets or on time."""
    certificate = accepted("same-morton-unknot.json")
    first = format_certificate(expand_certificate(certificate).certificate)
    again = expand_certificate(parse_certificate(format_certificate(certificate)))
    assert format_certificate(again.certificate) == first


def published_pairs(seed: int, knots: int, links: int) -> list[tuple[str, Braid, Braid]]:
    """Rows of the tables (C. Livingston, A. H. Moore, KnotInfo and LinkInfo) with two words."""
    generator = random.Random(seed)
    rows = [row for row in iter_knots(13) if len(row.braids) == 2]
    chosen = generator.sample(rows, knots)
    others = [row for row in iter_links(11) if len(set(row.braids)) == 2]
    chosen += generator.sample(others, links)
    return [(row.name, *row.braids) for row in chosen]


def test_a_sample_of_published_pairs_expands() -> None:
    """Proofs for two published words of one link, written out and accepted."""
    found = 0
    for _, left, right in published_pairs(1, 0, 12):
        certificate = compare(left, right, limits=SearchLimits(None, nodes=60)).certificate
        if certificate is not None:
            found += check_expansion(certificate) > 0
    assert found >= 5


@pytest.mark.slow
def test_two_hundred_published_pairs_expand() -> None:
    """Every proof that the search finds for a seeded sample, written out and accepted."""
    found = 0
    for name, left, right in published_pairs(2026, 50, 160):
        certificate = compare(left, right, limits=LIMITS).certificate
        if certificate is not None:
            found += 1
            assert check_expansion(certificate) >= 0, name
    assert found >= 200
