"""Certificates as values: frozen, hashable, with an evaluable repr, of one of two shapes."""

from dataclasses import FrozenInstanceError

import numpy as np
import pytest
from hypothesis import given

from braidsearch.certificates import Certificate, Distinction
from braidsearch.errors import InputError
from braidsearch.moves import (  # noqa: F401 - the names that a repr speaks of
    Conjugate,
    Destabilize,
    Rewrite,
    Stabilize,
)
from braidsearch.words import Braid
from tests.certificates.arbitrary import certificates

TREFOIL, MIRROR = Braid([1, 1, 1]), Braid([-1, -1, -1])
JONES = ([[2, 1], [6, 1], [8, -1]], [[-8, -1], [-6, 1], [-2, 1]])


def distinction(**changes: object) -> Distinction:
    """Right-handed against left-handed trefoil by the Jones polynomial."""
    fields = {
        "symmetry": "identity",
        "invariant": "jones",
        "parameters": {},
        "left_moves": [],
        "right_moves": [],
        "left": JONES[0],
        "right": JONES[1],
    }
    return Distinction(**{**fields, **changes})  # type: ignore[arg-type]


@given(certificates)
def test_repr_evaluates_to_an_equal_value(certificate: Certificate) -> None:
    """eval(repr(c)) == c, with an equal hash."""
    again = eval(repr(certificate))
    assert again == certificate
    assert hash(again) == hash(certificate)


def test_certificates_are_frozen() -> None:
    """No field of a certificate can be set."""
    certificate = Certificate.different(TREFOIL, MIRROR, [distinction()])
    with pytest.raises(FrozenInstanceError):
        certificate.verdict = "same"  # type: ignore[misc]
    with pytest.raises(FrozenInstanceError):
        certificate.distinctions[0].left = 0  # type: ignore[misc]


def test_lists_and_numpy_integers_become_tuples_of_integers() -> None:
    """What an invariant returns, lists or arrays' entries, is kept as plain hashable values."""
    made = distinction(left=[np.int64(3), [np.int64(-1)]], parameters={"b": [2], "a": 1})
    assert made.left == (3, (-1,))
    assert type(made.left[0]) is int  # type: ignore[index]
    assert made.parameters == (("a", 1), ("b", (2,)))


@pytest.mark.parametrize("value", [1.5, None, True, {1: 2}, [0.0], b"x"])
def test_values_that_no_certificate_holds_are_refused(value: object) -> None:
    """Invariants are exact: a fraction, a truth value or nothing is no value of one."""
    with pytest.raises(InputError, match="expected integers, names and lists of them"):
        distinction(left=value)


def test_shapes_that_claim_nothing_are_refused() -> None:
    """Neither a verdict of another name, nor a difference without a distinction."""
    with pytest.raises(InputError, match="'undecided': expected same or different"):
        Certificate(TREFOIL, MIRROR, "undecided", None)
    with pytest.raises(InputError, match="expected distinctions alone"):
        Certificate.different(TREFOIL, MIRROR, [])
    with pytest.raises(InputError, match="expected distinctions alone"):
        Certificate(TREFOIL, MIRROR, "different", "mirror", distinctions=(distinction(),))
    with pytest.raises(InputError, match="each symmetry at most once"):
        Certificate.different(TREFOIL, MIRROR, [distinction(), distinction()])
    with pytest.raises(InputError, match="expected none"):
        Certificate(TREFOIL, TREFOIL, "same", "identity", distinctions=(distinction(),))
    with pytest.raises(InputError, match="symmetry 'turn'"):
        Certificate.same(TREFOIL, TREFOIL, "turn", [])
    with pytest.raises(InputError, match="symmetry None"):
        Certificate(TREFOIL, TREFOIL, "same", None)
    with pytest.raises(InputError, match="symmetry 'turn'"):
        distinction(symmetry="turn")


def test_notebook_shows_the_explanation_with_its_signs_escaped() -> None:
    """The HTML form holds the claim and both values, and no markup that came from the data."""
    certificate = Certificate.different(
        TREFOIL, MIRROR, [distinction(invariant="<script>", left=1, right=2)]
    )
    shown = certificate._repr_html_()
    assert "Different links" in shown
    assert "by the &lt;script&gt;" in shown
    assert shown.count("<svg") == 2
    assert "<script>" not in shown
