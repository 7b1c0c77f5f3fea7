"""Random walks over arc presentations: compiled inner loops, cooling and heating, short words."""

from braidsearch.arc_walk.shortening import ShortPresentation, cooled, find_short
from braidsearch.arc_walk.walking import Phase, Walk, cool, heat, mixed_seed, walk

__all__ = [
    "Phase",
    "ShortPresentation",
    "Walk",
    "cool",
    "cooled",
    "find_short",
    "heat",
    "mixed_seed",
    "walk",
]
