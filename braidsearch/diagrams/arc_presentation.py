"""Arc presentations (rectangular diagrams) of links, and the closed braids that they are."""

from __future__ import annotations

from bisect import bisect_left
from collections.abc import Sequence
from dataclasses import dataclass

from braidsearch.errors import InputError
from braidsearch.words import Braid


@dataclass(frozen=True, slots=True)
class ArcPresentation:
    """N columns and N rows, both read cyclically: a link as vertical arcs over horizontal ones.

    Column c carries one vertical arc, from row ``starts[c]`` to row ``ends[c]``; rows count from
    0 at the top. Every row is left once and entered once. Row r runs to the right, cyclically,
    from the column that enters it to the column that leaves it, and every vertical passes over
    every row that it meets. The rows that run across the cut before column 0 are the strands of
    a closed braid, top to bottom.

    Raises InputError when a row is not left once and entered once, or an arc stays in its row.

    Source: Cromwell, Embedding knots and links in an open book I: basic properties, 1995;
    Dynnikov, Arc-presentations of links: monotonic simplification, 2006.
    """

    starts: tuple[int, ...]
    ends: tuple[int, ...]

    def __post_init__(self) -> None:
        rows = set(range(len(self.starts)))
        if not rows or len(self.ends) != len(rows):
            raise InputError(
                f"{len(self.starts)} starts, {len(self.ends)} ends: expected one of each a column"
            )
        if set(self.starts) != rows or set(self.ends) != rows:
            raise InputError("an arc presentation: expected every row left once and entered once")
        if any(map(int.__eq__, self.starts, self.ends)):
            raise InputError("an arc presentation: expected every column to end in another row")

    @property
    def size(self) -> int:
        """The number of columns, which is the number of rows: the arc number of the diagram."""
        return len(self.starts)

    @property
    def leaves(self) -> tuple[int, ...]:
        """For each row the column where it is left: the inverse of ``starts``."""
        return inverse_permutation(self.starts)

    @property
    def enters(self) -> tuple[int, ...]:
        """For each row the column where it is entered: the inverse of ``ends``."""
        return inverse_permutation(self.ends)

    @property
    def active_rows(self) -> tuple[int, ...]:
        """The rows that run across the cut before column 0, top to bottom: the strands."""
        return active_rows(self.enters, self.leaves)

    @property
    def strands(self) -> int:
        """The number of strands of the closed braid; it is the same at every cut."""
        return len(self.active_rows)


def inverse_permutation(values: Sequence[int]) -> tuple[int, ...]:
    """The places of 0, 1, 2, ... in a permutation of them."""
    places = [0] * len(values)
    for place, value in enumerate(values):
        places[value] = place
    return tuple(places)


def active_rows(enters: Sequence[int], leaves: Sequence[int]) -> tuple[int, ...]:
    """The rows entered further right than they are left: they pass the cut before column 0."""
    return tuple(row for row in range(len(enters)) if enters[row] > leaves[row])


def arcs_from_word(braid: Braid) -> ArcPresentation:
    """The arc presentation of a closed braid, with two columns a strand and one a letter.

    Strand i starts in row a_i and is moved, the last one first, to a fresh row b_i below all the
    a's. For a letter the strand that passes over jumps to a fresh row just beyond its neighbour;
    at the end the strands go back to the a's, the first one first. No crossing but those of the
    letters arises, so the presentation reads ``braid`` letter by letter.
    """
    count = braid.strands
    names = list(range(2 * count))  # the rows, top to bottom: a_1 .. a_n, b_1 .. b_n
    strands = names[count:]
    columns = [(strand, strand + count) for strand in reversed(range(count))]
    for letter in braid.word:
        columns.append(_over_jump(letter, names, strands))
    columns += zip(strands, range(count), strict=True)
    row_of = inverse_permutation(names)
    return ArcPresentation(
        tuple(row_of[start] for start, _ in columns), tuple(row_of[end] for _, end in columns)
    )


def _over_jump(letter: int, names: list[int], strands: list[int]) -> tuple[int, int]:
    """Give the over strand of ``letter`` a fresh row; return its old row's name and its new one."""
    upper, lower = abs(letter) - 1, abs(letter)
    fresh = len(names)
    if letter > 0:
        names.insert(names.index(strands[lower]) + 1, fresh)
        old = strands[upper]
        strands[upper], strands[lower] = strands[lower], fresh
    else:
        names.insert(names.index(strands[upper]), fresh)
        old = strands[lower]
        strands[upper], strands[lower] = fresh, strands[upper]
    return old, fresh


def word_from_arcs(arcs: ArcPresentation) -> Braid:
    """The braid whose closure the presentation shows, read column by column from the cut.

    A vertical that goes down over k strands from position p (counted from 1 at the top) reads
    p, p+1, ..., p+k-1; one that goes up over k strands reads -(p-1), -(p-2), ..., -(p-k).
    """
    letters: list[int] = []
    for column_letters in read_columns(arcs):
        letters += column_letters
    return Braid.trusted(tuple(letters), arcs.strands)


def read_columns(arcs: ArcPresentation) -> list[list[int]]:
    """The letters of every column: their concatenation is the word of the presentation."""
    active = list(arcs.active_rows)
    columns = []
    for start, end in zip(arcs.starts, arcs.ends, strict=True):
        place = bisect_left(active, start)
        del active[place]
        target = bisect_left(active, end)
        active.insert(target, end)
        if target >= place:
            columns.append(list(range(place + 1, target + 1)))
        else:
            columns.append([-letter for letter in range(place, target, -1)])
    return columns
