"""The cell modules of the Temperley-Lieb algebra: link states and how the generators act."""

from dataclasses import dataclass
from functools import lru_cache

import numpy as np

from braidsearch.invariants.wide_integers import IntArray

_State = tuple[int, ...]


@dataclass(frozen=True, eq=False)
class LinkStates:
    """All link states on ``strands`` points, grouped by their number of through strands.

    A link state joins some of the points in pairs by arcs that do not cross; the other points,
    under no arc, begin through strands. ``through`` has the number of through strands for each
    state, ``first`` and ``size`` the first state and the number of states of the same module.
    ``parity`` is 0 or 1 for each state.

    ``target[i, x]`` is the state to which e_(i+1), the cup and cap at points i and i+1, takes x:
    x itself if x joins the two points (then with a closed loop), -1 if e_(i+1) x is zero in the
    module since both points begin through strands. Otherwise the target has the other parity.
    """

    strands: int
    through: IntArray
    first: IntArray
    size: IntArray
    parity: IntArray
    target: IntArray


@lru_cache(maxsize=16)
def link_states(strands: int) -> LinkStates:
    """The table for so many strands; 924 states on 12."""
    states = sorted(_all_states(strands), key=_through_count)
    through = np.array([_through_count(state) for state in states], dtype=np.int64)
    counts, first, place, size = np.unique(
        through, return_index=True, return_inverse=True, return_counts=True
    )
    del counts
    number = {state: index for index, state in enumerate(states)}
    target = [
        [number.get(_apply_cup_cap(state, point), -1) for state in states]
        for point in range(strands - 1)
    ]
    return LinkStates(
        strands=strands,
        through=through,
        first=first[place].astype(np.int64),
        size=size[place].astype(np.int64),
        parity=np.array([_parity(state) for state in states], dtype=np.int64),
        target=np.array(target, dtype=np.int64).reshape(strands - 1, len(states)),
    )


def _all_states(strands: int) -> list[_State]:
    """Every link state as the tuple of the partners of its points; a through strand's is itself."""
    partial: list[tuple[_State, _State]] = [((), ())]
    for point in range(strands):
        longer = []
        for partners, open_points in partial:
            longer.append(((*partners, point), (*open_points, point)))
            if open_points:
                last = open_points[-1]
                joined = (*partners[:last], point, *partners[last + 1 :], last)
                longer.append((joined, open_points[:-1]))
        partial = longer
    return [partners for partners, _ in partial]


def _through_count(state: _State) -> int:
    return sum(1 for point, partner in enumerate(state) if point == partner)


def _apply_cup_cap(state: _State, point: int) -> _State:
    """The state under e at the two points from ``point`` on; () where that is zero."""
    left, right = state[point], state[point + 1]
    if left == point and right == point + 1:
        return ()
    if left == point + 1:
        return state
    result = list(state)
    result[point], result[point + 1] = point + 1, point
    if left == point:
        result[right] = right
    elif right == point + 1:
        result[left] = left
    else:
        result[left], result[right] = right, left
    return tuple(result)


def _parity(state: _State) -> int:
    """The parity that every e_i which moves the state changes.

    It is the sum of (length + 1) / 2 over the arcs and of half the position, rounded down, over
    the through strands. An arc's length is odd. Say e_i joins i and i+1, whose partners were a
    and b: where a < i and i+1 < b, the sum grows by 1; where both are on one side, say
    i+1 < b < a, it changes by b - (i+1), an odd length, less twice something; where i began a
    through strand and now b does, b - i is even and the sum changes by (b - i)/2 - (b - i)/2 - 1.
    """
    total = 0
    for point, partner in enumerate(state):
        if partner == point:
            total += point // 2
        elif partner > point:
            total += (partner - point + 1) // 2
    return total % 2
