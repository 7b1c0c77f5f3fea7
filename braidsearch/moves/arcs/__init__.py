"""Chains of moves on arc presentations, translated into the moves that a proof may hold."""

from braidsearch.moves.arcs.legs import (
    Conjugation,
    Destabilization,
    Exchange,
    Leg,
    Stabilization,
    composed,
    reversed_leg,
)
from braidsearch.moves.arcs.translation import legs_from_arc_moves
from braidsearch.moves.arcs.writing import write_arc_moves, write_legs

__all__ = [
    "Conjugation",
    "Destabilization",
    "Exchange",
    "Leg",
    "Stabilization",
    "composed",
    "legs_from_arc_moves",
    "reversed_leg",
    "write_arc_moves",
    "write_legs",
]
