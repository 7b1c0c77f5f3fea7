"""Codes in which the trade writes diagrams down, each with a reader and a writer."""

from braidsearch.diagrams.codes.dowker_thistlethwaite_code import (
    dowker_thistlethwaite_code,
    format_dowker_thistlethwaite_code,
    parse_dowker_thistlethwaite_code,
)
from braidsearch.diagrams.codes.gauss_code import (
    format_gauss_code,
    gauss_code,
    parse_gauss_code,
)
from braidsearch.diagrams.codes.notations import NOTATIONS, parse_code
from braidsearch.diagrams.codes.planar_diagram_code import (
    format_planar_diagram_code,
    parse_planar_diagram_code,
    planar_diagram_code,
)

__all__ = [
    "NOTATIONS",
    "dowker_thistlethwaite_code",
    "format_dowker_thistlethwaite_code",
    "format_gauss_code",
    "format_planar_diagram_code",
    "gauss_code",
    "parse_code",
    "parse_dowker_thistlethwaite_code",
    "parse_gauss_code",
    "parse_planar_diagram_code",
    "planar_diagram_code",
]
