"""Seifert circles and Vogel's moves: from a diagram to a closed braid and back."""

import random

import pytest
from hypothesis import given, settings

from braidsearch.diagrams import (
    LinkDiagram,
    braid_from_diagram,
    closed_braid_diagram,
    simplify_diagram,
)
from braidsearch.diagrams.seifert_reading import read_coherent_circles
from braidsearch.diagrams.vogel import SeifertCircles
from braidsearch.errors import CapacityError
from braidsearch.invariants import homfly_polynomial, jones_polynomial, pair_linking_numbers
from braidsearch.invariants.diagram_linking import diagram_linking_numbers
from braidsearch.words import Braid
from tests.diagrams.brute_force import brute_force_jones
from tests.diagrams.published import published_diagram
from tests.knot_tables import TableRow, iter_knots
from tests.strategies import braids, link_diagrams


@given(link_diagrams(max_strands=4, max_letters=9))
def test_the_closed_braid_is_the_link_of_the_diagram(diagram: LinkDiagram) -> None:
    """Jones polynomial by brute force, linking numbers and components; strands as Yamada says."""
    braid = braid_from_diagram(diagram)
    assert braid.strands == diagram.seifert_circle_count
    assert braid.components == diagram.component_count
    assert pair_linking_numbers(braid) == diagram_linking_numbers(diagram)
    assert braid.exponent_sum == diagram.writhe
    assert brute_force_jones(diagram) == jones_polynomial(braid)


@given(braids(max_strands=5, max_letters=20))
def test_a_closed_braid_comes_back(braid: Braid) -> None:
    """Its circles are coherent: as many letters and strands, the same HOMFLY-PT polynomial."""
    back = braid_from_diagram(closed_braid_diagram(braid))
    assert (back.strands, len(back)) == (braid.strands, len(braid))
    assert homfly_polynomial(back) == homfly_polynomial(braid)
    assert jones_polynomial(back) == jones_polynomial(braid)
    assert pair_linking_numbers(back) == pair_linking_numbers(braid)


@settings(max_examples=60)
@given(link_diagrams(max_strands=6, max_letters=40))
def test_moves_lower_the_number_of_incoherent_pairs(diagram: LinkDiagram) -> None:
    """Two letters for each pair of incoherent circles in one piece, counted beforehand.

    Vogel, Representation of links by braids: a new algorithm, 1990.
    """
    circles = SeifertCircles(diagram)
    circles.make_coherent()
    moves = (len(circles.signs) - len(diagram.crossings)) // 2
    assert moves == incoherent_pairs(diagram)
    assert sum(circles.signs) == diagram.writhe


def incoherent_pairs(diagram: LinkDiagram) -> int:
    """Pairs of Seifert circles of one piece that do not bound an oriented annulus's two sides.

    Of two disjoint circles on the sphere, each lies to the left or to the right of the other;
    they are coherent when one lies left of the other and the other right of the one. The side is
    found by walking over the faces without crossing the circle.
    """
    circle_of_arc = {
        arc: number for number, arcs in enumerate(diagram.seifert_circles) for arc in arcs
    }
    left_face = {
        (arc, step): number for number, face in enumerate(diagram.faces) for arc, step in face
    }
    sides = {}
    for number, arcs in enumerate(diagram.seifert_circles):
        reached = {left_face[arc, 1] for arc in arcs}
        waiting = list(reached)
        while waiting:
            for arc, step in diagram.faces[waiting.pop()]:
                beyond = left_face[arc, -step]
                if circle_of_arc[arc] != number and beyond not in reached:
                    reached.add(beyond)
                    waiting.append(beyond)
        for other, other_arcs in enumerate(diagram.seifert_circles):
            sides[number, other] = left_face[other_arcs[0], 1] in reached
    piece_of_circle = {}
    for piece_number, piece in enumerate(diagram.pieces):
        for crossing in piece:
            for arc in diagram.crossings[crossing].arcs:
                piece_of_circle[circle_of_arc[arc]] = piece_number
    count = len(diagram.seifert_circles)
    return sum(
        piece_of_circle[one] == piece_of_circle[other] and sides[one, other] == sides[other, one]
        for one in range(count)
        for other in range(one)
    )


@pytest.mark.parametrize("row", list(iter_knots(8)), ids=lambda row: row.name)
def test_published_knots_with_their_homfly_polynomials(row: TableRow) -> None:
    """The HOMFLY-PT polynomial of the braid is the table's (KnotInfo), for all to 8 crossings."""
    assert homfly_polynomial(braid_from_diagram(published_diagram(row))) == row.homfly


def test_split_parts_and_circles_lie_beside_each_other() -> None:
    """A trefoil, a Hopf link and two circles: strands 2 + 2 + 1 + 1, no letter between them."""
    braid = Braid([1, 1, 1, 3, 3], 6)
    assert braid_from_diagram(closed_braid_diagram(braid)) == braid
    assert braid_from_diagram(LinkDiagram((), 3)) == Braid([], 3)


@pytest.mark.parametrize("word", [[1, 1, 2, 2], [1, 1, 2, 2, 3, 3], [1, 2, 2, 1, 3, 3]])
def test_circles_that_are_not_coherent_are_not_read(word: list[int]) -> None:
    """Chains of circles with every other one reversed have to be moved before they are read."""
    braid = Braid(word)
    turned = closed_braid_diagram(braid).reversed_components(range(0, braid.components, 2))
    assert incoherent_pairs(turned) > 0
    with pytest.raises(ArithmeticError, match="do not lie in a row"):
        read_coherent_circles(turned.opposite_ends, [c.sign for c in turned.crossings], 0)


def random_turned_diagram(seed: int, strands: int, letters: int, every: int = 2) -> LinkDiagram:
    """The diagram of a random closed braid, simplified, every so manieth component reversed."""
    generator = random.Random(seed)
    indices = [generator.randint(1, strands - 1) for _ in range(letters)]
    braid = Braid([generator.choice((1, -1)) * index for index in indices])
    turned = closed_braid_diagram(braid).reversed_components(range(0, braid.components, every))
    return simplify_diagram(turned)


def test_thousands_of_crossings() -> None:
    """A long word with one component reversed: a strand for each Seifert circle."""
    turned = random_turned_diagram(seed=11, strands=12, letters=4000, every=9)
    assert len(turned.crossings) > 2000
    braid = braid_from_diagram(turned)
    assert braid.strands == turned.seifert_circle_count > 12
    assert pair_linking_numbers(braid) == diagram_linking_numbers(turned)


def test_more_strands_or_letters_than_a_braid_may_have() -> None:
    """Both ends are told apart, in one line."""
    many_letters = random_turned_diagram(seed=8, strands=100, letters=5600)
    with pytest.raises(CapacityError, match=r"\d+ strands has more than 100000 letters: expected"):
        braid_from_diagram(many_letters)
    wide = random_turned_diagram(seed=9, strands=300, letters=14000)
    with pytest.raises(CapacityError, match="Seifert circles: expected at most 1000"):
        braid_from_diagram(wide)
