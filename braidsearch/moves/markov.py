"""The four moves of which every proof consists, as values that state their result."""

from __future__ import annotations

from dataclasses import dataclass

from braidsearch.errors import CapacityError, InputError
from braidsearch.normal_form import are_equal
from braidsearch.words import MAX_LETTERS, Braid


@dataclass(frozen=True, slots=True)
class Rewrite:
    """Another word for the same element of the braid group."""

    word: tuple[int, ...]


@dataclass(frozen=True, slots=True)
class Conjugate:
    """A word for by^-1 * current * by."""

    by: tuple[int, ...]
    word: tuple[int, ...]


@dataclass(frozen=True, slots=True)
class Stabilize:
    """The current word followed by the letter sign * n, on n+1 = ``strands`` strands."""

    sign: int
    strands: int
    word: tuple[int, ...]


@dataclass(frozen=True, slots=True)
class Destabilize:
    """The current word without its last letter sign * (n-1), on n-1 = ``strands`` strands.

    No other letter of the current word may have the index n-1.
    """

    sign: int
    strands: int
    word: tuple[int, ...]


Move = Rewrite | Conjugate | Stabilize | Destabilize


def apply_move(current: Braid, move: Move) -> Braid:
    """The braid after the move, which is checked.

    By Markov's theorem (Markov, 1935; Birman, Braids, links and mapping class groups, 1974) the
    closures of both are the same oriented link. Raises InputError for a false step, CapacityError
    for a word that a certificate cannot hold.
    """
    longest = max(len(move.word), len(move.by) if isinstance(move, Conjugate) else 0)
    if longest > MAX_LETTERS:
        raise CapacityError(f"a move with {longest} letters: expected {MAX_LETTERS} at most")
    if isinstance(move, Rewrite):
        return _apply_conjugate(current, (), move.word, "rewrite")
    if isinstance(move, Conjugate):
        return _apply_conjugate(current, move.by, move.word, "conjugate")
    if isinstance(move, Stabilize):
        return _apply_stabilize(current, move)
    return _apply_destabilize(current, move)


def _apply_conjugate(
    current: Braid, by: tuple[int, ...], word: tuple[int, ...], name: str
) -> Braid:
    conjugator, result = Braid(by, current.strands).word, Braid(word, current.strands)
    before = Braid.trusted(current.word + conjugator, current.strands)
    after = Braid.trusted(conjugator + result.word, current.strands)
    if not are_equal(before, after):
        raise InputError(f"{name} to {list(word)}: expected a word for the element as conjugated")
    return result


def _apply_stabilize(current: Braid, move: Stabilize) -> Braid:
    expected = (*current.word, move.sign * current.strands)
    if move.sign not in (1, -1) or move.strands != current.strands + 1 or move.word != expected:
        raise InputError(f"stabilize to {list(move.word)}: expected {list(expected)}")
    return Braid(expected, move.strands)


def _apply_destabilize(current: Braid, move: Destabilize) -> Braid:
    last = move.sign * (current.strands - 1)
    fits = move.sign in (1, -1) and move.strands == current.strands - 1 >= 1
    if not fits or current.word != (*move.word, last):
        raise InputError(f"destabilize to {list(move.word)}: expected the last letter {last} taken")
    return Braid(move.word, move.strands)


def stated_result(before: Braid, move: Move) -> Braid:
    """The braid that the move says it leads to, unchecked."""
    strands = move.strands if isinstance(move, Stabilize | Destabilize) else before.strands
    return Braid.trusted(move.word, strands)


def reversed_move(before: Braid, move: Move) -> Move:
    """The move that leads from the result of ``move`` back to ``before``."""
    if isinstance(move, Rewrite):
        return Rewrite(before.word)
    if isinstance(move, Conjugate):
        return Conjugate(tuple(-letter for letter in reversed(move.by)), before.word)
    if isinstance(move, Stabilize):
        return Destabilize(move.sign, before.strands, before.word)
    return Stabilize(move.sign, before.strands, before.word)
