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

    ``infima`` and ``lengths``, shape (words,), hold the infimum and the number of factors of each.
    ``names``, shape (words, longest), names the factors: rows of ``permutations``, shape
    (simple elements, strands), in which a strand that starts at position i ends at the entry i.
    Name 0 is the identity and fills up short normal forms.
    """

    strands: int
    infima: IntegerArray
    lengths: IntegerArray
    names: NDArray[np.integer]
    permutations: IntegerArray

    def __len__(self) -> int:
        return len(self.infima)

    def __getitem__(self, index: int) -> NormalForm:
        rows = self.permutations[self.names[index, : self.lengths[index]]].tolist()
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
    sequences, negatives = _factors_of_blocks(blocks[:, order], tables)
    factors = _weigh_columns(sequences, counts[order], tables)
    deltas = (factors == tables.delta).sum(axis=0) if tables.delta else 0 * negatives
    lengths = (factors != tables.identity).sum(axis=0) - deltas
    back = np.empty_like(order)
    back[order] = np.arange(len(order))
    names = _shift_columns(factors, deltas, int(lengths.max(initial=0)))
    return BatchNormalForm(
        strands=tables.strands,
        infima=(deltas - negatives)[back],
        lengths=lengths[back],
        names=names.T[back],
        permutations=tables.permutations,
    )


def _cut_into_blocks(
    letters: IntegerArray, tables: PairTables
) -> tuple[NDArray[np.int16], IntegerArray]:
    """Cut every word greedily into simple elements and inverses of simple elements.

    Returns the states of the cutting automaton at the end of each block, shape (blocks, words),
    filled up with 0 (the empty block), and the number of blocks of each word.
    """
    count, length = letters.shape
    codes = (letters + (tables.strands - 1)).T.copy()
    width = 2 * tables.strands - 1
    blocks = np.zeros((length + 1, count), dtype=np.int16)
    flat = blocks.reshape(-1)
    first, row_steps = np.arange(count), tables.emits * count
    places, state = first.copy(), np.zeros(count, dtype=np.int64)
    for column in codes:
        step = state * width
        step += column
        flat[places] = state
        places += row_steps.take(step)
        tables.next_state.take(step, out=state, mode="clip")
    flat[places] = state
    counts = (places - first) // count + (state % len(tables.permutations) != tables.identity)
    return blocks[: int(counts.max(initial=0))], counts


def _factors_of_blocks(
    blocks: NDArray[np.int16], tables: PairTables
) -> tuple[NDArray[np.int16], IntegerArray]:
    """Simple factors, each flipped once for every later inverse block; the inverse blocks."""
    negative = tables.is_negative.astype(np.int8).take(blocks)
    so_far = np.cumsum(negative, axis=0, dtype=np.int32)
    total = so_far[-1] if len(so_far) else np.zeros(blocks.shape[1], dtype=np.int32)
    index = (so_far ^ total) & 1
    index += 2 * blocks.astype(np.int32)
    return tables.factor_of_block.astype(np.int16).take(index), total.astype(np.int64)


def _weigh_columns(
    factors: NDArray[np.int16], counts: IntegerArray, tables: PairTables
) -> NDArray[np.integer]:
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
    columns //= narrow.type(size)
    return columns


def _shift_columns(
    factors: NDArray[np.integer], shifts: IntegerArray, longest: int
) -> NDArray[np.integer]:
    """Each column moved up by its own shift, cut to the longest; identities fill up the end."""
    height, count = factors.shape
    padded = np.zeros((max(height, int(shifts.max(initial=0))) + longest, count), factors.dtype)
    padded[:height] = factors
    places = np.arange(count) + shifts * count + np.arange(longest)[:, None] * count
    shifted: NDArray[np.integer] = padded.reshape(-1).take(places)
    return shifted


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
    names = np.zeros((len(sequences), int(lengths.max(initial=0))), dtype=np.int64)
    kept = [identity]
    for column, (shift, length) in enumerate(zip(deltas, lengths, strict=True)):
        names[column, :length] = np.arange(len(kept), len(kept) + length)
        kept.extend(factors[shift : shift + length, column])
    infima = np.array([infimum for infimum, _ in sequences], dtype=np.int64) + deltas
    return BatchNormalForm(strands, infima, lengths, names, np.array(kept))


def left_normal_forms_of(braids: Sequence[Braid]) -> BatchNormalForm:
    """The same for braids, which must all have the same number of strands."""
    strands = {braid.strands for braid in braids}
    if len(strands) != 1:
        raise InputError(f"braids on {sorted(strands)} strands: expected one number of strands")
    return left_normal_forms([braid.word for braid in braids], strands.pop())
