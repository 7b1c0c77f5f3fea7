"""Where to cut an arc presentation between rows, so that its braid word is shortest."""

from __future__ import annotations

from braidsearch.diagrams.arc_presentation import ArcPresentation, read_columns

LARGEST_TURNED = 64  # columns up to which a key is found over all rotations


def word_lengths(arcs: ArcPresentation) -> tuple[int, ...]:
    """For each k, the letters of the word once the first k rows are rotated to the bottom.

    A vertical crosses the active rows between its ends, or, when the cut between the rows falls
    inside it, all the other active rows; so one reading of the columns counts for every cut.
    Rotating columns rotates the word, and its length stays.
    """
    others = arcs.strands - 1
    change = [0] * (arcs.size + 1)
    total = 0
    for letters, start, end in zip(read_columns(arcs), arcs.starts, arcs.ends, strict=True):
        crossed = len(letters)
        total += crossed
        change[min(start, end) + 1] += others - 2 * crossed
        change[max(start, end) + 1] -= others - 2 * crossed
    lengths = []
    for k in range(arcs.size):
        total += change[k]
        lengths.append(total)
    return tuple(lengths)


def shortest_row_cut(arcs: ArcPresentation) -> int:
    """The least number of rows to rotate to the bottom so that the word has fewest letters."""
    lengths = word_lengths(arcs)
    return lengths.index(min(lengths))


def torus_key(arcs: ArcPresentation) -> tuple[tuple[int, int], ...]:
    """A value that two presentations share exactly when rotations carry one to the other."""
    size = arcs.size
    columns = list(zip(arcs.starts, arcs.ends, strict=True))
    candidates = []
    for first in range(size):
        top = columns[first][0]
        turned = columns[first:] + columns[:first]
        candidates.append(tuple([((s - top) % size, (e - top) % size) for s, e in turned]))
    return min(candidates)


def presentation_key(arcs: ArcPresentation) -> tuple[tuple[int, int], ...]:
    """A value that different presentations never share; rotated ones do, if they are small.

    On many columns all rotations would take long, and the presentation itself is the key.
    """
    if arcs.size > LARGEST_TURNED:
        return tuple(zip(arcs.starts, arcs.ends, strict=True))
    return torus_key(arcs)
