"""Skein relations, Markov moves, symmetries, sums: laws that hold for the verifier's invariants."""

import random
from collections import Counter

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.words import Braid
from tests.knot_tables import alexander_from_conway
from tests.scrambles import apply_random_relation, scramble
from tests.strategies import braids, braids_on
from tests.verifier.closures import NAMES, combination, invariant, product, terms

every_invariant = pytest.mark.parametrize("name", NAMES)
POLYNOMIALS = ("alexander", "jones", "homfly")


@st.composite
def skein_triples(draw):
    """Braids that close to L+, L- and L0, of up to 25 letters on up to 5 strands."""
    strands = draw(st.integers(2, 5))
    before, after = draw(braids_on(strands, 12)).word, draw(braids_on(strands, 12)).word
    index = draw(st.integers(1, strands - 1))
    return [Braid([*before, *middle, *after], strands) for middle in ([index], [-index], [])]


@settings(max_examples=60)
@given(skein_triples())
def test_skein_relation_of_jones(triple):
    """t^-1 V(L+) - t V(L-) = (t^(1/2) - t^(-1/2)) V(L0)."""
    plus, minus, none = (invariant("jones", braid) for braid in triple)
    left = combination((1, (-2,), plus), (-1, (2,), minus))
    assert left == combination((1, (1,), none), (-1, (-1,), none))


@settings(max_examples=60)
@given(skein_triples())
def test_skein_relation_of_homfly(triple):
    """v^-1 P(L+) - v P(L-) = z P(L0)."""
    plus, minus, none = (invariant("homfly", braid) for braid in triple)
    left = combination((1, (-1, 0), plus), (-1, (1, 0), minus))
    assert left == combination((1, (0, 1), none))


@settings(max_examples=60)
@given(braids(max_strands=5, max_letters=20))
def test_homfly_at_v_1_is_alexander(braid):
    """P(1, z) is the Conway polynomial: no negative powers of z, and Alexander's up to units."""
    conway = Counter()
    for _, z, c in invariant("homfly", braid):
        conway[z] += c
    entries = sorted([z, c] for z, c in conway.items() if c)
    assert all(z >= 0 for z, _ in entries)
    assert invariant("alexander", braid) == alexander_from_conway(entries)


@settings(max_examples=60)
@given(braids(max_strands=5, max_letters=20))
def test_values_at_one(braid):
    """V(1) = (-2)^(components - 1) (Jones 1985); Delta(1) is +-1 for knots, 0 for links."""
    jones, alexander = invariant("jones", braid), invariant("alexander", braid)
    assert sum(c for _, c in jones) == (-2) ** (braid.components - 1)
    assert abs(sum(c for _, c in alexander)) == (braid.components == 1)


@settings(max_examples=60)
@given(braids(max_strands=5, max_letters=20))
def test_the_determinant_is_one_number(braid):
    """|V(-1)| = |Delta(-1)| is the determinant; a knot's is 1 modulo 4 iff 4 divides sigma.

    Jones 1985; Murasugi, On a certain numerical invariant of link types, 1965.
    """
    jones, alexander = invariant("jones", braid), invariant("alexander", braid)
    determinant = abs(sum(c * (-1) ** exponent for exponent, c in alexander))
    lowest = jones[0][0]
    assert abs(sum(c * (-1) ** ((e - lowest) // 2) for e, c in jones)) == determinant
    if braid.components == 1:
        assert (determinant % 4 == 1) == (invariant("signature", braid) % 4 == 0)


@every_invariant
@settings(max_examples=40)
@given(data=st.data(), strands=st.integers(2, 5))
def test_conjugation(name, data, strands):
    """Conjugate braids have one closure."""
    braid, by = data.draw(braids_on(strands, 14)), data.draw(braids_on(strands, 4))
    assert invariant(name, by.inverse() * braid * by) == invariant(name, braid)


@every_invariant
@settings(max_examples=40)
@given(braid=braids(max_strands=5, max_letters=14), sign=st.sampled_from([1, -1]))
def test_stabilization(name, braid, sign):
    """One more strand, joined by one letter of either sign, leaves the closure."""
    stabilized = Braid([*braid.word, sign * braid.strands], braid.strands + 1)
    assert invariant(name, stabilized) == invariant(name, braid)


@every_invariant
@settings(max_examples=40)
@given(braid=braids(max_strands=5, max_letters=16), seed=st.integers(0, 10**6))
def test_braid_relations(name, braid, seed):
    """Words for one braid have one value."""
    generator = random.Random(seed)
    word = list(braid.word)
    for _ in range(10):
        apply_random_relation(word, generator)
    assert invariant(name, Braid(word, braid.strands)) == invariant(name, braid)


@every_invariant
def test_scrambles(name):
    """Twenty words after forty random moves close to the links that they closed to."""
    generator = random.Random(4)
    for _ in range(20):
        letters = [generator.choice([1, -1, 2, -2]) for _ in range(9)]
        braid = Braid(letters, strands=3)
        assert invariant(name, scramble(braid, generator, 40, 2)) == invariant(name, braid)


@every_invariant
@settings(max_examples=40)
@given(braid=braids(max_strands=5, max_letters=14))
def test_symmetries(name, braid):
    """Reversing changes nothing; the mirror image has t, v and the signs inverted."""
    value = invariant(name, braid)
    assert invariant(name, braid.reverse()) == value
    mirrored = invariant(name, braid.mirror())
    if name in ("components", "alexander"):
        assert mirrored == value
    elif name == "signature":
        assert mirrored == -value
    elif name in ("linking-numbers", "linking-sums"):
        assert mirrored == sorted(-number for number in value)
    elif name == "jones":
        assert mirrored == sorted([-e, c] for e, c in value)
    else:  # v^-1 P(L+) - v P(L-) = z P(L0) is kept by v -> 1/v, z -> -z
        assert mirrored == sorted([-v, z, -c if z % 2 else c] for v, z, c in value)


def shifted(braid, by):
    return [letter + by if letter > 0 else letter - by for letter in braid.word]


@settings(max_examples=40)
@given(left=braids(3, 8), right=braids(3, 8))
def test_connected_sums_and_split_unions(left, right):
    """Polynomials multiply, with a circle more for a split union; signatures add."""
    joint = [*left.word, *shifted(right, left.strands)]
    strands = left.strands + right.strands
    union, connected = Braid(joint, strands), Braid([*joint, left.strands], strands)
    for name in POLYNOMIALS:
        values = invariant(name, left), invariant(name, right)
        assert terms(invariant(name, connected)) == product(*values)
        two_circles = invariant(name, Braid([], strands=2))
        parts = [[*exponents, c] for exponents, c in product(*values).items()]
        assert terms(invariant(name, union)) == product(two_circles, parts)
    total = invariant("signature", left) + invariant("signature", right)
    assert invariant("signature", connected) == invariant("signature", union) == total
