"""Weaving: the braid, what was checked, and what is said besides."""

import random

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.diagrams import (
    LinkDiagram,
    braid_from_diagram,
    closed_braid_diagram,
    parse_code,
    parse_planar_diagram_code,
    simplify_diagram,
)
from braidsearch.invariants import (
    homfly_polynomial,
    jones_polynomial,
    pair_linking_numbers,
)
from braidsearch.weaving import WeavingError, Woven, check_same_invariants, weave
from braidsearch.words import Braid
from tests.diagrams.brute_force import brute_force_jones
from tests.diagrams.published import published_diagram
from tests.knot_tables import TableRow, iter_knots, iter_links
from tests.strategies import braids, link_diagrams

SAMPLE = [*list(iter_knots(13))[::60], *list(iter_links(11))[::20]]


@pytest.mark.parametrize("row", SAMPLE, ids=lambda row: row.name)
def test_published_diagrams(row: TableRow) -> None:
    """The woven braid has the table's Jones polynomial (KnotInfo, LinkInfo), signs and all."""
    woven = weave(published_diagram(row))
    assert jones_polynomial(woven.braid) == row.jones
    assert woven.checks[-1] == "Jones polynomial: equal, by a state sum over the diagram"


@pytest.mark.slow
def test_every_published_diagram() -> None:
    """All 12,965 knots to 13 crossings and all 4,188 oriented links to 11."""
    rows = [*iter_knots(13), *iter_links(11)]
    wrong = [
        row.name
        for row in rows
        if jones_polynomial(weave(published_diagram(row)).braid) != row.jones
    ]
    assert len(rows) == 17_153
    assert not wrong


@given(link_diagrams(max_strands=4, max_letters=9))
def test_the_woven_braid_is_the_link(diagram: LinkDiagram) -> None:
    """Jones polynomial by brute force; at most as many strands as there are Seifert circles,
    in the diagram as it is drawn and in the simplified one.
    """
    woven = weave(diagram)
    assert brute_force_jones(diagram) == jones_polynomial(woven.braid)
    assert woven.braid.strands <= diagram.seifert_circle_count
    assert woven.braid.strands <= simplify_diagram(diagram).seifert_circle_count
    assert woven.braid.components == diagram.component_count
    assert len(woven.checks) == (3 if diagram.component_count > 1 else 2)


@settings(max_examples=60)
@given(braids(max_strands=5, max_letters=20))
def test_a_braid_drawn_and_woven_again(braid: Braid) -> None:
    """HOMFLY-PT and Jones polynomials, linking numbers and components are those of before."""
    woven = weave(closed_braid_diagram(braid)).braid
    assert homfly_polynomial(woven) == homfly_polynomial(braid)
    assert jones_polynomial(woven) == jones_polynomial(braid)
    assert pair_linking_numbers(woven) == pair_linking_numbers(braid)
    assert woven.components == braid.components


@given(link_diagrams(max_letters=10), st.data())
def test_a_wrong_braid_does_not_pass(diagram: LinkDiagram, data: st.DataObject) -> None:
    """One letter of a woven word turned: turned away exactly where an invariant differs."""
    woven = weave(diagram).braid
    if not woven.word:
        return
    place = data.draw(st.integers(0, len(woven) - 1))
    word = [-letter if k == place else letter for k, letter in enumerate(woven.word)]
    other = Braid(word, woven.strands)
    differs = brute_force_jones(diagram) != jones_polynomial(other) or (
        pair_linking_numbers(other) != pair_linking_numbers(woven)
    )
    if differs:
        with pytest.raises(WeavingError, match=r"another (linking numbers|Jones polynomial) than"):
            check_same_invariants(diagram, diagram, other)
    else:
        assert check_same_invariants(diagram, diagram, other)


def test_the_trefoil_with_all_that_is_said() -> None:
    """Three positive letters on two strands, two checks, no note."""
    trefoil = parse_planar_diagram_code("[[1,5,2,4],[3,1,4,6],[5,3,6,2]]")
    assert weave(trefoil) == Woven(
        Braid([1, 1, 1]),
        (
            "number of components: 1, in the diagram and in the braid",
            "Jones polynomial: equal, by a state sum over the diagram",
        ),
    )


def test_notes_of_the_notation_and_of_the_weaving() -> None:
    """What the code forgets comes first, then what was simplified and what falls apart."""
    diagram, notes = parse_code("dowker-thistlethwaite", "[4 6 2] [8] []")
    woven = weave(diagram, notes)
    assert woven.notes[0].startswith("a Dowker-Thistlethwaite code forgets the mirror image")
    assert woven.notes[1:] == (
        "the diagram was simplified from 4 crossings to 3",
        "the diagram falls into 3 parts, which lie beside each other as a split union",
    )
    assert woven.braid == Braid([1, 1, 1], 4)
    assert woven.checks[1] == (
        "linking numbers of 3 pairs of components: equal, counted at the crossings of the diagram"
    )


def wide_torus_link(strands: int) -> LinkDiagram:
    """T(n, n) on so many strands, one component reversed."""
    full_twist = [index for _ in range(strands) for index in range(1, strands)]
    return closed_braid_diagram(Braid(full_twist)).reversed_components([0])


@pytest.mark.parametrize(
    ("strands", "check"),
    [
        (4, "Jones polynomial: equal, by a state sum over the diagram"),
        (9, "Jones polynomial: equal at a point modulo each of 3 primes"),
        (24, "Alexander polynomial: equal up to units at a root of unity of order 96, modulo"),
    ],
)
def test_larger_diagrams_are_checked_by_what_they_allow(strands: int, check: str) -> None:
    """The exact polynomial; values modulo primes; where too many arcs are open, Alexander's."""
    diagram = wide_torus_link(strands)
    woven = weave(diagram)
    assert woven.checks[-1].startswith(check)
    assert woven.checks[1].startswith("linking number")
    assert woven.braid.components == strands


@pytest.mark.parametrize(
    ("strands", "wanted"), [(9, "Jones polynomial"), (24, "Alexander polynomial")]
)
def test_values_modulo_primes_tell_links_apart(strands: int, wanted: str) -> None:
    """Crossings of one component with itself changed: the linking numbers stay, the value not."""
    diagram = wide_torus_link(strands)
    braid = weave(diagram).braid
    knotted = Braid([*braid.word, *[braid.strands] * 3], braid.strands + 1)
    with pytest.raises(WeavingError, match=f"another value of the {wanted}"):
        check_same_invariants(diagram, diagram, knotted)


def test_a_wide_braid_is_checked_on_its_simplified_diagram() -> None:
    """Woven without simplifying, the closed braid is too wide to sum over, but not after it.

    With a trefoil tied into its last strand it is told apart by the same sums.
    """
    generator = random.Random(1)
    letters = [generator.choice((1, -1)) * generator.randint(1, 8) for _ in range(70)]
    braid = Braid(letters, 9)
    diagram = closed_braid_diagram(braid).reversed_components([0])
    wide = braid_from_diagram(diagram)
    checks = check_same_invariants(diagram, simplify_diagram(diagram), wide)
    assert checks[-1].endswith("and over the closed braid's diagram, simplified")
    knotted = Braid([*wide.word, *[wide.strands] * 3], wide.strands + 1)
    with pytest.raises(WeavingError, match="another value of the Jones polynomial"):
        check_same_invariants(diagram, simplify_diagram(diagram), knotted)
