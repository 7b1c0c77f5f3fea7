"""The signature of a closed braid, from the Goeritz form of its diagram."""

import numpy as np
from numpy.typing import NDArray

from braidsearch.errors import CapacityError
from braidsearch.invariants.pieces import closure_pieces
from braidsearch.words.braid import Braid

_LARGEST_WORK = 3 * 10**10


def link_signature(braid: Braid) -> int:
    """The signature of the closure; the right-handed trefoil, closure of 1 1 1, has -2.

    The sign is that of V + V^T for a Seifert matrix V whose positive crossings count negative.
    The signature of a split union is the sum over its parts, so unlinks have 0.

    Raises CapacityError where the elimination would be too long.
    """
    return sum(_signature_of_factor(factor) for factor in closure_pieces(braid).factors)


def estimated_cost(braid: Braid) -> float:
    """Seconds that ``link_signature`` needs, to within a factor of a few."""
    factors = closure_pieces(braid).factors
    return 2e-5 + sum(5e-6 * len(factor) + 4e-9 * _work(factor) for factor in factors)


def is_applicable(braid: Braid) -> bool:
    """Whether ``link_signature`` answers for this braid."""
    return sum(map(_work, closure_pieces(braid).factors)) <= _LARGEST_WORK


def _work(braid: Braid) -> int:
    return len(braid) * braid.strands**2 * (10 + len(braid) // 60)


def _signature_of_factor(braid: Braid) -> int:
    """The signature of the Goeritz form, corrected.

    The regions of the diagram in even columns (column i lies between strand positions i and
    i + 1, column 0 inside all strands) carry the form: a letter of sign e in an even column
    joins the regions u above and w below it and adds -e (x_u - x_w)^2; in an odd column it joins
    the regions to its left and right and adds e (x_u - x_w)^2; the innermost region has x = 0.
    The signature of the link is the signature of this form minus the sum of the signs of the
    letters in odd columns: at these the surface that fills the odd columns has its two sides
    running the same way, so they make up its normal Euler number (Gordon, Litherland, On the
    signature of a link, 1978).
    """
    if _work(braid) > _LARGEST_WORK:
        raise CapacityError(
            f"the signature of {len(braid)} letters on {braid.strands} strands: "
            "expected a shorter word or fewer strands"
        )
    front = SymmetricFront()
    around = [front.add_vertex() if column % 2 == 0 else -1 for column in range(braid.strands + 1)]
    front.ground(around[0])
    _add_letters(front, braid, around)
    for vertex in around[2::2]:
        front.complete(vertex)
    return front.signature - sum(1 if letter > 0 else -1 for letter in braid.word if letter % 2)


def _add_letters(front: "SymmetricFront", braid: Braid, around: list[int]) -> None:
    """Add each letter's square; ``around`` are the regions that reach around the closure."""
    last = {abs(letter): place for place, letter in enumerate(braid.word)}
    current = list(around)
    for place, letter in enumerate(braid.word):
        column, sign = abs(letter), 1 if letter > 0 else -1
        if column % 2:
            front.add_square(current[column - 1], current[column + 1], sign)
            continue
        above = current[column]
        # The last region of a column is its first, around the closure.
        current[column] = around[column] if place == last[column] else front.add_vertex()
        front.add_square(above, current[column], -sign)
        if above != around[column]:
            front.complete(above)


class SymmetricFront:
    """The signature of an integer quadratic form whose variables come and go.

    Variables are added, squares (x_u - x_w)^2 are added to the form, and a variable is completed
    when no square with it will follow; then it is eliminated as soon as a pivot allows. Only the
    variables in between are kept, so a form of small width costs little.

    The matrix kept is the Schur complement times the last pivot: its entries are minors of the
    integer matrix of the form, and every division is exact (Bareiss, Sylvester's identity and
    multistep integer-preserving Gaussian elimination, 1968).
    """

    def __init__(self) -> None:
        self.signature = 0
        self._previous = 1
        self._matrix: NDArray[np.object_] = np.zeros((4, 4), dtype=object)
        self._free = [3, 2, 1, 0]
        self._grounded = -1
        self._waiting: set[int] = set()

    def add_vertex(self) -> int:
        """A new variable, named by an integer that is free for use again once eliminated."""
        if not self._free:
            size = len(self._matrix)
            # np.pad would bring in fixed-width zeros, and with them fixed-width sums.
            larger = np.zeros((2 * size, 2 * size), dtype=object)
            larger[:size, :size] = self._matrix
            self._matrix = larger
            self._free = list(reversed(range(size, 2 * size)))
        return self._free.pop()

    def ground(self, vertex: int) -> None:
        """Set a variable to zero: squares with it count for the other variable alone."""
        self._grounded = vertex

    def add_square(self, first: int, second: int, weight: int) -> None:
        """Add weight * (x_first - x_second)^2 to the form."""
        scaled = weight * self._previous
        ends = [vertex for vertex in (first, second) if vertex != self._grounded]
        if first == second:
            return
        for vertex in ends:
            self._matrix[vertex, vertex] += scaled
        if len(ends) == 2:
            self._matrix[first, second] -= scaled
            self._matrix[second, first] -= scaled

    def complete(self, vertex: int) -> None:
        """Say that no further square holds this variable, and eliminate what can be."""
        self._waiting.add(vertex)
        while self._eliminate_one():
            pass

    def _eliminate_one(self) -> bool:
        for vertex in sorted(self._waiting):
            if self._matrix[vertex, vertex]:
                self._eliminate(vertex)
                return True
        for vertex in sorted(self._waiting):
            others = np.flatnonzero(self._matrix[vertex])
            if not len(others):  # a zero row: the form does not see the variable
                self._release(vertex)
                return True
            partner = next((other for other in others if other in self._waiting), None)
            if partner is not None:
                # Both squares are absent: x_vertex x_partner gives one after a change of basis.
                self._matrix[vertex] += self._matrix[partner]
                self._matrix[:, vertex] += self._matrix[:, partner]
                self._eliminate(vertex)
                return True
        return False

    def _eliminate(self, vertex: int) -> None:
        pivot = self._matrix[vertex, vertex]
        self.signature += 1 if (pivot > 0) == (self._previous > 0) else -1
        column = self._matrix[:, vertex].copy()
        self._matrix = (pivot * self._matrix - np.outer(column, column)) // self._previous
        self._previous = pivot
        self._release(vertex)

    def _release(self, vertex: int) -> None:
        self._matrix[vertex] = 0
        self._matrix[:, vertex] = 0
        self._waiting.discard(vertex)
        self._free.append(vertex)
