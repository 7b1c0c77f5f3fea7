"""The grammar that reading and writing share: the names of the format and the fields of moves."""

from dataclasses import dataclass, replace
from typing import Final

from braidsearch.moves import Conjugate, Destabilize, Move, Rewrite, Stabilize
from braidsearch.words import MAX_STRANDS

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


@dataclass(frozen=True)
class Shape:
    """The shape of a value or a parameter: an integer, or a list of entries of one shape.

    ``depth`` is 0 for an integer, 1 for a list of integers, 2 for a list of such lists. ``width``
    is the number of integers in each innermost list (None: any); ``least`` and ``most`` bound the
    integers, and ``entries`` the length of the outermost list.
    """

    depth: int
    width: int | None = None
    least: int | None = None
    most: int | None = None
    entries: tuple[int, int] | None = None
    is_permutation: bool = False


MAX_DEGREE: Final = 200
"""The most points that a permutation in a certificate moves about."""

MAX_GENERATORS: Final = 1_000
"""The most generators of a group in a certificate, and the most meridians."""

_INTEGER, _INTEGERS, _LISTS = Shape(0), Shape(1), Shape(2)

VALUES: Final[dict[str, Shape]] = {
    "components": _INTEGER,
    "linking-numbers": _INTEGERS,
    "linking-sums": _INTEGERS,
    "alexander": Shape(2, 2),
    "jones": Shape(2, 2),
    "homfly": Shape(2, 3),
    "signature": _INTEGER,
    "levine-tristram": Shape(1, 2),
    "alexander-module": _LISTS,
    "colouring": _LISTS,
    "three-braid": _LISTS,
}
"""The invariants of this version, with the shapes of their values; of ``sublinks`` see below."""

_PERMUTATIONS = Shape(2, None, 1, MAX_DEGREE, is_permutation=True)

PARAMETERS: Final[dict[str, dict[str, Shape]]] = {
    "levine-tristram": {"order": Shape(0, None, 2, 60), "power": Shape(0, None, 1, 59)},
    "alexander-module": {"prime": Shape(0, None, 2, 1000)},
    "colouring": {
        "generators": replace(_PERMUTATIONS, entries=(0, MAX_GENERATORS)),
        "meridians": replace(_PERMUTATIONS, entries=(1, MAX_GENERATORS)),
    },
    "sublinks": {"components": Shape(0, None, 1, MAX_STRANDS)},
}
"""The parameters of the invariants that have any, with their shapes."""

SUBLINKS: Final = "sublinks"
"""The invariant whose values are lists of values of another one.

Its parameters hold beside its own the name of the other, under ``invariant``, and the parameters
of that one.
"""

INVARIANTS: Final = (*VALUES, SUBLINKS)
"""The names of all invariants that a certificate may hold."""

MAX_MOVES: Final = 100_000
"""The longest list of moves that a certificate may hold."""


def move_name(move: Move) -> str:
    """The name under which a move stands in a certificate."""
    return type(move).__name__.lower()
