"""Walks over arc presentations: cool, heat, any plan of phases, and their moves on demand."""

from __future__ import annotations

import importlib
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from functools import cache
from typing import Any

import numpy as np

from braidsearch import compiling
from braidsearch.arc_walk import kernels
from braidsearch.diagrams import ArcMove, ArcMoveKind, ArcPresentation
from braidsearch.errors import CapacityError

LARGEST_SIZE = 16_000  # cells are 16-bit; a split renumbers up to the size
_MASK = (1 << 64) - 1


@dataclass(frozen=True, slots=True)
class Phase:
    """A part of a walk: ``tries`` proposals of neighbouring columns or rows.

    ``splits`` are spread evenly over the tries. ``merges`` is the share (0 to 1) of the merges
    seen that are made when they keep the strand count; those that take a strand away are all
    made, and what still merges at the end of the phase is merged, unless the share is 0.
    ``exchanges`` is the share of the swaps made among those that exchange the closed braid.
    """

    tries: int
    splits: int = 0
    merges: float = 1.0
    exchanges: float = 1.0


@dataclass(frozen=True, slots=True)
class Walk:
    """A finished walk: start, seed and plan, its end and the number of accepted moves."""

    start: ArcPresentation
    seed: int
    plan: tuple[Phase, ...]
    end: ArcPresentation
    strands: int
    moves: int

    def iter_moves(self) -> Iterator[ArcMove]:
        """The accepted moves in order, by walking once more with a trace."""
        trace = recorded(self)
        for place in range(0, 3 * self.moves, 3):
            yield ArcMove(ArcMoveKind(trace[place]), int(trace[place + 1]), int(trace[place + 2]))


def recorded(walk: Walk) -> Any:
    """The accepted moves of a walk in a row, three numbers each, by walking once more."""
    trace = zeros(3 * walk.moves, np.int32)
    cells, capacity, numbers = _packed(walk.start, walk.seed, walk.plan)
    kernels.walk(cells, capacity, numbers, _plan_cells(walk.plan), trace)
    return trace


def walk(arcs: ArcPresentation, seed: int, plan: Sequence[Phase]) -> Walk:
    """Walk from ``arcs`` through the phases; the same seed gives the same walk on any machine.

    Raises CapacityError for presentations too large for 16-bit cells.
    """
    phases = tuple(plan)
    cells, capacity, numbers = _packed(arcs, seed, phases)
    kernels.walk(cells, capacity, numbers, _plan_cells(phases), zeros(0, np.int32))
    size = int(numbers[kernels.SIZE])
    end = ArcPresentation(
        tuple(map(int, cells[:size])), tuple(map(int, cells[capacity : capacity + size]))
    )
    strands, moves = int(numbers[kernels.STRANDS]), int(numbers[kernels.ACCEPTED])
    return Walk(arcs, seed, phases, end, strands, moves)


def cool(arcs: ArcPresentation, seed: int, tries: int, *, exchanges: float = 1.0) -> Walk:
    """Random swaps, and every merge as soon as it is seen; the presentation only gets smaller."""
    return walk(arcs, seed, (Phase(tries, exchanges=exchanges),))


def heat(
    arcs: ArcPresentation, seed: int, tries: int, splits: int, *, exchanges: float = 1.0
) -> Walk:
    """Random swaps with ``splits`` splits of random kinds among them, and no merges."""
    return walk(arcs, seed, (Phase(tries, splits, merges=0.0, exchanges=exchanges),))


def mixed_seed(*parts: int) -> int:
    """A seed made from several integers, by the finalizer of splitmix64 (Steele et al., 2014)."""
    state = 0x9E3779B97F4A7C15
    for part in parts:
        state = (state ^ part) + 0x9E3779B97F4A7C15 & _MASK
        state = (state ^ state >> 30) * 0xBF58476D1CE4E5B9 & _MASK
        state = (state ^ state >> 27) * 0x94D049BB133111EB & _MASK
        state ^= state >> 31
    return state


@cache
def is_compiled() -> bool:
    """Whether walks run compiled; the first call compiles, or loads what was compiled before.

    Where the compiler is present but fails, the loops are loaded again as plain functions.
    """
    if not compiling.is_compiled():
        return False
    circle = np.array([0, 1, 1, 0, 0, 1, 1, 0], dtype=np.int16)
    numbers = np.array([2, 1, 1, 0, 0, 0], dtype=np.int64)
    plan = np.array([1, 0, 0, 0], dtype=np.int64)
    try:
        with compiling.interrupts_deferred():
            kernels.walk(circle, 2, numbers, plan, np.zeros(0, dtype=np.int32))
    except Exception:  # whatever the compiler raises, the plain loops need none of it
        compiling.switch_off()
        importlib.reload(kernels)
        return False
    return True


def _packed(arcs: ArcPresentation, seed: int, plan: tuple[Phase, ...]) -> tuple[Any, int, Any]:
    """The cells of a presentation with room for the splits of a plan, and the walk's numbers."""
    cells, capacity = cells_of(arcs, plan)
    numbers = zeros(kernels.NUMBERS, np.int64)
    numbers[kernels.SIZE] = arcs.size
    numbers[kernels.STRANDS] = arcs.strands
    numbers[kernels.RANDOM] = (mixed_seed(seed) >> 3) or 1  # below 2^61, and not the fixed point 0
    return cells, capacity, numbers


def cells_of(arcs: ArcPresentation, plan: Sequence[Phase]) -> tuple[Any, int]:
    """The cells of a presentation with room for the splits of a plan, and their capacity."""
    size = arcs.size
    capacity = size + sum(phase.splits for phase in plan)
    if capacity > LARGEST_SIZE:
        raise CapacityError(f"{capacity} columns: a walk takes at most {LARGEST_SIZE}")
    cells = zeros(4 * capacity, np.int16)
    for section, values in enumerate((arcs.starts, arcs.ends, arcs.leaves, arcs.enters)):
        cells[section * capacity : section * capacity + size] = values
    return cells, capacity


def _plan_cells(plan: tuple[Phase, ...]) -> Any:
    values = []
    for phase in plan:
        rates = (round(share * kernels.RATE_ONE) for share in (phase.merges, phase.exchanges))
        values += [phase.tries, phase.splits, *rates]
    return np.array(values, dtype=np.int64) if is_compiled() else values


def zeros(count: int, kind: type[np.generic]) -> Any:
    """Zeros for the compiled loops; for the plain ones a list, whose integers cannot overflow."""
    return np.zeros(count, dtype=kind) if is_compiled() else [0] * count
