"""Invariants computed on diagrams, against brute force and against those of braids."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.diagrams import LinkDiagram, closed_braid_diagram
from braidsearch.errors import CapacityError
from braidsearch.invariants import alexander_polynomial, jones_polynomial
from braidsearch.invariants.diagram_alexander import (
    braid_alexander_value,
    diagram_alexander_value,
    is_equal_up_to_units,
    sparse_determinant,
)
from braidsearch.invariants.diagram_bracket import (
    bracket_value,
    diagram_jones_polynomial,
    jones_value,
)
from braidsearch.invariants.diagram_sweep import sweep_diagram
from braidsearch.invariants.residues import prime_modulus
from braidsearch.words import Braid
from tests.diagrams.brute_force import brute_force_jones
from tests.strategies import braids, link_diagrams

MODULUS = (2**31 - 1) * (2**61 - 1)
PRIME, ROOT = prime_modulus(96, 0)


@settings(max_examples=150)
@given(link_diagrams(max_strands=4, max_letters=9))
def test_state_sum_over_a_sweep_is_the_sum_over_all_states(diagram: LinkDiagram) -> None:
    """The exact polynomial agrees with 2^c states, one by one."""
    assert diagram_jones_polynomial(diagram) == brute_force_jones(diagram)


@given(braids(max_strands=6, max_letters=30))
def test_state_sum_agrees_with_the_cell_modules(braid: Braid) -> None:
    """On the diagram of a closed braid: the traces in the Temperley-Lieb algebra."""
    assert diagram_jones_polynomial(closed_braid_diagram(braid)) == jones_polynomial(braid)


@given(link_diagrams(max_letters=14), st.integers(2, MODULUS - 1))
def test_bracket_values_are_values_of_the_polynomial(diagram: LinkDiagram, point: int) -> None:
    """Modulo a product of primes, at any point."""
    polynomial = diagram_jones_polynomial(diagram)
    assert bracket_value(diagram, point, MODULUS) == jones_value(polynomial, point, MODULUS)


@given(link_diagrams(max_letters=14))
def test_sweeps_pass_every_crossing_and_close_every_arc(diagram: LinkDiagram) -> None:
    """The open arcs after each crossing are those with one crossing passed, counted anew."""
    sweep = sweep_diagram(diagram)
    assert sorted(sweep.order) == list(range(len(diagram.crossings)))
    for place in range(len(sweep.order)):
        passed = [diagram.crossings[crossing].arcs for crossing in sweep.order[: place + 1]]
        met = [arc for arcs in passed for arc in arcs]
        assert sweep.open_arcs[place] == sum(met.count(arc) == 1 for arc in set(met))


@given(braids(max_strands=5, max_letters=20))
def test_alexander_values_of_a_braid_and_of_its_diagram(braid: Braid) -> None:
    """Both are values of the polynomial at a root of unity, up to a sign and a power of it."""
    terms = alexander_polynomial(braid)
    value = sum(c * pow(ROOT, exponent, PRIME) for exponent, c in terms) % PRIME
    diagram = closed_braid_diagram(braid)
    on_diagram = diagram_alexander_value(diagram, ROOT, PRIME)
    assert is_equal_up_to_units(value, on_diagram, ROOT, PRIME)
    assert is_equal_up_to_units(value, braid_alexander_value(braid, ROOT, PRIME), ROOT, PRIME)


def test_alexander_values_tell_knots_apart() -> None:
    """Trefoil, figure-eight knot and unknot have three values that no unit joins."""
    words = ([1, 1, 1], [1, -2, 1, -2], [1])
    values = [braid_alexander_value(Braid(word), ROOT, PRIME) for word in words]
    for one, other in ((0, 1), (0, 2), (1, 2)):
        assert not is_equal_up_to_units(values[one], values[other], ROOT, PRIME)


@given(st.lists(st.lists(st.integers(-3, 3), min_size=4, max_size=4), min_size=4, max_size=4))
def test_sparse_determinants(matrix: list[list[int]]) -> None:
    """Elimination by short rows gives the determinant up to sign, as Leibniz's sum has it."""
    sympy = pytest.importorskip("sympy")
    expected = int(sympy.Matrix(matrix).det()) % PRIME
    rows = [{place: entry % PRIME for place, entry in enumerate(row) if entry} for row in matrix]
    assert sparse_determinant(rows, PRIME) in (expected, -expected % PRIME)


def test_a_diagram_too_wide_for_a_state_sum() -> None:
    """It is turned away at once, by the number of arcs open at a time."""
    braid = Braid([letter for _ in range(40) for letter in range(1, 40)])
    with pytest.raises(CapacityError, match="arcs open at a time: expected a narrower diagram"):
        diagram_jones_polynomial(closed_braid_diagram(braid))
    with pytest.raises(CapacityError, match="the bracket of a diagram with 1560 crossings"):
        bracket_value(closed_braid_diagram(braid), 3, MODULUS)
