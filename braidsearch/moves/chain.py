"""Chains of Markov moves under construction: each step is checked when it is made."""

from __future__ import annotations

from collections.abc import Iterable

from braidsearch.moves.markov import (
    Conjugate,
    Destabilize,
    Move,
    Rewrite,
    Stabilize,
    apply_move,
    reversed_move,
    stated_result,
)
from braidsearch.words import Braid
from braidsearch.words.reduction import free_reduce_letters


class MoveChain:
    """A growing chain of moves from ``start`` to ``current``; ``braids`` holds every stage.

    Every step is checked by the normal form as it is made and raises InputError when false, so a
    finished chain is a proof. A draft (``is_checked`` False) takes the moves at their word: a
    search makes many of them, and replays the few that it needs on a checked chain.
    """

    def __init__(self, start: Braid, is_checked: bool = True) -> None:
        self.braids = [start]
        self.moves: list[Move] = []
        self._apply = apply_move if is_checked else stated_result

    @property
    def start(self) -> Braid:
        """The braid from which the chain leads."""
        return self.braids[0]

    @property
    def current(self) -> Braid:
        """The braid to which the chain leads."""
        return self.braids[-1]

    def __len__(self) -> int:
        return len(self.moves)

    def append(self, move: Move) -> None:
        """Add a move. Raises InputError when it is false."""
        self.braids.append(self._apply(self.current, move))
        self.moves.append(move)

    def rewrite(self, word: Iterable[int]) -> None:
        """Replace the current word by another of the same element; nothing for the same word."""
        letters = tuple(word)
        if letters != self.current.word:
            self.append(Rewrite(letters))

    def conjugate(self, by: Iterable[int], word: Iterable[int] | None = None) -> None:
        """Conjugate by ``by``; ``word`` is by^-1 * current * by, freely reduced, if not given."""
        conjugator = tuple(free_reduce_letters(by))
        if word is None:
            inverse = tuple(-letter for letter in reversed(conjugator))
            word = free_reduce_letters(inverse + self.current.word + conjugator)
        letters = tuple(word)
        if not conjugator:
            self.rewrite(letters)
        else:
            self.append(Conjugate(conjugator, letters))

    def stabilize(self, sign: int) -> None:
        """Append the letter sign * n, and a strand."""
        strands = self.current.strands
        self.append(Stabilize(sign, strands + 1, (*self.current.word, sign * strands)))

    def destabilize(self) -> None:
        """Take the last letter away, and a strand; no other letter may have the last index."""
        *rest, last = self.current.word or (0,)
        self.append(Destabilize(1 if last > 0 else -1, self.current.strands - 1, tuple(rest)))

    def extend(self, moves: Iterable[Move]) -> None:
        """Add all moves in order."""
        for move in moves:
            self.append(move)

    def reversed_moves(self) -> list[Move]:
        """The moves that lead from ``current`` back to ``start``."""
        stages = zip(self.braids, self.moves, strict=False)
        return [reversed_move(before, move) for before, move in stages][::-1]
