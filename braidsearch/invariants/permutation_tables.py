"""The permutations of a few positions as numbered rows, for the basis of a Hecke algebra."""

from dataclasses import dataclass
from functools import lru_cache
from math import factorial

import numpy as np

from braidsearch.invariants.wide_integers import IntArray


@dataclass(frozen=True, eq=False)
class Ascents:
    """The rows w with w(a) < w(b), and beside each the row of w with these two exchanged.

    Even and odd permutations apart: ``even`` (with ``odd_partners``) and ``odd`` (with
    ``even_partners``), since the two exchanged permutations differ in parity.
    """

    even: IntArray
    odd_partners: IntArray
    odd: IntArray
    even_partners: IntArray


@lru_cache(maxsize=16)
def permutations(size: int) -> IntArray:
    """All permutations w of 0 .. size-1, one a row, as (w(0), ..., w(size-1)).

    Rows are in lexicographic order read from the last position to the first; so the block with
    w(size-1) = k has the rows of size - 1 in their order, values from k upwards raised by one.
    """
    if size == 0:
        return np.zeros((1, 0), dtype=np.int64)
    shorter = permutations(size - 1)
    blocks = []
    for last in range(size):
        raised = shorter + (shorter >= last)
        blocks.append(np.column_stack([raised, np.full(len(shorter), last)]))
    return np.concatenate(blocks).astype(np.int64)


@lru_cache(maxsize=16)
def parities(size: int) -> IntArray:
    """The parity, 0 or 1, of the number of inversions of each row of ``permutations``."""
    if size == 0:
        return np.zeros(1, dtype=np.int64)
    shorter = parities(size - 1)
    return np.concatenate([(shorter + size - 1 - last) % 2 for last in range(size)])


@lru_cache(maxsize=128)
def ascents(size: int, first: int, second: int) -> Ascents:
    """The table for the exchange of two positions, ``first`` before ``second``."""
    rows = permutations(size)
    low = np.flatnonzero(rows[:, first] < rows[:, second])
    exchanged = rows[low]
    exchanged[:, [first, second]] = exchanged[:, [second, first]]
    high = row_numbers(exchanged)
    is_odd = parities(size)[low] == 1
    return Ascents(low[~is_odd], high[~is_odd], low[is_odd], high[is_odd])


def row_numbers(rows: IntArray) -> IntArray:
    """The numbers of the given permutations, an array of shape (count, size)."""
    size = rows.shape[1]
    return np.searchsorted(_keys(permutations(size)), _keys(rows)).astype(np.int64)


def _keys(rows: IntArray) -> IntArray:
    """Numbers in the order of the rows: the values as digits, the last the most significant."""
    size = rows.shape[1]
    weights = (size + 1) ** np.arange(size, dtype=np.int64)
    keys: IntArray = rows @ weights
    return keys


def row_count(size: int) -> int:
    """The number of rows of ``permutations``."""
    return factorial(size)
