"""The way through the presentations that walks have visited: legal moves, and the fewest."""

from collections import deque
from collections.abc import Iterable, Sequence
from itertools import product

import networkx as nx
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.arc_walk import Phase, Walk, direct, direct_kernel, iter_direct_moves, walk
from braidsearch.arc_walk.direct_kernel import mark_of_column
from braidsearch.arc_walk.walking import recorded
from braidsearch.diagrams import (
    ArcMove,
    ArcMoveKind,
    ArcPresentation,
    apply_arc_move,
    apply_arc_moves,
    arcs_from_word,
)
from braidsearch.words import Braid
from tests.strategies import braids

SWAPS = (ArcMoveKind.SWAP_COLUMNS, ArcMoveKind.SWAP_ROWS)
PLANS = st.sampled_from(
    [
        (Phase(600),),
        (Phase(200, 3, merges=0.0), Phase(200)),
        (Phase(300, 2, merges=0.5, exchanges=0.3),),
        (Phase(0),),
    ]
)
SEEDS = st.integers(0, 2**64)


def visited(start: ArcPresentation, moves: Iterable[ArcMove]) -> list[ArcPresentation]:
    """The presentations on the way, both ends with it."""
    found = [start]
    for move in moves:
        found.append(apply_arc_move(found[-1], move))
    return found


def fewest_moves(walks: Sequence[Walk]) -> int:
    """How few of the walks' moves lead from end to end, by a graph of the very presentations."""
    graph = nx.DiGraph()
    for part in walks:
        moves = list(part.iter_moves())
        stages = visited(part.start, moves)
        graph.add_nodes_from(stages)
        for here, there, move in zip(stages, stages[1:], moves, strict=False):
            graph.add_edge(here, there)
            if move.kind in SWAPS:
                graph.add_edge(there, here)
    return int(nx.shortest_path_length(graph, walks[0].start, walks[-1].end))


@given(braids(max_strands=5, max_letters=14), st.lists(st.tuples(SEEDS, PLANS), min_size=1))
@settings(max_examples=40, deadline=None)
def test_direct_moves_lead_to_the_end_by_the_fewest(
    braid: Braid, drawn: list[tuple[int, tuple[Phase, ...]]]
) -> None:
    """They are legal moves from the start of the first walk to the end of the last, and no fewer
    of the moves made would do."""
    walks: deque[Walk] = deque()
    for seed, plan in drawn[:3]:
        start = walks[-1].end if walks else arcs_from_word(braid)
        walks.append(walk(start, seed, plan))
    moves = list(iter_direct_moves(walks))
    stages = visited(walks[0].start, moves)
    assert stages[-1] == walks[-1].end
    assert len(set(stages)) == len(stages)
    assert len(moves) == fewest_moves(walks)


def test_a_long_walk_on_few_columns_is_much_longer_than_its_way() -> None:
    """Tens of thousands of tries with a few arcs come back to the same places all the time."""
    arcs = arcs_from_word(Braid([1, 2, 3, 1, 2, 3, 1]))
    done = walk(arcs, 7, (Phase(40_000),))
    moves = list(iter_direct_moves([done]))
    assert apply_arc_moves(arcs, moves) == done.end
    assert 20 * len(moves) < done.moves


def test_where_the_loops_cannot_be_compiled_all_moves_are_made(
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    """A walk's own moves, every one, are a way to its end as well."""
    monkeypatch.setattr(direct, "_kernel", lambda: None)
    done = walk(arcs_from_word(Braid([1, -2, 1])), 3, (Phase(500),))
    assert list(iter_direct_moves([done])) == list(done.iter_moves())


def test_no_two_pairs_of_columns_have_one_mark() -> None:
    """Presentations that differ in two columns are told apart, whichever these are."""
    both = [
        np.array(
            [mark_of_column(*column, one) for column in product(range(17), range(9), range(9))]
        )
        for one in (direct_kernel.FIRST, direct_kernel.SECOND)
    ]
    rows, columns = np.triu_indices(len(both[0]), 1)
    first, second = ((marks[rows] + marks[columns]) % direct_kernel.PRIME for marks in both)
    pairs = first * (direct_kernel.PRIME + 1) + second
    assert len(np.unique(pairs)) == len(pairs) > 900_000


@pytest.mark.parametrize("letters", [10, 30])
def test_a_long_walk_marks_presentations_as_they_are(letters: int) -> None:
    """Of tens of thousands of visits, those have one mark that are of one presentation."""
    braid = Braid([1, -2, 3, 4, -3, 2, -1, 1, -2, -4] * (letters // 10))
    done = walk(arcs_from_word(braid), 5, (Phase(3_000, 3, merges=0.0), Phase(60_000, merges=0.0)))
    stages = visited(done.start, done.iter_moves())
    marks = direct.marks_of(direct_kernel, done, recorded(done))
    assert len(set(zip(stages, marks.tolist(), strict=True))) == len(set(stages))
    assert len(set(marks.tolist())) == len(set(stages))
    moves = list(iter_direct_moves([done]))
    assert apply_arc_moves(done.start, moves) == done.end
