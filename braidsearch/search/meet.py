"""Search from both sides at once, over conjugacy classes, until the sides meet."""

from __future__ import annotations

from braidsearch.moves import Move, MoveChain
from braidsearch.normal_form.conjugacy import ClassKey
from braidsearch.search.explorer import DEFAULT_PACE, Explorer, Pace, Side
from braidsearch.search.limits import Budget, Ending
from braidsearch.search.route import Route


class Meeting:
    """A bidirectional search that goes on from two simplified braids; it can run in instalments.

    ``left`` and ``right`` are the routes by which the two words were simplified. All classes met,
    from either side, are nodes of one graph.
    """

    def __init__(
        self, left: Route, right: Route, budget: Budget, pace: Pace = DEFAULT_PACE
    ) -> None:
        self._budget = budget
        self._explorer = Explorer(budget, max(left.start.strands, right.start.strands), pace)
        self._left, self._right = self._explorer.begin(left), self._explorer.begin(right)
        self._middle: ClassKey | None = None
        if self._right.start.key in self._left.met:
            self._middle = self._right.start.key

    def run(self, share: float = 1.0) -> Ending:
        """Take turns, the side with fewer turns first, until both meet or a limit ends it.

        ``share`` is the part of the limits that may be used.
        """
        while self._middle is None:
            ending = self._budget.ending(share)
            if ending is not None:
                return ending
            side = min((self._left, self._right), key=lambda side: (side.turns, len(side.met)))
            fewest = min(self._left.fewest_strands, self._right.fewest_strands)
            self._budget.tell(fewest, "searching for moves")
            self._middle = self._take_turn(side, share)
        return Ending.FOUND

    def _take_turn(self, side: Side, share: float) -> ClassKey | None:
        """The class in which the sides meet during the turn, if they do."""
        for key in self._explorer.take_turn(side):
            if key in self._left.met and key in self._right.met:
                return key
            if self._budget.ending(share) is not None:
                break
        return None

    def moves(self) -> list[Move]:
        """The moves from the left word to the right one, once both have met."""
        if self._middle is None:
            raise ValueError("the two sides have not met")
        forward = self._explorer.moves_to(self._left, self._middle)
        back = MoveChain(self._right.route.start, is_checked=False)
        back.extend(self._explorer.moves_to(self._right, self._middle))
        return [*forward, *back.reversed_moves()]
