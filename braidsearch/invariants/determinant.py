"""The determinant of a closed braid, from the colourings of its diagram."""

import numpy as np
from numpy.typing import NDArray

from braidsearch.errors import CapacityError
from braidsearch.invariants.pieces import closure_pieces
from braidsearch.words.braid import Braid

_LARGEST_WORK = 10**9


def link_determinant(braid: Braid) -> int:
    """The determinant |Delta(-1)| of the closure, 1 for the unknot and 0 for a split link.

    Raises CapacityError where the elimination would be too long.
    """
    pieces = closure_pieces(braid)
    if pieces.splits:
        return 0
    result = 1
    for factor in pieces.factors:
        result *= _determinant_of_factor(factor)
    return result


def estimated_cost(braid: Braid) -> float:
    """Seconds that ``link_determinant`` needs, to within a factor of a few."""
    pieces = closure_pieces(braid)
    return 1e-5 + 1e-7 * sum(map(_work, pieces.factors)) * (not pieces.splits)


def is_applicable(braid: Braid) -> bool:
    """Whether ``link_determinant`` answers for this braid."""
    pieces = closure_pieces(braid)
    return bool(pieces.splits) or sum(map(_work, pieces.factors)) <= _LARGEST_WORK


def _work(braid: Braid) -> int:
    return braid.strands**3 // 3 + len(braid) * (braid.strands + len(braid) // 60)


def _determinant_of_factor(braid: Braid) -> int:
    """A first minor of the matrix that takes the colours above the braid to those below it, less 1.

    Colour the arcs of a diagram so that at each crossing the two arcs below add to twice the arc
    above (Fox). The braid takes the colours of its strands at the top to those at the bottom by
    an integer matrix B, and B - 1 presents the group of colourings. Its rows have the relation
    (1, -1, 1, ...) and its columns the sum zero, both with units only, so all first minors are
    equal up to sign; they are the determinant of the link.
    """
    if _work(braid) > _LARGEST_WORK:
        raise CapacityError(
            f"the determinant of {len(braid)} letters on {braid.strands} strands: "
            "expected a shorter word or fewer strands"
        )
    colours = list(np.eye(braid.strands, dtype=object)[:, 1:])
    for letter in braid.word:
        left, right = colours[abs(letter) - 1], colours[abs(letter)]
        if letter > 0:
            colours[letter - 1 : letter + 1] = [2 * left - right, left]
        else:
            colours[-letter - 1 : -letter + 1] = [right, 2 * right - left]
    matrix = np.array(colours[1:], dtype=object)
    return abs(fraction_free_determinant(matrix - np.eye(len(matrix), dtype=object)))


def fraction_free_determinant(matrix: NDArray[np.object_]) -> int:
    """The determinant of a square matrix of Python integers, shape (m, m), exactly.

    Every entry met is a minor of the matrix, and every division is exact (Bareiss, Sylvester's
    identity and multistep integer-preserving Gaussian elimination, 1968).
    """
    rest = matrix.copy()
    sign, previous = 1, 1
    while len(rest) > 1:
        pivots = np.flatnonzero(rest[:, 0])
        if not len(pivots):
            return 0
        if pivots[0]:
            rest[[0, pivots[0]]] = rest[[pivots[0], 0]]
            sign = -sign
        pivot = rest[0, 0]
        crossed = np.outer(rest[1:, 0], rest[0, 1:])
        rest = (pivot * rest[1:, 1:] - crossed) // previous
        previous = pivot
    return sign * int(rest[0, 0]) if len(rest) else 1
