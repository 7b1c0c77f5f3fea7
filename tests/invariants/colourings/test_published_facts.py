"""What is known of colourings of knots, from the literature and from published tables."""

from collections import Counter
from functools import reduce

import pytest

from braidsearch.invariants.colourings import count_colourings, estimated_cost, group_ladder
from braidsearch.words import SYMMETRIES, Braid, apply_symmetry
from tests.invariants.colourings import fixed_tuples
from tests.knot_tables import iter_knots, iter_links

LADDER = {colours.name: colours for colours in group_ladder()}
TREFOIL = Braid([1, 1, 1])
FIGURE_EIGHT = Braid([1, -2, 1, -2])


@pytest.fixture(scope="module")
def knots():
    """The knots to 12 crossings by name (KnotInfo)."""
    return {row.name: row for row in iter_knots(12)}


def total(braid, name):
    """All colourings, whatever their longitudes."""
    return sum(row[-1] for row in count_colourings(braid, LADDER[name]))


def told_apart(left, right, names=None):
    """The first colours of the ladder, or of those named, that tell two closures apart."""
    for name in names or LADDER:
        colours = LADDER[name]
        if count_colourings(left, colours) != count_colourings(right, colours):
            return name
    return None


def test_eisermann_s_example_8_17(knots):
    """Of 8_17 and its reverse one has 1 and the other 23 homomorphisms to M11, order 11.

    The trivial one is among them, a meridian going to a fixed element (M. Eisermann, Knot
    colouring polynomials, 2007). Here all 720 conjugates are counted.
    """
    braid = knots["8_17"].braid
    counts = [total(image, "M11, meridian of order 11") for image in (braid, braid.reverse())]
    assert sorted(counts) == [720, 23 * 720]


def test_the_kinoshita_terasaka_and_conway_knots(knots):
    """PSL(2, 7) and S5 tell the mutants 11n_42 and 11n_34 apart, in all four symmetries.

    R. Riley (Homomorphisms of knot groups on finite groups, 1971) told them apart by PSL(2, 7).
    """
    left, right = knots["11n_34"].braid, knots["11n_42"].braid
    names = [name for name in LADDER if name.startswith(("PSL(2, 7)", "S5"))]
    for symmetry in SYMMETRIES:
        assert told_apart(left, apply_symmetry(right, symmetry), names), symmetry


@pytest.mark.parametrize(("degree", "size"), [(3, 3), (4, 6), (5, 10), (6, 15)])
def test_trefoil_by_transpositions(degree, size):
    """Pairs with aba = bab: equal, or sharing one point, of which there are 2 (n - 2) for each.

    The group of the trefoil is <a, b | aba = bab>, a and b meridians (from memory; it is in every
    textbook, as R. H. Crowell, R. H. Fox, Introduction to Knot Theory, 1963).
    """
    name = f"S{degree}, meridian of order 2"
    assert total(TREFOIL, name) == size * (1 + 2 * (degree - 2))


@pytest.mark.parametrize(
    "name",
    [
        *("S3, meridian of order 2", "S4, meridian of order 4", "M10, meridian of order 8"),
        *("PSL(2, 7), meridian of order 7", "AGammaL(1, 8), meridian of order 6"),
    ],
)
def test_longitudes_of_the_trefoil(name):
    """In <a, b | aba = bab> the longitude of a is (ab)^3 a^-6, with (ab)^3 central.

    The complement is fibred by circles, and (ab)^3 is a fibre, which links the knot 6 times (from
    memory; G. Burde, H. Zieschang, Knots, 1985).
    """
    colours = LADDER[name]
    [x] = colours.meridians
    found = fixed_tuples.carriers(colours.generators, x)
    rows = Counter()
    for b in found:
        if product(x, b, x) == product(b, x, b):
            longitude = product(*(x, b) * 3, *[fixed_tuples.inverse(x)] * 6)
            rows[fixed_tuples.least_conjugate(colours.generators, x, longitude)] += len(found)
    expected = sorted([1, *longitude, count] for longitude, count in rows.items())
    assert count_colourings(TREFOIL, colours) == expected


def product(*factors):
    return reduce(fixed_tuples.times, factors)


@pytest.mark.parametrize(
    ("name", "prime"),
    [
        ("S3, meridian of order 2", 3),
        ("the dihedral group of degree 5, meridian of order 2", 5),
        ("the dihedral group of degree 7, meridian of order 2", 7),
    ],
)
def test_dihedral_colourings_and_determinants(name, prime):
    """A knot has colourings by reflections other than p constant ones if and only if p | det.

    Their number is a power of p (R. H. Crowell, R. H. Fox, 1963; determinants from KnotInfo).
    All longitudes are trivial: they lie in the second commutator group.
    """
    for row in iter_knots(10):
        [[*entry, count]] = count_colourings(row.braid, LADDER[name])
        assert entry == [1, *range(1, prime + 1)]
        assert count in (prime, prime**2, prime**3, prime**4)
        assert (count > prime) == (row.determinant % prime == 0), row.name


def test_figure_eight_by_four_points():
    """t^2 - 3t + 1 = t^2 + t + 1 over F_4: its roots colour the figure-eight by A4, 16 ways."""
    assert total(FIGURE_EIGHT, "AGL(1, 4), meridian of order 3") == 4 * 4
    assert total(TREFOIL, "AGL(1, 4), meridian of order 3") == 4 * 4
    assert total(Braid([1] * 5), "AGL(1, 4), meridian of order 3") == 4


@pytest.mark.parametrize(
    "name", ["9_42", "10_71", "12a_126", "12a_132", "12a_214", "12a_222", "12a_697"]
)
def test_chirality_that_polynomials_miss(knots, name):
    """These are none of their mirror images (symmetry_type, KnotInfo); small groups see it."""
    assert knots[name].columns["symmetry_type"].strip() in ("chiral", "reversible")
    for image in ("mirror", "mirror-reverse"):
        braid = knots[name].braid
        assert told_apart(braid, apply_symmetry(braid, image)), image


def is_quick(row, colours):
    return estimated_cost(row.braid, colours) < 0.003


def test_reversible_knots_are_never_told_from_their_reverses(knots):
    """Every twelfth knot to 11 crossings that the table calls invertible, by all quick colours.

    The slow survey in the benchmarks takes all of them and the whole ladder.
    """
    rows = [
        row
        for row in knots.values()
        if row.crossings <= 11
        and row.columns["symmetry_type"].strip() in ("reversible", "fully amphicheiral")
    ][::12]
    assert len(rows) > 25
    for row in rows:
        for colours in LADDER.values():
            if is_quick(row, colours):
                value = count_colourings(row.braid, colours)
                assert count_colourings(row.braid.reverse(), colours) == value, row.name


def test_amphicheiral_knots_are_never_told_from_their_images(knots):
    """The knots to 10 crossings that equal their mirror-reverse, and 12a_427, its mirror image."""
    rows = [row for row in knots.values() if row.crossings <= 10]
    images = [
        (row, "mirror-reverse")
        for row in rows
        if row.columns["symmetry_type"].strip() in ("negative amphicheiral", "fully amphicheiral")
    ]
    assert len(images) > 15
    for row, symmetry in [*images, (knots["12a_427"], "mirror")]:
        image = apply_symmetry(row.braid, symmetry)
        for colours in LADDER.values():
            if is_quick(row, colours):
                value = count_colourings(row.braid, colours)
                assert count_colourings(image, colours) == value, row.name


def test_knots_that_are_not_invertible(knots):
    """Up to 9 crossings 8_17, 9_32 and 9_33 alone, and 10_81 by PSL(2, 27) extended.

    H. F. Trotter (Non-invertible knots exist, 1963) proved the first kind; R. Hartley
    (Identifying non-invertible knots, 1983) has the knots to 10 crossings.
    """
    groups = [
        *("PGammaL(2, 16), meridian of order 4", "M11, meridian of order 11"),
        *("PSL(2, 27):3, meridian of order 3", "PGammaL(2, 8), meridian of order 6"),
    ]
    for name in ("8_17", "9_32", "9_33", "10_81"):
        braid = knots[name].braid
        assert told_apart(braid, braid.reverse(), groups), name
    assert total(knots["10_81"].braid, groups[2]) > 0


def test_orientations_of_links():
    """Linking numbers show in longitudes: the Hopf link and its mirror image, by 4-cycles of S4.

    The longitude of one component is the other's meridian, or its inverse.
    """
    name = "AGL(1, 5), meridian of order 4"
    assert told_apart(Braid([1, 1]), Braid([-1, -1]), [name])
    assert not told_apart(Braid([1, 1]), Braid([1, 1]).reverse(), [name])


def test_both_words_of_published_links():
    """The two braid words of a row close to one link (LinkInfo), so they have one value."""
    names = ["S4, meridian of order 4", "AGL(1, 7), meridian of order 6"]
    rows = [row for row in iter_links(8) if len(row.braids) == 2][::3]
    assert len(rows) > 30
    for row in rows:
        left, right = row.braids
        assert told_apart(left, right, names) is None, row.name
