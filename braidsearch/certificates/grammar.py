"""The grammar that reading and writing share: the names of the format and the fields of moves."""

from typing import Final

from braidsearch.moves import Conjugate, Destabilize, Move, Rewrite, Stabilize

FORMAT: Final = "braidsearch certificate"
VERSION: Final = 1

MOVES: Final[dict[str, type[Move]]] = {
    "rewrite": Rewrite,
    "conjugate": Conjugate,
    "stabilize": Stabilize,
    "destabilize": Destabilize,
}

MOVE_FIELDS: Final[dict[str, tuple[str, ...]]] = {
    "rewrite": ("word",),
    "conjugate": ("by", "word"),
    "stabilize": ("sign", "strands", "word"),
    "destabilize": ("sign", "strands", "word"),
}

CLAIM_FIELDS: Final = ("format", "version", "left", "right", "verdict")
PROOF_FIELDS: Final[dict[str, tuple[str, ...]]] = {
    "same": ("symmetry", "moves"),
    "different": ("distinctions",),
}
DISTINCTION_FIELDS: Final = (
    "symmetry",
    "invariant",
    "parameters",
    "left_moves",
    "right_moves",
    "left",
    "right",
)

VALUE_WIDTHS: Final[dict[str, int]] = {
    "components": 0,
    "linking-numbers": 1,
    "linking-sums": 1,
    "alexander": 2,
    "jones": 2,
    "homfly": 3,
    "signature": 0,
}
"""The invariants of this version, with the shape of their values.

0 is an integer, 1 a list of integers, and more a list of entries of so many integers.
"""

MAX_MOVES: Final = 100_000
"""The longest list of moves that a certificate may hold."""


def move_name(move: Move) -> str:
    """The name under which a move stands in a certificate."""
    return type(move).__name__.lower()
