"""Routes: what a search remembers of a way from one braid to another, to be proven on demand."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass, field
from functools import cached_property

from braidsearch.moves import Conjugate, Move, MoveChain
from braidsearch.words import Braid


@dataclass(frozen=True)
class Stretch:
    """A part of a route: where it ends, and how its moves are obtained when they are needed.

    A walk over arc presentations is remembered by its seed; it is walked again, and written out
    in moves, only when it turns out to be part of a proof.
    """

    end: Braid
    make_moves: Callable[[], Sequence[Move]] = field(compare=False)

    @classmethod
    def of_chain(cls, chain: MoveChain) -> Stretch:
        """The stretch of a chain whose moves are written already."""
        moves = tuple(chain.moves)
        return cls(chain.current, lambda: moves)

    @cached_property
    def moves(self) -> tuple[Move, ...]:
        """The moves of the stretch."""
        return tuple(self.make_moves())


@dataclass(frozen=True)
class Route:
    """A way from ``start`` through stretches, each beginning where the one before ends."""

    start: Braid
    stretches: tuple[Stretch, ...] = ()

    @property
    def current(self) -> Braid:
        """The braid to which the route leads."""
        return self.stretches[-1].end if self.stretches else self.start

    @property
    def moves(self) -> list[Move]:
        """All moves, not yet checked as a whole."""
        return [move for stretch in self.stretches for move in stretch.moves]

    def extended(self, *stretches: Stretch) -> Route:
        """The route with more stretches at its end."""
        return Route(self.start, (*self.stretches, *stretches))

    def conjugated(self, by: tuple[int, ...], end: Braid) -> Route:
        """The route with a conjugation by ``by`` at its end, which leads to ``end``."""
        step = Conjugate(by, end.word)
        return self.extended(Stretch(end, lambda: (step,)))

    def reversed_moves(self) -> list[Move]:
        """The moves that lead from ``current`` back to ``start``."""
        draft = MoveChain(self.start, is_checked=False)
        draft.extend(self.moves)
        return draft.reversed_moves()
