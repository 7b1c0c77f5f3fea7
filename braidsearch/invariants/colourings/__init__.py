"""Colourings of links by conjugacy classes of finite groups: counted with their longitudes."""

from braidsearch.invariants.colourings.colours import Colours
from braidsearch.invariants.colourings.counting import (
    count_colourings,
    estimated_cost,
    is_applicable,
    verification_seconds,
)
from braidsearch.invariants.colourings.ladder import group_ladder

__all__ = [
    "Colours",
    "count_colourings",
    "estimated_cost",
    "group_ladder",
    "is_applicable",
    "verification_seconds",
]
