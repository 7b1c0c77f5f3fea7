"""Invariants of a diagram, computed on the diagram itself, against those of its braid."""

from __future__ import annotations

import random
from collections.abc import Iterator

from braidsearch.diagrams.closed_braid_diagram import closed_braid_diagram
from braidsearch.diagrams.link_diagram import LinkDiagram
from braidsearch.diagrams.simplification import simplify_diagram
from braidsearch.errors import BraidsearchError
from braidsearch.invariants import jones
from braidsearch.invariants.diagram_alexander import (
    braid_alexander_value,
    diagram_alexander_value,
    is_equal_up_to_units,
)
from braidsearch.invariants.diagram_bracket import (
    bracket_value,
    diagram_jones_polynomial,
    is_jones_feasible,
)
from braidsearch.invariants.diagram_linking import diagram_linking_numbers
from braidsearch.invariants.diagram_sweep import sweep_diagram
from braidsearch.invariants.linking_numbers import pair_linking_numbers
from braidsearch.invariants.residues import prime_modulus
from braidsearch.words import Braid

_JONES_SECONDS = 2.0
_BRACKET_STATES = 500_000
"""A sweep with so many states takes two or three seconds."""
_ROOT_ORDER = 96
_PRIMES = 3
_SEED = 1985


class WeavingError(BraidsearchError):
    """A braid that does not have the invariants of the diagram it was woven from."""


def check_same_invariants(
    diagram: LinkDiagram, simplified: LinkDiagram, braid: Braid
) -> tuple[str, ...]:
    """What was checked, a sentence each, of a braid woven from a diagram.

    The number of components and the linking numbers, counted on the diagram; the Jones polynomial
    by a state sum over the diagram, exact or at one point modulo each of several primes; where
    the diagram or the braid is too large for it, the Alexander polynomial at roots of unity modulo
    primes, up to units. The state sum takes the diagram as it was drawn, or where that is too wide
    and ``simplified`` is not, the latter.

    Raises WeavingError where one of them differs.
    """
    _require(diagram.component_count == braid.components, "number of components")
    checks = [f"number of components: {braid.components}, in the diagram and in the braid"]
    if braid.components > 1:
        _require(diagram_linking_numbers(diagram) == pair_linking_numbers(braid), "linking numbers")
        pairs = braid.components * (braid.components - 1) // 2
        checks.append(
            f"linking number{'s' * (pairs > 1)} of {pairs} pair{'s' * (pairs > 1)} of components: "
            "equal, counted at the crossings of the diagram"
        )
    polynomial_check = _check_jones(diagram, "the diagram", braid)
    if not polynomial_check and simplified != diagram:
        polynomial_check = _check_jones(simplified, "the simplified diagram", braid)
    return (*checks, polynomial_check or _check_alexander(diagram, braid))


def _require(is_equal: bool, title: str) -> None:
    if not is_equal:
        raise WeavingError(f"the braid woven from a diagram has another {title} than the diagram")


def _check_jones(diagram: LinkDiagram, title: str, braid: Braid) -> str:
    """What was checked of the Jones polynomial; nothing where it would take too long."""
    sweep = sweep_diagram(diagram)
    if sweep.state_count > _BRACKET_STATES:
        return ""
    if is_jones_feasible(diagram, sweep) and _is_jones_fast(braid):
        polynomial = jones.jones_polynomial(braid)
        _require(diagram_jones_polynomial(diagram) == polynomial, "Jones polynomial")
        return f"Jones polynomial: equal, by a state sum over {title}"
    for closure, closure_title in _iter_closures(braid):
        if sweep_diagram(closure).state_count <= _BRACKET_STATES:
            return _check_bracket(diagram, title, closure, closure_title)
    return ""


def _iter_closures(braid: Braid) -> Iterator[tuple[LinkDiagram, str]]:
    """Diagrams of the closed braid to take a state sum over, with what to call them."""
    closure = closed_braid_diagram(braid)
    yield closure, "the closed braid"
    yield simplify_diagram(closure), "the closed braid's diagram, simplified"


def _check_bracket(
    diagram: LinkDiagram, title: str, closure: LinkDiagram, closure_title: str
) -> str:
    modulus, point = _modulus_and_point()
    equal = bracket_value(diagram, point, modulus) == bracket_value(closure, point, modulus)
    _require(equal, "value of the Jones polynomial")
    return (
        f"Jones polynomial: equal at a point modulo each of {_PRIMES} primes of 31 bits, by state "
        f"sums over {title} and over {closure_title}"
    )


def _is_jones_fast(braid: Braid) -> bool:
    return jones.is_applicable(braid) and jones.estimated_cost(braid) <= _JONES_SECONDS


def _modulus_and_point() -> tuple[int, int]:
    """A product of primes, and a point drawn once and for all that is no root of the loop."""
    modulus = 1
    for number in range(_PRIMES):
        modulus *= prime_modulus(_ROOT_ORDER, number)[0]
    return modulus, random.Random(_SEED).randrange(2, modulus)


def _check_alexander(diagram: LinkDiagram, braid: Braid) -> str:
    for number in range(_PRIMES):
        prime, root = prime_modulus(_ROOT_ORDER, number)
        values = (
            diagram_alexander_value(diagram, root, prime),
            braid_alexander_value(braid, root, prime),
        )
        _require(is_equal_up_to_units(*values, root, prime), "value of the Alexander polynomial")
    return (
        f"Alexander polynomial: equal up to units at a root of unity of order {_ROOT_ORDER}, "
        f"modulo each of {_PRIMES} primes of 31 bits; the Jones polynomial would take too long"
    )
