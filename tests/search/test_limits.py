"""Limits that no search can keep are refused, and every ending has its own name."""

import math

import pytest

from braidsearch.errors import InputError
from braidsearch.search.limits import Budget, Ending, SearchLimits


@pytest.mark.parametrize(
    ("name", "value"),
    [
        ("seconds", -1),
        ("seconds", math.nan),
        ("seconds", math.inf),
        ("nodes", -1),
        ("nodes", 1.5),
        ("nodes", True),
        ("max_strands", 0),
        ("max_strands", 10**9),
        ("max_letters", None),
        ("max_letters", 0),
    ],
)
def test_a_nonsense_limit_is_named(name, value):
    """The message names the limit and the value."""
    with pytest.raises(InputError, match=name):
        SearchLimits(**{name: value})


def test_each_limit_has_its_own_ending():
    """Nodes and seconds end a search under different names; without limits nothing ends it."""
    nodes = Budget(SearchLimits(seconds=None, nodes=10))
    assert nodes.ending() is None
    nodes.nodes = 5
    assert nodes.ending(share=0.5) is Ending.NODE_LIMIT
    assert nodes.ending() is None
    assert Budget(SearchLimits(seconds=0, nodes=None)).ending() is Ending.TIME_LIMIT
    assert Budget(SearchLimits(seconds=None, nodes=None)).ending() is None
    assert len({ending.value for ending in Ending}) == len(Ending)
