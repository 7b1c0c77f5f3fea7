"""The invariants that take parameters: they see what the polynomials of the table miss."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from functools import lru_cache, partial
from math import comb
from typing import TYPE_CHECKING

from braidsearch.invariants import alexander_module, levine_tristram, sublinks
from braidsearch.invariants.table import INVARIANTS, NEGLIGIBLE_SECONDS, Invariant, Value
from braidsearch.words.braid import Braid

if TYPE_CHECKING:
    from braidsearch.invariants.colourings import Colours

TITLES: dict[str, str] = {
    **{invariant.name: invariant.title for invariant in INVARIANTS},
    "levine-tristram": "Levine-Tristram signature and nullity",
    "alexander-module": "Alexander module",
    "colouring": "colourings",
    "sublinks": "sublinks",
    "three-braid": "classification of closed 3-braids (Birman, Menasco, 1993)",
}
"""The name in sentences of each invariant that a certificate may rest on, and of some others."""

ROOTS_OF_UNITY: tuple[tuple[int, int], ...] = (
    *((3, 1), (4, 1), (5, 1), (5, 2), (6, 1)),
    *((8, 1), (8, 3), (10, 1), (10, 3), (12, 1), (12, 5)),
)
"""Order and power of the roots at which Levine-Tristram signatures are asked for.

A complex-conjugate root has the same signature, so of each pair one is here.
"""

PRIMES: tuple[int, ...] = (2, 3, 5, 7, 11, 13)
"""The primes modulo which Alexander modules are compared."""

_MOST_SUBLINKS = 120  # of one number of components
_MOST_COMPONENTS = 5  # of links on whose sublinks everything is asked: thirty at most
_MOST_LETTERS = 80  # of either braid, for the same


def finer_ladder(left: Braid, right: Braid) -> list[Invariant]:
    """The invariants with parameters that may tell these closures apart, cheapest first."""
    components = len(left.component_cycles)
    is_small = components <= _MOST_COMPONENTS and max(len(left), len(right)) <= _MOST_LETTERS
    steps = [
        (invariant.estimated_cost(left) + invariant.estimated_cost(right), place, invariant)
        for place, invariant in enumerate(iter_finer(components, is_small))
        if invariant.is_applicable(left) and invariant.is_applicable(right)
    ]
    steps.sort(key=lambda step: (max(step[0], NEGLIGIBLE_SECONDS), step[1]))
    return [invariant for _, _, invariant in steps]


def iter_finer(components: int, is_small: bool = True) -> Iterator[Invariant]:
    """All of them, for links of so many components; where cost does not matter, in this order.

    Links that are not small are asked for the plain invariants of their sublinks alone.
    """
    own = [*map(_levine_tristram, ROOTS_OF_UNITY), *map(_alexander_module, PRIMES)]
    colourings = list(map(_colouring, _group_ladder()))
    yield from _plain_on_sublinks(components)
    yield from own
    yield from colourings
    if is_small:
        yield from _on_sublinks([*own, *colourings], components)


def sublink_ladder(left: Braid, right: Braid) -> list[Invariant]:
    """The first part of the finer ladder: plain invariants of sublinks, none of them for knots."""
    return [
        step
        for step in _plain_on_sublinks(len(left.component_cycles))
        if step.is_applicable(left) and step.is_applicable(right)
    ]


def _plain_on_sublinks(components: int) -> Iterator[Invariant]:
    plain = [step for step in INVARIANTS if step.certifies and step.name != "components"]
    return _on_sublinks(plain, components)


def _on_sublinks(steps: list[Invariant], components: int) -> Iterator[Invariant]:
    for count in range(1, components):
        if comb(components, count) <= _MOST_SUBLINKS:
            yield from (of_sublinks(step, count) for step in steps)


def of_sublinks(invariant: Invariant, components: int) -> Invariant:
    """The values of an invariant for all sublinks of so many components."""

    def total(cost: Callable[[Braid], float]) -> Callable[[Braid], float]:
        return lambda braid: sum(map(cost, _sublinks(braid, components)))

    def is_applicable(braid: Braid) -> bool:
        return all(map(invariant.is_applicable, _sublinks(braid, components)))

    checked = invariant.verification_cost
    inner = (("invariant", invariant.name), *invariant.parameters)
    noun = "component" if components == 1 else "components"
    return Invariant(
        name="sublinks",
        title=f"{invariant.title} of all sublinks of {components} {noun}",
        compute=partial(_compute_of_sublinks, components=components, compute=invariant.compute),
        estimated_cost=total(invariant.estimated_cost),
        is_applicable=is_applicable,
        parameters=(("components", components), *inner),
        verification_cost=None if checked is None else total(checked),
    )


@lru_cache(maxsize=64)
def _sublinks(braid: Braid, components: int) -> tuple[Braid, ...]:
    return tuple(sublinks.iter_sublinks(braid, components))


def _compute_of_sublinks(
    braid: Braid, components: int, compute: Callable[[Braid], Value]
) -> list[Value]:
    return sublinks.sublink_values(braid, components, compute)


def _levine_tristram(root: tuple[int, int]) -> Invariant:
    order, power = root
    return Invariant(
        name="levine-tristram",
        title=f"{TITLES['levine-tristram']} at exp(2 pi i {power}/{order})",
        compute=partial(levine_tristram.levine_tristram_signature, order=order, power=power),
        estimated_cost=partial(levine_tristram.estimated_cost, order=order),
        is_applicable=partial(levine_tristram.is_applicable, order=order),
        parameters=(("order", order), ("power", power)),
    )


def _alexander_module(prime: int) -> Invariant:
    return Invariant(
        name="alexander-module",
        title=f"{TITLES['alexander-module']} modulo {prime}",
        compute=partial(alexander_module.alexander_module_factors, prime=prime),
        estimated_cost=partial(alexander_module.estimated_cost, prime=prime),
        is_applicable=partial(alexander_module.is_applicable, prime=prime),
        parameters=(("prime", prime),),
    )


def _group_ladder() -> list[Colours]:
    from braidsearch.invariants.colourings import group_ladder  # noqa: PLC0415 - tables of groups

    return list(group_ladder())


def _colouring(colours: Colours) -> Invariant:
    from braidsearch.invariants import colourings  # noqa: PLC0415 - tables of groups

    return Invariant(
        name="colouring",
        title=f"{TITLES['colouring']} in {colours.name}",
        compute=partial(colourings.count_colourings, colours=colours),
        estimated_cost=partial(colourings.estimated_cost, colours=colours),
        is_applicable=partial(colourings.is_applicable, colours=colours),
        parameters=(("generators", colours.generators), ("meridians", colours.meridians)),
        verification_cost=partial(colourings.verification_seconds, colours=colours),
    )
