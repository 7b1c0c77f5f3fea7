"""``tighten``: the fewest strands, then the fewest letters, that a search reaches."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from typing import Any

from braidsearch.certificates import Certificate
from braidsearch.errors import CapacityError, OutOfTimeError
from braidsearch.invariants.table import invariant_named
from braidsearch.moves import Conjugate, Move
from braidsearch.normal_form.conjugacy import ClassKey
from braidsearch.search.effort import SUMMIT_CAP
from braidsearch.search.explorer import Explorer, Side
from braidsearch.search.gate import judge
from braidsearch.search.limits import Budget, Ending, Progress, SearchLimits
from braidsearch.search.proof import checked_chain
from braidsearch.search.proposals import iter_words
from braidsearch.search.simplify import greedy_route, simplified
from braidsearch.words import Braid

_PATIENCE = 400  # nodes without progress after which fewer letters are given up
_DEAREST = 20.0


@dataclass(frozen=True)
class Tightening:
    """What ``tighten`` found.

    ``braid`` closes to the same oriented link as the word given, which ``certificate``, accepted by
    the verifier, proves. ``lower_bound`` is the least number of strands that the Morton-Franks-
    Williams inequality allows (None where the HOMFLY-PT polynomial is out of reach).
    ``explored`` tells what was done, as for ``compare``.
    """

    braid: Braid
    certificate: Certificate
    lower_bound: int | None
    explored: Mapping[str, Any] = field(hash=False)

    @property
    def is_minimal(self) -> bool:
        """Whether no braid on fewer strands closes to this link: the bound is met."""
        return self.lower_bound == self.braid.strands


def strands_lower_bound(braid: Braid, seconds: float = _DEAREST) -> int | None:
    """The least number of strands of any braid for this link, by its HOMFLY-PT polynomial.

    Morton, Seifert circles and knot polynomials, 1986; Franks, Williams, Braids and the Jones
    polynomial, 1987: twice (strands - 1) is at least the spread of the exponents of v. None when
    the polynomial takes more than so many seconds, by estimate.
    """
    homfly = invariant_named("homfly")
    if not homfly.is_applicable(braid) or homfly.estimated_cost(braid) > seconds:
        return None
    try:
        value = homfly.compute(braid)
    except CapacityError:
        return None
    exponents: list[int] = [term[0] for term in value]
    return (max(exponents) - min(exponents)) // 2 + 1


def tighten(
    braid: Braid,
    *,
    limits: SearchLimits | None = None,
    progress: Callable[[Progress], None] | None = None,
) -> Tightening:
    """A word on the fewest strands, and then with the fewest letters, that the search reaches.

    The search ends when the lower bound on strands is met and no shorter word has turned up for a
    while, or at the limits.
    """
    return _Tightener(braid, Budget(limits or SearchLimits(), progress)).answer()


class _Tightener:
    """The search: what has been explored, the best word so far, and the moves that lead to it."""

    def __init__(self, braid: Braid, budget: Budget) -> None:
        self.budget = budget
        self.start = braid
        self.route = simplified(greedy_route(braid, budget), budget)
        self.best = self.route.current
        self.make_moves: Callable[[], list[Move]] = lambda: self.route.moves
        self.lower_bound = self._bound_of(self.best)
        self.explorer = Explorer(budget, self.best.strands)
        self.last_progress = 0
        self.looked_at: set[ClassKey] = set()

    def answer(self) -> Tightening:
        """Explore to the end, and prove what was found."""
        try:
            ending = self._explore()
        except KeyboardInterrupt:
            ending = Ending.INTERRUPTED
        except OutOfTimeError:
            ending = Ending.TIME_LIMIT
        chain = checked_chain(self.start, self.make_moves(), self.best)
        certificate = Certificate.same(self.start, self.best, "identity", chain.moves)
        report = judge(certificate)
        if not report.valid:
            raise CapacityError(f"the verifier did not accept the certificate: {report.reason}")
        explored = {
            "nodes": self.budget.nodes,
            "seconds": round(self.budget.seconds, 3),
            "ending": ending.value,
        }
        return Tightening(self.best, certificate, self.lower_bound, explored)

    def _bound_of(self, braid: Braid) -> int | None:
        return strands_lower_bound(braid, min(_DEAREST, self.budget.seconds_left))

    def _explore(self) -> Ending:
        if self._is_settled():
            return Ending.FOUND
        side = self.explorer.begin(self.route)
        self._look_at(side, side.start.key)
        while not self._is_settled():
            ending = self.budget.ending()
            if ending is not None:
                return ending
            self.budget.tell(self.best.strands, f"tightening, {len(self.best)} letters")
            for key in self.explorer.take_turn(side):
                self._look_at(side, key)
                if self._is_settled() or self.budget.ending() is not None:
                    break
        return Ending.FOUND

    def _is_settled(self) -> bool:
        if self.best.strands != self.lower_bound:
            return self.best.strands == 1
        # On the fewest strands the exponent sum is an invariant of the link (Dynnikov, Prasolov,
        # Bypasses for rectangular diagrams, 2013), so a word of one sign has the fewest letters.
        if len(self.best) == abs(self.best.exponent_sum):
            return True
        return self.budget.nodes - self.last_progress >= _PATIENCE

    def _look_at(self, side: Side, key: ClassKey) -> None:
        """Take the shortest word of a class, when it is better than the best one."""
        if key in self.looked_at or key[0] > self.best.strands:
            return
        self.looked_at.add(key)
        representative = self.explorer.graph.representative(key)
        words = iter_words(representative, SUMMIT_CAP, self.budget.is_out_of_time)
        by, shortest = min(words, key=lambda found: len(found[1]))
        found = Braid.trusted(shortest, key[0])
        if (found.strands, len(found)) >= (self.best.strands, len(self.best)):
            return
        last = Conjugate(by, shortest)
        self.best, self.last_progress = found, self.budget.nodes
        self.make_moves = lambda: [*self.explorer.moves_to(side, key), last]
        if self.lower_bound is None:
            self.lower_bound = self._bound_of(found)
