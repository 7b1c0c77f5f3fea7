"""``find_symmetries``: which symmetric images of a closed braid are the same link again."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import replace

from braidsearch.errors import InputError
from braidsearch.search.limits import Budget, Progress, SearchLimits
from braidsearch.search.query import Query
from braidsearch.search.verdict import Verdict
from braidsearch.words import SYMMETRIES, Braid

IMAGES: dict[str, str] = {
    "mirror": "mirror image",
    "reverse": "reverse",
    "mirror-reverse": "reversed mirror image",
}
"""The three symmetric images of a link, in words."""


def find_symmetries(
    braid: Braid,
    *,
    symmetries: Sequence[str] = SYMMETRIES[1:],
    limits: SearchLimits | None = None,
    progress: Callable[[Progress], None] | None = None,
) -> dict[str, Verdict]:
    """For each symmetry, whether it gives the same oriented link as the closure of the braid.

    A verdict is what ``compare`` would say of the braid and itself, up to that symmetry alone:
    its certificate has the braid on both sides and claims, for "same", that the closure of the
    braid is its own image under the symmetry, for "different", that it is not. The limits hold
    for each symmetry by itself. Raises InputError for a name that is not among mirror, reverse
    and mirror-reverse.
    """
    for symmetry in symmetries:
        if symmetry not in IMAGES:
            raise InputError(f"symmetry {symmetry!r}: expected {', '.join(IMAGES)}")
    return {
        symmetry: _ask(braid, symmetry, Budget(limits or SearchLimits(), progress))
        for symmetry in symmetries
    }


def _ask(braid: Braid, symmetry: str, budget: Budget) -> Verdict:
    verdict = Query(braid, braid, (symmetry,), budget, others=()).settled()
    return replace(verdict, reason=_about_itself(verdict, symmetry))


def _about_itself(verdict: Verdict, symmetry: str) -> str:
    """The reason of the verdict, said of one link and its image instead of LEFT and RIGHT."""
    if verdict.outcome == "undecided" or verdict.certificate is None:
        return verdict.reason
    if verdict.outcome == "different":
        return verdict.reason.replace("told apart", f"told from its {IMAGES[symmetry]}", 1)
    count = len(verdict.certificate.moves)
    if not count:
        return f"the {symmetry} of the word is the word itself"
    moves = "one move leads" if count == 1 else f"{count} moves lead"
    return f"{moves} from the word to its {symmetry}"
