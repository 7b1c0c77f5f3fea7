"""Looking for an invariant that tells two closed braids apart, cheapest first."""

from __future__ import annotations

from dataclasses import dataclass, field

from braidsearch.certificates import Certificate, Distinction
from braidsearch.errors import CapacityError
from braidsearch.invariants.table import Invariant, ladder
from braidsearch.moves import MoveChain
from braidsearch.search.gate import judge
from braidsearch.search.limits import Budget
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
        self, left_chain: MoveChain, right_chain: MoveChain, dearest: float, budget: Budget
    ) -> Distinction | None:
        """The first invariant of estimated cost up to ``dearest`` seconds that differs.

        The chains lead from left and from right to the braids on which it is computed. Only a
        difference that the verifier confirms counts.
        """
        left = left_chain.current
        image = apply_symmetry(right_chain.current, self.symmetry)
        for invariant in ladder(left, image):
            if invariant.name in self.agreed or not invariant.certifies:
                continue
            cost = invariant.estimated_cost(left) + invariant.estimated_cost(image)
            if cost > min(dearest, budget.seconds_left):
                continue
            found = self._compare(invariant, left_chain, right_chain, image)
            if found is not None:
                return found
        return None

    def _compare(
        self, invariant: Invariant, left_chain: MoveChain, right_chain: MoveChain, image: Braid
    ) -> Distinction | None:
        try:
            value, other = invariant.compute(left_chain.current), invariant.compute(image)
        except CapacityError:
            return None
        if value == other:
            self.agreed.append(invariant.name)
            return None
        found = Distinction(
            symmetry=self.symmetry,
            invariant=invariant.name,
            parameters={},
            left_moves=left_chain.moves,
            right_moves=right_chain.moves,
            left=value,
            right=other,
        )
        claim = Certificate.different(self.left, self.right, [found])
        return found if judge(claim).valid else None
