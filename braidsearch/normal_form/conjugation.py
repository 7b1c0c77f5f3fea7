"""Conjugation by simple elements on normal forms: cycling, decycling, cyclic sliding."""

from __future__ import annotations

from braidsearch.normal_form.left_normal_form import (
    Element,
    ShouldStop,
    never,
    push_left,
    push_right,
)
from braidsearch.normal_form.simple_elements import SimpleElements

Conjugators = tuple[int, ...]
"""Simple elements by which to conjugate one after the other: their product, left to right."""


def conjugate_by_simple(elements: SimpleElements, element: Element, by: int) -> Element:
    """by^-1 * element * by, using by^-1 = complement(by) * delta^-1."""
    infimum, factors = element
    product = list(factors)
    infimum += push_right(elements, product, by)
    front = elements.flip_power(elements.complement(by), infimum - 1)
    product = push_left(elements, front, product)
    infimum -= 1
    first = 0
    while first < len(product) and product[first] == elements.delta:
        first += 1
    return infimum + first, tuple(product[first:])


def initial_factor(elements: SimpleElements, element: Element) -> int:
    """The first factor with the delta power moved behind it: what cycling conjugates by."""
    infimum, factors = element
    return elements.flip_power(factors[0], infimum)


def cycle(elements: SimpleElements, element: Element) -> Element:
    """Move the initial factor to the end: conjugation by it (Elrifai, Morton, 1994)."""
    infimum, factors = element
    if not factors:
        return element
    product = list(factors[1:])
    infimum += push_right(elements, product, elements.flip_power(factors[0], infimum))
    return infimum, tuple(product)


def preferred_prefix(elements: SimpleElements, element: Element) -> int:
    """The conjugator of cyclic sliding: the initial factor met with the last one's complement."""
    if not element[1]:
        return elements.identity
    first, last = initial_factor(elements, element), element[1][-1]
    return elements.meet(first, elements.complement(last))


def slide(elements: SimpleElements, element: Element) -> tuple[Element, int]:
    """One cyclic sliding, with its conjugator.

    Gebhardt, Gonzalez-Meneses, The cyclic sliding operation in Garside groups, 2010: iterated, it
    ends in a circuit, whose members have the greatest infimum and the least supremum of the class.
    """
    prefix = preferred_prefix(elements, element)
    if prefix == elements.identity:
        return element, prefix
    return conjugate_by_simple(elements, element, prefix), prefix


def slide_to_circuit(
    elements: SimpleElements, element: Element, should_stop: ShouldStop = never
) -> tuple[Element, Conjugators]:
    """A member of the sliding circuit at the end, with the conjugators that lead there.

    A walk that is stopped early returns the conjugate that it has reached.
    """
    places: dict[Element, int] = {}
    conjugators: list[int] = []
    while element not in places:
        if should_stop():
            return element, tuple(conjugators)
        places[element] = len(conjugators)
        element, prefix = slide(elements, element)
        if prefix == elements.identity:
            break
        conjugators.append(prefix)
    return element, tuple(conjugators[: places[element]])


def inverse_element(elements: SimpleElements, element: Element) -> Element:
    """The normal form of the inverse: complements in the opposite order, flipped to fit."""
    infimum, factors = element
    inverse = [
        elements.flip_power(elements.complement(factor), infimum + position + 1)
        for position, factor in enumerate(factors)
    ]
    return -infimum - len(factors), tuple(reversed(inverse))


def conjugator_word(elements: SimpleElements, conjugators: Conjugators) -> tuple[int, ...]:
    """The product of the conjugators as a positive word."""
    return tuple(letter for element in conjugators for letter in elements.word(element))
