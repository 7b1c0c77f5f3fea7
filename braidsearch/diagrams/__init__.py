"""Diagrams of links: drawings with crossings, arc presentations, and closed braids."""

from braidsearch.diagrams.arc_moves import ArcMove, ArcMoveKind, apply_arc_move, apply_arc_moves
from braidsearch.diagrams.arc_presentation import (
    ArcPresentation,
    arcs_from_word,
    word_from_arcs,
)
from braidsearch.diagrams.link_diagram import Crossing, LinkDiagram

__all__ = [
    "ArcMove",
    "ArcMoveKind",
    "ArcPresentation",
    "Crossing",
    "LinkDiagram",
    "apply_arc_move",
    "apply_arc_moves",
    "arcs_from_word",
    "word_from_arcs",
]
