"""Greedy simplification: fewer letters, fewer strands, every step recorded."""

from __future__ import annotations

from braidsearch.moves import MoveChain
from braidsearch.search.limits import Budget
from braidsearch.search.proposals import draft_destabilization, iter_words, turnings
from braidsearch.search.route import Route, Stretch
from braidsearch.words import Braid, cyclic_reduce
from braidsearch.words.half_twist import flip_letters
from braidsearch.words.handles import reduce_handles, reduce_handles_turned

_SUMMIT_CAP = 100
LONGEST_SUMMIT = 100  # letters up to which the summit is walked for a destabilization
_LONGEST_HANDLES = 400  # letters up to which handles are reduced
_WALK_STRANDS, _WALK_LETTERS = 5, 40  # from either of them on a walk comes first
_SEED = 1


def greedy_route(braid: Braid, budget: Budget) -> Route:
    """The route by visible reductions and destabilizations alone, which takes little time."""
    return _greedy(Route(braid), budget, 0)


def visibly_simplified(route: Route, budget: Budget) -> Route:
    """A route continued by the reductions visible in the summit of the class, without a walk."""
    return _greedy(route, budget, _SUMMIT_CAP)


def simplified(route: Route, budget: Budget, tries_a_letter: int | None = None) -> Route:
    """A greedy route continued to the handiest braid at hand: for large braids by a walk first.

    ``tries_a_letter`` is the length of the walk for each letter and strand (None: a long one).
    """
    braid = route.current
    if braid.strands >= _WALK_STRANDS or len(braid) >= _WALK_LETTERS:
        from braidsearch.search.walks import (  # noqa: PLC0415 - loads a compiler
            COOLING_TRIES_A_LETTER,
            cooled_route,
        )

        tries = tries_a_letter or COOLING_TRIES_A_LETTER
        route = cooled_route(route, _SEED, budget.is_out_of_time, tries)
    return _greedy(route, budget, _SUMMIT_CAP)


def _greedy(route: Route, budget: Budget, summit_cap: int) -> Route:
    return route.extended(Stretch.of_chain(simplify(route.current, budget, summit_cap)))


def simplify(braid: Braid, budget: Budget, summit_cap: int) -> MoveChain:
    """A chain of moves to a braid with fewer strands or letters, as far as greed goes.

    The chain is a draft: whoever makes a proof of it checks it. ``summit_cap`` bounds the members
    of a summit that are looked at; 0 leaves summits alone.

    Handle reduction and cyclic reduction shorten the word; a generator at either end that occurs
    once is destabilized away, looked for in the word and in words of the summit of its class.
    """
    chain = MoveChain(braid, is_checked=False)
    while True:
        shorten(chain)
        if not _destabilize_once(chain, budget, summit_cap):
            return chain


def shorten(chain: MoveChain) -> None:
    """Conjugate to a shorter word, by handle reductions and cyclic reductions in turn."""
    braid = chain.current
    by: tuple[int, ...] = ()
    while True:
        reduced, step = cyclic_reduce(_without_handles(braid))
        if len(reduced) >= len(braid):
            break
        braid, by = reduced, by + step
    if len(braid) < len(chain.current):
        chain.conjugate(by, braid.word)


def _without_handles(braid: Braid) -> Braid:
    if len(braid) > _LONGEST_HANDLES:
        return braid
    return min((reduce_handles(braid), reduce_handles_turned(braid)), key=len)


def _destabilize_once(chain: MoveChain, budget: Budget, summit_cap: int) -> bool:
    braid = chain.current
    turned = [(turn, flip_letters(braid.word, braid.strands)) for turn in turnings(braid)]
    for by, word in [((), braid.word), *turned]:
        if _take(chain, draft_destabilization(braid, by, word)):
            return True
    if len(braid) > LONGEST_SUMMIT or not summit_cap or budget.is_out_of_time():
        return False
    return any(
        _take(chain, draft_destabilization(braid, by, word))
        for by, word in iter_words(braid, summit_cap, budget.is_out_of_time)
    )


def _take(chain: MoveChain, draft: MoveChain | None) -> bool:
    if draft is None:
        return False
    chain.extend(draft.moves)
    return True
