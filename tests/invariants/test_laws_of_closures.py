"""What leaves the closed braid's link alone leaves the invariants alone; sums and mirrors."""

import random

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.invariants import INVARIANTS, invariant_named, mirror_image
from braidsearch.invariants.laurent import multiply
from braidsearch.words import Braid
from tests.scrambles import apply_random_relation
from tests.strategies import braids, braids_on

NAMES = [invariant.name for invariant in INVARIANTS]
every_invariant = pytest.mark.parametrize("name", NAMES)


def value(name, braid):
    return invariant_named(name).compute(braid)


def shifted(braid, by):
    return [letter + by if letter > 0 else letter - by for letter in braid.word]


@every_invariant
@settings(max_examples=40)
@given(data=st.data(), strands=st.integers(2, 6))
def test_conjugation(name, data, strands):
    """Conjugate braids have the same closure."""
    braid, by = data.draw(braids_on(strands, 20)), data.draw(braids_on(strands, 5))
    assert value(name, by.inverse() * braid * by) == value(name, braid)


@every_invariant
@settings(max_examples=40)
@given(braid=braids(max_strands=6, max_letters=20), sign=st.sampled_from([1, -1]))
def test_stabilization(name, braid, sign):
    """One more strand and one letter of the new generator leave the closure as it is."""
    stabilized = Braid([*braid.word, sign * braid.strands], braid.strands + 1)
    assert value(name, stabilized) == value(name, braid)


@every_invariant
@settings(max_examples=40)
@given(braid=braids(max_strands=6, max_letters=20), seed=st.integers(0, 10**6))
def test_braid_relations(name, braid, seed):
    """Words for one element of the braid group have one value."""
    generator = random.Random(seed)
    word = list(braid.word)
    for _ in range(12):
        apply_random_relation(word, generator)
    assert value(name, Braid(word, braid.strands)) == value(name, braid)


@every_invariant
@settings(max_examples=40)
@given(braid=braids(max_strands=6, max_letters=24))
def test_symmetries(name, braid):
    """The mirror image has the mirrored value, the reverse has the value itself."""
    assert value(name, braid.mirror()) == mirror_image(name, value(name, braid))
    assert value(name, braid.reverse()) == value(name, braid)
    assert value(name, braid.inverse()) == mirror_image(name, value(name, braid))


SPLIT_CIRCLE = {
    "alexander": [],
    "jones": [[-1, -1], [1, -1]],
    "homfly": [[-1, -1, 1], [1, -1, -1]],
}


@settings(max_examples=40)
@given(left=braids(4, 12), right=braids(4, 12))
def test_connected_sums(left, right):
    """One letter between two braids: polynomials multiply, signatures add, determinants multiply.

    The word is mixed, so that the two parts must be found in it.
    """
    word = [*left.word[:3], *shifted(right, left.strands), left.strands, *left.word[3:]]
    joined = Braid(word, left.strands + right.strands)
    for name in ("alexander", "jones", "homfly"):
        assert value(name, joined) == multiply(value(name, left), value(name, right))
    assert value("signature", joined) == value("signature", left) + value("signature", right)
    product = value("determinant", left) * value("determinant", right)
    assert value("determinant", joined) == product


@settings(max_examples=40)
@given(left=braids(4, 12), right=braids(4, 12))
def test_split_unions(left, right):
    """No letter between two braids: one more factor for the circle, and zeros in between."""
    word = [*left.word[:3], *shifted(right, left.strands), *left.word[3:]]
    union = Braid(word, left.strands + right.strands)
    for name, circle in SPLIT_CIRCLE.items():
        parts = multiply(value(name, left), value(name, right))
        assert value(name, union) == multiply(circle, parts)
    assert value("signature", union) == value("signature", left) + value("signature", right)
    assert value("determinant", union) == 0
    zeros = [0] * (left.components * right.components)
    numbers = value("linking-numbers", left) + value("linking-numbers", right) + zeros
    assert value("linking-numbers", union) == sorted(numbers)
    sums = value("linking-sums", left) + value("linking-sums", right)
    assert value("linking-sums", union) == sorted(sums)


@pytest.mark.parametrize("strands", [1, 2, 3, 7, 20])
def test_unlinks(strands):
    """The empty word on n strands closes to n circles: powers of the circle's value."""
    unlink = Braid([], strands=strands)
    for name, circle in SPLIT_CIRCLE.items():
        expected = [[0, 0, 1]] if name == "homfly" else [[0, 1]]
        for _ in range(strands - 1):
            expected = multiply(expected, circle)
        assert value(name, unlink) == expected
    assert value("signature", unlink) == 0
    assert value("determinant", unlink) == (1 if strands == 1 else 0)
    assert value("components", unlink) == strands


@settings(max_examples=60)
@given(braid=braids(max_strands=6, max_letters=30))
def test_values_at_special_points(braid):
    """V(1) = (-2)^(components - 1) (Jones 1985), |V(-1)| = |Delta(-1)| = determinant."""
    jones, alexander = value("jones", braid), value("alexander", braid)
    assert sum(c for _, c in jones) == (-2) ** (braid.components - 1)
    determinant = value("determinant", braid)
    assert abs(sum(c * (-1) ** exponent for exponent, c in alexander)) == determinant
    lowest = min(exponent for exponent, _ in jones)
    assert abs(sum(c * (-1) ** ((e - lowest) // 2) for e, c in jones)) == determinant
    assert abs(sum(c for _, c in alexander)) == (1 if braid.components == 1 else 0)


@settings(max_examples=100)
@given(braid=braids(max_strands=6, max_letters=30).filter(lambda braid: braid.components == 1))
def test_signature_and_determinant_of_knots(braid):
    """|Delta(-1)| = 1 mod 4 exactly if the signature is 0 mod 4 (Murasugi 1965)."""
    assert value("determinant", braid) % 4 == (1 if value("signature", braid) % 4 == 0 else 3)
