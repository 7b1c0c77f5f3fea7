"""Explanations as text: what is said of each step, what is marked, and how lines are wrapped."""

import re

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.certificates import Certificate, Distinction
from braidsearch.explaining import explain_proof, explanation_to_json, format_text
from braidsearch.explaining.polynomial_text import polynomial_lines
from braidsearch.explaining.theorems import INVARIANCE
from braidsearch.explaining.values import Polynomials, compare_values
from braidsearch.moves import Conjugate, Destabilize, Rewrite, Stabilize
from braidsearch.words import Braid
from tests.certificates.arbitrary import certificates
from tests.explaining.reading import ACCEPTED, accepted, chains, without_moves


def test_a_proof_of_sameness_step_by_step() -> None:
    """Each step has its number, its kind, both words with brackets, a reason and a source."""
    moves = [
        Stabilize(1, 3, (1, 1, 1, 2)),
        Rewrite((1, 1, 1, 2, 1, -1)),
        Conjugate((1, -1), (1, -1, 1, 1, 1, 2)),
        Destabilize(1, 2, (1, -1, 1, 1, 1)),
    ]
    certificate = Certificate.same(Braid([1, 1, 1]), Braid([-1, -1, -1]), "mirror", moves)
    lines = format_text(explain_proof(certificate)).splitlines()
    assert lines[:26] == [
        "claim: the closure of LEFT is the mirror image of the closure of RIGHT",
        "  LEFT  = 1 1 1 (2 strands, 3 letters)",
        "  RIGHT = -1 -1 -1 (2 strands, 3 letters)",
        "",
        "proof: 4 steps lead from LEFT to mirror of RIGHT",
        "  1. stabilization: the letter 2 behind the word on 2 strands adds one strand",
        "       before: 1 1 1 []",
        "       after:  1 1 1 [2]",
        "       allowed: it alone passes the new strand: a kink of the closure, which can be"
        " untwisted",
        "         [Markov 1936; Birman 1974]",
        "  2. rewriting: the marked letters are written anew, by relations of the group on 3"
        " strands",
        "       before: 1 1 1 2 []",
        "       after:  1 1 1 2 [1 -1]",
        "       allowed: both words are the same braid [Artin 1925; Artin 1947]",
        "  3. conjugation: the last 2 letters around the closure to the front",
        "       before: 1 1 1 2 [1 -1]",
        "       after:  [1 -1] 1 1 1 2",
        "       allowed: a closed braid has no first letter [Markov 1936; Birman 1974]",
        "  4. destabilization: the last letter 2 of the word on 3 strands goes with its strand",
        "       before: 1 -1 1 1 1 [2]",
        "       after:  1 -1 1 1 1 []",
        "       allowed: it alone passes the last strand: a kink of the closure, which can be"
        " untwisted",
        "         [Markov 1936; Birman 1974]",
        "which is mirror of RIGHT, letter by letter",
        "",
        "theorems relied on:",
    ]


def test_elementary_steps_say_where_they_act() -> None:
    """Positions are counted from 1, and the relation stands with its letters."""
    certificate = Certificate.same(
        Braid([1, 2, -1, 3]),
        Braid([-2, 1, 2, 3]),
        "identity",
        [Rewrite((-2, 1, 2, 3))],
    )
    text = format_text(explain_proof(certificate, is_elementary=True))
    assert "  1. mixed braid relation: letters 1 to 3: 1 2 -1 becomes -2 1 2\n" in text
    assert "before: [1 2 -1] 3\n" in text
    assert "after:  [-2 1 2] 3\n" in text
    assert "it is 1 2 1 = 2 1 2 with letters taken to the other side [Artin 1925" in text


def test_polynomials_stand_one_under_the_other() -> None:
    """Terms of one exponent share a column, and those that differ have a mark below."""
    left, right = [[0, 1], [1, 1], [3, -2]], [[0, 1], [1, 1], [4, 3]]
    polynomials = compare_values("jones", left, right, {})
    assert isinstance(polynomials, Polynomials)
    assert list(polynomial_lines(polynomials, ("LEFT", "RIGHT"), "  ", 80)) == [
        "  LEFT:    1 + t^(1/2) - 2 t^(3/2)       .",
        "  RIGHT:   1 + t^(1/2)           . + 3 t^2",
        "                       ^^^^^^^^^^^ ^^^^^^^",
    ]


@given(
    st.dictionaries(st.integers(-30, 30), st.tuples(st.integers(-99, 99), st.integers(-99, 99))),
    st.integers(40, 120),
)
def test_marks_stand_under_all_terms_that_differ(
    terms: dict[int, tuple[int, int]], width: int
) -> None:
    """In each block of three lines the marks cover exactly the columns of differing terms."""
    left, right = (
        [[power, both[side]] for power, both in sorted(terms.items()) if both[side]]
        for side in (0, 1)
    )
    polynomials = compare_values("alexander", left, right, {})
    assert isinstance(polynomials, Polynomials)
    lines = list(polynomial_lines(polynomials, ("LEFT", "RIGHT"), "", width))
    assert len(lines) % 3 == 0
    assert all(len(line) <= width for line in lines)
    marked = 0
    for top, below, marks in zip(lines[::3], lines[1::3], lines[2::3], strict=True):
        for run in re.finditer(r"\^+", marks):
            one, other = top[run.start() : run.end()], below[run.start() : run.end()]
            assert one.strip(" +") != other.strip(" +")
            marked += 1
    kept = [both for both in terms.values() if both != (0, 0)]
    assert marked == sum(one != other for one, other in kept)


def test_tables_name_what_differs() -> None:
    """Values that are counts stand in rows; an arrow stands behind rows that differ."""
    text = format_text(explain_proof(accepted("different-colouring-chirality.json")))
    rows = [line for line in text.splitlines() if line.endswith("<- differs")]
    assert [row.split()[-4:-2] for row in rows] == [["0", "60"], ["60", "0"]]
    assert "image of the longitude  LEFT  mirror of RIGHT" in text
    assert "Riley 1971: R. Riley, Homomorphisms of knot groups on finite groups, 1971." in text


@pytest.mark.parametrize("name", ACCEPTED)
@pytest.mark.parametrize("is_elementary", [False, True])
def test_every_accepted_certificate_is_explained(name: str, is_elementary: bool) -> None:
    """At every width all letters stand in the text unbroken, in lines no longer than asked."""
    certificate = accepted(name)
    explanation = explain_proof(certificate, is_elementary)
    for width in (40, 63, 100):
        text = format_text(explanation, width)
        assert all(len(line) <= width for line in text.splitlines())
        tokens = text.replace("[", " ").replace("]", " ").split()
        for braid in (certificate.left, certificate.right):
            assert " ".join(map(str, braid.word)) in " ".join(tokens)
    whole = " ".join(format_text(explanation, 100_000).replace("[", "").replace("]", "").split())
    for _, moves in chains(explanation.certificate):
        for move in moves:
            assert " ".join(map(str, move.word)) in whole
    for distinction in explanation.distinctions:
        assert "differs" in text or "^" in text
        assert distinction.theorems


@given(certificates.map(without_moves), st.integers(30, 120))
def test_whatever_can_be_read_can_be_explained(certificate: Certificate, width: int) -> None:
    """No value of the right shape is too strange for words, nor for JSON, though it be false."""
    explanation = explain_proof(certificate)
    assert format_text(explanation, width).startswith("claim: the closure of LEFT is")
    assert explanation_to_json(explanation)["verdict"] == certificate.verdict


def test_every_invariant_has_its_theorem() -> None:
    """What a certificate may rest on is backed by a publication, but for the plain count."""
    from braidsearch.certificates.grammar import VALUES  # noqa: PLC0415 - the list to compare with

    assert set(INVARIANCE) == set(VALUES)
    assert {name for name, theorem in INVARIANCE.items() if not theorem.publications} == {
        "components"
    }


def test_marks_in_json_are_pairs_from_one() -> None:
    """First and last letter, counted from 1; the place of nothing ends before it begins."""
    explanation = explain_proof(accepted("same-by-cancelling.json"), is_elementary=True)
    (step,) = explanation_to_json(explanation)["steps"]
    assert (step["kind"], step["before"]["marks"], step["after"]["marks"]) == (
        "cancellation",
        [[2, 3]],
        [[2, 1]],
    )


def test_a_distinction_of_each_kind_of_value() -> None:
    """Numbers, lists and pairs are set out with both sides, equal entries without an arrow."""
    for invariant, parameters, left, right, shown in (
        ("signature", {}, -2, 2, ["value    -2      2  <- differs"]),
        ("components", {}, 1, 2, ["value     1      2  <- differs"]),
        ("linking-numbers", {}, (0, 1, 1), (1, 1, 1), ["0                  1      0  <- differs"]),
        ("linking-sums", {}, (2,), (), ["2         1      0  <- differs"]),
        (
            "levine-tristram",
            {"order": 3, "power": 1},
            (-2, 0),
            (0, 0),
            ["signature    -2      0  <- differs", "nullity       0      0"],
        ),
        ("alexander-module", {"prime": 3}, ((1, 1), ()), ((),), ["number 2 from the largest"]),
    ):
        item = Distinction("identity", invariant, parameters, [], [], left, right)
        certificate = Certificate.different(Braid([1]), Braid([-1]), [item])
        text = format_text(explain_proof(certificate))
        for line in shown:
            assert f"\n    {line}" in text, text
