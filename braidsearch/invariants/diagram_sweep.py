"""An order in which to pass the crossings of a diagram so that few arcs are open at a time."""

from __future__ import annotations

import heapq
from collections.abc import Iterator
from dataclasses import dataclass
from math import comb

from braidsearch.diagrams.link_diagram import LinkDiagram

_STARTS = 12
_LARGEST_EFFORT = 20_000
"""At most so many crossings are tried as the first one, spread over the diagram; fewer where
all the sweeps together would pass more crossings than this."""


@dataclass(frozen=True)
class Sweep:
    """The crossings of a diagram in an order, and after each the number of open arcs.

    An arc is open when one of its two crossings has been passed and the other has not.
    """

    order: tuple[int, ...]
    open_arcs: tuple[int, ...]

    @property
    def width(self) -> int:
        """The largest number of arcs that are open at a time."""
        return max(self.open_arcs, default=0)

    @property
    def state_count(self) -> int:
        """Roughly the number of ways to join open arcs in pairs without crossings, summed up.

        The arcs across the edge of a disc, 2 m of them, have the m-th Catalan number.
        """
        return sum(comb(count, count // 2) // (count // 2 + 1) for count in self.open_arcs)


def sweep_diagram(diagram: LinkDiagram) -> Sweep:
    """The cheapest of several sweeps of the whole diagram, by ``state_count``."""
    count = len(diagram.crossings)
    tries = min(_STARTS, 1 + _LARGEST_EFFORT // max(count, 1))
    starts = sorted({count * number // tries for number in range(tries)}) if count else []
    sweeps = [_sweep_from(diagram, start) for start in starts]
    return min(sweeps, key=lambda sweep: sweep.state_count, default=Sweep((), ()))


def _sweep_from(diagram: LinkDiagram, start: int) -> Sweep:
    order: list[int] = []
    open_arcs: list[int] = []
    width = 0
    for crossing, touched in _iter_greedily(diagram, start):
        width += 4 - 2 * touched - 2 * _loops_at(diagram, crossing)
        order.append(crossing)
        open_arcs.append(width)
    return Sweep(tuple(order), tuple(open_arcs))


def _loops_at(diagram: LinkDiagram, crossing: int) -> int:
    return 4 - len(set(diagram.crossings[crossing].arcs))


def _iter_greedily(diagram: LinkDiagram, start: int) -> Iterator[tuple[int, int]]:
    """The crossings, each the one with the most open arcs, and among these the first reached.

    Yields each with its number of open arcs. Pieces of the diagram come one after the other.
    """
    opposite = diagram.opposite_ends
    touched = [0] * len(diagram.crossings)
    is_passed = [False] * len(diagram.crossings)
    reached = 0
    heads = [start, *(piece[0] for piece in diagram.pieces)]
    for head in heads:
        waiting = [] if is_passed[head] else [(0, 0, head)]
        while waiting:
            priority, _, crossing = heapq.heappop(waiting)
            if is_passed[crossing] or -priority != touched[crossing]:
                continue
            is_passed[crossing] = True
            yield crossing, touched[crossing]
            for end in range(4 * crossing, 4 * crossing + 4):
                neighbour = opposite[end] // 4
                if not is_passed[neighbour]:
                    touched[neighbour] += 1
                    reached += 1
                    heapq.heappush(waiting, (-touched[neighbour], reached, neighbour))
