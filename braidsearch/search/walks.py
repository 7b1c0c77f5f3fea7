"""Walks over arc presentations as stretches of a route, and as proposals from a class."""

from __future__ import annotations

from collections.abc import Sequence

from braidsearch.arc_walk import (
    HeatRange,
    Phase,
    Walk,
    cooled,
    find_short,
    iter_direct_moves,
    mixed_seed,
    walk,
)
from braidsearch.diagrams import ArcPresentation, word_from_arcs
from braidsearch.diagrams.arc_cuts import presentation_key
from braidsearch.normal_form.left_normal_form import ShouldStop, never
from braidsearch.search.route import Route, Stretch
from braidsearch.search.walk_proofs import walk_moves
from braidsearch.words import Braid

PresentationKey = tuple[tuple[int, int], ...]

_HEATS = HeatRange(tries=(100, 2_000), splits=(1, 5), settling=400)
_EXCHANGE_SHARES = (0.05, 0.3, 1.0)  # few exchanges keep proofs short, many reach further
_GENTLE_WALKS = 40  # walks from each class with few exchanges, before all shares are drawn
COOLING_TRIES_A_LETTER = 3_000


def walked_stretch(start: Braid, walks: Sequence[Walk]) -> Stretch:
    """The stretch from a word through walks that begin at its own arc presentation."""
    end = word_from_arcs(walks[-1].end)
    return Stretch(end, lambda: walk_moves(start, iter_direct_moves(walks)))


def cooled_route(
    route: Route,
    seed: int,
    should_stop: ShouldStop = never,
    tries_a_letter: int = COOLING_TRIES_A_LETTER,
) -> Route:
    """The route continued to the shortest word on the fewest strands that a first walk finds."""
    braid = route.current
    tries = tries_a_letter * (len(braid) + braid.strands)
    best = find_short(braid, seed, tries, keep=1, should_stop=should_stop)[0]
    end = best.braid
    if (end.strands, len(end)) >= (braid.strands, len(braid)):
        return route
    return route.extended(Stretch(end, lambda: walk_moves(braid, best.iter_moves())))


class Walker:
    """Short walks from one braid: heat by a few splits, cool, and see where the braid is then.

    The walks start at the braid's own arc presentation, cooled once. ``known`` holds the
    presentations (up to rotation) that need no second look, and may be shared among walkers.
    """

    def __init__(self, braid: Braid, known: set[PresentationKey], seed: int) -> None:
        self._braid = braid
        self._known = known
        self._seed = seed
        self._number = 0
        self._base: Walk | None = None

    def propose(self, most_strands: int) -> Stretch | None:
        """A stretch to a presentation not known yet on at most so many strands, if one is met."""
        if self._base is None:
            self._base = cooled(self._braid, self._seed)
            return self._offer((self._base,), most_strands)
        self._number += 1
        seed = mixed_seed(self._seed, self._number)
        gentle = self._number <= _GENTLE_WALKS
        step = walk(self._base.end, seed, _heat_plan(mixed_seed(seed, 1), gentle))
        return self._offer((self._base, step), most_strands)

    def _offer(self, walks: tuple[Walk, ...], most_strands: int) -> Stretch | None:
        end: ArcPresentation = walks[-1].end
        if walks[-1].strands > most_strands:
            return None
        key = presentation_key(end)
        if key in self._known:
            return None
        self._known.add(key)
        return walked_stretch(self._braid, walks)


def _heat_plan(seed: int, gentle: bool) -> tuple[Phase, Phase]:
    """A heat and the cooling after it; all their numbers are drawn from the seed."""
    shares = _EXCHANGE_SHARES[:1] if gentle else _EXCHANGE_SHARES
    return _HEATS.plan(seed, shares[seed // 4096 % len(shares)])
