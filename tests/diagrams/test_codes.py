"""Planar diagram, Gauss and Dowker-Thistlethwaite codes: readers and writers are pairs."""

import re

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.diagrams import (
    NOTATIONS,
    LinkDiagram,
    closed_braid_diagram,
    dowker_thistlethwaite_code,
    format_dowker_thistlethwaite_code,
    format_gauss_code,
    format_planar_diagram_code,
    gauss_code,
    parse_code,
    parse_dowker_thistlethwaite_code,
    parse_gauss_code,
    parse_planar_diagram_code,
    planar_diagram_code,
)
from braidsearch.invariants import mirror_image
from braidsearch.invariants.diagram_bracket import diagram_jones_polynomial
from braidsearch.invariants.diagram_linking import diagram_linking_numbers
from braidsearch.words import Braid
from tests.diagrams.published import dowker_thistlethwaite_text, published_diagram
from tests.knot_tables import TableRow, iter_knots, iter_links
from tests.strategies import link_diagrams

TREFOIL = [[1, 5, 2, 4], [3, 1, 4, 6], [5, 3, 6, 2]]
SAMPLE = [*list(iter_knots(13))[::150], *list(iter_links(11))[::75]]


@given(link_diagrams(max_letters=14), st.sampled_from([0, 1, 7]))
def test_planar_diagram_codes_come_back(diagram: LinkDiagram, first: int) -> None:
    """Whatever the first label, the reader gives the diagram with its arcs in order."""
    text = format_planar_diagram_code(diagram, first)
    assert parse_planar_diagram_code(text) == diagram.renumbered()


@given(link_diagrams(max_letters=14))
def test_gauss_codes_come_back(diagram: LinkDiagram) -> None:
    """With crossing signs the code is the diagram."""
    text = format_gauss_code(diagram)
    read = parse_gauss_code(text)
    assert format_gauss_code(read) == text
    assert sorted(c.sign for c in read.crossings) == sorted(c.sign for c in diagram.crossings)
    assert diagram_jones_polynomial(read) == diagram_jones_polynomial(diagram)
    assert diagram_linking_numbers(read) == diagram_linking_numbers(diagram)


@given(link_diagrams(max_letters=10))
def test_dowker_thistlethwaite_codes_come_back(diagram: LinkDiagram) -> None:
    """The code of the diagram that a code draws is that code, and shadow and components stay."""
    text = format_dowker_thistlethwaite_code(diagram)
    read = parse_dowker_thistlethwaite_code(text)
    assert format_dowker_thistlethwaite_code(read) == text
    assert read.component_count == diagram.component_count
    assert len(read.crossings) == len(diagram.crossings)


@pytest.mark.parametrize("row", SAMPLE, ids=lambda row: row.name)
def test_published_diagrams_in_all_codes(row: TableRow) -> None:
    """The planar diagram code has the table's Jones polynomial, and so has its Gauss code; the
    Dowker-Thistlethwaite code, and the Gauss code without signs, up to the mirror image.
    """
    diagram = published_diagram(row)
    assert diagram_jones_polynomial(diagram) == row.jones
    assert parse_planar_diagram_code(format_planar_diagram_code(diagram)) == diagram.renumbered()
    assert diagram_jones_polynomial(parse_gauss_code(format_gauss_code(diagram))) == row.jones
    either = (row.jones, mirror_image("jones", row.jones))
    unsigned = re.sub(r"O(\d+)[+-]", r"\1", format_gauss_code(diagram))
    unsigned = re.sub(r"U(\d+)[+-]", r"-\1", unsigned)
    assert diagram_jones_polynomial(parse_gauss_code(unsigned)) in either
    own = parse_dowker_thistlethwaite_code(format_dowker_thistlethwaite_code(diagram))
    assert diagram_jones_polynomial(own) in either


@pytest.mark.parametrize("row", SAMPLE, ids=lambda row: row.name)
def test_published_codes_of_the_other_kinds(row: TableRow) -> None:
    """The table's own Dowker-Thistlethwaite code, and its Gauss code, up to the mirror image.

    The code is written back as it stands.
    """
    either = (row.jones, mirror_image("jones", row.jones))
    text = dowker_thistlethwaite_text(row)
    diagram = parse_dowker_thistlethwaite_code(text)
    assert diagram_jones_polynomial(diagram) in either
    assert _numbers(format_dowker_thistlethwaite_code(diagram)) == _numbers(text)
    assert diagram_jones_polynomial(parse_gauss_code(row.columns["gauss_notation"])) in either


@pytest.mark.slow
def test_all_published_dowker_thistlethwaite_codes() -> None:
    """Each of the 17,153 codes draws the row's knot or link, or its mirror image, by Jones."""
    rows = [*iter_knots(13), *iter_links(11)]
    wrong = []
    for row in rows:
        value = diagram_jones_polynomial(
            parse_dowker_thistlethwaite_code(dowker_thistlethwaite_text(row))
        )
        if value not in (row.jones, mirror_image("jones", row.jones)):
            wrong.append(row.name)
    assert len(rows) == 17_153
    assert not wrong


def _numbers(text: str) -> list[int]:
    return [int(number) for number in re.findall(r"-?\d+", text)]


@pytest.mark.parametrize(
    "text",
    [
        "[[1,5,2,4],[3,1,4,6],[5,3,6,2]]",
        "{{1, 5, 2, 4}, {3, 1, 4, 6}, {5, 3, 6, 2}}",
        "1 5 2 4\n3 1 4 6\n5 3 6 2\n",
        "(1,5,2,4) (3,1,4,6) (5,3,6,2)",
        "1 5 2 4; 3 1 4 6; 5 3 6 2",
        "[[0,4,1,3],[2,0,3,5],[4,2,5,1]]",
    ],
)
def test_one_planar_diagram_code_written_in_many_ways(text: str) -> None:
    """Brackets of any kind, lines, labels from 0 or from 1: all the right-handed trefoil."""
    diagram = parse_planar_diagram_code(text)
    assert diagram == planar_diagram_code(TREFOIL)
    assert diagram_jones_polynomial(diagram) == [[2, 1], [6, 1], [8, -1]]


@pytest.mark.parametrize(
    "text",
    [
        "O1+ U2+ O3+ U1+ O2+ U3+",
        "O1+U2+O3+U1+O2+U3+",
        "[o1+, u2+, o3+, u1+, o2+, u3+]",
        "{O7+ U9+ O8+ U7+ O9+ U8+}",
        "1 -2 3 -1 2 -3",
        "[[1, −2, 3, −1, 2, −3]]",
    ],
)
def test_one_gauss_code_written_in_many_ways(text: str) -> None:
    """With signs, without, glued, and with other numbers: all the right-handed trefoil."""
    assert diagram_jones_polynomial(parse_gauss_code(text)) == [[2, 1], [6, 1], [8, -1]]


def test_codes_from_lists() -> None:
    """The same readers for lists: the Hopf link with linking number 1, and with -1."""
    over_and_under = [[1, -2], [2, -1]]
    assert diagram_linking_numbers(gauss_code(over_and_under, [1, 1])) == [1]
    assert diagram_linking_numbers(gauss_code(over_and_under, {1: -1, 2: -1})) == [-1]
    assert diagram_linking_numbers(dowker_thistlethwaite_code([[4], [2]])) == [1]
    assert diagram_linking_numbers(planar_diagram_code([[4, 1, 3, 2], [2, 3, 1, 4]])) == [-1]


def test_components_without_crossings() -> None:
    """A list of one label, or an empty list, is a circle by itself."""
    three = LinkDiagram((), 3)
    assert planar_diagram_code([[1], [2], [3]]) == three
    assert parse_gauss_code("[] [] []") == three
    assert parse_dowker_thistlethwaite_code("[[], [], []]") == three
    beside = closed_braid_diagram(Braid([1, 1, 1], 3))
    assert parse_planar_diagram_code(format_planar_diagram_code(beside)).circles == 1
    assert format_planar_diagram_code(three) == "[[1],[2],[3]]"
    assert format_gauss_code(beside).endswith("[]")


def test_a_component_over_all_others_runs_as_its_labels_ascend() -> None:
    """Two circles, one on top of the other: the lower one runs as its under-strands say, the
    upper one as its labels do, in either order of the crossings.
    """
    code = [[2, 3, 1, 4], [1, 3, 2, 4]]
    for entries in (code, code[::-1]):
        diagram = planar_diagram_code(entries)
        upper = diagram.component_of_arc[2]
        assert diagram_linking_numbers(diagram) == [0]
        (_, over) = diagram.crossings[0].passages
        assert over == (2, 3)
        assert diagram.components[upper] == (2, 3)
    longer = planar_diagram_code([[1, 6, 2, 5], [2, 6, 3, 7], [3, 8, 4, 7], [4, 8, 1, 5]])
    assert longer.components == ((0, 1, 2, 3), (4, 5, 6, 7))


def test_notes_say_what_a_code_forgets() -> None:
    """A Dowker-Thistlethwaite code, and a Gauss code without signs, forget the mirror image."""
    assert NOTATIONS == ("planar-diagram", "gauss", "dowker-thistlethwaite")
    (note,) = parse_code("dowker-thistlethwaite", "4 6 2")[1]
    assert note.startswith("a Dowker-Thistlethwaite code forgets the mirror image")
    (note,) = parse_code("gauss", "1 -2 3 -1 2 -3")[1]
    assert note.startswith("a Gauss code without crossing signs forgets the mirror image")
    assert parse_code("gauss", "O1+ U2+ O3+ U1+ O2+ U3+")[1] == ()
    assert parse_code("planar-diagram", str(TREFOIL))[1] == ()
