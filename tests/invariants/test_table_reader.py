"""The reader of published polynomials and rows, on which the table tests rest."""

import pytest

from tests.knot_tables import alexander_from_conway, iter_knots, iter_links
from tests.polynomial_text import parse_polynomial


@pytest.mark.parametrize(
    ("text", "variables", "terms"),
    [
        ("t^(-2)-t^(-1)+ 1", ("t",), [[-2, 1], [-1, -1], [0, 1]]),
        ("47 + t^(-8) - 4/t^7", ("t",), [[-8, 1], [-7, -4], [0, 47]]),
        ("(2*v^2-v^4)+ v^2*z^2", ("v", "z"), [[2, 0, 2], [2, 2, 1], [4, 0, -1]]),
        ("v/z-v^3/z", ("v", "z"), [[1, -1, 1], [3, -1, -1]]),
        ("1/(v^3*z)-(2*v^2)/z^2", ("v", "z"), [[-3, -1, 1], [2, -2, -2]]),
        ("-x - x", ("x",), [[1, -2]]),
        ("x - x", ("x",), []),
        ("-(1-x)*(1+x)", ("x",), [[0, -1], [2, 1]]),
    ],
)
def test_syntaxes(text, variables, terms):
    """Every syntax that the tables use, and cancellation."""
    assert parse_polynomial(text, variables) == terms


@pytest.mark.parametrize("text", ["", "1 +", "x y", "q", "1/(1+x)", "(x", "x^", "x)", "x^(2", "2x"])
def test_what_cannot_be_read_is_refused(text):
    """No part of a text is passed over."""
    with pytest.raises((ValueError, IndexError)):
        parse_polynomial(text, ("x",))


def test_conway_to_alexander():
    """1 + z^2 is 1 - t + t^2, z is 1 - t, 0 is 0."""
    assert alexander_from_conway([[0, 1], [2, 1]]) == [[0, 1], [1, -1], [2, 1]]
    assert alexander_from_conway([[1, 1]]) == [[0, 1], [1, -1]]
    assert alexander_from_conway([]) == []


def test_knot_conway_polynomials_give_the_alexander_column():
    """Two columns of the table agree, so both are read right."""
    for row in iter_knots(8):
        assert alexander_from_conway(row.conway) == row.alexander, row.name


def test_rows():
    """35 knots to 8 crossings; every row has words on at least two strands and as many signs."""
    knots, links = list(iter_knots(8)), list(iter_links(6))
    assert len(knots) == 35
    assert knots[0].name == "3_1"
    assert len({row.name for row in links}) == len(links) > 10
    for row in [*knots, *links]:
        assert row.braids
        assert all(braid.strands >= 2 and braid.word for braid in row.braids)
        assert (row.braid.components == 1) == row.is_knot
