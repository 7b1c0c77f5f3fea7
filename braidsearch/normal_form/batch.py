"""Left normal forms of many words at once, as NumPy arrays."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from braidsearch.errors import InputError
from braidsearch.normal_form.left_normal_form import NormalForm, simple_sequence
from braidsearch.normal_form.pair_tables import LARGEST_TABLE, PairTables, pair_tables, weigh_arrays
from braidsearch.normal_form.simple_elements import simple_elements
from braidsearch.words import Braid

IntegerArray = NDArray[np.int64]


@dataclass(frozen=True)
class BatchNormalForm:
    """The left normal forms of a batch of words on the same strands.

    ``infima`` has shape (words,). ``factors`` has shape (words, longest, strands): the
    permutations of the factors, as in NormalForm, filled up with identity permutations at the end;
    ``lengths``, shape (words,), counts the true factors.
    """

    strands: int
    infima: IntegerArray
    lengths: IntegerArray
    factors: NDArray[np.int16]

    def __len__(self) -> int:
        return len(self.infima)

    def __getitem__(self, index: int) -> NormalForm:
        rows = self.factors[index, : self.lengths[index]].tolist()
        return NormalForm(self.strands, int(self.infima[index]), tuple(map(tuple, rows)))


def left_normal_forms(
    words: Sequence[Sequence[int]] | NDArray[np.integer], strands: int
) -> BatchNormalForm:
    """The left normal forms of many words in the braid group on ``strands`` strands.

    ``words``: an integer array of shape (words, letters) in which 0 fills up short words, or a
    sequence of words. Up to LARGEST_TABLE strands every step is a table look-up over the whole
    batch; above, permutations are arrays. Raises InputError for a letter outside the group.
    """
    letters = _letter_array(words, strands)
    if strands <= LARGEST_TABLE:
        return _by_tables(letters, pair_tables(strands))
    return _by_permutations(letters, strands)


def _letter_array(
    words: Sequence[Sequence[int]] | NDArray[np.integer], strands: int
) -> IntegerArray:
    if isinstance(words, np.ndarray):
        letters = words.astype(np.int64)
    else:
        longest = max(map(len, words), default=0)
        letters = np.zeros((len(words), longest), dtype=np.int64)
        for row, word in enumerate(words):
            letters[row, : len(word)] = word
    if letters.ndim != 2:
        raise InputError(f"an array with {letters.ndim} axes: expected (words, letters)")
    outside = letters[np.abs(letters) >= max(strands, 1)]
    if outside.size:
        raise InputError(
            f"letter {outside[0]}: expected an index from 1 to {strands - 1} on {strands} strands"
        )
    return letters


def _by_tables(letters: IntegerArray, tables: PairTables) -> BatchNormalForm:
    blocks, counts = _cut_into_blocks(letters, tables)
    order = np.argsort(-counts, kind="stable")
    blocks, counts = blocks[:, order], counts[order]
    factors, negatives = _factors_of_blocks(blocks, tables)
    factors = _weigh_columns(factors, counts, tables)
    deltas = np.cumprod(factors == tables.delta, axis=0).sum(axis=0)
    lengths = np.cumprod(factors != tables.identity, axis=0).sum(axis=0) - deltas
    back = np.argsort(order, kind="stable")
    shifted = _shift_columns(factors, deltas, int(lengths.max(initial=0)), tables.identity)
    return BatchNormalForm(
        strands=tables.strands,
        infima=(deltas - negatives)[back],
        lengths=lengths[back],
        factors=tables.permutations.astype(np.int16)[shifted[:, back].T],
    )


def _cut_into_blocks(
    letters: IntegerArray, tables: PairTables
) -> tuple[IntegerArray, IntegerArray]:
    """Cut every word greedily into simple elements and inverses of simple elements.

    Returns the states of the cutting automaton at the end of each block, shape (blocks, words),
    filled up with 0 (the empty block), and the number of blocks of each word.
    """
    count, length = letters.shape
    codes = (letters + (tables.strands - 1)).T.copy()
    width = 2 * tables.strands - 1
    blocks = np.zeros((length + 1, count), dtype=np.int64)
    flat = blocks.reshape(-1)
    places = np.arange(count)
    state = np.zeros(count, dtype=np.int64)
    for column in codes:
        step = state * width + column
        flat[places] = state
        places += np.take(tables.emits, step) * count
        state = np.take(tables.next_state, step)
    flat[places] = state
    counts = (places - np.arange(count)) // count + (
        state % len(tables.permutations) != tables.identity
    )
    return blocks[: int(counts.max(initial=0))], counts


def _factors_of_blocks(
    blocks: IntegerArray, tables: PairTables
) -> tuple[IntegerArray, IntegerArray]:
    """Simple factors, each flipped once for every later inverse block; the inverse blocks."""
    negative = tables.is_negative[blocks]
    total = negative.sum(axis=0)
    after = total - np.cumsum(negative, axis=0)
    return tables.factor_of_block[blocks * 2 + (after & 1)], total


def _weigh_columns(factors: IntegerArray, counts: IntegerArray, tables: PairTables) -> IntegerArray:
    """Insert factor after factor into left-weighted columns; ``counts`` must not increase.

    What is inserted already is held times n!, ready to be the left half of an index of a pair.
    The loop is bound by memory traffic, so it runs on the narrowest integers that hold a pair.
    """
    size = len(tables.permutations)
    narrow = np.min_scalar_type(-size * size)
    columns = factors.astype(narrow)
    left, right = tables.left.astype(narrow), (tables.right * size).astype(narrow)
    carried, index = np.empty(len(counts), dtype=narrow), np.empty(len(counts), dtype=np.intp)
    columns[:1] *= narrow.type(size)
    for position in range(1, len(columns)):
        active = int(np.searchsorted(-counts, -position, side="left"))
        moving, pair = carried[:active], index[:active]
        moving[:] = columns[position, :active]
        for row in range(position - 1, -1, -1):
            np.add(columns[row, :active], moving, out=pair)
            right.take(pair, out=columns[row + 1, :active], mode="clip")
            left.take(pair, out=moving, mode="clip")
        np.multiply(moving, size, out=columns[0, :active])
    return columns.astype(np.int64) // size


def _shift_columns(
    factors: IntegerArray, shifts: IntegerArray, longest: int, fill: int
) -> IntegerArray:
    """Each column moved up by its own shift, cut to the longest, filled up at the end."""
    rows = np.arange(longest)[:, None] + shifts
    if not len(factors):
        return np.full(rows.shape, fill, dtype=np.int64)
    inside = rows < len(factors)
    taken = np.take_along_axis(factors, np.minimum(rows, len(factors) - 1), axis=0)
    return np.where(inside, taken, fill)


def _by_permutations(letters: IntegerArray, strands: int) -> BatchNormalForm:
    """The same insertion with permutations as arrays, for any number of strands."""
    elements = simple_elements(strands)
    sequences = [simple_sequence(elements, row[row != 0].tolist()) for row in letters]
    longest = max((len(sequence) for _, sequence in sequences), default=0)
    identity = np.arange(strands)
    factors = np.broadcast_to(identity, (longest, len(sequences), strands)).copy()
    for column, (_, sequence) in enumerate(sequences):
        for row, name in enumerate(sequence):
            factors[row, column] = elements.permutations[name]
    for position in range(1, longest):
        moving = np.arange(len(sequences))
        for row in range(position - 1, -1, -1):
            before = factors[row, moving]
            left, right = weigh_arrays(before, factors[row + 1, moving])
            factors[row, moving], factors[row + 1, moving] = left, right
            moving = moving[(left != before).any(axis=1)]
            if not moving.size:
                break
    is_delta = (factors == identity[::-1]).all(axis=2)
    deltas = np.cumprod(is_delta, axis=0).sum(axis=0)
    lengths = np.cumprod((factors != identity).any(axis=2), axis=0).sum(axis=0) - deltas
    shape = (len(sequences), int(lengths.max(initial=0)), strands)
    kept = np.broadcast_to(identity.astype(np.int16), shape).copy()
    for column, (shift, length) in enumerate(zip(deltas, lengths, strict=True)):
        kept[column, :length] = factors[shift : shift + length, column]
    infima = np.array([infimum for infimum, _ in sequences], dtype=np.int64) + deltas
    return BatchNormalForm(strands, infima, lengths, kept)


def left_normal_forms_of(braids: Sequence[Braid]) -> BatchNormalForm:
    """The same for braids, which must all have the same number of strands."""
    strands = {braid.strands for braid in braids}
    if len(strands) != 1:
        raise InputError(f"braids on {sorted(strands)} strands: expected one number of strands")
    return left_normal_forms([braid.word for braid in braids], strands.pop())
