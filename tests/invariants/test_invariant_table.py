"""The table of invariants: names, applicability, order of cost; display and reading back."""

import json
import subprocess
import sys

import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.errors import InputError
from braidsearch.invariants import (
    INVARIANTS,
    compute_invariants,
    format_polynomial,
    invariant_named,
    ladder,
    mirror_image,
    sympy_expression,
)
from braidsearch.invariants.table import NEGLIGIBLE_SECONDS
from braidsearch.words import Braid
from tests.polynomial_text import parse_polynomial
from tests.strategies import braids

CERTIFYING = [
    "components",
    "linking-numbers",
    "linking-sums",
    "signature",
    "alexander",
    "jones",
    "homfly",
]


def test_names():
    """The names are those of certificates; the determinant alone certifies nothing."""
    names = [invariant.name for invariant in INVARIANTS]
    assert sorted(names) == sorted([*CERTIFYING, "determinant"])
    assert [i.name for i in INVARIANTS if not i.certifies] == ["determinant"]
    for name in names:
        assert invariant_named(name).name == name
    with pytest.raises(InputError, match="'conway': expected one of components"):
        invariant_named("conway")


def is_plain(value):
    if type(value) is list:
        return all(map(is_plain, value))
    return type(value) is int


@given(braids(max_strands=6, max_letters=20))
def test_values_are_plain(braid):
    """Values are Python integers and lists of them, so they pass through JSON unchanged."""
    values = compute_invariants(braid)
    assert set(values) == {invariant.name for invariant in INVARIANTS}
    assert all(map(is_plain, values.values()))
    assert json.loads(json.dumps(values)) == values


@given(braids(max_strands=6, max_letters=20))
def test_polynomials_are_sorted_without_zeros(braid):
    """The form of a certificate: terms sorted by exponents, each once, no zero coefficient."""
    values = compute_invariants(braid)
    for name in ("alexander", "jones", "homfly"):
        exponents = [term[:-1] for term in values[name]]
        assert exponents == sorted(exponents)
        assert len(set(map(tuple, exponents))) == len(exponents)
        assert all(term[-1] for term in values[name])
    assert values["linking-numbers"] == sorted(values["linking-numbers"])


@settings(max_examples=50)
@given(braids(max_strands=10, max_letters=40), braids(max_strands=10, max_letters=40))
def test_the_ladder_goes_up(left, right):
    """Cheapest first, certifying and applicable to both only, and each of these once.

    Costs too small to notice count as equal, and then the order is that of the table.
    """
    steps = ladder(left, right)
    costs = [step.estimated_cost(left) + step.estimated_cost(right) for step in steps]
    noticed = [max(cost, NEGLIGIBLE_SECONDS) for cost in costs]
    assert noticed == sorted(noticed)
    cheap = [step for step, cost in zip(steps, costs, strict=True) if cost <= NEGLIGIBLE_SECONDS]
    assert cheap == [invariant for invariant in INVARIANTS if invariant in cheap]
    expected = {
        invariant.name
        for invariant in INVARIANTS
        if invariant.certifies and all(map(invariant.is_applicable, (left, right)))
    }
    assert {step.name for step in steps} == expected
    assert len(steps) == len(expected)


def test_the_ladder_on_two_trefoils():
    """The trefoils are told apart by the Jones polynomial, before the signature is asked."""
    left, right = Braid([1, 1, 1]), Braid([-1, -1, -1])
    steps = ladder(left, right)
    first = next(step for step in steps if step.compute(left) != step.compute(right))
    assert first.name == "jones"


def test_the_ladder_on_many_strands():
    """On 20 strands, all joined twice, only the cheap invariants and Alexander are left."""
    braid = Braid([*range(1, 20), *range(1, 20)], 20)
    names = [step.name for step in ladder(braid, Braid([1, 1, 1]))]
    cheap = ["components", "linking-numbers", "linking-sums"]
    assert sorted(names) == ["alexander", *cheap, "signature"]
    assert names[:2] == ["components", "linking-numbers"]


def test_nothing_heavy_is_imported():
    """Computing every invariant loads neither sympy nor networkx."""
    program = (
        "import sys; from braidsearch.invariants import compute_invariants; "
        "from braidsearch.words import Braid; compute_invariants(Braid([1, -2, 1, -2])); "
        "sys.exit(any(name in sys.modules for name in ('sympy', 'networkx', 'scipy', 'numba')))"
    )
    assert subprocess.run([sys.executable, "-c", program], check=False).returncode == 0


@pytest.mark.parametrize(
    ("name", "value", "text"),
    [
        ("jones", [[2, 1], [6, 1], [8, -1]], "t + t^3 - t^4"),
        ("jones", [[1, -1], [5, -1]], "-t^(1/2) - t^(5/2)"),
        ("jones", [[-4, 1], [0, -3], [3, 12]], "t^(-2) - 3 + 12 t^(3/2)"),
        ("alexander", [[0, 1], [1, -3], [2, 1]], "1 - 3 t + t^2"),
        ("alexander", [], "0"),
        ("homfly", [[2, 0, 2], [2, 2, 1], [4, 0, -1]], "2 v^2 - v^4 + v^2 z^2"),
        ("homfly", [[-1, -1, 1], [1, -1, -1]], "v^(-1) z^(-1) - v z^(-1)"),
        ("signature", -2, "-2"),
        ("linking-numbers", [-1, 0, 2], "-1, 0, 2"),
        ("linking-numbers", [], "none"),
    ],
)
def test_display(name, value, text):
    """Values as a reader writes them."""
    assert format_polynomial(name, value) == text


@given(braids(max_strands=5, max_letters=20))
def test_display_can_be_read_back(braid):
    """The displayed text, read again, is the polynomial."""
    values = compute_invariants(braid)
    for name, variables in (("alexander", ("t",)), ("homfly", ("v", "z"))):
        text = format_polynomial(name, values[name]).replace(" ^", "^")
        starred = text.replace(" + ", "+").replace(" - ", "-").replace(" ", "*")
        assert parse_polynomial(starred, variables) == values[name]


@settings(max_examples=30)
@given(braids(max_strands=4, max_letters=12), st.sampled_from(["alexander", "jones", "homfly"]))
def test_sympy_expressions(braid, name):
    """The sympy expression has the terms of the value."""
    value = invariant_named(name).compute(braid)
    expression = sympy_expression(name, value)
    symbols = sympy.symbols("v z") if name == "homfly" else (sympy.Symbol("t"),)
    scale = 2 if name == "jones" else 1
    terms = []
    for term in sympy.Add.make_args(expression):
        powers = term.as_powers_dict()
        coefficient, _ = term.as_coeff_Mul()
        if coefficient:
            terms.append([*(int(scale * powers.get(s, 0)) for s in symbols), int(coefficient)])
    assert sorted(terms) == value


def test_mirror_images_of_named_invariants_only():
    """A name outside the table is refused by name, as is a number where a polynomial belongs."""
    with pytest.raises(InputError, match="'arf'"):
        mirror_image("arf", 1)
    with pytest.raises(InputError, match="'signature': expected one of alexander, jones, homfly"):
        sympy_expression("signature", -2)
