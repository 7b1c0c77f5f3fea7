"""Rotations of arc presentations, and the group elements by which they conjugate the word."""

from __future__ import annotations

from bisect import bisect_left
from collections.abc import Sequence

from braidsearch.diagrams.arc_moves import rotate_columns, rotate_rows
from braidsearch.diagrams.arc_presentation import ArcPresentation, read_columns
from braidsearch.moves.arcs.legs import Letters


def columns_conjugator(arcs: ArcPresentation, count: int) -> Letters:
    """The letters of the first ``count`` columns: rotating them to the end conjugates by them."""
    columns = read_columns(arcs)[: count % arcs.size]
    return tuple(letter for letters in columns for letter in letters)


def rows_conjugator(arcs: ArcPresentation, count: int) -> Letters:
    """What rotating ``count`` rows to the bottom conjugates by.

    A row that runs across the cut takes its strand from the top over all others to the bottom,
    sigma_1 ... sigma_(n-1); any other row passes over everything and back, and nothing changes.
    """
    limit = count % arcs.size
    active = arcs.active_rows
    return over_all(len(active)) * bisect_left(active, limit)


def over_all(strands: int) -> Letters:
    """The top strand over all others to the bottom: sigma_1 ... sigma_(n-1)."""
    return tuple(range(1, strands))


def rotated(arcs: ArcPresentation, columns: int, rows: int) -> tuple[ArcPresentation, Letters]:
    """The presentation with columns, then rows, rotated, and what its word is conjugated by."""
    by = columns_conjugator(arcs, columns)
    turned = rotate_columns(arcs, columns)
    return rotate_rows(turned, rows), by + rows_conjugator(turned, rows)


def jump_letters(active: Sequence[int], start: int, end: int) -> Letters:
    """The letters of a vertical from ``start``, a row of the sorted ``active`` ones, to ``end``."""
    place = bisect_left(active, start)
    target = bisect_left(active, end)
    if target > place:
        return tuple(range(place + 1, target))
    return tuple(-letter for letter in range(place, target, -1))
