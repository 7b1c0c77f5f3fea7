"""Files that hold one link as a whole: polygons in space."""

from __future__ import annotations

import re

from braidsearch.ledger.reading.catalogue_file import CatalogueFile
from braidsearch.ledger.reading.values import Row

_SEPARATORS = re.compile(r"[\s,;]+")
_COORDINATE = re.compile(r"[+-]?(?:[0-9]+\.?[0-9]*|\.[0-9]+)(?:[eE][+-]?[0-9]+)?")


def polygon_row(file: CatalogueFile) -> Row:
    """The row of a file that is one link in space: its text, as ``read_polygons`` takes it."""
    text = file.read_text()
    return Row(file.shown, 0, "", file.source, "", "polygon", text, file.path.name)


def is_coordinates(content: str) -> bool:
    """Whether the first line of a file begins a list of points and no list of braid words.

    The title x y z does, and so do three numbers of which one has a decimal point or an exponent:
    the letters of a word have neither. Three integers may be both, so they do not.
    """
    fields = [field.strip('"').lower() for field in _SEPARATORS.split(content) if field]
    if fields == ["x", "y", "z"]:
        return True
    is_point = len(fields) == 3 and all(map(_COORDINATE.fullmatch, fields))
    return is_point and not all(field.lstrip("+-").isdigit() for field in fields)
