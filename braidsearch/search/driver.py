"""``compare``: the question as users ask it."""

from __future__ import annotations

from collections.abc import Callable, Sequence

from braidsearch.errors import InputError
from braidsearch.search.limits import Budget, Progress, SearchLimits
from braidsearch.search.query import Query
from braidsearch.search.verdict import Verdict
from braidsearch.words import SYMMETRIES, Braid


def compare(
    left: Braid,
    right: Braid,
    *,
    up_to: Sequence[str] = (),
    limits: SearchLimits | None = None,
    progress: Callable[[Progress], None] | None = None,
) -> Verdict:
    """Whether the closures of two braids are the same oriented link.

    ``up_to`` names the symmetries (mirror, reverse, mirror-reverse) that may be applied to the
    right link as well. "same" comes with a chain of Markov moves, "different" with an invariant
    that differs for every symmetry asked; both have passed the independent verifier. "undecided"
    says that the limits were reached, and nothing about the links. Raises InputError for an
    unknown symmetry.
    """
    for symmetry in up_to:
        if symmetry not in SYMMETRIES:
            raise InputError(f"up to {symmetry!r}: expected {', '.join(SYMMETRIES[1:])}")
    asked = tuple(dict.fromkeys(("identity", *up_to)))
    return Query(left, right, asked, Budget(limits or SearchLimits(), progress)).settled()
