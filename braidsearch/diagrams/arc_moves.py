"""The moves on arc presentations, one pure function each: plain, slow, every condition checked."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from enum import IntEnum

from braidsearch.diagrams.arc_presentation import ArcPresentation
from braidsearch.errors import InputError


class ArcMoveKind(IntEnum):
    """The kinds of moves; the numbers are those that the compiled walk records.

    A split leaves the given column (row) in two neighbouring ones, the given one and the next. Of
    a column s -> e split at the new row m, the LATER kind makes s -> m and then m -> e, the
    EARLIER kind m -> e and then s -> m. Of a row split at a new column, the part that is entered
    first is the lower of the two rows in the LATER kind, and the upper one in the EARLIER kind.
    """

    SWAP_COLUMNS = 0
    SWAP_ROWS = 1
    MERGE_COLUMNS = 2
    MERGE_ROWS = 3
    SPLIT_COLUMN_LATER = 4
    SPLIT_COLUMN_EARLIER = 5
    SPLIT_ROW_LATER = 6
    SPLIT_ROW_EARLIER = 7
    ROTATE_COLUMNS = 8
    ROTATE_ROWS = 9


@dataclass(frozen=True, slots=True)
class ArcMove:
    """One move: its kind, the column or row where it acts, and for a split the new row or column.

    Swaps and merges act on ``position`` and the next one, the last one being followed by number
    0. For a split, ``new`` is the number that the new row (of a column) or column (of a row) gets,
    from 0 to N. For a rotation ``position`` counts how many columns (rows) go to the end.
    """

    kind: ArcMoveKind
    position: int
    new: int = 0


def apply_arc_move(arcs: ArcPresentation, move: ArcMove) -> ArcPresentation:
    """The presentation after one move; raises InputError where the move's condition fails."""
    kind, position = move.kind, move.position
    if kind is ArcMoveKind.ROTATE_COLUMNS:
        return rotate_columns(arcs, position)
    if kind is ArcMoveKind.ROTATE_ROWS:
        return rotate_rows(arcs, position)
    if kind is ArcMoveKind.SWAP_COLUMNS:
        return swap_columns(arcs, position)
    if kind is ArcMoveKind.SWAP_ROWS:
        return swap_rows(arcs, position)
    if kind is ArcMoveKind.MERGE_COLUMNS:
        return merge_columns(arcs, position)
    if kind is ArcMoveKind.MERGE_ROWS:
        return merge_rows(arcs, position)
    earlier = kind in (ArcMoveKind.SPLIT_COLUMN_EARLIER, ArcMoveKind.SPLIT_ROW_EARLIER)
    if kind in (ArcMoveKind.SPLIT_COLUMN_LATER, ArcMoveKind.SPLIT_COLUMN_EARLIER):
        return split_column(arcs, position, move.new, earlier=earlier)
    return split_row(arcs, position, move.new, earlier=earlier)


def apply_arc_moves(arcs: ArcPresentation, moves: Iterable[ArcMove]) -> ArcPresentation:
    """The presentation after a chain of moves."""
    for move in moves:
        arcs = apply_arc_move(arcs, move)
    return arcs


def transpose(arcs: ArcPresentation) -> ArcPresentation:
    """Rows as columns: column r leaves row ``leaves[r]`` and enters row ``enters[r]``.

    A change of names only, which lets one function act on columns and on rows. (It shows another
    link: the reflection in the diagonal would also have to exchange over and under.)
    """
    return ArcPresentation(arcs.leaves, arcs.enters)


def rotate_columns(arcs: ArcPresentation, count: int = 1) -> ArcPresentation:
    """The first ``count`` columns moved behind the last one: the closed braid is cut later."""
    shift = count % arcs.size
    return ArcPresentation(
        arcs.starts[shift:] + arcs.starts[:shift], arcs.ends[shift:] + arcs.ends[:shift]
    )


def rotate_rows(arcs: ArcPresentation, count: int = 1) -> ArcPresentation:
    """The first ``count`` rows moved below the last one, passing over everything between."""
    return transpose(rotate_columns(transpose(arcs), count))


def swap_columns(arcs: ArcPresentation, position: int) -> ArcPresentation:
    """Neighbouring columns exchanged: their four rows are distinct and do not interleave."""
    first, second = _neighbours(arcs, position)
    a, b, c, d = arcs.starts[first], arcs.ends[first], arcs.starts[second], arcs.ends[second]
    if len({a, b, c, d}) < 4:
        raise InputError(f"swap at {position}: expected neighbours without a common end")
    if (min(a, b) < c < max(a, b)) != (min(a, b) < d < max(a, b)):
        raise InputError(f"swap at {position}: expected neighbours that do not cross")
    starts, ends = list(arcs.starts), list(arcs.ends)
    starts[first], ends[first], starts[second], ends[second] = c, d, a, b
    return ArcPresentation(tuple(starts), tuple(ends))


def swap_rows(arcs: ArcPresentation, position: int) -> ArcPresentation:
    """Neighbouring rows exchanged: their four columns are distinct and do not interleave."""
    return transpose(swap_columns(transpose(arcs), position))


def merge_columns(arcs: ArcPresentation, position: int) -> ArcPresentation:
    """Neighbouring columns with a common row joined to one, in the first's place; the row goes.

    If the row is entered in the first and left in the second, the strand count stays. If it is
    left in the first and entered in the second it runs the long way round, and the closed braid
    loses a strand. A component of two columns and two rows, a trivial circle, is not merged.
    """
    first, second = _neighbours(arcs, position)
    a, b, c, d = arcs.starts[first], arcs.ends[first], arcs.starts[second], arcs.ends[second]
    if (b == c) == (a == d):
        raise InputError(f"merge at {position}: expected neighbours with exactly one common end")
    start, end, gone = (a, d, b) if b == c else (c, b, a)
    starts, ends = list(arcs.starts), list(arcs.ends)
    starts[first], ends[first] = start, end
    del starts[second], ends[second]
    return ArcPresentation(_without_row(starts, gone), _without_row(ends, gone))


def merge_rows(arcs: ArcPresentation, position: int) -> ArcPresentation:
    """Neighbouring rows with a common column joined to one, in the first's place; the column goes.

    The closed braid loses a strand exactly when the two rows together run round more than once.
    """
    return transpose(merge_columns(transpose(arcs), position))


def split_column(
    arcs: ArcPresentation, position: int, new: int, *, earlier: bool
) -> ArcPresentation:
    """The column s -> e split at a new row: s -> new, new -> e, or ``earlier``: new -> e, s -> new.

    The inverse of ``merge_columns``. The second kind gives the closed braid one strand more.
    """
    if not (0 <= position < arcs.size and 0 <= new <= arcs.size):
        raise InputError(f"split of {position} at {new}: expected places from 0 to {arcs.size}")
    starts = [row + (row >= new) for row in arcs.starts]
    ends = [row + (row >= new) for row in arcs.ends]
    if earlier:
        starts.insert(position, new)
        ends.insert(position + 1, new)
    else:
        starts.insert(position + 1, new)
        ends.insert(position, new)
    return ArcPresentation(tuple(starts), tuple(ends))


def split_row(arcs: ArcPresentation, position: int, new: int, *, earlier: bool) -> ArcPresentation:
    """The row split at a new column: the part entered first is the upper one if ``earlier``.

    The inverse of ``merge_rows``. The closed braid gets one strand more exactly when the new
    column stands where the row does not run.
    """
    return transpose(split_column(transpose(arcs), position, new, earlier=earlier))


def _neighbours(arcs: ArcPresentation, position: int) -> tuple[int, int]:
    if not 0 <= position < arcs.size:
        raise InputError(f"position {position}: expected one from 0 to {arcs.size - 1}")
    return position, (position + 1) % arcs.size


def _without_row(rows: list[int], gone: int) -> tuple[int, ...]:
    return tuple(row - (row > gone) for row in rows)
