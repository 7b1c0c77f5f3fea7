"""Exploration of the classes around a braid: expansion of classes, and walks from them."""

from __future__ import annotations

import heapq
from collections.abc import Iterator
from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from braidsearch.moves import Move
from braidsearch.normal_form.conjugacy import ClassKey, ConjugacyClass, conjugacy_class
from braidsearch.search.class_graph import ClassGraph
from braidsearch.search.effort import summit_cap
from braidsearch.search.limits import Budget
from braidsearch.search.proposals import (
    draft_destabilization,
    draft_exchange,
    iter_stabilizations,
    iter_words,
)
from braidsearch.search.route import Route, Stretch
from braidsearch.words import Braid

if TYPE_CHECKING:
    from braidsearch.search.walks import PresentationKey, Walker

_EXTRA_STRANDS = 2
_WALKS_A_NODE = 20  # fruitless walks that count as one node
_WALK_COST, _EXPANSION_COST = 8, 3


@dataclass(frozen=True, slots=True)
class Pace:
    """How a side divides its turns: classes expanded before its first walk, and turns for one more.

    ``walks_a_turn`` is what a turn is that expands nothing.

    Walks cost little and stay on the fewest strands; expansions reach every neighbour.
    """

    expansions_first: int = 6
    turns_an_expansion: int = 3
    walks_a_turn: int = 60


@dataclass
class Side:
    """Where an exploration began, what it has met, and what waits to be expanded.

    Classes on fewer strands are expanded first, then those met earlier: on one strand number the
    search is breadth-first. ``fewest`` lists the classes on the fewest strands, from which walks
    start; ``known`` holds the presentations that walks need not look at again.
    """

    route: Route
    start: ConjugacyClass
    met: set[ClassKey] = field(default_factory=set)
    waiting: list[tuple[int, int, int, ClassKey]] = field(default_factory=list)
    fewest_strands: int = 0
    fewest: list[ClassKey] = field(default_factory=list)
    walkers: dict[ClassKey, Walker] = field(default_factory=dict)
    known: set[PresentationKey] = field(default_factory=set)
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


DEFAULT_PACE = Pace()


class Explorer:
    """One graph of classes, grown from one side or several within a budget.

    Two proposers draw its edges: expansion of a class by the moves visible in its summit, and
    walks over arc presentations.
    """

    def __init__(self, budget: Budget, strands: int, pace: Pace = DEFAULT_PACE) -> None:
        self.budget = budget
        self._pace = pace
        self.graph = ClassGraph()
        self._max_strands = budget.limits.max_strands or strands + _EXTRA_STRANDS

    def begin(self, route: Route) -> Side:
        """A side that explores from the end of the route."""
        start = self._classify(route.current)
        self.graph.add_class(start)
        return Side(route, start)

    def take_turn(self, side: Side) -> Iterator[ClassKey]:
        """Expand a class, or walk for a while; yields each class met, new or not.

        A turn may be given up at any time; what it left undone is taken up again.
        """
        side.turns += 1
        pace = self._pace
        is_walk = side.turns > pace.expansions_first and side.turns % pace.turns_an_expansion != 0
        if side.waiting and not is_walk:
            return self._expand(side)
        return self._walk(side)

    def moves_to(self, side: Side, key: ClassKey) -> list[Move]:
        """Moves from the start of the side's route to the representative of a class met."""
        start = side.start
        route = side.route.conjugated(start.conjugator, start.representative)
        return [*route.moves, *self.graph.shortest_moves(start.key, key)]

    def _enter(
        self, side: Side, key: ClassKey, stretch: Stretch, depth: int, cost: int
    ) -> ClassKey:
        found = self._classify(stretch.end)
        self.graph.add_edge(key, stretch, found, cost)
        self.budget.nodes += 1
        if found.key not in side.met:
            side.enter(found.key, depth)
        return found.key

    def _classify(self, braid: Braid) -> ConjugacyClass:
        return conjugacy_class(braid, summit_cap(braid), self.budget.is_out_of_time)

    def _expand(self, side: Side) -> Iterator[ClassKey]:
        """Enter the classes next to the first one that waits."""
        entry = heapq.heappop(side.waiting)
        _, depth, _, key = entry
        is_done = False
        try:
            most = min(self._max_strands, side.fewest_strands + 1)
            for stretch in self._iter_stretches(self.graph.representative(key), most):
                yield self._enter(side, key, stretch, depth + 1, _EXPANSION_COST)
            is_done = True
        finally:
            if not is_done:
                heapq.heappush(side.waiting, entry)

    def _iter_stretches(self, braid: Braid, most_strands: int) -> Iterator[Stretch]:
        words = list(iter_words(braid, summit_cap(braid), self.budget.is_out_of_time))
        for propose in (draft_destabilization, draft_exchange):
            for by, word in words:
                draft = propose(braid, by, word)
                if draft is not None:
                    yield Stretch.of_chain(draft)
        if braid.strands < most_strands and len(braid) < self.budget.limits.max_letters:
            yield from map(Stretch.of_chain, iter_stabilizations(braid))

    def _walk(self, side: Side) -> Iterator[ClassKey]:
        """Walk from classes on the fewest strands, chosen by the seed of the turn."""
        from braidsearch.arc_walk import mixed_seed  # noqa: PLC0415 - loads a compiler

        for number in range(self._pace.walks_a_turn):
            key = side.fewest[mixed_seed(side.turns, number) % len(side.fewest)]
            stretch = self._walker(side, key).propose(side.fewest_strands)
            if stretch is not None:
                yield self._enter(side, key, stretch, 0, _WALK_COST)
                continue
            side.fruitless_walks += 1
            if side.fruitless_walks % _WALKS_A_NODE == 0:
                self.budget.nodes += 1
                yield key

    def _walker(self, side: Side, key: ClassKey) -> Walker:
        from braidsearch.search.walks import Walker  # noqa: PLC0415 - loads a compiler

        if key not in side.walkers:
            braid = self.graph.representative(key)
            side.walkers[key] = Walker(braid, side.known, len(side.walkers))
        return side.walkers[key]
