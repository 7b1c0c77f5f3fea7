"""How much work a single braid is worth to a search."""

from braidsearch.words import Braid

SUMMIT_CAP = 200
_LARGEST_SUMMIT = 800  # strands times letters up to which summits are walked


def summit_cap(braid: Braid) -> int:
    """Members of an ultra summit set that the search walks at most, for the class of the braid.

    Large braids are named by the end of their cyclic sliding alone: two names may then stand for
    one class, which costs a search some luck and a proof nothing.
    """
    return SUMMIT_CAP if len(braid) * braid.strands <= _LARGEST_SUMMIT else 0
