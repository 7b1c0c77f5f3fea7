"""Invariants of small closed braids, computed naively: the oracle for moves on arc presentations.

The Jones polynomial comes from the Kauffman bracket, every state of every crossing gathered by
the planar matching that it leaves (Kauffman, State models and the Jones polynomial, 1987), and
the linking numbers from the crossings between components. Nothing is shared with the package
but the Braid value.
"""

from __future__ import annotations

import random
from collections import Counter

from braidsearch.diagrams.arc_moves import ArcMove, ArcMoveKind, apply_arc_move
from braidsearch.diagrams.arc_presentation import ArcPresentation
from braidsearch.errors import InputError
from braidsearch.words import Braid

Polynomial = dict[int, int]


def jones(braid: Braid) -> tuple[tuple[int, int], ...]:
    """(exponent of t in halves, coefficient) pairs; V(unknot) = 1, right-handed trefoil t + ..."""
    n = braid.strands
    identity = tuple([n + i for i in range(n)] + list(range(n)))  # tops 0..n-1, bottoms n..2n-1
    states: dict[tuple[int, ...], Polynomial] = {identity: {0: 1}}
    for letter in braid.word:
        # sigma_i = A^-1 + A U_i: with this choice the closure of 1 1 1 gets t + t^3 - t^4
        sign = 1 if letter > 0 else -1
        following: dict[tuple[int, ...], Counter[int]] = {}
        for matching, value in states.items():
            _add(following, matching, value, -sign, 0)
            hooked, loops = _hook(matching, n, abs(letter) - 1)
            _add(following, hooked, value, sign, loops)
        states = {matching: dict(value) for matching, value in following.items()}
    total: Counter[int] = Counter()
    for matching, value in states.items():
        _accumulate(total, value, 0, _closed_loops(matching, n) - 1)
    writhe = braid.exponent_sum
    # a positive kink multiplies this bracket by -A^-3, and V(t) is the unit-corrected bracket
    unit = -1 if writhe % 2 else 1
    shifted = {power + 3 * writhe: unit * c for power, c in total.items() if c}
    assert all(power % 2 == 0 for power in shifted)
    return tuple(sorted((power // 2, c) for power, c in shifted.items()))


def _add(target, matching, value, shift, loops):
    _accumulate(target.setdefault(matching, Counter()), value, shift, loops)


def _accumulate(target: Counter[int], value: Polynomial, shift: int, loops: int) -> None:
    for _ in range(loops):
        looped: Counter[int] = Counter()
        for power, c in value.items():
            looped[power + 2] -= c
            looped[power - 2] -= c
        value = dict(looped)
    for power, c in value.items():
        target[power + shift] += c


def _hook(matching: tuple[int, ...], n: int, i: int) -> tuple[tuple[int, ...], int]:
    pairs = list(matching)
    left, right = n + i, n + i + 1
    if pairs[left] == right:
        return matching, 1
    a, b = pairs[left], pairs[right]
    pairs[a], pairs[b] = b, a
    pairs[left], pairs[right] = right, left
    return tuple(pairs), 0


def _closed_loops(matching: tuple[int, ...], n: int) -> int:
    seen: set[int] = set()
    loops = 0
    for first in range(2 * n):
        loops += first not in seen
        point = first
        while point not in seen:
            seen.add(point)
            other = matching[point]
            seen.add(other)
            point = (other + n) % (2 * n)
    return loops


def linking_numbers(braid: Braid) -> tuple[int, ...]:
    """The linking numbers of all pairs of components, doubled and sorted."""
    owner = {start: index for index, cycle in enumerate(braid.component_cycles) for start in cycle}
    at = [owner[i] for i in range(braid.strands)]
    totals = {(i, j): 0 for j in range(braid.components) for i in range(j)}
    for letter in braid.word:
        i = abs(letter) - 1
        pair = (min(at[i], at[i + 1]), max(at[i], at[i + 1]))
        if pair[0] != pair[1]:
            totals[pair] += 1 if letter > 0 else -1
        at[i], at[i + 1] = at[i + 1], at[i]
    return tuple(sorted(totals.values()))


def invariants(braid: Braid) -> tuple[object, ...]:
    return braid.components, linking_numbers(braid), jones(braid)


def random_move(
    arcs: ArcPresentation, rng: random.Random, kinds: tuple[ArcMoveKind, ...] = tuple(ArcMoveKind)
) -> tuple[ArcMove, ArcPresentation] | None:
    """A move of a random kind of ``kinds`` at a random place where it applies, and its result."""
    kind = rng.choice(kinds)
    for _ in range(4 * arcs.size):
        move = ArcMove(kind, rng.randrange(arcs.size), rng.randrange(arcs.size + 1))
        try:
            return move, apply_arc_move(arcs, move)
        except InputError:
            continue
    return None
