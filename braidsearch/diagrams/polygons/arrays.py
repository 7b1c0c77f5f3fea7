"""Closed polygons as lists of arrays, checked, and as the arrays that the loops work on."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from typing import Any

import numpy as np
from numpy.typing import NDArray

from braidsearch.errors import InputError

Polygon = NDArray[np.float64]

MAX_VERTICES = 100_000

_EXPECTED = "expected three finite numbers x y z"


def check_polygons(polygons: Iterable[Any]) -> list[Polygon]:
    """The polygons as arrays of n x 3 doubles, a last row that repeats the first left out.

    Whatever numpy makes an array of is taken, integers as long as doubles hold them exactly; one
    array of n x 3 alone is one polygon.
    Raises InputError, in one line that names component and row (from 1), for what is not rows of
    three finite numbers, for fewer than three vertices, for a row twice in succession, and for no
    polygon at all.
    """
    if isinstance(polygons, np.ndarray) and polygons.ndim == 2:
        polygons = [polygons]
    if not isinstance(polygons, Iterable):
        raise InputError(f"{type(polygons).__name__}: expected a list of arrays of n rows x y z")
    checked = [_check_polygon(polygon, k) for k, polygon in enumerate(polygons, start=1)]
    if not checked:
        raise InputError("no polygon: expected rows x y z, a blank line between polygons")
    count = sum(map(len, checked))
    if count > MAX_VERTICES:
        raise InputError(f"{count} vertices: expected at most {MAX_VERTICES}")
    return checked


def _check_polygon(polygon: Any, number: int) -> Polygon:
    rows = _as_rows(polygon, number)
    unfit = np.flatnonzero(~np.isfinite(rows).all(axis=1))
    if len(unfit):
        row = int(unfit[0])
        shown = " ".join(map(str, rows[row].tolist()))
        raise InputError(f"component {number}, row {row + 1}: {shown}: {_EXPECTED}")
    if len(rows) > 1 and (rows[0] == rows[-1]).all():
        rows = rows[:-1]
    if len(rows) < 3:
        points = "1 point" if len(rows) == 1 else f"{len(rows)} points"
        raise InputError(f"component {number}: {points}: expected at least three")
    repeated = np.flatnonzero((rows[1:] == rows[:-1]).all(axis=1))
    if len(repeated):
        row = int(repeated[0]) + 2
        raise InputError(
            f"component {number}, row {row}: the same point as the row before: "
            "expected polygons that do not meet themselves"
        )
    rows.flags.writeable = False
    return rows


def _as_rows(polygon: Any, number: int) -> Polygon:
    try:
        given = np.asarray(polygon)
        if given.dtype.kind not in "iufO":
            raise TypeError
        rows = np.array(given, dtype=np.float64)
    except (TypeError, ValueError, OverflowError):
        raise InputError(f"component {number}: {_first_bad_row(polygon)}") from None
    if rows.ndim != 2 or rows.shape[1] != 3:
        shape = f"an array of shape {rows.shape}"
        raise InputError(f"component {number}, {shape}: expected n rows x y z")
    if given.dtype.kind in "iuO":
        _check_held_exactly(given, rows, number)
    return rows


def _check_held_exactly(given: NDArray[Any], rows: Polygon, number: int) -> None:
    """Whether the doubles are the numbers given, which Python compares without rounding."""
    pairs = zip(given.ravel().tolist(), rows.ravel().tolist(), strict=True)
    for place, (number_given, double) in enumerate(pairs):
        if number_given != double and np.isfinite(double):
            raise InputError(
                f"component {number}, row {place // 3 + 1}: {str(number_given)[:40]}: "
                "expected numbers that a double holds exactly"
            )


def _first_bad_row(polygon: Any) -> str:
    if isinstance(polygon, Sequence) and not isinstance(polygon, str):
        for i, row in enumerate(polygon, start=1):
            try:
                fits = np.asarray(row, dtype=np.float64).shape == (3,)
            except (TypeError, ValueError, OverflowError):
                fits = False
            if not fits:
                return f"row {i}: {str(row)[:40]}: {_EXPECTED}"
    return "expected an array of n rows x y z"
