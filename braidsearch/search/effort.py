"""How much work a single braid is worth to a search."""

from braidsearch.words import Braid

SUMMIT_CAP = 200
MOST_TURNED = 40  # strands up to which a proof may turn a braid over: the half twist grows fast
_LARGEST_SUMMIT = 800  # strands times letters up to which summits are walked


def summit_cap(braid: Braid) -> int:
    """Members of an ultra summit set that the search walks at most, for the class of the braid.

    Large braids are named by the end of their cyclic sliding alone: two names may then stand for
    one class, which costs a search some luck and a proof nothing.
    """
    is_small = braid.strands <= MOST_TURNED and len(braid) * braid.strands <= _LARGEST_SUMMIT
    return SUMMIT_CAP if is_small else 0
