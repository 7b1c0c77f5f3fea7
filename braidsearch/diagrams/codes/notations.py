"""The codes by name, each with what it leaves open about the link."""

from __future__ import annotations

from collections.abc import Callable

from braidsearch.diagrams.codes.dowker_thistlethwaite_code import parse_dowker_thistlethwaite_code
from braidsearch.diagrams.codes.gauss_code import has_crossing_signs, parse_gauss_code
from braidsearch.diagrams.codes.planar_diagram_code import parse_planar_diagram_code
from braidsearch.diagrams.link_diagram import LinkDiagram
from braidsearch.errors import InputError

_FORGOTTEN_MIRROR_IMAGE = (
    "forgets the mirror image: the link meant is this one or its mirror image; of a composite "
    "link each summand, and of a split link each part, may be mirrored by itself"
)

_READERS: dict[str, Callable[[str], LinkDiagram]] = {
    "planar-diagram": parse_planar_diagram_code,
    "gauss": parse_gauss_code,
    "dowker-thistlethwaite": parse_dowker_thistlethwaite_code,
}

NOTATIONS = tuple(_READERS)
"""The names of the codes that ``parse_code`` reads."""


def parse_code(notation: str, text: str) -> tuple[LinkDiagram, tuple[str, ...]]:
    """The diagram that the text writes in the named code, and notes on what the code leaves open.

    Raises InputError for a name that is not among NOTATIONS, and for a text that is not a code.
    """
    if notation not in _READERS:
        raise InputError(f"notation {notation!r}: expected one of {', '.join(NOTATIONS)}")
    diagram = _READERS[notation](text)
    if notation == "dowker-thistlethwaite":
        return diagram, (f"a Dowker-Thistlethwaite code {_FORGOTTEN_MIRROR_IMAGE}",)
    if notation == "gauss" and diagram.crossings and not has_crossing_signs(text):
        return diagram, (f"a Gauss code without crossing signs {_FORGOTTEN_MIRROR_IMAGE}",)
    return diagram, ()
