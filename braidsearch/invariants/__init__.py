"""Invariants of closed braids, exact: one file for each, and the table of them all."""

from braidsearch.invariants.alexander import alexander_polynomial
from braidsearch.invariants.components import component_count
from braidsearch.invariants.determinant import link_determinant
from braidsearch.invariants.finer import TITLES, finer_ladder
from braidsearch.invariants.homfly import homfly_polynomial
from braidsearch.invariants.jones import jones_polynomial
from braidsearch.invariants.laurent import format_polynomial, mirror_image, sympy_expression
from braidsearch.invariants.linking_numbers import pair_linking_numbers
from braidsearch.invariants.linking_sums import component_linking_sums
from braidsearch.invariants.signature import link_signature
from braidsearch.invariants.table import (
    INVARIANTS,
    Invariant,
    Value,
    compute_invariants,
    invariant_named,
    ladder,
)

__all__ = [
    "INVARIANTS",
    "TITLES",
    "Invariant",
    "Value",
    "alexander_polynomial",
    "component_count",
    "component_linking_sums",
    "compute_invariants",
    "finer_ladder",
    "format_polynomial",
    "homfly_polynomial",
    "invariant_named",
    "jones_polynomial",
    "ladder",
    "link_determinant",
    "link_signature",
    "mirror_image",
    "pair_linking_numbers",
    "sympy_expression",
]
