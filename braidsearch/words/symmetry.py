"""The four symmetries that act on braid words and on the links that they close to."""

from collections.abc import Callable

from braidsearch.errors import InputError
from braidsearch.words.braid import Braid

_ACTIONS: dict[str, Callable[[Braid], Braid]] = {
    "identity": lambda braid: braid,
    "mirror": Braid.mirror,
    "reverse": Braid.reverse,
    "mirror-reverse": Braid.inverse,
}

SYMMETRIES: tuple[str, ...] = tuple(_ACTIONS)


def apply_symmetry(braid: Braid, symmetry: str) -> Braid:
    """The image of ``braid`` under one of SYMMETRIES; each is an involution on words.

    Raises InputError for another name.
    """
    if symmetry not in _ACTIONS:
        raise InputError(f"symmetry {symmetry!r}: expected one of {', '.join(SYMMETRIES)}")
    return _ACTIONS[symmetry](braid)
