"""Certificates in words, and values of invariants as people write them."""

import pytest
from hypothesis import given
from hypothesis import strategies as st
from sympy import Rational, Symbol, sympify

from braidsearch.certificates import Certificate, Distinction, explain_certificate
from braidsearch.certificates.display import show_value
from braidsearch.moves import Conjugate, Destabilize, Rewrite, Stabilize
from braidsearch.words import Braid
from tests.certificates.arbitrary import certificates

exponents = st.integers(-30, 30)
coefficients = st.integers(-(2**70), 2**70).filter(bool)


def test_proof_of_sameness_in_words() -> None:
    """Every move stands on a numbered line with the word that results."""
    moves = [
        Stabilize(1, 3, (1, 1, 1, 2)),
        Rewrite((1, 1, 1, 2)),
        Conjugate((1,), (1, 1, 2, 1)),
        Destabilize(-1, 2, (1, -1)),
    ]
    certificate = Certificate.same(Braid([1, 1, 1]), Braid([-1, -1, -1]), "mirror", moves)
    assert explain_certificate(certificate).splitlines() == [
        'claim: the closure of LEFT = "1 1 1"',
        '  is the mirror image of the closure of RIGHT = "-1 -1 -1"',
        "proof: 4 moves, from LEFT",
        "  1. add strand 3 with the letter 2: 1 1 1 2",
        "  2. rewrite by braid relations: 1 1 1 2",
        "  3. conjugate by 1: 1 1 2 1",
        "  4. take away strand 3 with the letter -2: 1 -1",
        "  which is the mirror of RIGHT, letter by letter",
    ]


def test_proof_of_difference_in_words() -> None:
    """Both values are written as polynomials, one below the other."""
    distinction = Distinction(
        symmetry="mirror",
        invariant="jones",
        parameters={"strands": 2},
        left_moves=[Rewrite((1, 1, 1))],
        right_moves=[],
        left=[[2, 1], [6, 1], [8, -1]],
        right=[[-5, -2], [-1, 1]],
    )
    certificate = Certificate.different(Braid([1, 1, 1]), Braid([1, 1]), [distinction])
    assert explain_certificate(certificate).splitlines() == [
        'claim: the closure of LEFT = "1 1 1"',
        '  is not the mirror image of the closure of RIGHT = "1 1",',
        "  after 1 move on LEFT:",
        "    1. rewrite by braid relations: 1 1 1",
        "  by the Jones polynomial (strands = 2):",
        "    LEFT:            t + t^3 - t^4",
        "    mirror of RIGHT: -2 t^(-5/2) + t^(-1/2)",
    ]


def test_equal_words_need_no_move() -> None:
    """A chain without moves is said to be one."""
    braid = Braid([1] * 40)
    text = explain_certificate(Certificate.same(braid, braid, "identity", []))
    assert text.endswith("\nproof: LEFT is RIGHT, letter by letter")
    assert "(40 letters)" in text
    mirrored = explain_certificate(Certificate.same(braid, braid.mirror(), "mirror", []))
    assert mirrored.endswith("\nproof: LEFT is the mirror of RIGHT, letter by letter")


@given(certificates, st.integers(0, 6))
def test_bounded_explanations_say_what_they_leave_out(
    certificate: Certificate, most_moves: int
) -> None:
    """No chain shows more moves than allowed, and those shown and left out are all of them."""
    text = explain_certificate(certificate, most_moves=most_moves)
    chains = [certificate.moves]
    for distinction in certificate.distinctions:
        chains += [distinction.left_moves, distinction.right_moves]
    shown = [line for line in text.splitlines() if line.lstrip()[:1].isdigit() and ". " in line]
    hidden = sum(
        int(line.split("...")[1].split()[0]) for line in text.splitlines() if " more moves" in line
    )
    assert len(shown) + hidden == sum(map(len, chains))
    assert len(shown) <= most_moves * len(chains)


@given(st.dictionaries(st.tuples(exponents), coefficients, max_size=6))
def test_jones_display_is_the_polynomial(terms: dict[tuple[int], int]) -> None:
    """sympy reads what is shown as the sum of the terms, exponents counted in halves of t."""
    value = sorted([exponent, coefficient] for (exponent,), coefficient in terms.items())
    t = Symbol("t", positive=True)
    expected = sum(c * t ** Rational(exponent, 2) for exponent, c in value)
    assert read_polynomial(show_value("jones", value)) == expected


@given(st.dictionaries(st.tuples(exponents, exponents), coefficients, max_size=6))
def test_homfly_display_is_the_polynomial(terms: dict[tuple[int, int], int]) -> None:
    """sympy reads what is shown as the sum of the terms in v and z."""
    value = sorted([*both, coefficient] for both, coefficient in terms.items())
    v, z = Symbol("v", positive=True), Symbol("z", positive=True)
    expected = sum(c * v**first * z**second for first, second, c in value)
    assert read_polynomial(show_value("homfly", value)) == expected


@pytest.mark.parametrize(
    ("invariant", "value", "shown"),
    [
        ("alexander", [[0, 1], [1, -1], [2, 1]], "1 - t + t^2"),
        ("alexander", [], "0"),
        ("homfly", [[2, 0, 2], [2, 2, 1], [4, 0, -1]], "2 v^2 + v^2 z^2 - v^4"),
        ("jones", [[-1, -1], [-5, -1]], "-t^(-1/2) - t^(-5/2)"),
        ("components", 2, "2"),
        ("linking-numbers", (), "none"),
        ("linking-numbers", (-1, 0, 2), "-1, 0, 2"),
        ("three-braid", [[2, -1, 0]], "exponent sum 2, cyclic word b^-1 a"),
        (
            "three-braid",
            [[0], [1, 0]],
            "exponent sum 0, cyclic word 1; exponent sum 1, cyclic word a",
        ),
        ("alexander-module", [[1, 0, 1], []], "1 + t^2; 0"),
        ("alexander-module", [], "trivial"),
        ("levine-tristram", [-2, 0], "-2, 0"),
    ],
)
def test_values_as_people_write_them(invariant: str, value: object, shown: str) -> None:
    """A sample of each kind of value."""
    assert show_value(invariant, value) == shown


def test_colourings_as_people_write_them() -> None:
    """Longitudes stand in cycles, one for each component; classes are named where there are two."""
    given = {"meridians": [[2, 1, 3]]}
    knot = [[1, 1, 2, 3, 3], [1, 2, 1, 3, 6]]
    assert (
        show_value("colouring", knot, given) == "9 colourings; by longitude 3 with 1, 6 with (1 2)"
    )
    link = [[1, 1, 2, 3, 2, 2, 3, 1, 3]]
    shown = show_value("colouring", link, given)
    assert shown == "3 colourings; by longitude 3 with 1: 1 and 2: (1 2 3)"
    assert show_value("colouring", [], given) == "0 colourings"


def test_values_of_sublinks_stand_beside_each_other() -> None:
    """Each as the invariant of the sublinks is written."""
    given = {"components": 1, "invariant": "alexander"}
    assert show_value("sublinks", [[[0, 1]], [[0, 2], [1, -1]]], given) == "1; 2 - t"


def read_polynomial(text: str) -> object:
    """The text as sympy reads it; a blank between factors is a product."""
    names = {name: Symbol(name, positive=True) for name in "tvz"}
    parts = text.replace(" + ", "\0+").replace(" - ", "\0-").split("\0")
    assert all(not part.endswith("...") for part in parts)
    return sympify("".join(part.replace(" ", "*") for part in parts).replace("^", "**"), names)
