"""A certificate written out in elementary steps, which is a certificate of the same claim again."""

from __future__ import annotations

from dataclasses import replace
from typing import NamedTuple

from braidsearch.certificates import Certificate, Distinction, format_certificate
from braidsearch.errors import CapacityError
from braidsearch.moves import Move
from braidsearch.moves.elementary_expansion import Stage, expand_moves
from braidsearch.moves.elementary_steps import ElementaryStep

_LARGEST_FILE = 16_000_000  # bytes of a certificate file, which are its characters


class Expansion(NamedTuple):
    """The certificate written out, and its elementary steps.

    Each step is one move of the certificate. The steps stand in the order of the moves: those of
    the proof of sameness; or, for each distinction, those of its ``left_moves``, then those of its
    ``right_moves``.
    """

    certificate: Certificate
    steps: tuple[ElementaryStep, ...]


def expand_certificate(certificate: Certificate) -> Expansion:
    """The certificate with every conjugation and rewriting written out in single relations.

    Conjugations are by one letter; rewritings are free insertions and cancellations, far
    commutations and braid relations (Artin, Theory of braids, 1947). The claim and the invariants
    are those of the given certificate, which the caller has verified. Raises InputError where a
    move is false, CapacityError for more steps than a certificate can hold.
    """
    if certificate.verdict == "same":
        stages = expand_moves(certificate.left, certificate.moves)
        expanded = replace(certificate, moves=tuple(move for _, move in stages))
        return _checked(Expansion(expanded, tuple(step for step, _ in stages)))
    distinctions = []
    steps: list[ElementaryStep] = []
    for distinction in certificate.distinctions:
        left = expand_moves(certificate.left, distinction.left_moves)
        right = expand_moves(certificate.right, distinction.right_moves)
        distinctions.append(_with_moves(distinction, left, right))
        steps += [step for step, _ in (*left, *right)]
    expanded = replace(certificate, distinctions=tuple(distinctions))
    return _checked(Expansion(expanded, tuple(steps)))


def _checked(expansion: Expansion) -> Expansion:
    """The expansion, unless its file would be larger than any verifier reads."""
    size = len(format_certificate(expansion.certificate))
    if size > _LARGEST_FILE:
        raise CapacityError(
            f"elementary steps of {size} bytes: expected at most {_LARGEST_FILE}, as a file holds"
        )
    return expansion


def _with_moves(distinction: Distinction, left: list[Stage], right: list[Stage]) -> Distinction:
    left_moves: list[Move] = [move for _, move in left]
    right_moves: list[Move] = [move for _, move in right]
    return Distinction(
        distinction.symmetry,
        distinction.invariant,
        distinction.parameters,
        left_moves,
        right_moves,
        distinction.left,
        distinction.right,
    )
