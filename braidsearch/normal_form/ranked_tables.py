"""The simple elements of a small braid group as tables, for loops that are compiled."""

# ruff: noqa: PLR0913, PLR0917 - loose arguments, since compiled loops take no objects of ours

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache
from itertools import permutations
from typing import Any

import numpy as np

from braidsearch.compiling import compiled
from braidsearch.normal_form.pair_tables import LARGEST_TABLE, rank
from braidsearch.normal_form.simple_elements import Permutation, SimpleElements

# The entries of ``pairs`` at [a, b], and the rows of ``singles``.
LEFT, RIGHT, MEET, RESIDUE = range(4)
SAME, FLIP, COMPLEMENT = range(3)


Letters = tuple[int, ...]


@dataclass(frozen=True)
class RankedTables:
    """Simple elements named by their place among all permutations in lexicographic order.

    So the identity is 0, delta the last, and names compare as the permutations do. ``pairs``,
    shape (n!, n!, 4), holds the left-weighted pair of a and b, their greatest common left divisor,
    and the least r such that b divides a * r. ``singles``, shape (3, n!), holds a, its conjugate
    by delta (so the one by delta^k at [k % 2, a]), and the c with a * c = delta. ``words`` are
    shortest positive words; ``undoing[k % 2]`` are words for delta^-1 times the conjugate of a by
    delta^k. ``elements`` knows the element a by ``names[a]``.
    """

    strands: int
    permutations: tuple[Permutation, ...]
    words: tuple[Letters, ...]
    undoing: tuple[tuple[Letters, ...], ...]
    elements: SimpleElements
    names: tuple[int, ...]
    atoms: Any
    pairs: Any
    singles: Any


@lru_cache(maxsize=LARGEST_TABLE)
def ranked_tables(strands: int) -> RankedTables:
    """The tables for the braid group on ``strands`` <= LARGEST_TABLE strands, made once."""
    ordered = tuple(permutations(range(strands)))
    elements = SimpleElements(strands)
    names = tuple(elements.number(ends) for ends in ordered)
    table = np.array(ordered, dtype=np.int64).reshape(-1, strands)
    inverse = np.argsort(table, axis=1)
    same, flip = np.arange(len(table)), rank(strands - 1 - table[:, ::-1])
    singles = np.stack([same, flip, rank(strands - 1 - inverse)])
    without_first = _swapped(table)
    atoms = np.array(without_first[0], dtype=np.int64)
    with_last = rank(inverse)[_swapped(inverse)]
    pairs = np.zeros((len(table), len(table), 4), dtype=np.uint16)
    order = np.argsort(_crossings(table), kind="stable")
    starts, finishes = _descents(table), _descents(inverse)
    fill_weighted(pairs, order, without_first, with_last, starts, finishes)
    fill_meets(pairs, order, without_first, starts)
    fill_residues(pairs, order, without_first, starts, singles, rank(inverse))
    words = tuple(elements.word(name) for name in names)
    return RankedTables(
        strands=strands,
        permutations=ordered,
        words=words,
        undoing=tuple(_undoing(words, singles[COMPLEMENT][turned]) for turned in singles[:2]),
        elements=elements,
        names=names,
        atoms=atoms,
        pairs=pairs,
        singles=singles.astype(np.uint16),
    )


def _undoing(words: tuple[Letters, ...], complements: Any) -> tuple[Letters, ...]:
    """Words for delta^-1 * a, the inverse of the complement of a."""
    return tuple(tuple(-letter for letter in reversed(words[c])) for c in complements.tolist())


def _swapped(table: Any) -> Any:
    """The ranks of the permutations with entries i and i+1 swapped, shape (rows, n - 1)."""
    columns = []
    for index in range(table.shape[1] - 1):
        swapped = table.copy()
        swapped[:, [index, index + 1]] = table[:, [index + 1, index]]
        columns.append(rank(swapped))
    return np.ascontiguousarray(np.stack(columns, axis=1))


def _descents(table: Any) -> Any:
    """Whether entry i exceeds entry i+1, shape (rows, n - 1)."""
    return np.ascontiguousarray(table[:, :-1] > table[:, 1:])


def _crossings(table: Any) -> Any:
    """The lengths of the elements: their pairs of strands that cross."""
    upper = np.triu(np.ones((table.shape[1],) * 2, dtype=bool), 1)
    return ((table[:, :, None] > table[:, None, :]) & upper).sum(axis=(1, 2))


@compiled
def fill_weighted(
    pairs: Any, order: Any, without_first: Any, with_last: Any, starts: Any, finishes: Any
) -> None:
    """Left-weighted pairs: move one sigma_j across, and look up the pair with the shorter b."""
    for b in order:
        for a in range(len(order)):
            pairs[a, b, LEFT], pairs[a, b, RIGHT] = a, b
            for j in range(starts.shape[1]):
                if starts[b, j] and not finishes[a, j]:
                    longer, shorter = with_last[a, j], without_first[b, j]
                    pairs[a, b, LEFT] = pairs[longer, shorter, LEFT]
                    pairs[a, b, RIGHT] = pairs[longer, shorter, RIGHT]
                    break


@compiled
def fill_meets(pairs: Any, order: Any, without_first: Any, starts: Any) -> None:
    """Greatest common left divisors: sigma_j times that of the quotients, if both start with it."""
    for a in order:
        for b in range(len(order)):
            for j in range(starts.shape[1]):
                if starts[a, j] and starts[b, j]:
                    rest = pairs[without_first[a, j], without_first[b, j], MEET]
                    pairs[a, b, MEET] = without_first[rest, j]
                    break


@compiled
def fill_residues(
    pairs: Any, order: Any, without_first: Any, starts: Any, singles: Any, inverses: Any
) -> None:
    """Residues: that of sigma_j * a is the residue of a on that of sigma_j.

    The join of sigma_j and b is delta divided by the common right divisor of their complements,
    and a right divisor is a left divisor of the inverse permutation.
    """
    for b in range(len(order)):
        pairs[0, b, RESIDUE] = b
        for j in range(starts.shape[1]):
            one = inverses[singles[COMPLEMENT, without_first[0, j]]]
            other = inverses[singles[COMPLEMENT, b]]
            suffix = inverses[pairs[one, other, MEET]]
            join = singles[FLIP, singles[COMPLEMENT, suffix]]
            pairs[without_first[0, j], b, RESIDUE] = without_first[join, j]
    for a in order[starts.shape[1] + 1 :]:
        j = 0
        while not starts[a, j]:
            j += 1
        atom, rest = without_first[0, j], without_first[a, j]
        for b in range(len(order)):
            pairs[a, b, RESIDUE] = pairs[rest, pairs[atom, b, RESIDUE], RESIDUE]
