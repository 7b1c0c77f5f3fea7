"""One braid for many: a canonical form that braids with one closure often share, and its moves."""

from __future__ import annotations

from functools import lru_cache

from braidsearch.moves import flype_word, power
from braidsearch.normal_form.conjugacy import conjugacy_class
from braidsearch.search.closed_three_braids import is_classified
from braidsearch.search.effort import SUMMIT_CAP, summit_cap
from braidsearch.search.limits import Budget, SearchLimits
from braidsearch.search.proposals import Letters, iter_words
from braidsearch.search.route import Route, Stretch
from braidsearch.search.simplify import LONGEST_SUMMIT, greedy_route, simplified, visibly_simplified
from braidsearch.words import Braid

_WALK_STRANDS = 5  # from so many strands on that are left, a walk looks for fewer
_SHORT_WALK = 300  # tries a letter: what it misses among small braids, a search finds when needed
_SMALL = 40  # letters and strands up to which the walk is a short one
_REMEMBERED = 20_000


def canonical_route(braid: Braid) -> Route:
    """A route to the canonical form of the braid: equal forms are the same oriented link.

    The form is a word on the fewest strands that simplification reaches: up to 3 strands it
    depends on the link alone (Birman, Menasco, Studying links via closed braids III, 1993), from 4
    strands on it is the shortest word of the conjugacy class reached, so that different forms
    prove nothing. The same braid gets the same form at all times: no clock is looked at.
    Raises CapacityError for what is too large.
    """
    route = _one_pass(braid)
    while (further := _further_pass(route.current)) is not None:
        route = route.extended(*further.stretches)
    return route


@lru_cache(maxsize=_REMEMBERED)
def _further_pass(form: Braid) -> Route | None:
    """The pass that begins at a form, None where it ends where it began: the form is settled."""
    route = _one_pass(form)
    end = route.current
    is_better = (end.strands, len(end), end.word) < (form.strands, len(form), form.word)
    return route if is_better else None


def visible_route(braid: Braid) -> Route:
    """A route by the reductions that are visible in the word and in the summit of its class.

    It is the beginning of that to the canonical form, without a walk.
    """
    budget = Budget(SearchLimits(seconds=None))
    route = greedy_route(braid, budget)
    if len(route.current) <= LONGEST_SUMMIT:
        route = visibly_simplified(route, budget)
    return route


def _one_pass(braid: Braid) -> Route:
    budget = Budget(SearchLimits(seconds=None))
    route = visible_route(braid)
    if route.current.strands >= _WALK_STRANDS or len(route.current) > LONGEST_SUMMIT:
        is_small = len(route.current) + route.current.strands <= _SMALL
        route = simplified(route, budget, _SHORT_WALK if is_small else None)
    return _to_classified_form(route) if is_classified(route.current) else _to_shortest_word(route)


def _to_shortest_word(route: Route) -> Route:
    """The route continued by a conjugation to the shortest word of the summit of its class.

    The summit of a large braid is out of reach, and its words are long: that one stays as it is.
    """
    if not summit_cap(route.current):
        return route
    found = conjugacy_class(route.current, summit_cap(route.current))
    by, word = _shortest_member(found.representative)
    return route.conjugated(found.conjugator + by, Braid.trusted(word, route.current.strands))


@lru_cache(maxsize=_REMEMBERED)
def _shortest_member(representative: Braid) -> tuple[Letters, Letters]:
    """The shortest word for a member of the summit, the least such, with its conjugator."""
    words = iter_words(representative, SUMMIT_CAP)
    return min(words, key=lambda pair: (len(pair[1]), pair[1]))


def _to_classified_form(route: Route) -> Route:
    """The route continued to the braid that stands for its link, on 3 strands or fewer."""
    from braidsearch.three_braids import moves_between  # noqa: PLC0415 - not for larger braids

    form = _classified_form(route.current)
    moves = moves_between(route.current, form)
    if moves is None:
        raise ValueError(f"{form!r} does not close to the link that it stands for")
    return route.extended(Stretch(form, lambda: moves))


def _classified_form(braid: Braid) -> Braid:
    """The braid that stands for the closure of one on 3 strands or fewer.

    The trivial braid for the unknot, 1^k on 2 strands for a torus link, otherwise the shortest word
    of a conjugacy class: of the lesser one, where a flype joins two.
    """
    from braidsearch.three_braids.classification import on_three_strands  # noqa: PLC0415
    from braidsearch.three_braids.conjugacy import three_braid_class  # noqa: PLC0415
    from braidsearch.three_braids.flype_family import flype_exponents  # noqa: PLC0415
    from braidsearch.three_braids.torus_links import UNKNOTS, torus_twists  # noqa: PLC0415

    wide = on_three_strands(braid)
    named = three_braid_class(wide)
    twists = torus_twists(named)
    if twists:
        return Braid((), 1) if twists[0] in UNKNOTS else Braid(power(1, twists[0]), 2)
    exponents = flype_exponents(named)
    if exponents is not None and named.reverse().value < named.value:
        u, v, w, e = exponents
        wide = Braid(flype_word(w, v, u, e), 3)
    found = conjugacy_class(wide, summit_cap(wide))
    return Braid.trusted(_shortest_member(found.representative)[1], 3)
