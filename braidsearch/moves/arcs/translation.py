"""From a chain of moves on arc presentations to legs between braid words."""

from __future__ import annotations

from bisect import bisect_left
from collections.abc import Iterable

from braidsearch.diagrams.arc_moves import ArcMove, ArcMoveKind, apply_arc_move
from braidsearch.diagrams.arc_presentation import (
    ArcPresentation,
    active_rows,
    word_from_arcs,
)
from braidsearch.moves.arcs.frames import jump_letters, over_all, rotated
from braidsearch.moves.arcs.legs import Leg, LegBuilder, Letters, inverse_letters
from braidsearch.moves.arcs.strand_changes import exchange_legs, merge_legs, split_legs

_Axis = tuple[list[int], list[int]]
_MERGES = (ArcMoveKind.MERGE_COLUMNS, ArcMoveKind.MERGE_ROWS)


def legs_from_arc_moves(arcs: ArcPresentation, moves: Iterable[ArcMove]) -> list[Leg]:
    """Legs from the word of ``arcs`` to the word of the presentation that the moves reach.

    Swaps that exchange nothing, rotations, and splits and merges that keep the strand count only
    conjugate, and whole runs of them become one Conjugation. Nothing is checked here by the word
    problem: each leg is checked when it is written as moves.
    """
    translator = _Translator(arcs)
    for move in moves:
        translator.apply(move)
    return translator.finish()


class _Translator:
    """The presentation reached, as lists that a swap changes in a few places, and the legs."""

    def __init__(self, arcs: ArcPresentation) -> None:
        self.builder = LegBuilder(word_from_arcs(arcs))
        self._load(arcs)

    def _load(self, arcs: ArcPresentation) -> None:
        self.size = arcs.size
        self.starts, self.ends = list(arcs.starts), list(arcs.ends)
        self.leaves, self.enters = list(arcs.leaves), list(arcs.enters)

    def _arcs(self) -> ArcPresentation:
        return ArcPresentation(tuple(self.starts), tuple(self.ends))

    def finish(self) -> list[Leg]:
        """Settle on the word of the presentation reached, and hand over the legs."""
        self.builder.settle(word_from_arcs(self._arcs()).word)
        return self.builder.legs

    def apply(self, move: ArcMove) -> None:
        """Translate one move, and make it."""
        if move.kind is ArcMoveKind.SWAP_COLUMNS:
            self._swap_columns(move)
        elif move.kind is ArcMoveKind.SWAP_ROWS:
            self._swap_rows(move)
        else:
            self._change(move)

    def _change(self, move: ArcMove) -> None:
        arcs = self._arcs()
        if move.kind in (ArcMoveKind.ROTATE_COLUMNS, ArcMoveKind.ROTATE_ROWS):
            columns = move.position if move.kind is ArcMoveKind.ROTATE_COLUMNS else 0
            rows = move.position if move.kind is ArcMoveKind.ROTATE_ROWS else 0
            self.builder.conjugate(rotated(arcs, columns, rows)[1])
        else:
            legs = merge_legs(arcs, move) if move.kind in _MERGES else split_legs(arcs, move)
            for leg in legs:
                self.builder.add(leg)
        self._load(apply_arc_move(arcs, move))

    def _swap_columns(self, move: ArcMove) -> None:
        p = move.position
        q = (p + 1) % self.size
        if p > q:
            self.builder.conjugate(self._cut_conjugator(p, q))
        _swap((self.starts, self.ends), (self.leaves, self.enters), p, q)

    def _cut_conjugator(self, last: int, first: int) -> Letters:
        """What the swap of the columns on both sides of the cut conjugates by.

        The last column's letters L are taken to the front, where the two columns change places;
        the other column's letters M, now in front, are taken to the end: L^-1 M.
        """
        active = set(active_rows(self.enters, self.leaves))
        active ^= {self.starts[last], self.ends[last]}
        before = sorted(active)
        letters = jump_letters(before, self.starts[last], self.ends[last])
        others = jump_letters(before, self.starts[first], self.ends[first])
        return inverse_letters(letters) + others

    def _swap_rows(self, move: ArcMove) -> None:
        p = move.position
        q = (p + 1) % self.size
        entry = self.enters[p]
        to_leave, to_enter, end = (
            (column - entry) % self.size
            for column in (self.leaves[q], self.enters[q], self.leaves[p])
        )
        if to_leave < to_enter < end:
            for leg in exchange_legs(self._arcs(), p):
                self.builder.add(leg)
        else:
            # The lower row runs inside the upper one, or the other way round, or neither.
            self._conjugate_nested(p, q, lower_inside=to_enter < to_leave < end)
        _swap((self.leaves, self.enters), (self.starts, self.ends), p, q)

    def _conjugate_nested(self, p: int, q: int, *, lower_inside: bool) -> None:
        """Two rows that both run across the cut: the inner one passes over the outer one there.

        The last row and the first are brought together by a rotation before, undone after.
        """
        upper_active = self.enters[p] > self.leaves[p]
        lower_active = self.enters[q] > self.leaves[q]
        if p < q and not (upper_active and lower_active):
            return
        active = active_rows(self.enters, self.leaves)
        turn = over_all(len(active))
        if p > q and lower_active:
            self.builder.conjugate(turn)
        if upper_active and lower_active:
            # At the bottom after the rotation, the upper row of the pair is the last but one.
            place = len(active) - 1 if p > q else 1 + bisect_left(active, p)
            self.builder.conjugate((-place,) if lower_inside else (place,))
        if p > q and upper_active:
            self.builder.conjugate(inverse_letters(turn))


def _swap(axis: _Axis, other: _Axis, p: int, q: int) -> None:
    """Exchange places p and q of an axis, whose inverses the other axis holds."""
    for values, places in zip(axis, other, strict=True):
        values[p], values[q] = values[q], values[p]
        places[values[p]], places[values[q]] = p, q
