"""Search from both sides at once, over conjugacy classes, until the sides meet."""

from __future__ import annotations

import heapq
from collections.abc import Iterator
from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from braidsearch.moves import Move
from braidsearch.normal_form.conjugacy import ClassKey, ConjugacyClass, conjugacy_class
from braidsearch.search.class_graph import SUMMIT_CAP, ClassGraph
from braidsearch.search.limits import Budget, Ending
from braidsearch.search.proposals import (
    draft_destabilization,
    draft_exchange,
    iter_stabilizations,
    iter_words,
)
from braidsearch.search.route import Route, Stretch
from braidsearch.words import Braid

if TYPE_CHECKING:
    from braidsearch.search.walks import TorusKey, Walker

_EXTRA_STRANDS = 2
_EXPANSIONS_FIRST = 6  # classes expanded on each side before the first walk
_WALKS_A_TURN = 60
_WALKS_A_NODE = 20  # fruitless walks that count as one node
_WALK_COST, _EXPANSION_COST = 8, 3


@dataclass
class Side:
    """One side of the search: its class to begin with, what it has met, what waits.

    Classes on fewer strands are expanded first, then those met earlier: on one strand number the
    search is breadth-first. ``walkers`` are kept for the classes on the fewest strands.
    """

    start: ConjugacyClass
    met: set[ClassKey] = field(default_factory=set)
    waiting: list[tuple[int, int, int, ClassKey]] = field(default_factory=list)
    fewest_strands: int = 0
    fewest: list[ClassKey] = field(default_factory=list)
    walkers: dict[ClassKey, Walker] = field(default_factory=dict)
    known: set[TorusKey] = field(default_factory=set)
    turns: int = 0
    fruitless_walks: int = 0

    def __post_init__(self) -> None:
        self.fewest_strands = self.start.key[0]
        self.enter(self.start.key, 0)

    def enter(self, key: ClassKey, depth: int) -> None:
        """Put a class that was met now in the queue."""
        self.met.add(key)
        if key[0] < self.fewest_strands:
            self.fewest_strands = key[0]
            self.fewest.clear()
            self.walkers.clear()
        if key[0] == self.fewest_strands:
            self.fewest.append(key)
        heapq.heappush(self.waiting, (key[0], depth, len(self.met), key))


class Meeting:
    """A bidirectional search that goes on from two simplified braids; it can run in instalments.

    ``left`` and ``right`` are the routes by which the two words were simplified. All classes met,
    from either side, are nodes of one graph. Two proposers draw its edges: expansion of a class
    by the moves visible in its summit, and walks over arc presentations.
    """

    def __init__(self, left: Route, right: Route, budget: Budget) -> None:
        self._left_route, self._right_route = left, right
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
        smaller, larger = sorted((self.left.met, self.right.met), key=len)
        return any(key in larger for key in smaller)

    def run(self, share: float = 1.0) -> Ending:
        """Take turns, first the side that has met less, until they meet or a limit ends it."""
        if self.is_met:
            return Ending.FOUND
        while True:
            ending = self._budget.ending(share)
            if ending is not None:
                return ending
            side = min((self.left, self.right), key=lambda side: (side.turns, len(side.met)))
            fewest = min(self.left.fewest_strands, self.right.fewest_strands)
            self._budget.tell(fewest, "searching")
            side.turns += 1
            if self._take_turn(side, share):
                return Ending.FOUND

    def _take_turn(self, side: Side, share: float) -> bool:
        """Expand a class, or walk for a while; whether the sides have met."""
        walks = side.turns > _EXPANSIONS_FIRST and side.turns % 2 == 0
        if side.waiting and not walks:
            return self._expand(side, share)
        return self._walk(side, share)

    def _enter(
        self, side: Side, key: ClassKey, stretch: Stretch, depth: int, cost: int
    ) -> ClassKey:
        found = self._classify(stretch.end)
        self.graph.add_edge(key, stretch, found, cost)
        self._budget.nodes += 1
        if found.key not in side.met:
            side.enter(found.key, depth)
        return found.key

    def _has_met(self, key: ClassKey) -> bool:
        return key in self.left.met and key in self.right.met

    def _classify(self, braid: Braid) -> ConjugacyClass:
        return conjugacy_class(braid, SUMMIT_CAP, self._budget.is_out_of_time)

    def _expand(self, side: Side, share: float) -> bool:
        """Enter the classes next to the first one that waits; a limit puts it back."""
        entry = heapq.heappop(side.waiting)
        _, depth, _, key = entry
        for stretch in self._iter_stretches(self.graph.representative(key)):
            found = self._enter(side, key, stretch, depth + 1, _EXPANSION_COST)
            if self._has_met(found):
                return True
            if self._budget.ending(share) is not None:
                heapq.heappush(side.waiting, entry)
                break
        return False

    def _iter_stretches(self, braid: Braid) -> Iterator[Stretch]:
        words = list(iter_words(braid, SUMMIT_CAP, self._budget.is_out_of_time))
        for propose in (draft_destabilization, draft_exchange):
            for by, word in words:
                draft = propose(braid, by, word)
                if draft is not None:
                    yield Stretch.of_chain(draft)
        if braid.strands < self._max_strands and len(braid) < self._max_letters:
            yield from map(Stretch.of_chain, iter_stabilizations(braid))

    def _walk(self, side: Side, share: float) -> bool:
        """Walk from classes on the fewest strands, chosen by the seed of the turn."""
        from braidsearch.arc_walk import mixed_seed  # noqa: PLC0415 - loads a compiler
        from braidsearch.search.walks import Walker  # noqa: PLC0415

        for number in range(_WALKS_A_TURN):
            seed = mixed_seed(side.turns, number)
            key = side.fewest[seed % len(side.fewest)]
            walker = side.walkers.get(key)
            if walker is None:
                walker = Walker(
                    self.graph.representative(key), side.known, mixed_seed(len(side.walkers))
                )
                side.walkers[key] = walker
            stretch = walker.propose(side.fewest_strands)
            if stretch is None:
                side.fruitless_walks += 1
                if side.fruitless_walks % _WALKS_A_NODE == 0:
                    self._budget.nodes += 1
            elif self._has_met(self._enter(side, key, stretch, 0, _WALK_COST)):
                return True
            if self._budget.ending(share) is not None:
                break
        return False

    def moves(self) -> list[Move]:
        """The moves from the left word to the right one along a shortest path; both have met."""
        left, right = self.left.start, self.right.start
        before = self._left_route.conjugated(left.conjugator, left.representative)
        after = self._right_route.conjugated(right.conjugator, right.representative)
        between = self.graph.shortest_moves(left.key, right.key)
        return [*before.moves, *between, *after.reversed_moves()]
