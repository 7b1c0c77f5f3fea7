"""Diagrams of links: drawings with crossings, arc presentations, and closed braids."""

from braidsearch.diagrams.arc_moves import ArcMove, ArcMoveKind, apply_arc_move, apply_arc_moves
from braidsearch.diagrams.arc_presentation import (
    ArcPresentation,
    arcs_from_word,
    word_from_arcs,
)
from braidsearch.diagrams.closed_braid_diagram import closed_braid_diagram
from braidsearch.diagrams.codes import (
    NOTATIONS,
    dowker_thistlethwaite_code,
    format_dowker_thistlethwaite_code,
    format_gauss_code,
    format_planar_diagram_code,
    gauss_code,
    parse_code,
    parse_dowker_thistlethwaite_code,
    parse_gauss_code,
    parse_planar_diagram_code,
    planar_diagram_code,
)
from braidsearch.diagrams.link_diagram import Crossing, LinkDiagram
from braidsearch.diagrams.simplification import simplify_diagram
from braidsearch.diagrams.vogel import braid_from_diagram

__all__ = [
    "NOTATIONS",
    "ArcMove",
    "ArcMoveKind",
    "ArcPresentation",
    "Crossing",
    "LinkDiagram",
    "apply_arc_move",
    "apply_arc_moves",
    "arcs_from_word",
    "braid_from_diagram",
    "closed_braid_diagram",
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
    "simplify_diagram",
    "word_from_arcs",
]
