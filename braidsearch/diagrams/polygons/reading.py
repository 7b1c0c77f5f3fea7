"""Reading and writing closed polygons in space as text: rows x y z."""

from __future__ import annotations

import re
from collections.abc import Iterable
from os import PathLike
from pathlib import Path

import numpy as np

from braidsearch.diagrams.polygons.arrays import MAX_VERTICES, Polygon, check_polygons
from braidsearch.errors import InputError

_NUMBER = re.compile(r"[+-]?(?:[0-9]+\.?[0-9]*|\.[0-9]+)(?:[eE][+-]?[0-9]+)?")
_MINUS_SIGNS = str.maketrans("−‒–﹣－", "-----")
_SEPARATORS = re.compile(r"[\s,;]+")
_LONGEST_LINE = 40


def read_polygons(source: str | PathLike[str]) -> list[Polygon]:
    """Read closed polygons from a file, or from text where a string holds several lines.

    Rows x y z, separated by blanks, commas, semicolons or tabs; a blank line, or a row of
    separators alone, between components; ``#`` begins a comment; a first row that says x, y, z is
    a title. Numbers are taken as the doubles next to them, and exactly so from there on. The
    result has one read-only n x 3 array for each component; a last row that repeats the first is
    left out.

    Raises InputError, in one line that names the line of the file, for a row that is not three
    finite numbers, and for fewer than three points, no points, or a file that cannot be read.
    """
    if isinstance(source, str) and len(source.splitlines()) > 1:
        return parse_polygons(source)
    try:
        text = Path(source).read_text(encoding="utf-8-sig")
    except (OSError, UnicodeDecodeError, ValueError) as error:
        reason = error.strerror if isinstance(error, OSError) else "not a text in UTF-8"
        raise InputError(f"{_shown(str(source))}: {reason}") from None
    return parse_polygons(text)


def parse_polygons(text: str) -> list[Polygon]:
    """Read closed polygons from text; see ``read_polygons``."""
    polygons: list[list[tuple[float, ...]]] = [[]]
    starts = [1]
    count = 0
    for number, line in enumerate(text.splitlines(), start=1):
        content = line.split("#", 1)[0]
        fields = [field for field in _SEPARATORS.split(content) if field]
        if not fields:
            if polygons[-1] and not line.lstrip().startswith("#"):
                polygons.append([])
        elif count or polygons[0] or [field.strip('"').lower() for field in fields] != [*"xyz"]:
            if not polygons[-1]:
                starts[len(polygons) - 1 :] = [number]
            polygons[-1].append(_read_row(fields, line, number))
            count += 1
        if count > MAX_VERTICES + 1:
            raise InputError(f"line {number}: expected at most {MAX_VERTICES} points")
    return _as_polygons([rows for rows in polygons if rows], starts)


def format_polygons(polygons: Iterable[Polygon]) -> str:
    """Write rows x y z, a blank line between components; reading gives the same doubles back."""
    parts = []
    for polygon in check_polygons(polygons):
        parts.append("".join(" ".join(map(repr, row)) + "\n" for row in polygon.tolist()))
    return "\n".join(parts)


def _read_row(fields: list[str], line: str, number: int) -> tuple[float, ...]:
    plain = [field.translate(_MINUS_SIGNS) for field in fields]
    if len(plain) == 3 and all(map(_NUMBER.fullmatch, plain)):
        row = tuple(map(float, plain))
        if np.isfinite(row).all():
            return row
    raise InputError(f"line {number}: {_shown(line)}: expected three finite numbers x y z")


def _as_polygons(polygons: list[list[tuple[float, ...]]], starts: list[int]) -> list[Polygon]:
    for rows, start in zip(polygons, starts, strict=False):
        points = len(rows) - (len(rows) > 1 and rows[0] == rows[-1])
        if points < 3:
            counted = "1 point" if points == 1 else f"{points} points"
            raise InputError(f"component from line {start}: {counted}: expected at least three")
    return check_polygons(np.array(rows) for rows in polygons)


def _shown(text: str) -> str:
    short = text.strip()
    return repr(short if len(short) <= _LONGEST_LINE else short[: _LONGEST_LINE - 3] + "...")
