"""Short presentations of a link: cool, then heat and cool again from the best ones found."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass, field

from braidsearch.arc_walk.heats import HeatRange
from braidsearch.arc_walk.walking import Phase, Walk, mixed_seed, walk
from braidsearch.diagrams import (
    ArcMove,
    ArcMoveKind,
    ArcPresentation,
    apply_arc_move,
    arcs_from_word,
    word_from_arcs,
)
from braidsearch.diagrams.arc_cuts import presentation_key, shortest_row_cut, word_lengths
from braidsearch.words import Braid

COOLING_TRIES_A_COLUMN = 400
_HEATS = HeatRange(tries=(100, 600), splits=(1, 3), settling=250)
LARGEST_POOL = 64
_COLUMNS_A_HEAT = 200  # a larger presentation is heated in several places at once: every heat takes
# some time for each of its columns, whatever it does


@dataclass(frozen=True, slots=True)
class ShortPresentation:
    """A presentation reached from ``start``, with the walks that lead to it.

    ``arcs`` is cut between rows so that ``braid``, its word, has as few letters as possible.
    """

    start: Braid
    arcs: ArcPresentation
    walks: tuple[Walk, ...]
    tries: int

    @property
    def braid(self) -> Braid:
        """The word of the presentation."""
        return word_from_arcs(self.arcs)

    def iter_moves(self) -> Iterator[ArcMove]:
        """The moves from arcs_from_word(start) to ``arcs``: walks, and a rotation to the cut."""
        for part in self.walks:
            yield from part.iter_moves()
        end = self.walks[-1].end
        count = shortest_row_cut(end)
        if count:
            yield ArcMove(ArcMoveKind.ROTATE_ROWS, count)


@dataclass(slots=True)
class _Pool:
    """The presentations on the fewest strands so far: those with fewest letters, each once."""

    strands: int
    walks: list[tuple[int, tuple[Walk, ...]]] = field(default_factory=list)
    keys: set[tuple[tuple[int, int], ...]] = field(default_factory=set)

    def offer(self, walks: tuple[Walk, ...]) -> None:
        """Take a presentation in, unless it is known or on more strands than the best."""
        end = walks[-1]
        if end.strands > self.strands:
            return
        if end.strands < self.strands:
            self.strands = end.strands
            self.walks.clear()
            self.keys.clear()
        key = presentation_key(end.end)
        if key in self.keys:
            return
        self.keys.add(key)
        self.walks.append((min(word_lengths(end.end)), walks))
        self.walks.sort(key=lambda entry: entry[0])
        del self.walks[LARGEST_POOL:]


def cooled(braid: Braid, seed: int, *, exchanges: float = 0.02) -> Walk:
    """The presentation of a word, cooled with tries in proportion to its size."""
    arcs = arcs_from_word(braid)
    tries = COOLING_TRIES_A_COLUMN * arcs.size
    return walk(arcs, mixed_seed(seed, 0), (Phase(tries, merges=0.25, exchanges=exchanges),))


def find_short(  # noqa: PLR0913 - each option has its own default
    braid: Braid,
    seed: int,
    tries: int,
    *,
    keep: int = 8,
    should_stop: Callable[[], bool] = lambda: False,
    exchanges: float = 0.02,
) -> list[ShortPresentation]:
    """The best presentations that about ``tries`` tries reach: fewest strands, then letters.

    The word's own presentation is cooled; then each round heats one of the best ones by one to
    three splits for every 200 columns, cools it, and takes what it finds into the pool, where only
    the least strand count stays. At most ``keep`` results, best first; the same seed gives the
    same results.

    An exchange move costs a proof four moves and the other swaps cost nothing, so only a share of
    ``exchanges`` of them is made: a small one for short proofs, 1 to reach as far as can be.
    """
    first = cooled(braid, seed, exchanges=exchanges)
    pool = _Pool(first.strands)
    pool.offer((first,))
    spent = first.plan[0].tries
    number = 0
    while spent < tries and pool.strands > braid.components and not should_stop():
        number += 1
        _, chosen = pool.walks[mixed_seed(seed, number, 2) % len(pool.walks)]
        times = max(1, chosen[-1].end.size // _COLUMNS_A_HEAT)
        plan = _HEATS.plan(mixed_seed(seed, number, 1), exchanges, times)
        step = walk(chosen[-1].end, mixed_seed(seed, number, 3), plan)
        spent += sum(phase.tries for phase in plan)
        pool.offer((*chosen, step))
    return [_result(braid, walks, spent) for _, walks in pool.walks[:keep]]


def _result(braid: Braid, walks: tuple[Walk, ...], tries: int) -> ShortPresentation:
    end = walks[-1].end
    cut = ArcMove(ArcMoveKind.ROTATE_ROWS, shortest_row_cut(end))
    return ShortPresentation(braid, apply_arc_move(end, cut), walks, tries)
