"""The four symmetries act on words as Klein's four-group."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.errors import InputError
from braidsearch.words import SYMMETRIES, Braid, apply_symmetry
from tests.strategies import braids

PRODUCT = {
    ("mirror", "reverse"): "mirror-reverse",
    ("mirror", "mirror-reverse"): "reverse",
    ("reverse", "mirror-reverse"): "mirror",
}


def product_of(first: str, second: str) -> str:
    """The symmetry that both make together."""
    if first == second:
        return "identity"
    if "identity" in (first, second):
        return second if first == "identity" else first
    return PRODUCT.get((first, second)) or PRODUCT[second, first]


@given(braids(), st.sampled_from(SYMMETRIES), st.sampled_from(SYMMETRIES))
def test_symmetries_compose(braid: Braid, first: str, second: str) -> None:
    """Each is its own inverse, and two different ones beside the identity make the third."""
    image = apply_symmetry(apply_symmetry(braid, first), second)
    assert image == apply_symmetry(braid, product_of(first, second))


@given(braids())
def test_symmetries_on_letters(braid: Braid) -> None:
    """Mirror negates the letters, reverse reads backwards, mirror-reverse inverts the braid."""
    assert apply_symmetry(braid, "mirror").word == tuple(-letter for letter in braid.word)
    assert apply_symmetry(braid, "reverse").word == braid.word[::-1]
    assert apply_symmetry(braid, "mirror-reverse") == braid.inverse()
    assert apply_symmetry(braid, "identity") is braid


@given(braids(), st.sampled_from(SYMMETRIES))
def test_symmetries_keep_components(braid: Braid, symmetry: str) -> None:
    """An image has as many strands and components; a mirror image the opposite exponent sum."""
    image = apply_symmetry(braid, symmetry)
    assert (image.strands, image.components) == (braid.strands, braid.components)
    sign = -1 if symmetry.startswith("mirror") else 1
    assert image.exponent_sum == sign * braid.exponent_sum


def test_unknown_symmetry_is_named() -> None:
    """A name that is no symmetry is quoted, with those that are."""
    with pytest.raises(InputError, match="'rotate': expected one of identity, mirror"):
        apply_symmetry(Braid([1]), "rotate")
