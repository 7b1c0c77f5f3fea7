"""The signature of a real quadratic form, from intervals of a given precision."""

from collections.abc import Iterable

import numpy as np
from numpy.typing import NDArray


class IntervalFront:
    """Signs of the pivots of a real quadratic form whose variables come and go.

    Variables are added, squares and products of them are added to the form, and a variable is
    completed when nothing with it will follow; then it is eliminated as soon as a pivot with a
    certain sign is found. ``positive`` and ``negative`` count the pivots. By Sylvester's law of
    inertia the form has at least so many positive and negative squares; it has exactly so many
    if they add up to its rank.

    An entry of the matrix is an integer, in units of 2^-precision; it differs from the true entry
    of the Schur complement by at most ``_error`` units, one bound for all entries.
    """

    def __init__(self, precision: int) -> None:
        self.positive = 0
        self.negative = 0
        self.precision = precision
        self._error = 0
        self._matrix: NDArray[np.object_] = np.zeros((8, 8), dtype=object)
        self._free = list(reversed(range(8)))
        self._waiting: list[int] = []

    @property
    def waiting(self) -> int:
        """How many completed variables have not been eliminated."""
        return len(self._waiting)

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

    def add_terms(self, terms: Iterable[tuple[int, int, int]]) -> None:
        """Add weights, each within one unit of the truth, to entries (first, second) of the matrix.

        The entry (second, first) gets the same. No entry may be named twice.
        """
        for first, second, weight in terms:
            self._matrix[first, second] += weight
            if first != second:
                self._matrix[second, first] += weight
        self._error += 1

    def complete(self, vertex: int) -> None:
        """Say that nothing will be added to this variable, and eliminate what can be."""
        self._waiting.append(vertex)
        while self._eliminate_one():
            pass

    def _eliminate_one(self) -> bool:
        if not self._waiting:
            return False
        best = max(self._waiting, key=lambda vertex: abs(self._matrix[vertex, vertex]))
        if abs(self._matrix[best, best]) > self._error:
            self._eliminate(best)
            return True
        for first in self._waiting:
            for second in self._waiting:
                if first != second and abs(self._matrix[first, second]) > 4 * self._error:
                    self._add_to(first, second)
                    self._eliminate(first)
                    return True
        return False

    def _add_to(self, vertex: int, partner: int) -> None:
        """A change of basis, after which the square of ``vertex`` has a certain sign.

        The squares of both are at most the error E, so the new one, with an error of 4 E, is at
        least twice the product less 2 E, which is more than 6 E.
        """
        self._matrix[vertex] += self._matrix[partner]
        self._matrix[:, vertex] += self._matrix[:, partner]
        self._error *= 4

    def _eliminate(self, vertex: int) -> None:
        """Take the Schur complement.

        With pivot p, column c, both within E of the truth, |c| <= C - E and |p| >= G + E, the
        product of two true c differs from that of ours by at most 2 C E, and dividing by the
        other p changes the quotient by at most C^2 E / (|p| G). Rounding c / p to the precision
        adds as many units as c has, and rounding the products one more.
        """
        pivot = self._matrix[vertex, vertex]
        if pivot > 0:
            self.positive += 1
        else:
            self.negative += 1
        column = self._matrix[:, vertex].copy()
        self._release(vertex)
        column[vertex] = 0
        touched = np.flatnonzero(column)
        if not len(touched):
            largest = self._error
        else:
            column = column[touched]
            scaled = (column << self.precision) // pivot
            products = np.outer(column, scaled) >> self.precision
            self._matrix[np.ix_(touched, touched)] -= products
            largest = max(map(abs, column)) + self._error
        sure = abs(pivot) - self._error
        spread = 2 * largest * self._error // sure
        spread += largest * largest * self._error // (abs(pivot) * sure)
        self._error += spread + (largest >> self.precision) + 4

    def _release(self, vertex: int) -> None:
        self._matrix[vertex] = 0
        self._matrix[:, vertex] = 0
        self._waiting.remove(vertex)
        self._free.append(vertex)
