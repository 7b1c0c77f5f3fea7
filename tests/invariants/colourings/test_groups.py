"""The groups of the ladder are what their names say, and so are the classes."""

import itertools

import pytest

from braidsearch.errors import CapacityError
from braidsearch.invariants.colourings import group_ladder
from braidsearch.invariants.colourings import permutation_groups as groups
from braidsearch.invariants.colourings.class_tables import class_tables
from braidsearch.invariants.colourings.classes import centraliser, conjugates, reach_classes
from braidsearch.invariants.colourings.finite_fields import FiniteField, finite_field
from braidsearch.invariants.colourings.permutations import (
    from_images,
    generated_group,
    inverse,
    order,
)

LADDER = group_ladder()
GROUPS = {colours.name.split(", meridian")[0]: colours.generators for colours in LADDER}
LARGEST_GROUP = 30_000

# Simple groups and their extensions: J. H. Conway, R. T. Curtis, S. P. Norton, R. A. Parker,
# R. A. Wilson, ATLAS of Finite Groups, 1985. Affine groups: q (q - 1) / index times the number of
# field automorphisms; AGL(3, 2): 8 |GL(3, 2)|.
PUBLISHED_ORDERS = {
    **{"S3": 6, "S4": 24, "S5": 120, "S6": 720, "A5": 60, "A6": 360, "A7": 2520},
    **{"PSL(2, 7)": 168, "PGL(2, 7)": 336, "PSL(2, 8)": 504, "PGammaL(2, 8)": 1512},
    **{"PGL(2, 9)": 720, "M10": 720, "PSL(2, 11)": 660, "PGL(2, 11)": 1320},
    **{"PSL(2, 13)": 1092, "PGammaL(2, 16)": 16320, "PSL(2, 27):3": 29484},
    **{"PSL(3, 3)": 5616, "M11": 7920, "Sz(8)": 29120, "AGL(3, 2)": 8 * 168},
    **{"the dihedral group of degree 5": 10, "the dihedral group of degree 7": 14, "7:3": 21},
    **{f"AGL(1, {q})": q * (q - 1) for q in (4, 5, 7, 8, 9)},
    **{"AGammaL(1, 8)": 56 * 3, "AGammaL(1, 16)": 240 * 4, "AGammaL(1, 27)": 27 * 26 * 3},
    **{"AGammaL(1, 32)": 32 * 31 * 5, "2^4:5:4": 16 * 5 * 4, "3^3:13:3": 27 * 13 * 3},
    **{"2^6:9:6": 64 * 9 * 6, "2^6:21:6": 64 * 21 * 6},
}


@pytest.mark.parametrize("q", [2, 3, 4, 5, 7, 8, 9, 16, 25, 27, 49, 125])
def test_fields(q):
    """The axioms: a group under addition, one without 0 under multiplication, distributivity.

    All pairs are tried, and of triples those with the primitive element.
    """
    field, elements = finite_field(q), range(q)
    add, multiply, w = field.add, field.multiply, finite_field(q).primitive_element
    for a, b in itertools.product(elements, repeat=2):
        assert add(a, b) == add(b, a)
        assert multiply(a, b) == multiply(b, a)
        assert add(a, add(b, w)) == add(add(a, b), w)
        assert multiply(a, multiply(b, w)) == multiply(multiply(a, b), w)
        assert multiply(w, add(a, b)) == add(multiply(w, a), multiply(w, b))
        assert field.frobenius(add(a, b)) == add(field.frobenius(a), field.frobenius(b))
    for a in elements:
        assert (add(a, 0), multiply(a, 1), add(a, field.negative(a))) == (a, a, 0)
        assert a == 0 or multiply(a, field.power(a, -1)) == 1
    assert {field.power(w, exponent) for exponent in elements} == set(elements) - {0}


def test_fields_of_prime_order_count_modulo_the_prime():
    """Elements are their residues."""
    field = finite_field(13)
    for a, b in itertools.product(range(13), repeat=2):
        assert field.add(a, b) == (a + b) % 13
        assert field.multiply(a, b) == a * b % 13


def test_what_is_no_field():
    """Orders that are no powers of a prime, too large ones, and the inverse of 0."""
    for q in (0, 1, 6, 12, 100):
        with pytest.raises(ValueError, match="power of a prime"):
            finite_field(q)
    with pytest.raises(CapacityError):
        finite_field(1024)
    with pytest.raises(ZeroDivisionError):
        FiniteField(7, 1).power(0, -1)


@pytest.mark.parametrize("name", GROUPS)
def test_group_orders(name):
    """The order of the group that the generators generate is the published one."""
    group = generated_group(map(from_images, GROUPS[name]), LARGEST_GROUP)
    assert group is not None
    assert len(group) == PUBLISHED_ORDERS[name]


def test_every_published_order_is_asked_for():
    """No name of the table is misspelt."""
    assert PUBLISHED_ORDERS.keys() == GROUPS.keys()


@pytest.mark.parametrize("colours", LADDER, ids=lambda colours: colours.name)
def test_classes_of_the_ladder(colours):
    """Order and class size are as stated, |class| |centraliser| = |group|, and x generates G.

    That is, the conjugates of x do.
    """
    classes = reach_classes(colours)
    meridian = from_images(colours.meridians[0])
    name = colours.name.split(", meridian")[0]
    assert classes.sizes == colours.class_sizes
    assert f"order {order(meridian)}" in colours.name
    assert classes.sizes[0] * len(centraliser(classes, 0).elements) == PUBLISHED_ORDERS[name]
    generated = generated_group(classes.elements, LARGEST_GROUP)
    assert generated is not None
    assert len(generated) == PUBLISHED_ORDERS[name]


def test_the_ladder_rises_and_its_names_differ():
    """Cheapest first, one name for each, and no class twice, nor with that of the inverses."""
    sizes = [sum(colours.class_sizes or ()) for colours in LADDER]
    assert sizes == sorted(sizes)
    assert len({colours.name for colours in LADDER}) == len(LADDER) > 100
    for name, generators in GROUPS.items():
        seen = set()
        for colours in LADDER:
            if colours.generators == generators:
                classes = set(reach_classes(colours).elements)
                assert seen.isdisjoint(classes), name
                seen |= classes | set(map(inverse, classes))


COMPLETE = sorted(GROUPS.keys() - {"AGammaL(1, 32)", "2^6:9:6", "2^6:21:6"})


@pytest.mark.parametrize("name", COMPLETE)
def test_no_generating_class_is_missing(name):
    """Each class of at most 1,000 elements that generates has its order and size in the ladder.

    So those left out are images under automorphisms or under inversion, as far as orders tell.
    Of three groups the classes of other powers of the Frobenius map are left out as well.
    """
    generators = [from_images(generator) for generator in GROUPS[name]]
    group = generated_group(generators, LARGEST_GROUP) or []
    kept = {
        (order(from_images(colours.meridians[0])), *(colours.class_sizes or ()))
        for colours in LADDER
        if colours.generators == GROUPS[name]
    }
    seen = set()
    for element in group:
        if element in seen:
            continue
        found = conjugates(element, generators)
        seen.update(found)
        if 1 < len(found) <= 1000 and (order(element), len(found)) not in kept:
            assert len(generated_group(found, LARGEST_GROUP) or []) < len(group)


NOT_INVERTED = ["M11, meridian of order 11", "M11, meridian of order 8"]


@pytest.mark.parametrize("name", NOT_INVERTED)
def test_elements_of_mathieu_s_group_that_are_not_conjugate_to_their_inverses(name):
    """All automorphisms of M11 are inner (ATLAS), so none inverts them."""
    colours = next(colours for colours in LADDER if colours.name == name)
    classes = reach_classes(colours)
    assert inverse(classes.elements[0]) not in classes.elements


def test_tables_conjugate_as_permutations_do():
    """conjugate, unconjugate and the chains of over arcs, for all pairs of a class of 56."""
    colours = next(c for c in LADDER if c.name == "PSL(2, 7), meridian of order 3")
    arrays, elements = class_tables(colours).arrays, reach_classes(colours).elements
    for o, x in itertools.product(range(len(elements)), repeat=2):
        y = int(arrays.conjugate[o, x])
        assert elements[y] == inverse(elements[o]).translate(elements[x]).translate(elements[o])
        assert arrays.unconjugate[o, y] == x
        chain = [int(arrays.first_over[x, y])]
        while chain[-1] >= 0:
            chain.append(int(arrays.next_over[chain[-1], x]))
        assert o in chain
        assert all(arrays.conjugate[member, x] == y for member in chain[:-1])


def test_tables_are_kept_within_bounds():
    """Old tables go when many are made; what is asked for again is made again, the same."""
    large = [colours for colours in LADDER if sum(colours.class_sizes or ()) > 900]
    first = class_tables(large[0])
    assert class_tables(large[0]) is first
    for colours in LADDER[-20:]:
        class_tables(colours)
    again = class_tables(large[0])
    assert again.entries == first.entries
    assert (again.arrays.conjugate == first.arrays.conjugate).all()


def test_matrices_move_lines_and_vectors():
    """A homomorphism: the map of a product is the product of the maps."""
    field = finite_field(3)
    one, other = ((1, 1, 0), (0, 1, 2), (0, 0, 1)), ((0, 1, 0), (0, 0, 1), (1, 0, 2))
    both = tuple(groups.times_matrix(field, row, other) for row in one)
    for mapped in (groups.line_map, groups.vector_map):
        first, second = (from_images(mapped(field, matrix)) for matrix in (one, other))
        assert first.translate(second) == from_images(mapped(field, both))
