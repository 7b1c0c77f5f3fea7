"""The value of a link diagram: what it accepts, and the symmetries."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.diagrams import Crossing, LinkDiagram, closed_braid_diagram
from braidsearch.errors import InputError
from braidsearch.invariants import mirror_image, pair_linking_numbers
from braidsearch.invariants.diagram_linking import diagram_linking_matrix, diagram_linking_numbers
from braidsearch.words import Braid
from tests.diagrams.brute_force import brute_force_jones
from tests.strategies import braids, link_diagrams

TREFOIL = LinkDiagram(
    (Crossing((0, 4, 1, 3), 1), Crossing((2, 0, 3, 5), 1), Crossing((4, 2, 5, 1), 1))
)


def test_right_handed_trefoil() -> None:
    """Three positive crossings, two Seifert circles, V = t + t^3 - t^4 (Jones, 1985)."""
    assert TREFOIL.writhe == 3
    assert len(TREFOIL.seifert_circles) == 2
    assert sorted(map(len, TREFOIL.faces)) == [2, 2, 2, 3, 3]
    assert TREFOIL.components == ((0, 1, 2, 3, 4, 5),)
    assert brute_force_jones(TREFOIL) == [[2, 1], [6, 1], [8, -1]]


@pytest.mark.parametrize(
    ("crossings", "circles", "message"),
    [
        ((), 0, "0 crossings and 0 circles: expected a link of at least one component"),
        ((), -1, "0 crossings and -1 circles: expected"),
        ((Crossing((0, 1, 1, 0), 2),), 0, "sign 2 at crossing 1: expected 1 or -1"),
        ((Crossing((0, 1, 1, 2), 1),), 0, "arc 2 at crossing 1: expected a number from 0 to 1"),
        ((Crossing((0, 0, 1, 1), -1),), 0, "arc 0: expected it to leave one crossing"),
        (
            (Crossing((2, 1, 3, 0), 1), Crossing((1, 0, 2, 3), 1)),
            0,
            "the piece of crossing 1, 2 crossings in all: expected a planar diagram, found one of "
            "genus 1",
        ),
    ],
)
def test_what_is_not_a_diagram(crossings: tuple[Crossing, ...], circles: int, message: str) -> None:
    """One line names what is wrong and what was expected."""
    with pytest.raises(InputError) as caught:
        LinkDiagram(crossings, circles)
    assert str(caught.value).startswith(message)
    assert "\n" not in str(caught.value)


@given(link_diagrams(max_letters=12))
def test_faces_components_and_pieces_are_partitions(diagram: LinkDiagram) -> None:
    """Each arc lies in one component and on two faces, in both directions; V - E + F = 2."""
    arcs = sorted(arc for component in diagram.components for arc in component)
    assert arcs == list(range(diagram.arc_count))
    sides = sorted(side for face in diagram.faces for side in face)
    assert sides == sorted((arc, step) for arc in arcs for step in (1, -1))
    assert len(diagram.faces) == len(diagram.crossings) + 2 * len(diagram.pieces)
    assert diagram.is_planar
    assert diagram.is_connected == (len(diagram.pieces) + diagram.circles == 1)
    circles = sorted(arc for circle in diagram.seifert_circles for arc in circle)
    assert circles == arcs


@given(link_diagrams(max_letters=8))
def test_mirror_image_and_reverse(diagram: LinkDiagram) -> None:
    """Both are their own inverses; a mirror image has t and 1/t exchanged, a reverse has not."""
    assert diagram.mirrored().mirrored() == diagram
    assert diagram.reversed().reversed() == diagram
    value = brute_force_jones(diagram)
    assert brute_force_jones(diagram.mirrored()) == mirror_image("jones", value)
    assert brute_force_jones(diagram.reversed()) == value


@given(link_diagrams(max_letters=12), st.data())
def test_reversing_components_turns_linking_numbers(
    diagram: LinkDiagram, data: st.DataObject
) -> None:
    """A linking number changes sign exactly when one of its two components is reversed."""
    chosen = data.draw(st.sets(st.integers(0, diagram.component_count - 1)))
    before = diagram_linking_matrix(diagram)
    after = diagram_linking_matrix(diagram.reversed_components(chosen))
    turned = {
        (one, other): number * (-1 if (one in chosen) != (other in chosen) else 1)
        for (one, other), number in before.items()
    }
    assert after == turned


@given(braids(max_strands=6, max_letters=25))
def test_linking_numbers_of_a_closed_braid(braid: Braid) -> None:
    """Counted at the crossings of the diagram they are those counted along the word."""
    diagram = closed_braid_diagram(braid)
    assert diagram_linking_numbers(diagram) == pair_linking_numbers(braid)
    assert diagram.component_count == braid.components
    assert diagram.writhe == braid.exponent_sum
    assert diagram.seifert_circle_count == braid.strands


def test_a_component_that_is_not_there() -> None:
    """A number beyond the last component is turned away, with the range of those that exist."""
    with pytest.raises(InputError, match="component 1: expected a number from 0 to 0"):
        TREFOIL.reversed_components([1])


@given(link_diagrams(max_letters=12))
def test_numbering_is_in_order(diagram: LinkDiagram) -> None:
    """Renumbered arcs ascend along each component; doing it twice changes nothing more."""
    ordered = diagram.renumbered()
    for component in ordered.components:
        assert list(component) == list(range(component[0], component[0] + len(component)))
    assert ordered.renumbered() == ordered
    assert brute_force_writhes(ordered) == brute_force_writhes(diagram)


def brute_force_writhes(diagram: LinkDiagram) -> list[int]:
    """What does not depend on the numbers of arcs: signs, and lengths of components and faces."""
    return [
        *(crossing.sign for crossing in diagram.crossings),
        *sorted(map(len, diagram.components)),
        *sorted(map(len, diagram.faces)),
    ]
