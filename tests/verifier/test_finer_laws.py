"""Markov moves, symmetries, sums: laws that hold for colourings, sublinks, signatures, modules."""

import random

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.words import Braid
from tests.scrambles import scramble
from tests.strategies import braids, braids_on
from tests.verifier import oracles
from tests.verifier.closures import invariant
from tests.verifier.finer_samples import SAMPLES
from tests.verifier.permutation_groups import A5

every_sample = pytest.mark.parametrize("sample", SAMPLES)


def value(sample, braid):
    name, parameters = SAMPLES[sample]
    return invariant(name, braid, **parameters)


@every_sample
@settings(max_examples=20)
@given(braid=braids(max_strands=4, max_letters=7))
def test_second_routes(sample, braid):
    """All tuples, traced strands, eigenvalues, minors: all give what the verifier computes."""
    name, parameters = SAMPLES[sample]
    if sample != "colouring A4, three classes" or braid.strands < 4:
        expected = oracles.value(name, braid.strands, braid.word, **parameters)
        assert value(sample, braid) == expected


@every_sample
@settings(max_examples=15)
@given(data=st.data(), strands=st.integers(2, 4))
def test_conjugation(sample, data, strands):
    """Conjugate braids have one closure."""
    braid, by = data.draw(braids_on(strands, 10)), data.draw(braids_on(strands, 4))
    assert value(sample, by.inverse() * braid * by) == value(sample, braid)


@every_sample
@settings(max_examples=15)
@given(braid=braids(max_strands=4, max_letters=10), sign=st.sampled_from([1, -1]))
def test_stabilization(sample, braid, sign):
    """One more strand, joined by one letter of either sign, leaves the closure."""
    stabilized = Braid([*braid.word, sign * braid.strands], braid.strands + 1)
    assert value(sample, stabilized) == value(sample, braid)


@every_sample
def test_scrambles(sample):
    """Four words after fifteen random moves close to the links that they closed to."""
    generator = random.Random(4)
    for _ in range(4):
        letters = [generator.choice([1, -1, 2, -2]) for _ in range(8)]
        braid = Braid(letters, strands=3)
        assert value(sample, scramble(braid, generator, 15, 2)) == value(sample, braid)


@pytest.mark.parametrize("sample", [name for name in SAMPLES if "colouring" not in name])
@settings(max_examples=15)
@given(braid=braids(max_strands=4, max_letters=10))
def test_symmetries(sample, braid):
    """Reversing changes nothing but colourings; mirroring negates signatures, keeps modules."""
    assert value(sample, braid.reverse()) == value(sample, braid)
    if "signature" in sample:
        signature, nullity = value(sample, braid)
        assert value(sample, braid.mirror()) == [-signature, nullity]
    if "module" in sample:
        assert value(sample, braid.mirror()) == value(sample, braid)


@settings(max_examples=25)
@given(braid=braids(max_strands=3, max_letters=8))
def test_colourings_of_the_mirror_image(braid):
    """Mirroring inverts longitudes: each list of classes has its colourings with inverses."""
    # In A4 no 3-cycle is conjugate to its inverse, and its centraliser has order three.
    mirrored = []
    for *entries, count in value("colouring A4", braid.mirror()):
        pairs = [entries[k : k + 5] for k in range(0, len(entries), 5)]
        inverses = [[kind, *(images.index(i) + 1 for i in (1, 2, 3, 4))] for kind, *images in pairs]
        mirrored.append([*(number for pair in sorted(inverses) for number in pair), count])
    assert sorted(mirrored) == value("colouring A4", braid)


@settings(max_examples=25)
@given(braid=braids(max_strands=3, max_letters=8))
def test_the_number_of_colourings_of_a_reversed_link(braid):
    """Where the class is its own inverse class, as many colourings: invert every colour."""
    for parameters in (A5, SAMPLES["colouring S3"][1]):
        values = [invariant("colouring", one, **parameters) for one in (braid, braid.reverse())]
        assert sum(e[-1] for e in values[0]) == sum(e[-1] for e in values[1])


@settings(max_examples=25)
@given(left=braids(3, 6), right=braids(3, 6))
def test_connected_sums(left, right):
    """Signatures and nullities add under connected sum."""
    shifted = [letter + (1 if letter > 0 else -1) * left.strands for letter in right.word]
    joint = Braid([*left.word, *shifted, left.strands], left.strands + right.strands)
    for sample in SAMPLES:
        if "signature" in sample:
            parts = zip(value(sample, left), value(sample, right), strict=True)
            assert value(sample, joint) == [one + other for one, other in parts]


@settings(max_examples=40)
@given(braid=braids(max_strands=4, max_letters=10))
def test_signatures_at_minus_one(braid):
    """At -1 the Levine-Tristram signature is the signature."""
    assert value("signature at -1", braid)[0] == invariant("signature", braid)


@settings(max_examples=40)
@given(braid=braids(max_strands=4, max_letters=10))
def test_the_order_of_the_module_is_the_alexander_polynomial(braid):
    """The product of the invariant factors is the Alexander polynomial modulo p."""
    for prime in (2, 3, 7):
        product = [1]
        for factor in invariant("alexander-module", braid, prime=prime):
            size = len(product) + len(factor) - 1
            product = (
                [
                    sum(
                        product[i] * factor[k - i]
                        for i in range(len(product))
                        if 0 <= k - i < len(factor)
                    )
                    for k in range(size)
                ]
                if factor
                else []
            )
            if not product:
                break
        terms = [[e, c % prime] for e, c in invariant("alexander", braid) if c % prime]
        expected = [0] * (terms[-1][0] - terms[0][0] + 1) if terms else []
        for exponent, c in terms:
            expected[exponent - terms[0][0]] = c * pow(terms[-1][1], -1, prime) % prime
        assert [c % prime for c in product] == expected


@pytest.mark.parametrize("name", ["alexander", "jones", "signature", "alexander-module"])
@settings(max_examples=20)
@given(braid=braids(max_strands=4, max_letters=9))
def test_the_sublink_of_all_components(name, braid):
    """The only sublink with as many components is the link; with more there is none."""
    inner = {"prime": 3} if name == "alexander-module" else {}
    count = braid.components
    whole = invariant("sublinks", braid, components=count, invariant=name, **inner)
    assert whole == [invariant(name, braid, **inner)]
    assert invariant("sublinks", braid, components=count + 1, invariant=name, **inner) == []


@settings(max_examples=40)
@given(braid=braids(max_strands=5, max_letters=14))
def test_the_sublinks_of_two_components_have_the_linking_numbers(braid):
    """Each pair of components gives its linking number, and links no other component."""
    pairs = invariant("sublinks", braid, components=2, invariant="linking-numbers")
    assert sorted(number for pair in pairs for number in pair) == invariant(
        "linking-numbers", braid
    )
