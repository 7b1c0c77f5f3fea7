"""Weaving: from a drawing of a link to a closed braid, cross-checked by invariants of both."""

from braidsearch.weaving.cross_checks import WeavingError, check_same_invariants
from braidsearch.weaving.weave import Woven, weave

__all__ = ["WeavingError", "Woven", "check_same_invariants", "weave"]
