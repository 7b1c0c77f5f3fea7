"""Connected sums and split unions, of braids and of diagrams."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch import InputError
from braidsearch.diagrams.closed_braid_diagram import closed_braid_diagram
from braidsearch.diagrams.families import connected_sum, split_union, torus_link, two_bridge_link
from braidsearch.diagrams.vogel import braid_from_diagram
from braidsearch.invariants import component_count, jones_polynomial, pair_linking_numbers
from braidsearch.invariants.laurent import multiply
from braidsearch.words import Braid
from tests.strategies import braids

CIRCLE = [[-1, -1], [1, -1]]
KEYCHAIN = Braid([1, 1, -2, -2, -2, -2])
"""Three components in a row: the first and the second linked once, the second and third -2."""


@settings(max_examples=40)
@given(left=braids(max_strands=3, max_letters=7), right=braids(max_strands=3, max_letters=7))
def test_unions_multiply(left, right):
    """V of a split union is the product times -(t^(1/2) + t^(-1/2)) (Jones, 1985)."""
    union = split_union(left, right)
    assert union.components == left.components + right.components
    product = multiply(jones_polynomial(left), jones_polynomial(right))
    assert jones_polynomial(union) == multiply(product, CIRCLE)


@settings(max_examples=60)
@given(
    left=braids(max_strands=3, max_letters=7),
    right=braids(max_strands=3, max_letters=7),
    data=st.data(),
)
def test_sums_multiply(left, right, data):
    """V of a connected sum is the product, whichever components are joined (Jones, 1985)."""
    chosen = {
        "left_component": data.draw(st.integers(0, left.components - 1)),
        "right_component": data.draw(st.integers(0, right.components - 1)),
    }
    joined = connected_sum(left, right, **chosen)
    assert joined.strands == left.strands + right.strands - 1
    assert joined.components == left.components + right.components - 1
    product = multiply(jones_polynomial(left), jones_polynomial(right))
    assert jones_polynomial(joined) == product
    drawn = connected_sum(closed_braid_diagram(left), closed_braid_diagram(right), **chosen)
    assert drawn.component_count == joined.components
    assert jones_polynomial(braid_from_diagram(drawn)) == product


@settings(max_examples=30)
@given(left=braids(max_strands=4, max_letters=7), right=braids(max_strands=4, max_letters=7))
def test_unions_of_diagrams(left, right):
    """Two drawings side by side are the split union of the two links."""
    drawn = split_union(closed_braid_diagram(left), closed_braid_diagram(right))
    expected = jones_polynomial(split_union(left, right))
    assert jones_polynomial(braid_from_diagram(drawn)) == expected


@pytest.mark.parametrize(
    ("component", "numbers"), [(0, [-2, 1, 3]), (1, [-2, 1, 3]), (2, [-2, 1, 3])]
)
def test_the_chosen_component_is_joined(component, numbers):
    """A ring linked three times with a circle hangs from the component that was named."""
    joined = connected_sum(KEYCHAIN, torus_link(2, 6), left_component=component)
    assert sorted(n for n in pair_linking_numbers(joined) if n) == numbers
    degrees = {0: [1, 1, 2, 2], 1: [1, 1, 1, 3], 2: [1, 1, 2, 2]}[component]
    assert _linked_neighbours(joined) == degrees


def _linked_neighbours(braid):
    """For each component of the closure, how many others it links, sorted."""
    place = [0] * braid.strands
    for number, cycle in enumerate(braid.component_cycles):
        for position in cycle:
            place[position] = number
    totals = {}
    for letter in braid.word:
        i = abs(letter)
        pair = frozenset(place[i - 1 : i + 1])
        if len(pair) == 2:
            totals[pair] = totals.get(pair, 0) + (1 if letter > 0 else -1)
        place[i - 1], place[i] = place[i], place[i - 1]
    linked = [pair for pair, total in totals.items() if total]
    return sorted(sum(number in pair for pair in linked) for number in range(braid.components))


def test_sums_with_circles_and_bad_numbers():
    """The unknot is neutral; a component that is not there is named, and so are unlike kinds."""
    trefoil, circle = two_bridge_link([3]), closed_braid_diagram(Braid([]))
    assert connected_sum(trefoil, circle) == trefoil
    assert connected_sum(circle, trefoil) == trefoil
    assert connected_sum(circle, circle) == circle
    assert connected_sum(Braid([1, 1, 1]), Braid([])) == Braid([1, 1, 1])
    assert component_count(connected_sum(Braid([1, 1]), Braid([1, 1]))) == 3
    with pytest.raises(InputError, match="component 1: expected a number from 0 to 0"):
        connected_sum(trefoil, trefoil, right_component=1)
    with pytest.raises(InputError, match="component 2: expected a number from 0 to 1"):
        connected_sum(Braid([1, 1]), Braid([1]), left_component=2)
    for operation in (connected_sum, split_union):
        with pytest.raises(InputError, match="Braid and LinkDiagram: expected two braids or two"):
            operation(Braid([1]), trefoil)
