"""Exchanges, merges and splits of arc presentations, as legs between the words that they show.

Each function takes the presentation before the move, and returns legs from its word to the word
of the presentation after. The pair of rows that matters is rotated to the bottom, where the last
generator sigma_(n-1) shows what happens.
"""

from __future__ import annotations

from braidsearch.diagrams.arc_moves import (
    ArcMove,
    ArcMoveKind,
    apply_arc_move,
    merge_columns,
    merge_rows,
    swap_rows,
)
from braidsearch.diagrams.arc_presentation import ArcPresentation, read_columns, word_from_arcs
from braidsearch.errors import InputError
from braidsearch.moves.arcs.frames import columns_conjugator, rotated, rows_conjugator
from braidsearch.moves.arcs.legs import (
    Exchange,
    Leg,
    LegBuilder,
    Letters,
    inverse_letters,
    reversed_leg,
)


def exchange_legs(arcs: ArcPresentation, position: int) -> list[Leg]:
    """The swap of two rows that together cover the circle: an exchange move.

    With the pair at the bottom and the cut just after the lower row is entered, the word before
    is alpha s^-1 beta s. Afterwards the two letters s have moved to the ends of the other row,
    and the parts of alpha where both rows run commute with s: the word is s^-1 alpha s beta.
    """
    lower = (position + 1) % arcs.size
    columns, rows = arcs.enters[lower] + 1, position + 2
    frame, by = rotated(arcs, columns, rows)
    builder = LegBuilder(word_from_arcs(arcs))
    builder.conjugate(by)
    s = frame.strands - 1
    alpha, sign, rest = _parted(word_from_arcs(frame).word, s)
    beta, last, nothing = _parted(rest, s)
    if (sign, last, nothing) != (-1, 1, ()):
        raise InputError(f"rows at {position}: expected a pair that makes an exchange move")
    builder.add(Exchange(frame.strands, alpha, beta, -1))
    builder.conjugate((s,))
    after = swap_rows(arcs, position)
    builder.conjugate(inverse_letters(rotated(after, columns, rows)[1]))
    builder.settle(word_from_arcs(after).word)
    return builder.legs


def merge_legs(arcs: ArcPresentation, move: ArcMove) -> list[Leg]:
    """The merge of two columns or rows: a conjugation, or a destabilization between two."""
    if move.kind is ArcMoveKind.MERGE_COLUMNS:
        return _merge_columns_legs(arcs, move.position)
    return _merge_rows_legs(arcs, move.position)


def split_legs(arcs: ArcPresentation, move: ArcMove) -> list[Leg]:
    """The split of a column or row: the legs of its merge, walked backwards."""
    after = apply_arc_move(arcs, move)
    columns = move.kind in (ArcMoveKind.SPLIT_COLUMN_LATER, ArcMoveKind.SPLIT_COLUMN_EARLIER)
    merge = ArcMoveKind.MERGE_COLUMNS if columns else ArcMoveKind.MERGE_ROWS
    return [reversed_leg(leg) for leg in reversed(merge_legs(after, ArcMove(merge, move.position)))]


def _merge_columns_legs(arcs: ArcPresentation, position: int) -> list[Leg]:
    """Columns x -> m, m -> y are one column x -> y; columns m -> y, x -> m lose a strand.

    A pair that the cut parts is rotated together first, which is how the merged column stands.
    """
    after = merge_columns(arcs, position)
    builder = LegBuilder(word_from_arcs(arcs))
    if after.strands == arcs.strands:
        if position == arcs.size - 1:
            builder.conjugate(columns_conjugator(arcs, 1))
    else:
        _destabilize_columns(builder, arcs, position)
        # What was reached is the word with the merged column last and the lost row's successor
        # on top; turn it back.
        back = 0 if position == arcs.size - 1 else position + 1
        rows = arcs.starts[position] % after.size
        builder.conjugate(inverse_letters(rotated(after, back, rows)[1]))
    builder.settle(word_from_arcs(after).word)
    return builder.legs


def _destabilize_columns(builder: LegBuilder, arcs: ArcPresentation, position: int) -> None:
    """Bring the row m of columns m -> y, x -> m to the bottom, them to the end, and drop m.

    The word is then rest U D, where m's strand goes up to position k, U = -(n-1) ... -k, and
    another comes down from l, D = l ... n-1; the row m runs everywhere else, below all of rest.
    Letting the strands pass each other leaves one letter of index n-1: for l > k,
    U D = (l-1 ... n-2) U, else U D = (l ... k-2) (k-1 ... n-1) (-(n-2) ... -(k-1)).
    """
    frame, by = rotated(arcs, position + 2, arcs.starts[position] + 1)
    builder.conjugate(by)
    *rest, up, down = read_columns(frame)
    before = [letter for letters in rest for letter in letters]
    n = frame.strands
    k, l = n - len(up), n - len(down)  # noqa: E741 - the names of the docstring
    if l > k:
        sign, before, after = -1, [*before, *range(l - 1, n - 1)], up[1:]
    else:
        sign, before = 1, [*before, *range(l, k - 1), *range(k - 1, n - 1)]
        after = [-letter for letter in range(n - 2, k - 2, -1)]
    builder.destabilize(before, sign, after)


def _merge_rows_legs(arcs: ArcPresentation, position: int) -> list[Leg]:
    """Rows joined by a column between them, which crosses nothing.

    Shorter together than the circle, they are one strand, and not a letter changes (rotated to be
    together if they are the last row and the first). Longer, they run side by side for a while:
    at the bottom, the word has a single letter of index n-1.
    """
    after = merge_rows(arcs, position)
    builder = LegBuilder(word_from_arcs(arcs))
    if after.strands == arcs.strands:
        if position == arcs.size - 1:
            builder.conjugate(rows_conjugator(arcs, 1))
    else:
        rows = position + 2
        frame, by = rotated(arcs, 0, rows)
        builder.conjugate(by)
        builder.destabilize(*_parted(word_from_arcs(frame).word, frame.strands - 1))
        back = 0 if position == arcs.size - 1 else position + 1
        builder.conjugate(inverse_letters(rows_conjugator(after, back)))
    builder.settle(word_from_arcs(after).word)
    return builder.legs


def _parted(word: Letters, index: int) -> tuple[Letters, int, Letters]:
    """What stands before the first letter of an index, its sign, and what stands after it."""
    for place, letter in enumerate(word):
        if abs(letter) == index:
            return word[:place], 1 if letter > 0 else -1, word[place + 1 :]
    raise InputError(f"no letter {index} in {list(word)}: expected one to take a strand away")
