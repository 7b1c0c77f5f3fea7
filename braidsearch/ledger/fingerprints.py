"""The fingerprint of a link: invariants that cost little, by which a ledger looks links up."""

from __future__ import annotations

import json
from collections.abc import Iterator
from dataclasses import dataclass
from functools import lru_cache
from typing import Any

from braidsearch.errors import CapacityError
from braidsearch.invariants.table import Invariant, invariant_named
from braidsearch.search.gate import is_confirmed
from braidsearch.search.verification_cost import verification_seconds
from braidsearch.words import Braid

FIELDS: tuple[str, ...] = (
    "components",
    "linking-numbers",
    "linking-sums",
    "alexander",
    "jones",
    "homfly",
    "signature",
)
"""The invariants of a fingerprint, in the order in which they are compared."""

BASE = 3
"""How many of them, from the first on, are computed for every braid."""

_DEAREST_SECONDS = 2.0  # by estimate, the verifier's part included; never by the clock
_REMEMBERED = 50_000


@dataclass(frozen=True, slots=True)
class Fingerprint:
    """Values of the invariants in FIELDS, each as compact JSON, None where it costs too much
    or is too large for the verifier.

    Every value was computed by two routes, the searcher's and the verifier's. Links whose
    fingerprints differ in a value that both have are different oriented links.
    """

    values: tuple[str | None, ...]

    @property
    def base(self) -> tuple[str | None, ...]:
        """The values that every fingerprint has."""
        return self.values[:BASE]

    @property
    def is_complete(self) -> bool:
        """Whether no value is missing."""
        return None not in self.values

    def differences(self, other: Fingerprint) -> Iterator[str]:
        """The invariants that differ, of those that both have, in the order of FIELDS."""
        for name, mine, theirs in zip(FIELDS, self.values, other.values, strict=True):
            if mine is not None and theirs is not None and mine != theirs:
                yield name

    def first_difference(self, other: Fingerprint) -> str | None:
        """The first invariant that differs, of those that both have; None when they agree."""
        return next(self.differences(other), None)

    def value(self, name: str) -> Any:
        """The value of one invariant as a certificate states it, None where it is missing."""
        text = self.values[FIELDS.index(name)]
        return None if text is None else json.loads(text)


@lru_cache(maxsize=_REMEMBERED)
def fingerprint(braid: Braid) -> Fingerprint:
    """The fingerprint of the closure, each value confirmed by the verifier.

    Raises ArithmeticError when the two routes disagree, which is a defect of one of them.
    """
    return Fingerprint(tuple(_value(invariant_named(name), braid) for name in FIELDS))


def _value(invariant: Invariant, braid: Braid) -> str | None:
    if not invariant.is_applicable(braid) or _cost(invariant, braid) > _DEAREST_SECONDS:
        return None
    try:
        value = invariant.compute(braid)
    except CapacityError:
        return None
    is_right = is_confirmed(invariant.name, braid, value)
    if is_right is None:
        return None
    if not is_right:
        size = f"{braid.strands} strands, {len(braid)} letters: {braid.word[:20]}..."
        raise ArithmeticError(f"{invariant.name} of {size}: the searcher and the verifier disagree")
    return json.dumps(value, separators=(",", ":"))


def _cost(invariant: Invariant, braid: Braid) -> float:
    if FIELDS.index(invariant.name) < BASE:
        return 0.0
    return invariant.estimated_cost(braid) + verification_seconds(invariant, braid)
