"""Values carried over to symmetric images are the values of the images."""

from contextlib import suppress

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.certificates.grammar import INVARIANTS as NAMES
from braidsearch.certificates.symmetric_values import symmetric_parameters, symmetric_value
from braidsearch.certificates.values import freeze_value
from braidsearch.errors import InputError
from braidsearch.invariants import INVARIANTS, invariant_named
from braidsearch.invariants.colourings import Colours, count_colourings, group_ladder
from braidsearch.words import SYMMETRIES, Braid, apply_symmetry
from tests.certificates.arbitrary import parameters_and_values
from tests.strategies import braids
from tests.verifier import oracles
from tests.verifier.permutation_groups import A4, A4_BOTH, S3, S3_ROTATIONS

symmetries = st.sampled_from(SYMMETRIES)

# Values from the slow second routes in tests/verifier, which share no code with the project.
FINER = {
    "colouring S3": ("colouring", S3),
    "colouring S3, two classes": ("colouring", S3_ROTATIONS),
    "colouring A4": ("colouring", A4),
    "colouring A4, three classes": ("colouring", A4_BOTH),
    "signature at order 6": ("levine-tristram", {"order": 6, "power": 1}),
    "signature at order 5": ("levine-tristram", {"order": 5, "power": 2}),
    "module over F_2": ("alexander-module", {"prime": 2}),
    "module over F_5": ("alexander-module", {"prime": 5}),
    "three-braid": ("three-braid", {}),
    "Jones of sublinks": ("sublinks", {"components": 1, "invariant": "jones"}),
    "modules of pairs": (
        "sublinks",
        {"components": 2, "invariant": "alexander-module", "prime": 3},
    ),
    "colourings of pairs": ("sublinks", {"components": 2, "invariant": "colouring", **A4}),
}
LADDER = {colours.name: colours for colours in group_ladder()}
REVERSING = [
    LADDER[name]
    for name in (
        "AGammaL(1, 8), meridian of order 3",
        "PSL(2, 7), meridian of order 7",
        "M11, meridian of order 11",
    )
]
"""Groups with meridians that are not conjugate to their inverses."""


def frozen(parameters):
    return {name: freeze_value(value) for name, value in parameters.items()}


def thawed(value):
    return [thawed(item) for item in value] if isinstance(value, tuple) else value


def test_every_invariant_of_a_certificate_is_tried_here():
    """No name of the format is left without its law."""
    tried = {invariant.name for invariant in INVARIANTS} | {name for name, _ in FINER.values()}
    assert set(NAMES) <= tried


@pytest.mark.parametrize("name", [invariant.name for invariant in INVARIANTS])
@settings(max_examples=30)
@given(symmetry=symmetries, braid=braids(max_strands=5, max_letters=14))
def test_plain_invariants(name, symmetry, braid):
    """The value carried over is the value of the image."""
    compute = invariant_named(name).compute
    expected = freeze_value(compute(apply_symmetry(braid, symmetry)))
    assert symmetric_value(name, {}, freeze_value(compute(braid)), symmetry) == expected


@pytest.mark.parametrize("case", FINER)
@settings(max_examples=20)
@given(symmetry=symmetries, braid=braids(max_strands=3, max_letters=7))
def test_invariants_with_parameters(case, symmetry, braid):
    """The value carried over is that of the image with the parameters carried over."""
    name, parameters = FINER[case]
    image = apply_symmetry(braid, symmetry)
    value = oracles.value(name, braid.strands, list(braid.word), **parameters)
    carried = symmetric_parameters(name, frozen(parameters), symmetry)
    expected = oracles.value(
        name, image.strands, list(image.word), **{key: thawed(v) for key, v in carried.items()}
    )
    assert value is not None
    found = symmetric_value(name, frozen(parameters), freeze_value(value), symmetry)
    assert found == freeze_value(expected)


def test_sublinks_are_sorted_again():
    """A right-handed trefoil beside a torus knot (2, 5): signatures -4, -2; mirrored 2, 4."""
    parameters = {"components": 1, "invariant": "signature"}
    braid = [1, 1, 1, 3, 3, 3, 3, 3]
    assert oracles.value("sublinks", 4, braid, **parameters) == [-4, -2]
    assert oracles.value("sublinks", 4, [-letter for letter in braid], **parameters) == [2, 4]
    assert symmetric_value("sublinks", parameters, (-4, -2), "mirror") == (2, 4)
    assert symmetric_value("sublinks", parameters, (-4, -2), "reverse") == (-4, -2)


@pytest.mark.parametrize("symmetry", SYMMETRIES)
@pytest.mark.parametrize("colours", REVERSING, ids=lambda colours: colours.name)
@pytest.mark.parametrize(
    "word", [[1, 1, 1], [1, -2, 1, -2], [1, 1, 2, 1, 1, 2], [1, 1, 1, 2, -1, 2]]
)
def test_colourings_by_meridians_that_no_conjugation_inverts(symmetry, colours, word):
    """Larger groups: counts of the image by the inverse class, as the project counts them."""
    braid = Braid(word)
    parameters = {"generators": colours.generators, "meridians": colours.meridians}
    carried = symmetric_parameters("colouring", parameters, symmetry)
    assert (carried == parameters) == (symmetry in ("identity", "mirror-reverse"))
    others = Colours("inverse", carried["generators"], carried["meridians"])
    expected = count_colourings(apply_symmetry(braid, symmetry), others)
    value = freeze_value(count_colourings(braid, colours))
    assert symmetric_value("colouring", parameters, value, symmetry) == freeze_value(expected)


@settings(max_examples=20)
@given(symmetry=symmetries, braid=braids(max_strands=3, max_letters=9))
def test_carrying_over_twice_changes_nothing(symmetry, braid):
    """Every symmetry is its own inverse, on values and parameters as on words."""
    parameters = frozen(A4_BOTH)
    value = freeze_value(oracles.value("colouring", braid.strands, list(braid.word), **A4_BOTH))
    once = symmetric_parameters("colouring", parameters, symmetry)
    there = symmetric_value("colouring", parameters, value, symmetry)
    assert symmetric_parameters("colouring", once, symmetry) == parameters
    assert symmetric_value("colouring", once, there, symmetry) == value


@settings(max_examples=300)
@given(data=st.data(), name=st.sampled_from(sorted(NAMES)), symmetry=symmetries)
def test_values_that_no_link_has_are_carried_over_or_refused(data, name, symmetry):
    """A file that was read but never verified gives a value or an error in words, nothing else."""
    parameters, (value, _) = data.draw(parameters_and_values(name))
    with suppress(InputError):
        carried = symmetric_value(name, frozen(parameters), freeze_value(value), symmetry)
        assert freeze_value(carried) == carried


@pytest.mark.parametrize(
    ("name", "parameters", "value"),
    [
        ("arf", {}, 1),
        ("jones", {}, 3),
        ("three-braid", {}, ((),)),
        ("sublinks", {"components": 1, "invariant": "jones"}, 4),
        ("colouring", frozen(S3), ((7, 1, 2, 3, 3),)),
        ("colouring", frozen(A4), ((1, 2, 1, 4, 3, 1),)),
    ],
)
def test_other_values_are_refused(name, parameters, value):
    """An unknown name, a number for a polynomial, an unknown class, a longitude outside."""
    with pytest.raises(InputError, match="expected"):
        symmetric_value(name, parameters, value, "mirror-reverse")
