"""What the verifier's recomputation of an invariant costs: a verdict has to wait for it."""

from __future__ import annotations

from collections.abc import Callable
from math import comb, factorial

from braidsearch.invariants.table import Invariant
from braidsearch.words import Braid


def verification_seconds(invariant: Invariant, braid: Braid) -> float:
    """Seconds that the verifier takes for the invariant of the closure, to a factor of a few.

    Fitted to measurements, on one core, of random words and of words of one sign; the verifier
    knows nothing of this estimate. Invariants without a formula here cost it nothing of note.
    """
    if invariant.verification_cost is not None:
        return invariant.verification_cost(braid)
    # A sublink is smaller than the link: its invariant costs less than that of the whole.
    name = dict(invariant.parameters).get("invariant", invariant.name)
    estimate = _ESTIMATES.get(name)
    return 0.0 if estimate is None else estimate(braid.strands, len(braid))


def _alexander(strands: int, letters: int) -> float:
    return min(4.5e-9 * letters**4, 5e-8 * strands * letters**3)


def _jones(strands: int, letters: int) -> float:
    width = min(strands, 10)
    states = comb(2 * width, width) // (width + 1)
    return 7e-7 * letters**2 * min(1 + states / 14, 80)


def _homfly(strands: int, letters: int) -> float:
    return 5e-9 * factorial(min(strands, 12)) * letters**3


def _signature(strands: int, letters: int) -> float:
    return 5e-6 * letters * strands**2


_ESTIMATES: dict[str, Callable[[int, int], float]] = {
    "alexander": _alexander,
    "jones": _jones,
    "homfly": _homfly,
    "signature": _signature,
}
