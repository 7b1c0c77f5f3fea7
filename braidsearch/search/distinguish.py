"""Looking for an invariant that tells two closed braids apart, cheapest first."""

from __future__ import annotations

from dataclasses import dataclass, field

from braidsearch.certificates import Certificate, Distinction
from braidsearch.errors import CapacityError
from braidsearch.invariants.table import NEGLIGIBLE_SECONDS, Invariant, ladder
from braidsearch.moves import Move
from braidsearch.search.gate import judge
from braidsearch.search.limits import Budget
from braidsearch.search.proof import checked_chain
from braidsearch.search.route import Route
from braidsearch.search.verification_cost import verification_seconds
from braidsearch.words import Braid, apply_symmetry


@dataclass
class Distinguisher:
    """Compares a left link with one symmetric image of a right one.

    ``agreed`` names the invariants found equal, in the order in which they were computed.
    """

    left: Braid
    right: Braid
    symmetry: str
    agreed: list[str] = field(default_factory=list)

    def find(
        self, left_route: Route, right_route: Route, dearest: float, budget: Budget
    ) -> Distinction | None:
        """The first invariant of estimated cost up to ``dearest`` seconds that differs.

        The routes lead from left and from right to the braids on which it is computed. Only a
        difference that the verifier confirms counts.
        """
        left = left_route.current
        image = apply_symmetry(right_route.current, self.symmetry)
        bound = min(dearest, budget.seconds_left)
        for cost, invariant in _ladder_with_verification(left, image):
            if invariant.name in self.agreed or cost > bound:
                continue
            found = self._compare(invariant, left_route, right_route, image)
            if found is not None:
                return found
        return None

    def _compare(
        self, invariant: Invariant, left_route: Route, right_route: Route, image: Braid
    ) -> Distinction | None:
        try:
            value, other = invariant.compute(left_route.current), invariant.compute(image)
        except CapacityError:
            return None
        if value == other:
            self.agreed.append(invariant.name)
            return None
        found = Distinction(
            symmetry=self.symmetry,
            invariant=invariant.name,
            parameters={},
            left_moves=_proven_moves(left_route),
            right_moves=_proven_moves(right_route),
            left=value,
            right=other,
        )
        claim = Certificate.different(self.left, self.right, [found])
        return found if judge(claim).valid else None


def _ladder_with_verification(left: Braid, right: Braid) -> list[tuple[float, Invariant]]:
    """The invariants with what they cost, in seconds, the verifier's share included."""
    costs = [
        (
            sum(
                invariant.estimated_cost(braid) + verification_seconds(invariant.name, braid)
                for braid in (left, right)
            ),
            invariant,
        )
        for invariant in ladder(left, right)
    ]
    return sorted(costs, key=lambda pair: max(pair[0], NEGLIGIBLE_SECONDS))


def _proven_moves(route: Route) -> list[Move]:
    return checked_chain(route.start, route.moves, route.current).moves
