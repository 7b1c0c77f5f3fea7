"""The invariants with parameters: which are asked for which links, and in which order."""

from itertools import pairwise

import pytest
from hypothesis import given, settings

from braidsearch.certificates import Certificate, Distinction, format_certificate, parse_certificate
from braidsearch.invariants import TITLES, finer_ladder
from braidsearch.invariants.finer import iter_finer, of_sublinks
from braidsearch.invariants.table import NEGLIGIBLE_SECONDS, invariant_named
from braidsearch.verifier import verify_text
from braidsearch.words import Braid
from tests.strategies import braids

WHITEHEAD = Braid([1, -2, 1, -2, -2])
CHAIN = Braid([1, 1, 2, 2, 3, 3])
CHEAPEST = 12


def test_every_step_has_a_key_and_a_title_of_its_own() -> None:
    """No two steps of one ladder are the same question."""
    steps = list(iter_finer(components=3))
    assert len({step.key for step in steps}) == len(steps)
    assert len({step.title for step in steps}) == len(steps)
    assert {step.name for step in steps} <= set(TITLES)


def test_the_cheapest_comes_first() -> None:
    """What takes no notable time keeps the order of the list; the rest goes by its cost."""
    steps = finer_ladder(WHITEHEAD, WHITEHEAD)
    costs = [max(2 * step.estimated_cost(WHITEHEAD), NEGLIGIBLE_SECONDS) for step in steps]
    assert all(one <= other for one, other in pairwise(costs))


def test_sublinks_are_asked_of_links_alone() -> None:
    """A knot has none; a link of four components has those of one, two and three."""
    assert not [step for step in iter_finer(components=1) if step.name == "sublinks"]
    counts = {
        dict(step.parameters)["components"] for step in iter_finer(4) if step.name == "sublinks"
    }
    assert counts == {1, 2, 3}


def test_a_sublink_is_what_is_left_of_the_link() -> None:
    """Of a chain of four circles the pairs have linking numbers 1, 1, 1, 0, 0, 0."""
    step = of_sublinks(invariant_named("linking-numbers"), 2)
    assert step.compute(CHAIN) == [[0], [0], [0], [1], [1], [1]]
    assert step.is_applicable(CHAIN)
    assert step.estimated_cost(CHAIN) > 0


@pytest.mark.parametrize("step", list(iter_finer(components=2))[:30], ids=lambda step: step.title)
@given(left=braids(max_strands=4, max_letters=9), right=braids(max_strands=4, max_letters=9))
@settings(max_examples=12)
def test_what_the_search_computes_the_verifier_confirms(step, left: Braid, right: Braid) -> None:
    """A distinction by any step is valid exactly when its two values differ.

    The verifier recomputes both values by a route of its own; the file is read back before.
    """
    if not (step.is_applicable(left) and step.is_applicable(right)):
        return
    values = step.compute(left), step.compute(right)
    found = Distinction("identity", step.name, step.parameters, [], [], *values)
    text = format_certificate(Certificate.different(left, right, [found]))
    report = verify_text(format_certificate(parse_certificate(text)))
    expected = "as stated and differ" if values[0] != values[1] else "the two values are equal"
    assert expected in report.reason
