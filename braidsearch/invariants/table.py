"""The one table of invariants: their names, their functions, and which is cheapest for a braid."""

from collections.abc import Callable
from dataclasses import dataclass
from types import ModuleType
from typing import Any

from braidsearch.errors import InputError
from braidsearch.invariants import (
    alexander,
    components,
    determinant,
    homfly,
    jones,
    linking_numbers,
    linking_sums,
    signature,
)
from braidsearch.words.braid import Braid

Value = Any
"""What an invariant takes as its value, as it stands in a certificate: an integer, or a list of
integers, of lists of integers, or (over sublinks) of values."""

Parameters = tuple[tuple[str, Any], ...]
"""Names of parameters with their values, frozen: integers, names, and tuples of them."""


@dataclass(frozen=True)
class Invariant:
    """One invariant of closed braids.

    ``name`` is its name in certificates and ``title`` its name in sentences. ``compute`` gives
    its value, exact, for every braid for which ``is_applicable``, and raises CapacityError for
    the others. ``estimated_cost`` is the time that it takes, in seconds, roughly. ``certifies``
    says whether a certificate may rest on it. ``parameters`` select it among those of its name.
    ``verification_cost`` estimates the seconds that the verifier takes, where that is known here.
    """

    name: str
    title: str
    compute: Callable[[Braid], Value]
    estimated_cost: Callable[[Braid], float]
    is_applicable: Callable[[Braid], bool]
    certifies: bool = True
    parameters: Parameters = ()
    verification_cost: Callable[[Braid], float] | None = None

    @property
    def key(self) -> tuple[str, Parameters]:
        """What tells this invariant from all others."""
        return self.name, self.parameters


def _from_module(
    name: str,
    title: str,
    module: ModuleType,
    compute: Callable[[Braid], Value],
    certifies: bool = True,
) -> Invariant:
    return Invariant(name, title, compute, module.estimated_cost, module.is_applicable, certifies)


NEGLIGIBLE_SECONDS = 0.02

INVARIANTS: tuple[Invariant, ...] = (
    _from_module("components", "number of components", components, components.component_count),
    _from_module(
        "linking-numbers", "linking numbers", linking_numbers, linking_numbers.pair_linking_numbers
    ),
    _from_module(
        "determinant", "determinant", determinant, determinant.link_determinant, certifies=False
    ),
    _from_module("alexander", "Alexander polynomial", alexander, alexander.alexander_polynomial),
    _from_module("jones", "Jones polynomial", jones, jones.jones_polynomial),
    _from_module("homfly", "HOMFLY-PT polynomial", homfly, homfly.homfly_polynomial),
    _from_module("signature", "signature", signature, signature.link_signature),
    _from_module(
        "linking-sums",
        "sums of linking numbers",
        linking_sums,
        linking_sums.component_linking_sums,
    ),
)
"""Every invariant, in the order of the ladder where cost does not matter."""


def invariant_named(name: str) -> Invariant:
    """The invariant with this name; raises InputError for a name that is not in the table."""
    for invariant in INVARIANTS:
        if invariant.name == name:
            return invariant
    known = ", ".join(invariant.name for invariant in INVARIANTS)
    raise InputError(f"invariant {name!r}: expected one of {known}")


def compute_invariants(braid: Braid) -> dict[str, Value]:
    """The values of all invariants that are applicable to the braid, by name."""
    return {
        invariant.name: invariant.compute(braid)
        for invariant in INVARIANTS
        if invariant.is_applicable(braid)
    }


def ladder(left: Braid, right: Braid) -> list[Invariant]:
    """The invariants that may tell these closures apart and certify it, cheapest first.

    What takes less than NEGLIGIBLE_SECONDS costs nothing beside the start of a process; among
    those the order of the table holds: what every table of links lists comes first, and the
    signature, whose sign is a matter of convention in the trade, late. Invariants that are not
    applicable to both braids are left out.
    """
    steps = [
        invariant
        for invariant in INVARIANTS
        if invariant.certifies and invariant.is_applicable(left) and invariant.is_applicable(right)
    ]
    return sorted(
        steps,
        key=lambda step: max(
            step.estimated_cost(left) + step.estimated_cost(right), NEGLIGIBLE_SECONDS
        ),
    )
