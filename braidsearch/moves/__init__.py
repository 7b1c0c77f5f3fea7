"""The Markov moves, chains of them, and composite moves written out in them."""

from braidsearch.moves.chain import MoveChain
from braidsearch.moves.exchange import exchange
from braidsearch.moves.flype import flype, flype_word, power
from braidsearch.moves.markov import (
    Conjugate,
    Destabilize,
    Move,
    Rewrite,
    Stabilize,
    apply_move,
    reversed_move,
)

__all__ = [
    "Conjugate",
    "Destabilize",
    "Move",
    "MoveChain",
    "Rewrite",
    "Stabilize",
    "apply_move",
    "exchange",
    "flype",
    "flype_word",
    "power",
    "reversed_move",
]
