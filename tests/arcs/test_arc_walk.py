"""The walk: its moves are moves, its counts are right, and its seed decides everything."""

import signal
import subprocess
import sys
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch import compiling
from braidsearch.arc_walk import Phase, cool, cooled, find_short, heat, walk
from braidsearch.diagrams import (
    ArcMoveKind,
    ArcPresentation,
    apply_arc_move,
    apply_arc_moves,
    arcs_from_word,
    word_from_arcs,
)
from braidsearch.diagrams.arc_cuts import shortest_row_cut, torus_key, word_lengths
from braidsearch.diagrams.arc_moves import rotate_columns, rotate_rows
from braidsearch.errors import CapacityError
from braidsearch.words import Braid
from tests.arcs.oracle import invariants
from tests.strategies import braids

ROOT = Path(__file__).resolve().parents[2]
PLAN = (
    Phase(400, merges=0.3, exchanges=0.5),
    Phase(600, 4, merges=0.0),
    Phase(600, 6, merges=0.5),
    Phase(250),
)
SCRIPT = """
import sys
{prelude}
from braidsearch.arc_walk import Phase, find_short, iter_direct_moves, walk
from braidsearch.arc_walk.walking import is_compiled
from braidsearch.diagrams import arcs_from_word
from braidsearch.words import Braid
arcs = arcs_from_word(Braid([1, -2, 3, 3, 1, -2, 2, 1, -3, 2]))
done = walk(arcs, 17, (Phase(3000, 9, merges=0.5, exchanges=0.5), Phase(500)))
print(done.end, done.moves)
print(*iter_direct_moves([done, walk(done.end, 18, (Phase(800, 2), Phase(300)))]))
print(find_short(Braid([3, 3, -2, 3, -2, -1, -1, -1, 2, -1, 2]), 5, 20000)[0].arcs)
print(is_compiled(), file=sys.stderr)
"""


@given(braid=braids(max_strands=6, max_letters=40), seed=st.integers(0, 2**64))
@settings(max_examples=60, deadline=None)
def test_trace_replayed_by_pure_moves_ends_where_the_walk_ended(braid: Braid, seed: int) -> None:
    """Every recorded move is legal for the pure moves, and their chain has the walk's end."""
    arcs = arcs_from_word(braid)
    done = walk(arcs, seed, PLAN)
    moves = list(done.iter_moves())
    assert len(moves) == done.moves
    end = apply_arc_moves(arcs, moves)
    assert end == done.end
    assert end.strands == done.strands


def test_all_kinds_of_splits_and_merges_occur() -> None:
    """A heated walk uses every kind of swap, merge and split, none of them rarely."""
    done = walk(arcs_from_word(Braid([1, -2] * 6)), 3, (Phase(50_000, 400, merges=1.0),))
    kinds = [move.kind for move in done.iter_moves()]
    for kind in list(ArcMoveKind)[:8]:
        assert kinds.count(kind) > 40


def test_walk_counts_strands_in_both_directions() -> None:
    """Splits make strands and merges take them away, and no link is lost on the way."""
    braid = Braid([1, 1, 1, -2, 1, -2, 3], strands=4)
    arcs = arcs_from_word(braid)
    hot = heat(arcs, 11, 2_000, 8)
    assert hot.end.size == arcs.size + 8
    assert hot.strands > 4
    cold = cool(hot.end, 12, 20_000)
    assert cold.strands <= 3
    assert invariants(word_from_arcs(cold.end)) == invariants(braid)


def test_exchanges_can_be_left_out() -> None:
    """With a share of 0 no swap of rows that together cover the circle is made; with 1 some are."""

    def exchanges(share: float) -> int:
        arcs = arcs_from_word(Braid([1, 2, -1, 3, 2, -3, 1, 1, 3, -2] * 2))
        found = 0
        for move in walk(arcs, 5, (Phase(20_000, 10, 0.0, share),)).iter_moves():
            if move.kind is ArcMoveKind.SWAP_ROWS:
                found += _covers_circle(arcs, move.position)
            arcs = apply_arc_move(arcs, move)
        return found

    assert exchanges(0.0) == 0
    assert exchanges(1.0) > 10


def _covers_circle(arcs: ArcPresentation, row: int) -> bool:
    lower = (row + 1) % arcs.size

    def run(r: int) -> set[int]:
        """The gaps between columns that row r runs over; gap c lies after column c."""
        begin, end = arcs.enters[r], arcs.leaves[r]
        return {(begin + i) % arcs.size for i in range((end - begin) % arcs.size)}

    return run(row) | run(lower) == set(range(arcs.size))


@pytest.mark.parametrize(
    "prelude",
    [
        "sys.modules['numba'] = None",
        "import os; os.environ['NUMBA_DISABLE_JIT'] = '1'",
        "import numba\nnumba.njit = lambda *a, **k: (lambda f: lambda *b: 1 / 0)",
    ],
    ids=["not installed", "switched off", "failing"],
)
def test_plain_path_walks_the_same_walk(prelude: str) -> None:
    """Without a working compiler the same seed gives the same walk, on the plain source."""
    plain = _run(SCRIPT.format(prelude=prelude))
    assert plain.stderr.strip().endswith("False")
    assert plain.stdout == _run(SCRIPT.format(prelude="")).stdout


def test_unwritable_cache_still_compiles() -> None:
    """Where no folder can hold the compiled code, walks run compiled all the same."""
    pytest.importorskip("numba")
    prelude = (
        "from numba.core.dispatcher import Dispatcher\n"
        "def refuse(self): raise RuntimeError('cannot cache: no locator available')\n"
        "Dispatcher.enable_caching = refuse"
    )
    fresh = _run(SCRIPT.format(prelude=prelude))
    assert fresh.stderr.strip().endswith("True")
    assert fresh.stdout == _run(SCRIPT.format(prelude="")).stdout


def _run(script: str) -> subprocess.CompletedProcess[str]:
    return subprocess.run(
        [sys.executable, "-c", script], capture_output=True, text=True, check=True, cwd=ROOT
    )


@given(braid=braids(max_strands=5, max_letters=15))
@settings(max_examples=40, deadline=None)
def test_word_lengths_are_those_of_the_rotated_presentations(braid: Braid) -> None:
    """The lengths counted in one reading agree with the words read at every cut."""
    arcs = cool(arcs_from_word(braid), 1, 300).end
    lengths = tuple(len(word_from_arcs(rotate_rows(arcs, k))) for k in range(arcs.size))
    assert word_lengths(arcs) == lengths
    assert lengths[shortest_row_cut(arcs)] == min(lengths)


@given(braid=braids(max_strands=5, max_letters=15), j=st.integers(0, 40), k=st.integers(0, 40))
def test_torus_key_forgets_rotations_only(braid: Braid, j: int, k: int) -> None:
    """Rotations keep the key; it holds a rotation of the presentation, so it forgets no more."""
    arcs = arcs_from_word(braid)
    key = torus_key(arcs)
    assert torus_key(rotate_columns(rotate_rows(arcs, k), j)) == key
    stored = ArcPresentation(tuple(s for s, _ in key), tuple(e for _, e in key))
    turns = (rotate_columns(rotate_rows(arcs, b), a) for a in range(arcs.size) for b in [0])
    rows = [rotate_rows(turn, turn.starts[0]) for turn in turns]
    assert stored in rows


def test_mortons_unknot_cools_to_one_strand() -> None:
    """Morton's irreducible 4-braid of the unknot reaches one strand, with two columns.

    Morton, An irreducible 4-string braid with unknotted closure, 1983 (word from memory).
    """
    best = find_short(Braid([3, 3, -2, 3, -2, -1, -1, -1, 2, -1, 2]), 0, 300_000)[0]
    assert best.arcs.strands == 1
    assert best.arcs.size == 2
    assert apply_arc_moves(arcs_from_word(best.start), best.iter_moves()) == best.arcs


def test_find_short_results_are_reached_by_their_moves() -> None:
    """All results are on one strand count, best first, and their moves lead to them."""
    braid = Braid([1, 2, -3, 2, 2, 1, -3, 4, -1, 2, 3, 3], strands=5)
    results = find_short(braid, 3, 30_000)
    lengths = [len(result.braid) for result in results]
    assert lengths == sorted(lengths)
    assert len({result.arcs.strands for result in results}) == 1
    for result in results:
        assert apply_arc_moves(arcs_from_word(braid), result.iter_moves()) == result.arcs
        assert invariants(result.braid) == invariants(braid)


def test_too_large_presentations_are_refused() -> None:
    """A word with more columns than 16-bit cells can number is refused in words."""
    with pytest.raises(CapacityError):
        cooled(Braid([1] * 16_000), 0)


def test_an_interrupt_waits_for_the_compiler():
    """A keyboard interrupt during compilation is held back, and raised right after it."""
    reached: list[bool] = []
    with pytest.raises(KeyboardInterrupt):
        interrupt_while_deferred(reached)
    assert reached
    with pytest.raises(KeyboardInterrupt):
        signal.raise_signal(signal.SIGINT)


def interrupt_while_deferred(reached):
    with compiling.interrupts_deferred():
        signal.raise_signal(signal.SIGINT)
        reached.append(True)
