"""Closed braids on 3 strands or fewer: a classification that never leaves a pair undecided."""

from braidsearch.three_braids.classification import link_classes
from braidsearch.three_braids.proofs import moves_between

__all__ = ["link_classes", "moves_between"]
