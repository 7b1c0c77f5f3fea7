"""The Garside left normal form of one braid: delta^infimum followed by left-weighted factors."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Sequence
from dataclasses import dataclass

from braidsearch.errors import OutOfTimeError
from braidsearch.normal_form.simple_elements import (
    Permutation,
    SimpleElements,
    invert,
    permutation_word,
    simple_elements,
)
from braidsearch.words import Braid
from braidsearch.words.reduction import free_reduce_letters

_FACTORS_A_QUESTION = 16

ShouldStop = Callable[[], bool]
"""Asked between steps: whether a long computation should end before its end."""

Element = tuple[int, tuple[int, ...]]
"""A braid as the inner loops hold it: the infimum, and the names of the simple factors."""


def never() -> bool:
    """Computations that are to end by themselves ask this."""
    return False


@dataclass(frozen=True)
class NormalForm:
    """Delta^infimum times simple factors, each as long as it can be: unique for a braid.

    ``factors`` are permutations: the strand that starts at position i (from 0) of the factor ends
    at position factor[i]. No factor is the identity or the half twist delta.
    """

    strands: int
    infimum: int
    factors: tuple[Permutation, ...]

    @property
    def supremum(self) -> int:
        """The infimum plus the number of factors."""
        return self.infimum + len(self.factors)

    def to_braid(self) -> Braid:
        """A word for the normal form, negative powers of delta worked into the factors."""
        elements = simple_elements(self.strands)
        names = tuple(elements.number(factor) for factor in self.factors)
        return Braid.trusted(element_word(elements, (self.infimum, names)), self.strands)

    def __str__(self) -> str:
        factors = (" ".join(map(str, permutation_word(factor))) for factor in self.factors)
        return " | ".join([f"delta^{self.infimum}", *factors])


def left_normal_form(braid: Braid) -> NormalForm:
    """The left normal form of the braid, by insertion of one simple factor after the other.

    Epstein and others, Word processing in groups, 1992, chapter 9. Cost: at most quadratic in the
    number of letters.
    """
    elements = simple_elements(braid.strands)
    infimum, names = element_of_word(elements, braid.word)
    factors = tuple(elements.permutations[name] for name in names)
    return NormalForm(braid.strands, infimum, factors)


def are_equal(left: Braid, right: Braid, should_stop: ShouldStop = never) -> bool:
    """Whether two words are the same element of the braid group on the same strands.

    What both begin and end with, freely reduced, is left out of the comparison. Raises
    OutOfTimeError when ``should_stop`` says so on the way.
    """
    if left.strands != right.strands:
        return False
    one, other = _without_common_ends(
        free_reduce_letters(left.word), free_reduce_letters(right.word)
    )
    if one == other:
        return True
    elements = simple_elements(left.strands)
    first = element_of_word(elements, one, should_stop)
    return first == element_of_word(elements, other, should_stop)


def _without_common_ends(one: list[int], other: list[int]) -> tuple[list[int], list[int]]:
    shorter = min(len(one), len(other))
    start = next((i for i in range(shorter) if one[i] != other[i]), shorter)
    room = shorter - start
    end = next((i for i in range(room) if one[-1 - i] != other[-1 - i]), room)
    return one[start : len(one) - end], other[start : len(other) - end]


def element_of_word(
    elements: SimpleElements, word: Sequence[int], should_stop: ShouldStop = never
) -> Element:
    """The normal form of a word, in the names that the inner loops use.

    Raises OutOfTimeError when ``should_stop`` says so on the way.
    """
    infimum, sequence = simple_sequence(elements, word)
    factors: list[int] = []
    for place, factor in enumerate(sequence):
        infimum += push_right(elements, factors, factor)
        if place % _FACTORS_A_QUESTION == 0 and should_stop():
            raise OutOfTimeError("a normal form was not finished in time")
    return infimum, tuple(factors)


def simple_sequence(elements: SimpleElements, word: Sequence[int]) -> tuple[int, list[int]]:
    """The word as delta^k times simple factors, not yet left-weighted: k <= 0 and the factors.

    A run of negative letters is s^-1 for a simple s, which is delta^-1 times a simple element;
    moving each delta^-1 to the front flips every factor that it passes.
    """
    blocks = list(_iter_blocks(elements.strands, word))
    negatives = 0
    factors = []
    for positive, permutation in reversed(blocks):
        name = elements.number(permutation)
        if not positive:
            name = elements.left_complement(name)
        factors.append(elements.flip_power(name, negatives))
        negatives += not positive
    factors.reverse()
    return -negatives, factors


def _iter_blocks(strands: int, word: Sequence[int]) -> Iterable[tuple[bool, Permutation]]:
    """Cut the word, greedily, into simple elements and inverses of simple elements.

    The array is the inverse permutation of a positive block, and the permutation itself of the
    simple element whose inverse a negative block is: either way one more letter of the same
    sign is a swap that puts a crossing in, and one of the other sign a swap that takes it out.
    """
    identity = list(range(strands))
    array, positive = identity[:], True
    for letter in word:
        index = abs(letter)
        is_sorted = array[index - 1] < array[index]
        if is_sorted != ((letter > 0) == positive):  # else the letter fits, or cancels
            if array != identity:
                yield positive, invert(tuple(array)) if positive else tuple(array)
                array = identity[:]
            positive = letter > 0
        array[index - 1], array[index] = array[index], array[index - 1]
    if array != identity:
        yield positive, invert(tuple(array)) if positive else tuple(array)


def push_right(elements: SimpleElements, factors: list[int], factor: int) -> int:
    """Multiply left-weighted factors on the right, in place; returns how many deltas came out."""
    weigh, identity = elements.left_weighted, elements.identity
    position = len(factors)
    factors.append(factor)
    while position:
        left, right = factors[position - 1], factors[position]
        new_left, new_right = weigh(left, right)
        if new_left == left:
            break
        factors[position - 1], factors[position] = new_left, new_right
        position -= 1
    if factors[-1] == identity:
        factors.pop()
    if factors and factors[0] == elements.delta:
        del factors[0]
        return 1
    return 0


def push_left(elements: SimpleElements, factor: int, factors: Sequence[int]) -> list[int]:
    """Multiply left-weighted factors on the left by a simple element (deltas stay in front)."""
    weigh, identity = elements.left_weighted, elements.identity
    product: list[int] = []
    carried = factor
    for following in factors:
        first, carried = weigh(carried, following)
        product.append(first)
    if carried != identity:
        product.append(carried)
    return product


def element_word(elements: SimpleElements, element: Element) -> tuple[int, ...]:
    """A word for the normal form: delta^-1 x is the inverse of the complement of x."""
    infimum, factors = element
    letters: list[int] = []
    for position, factor in enumerate(factors):
        below = -infimum - position  # this many negative deltas still wait at this place
        if below > 0:
            waiting = elements.complement(elements.flip_power(factor, below - 1))
            letters.extend(-letter for letter in reversed(elements.word(waiting)))
        else:
            letters.extend(elements.word(factor))
    half_twist = elements.word(elements.delta)
    if infimum > 0:
        return half_twist * infimum + tuple(letters)
    surplus = max(-infimum - len(factors), 0)
    return tuple(letters) + tuple(-letter for letter in reversed(half_twist)) * surplus
