"""Tables over all pairs of simple elements, for groups small enough to hold them."""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache
from itertools import permutations

import numpy as np
from numpy.typing import NDArray

LARGEST_TABLE = 6

IntegerArray = NDArray[np.int64]


@dataclass(frozen=True)
class PairTables:
    """Every left-weighting of two simple elements, and the automaton that cuts words into blocks.

    A simple element is its place in ``permutations``, shape (n!, n), in lexicographic order.
    ``left`` and ``right``, shape (n! * n!,), hold the left-weighted pair of a and b at a * n! + b.
    A state of the automaton is a block: element a at a, the inverse of element a at n! + a;
    reading the letter l in state s looks up s * (2n - 1) + l + n - 1 (l = 0 fills up).
    ``emits`` says whether the block ends before the letter. ``factor_of_block`` holds, at
    2 * state + flips, the simple factor that the block becomes.
    """

    strands: int
    permutations: IntegerArray
    identity: int
    delta: int
    left: IntegerArray
    right: IntegerArray
    next_state: IntegerArray
    emits: IntegerArray
    is_negative: IntegerArray
    factor_of_block: IntegerArray


def weigh_arrays(left: IntegerArray, right: IntegerArray) -> tuple[IntegerArray, IntegerArray]:
    """The left-weighted pairs of two arrays of permutations, shape (pairs, n), as a new pair.

    sigma_i moves over where it starts the right factor and does not finish the left one; n rounds
    over all i suffice, as in a bubble sort of the columns.
    """
    strands = left.shape[1]
    before, after = np.argsort(left, axis=1).T.copy(), right.T.copy()
    for _ in range(strands):
        moved = False
        for index in range(strands - 1):
            swap = (after[index] > after[index + 1]) & (before[index] < before[index + 1])
            if swap.any():
                moved = True
                for array in (before, after):
                    here = np.where(swap, array[index + 1], array[index])
                    array[index + 1] = np.where(swap, array[index], array[index + 1])
                    array[index] = here
        if not moved:
            break
    return np.argsort(before.T, axis=1), after.T.copy()


@lru_cache(maxsize=LARGEST_TABLE)
def pair_tables(strands: int) -> PairTables:
    """The tables for the braid group on ``strands`` <= LARGEST_TABLE strands, made once."""
    table = np.array(list(permutations(range(strands))), dtype=np.int64).reshape(-1, strands)
    size = len(table)
    one, other = np.divmod(np.arange(size * size), size)
    left, right = weigh_arrays(table[one], table[other])
    flipped = rank(strands - 1 - table[:, ::-1])
    inverse = np.argsort(table, axis=1)
    left_complement = flipped[rank(strands - 1 - inverse)]
    next_state, emits = _cutting_automaton(table)
    straight = np.concatenate([np.arange(size), left_complement])
    factor_of_block = np.stack([straight, flipped[straight]], axis=1).reshape(-1)
    is_negative = np.repeat(np.array([0, 1], dtype=np.int64), size)
    is_negative[size] = 0  # the inverse of the identity is an empty block, not one delta less
    factor_of_block[2 * size : 2 * size + 2] = 0
    return PairTables(
        strands=strands,
        permutations=table,
        identity=0,
        delta=size - 1,
        left=rank(left),
        right=rank(right),
        next_state=next_state,
        emits=emits,
        is_negative=is_negative,
        factor_of_block=factor_of_block,
    )


def rank(table: IntegerArray) -> IntegerArray:
    """The places of permutations, shape (rows, n), in lexicographic order."""
    strands = table.shape[1]
    rank = np.zeros(len(table), dtype=np.int64)
    for index in range(strands):
        smaller = (table[:, index + 1 :] < table[:, index : index + 1]).sum(axis=1)
        rank = rank * (strands - index) + smaller
    return rank


def _cutting_automaton(table: IntegerArray) -> tuple[IntegerArray, IntegerArray]:
    """``next_state`` and ``emits`` of PairTables."""
    size, strands = table.shape
    width = 2 * strands - 1
    next_state = np.zeros((2 * size, width), dtype=np.int64)
    emits = np.zeros((2 * size, width), dtype=np.int64)
    next_state[:, strands - 1] = np.arange(2 * size)
    for index in range(1, strands):
        for sign, offset, arrays in (
            (1, 0, np.argsort(table, axis=1)),
            (-1, size, table),
        ):
            column = sign * index + strands - 1
            swapped = arrays.copy()
            swapped[:, [index - 1, index]] = arrays[:, [index, index - 1]]
            longer = rank(np.argsort(swapped, axis=1) if sign > 0 else swapped) + offset
            fits = arrays[:, index - 1] < arrays[:, index]
            own, letter = slice(offset, offset + size), longer[0]
            opposite_letter = letter - offset + (size - offset)
            next_state[own, column] = np.where(fits, longer, letter)
            emits[own, column] = ~fits
            next_state[own, -1 - column] = np.where(fits, opposite_letter, longer)
            emits[own, -1 - column] = fits
    emits[[0, size]] = 0
    return next_state.reshape(-1), emits.reshape(-1)
