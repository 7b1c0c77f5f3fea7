"""Counted colourings are the fixed tuples, and depend on the closure alone."""

import random
import subprocess
import sys

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.errors import CapacityError, InputError
from braidsearch.invariants.colourings import (
    Colours,
    count_colourings,
    estimated_cost,
    group_ladder,
    is_applicable,
    verification_seconds,
)
from braidsearch.invariants.colourings import permutation_groups as groups
from braidsearch.words import Braid
from tests.invariants.colourings import fixed_tuples
from tests.scrambles import apply_random_relation
from tests.strategies import braids, braids_on

S3 = Colours("S3, all but the identity", groups.symmetric_group(3), ((2, 1, 3), (2, 3, 1)))
A4 = Colours(
    "A4, both classes of order 3", groups.alternating_group(4), ((2, 3, 1, 4), (3, 1, 2, 4))
)
S4 = Colours("S4", groups.symmetric_group(4), ((2, 3, 4, 1),))
A5 = Colours("A5", groups.alternating_group(5), ((2, 3, 4, 5, 1),))
FROBENIUS = Colours("7:3", groups.affine_group(7, 2), (groups.cycles(7, 7), (1, 3, 5, 7, 2, 4, 6)))
SMALL = [S3, A4, S4, A5, FROBENIUS]
LADDER = {colours.name: colours for colours in group_ladder()}
LARGER = [
    LADDER[name]
    for name in (
        *("AGammaL(1, 8), meridian of order 3", "PSL(2, 7), meridian of order 7"),
        *("M10, meridian of order 8", "PGammaL(2, 8), meridian of order 6"),
        *("A7, meridian of order 3, class 1", "M11, meridian of order 2"),
    )
]


@pytest.mark.parametrize("colours", SMALL, ids=lambda colours: colours.name)
@settings(max_examples=30)
@given(braid=braids(max_strands=3, max_letters=10))
def test_counted_are_the_fixed_tuples(colours, braid):
    """All tuples of colours at the top are tried, and those that come out at the bottom kept."""
    assert count_colourings(braid, colours) == fixed_tuples.value(braid, colours)


@settings(max_examples=20)
@given(braid=braids(max_strands=4, max_letters=14))
def test_counted_are_the_fixed_tuples_on_four_strands(braid):
    """The same with four strands, for S3 with two classes, so that links have up to 5^4 tuples."""
    assert count_colourings(braid, S3) == fixed_tuples.value(braid, S3)


every_colours = pytest.mark.parametrize("colours", [S3, A4, *LARGER], ids=lambda c: c.name)


@every_colours
@settings(max_examples=12)
@given(data=st.data(), strands=st.integers(2, 5))
def test_conjugation(colours, data, strands):
    """Conjugate braids have the same closure."""
    braid, by = data.draw(braids_on(strands, 14)), data.draw(braids_on(strands, 4))
    if is_quick(braid, colours):
        expected = count_colourings(braid, colours)
        assert count_colourings(by.inverse() * braid * by, colours) == expected


@every_colours
@settings(max_examples=12)
@given(braid=braids(max_strands=5, max_letters=14), sign=st.sampled_from([1, -1]))
def test_stabilization(colours, braid, sign):
    """One more strand and one letter of the new generator leave the closure as it is.

    The diagram has one more kink, so this holds only with the framing taken out of longitudes.
    """
    if is_quick(braid, colours):
        stabilized = Braid([*braid.word, sign * braid.strands], braid.strands + 1)
        assert count_colourings(stabilized, colours) == count_colourings(braid, colours)


@every_colours
@settings(max_examples=12)
@given(braid=braids(max_strands=5, max_letters=14), seed=st.integers(0, 10**6))
def test_braid_relations(colours, braid, seed):
    """Words for one element of the braid group have one value."""
    generator = random.Random(seed)
    word = list(braid.word)
    for _ in range(12):
        apply_random_relation(word, generator)
    if is_quick(braid, colours):
        expected = count_colourings(braid, colours)
        assert count_colourings(Braid(word, braid.strands), colours) == expected


@every_colours
@settings(max_examples=12)
@given(braid=braids(max_strands=4, max_letters=14))
def test_symmetries(colours, braid):
    """Meridian and longitude of the mirror-reverse are (m, 1/l), those of the reverse (1/m, 1/l).

    So the colourings of the mirror-reverse have the inverse longitudes, and those of the reverse
    are the colourings by the classes of the inverses, with the inverse longitudes.
    """
    if not is_quick(braid, colours):
        return
    inverses = tuple(map(fixed_tuples.inverse, colours.meridians))
    opposite = Colours("inverses", colours.generators, inverses)
    value, other = count_colourings(braid, colours), count_colourings(braid, opposite)
    assert count_colourings(braid.inverse(), colours) == with_inverse_longitudes(value, colours)
    assert count_colourings(braid.reverse(), colours) == with_inverse_longitudes(other, colours)


def with_inverse_longitudes(value, colours):
    """The value with each longitude's class in the centraliser replaced by that of the inverse."""
    width = 1 + colours.degree
    rows = []
    for *entries, count in value:
        changed = []
        for start in range(0, len(entries), width):
            number, *images = entries[start : start + width]
            x = colours.meridians[number - 1]
            backwards = fixed_tuples.inverse(tuple(images))
            least = fixed_tuples.least_conjugate(colours.generators, x, backwards)
            changed.append([number, *least])
        rows.append([*(integer for entry in sorted(changed) for integer in entry), count])
    return sorted(rows)


def is_quick(braid, colours):
    """Unlinks of many components have too many colourings for a quick test."""
    return braid.components <= 2 and estimated_cost(braid, colours) < 0.5


@pytest.mark.parametrize("components", [1, 2, 5])
def test_unlinks(components):
    """Any colours for the circles of an unlink, and longitudes are trivial."""
    colours = LADDER["S5, meridian of order 2"]
    entry = [1, 1, 2, 3, 4, 5]
    assert count_colourings(Braid([], components), colours) == [
        [*entry * components, 10**components]
    ]


def test_more_colourings_than_are_kept_at_once():
    """The unlink of three circles has 11,025 colourings up to conjugation that all count."""
    colours = LADDER["A7, meridian of order 2"]
    value = count_colourings(Braid([], 3), colours)
    assert [row[-1] for row in value] == [105**3]


def test_plain_loops_count_the_same():
    """Without a compiler the same loops run as they stand."""
    program = (
        "from braidsearch.invariants.colourings import count_colourings, group_ladder\n"
        "from braidsearch.words import Braid\n"
        "colours = next(c for c in group_ladder() if c.name == 'M10, meridian of order 8')\n"
        "print(count_colourings(Braid([1, 1, -2, 1, -2, 1, -2, -2]), colours))\n"
        "print(count_colourings(Braid([1, 1, 2, -1, 2, 2]), colours))\n"
    )
    outputs = {
        subprocess.run(
            [sys.executable, "-c", program],
            env={"NUMBA_DISABLE_JIT": disabled, "PYTHONPATH": ":".join(sys.path)},
            check=True,
            capture_output=True,
            text=True,
        ).stdout
        for disabled in ("0", "1")
    }
    assert len(outputs) == 1
    assert len(outputs.pop().splitlines()) == 2


def test_estimates_are_repeatable_and_grow():
    """Costs follow from the seeds and the class sizes."""
    braid = Braid([1, 1, -2, 1, -2, 1, -2, -2])
    costs = [estimated_cost(braid, colours) for colours in group_ladder()]
    assert costs == [estimated_cost(braid, colours) for colours in group_ladder()]
    assert costs[0] < 1e-3 < costs[-1] < 1
    assert verification_seconds(braid, group_ladder()[-1]) > 10 * costs[-1]


def test_too_many_seeds_are_refused():
    """An unlink of twelve circles needs all its arcs as seeds, so 720^11 nodes for M11."""
    colours = LADDER["M11, meridian of order 11"]
    assert not is_applicable(Braid([], 12), colours)
    assert is_applicable(Braid([], 2), colours)
    with pytest.raises(CapacityError, match="12 strands"):
        count_colourings(Braid([], 12), colours)


def test_large_classes_are_refused():
    """The transpositions of S65 are 2,080, more than tables are made for."""
    colours = Colours("S65", groups.symmetric_group(65), (groups.cycles(65, 2),))
    assert not is_applicable(Braid([1, 1, 1]), colours)
    with pytest.raises(CapacityError, match="S65"):
        count_colourings(Braid([1, 1, 1]), colours)


@pytest.mark.parametrize(
    ("generators", "meridians", "message"),
    [
        (((2, 1, 3),), ((1, 1, 3),), "expected a permutation"),
        (((2, 1, 3),), ((2, 1),), "expected a permutation"),
        (((2, 1, 3), (0, 1, 2)), ((2, 1, 3),), "expected a permutation"),
        ((), ((1, 2),), "expected a generator"),
        (((2, 1),), (), "expected a generator"),
        ((tuple(range(1, 202)),), (tuple(range(1, 202)),), "at most 200"),
    ],
)
def test_what_is_no_colours(generators, meridians, message):
    """Images that are no permutation, of several degrees, none at all, or too many points."""
    with pytest.raises(InputError, match=message):
        Colours("none", generators, meridians)


def test_meridians_must_belong_to_the_group_and_to_several_classes():
    """A transposition is no even permutation, and all 3-cycles of S3 are conjugate."""
    outside = Colours("A3", ((2, 3, 1),), ((2, 1, 3),))
    twice = Colours("S3", groups.symmetric_group(3), ((2, 3, 1), (3, 1, 2)))
    with pytest.raises(InputError, match="element of the group"):
        count_colourings(Braid([1, 1, 1]), outside)
    with pytest.raises(InputError, match="no conjugate"):
        count_colourings(Braid([1, 1, 1]), twice)


def test_parameters_are_what_a_certificate_holds():
    """Lists of images, generators and meridians apart; the repr evaluates to the value."""
    assert S4.parameters == {
        "generators": [[2, 1, 3, 4], [2, 3, 4, 1]],
        "meridians": [[2, 3, 4, 1]],
    }
    assert eval(repr(S4)) == S4


def test_loose_components_have_too_many_colourings() -> None:
    """Circles apart from each other take all colours: nine have 4^9 colourings by a class of four.

    Beyond two million up to conjugation they are not counted.
    """
    colours = LADDER["AGL(1, 4), meridian of order 3"]
    nine = count_colourings(Braid([], 9), colours)
    assert sum(row[-1] for row in nine) == 4**9
    with pytest.raises(CapacityError):
        count_colourings(Braid([], 13), colours)
