"""The ultra summit set of a conjugacy class, orbit by orbit, with minimal simple elements."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, field

from braidsearch.normal_form.conjugation import (
    Conjugators,
    conjugate_by_simple,
    cycle,
    initial_factor,
    inverse_element,
)
from braidsearch.normal_form.left_normal_form import Element, ShouldStop, never
from braidsearch.normal_form.simple_elements import SimpleElements


@dataclass
class Summit:
    """The members of an ultra summit set found from one of them.

    ``parents`` sends each member to the one that it was reached from and the simple element that
    conjugates that one to it (None for the first). ``is_complete`` is False when the walk stopped
    at its cap: then the members are a part of the set only.
    """

    first: Element
    parents: dict[Element, tuple[Element, int] | None] = field(default_factory=dict)
    is_complete: bool = True

    def conjugators_to(self, member: Element) -> Conjugators:
        """The simple elements that conjugate ``first`` to the member, one after the other."""
        path: list[int] = []
        step = self.parents[member]
        while step is not None:
            member, by = step
            path.append(by)
            step = self.parents[member]
        return tuple(reversed(path))


def ultra_summit_set(
    elements: SimpleElements, start: Element, cap: int, should_stop: ShouldStop = never
) -> Summit:
    """Walk the ultra summit set from a member, up to ``cap`` members or until told to stop.

    ``start`` must lie on a cycling orbit of the super summit set (the end of cyclic sliding does).
    One member stands for its orbit under cycling: transport along the orbit is a bijection of the
    arrows, so every orbit next to it is met from there, and its mirror orbit under delta likewise.
    Gebhardt, A new approach to the conjugacy problem in Garside groups, 2005.
    """
    summit = Summit(start, {start: None})
    waiting = [_add_orbit(elements, summit, start, cap)]
    while waiting and summit.is_complete:
        orbit = waiting.pop(0)
        arrows = Arrows(elements, orbit)
        for atom in elements.atoms:
            if len(summit.parents) > cap or should_stop():
                summit.is_complete = False
                break
            arrow = arrows.minimal_arrow(atom)
            if arrow is None:
                continue
            target = conjugate_by_simple(elements, orbit[0], arrow)
            if target not in summit.parents:
                summit.parents[target] = (orbit[0], arrow)
                waiting.append(_add_orbit(elements, summit, target, cap))
    return summit


def _add_orbit(elements: SimpleElements, summit: Summit, start: Element, cap: int) -> list[Element]:
    """Enter the cycling orbit of a new member and its flipped orbit; returns the orbit.

    An orbit that is longer than the cap, or that does not return because ``start`` is not in the
    ultra summit set after all (its sliding was stopped), leaves the summit incomplete.
    """
    orbit = [start]
    following = cycle(elements, start)
    while following != start:
        if following in summit.parents or len(orbit) > cap:
            summit.is_complete = False
            break
        summit.parents[following] = (orbit[-1], initial_factor(elements, orbit[-1]))
        orbit.append(following)
        following = cycle(elements, following)
    for member in orbit:
        infimum, factors = member
        flipped = (infimum, tuple(elements.flip(factor) for factor in factors))
        if flipped not in summit.parents:
            summit.parents[flipped] = (member, elements.delta)
    return orbit


class Arrows:
    """The minimal simple elements that keep one member, ``orbit[0]``, in the ultra summit set."""

    def __init__(self, elements: SimpleElements, orbit: list[Element]) -> None:
        self.elements = elements
        self.orbit = orbit
        self._summit_data = [_SummitData(elements, member) for member in orbit]

    def minimal_arrow(self, atom: int) -> int | None:
        """The least arrow that the atom divides, or None when it is a product of shorter ones."""
        elements = self.elements
        least = self._summit_data[0].least_summit_arrow(atom)
        settled = self._settle(least, self._transport_around)
        if elements.divides(atom, settled):
            return settled
        if settled != elements.identity:
            return None  # a shorter arrow leads part of the way
        pulled = self._settle(atom, self._pull_back_around)
        settled = self._settle(pulled, self._transport_around)
        return settled if elements.divides(atom, settled) else None

    def _settle(self, arrow: int, step: Callable[[int], int]) -> int:
        """The value on the final cycle of the iteration whose index is a multiple of its length."""
        values = [arrow]
        places = {arrow: 0}
        while (arrow := step(arrow)) not in places:
            places[arrow] = len(values)
            values.append(arrow)
        entry = places[arrow]
        length = len(values) - entry
        return values[-(-entry // length) * length]

    def _transport_around(self, arrow: int) -> int:
        """The arrow carried once around the cycling orbit."""
        elements = self.elements
        target = conjugate_by_simple(elements, self.orbit[0], arrow)
        for member in self.orbit:
            if not member[1]:
                return arrow
            head, tail = elements.left_weighted(arrow, initial_factor(elements, target))
            rest = elements.quotient(initial_factor(elements, member), head)
            arrow = elements.product(rest, tail)
            target = cycle(elements, target)
        return arrow

    def _pull_back_around(self, arrow: int) -> int:
        """The least arrow whose transport around the orbit ``arrow`` divides."""
        for position in range(len(self.orbit) - 1, -1, -1):
            arrow = self._pull_back(position, arrow)
        return arrow

    def _pull_back(self, position: int, arrow: int) -> int:
        elements = self.elements
        infimum, factors = self.orbit[position]
        first = initial_factor(elements, self.orbit[position])
        head, tail = elements.left_weighted(first, arrow)
        one = elements.flip(elements.residue(elements.complement(head), tail))
        other = elements.flip_power(arrow, infimum)
        for factor in factors[1:]:
            other = elements.residue(factor, other)
        return self._summit_data[position].least_summit_arrow(elements.join(one, other))


class _SummitData:
    """A member of the super summit set, prepared for asking which conjugates stay in it."""

    def __init__(self, elements: SimpleElements, member: Element) -> None:
        self.elements = elements
        self.member = member
        self.inverse = inverse_element(elements, member)

    def least_summit_arrow(self, arrow: int) -> int:
        """The least multiple of ``arrow`` whose conjugate lies in the super summit set."""
        while True:
            larger = self._keep_infimum(self.member, arrow)
            larger = self._keep_infimum(self.inverse, larger)
            if larger == arrow:
                return arrow
            arrow = larger

    def _keep_infimum(self, element: Element, arrow: int) -> int:
        """The least multiple of ``arrow`` whose conjugate has the infimum of ``element``.

        arrow^-1 * delta^p * X * arrow has infimum p exactly when the flipped arrow divides
        X * arrow; what is missing is the residue.
        """
        elements = self.elements
        infimum, factors = element
        while True:
            missing = elements.flip_power(arrow, infimum)
            for factor in factors:
                missing = elements.residue(factor, missing)
                if missing == elements.identity:
                    return arrow
            missing = elements.residue(arrow, missing)
            if missing == elements.identity:
                return arrow
            arrow = elements.product(arrow, missing)
