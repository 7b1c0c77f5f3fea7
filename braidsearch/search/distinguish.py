"""Looking for an invariant that tells two closed braids apart, cheapest first."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterable
from dataclasses import dataclass, field
from typing import TypeAlias

from braidsearch.certificates import Certificate, Distinction
from braidsearch.errors import CapacityError
from braidsearch.invariants.finer import finer_ladder
from braidsearch.invariants.table import NEGLIGIBLE_SECONDS, Invariant, Value, ladder
from braidsearch.moves import Move
from braidsearch.search.gate import judge
from braidsearch.search.limits import Budget
from braidsearch.search.proof import checked_chain
from braidsearch.search.route import Route
from braidsearch.search.verification_cost import verification_seconds
from braidsearch.words import Braid, apply_symmetry

Ladder: TypeAlias = Callable[[Braid, Braid], Iterable[Invariant]]
"""Which invariants to try on two braids."""

_MOST_VALUES = 20_000


class Values:
    """The values computed so far in one query: several symmetries ask for those of one braid."""

    def __init__(self) -> None:
        self._known: dict[object, Value] = {}

    def value(self, invariant: Invariant, braid: Braid) -> Value:
        """The value for the closure of the braid. Raises CapacityError where it is out of reach."""
        key = (invariant.key, braid)
        if key not in self._known:
            if len(self._known) >= _MOST_VALUES:
                self._known.clear()
            self._known[key] = invariant.compute(braid)
        return self._known[key]


@dataclass
class Distinguisher:
    """Compares a left link with one symmetric image of a right one.

    ``agreed`` holds the invariants found equal, in the order in which they were computed, and
    ``found_by`` the one that differs, once it is found.
    """

    left: Braid
    right: Braid
    symmetry: str
    values: Values = field(default_factory=Values)
    agreed: dict[object, Invariant] = field(default_factory=dict)
    found_by: Invariant | None = None

    def find(  # noqa: PLR0913, PLR0917 - what to compare, and three bounds
        self,
        left_route: Route,
        right_route: Route,
        dearest: float,
        budget: Budget,
        invariants: Ladder = ladder,
        allowance: float = math.inf,
    ) -> Distinction | None:
        """The first invariant of estimated cost up to ``dearest`` seconds that differs.

        ``allowance`` bounds what all of them may cost together, by estimate, in seconds.

        The routes lead from left and from right to the braids on which it is computed. Only a
        difference that the verifier confirms counts.
        """
        left = left_route.current
        image = apply_symmetry(right_route.current, self.symmetry)
        for cost, invariant in _with_verification(invariants(left, image), left, image, budget):
            if invariant.key in self.agreed or cost > min(dearest, budget.seconds_left):
                continue
            allowance -= cost
            if allowance < 0:
                return None
            budget.tell(left.strands, "computing invariants")
            found = self._compare(invariant, left_route, right_route, image)
            if found is not None:
                return found
        return None

    def is_different(self, left: Braid, right: Braid, dearest: float, budget: Budget) -> bool:
        """Whether a cheap invariant of these braids differs; nothing is proven or remembered."""
        image = apply_symmetry(right, self.symmetry)
        for invariants in (ladder, finer_ladder):
            for cost, invariant in _with_verification(invariants(left, image), left, image, budget):
                if invariant.key in self.agreed or cost > min(dearest, budget.seconds_left):
                    continue
                if self._values_differ(invariant, left, image):
                    return True
        return False

    def _values_differ(self, invariant: Invariant, left: Braid, image: Braid) -> bool:
        try:
            return bool(self.values.value(invariant, left) != self.values.value(invariant, image))
        except CapacityError:
            return False

    def agreed_names(self) -> list[str]:
        """The names of the invariants found equal; how many of each that takes parameters."""
        counts: dict[str, int] = {}
        for invariant in self.agreed.values():
            counts[invariant.name] = counts.get(invariant.name, 0) + 1
        return [name if count == 1 else f"{name} ({count})" for name, count in counts.items()]

    def _compare(
        self, invariant: Invariant, left_route: Route, right_route: Route, image: Braid
    ) -> Distinction | None:
        try:
            value = self.values.value(invariant, left_route.current)
            other = self.values.value(invariant, image)
        except CapacityError:
            return None
        if value == other:
            self.agreed[invariant.key] = invariant
            return None
        found = Distinction(
            symmetry=self.symmetry,
            invariant=invariant.name,
            parameters=invariant.parameters,
            left_moves=_proven_moves(left_route),
            right_moves=_proven_moves(right_route),
            left=value,
            right=other,
        )
        claim = Certificate.different(self.left, self.right, [found])
        if not judge(claim).valid:
            return None
        self.found_by = invariant
        return found


def _with_verification(
    invariants: Iterable[Invariant], left: Braid, right: Braid, budget: Budget
) -> list[tuple[float, Invariant]]:
    """The invariants with what they cost, in seconds, the verifier's share included."""
    costs = []
    for invariant in invariants:
        if budget.is_out_of_time():
            break
        cost = sum(
            invariant.estimated_cost(braid) + verification_seconds(invariant, braid)
            for braid in (left, right)
        )
        costs.append((cost, invariant))
    return sorted(costs, key=lambda pair: max(pair[0], NEGLIGIBLE_SECONDS))


def _proven_moves(route: Route) -> list[Move]:
    return checked_chain(route.start, route.moves, route.current).moves
