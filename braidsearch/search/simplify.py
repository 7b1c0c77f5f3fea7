"""Greedy simplification: fewer letters, fewer strands, every step recorded."""

from __future__ import annotations

from braidsearch.moves import MoveChain
from braidsearch.search.limits import Budget
from braidsearch.search.proposals import draft_destabilization, iter_words
from braidsearch.search.route import Route, Stretch
from braidsearch.words import Braid, cyclic_reduce
from braidsearch.words.half_twist import flip_letters, half_twist
from braidsearch.words.handles import reduce_handles, reduce_handles_turned

_SUMMIT_CAP = 100
_WORDS_ONLY_ABOVE = 300  # letters from which the summit is not walked for a destabilization


_WALK_ABOVE = 4  # strands from which a walk looks for fewer before invariants are computed
_SEED = 1


def simplified(braid: Braid, budget: Budget) -> Route:
    """The route to the handiest braid at hand: by greed, then, on many strands, by a walk."""
    route = Route(braid, (Stretch.of_chain(simplify(braid, budget, _SUMMIT_CAP)),))
    if route.current.strands > _WALK_ABOVE and not budget.is_out_of_time():
        from braidsearch.search.walks import cooled_route  # noqa: PLC0415 - loads a compiler

        route = cooled_route(route, _SEED)
    return route


def simplify(braid: Braid, budget: Budget, summit_cap: int) -> MoveChain:
    """A chain of moves to a braid with fewer strands or letters, as far as greed goes.

    Handle reduction and cyclic reduction shorten the word; a generator at either end that occurs
    once is destabilized away, looked for in the word and in words of the summit of its class.
    """
    chain = MoveChain(braid)
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
    return min((reduce_handles(braid), reduce_handles_turned(braid)), key=len)


def _destabilize_once(chain: MoveChain, budget: Budget, summit_cap: int) -> bool:
    braid = chain.current
    turned = half_twist(braid.strands), flip_letters(braid.word, braid.strands)
    for by, word in (((), braid.word), turned):
        if _take(chain, draft_destabilization(braid, by, word)):
            return True
    if len(braid) > _WORDS_ONLY_ABOVE or budget.ending() is not None:
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
