"""Search from both sides at once, over conjugacy classes, until the sides meet."""

from __future__ import annotations

import heapq
from collections.abc import Iterator
from dataclasses import dataclass, field

from braidsearch.moves import Conjugate, Move, MoveChain
from braidsearch.normal_form.conjugacy import ClassKey, ConjugacyClass, conjugacy_class
from braidsearch.search.class_graph import SUMMIT_CAP, ClassGraph
from braidsearch.search.limits import Budget, Ending
from braidsearch.search.proposals import (
    draft_destabilization,
    draft_exchange,
    iter_stabilizations,
    iter_words,
)
from braidsearch.words import Braid

_EXTRA_STRANDS = 2


@dataclass
class Side:
    """One side of the search: its class to begin with, what it has met, what waits.

    Classes on fewer strands are expanded first, then those met earlier: on one strand number the
    search is breadth-first.
    """

    start: ConjugacyClass
    met: set[ClassKey] = field(default_factory=set)
    waiting: list[tuple[int, int, int, ClassKey]] = field(default_factory=list)
    fewest_strands: int = 0

    def __post_init__(self) -> None:
        self.enter(self.start.key, 0)

    def enter(self, key: ClassKey, depth: int) -> None:
        """Put a class that was met now in the queue."""
        self.met.add(key)
        self.fewest_strands = min(key[0], self.fewest_strands or key[0])
        heapq.heappush(self.waiting, (key[0], depth, len(self.met), key))


class Meeting:
    """A bidirectional search that goes on from two simplified braids; it can run in instalments.

    ``left`` and ``right`` are the chains by which the two words were simplified. All classes met,
    from either side, are nodes of one graph.
    """

    def __init__(self, left: MoveChain, right: MoveChain, budget: Budget) -> None:
        self._left_chain, self._right_chain = left, right
        self._budget = budget
        self.left = Side(self._classify(left.current))
        self.right = Side(self._classify(right.current))
        self.graph = ClassGraph()
        for side in (self.left, self.right):
            self.graph.add_class(side.start)
        larger = max(left.start.strands, right.start.strands)
        self._max_strands = budget.limits.max_strands or larger + _EXTRA_STRANDS
        self._max_letters = budget.limits.max_letters

    @property
    def is_met(self) -> bool:
        """Whether a class is known to both sides."""
        return not self.left.met.isdisjoint(self.right.met)

    def run(self, share: float = 1.0) -> Ending:
        """Expand classes, on the side that has met fewer, until both meet or a limit is reached."""
        while not self.is_met:
            sides = sorted((self.left, self.right), key=lambda side: len(side.met))
            side = next((side for side in sides if side.waiting), None)
            if side is None:
                return Ending.EXHAUSTED
            ending = self._budget.ending(share)
            if ending is not None:
                return ending
            fewest = min(self.left.fewest_strands, self.right.fewest_strands)
            self._budget.tell(fewest, "search over conjugacy classes")
            self._expand(side, share)
        return Ending.FOUND

    def _classify(self, braid: Braid) -> ConjugacyClass:
        return conjugacy_class(braid, SUMMIT_CAP, self._budget.is_out_of_time)

    def _expand(self, side: Side, share: float) -> None:
        """Enter the classes next to the first one that waits; a limit puts it back."""
        entry = heapq.heappop(side.waiting)
        _, depth, _, key = entry
        for draft in self._iter_drafts(self.graph.representative(key)):
            found = self._classify(draft.current)
            self.graph.add_class(found)
            self.graph.add_edge(key, draft, found)
            self._budget.nodes += 1
            if found.key not in side.met:
                side.enter(found.key, depth + 1)
            if self.is_met:
                return
            if self._budget.ending(share) is not None:
                heapq.heappush(side.waiting, entry)
                return

    def _iter_drafts(self, braid: Braid) -> Iterator[MoveChain]:
        words = list(iter_words(braid, SUMMIT_CAP, self._budget.is_out_of_time))
        for propose in (draft_destabilization, draft_exchange):
            for by, word in words:
                draft = propose(braid, by, word)
                if draft is not None:
                    yield draft
        if braid.strands < self._max_strands and len(braid) < self._max_letters:
            yield from iter_stabilizations(braid)

    def moves(self) -> list[Move]:
        """The moves from the left word to the right one along a shortest path; both have met."""
        before = _to_class(self._left_chain, self.left.start)
        after = _to_class(self._right_chain, self.right.start)
        between = self.graph.shortest_moves(self.left.start.key, self.right.start.key)
        return [*before.moves, *between, *after.reversed_moves()]


def _to_class(chain: MoveChain, found: ConjugacyClass) -> MoveChain:
    """The chain with one more step, to the representative of the class of its end."""
    longer = MoveChain(chain.start, is_checked=False)
    longer.extend(chain.moves)
    longer.append(Conjugate(found.conjugator, found.representative.word))
    return longer
