"""Closed 3-braids: a classification answers, so that they are never undecided."""

from __future__ import annotations

from braidsearch.errors import CapacityError, InputError
from braidsearch.invariants.finer import TITLES
from braidsearch.invariants.table import Invariant, Value
from braidsearch.moves import Move
from braidsearch.search.route import Route
from braidsearch.words import Braid

MOST_STRANDS = 3
_SECONDS_A_LETTER = 1e-5


def classified_moves(left: Route, right: Route) -> list[Move] | None:
    """The moves from the start of the left route to that of the right one, or None.

    None says that the closures differ, or that one of the routes does not end at a braid on 3
    strands or fewer.
    """
    if not (is_classified(left.current) and is_classified(right.current)):
        return None
    from braidsearch.three_braids import moves_between  # noqa: PLC0415 - not for larger braids

    moves = moves_between(left.current, right.current)
    return None if moves is None else [*left.moves, *moves, *right.reversed_moves()]


def three_braid_ladder(left: Braid, right: Braid) -> list[Invariant]:
    """The list of all conjugacy classes that close to a link, where both are closed 3-braids."""
    return [_CLASSES] if is_classified(left) and is_classified(right) else []


def is_classified(braid: Braid) -> bool:
    """Whether the braid is on so few strands that the classification holds for it."""
    return braid.strands <= MOST_STRANDS


def _link_classes(braid: Braid) -> Value:
    from braidsearch.three_braids import link_classes  # noqa: PLC0415 - not for larger braids

    try:
        return link_classes(braid)
    except InputError as error:
        raise CapacityError(str(error)) from None


_CLASSES = Invariant(
    name="three-braid",
    title=TITLES["three-braid"],
    compute=_link_classes,
    estimated_cost=lambda braid: _SECONDS_A_LETTER * len(braid),
    is_applicable=is_classified,
)
