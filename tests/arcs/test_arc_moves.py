"""Every move keeps the link, and does to the strands what its docstring says."""

import random

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.diagrams import (
    ArcMove,
    ArcMoveKind,
    ArcPresentation,
    apply_arc_move,
    apply_arc_moves,
    arcs_from_word,
    word_from_arcs,
)
from braidsearch.errors import InputError
from braidsearch.words import Braid
from tests.arcs.oracle import invariants, random_move
from tests.strategies import braids

SPLITS = [kind for kind in ArcMoveKind if kind.name.startswith("SPLIT")]
STRAND_CHANGES = {
    ArcMoveKind.SWAP_COLUMNS: {0},
    ArcMoveKind.SWAP_ROWS: {0},
    ArcMoveKind.MERGE_COLUMNS: {0, -1},
    ArcMoveKind.MERGE_ROWS: {0, -1},
    ArcMoveKind.SPLIT_COLUMN_LATER: {0},
    ArcMoveKind.SPLIT_COLUMN_EARLIER: {1},
    ArcMoveKind.SPLIT_ROW_LATER: {0, 1},
    ArcMoveKind.SPLIT_ROW_EARLIER: {0, 1},
    ArcMoveKind.ROTATE_COLUMNS: {0},
    ArcMoveKind.ROTATE_ROWS: {0},
}


@pytest.mark.parametrize("kind", list(ArcMoveKind))
@given(
    braid=braids(max_strands=3, max_letters=8), seed=st.integers(0, 2**32), wander=st.integers(0, 8)
)
@settings(max_examples=40, deadline=None)
def test_every_kind_of_move_keeps_the_link(
    kind: ArcMoveKind, braid: Braid, seed: int, wander: int
) -> None:
    """Components, linking numbers and Jones polynomial stay under any move, from any place."""
    rng = random.Random(seed)
    arcs = arcs_from_word(braid)
    for _ in range(wander):
        step = random_move(arcs, rng)
        if step is not None and step[1].strands <= 5:
            arcs = step[1]
    step = random_move(arcs, rng, (kind,))
    if step is not None:
        after = step[1]
        assert after.strands - arcs.strands in STRAND_CHANGES[kind]
        assert invariants(word_from_arcs(after)) == invariants(word_from_arcs(arcs))


@given(braid=braids(max_strands=4, max_letters=12), data=st.data())
def test_merge_undoes_split(braid: Braid, data: st.DataObject) -> None:
    """Merging the two columns or rows that a split made gives back the same presentation."""
    arcs = arcs_from_word(braid)
    kind = data.draw(st.sampled_from(SPLITS))
    move = ArcMove(
        kind, data.draw(st.integers(0, arcs.size - 1)), data.draw(st.integers(0, arcs.size))
    )
    merge = ArcMoveKind.MERGE_COLUMNS if "COLUMN" in kind.name else ArcMoveKind.MERGE_ROWS
    assert apply_arc_moves(arcs, [move, ArcMove(merge, move.position)]) == arcs


@given(braid=braids(max_strands=4, max_letters=12), count=st.integers(-50, 50))
def test_rotations_have_the_order_of_the_size(braid: Braid, count: int) -> None:
    """Rotating by ``count`` and by its negative, or N times by one, changes nothing."""
    arcs = arcs_from_word(braid)
    for kind in (ArcMoveKind.ROTATE_COLUMNS, ArcMoveKind.ROTATE_ROWS):
        there_and_back = [ArcMove(kind, count), ArcMove(kind, -count)]
        assert apply_arc_moves(arcs, there_and_back) == arcs
        assert apply_arc_moves(arcs, [ArcMove(kind, 1)] * arcs.size) == arcs


def test_crossing_neighbours_are_not_swapped() -> None:
    """Interleaving columns, and columns with a common row, cannot change places."""
    trefoil = ArcPresentation((0, 1, 2, 3, 4), (2, 3, 4, 0, 1))
    for kind in (ArcMoveKind.SWAP_COLUMNS, ArcMoveKind.SWAP_ROWS):
        for position in range(trefoil.size):
            with pytest.raises(InputError):
                apply_arc_move(trefoil, ArcMove(kind, position))


def test_a_trivial_circle_is_not_merged() -> None:
    """A component of two columns and two rows has no merge, at any of its places."""
    circle = ArcPresentation((0, 1), (1, 0))
    for kind in (ArcMoveKind.MERGE_COLUMNS, ArcMoveKind.MERGE_ROWS):
        for position in (0, 1):
            with pytest.raises(InputError):
                apply_arc_move(circle, ArcMove(kind, position))


@pytest.mark.parametrize("kind", list(ArcMoveKind)[:8])
@pytest.mark.parametrize(("position", "new"), [(-1, 0), (2, 0), (0, 3), (0, -1)])
def test_places_outside_are_refused(kind: ArcMoveKind, position: int, new: int) -> None:
    """A position or a new place outside the presentation is an input error, never an index."""
    circle = ArcPresentation((0, 1), (1, 0))
    with pytest.raises(InputError):
        apply_arc_move(circle, ArcMove(kind, position, new))
