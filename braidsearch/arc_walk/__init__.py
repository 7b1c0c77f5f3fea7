"""Random walks over arc presentations: compiled inner loops, cooling and heating, short words."""

from braidsearch.arc_walk.direct import iter_direct_moves
from braidsearch.arc_walk.heats import HeatRange
from braidsearch.arc_walk.shortening import ShortPresentation, cooled, find_short
from braidsearch.arc_walk.walking import Phase, Walk, cool, heat, mixed_seed, walk

__all__ = [
    "HeatRange",
    "Phase",
    "ShortPresentation",
    "Walk",
    "cool",
    "cooled",
    "find_short",
    "heat",
    "iter_direct_moves",
    "mixed_seed",
    "walk",
]
