"""Diagrams of links: arc presentations, their moves, and the closed braids that they are."""

from braidsearch.diagrams.arc_moves import ArcMove, ArcMoveKind, apply_arc_move, apply_arc_moves
from braidsearch.diagrams.arc_presentation import (
    ArcPresentation,
    arcs_from_word,
    word_from_arcs,
)

__all__ = [
    "ArcMove",
    "ArcMoveKind",
    "ArcPresentation",
    "apply_arc_move",
    "apply_arc_moves",
    "arcs_from_word",
    "word_from_arcs",
]
