"""Simplification: loops, clasps, nugatory crossings, and strands laid along shorter ways."""

import random

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.diagrams import LinkDiagram, closed_braid_diagram, simplify_diagram
from braidsearch.invariants.diagram_bracket import diagram_jones_polynomial
from braidsearch.invariants.diagram_linking import diagram_linking_numbers
from braidsearch.words import Braid
from tests.diagrams.brute_force import brute_force_jones
from tests.diagrams.published import published_diagram
from tests.knot_tables import TableRow, iter_knots
from tests.strategies import link_diagrams


@given(link_diagrams(max_letters=9))
def test_the_link_stays(diagram: LinkDiagram) -> None:
    """The normalised bracket, the components and the linking numbers are those of before."""
    simple = simplify_diagram(diagram)
    assert brute_force_jones(simple) == brute_force_jones(diagram)
    assert simple.component_count == diagram.component_count
    assert diagram_linking_numbers(simple) == diagram_linking_numbers(diagram)
    assert len(simple.crossings) <= len(diagram.crossings)


@settings(max_examples=50)
@given(link_diagrams(max_strands=6, max_letters=40))
def test_nothing_is_left_to_simplify(diagram: LinkDiagram) -> None:
    """No face of one side, no face of two that comes apart, no face twice at one crossing."""
    simple = simplify_diagram(diagram)
    assert simplify_diagram(simple) is simple
    for face in simple.face_cycles:
        crossings = [end // 4 for end in face]
        assert len(set(crossings)) == len(crossings)
        if len(face) == 2:
            # Along an arc of the clasp the strand is over at one end and under at the other.
            assert (face[0] + simple.opposite_ends[face[0]]) % 2 == 1


@given(st.lists(st.integers(1, 4), min_size=1, max_size=6))
def test_plain_unknots_and_unlinks_come_apart(word: list[int]) -> None:
    """A braid with each generator once, whatever its sign, and one times its inverse."""
    once = Braid([index if index % 2 else -index for index in range(1, 7)])
    assert simplify_diagram(closed_braid_diagram(once)) == LinkDiagram((), 1)
    trivial = Braid(word, 5) * Braid(word, 5).inverse()
    assert simplify_diagram(closed_braid_diagram(trivial)) == LinkDiagram((), 5)


def test_a_nugatory_crossing_between_two_knots() -> None:
    """Two trefoils on either side of a crossing: it goes, and their connected sum stays.

    V of a connected sum is the product (Jones, A polynomial invariant for knots, 1985).
    """
    diagram = closed_braid_diagram(Braid([1, 1, 1, 2, 3, 3, 3]))
    simple = simplify_diagram(diagram)
    assert len(simple.crossings) == 6
    trefoil = [[2, 1], [6, 1], [8, -1]]
    square = [[4, 1], [8, 2], [10, -2], [12, 1], [14, -2], [16, 1]]
    assert diagram_jones_polynomial(closed_braid_diagram(Braid([1, 1, 1]))) == trefoil
    assert diagram_jones_polynomial(simple) == square


@settings(max_examples=40)
@given(link_diagrams(max_strands=6, max_letters=50))
def test_the_link_stays_where_long_strands_are_laid_anew(diagram: LinkDiagram) -> None:
    """On diagrams too large for brute force: the state sum over a sweep, and linking numbers."""
    simple = simplify_diagram(diagram)
    assert diagram_jones_polynomial(simple) == diagram_jones_polynomial(diagram)
    assert diagram_linking_numbers(simple) == diagram_linking_numbers(diagram)


def test_a_component_above_all_others_comes_off() -> None:
    """A ring laid over a trefoil, four crossings more, ends as a circle beside the trefoil.

    The first strand runs over the two others to the right and, behind two crossings, back.
    """
    simple = simplify_diagram(closed_braid_diagram(Braid([-1, -2, 1, 1, 2, 1, 2])))
    assert (len(simple.crossings), simple.circles) == (3, 1)
    assert simple.writhe == 3


@pytest.mark.parametrize("seed", range(20))
def test_descending_diagrams_come_apart(seed: int) -> None:
    """Where a knot passes every crossing over first it is the unknot, whatever its shadow."""
    generator = random.Random(seed)
    shadow = closed_braid_diagram(Braid([generator.randint(1, 5) for _ in range(61)], 6))
    while len(shadow.components) > 1:
        shadow = closed_braid_diagram(Braid([generator.randint(1, 5) for _ in range(61)], 6))
    place = {arc: number for number, arc in enumerate(shadow.components[0])}
    descending = []
    for crossing in shadow.crossings:
        (under, _), (over, _) = crossing.passages
        descending.append(crossing if place[over] < place[under] else crossing.mirrored())
    assert simplify_diagram(LinkDiagram(tuple(descending))) == LinkDiagram((), 1)


@pytest.mark.parametrize("row", list(iter_knots(8)), ids=lambda row: row.name)
def test_published_diagrams_are_reduced(row: TableRow) -> None:
    """A diagram with the crossing number of its knot has no crossing to spare."""
    diagram = published_diagram(row)
    assert simplify_diagram(diagram) is diagram
