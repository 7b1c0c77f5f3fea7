"""Conjugacy of braids on 3 strands, with the conjugator, in linear time.

Two braids are conjugate exactly when their exponent sums are equal and their images in Z_2 * Z_3
are conjugate: if g^-1 x g and y have one image they differ by a power of Delta^2, which is central
and has exponent sum 6. Images are conjugate exactly when their cyclically reduced words are
rotations of one another (Magnus, Karrass, Solitar, Combinatorial group theory, 1966, section 4.1).
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import groupby

from braidsearch.three_braids.modular_group import (
    Letters,
    braid_preimage,
    cyclically_reduced,
    inverse_letters,
    least_rotation,
    modular_image,
    multiply_by,
)
from braidsearch.words import Braid


@dataclass(frozen=True, slots=True)
class ThreeBraidClass:
    """A conjugacy class of B_3: the exponent sum, and the cyclic word of the image.

    ``letters`` is the least rotation of the cyclically reduced word, 0 for a, 1 for b and -1 for
    b^-1. Equal values are equal classes.
    """

    exponent_sum: int
    letters: Letters

    @property
    def value(self) -> list[int]:
        """The class as a certificate states it: the exponent sum, then the letters."""
        return [self.exponent_sum, *self.letters]

    @property
    def signs(self) -> Letters:
        """The exponents of b in cyclic order, where a stands between every two of them.

        -1 is s1 and +1 is s2^-1: for these signs in a row the class is that of a full twist to the
        power ``full_twists`` times this alternating word. Empty for the classes of finite order.
        """
        return tuple(letter for letter in self.letters if letter) if len(self.letters) > 1 else ()

    @property
    def full_twists(self) -> int:
        """The power of Delta^2 in front of the alternating word in s1 and s2^-1.

        Murasugi, On closed 3-braids, 1974. Only for classes of infinite order modulo the centre.
        """
        return (self.exponent_sum + sum(self.signs)) // 6

    @property
    def runs(self) -> list[tuple[int, int]]:
        """The signs in cyclic order as runs: pairs of a sign and how often it stands in a row.

        The least rotation begins with a run of -1, so only the last run could go on in the first.
        """
        return [(sign, len(list(run))) for sign, run in groupby(self.signs)]

    def mirror(self) -> ThreeBraidClass:
        """The class with all crossings changed: up to conjugation by a, b becomes b^-1."""
        return _least(-self.exponent_sum, tuple(-letter for letter in self.letters))

    def reverse(self) -> ThreeBraidClass:
        """The class of the words read backwards, which is the cyclic word read backwards.

        Reading backwards is an anti-automorphism of B_3 that fixes s1, s2 and Delta and takes b to
        s2 s1 = a b a^-1; followed by the conjugation by a it fixes both a and b.
        """
        return _least(self.exponent_sum, self.letters[::-1])


@dataclass(frozen=True, slots=True)
class Conjugation:
    """A braid conjugated to the word that names its class.

    The image of the braid is prefix * letters * prefix^-1 for the letters of the class, which are
    a power of ``root`` and of no shorter word.
    """

    conjugacy_class: ThreeBraidClass
    prefix: Letters
    root: Letters


def _least(exponent_sum: int, core: Sequence[int]) -> ThreeBraidClass:
    start, _ = least_rotation(core)
    return ThreeBraidClass(exponent_sum, (*core[start:], *core[:start]))


def conjugate_to_class(braid: Braid) -> Conjugation:
    """The class of a braid on 3 strands, with an element of Z_2 * Z_3 that conjugates to it."""
    core, prefix = cyclically_reduced(modular_image(braid.word))
    start, period = least_rotation(core)
    letters = (*core[start:], *core[:start])
    named = ThreeBraidClass(braid.exponent_sum, letters)
    return Conjugation(named, prefix + core[:start], letters[:period])


def three_braid_class(braid: Braid) -> ThreeBraidClass:
    """The conjugacy class of a braid on 3 strands."""
    return conjugate_to_class(braid).conjugacy_class


def find_three_braid_conjugator(left: Braid, right: Braid) -> Letters | None:
    """A short word ``by`` with right = by^-1 * left * by, or None: they are not conjugate."""
    one, other = conjugate_to_class(left), conjugate_to_class(right)
    if one.conjugacy_class != other.conjugacy_class:
        return None
    back = inverse_letters(other.prefix)
    around = ((), one.root, inverse_letters(one.root))  # the cycle commutes with its root
    ways = [_product(one.prefix, turn, back) for turn in around]
    return braid_preimage(min(ways, key=len))


def _product(*factors: Letters) -> list[int]:
    product: list[int] = []
    for factor in factors:
        multiply_by(product, factor)
    return product
