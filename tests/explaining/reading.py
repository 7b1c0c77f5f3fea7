"""What tests of explanations share: certificates to explain, and checks of elementary steps."""

from __future__ import annotations

from dataclasses import replace
from functools import cache

from braidsearch.certificates import Certificate, read_certificate
from braidsearch.explaining import Expansion
from braidsearch.moves import Conjugate, Destabilize, Move, Rewrite, Stabilize
from braidsearch.moves.elementary_steps import (
    BRAID_RELATION,
    CANCELLATION,
    CONJUGATION,
    DESTABILIZATION,
    FAR_COMMUTATION,
    INSERTION,
    MIXED_BRAID_RELATION,
    STABILIZATION,
    ElementaryStep,
)
from braidsearch.moves.markov import stated_result
from braidsearch.words import Braid
from tests.verifier.cases import expected, path_of

ACCEPTED = sorted(expected("accepted"))


@cache
def accepted(name: str) -> Certificate:
    """A certificate of the folder of those that the verifier must accept."""
    return read_certificate(path_of("accepted", name))


def chains(certificate: Certificate) -> list[tuple[Braid, tuple[Move, ...]]]:
    """The chains of a certificate with the braids at which they start, in the order of steps."""
    found = [(certificate.left, certificate.moves)] if certificate.verdict == "same" else []
    for distinction in certificate.distinctions:
        found.append((certificate.left, distinction.left_moves))
        found.append((certificate.right, distinction.right_moves))
    return found


def without_moves(certificate: Certificate) -> Certificate:
    """The same claim and values without moves: of these only what is verified is explained."""
    kept = [
        replace(distinction, left_moves=(), right_moves=())
        for distinction in certificate.distinctions
    ]
    return replace(certificate, moves=(), distinctions=tuple(kept))


def last_braid(start: Braid, moves: tuple[Move, ...]) -> Braid:
    """Where a chain of moves says that it ends."""
    for move in moves:
        start = stated_result(start, move)
    return start


def check_steps(expansion: Expansion) -> None:
    """Every step is one of the eight kinds, acts where it says, and gives its move's word.

    Written from the definitions, without the code that made the steps.
    """
    steps = iter(expansion.steps)
    for start, moves in chains(expansion.certificate):
        braid = start
        for move in moves:
            step = next(steps)
            _check_step(braid, step, move)
            braid = stated_result(braid, move)
    assert next(steps, None) is None


def _check_step(braid: Braid, step: ElementaryStep, move: Move) -> None:
    at, before, after = step.place - 1, step.before, step.after
    end = at + len(before)
    if step.kind == CONJUGATION:
        assert isinstance(move, Conjugate)
        assert len(move.by) == 1
        assert (at, before, after) == (0, (), (-move.by[0], move.by[0]))
        assert move.word == (-move.by[0], *braid.word, move.by[0])
        return
    assert braid.word[at:end] == before
    assert move.word == braid.word[:at] + after + braid.word[end:]
    if step.kind in (STABILIZATION, DESTABILIZATION):
        assert type(move) is (Stabilize if step.kind == STABILIZATION else Destabilize)
        assert end == len(braid)
        return
    assert isinstance(move, Rewrite)
    assert _is_kind(step.kind, before, after), step


def _is_kind(kind: str, before: tuple[int, ...], after: tuple[int, ...]) -> bool:
    """Whether the letters before and after are those of a relation of this kind."""
    if kind in (INSERTION, CANCELLATION):
        none, pair = (before, after) if kind == INSERTION else (after, before)
        return none == () and len(pair) == 2 and pair[0] + pair[1] == 0
    if kind == FAR_COMMUTATION:
        one, other = before
        return after == (other, one) and abs(abs(one) - abs(other)) > 1
    signs = [1 if letter > 0 else -1 for letter in before]
    i, j, k = map(abs, before)
    is_relation = i == k and abs(i - j) == 1
    is_relation = is_relation and after == (signs[2] * j, signs[1] * i, signs[0] * j)
    if kind == BRAID_RELATION:
        return is_relation and signs in ([1, 1, 1], [-1, -1, -1])
    return (
        kind == MIXED_BRAID_RELATION
        and is_relation
        and signs not in ([1, 1, 1], [-1, -1, -1], [1, -1, 1], [-1, 1, -1])
    )
