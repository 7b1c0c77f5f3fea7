"""The groups that links are coloured with, cheapest first.

Chosen are small groups of several kinds, and of each group the classes of at most 1,000 elements
(of Suzuki's, 2,000, since all its elements of odd order are conjugate to their inverses) whose
members generate it: any other class colours a link with a proper subgroup alone, which is better
asked by itself. Of classes that an automorphism of the group takes into each other one is
kept, since their colourings correspond; of a class and that of its inverses one, since colourings
by the one are the colourings of the reversed link by the other. Nothing here knows any link.

To tell a link from its reverse a group is needed in which no automorphism inverts the meridian
and whatever commutes with it, as longitudes do. Where a meridian acts on a field by the Frobenius
map and its order there is more than 2, none does: it would invert a generator of the cyclic
quotient by the linear maps, on which automorphisms act trivially. All automorphisms of M11 are
inner, and its elements of order 8 and 11 are not conjugate to their inverses; those of order 4
are, but not together with the elements of order 8 whose squares they are. In Sz(8) elements of
order 4 are not conjugate to their inverses, and its automorphisms beyond the inner ones have odd
order, so they cannot trade two classes.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from functools import lru_cache

from braidsearch.invariants.colourings import permutation_groups as groups
from braidsearch.invariants.colourings.colours import Colours, Images
from braidsearch.invariants.colourings.finite_fields import finite_field
from braidsearch.invariants.colourings.permutations import from_images, images, product

Group = tuple[Images, ...]
Meridians = Iterator[tuple[int, int, Images]]
"""Orders, class sizes and elements."""


@lru_cache(maxsize=1)
def group_ladder() -> Sequence[Colours]:
    """All colours, by the number of conjugates of the meridian.

    The groups are made when this is first called, in some hundredths of a second; tables of
    their classes are made when colourings are counted.
    """
    found = [
        colours
        for family in _FAMILIES
        for name, group, meridians in family()
        for colours in _named(name, group, meridians)
    ]
    return tuple(sorted(found, key=lambda colours: colours.class_sizes or ()))


def _named(name: str, group: Group, meridians: Meridians) -> Iterator[Colours]:
    """Colours for each meridian; those of one order are told apart by a number."""
    found = list(meridians)
    orders = [order for order, _, _ in found]
    for place, (order, size, meridian) in enumerate(found):
        title = f"{name}, meridian of order {order}"
        if orders.count(order) > 1:
            title += f", class {orders[: place + 1].count(order)}"
        yield Colours(title, group, (meridian,), (size,))


Family = Iterator[tuple[str, Group, Meridians]]


def _symmetric() -> Family:
    """Cycle types of odd permutations; S6 has an automorphism that trades some of its types."""
    cases: dict[int, list[tuple[int, int, tuple[int, ...]]]] = {
        3: [(2, 3, (2,))],
        4: [(2, 6, (2,)), (4, 6, (4,))],
        5: [(2, 10, (2,)), (6, 20, (2, 3)), (4, 30, (4,))],
        6: [(2, 15, (2,)), (4, 90, (4,)), (6, 120, (6,))],
    }
    for degree, types in cases.items():
        yield f"S{degree}", groups.symmetric_group(degree), _of_cycle_types(degree, types)


def _alternating() -> Family:
    cases: dict[int, list[tuple[int, int, tuple[int, ...]]]] = {
        5: [(5, 12, (5,)), (2, 15, (2, 2)), (3, 20, (3,))],
        6: [(3, 40, (3,)), (2, 45, (2, 2)), (5, 72, (5,)), (4, 90, (4, 2))],
        7: [
            *((3, 70, (3,)), (2, 105, (2, 2)), (6, 210, (2, 2, 3)), (3, 280, (3, 3))),
            *((7, 360, (7,)), (5, 504, (5,)), (4, 630, (4, 2))),
        ],
    }
    for degree, types in cases.items():
        yield f"A{degree}", groups.alternating_group(degree), _of_cycle_types(degree, types)


def _of_cycle_types(degree: int, types: list[tuple[int, int, tuple[int, ...]]]) -> Meridians:
    for order, size, lengths in types:
        yield order, size, groups.cycles(degree, *lengths)


def _affine() -> Family:
    """Maps t -> w^k t^(p^i) + b of a field; w is its primitive element.

    A row has the name, the order q of the field, the index of the factors in the multiplicative
    group, the power i, and meridians (order, class size, k, b). The name q:m:f says that m
    factors and f powers of the Frobenius map occur.
    """
    rows: list[tuple[str, int, int, int, list[tuple[int, int, int, int]]]] = [
        ("AGL(1, 4)", 4, 1, 0, [(3, 4, 1, 0)]),
        ("the dihedral group of degree 5", 5, 2, 0, [(2, 5, 2, 0)]),
        ("AGL(1, 5)", 5, 1, 0, [(4, 5, 1, 0)]),
        ("the dihedral group of degree 7", 7, 3, 0, [(2, 7, 3, 0)]),
        ("7:3", 7, 2, 0, [(3, 7, 2, 0)]),
        ("AGL(1, 7)", 7, 1, 0, [(6, 7, 1, 0)]),
        ("AGL(1, 8)", 8, 1, 0, [(7, 8, 1, 0)]),
        ("AGL(1, 9)", 9, 1, 0, [(8, 9, 1, 0)]),
        ("AGammaL(1, 8)", 8, 1, 1, [(3, 28, 0, 0), (6, 28, 0, 1)]),
        ("2^4:5:4", 16, 3, 1, [(4, 40, 0, 0), (8, 40, 0, 2)]),
        ("AGammaL(1, 16)", 16, 1, 1, [(4, 120, 0, 0), (8, 120, 0, 2)]),
        ("3^3:13:3", 27, 2, 1, [(3, 117, 0, 0), (9, 117, 0, 3), (9, 117, 0, 6)]),
        ("AGammaL(1, 27)", 27, 1, 1, [(6, 351, 1, 0)]),
        ("AGammaL(1, 32)", 32, 1, 1, [(5, 496, 0, 0), (10, 496, 0, 1)]),
        ("2^6:9:6", 64, 7, 1, [(6, 288, 0, 0), (12, 288, 0, 2)]),
        ("2^6:21:6", 64, 3, 1, [(6, 672, 0, 0), (12, 672, 0, 2)]),
    ]
    for name, q, index, frobenius, found in rows:
        yield name, groups.affine_group(q, index, frobenius), _affine_meridians(q, frobenius, found)


def _affine_meridians(q: int, frobenius: int, found: list[tuple[int, int, int, int]]) -> Meridians:
    field = finite_field(q)
    for order, size, exponent, shift in found:
        factor = field.power(field.primitive_element, exponent)
        yield order, size, groups.affine_map(field, factor, shift, frobenius)


# Elements of the projective line's groups: (a, b, c, d) stands for t -> (a s + b) / (c s + d),
# with s = t or the Frobenius map's t^p. These two make them from what they are.
_Moebius = tuple[int, int, int, int]
_SHIFT: _Moebius = (1, 1, 0, 1)
_FIXED: _Moebius = (1, 0, 0, 1)


def _times(q: int, exponent: int) -> _Moebius:
    """The map s -> w^exponent s."""
    field = finite_field(q)
    return field.power(field.primitive_element, exponent), 0, 0, 1


def _companion(q: int, determinant: int, trace: int) -> _Moebius:
    """The map s -> -determinant / (s + trace)."""
    return 0, finite_field(q).negative(determinant), 1, trace


def _projective() -> Family:
    """Rows as of ``_affine``; index 2 is PSL(2, q), index 1 PGL(2, q), and i = 1 adds Frobenius."""
    shift, fixed, times, companion = _SHIFT, _FIXED, _times, _companion
    rows: list[tuple[str, int, int, int, list[tuple[int, int, _Moebius]]]] = [
        (
            *("PSL(2, 7)", 7, 2, 0),
            [
                *((2, 21, companion(7, 1, 0)), (7, 24, shift)),
                *((4, 42, companion(7, 1, 3)), (3, 56, times(7, 2))),
            ],
        ),
        (
            *("PGL(2, 7)", 7, 1, 0),
            [
                *((2, 28, times(7, 3)), (8, 42, companion(7, 3, 1))),
                *((8, 42, companion(7, 3, 2)), (6, 56, times(7, 1))),
            ],
        ),
        (
            *("PSL(2, 8)", 8, 1, 0),
            [
                *((3, 56, companion(8, 1, 1)), (9, 56, companion(8, 1, 3))),
                *((2, 63, shift), (7, 72, times(8, 1))),
            ],
        ),
        (
            *("PGammaL(2, 8)", 8, 1, 1),
            [(3, 84, fixed), (9, 168, companion(8, 1, 3)), (6, 252, shift)],
        ),
        (
            *("PGL(2, 9)", 9, 1, 0),
            [(2, 36, companion(9, 3, 0)), (10, 72, companion(9, 3, 1)), (8, 90, times(9, 1))],
        ),
        (
            *("PSL(2, 11)", 11, 2, 0),
            [
                *((2, 55, companion(11, 1, 0)), (11, 60, shift), (3, 110, companion(11, 1, 1))),
                *((6, 110, companion(11, 1, 5)), (5, 132, times(11, 2)), (5, 132, times(11, 4))),
            ],
        ),
        (
            *("PGL(2, 11)", 11, 1, 0),
            [
                *((2, 66, times(11, 5)), (4, 110, companion(11, 2, 2))),
                *((12, 110, companion(11, 2, 4)), (12, 110, companion(11, 2, 5))),
                *((10, 132, times(11, 1)), (10, 132, times(11, 3))),
            ],
        ),
        (
            *("PSL(2, 13)", 13, 2, 0),
            [
                *((13, 84, shift), (2, 91, times(13, 6)), (7, 156, companion(13, 1, 3))),
                *((7, 156, companion(13, 1, 5)), (7, 156, companion(13, 1, 6))),
                *((3, 182, times(13, 4)), (6, 182, times(13, 2))),
            ],
        ),
        ("PGammaL(2, 16)", 16, 1, 1, [(4, 680, fixed)]),
        ("PSL(2, 27):3", 27, 2, 1, [(3, 819, fixed)]),
    ]
    for name, q, index, frobenius, found in rows:
        group = groups.projective_group(q, index, frobenius)
        yield name, group, _projective_meridians(q, frobenius, found)
    yield _mathieu_group_10()


def _projective_meridians(
    q: int, frobenius: int, found: list[tuple[int, int, _Moebius]]
) -> Meridians:
    for order, size, entries in found:
        yield order, size, groups.moebius_map(finite_field(q), entries, frobenius)


def _mathieu_group_10() -> tuple[str, Group, Meridians]:
    """M10: PSL(2, 9) and the maps of the Frobenius map with determinants that are no squares."""
    field = finite_field(9)
    found = [(8, 90, _companion(9, 6, 0)), (4, 180, _times(9, 1))]
    group = (
        *groups.projective_group(9),
        groups.moebius_map(field, _times(9, 1), 1),
    )
    return "M10", group, _projective_meridians(9, 1, found)


def _linear() -> Family:
    """Affine maps of a vector space, and a projective plane: matrices by their companion rows."""
    cube, last = ((0, 1, 0), (0, 0, 1)), (0, 0, 1)
    swap: groups.Matrix = ((1, 0, 0), (0, 0, 1), (0, 1, 0))
    affine: list[tuple[int, int, groups.Matrix, groups.Vector]] = [
        (2, 42, swap, (0, 0, 0)),
        (4, 84, swap, last),
        (4, 168, (*cube, (1, 1, 1)), (0, 0, 0)),
        (7, 192, (*cube, (1, 0, 1)), (0, 0, 0)),
        (3, 224, (*cube, (1, 0, 0)), (0, 0, 0)),
        (6, 224, (*cube, (1, 0, 0)), last),
    ]
    field = finite_field(2)
    yield (
        "AGL(3, 2)",
        groups.affine_special_group(2, 3),
        (
            (order, size, groups.vector_map(field, matrix, shift))
            for order, size, matrix, shift in affine
        ),
    )
    plane: list[tuple[int, int, groups.Matrix]] = [
        (3, 104, ((1, 1, 0), (0, 1, 0), (0, 0, 1))),
        (2, 117, ((1, 0, 0), (0, 2, 0), (0, 0, 2))),
        (13, 432, (*cube, (1, 0, 2))),
        (13, 432, (*cube, (1, 1, 1))),
        (3, 624, (*cube, (1, 0, 0))),
        (8, 702, (*cube, (1, 0, 1))),
        (4, 702, (*cube, (1, 2, 1))),
        (6, 936, (*cube, (1, 1, 2))),
    ]
    yield (
        "PSL(3, 3)",
        groups.projective_special_group(3, 3),
        ((order, size, groups.line_map(finite_field(3), matrix)) for order, size, matrix in plane),
    )


def _mathieu() -> Family:
    """M11: a of order 11 and b of order 4 generate it; meridians are words in them."""
    group = groups.mathieu_group_11()
    a, b = map(from_images, group)
    words = [
        (2, 165, (b, b)),
        (3, 440, (a, b, b)),
        (11, 720, (a,)),
        (4, 990, (b,)),
        (8, 990, (a, a, b)),
    ]
    yield "M11", group, ((order, size, images(product(*word), 11)) for order, size, word in words)


def _suzuki() -> Family:
    """Sz(8): (x, y) -> (x, y + 1) is an involution, (x, y) -> (x + 1, y + x) has order 4."""
    group = groups.suzuki_group(8)
    yield "Sz(8)", group, iter([(2, 455, group[1]), (4, 1820, group[0])])


_FAMILIES = (_symmetric, _alternating, _affine, _projective, _linear, _mathieu, _suzuki)
