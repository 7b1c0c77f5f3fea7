"""The moves that lead most directly through the presentations that walks have visited."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from functools import cache
from types import ModuleType

import numpy as np

from braidsearch import compiling
from braidsearch.arc_walk.walking import Walk, cells_of, is_compiled, recorded, zeros
from braidsearch.diagrams import ArcMove, ArcMoveKind


def iter_direct_moves(walks: Sequence[Walk]) -> Iterator[ArcMove]:
    """The fewest moves, among those the walks made, from their start to their end.

    Each walk begins where the one before it ends. A walk comes back to the same presentations
    again and again: loops between two visits are left out, and swaps may be taken back.
    """
    kernel = _kernel()
    if kernel is None:
        yield from (move for part in walks for move in part.iter_moves())
        return
    traces = [recorded(part) for part in walks]
    trace = np.concatenate([np.asarray(one) for one in traces])
    marks = [marks_of(kernel, part, one) for part, one in zip(walks, traces, strict=True)]
    visits = np.concatenate([marks[0], *(one[1:] for one in marks[1:])])
    for place in _way(kernel, visits, trace)[::-1]:
        code, position, new = map(int, trace[3 * place : 3 * place + 3])
        yield ArcMove(ArcMoveKind(code), position, new)


@cache
def _kernel() -> ModuleType | None:
    """The loops, compiled where those of walks are; loaded with the first proof, not before.

    None where the compiler takes the loops of walks and not these.
    """
    is_compiled()  # where that switches the compiler off, these loops are plain as well
    from braidsearch.arc_walk import direct_kernel  # noqa: PLC0415 - as above

    if is_compiled():
        trace, nodes, *room = (np.zeros(4, kind) for kind in (np.int32, *[np.int64] * 5))
        cells, marks = np.zeros(8, np.int16), np.zeros(4, np.int64)
        try:
            with compiling.interrupts_deferred():
                direct_kernel.mark_visits(cells, 2, 2, trace, 0, marks)
                direct_kernel.find_way(nodes, trace, 0, *room)
        except Exception:  # whatever the compiler raises, all moves of a walk prove as much
            return None
    return direct_kernel


def marks_of(kernel: ModuleType, part: Walk, trace: object) -> np.ndarray:
    """A number for each presentation that a walk visits, equal just for equal ones."""
    marks = zeros(part.moves + 1, np.int64)
    cells, capacity = cells_of(part.start, part.plan)
    kernel.mark_visits(cells, capacity, part.start.size, trace, part.moves, marks)
    return np.asarray(marks, dtype=np.int64)


def _way(kernel: ModuleType, visits: np.ndarray, trace: np.ndarray) -> list[int]:
    """The numbers of the moves along a shortest way from the first visit to the last, backwards."""
    count = len(visits) - 1
    distinct, nodes = np.unique(visits, return_inverse=True)
    begins, came = zeros(len(distinct) + 2, np.int64), zeros(len(distinct), np.int64)
    edges, queue = zeros(2 * count, np.int64), zeros(len(visits), np.int64)
    length = kernel.find_way(nodes, trace, count, begins, edges, came, queue)
    return [int(place) for place in queue[:length]]
