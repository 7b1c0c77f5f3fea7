"""Named links as constructors: torus, two-bridge and pretzel links, cables, sums and unions."""

from braidsearch.diagrams.families.columns import (
    continued_fraction,
    pretzel_link,
    two_bridge_link,
)
from braidsearch.diagrams.families.sums import connected_sum, split_union
from braidsearch.diagrams.families.torus import cable, torus_link

__all__ = [
    "cable",
    "connected_sum",
    "continued_fraction",
    "pretzel_link",
    "split_union",
    "torus_link",
    "two_bridge_link",
]
