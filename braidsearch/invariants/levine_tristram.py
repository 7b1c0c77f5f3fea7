"""Levine-Tristram signatures of a closed braid: exact, from Kashaev's form and the Burau matrix."""

from collections.abc import Iterator
from math import gcd, log2

from braidsearch.errors import CapacityError, InputError
from braidsearch.invariants.interval_front import IntervalFront
from braidsearch.invariants.pieces import closure_pieces
from braidsearch.invariants.roots_of_unity import fixed_point_cosine, root_modulo_prime, totient
from braidsearch.words.braid import Braid

LARGEST_ORDER = 60
_LARGEST_COST = 3e3
_FIRST_BITS = 64
_MOST_GROWTH = 500


def levine_tristram_signature(braid: Braid, order: int, power: int) -> list[int]:
    """The signature and the nullity of the closure at omega = exp(2 pi i power / order).

    Those of (1 - omega) V + (1 - 1/omega) V^T for a Seifert matrix V of a connected surface
    (Levine, Invariants of knot cobordism, 1969; Tristram, Some cobordism invariants for links,
    1969), with the sign of ``link_signature``, which is that at omega = -1: the right-handed
    trefoil has -2 and 0 there. An unlink of m circles has signature 0 and nullity m - 1.

    Both add up over connected sums; a split union has one more in the nullity, for the tube that
    connects its surfaces.

    Raises InputError unless 2 <= order <= 60, 1 <= power < order and the two are coprime, and
    CapacityError where the elimination would be too long.
    """
    _check_root(order, power)
    if not is_applicable(braid, order):
        raise CapacityError(
            f"the Levine-Tristram signature of {len(braid)} letters on {braid.strands} strands: "
            "expected a shorter word or fewer strands"
        )
    pieces = closure_pieces(braid)
    signature, nullity = 0, pieces.splits
    for factor in pieces.factors:
        own_nullity = nullity_at_root(factor, order)
        signature += _signature_of_factor(factor, order, power, own_nullity)
        nullity += own_nullity
    return [signature, nullity]


def estimated_cost(braid: Braid, order: int) -> float:
    """Seconds that ``levine_tristram_signature`` needs, to within a factor of a few."""
    return 2e-5 + sum(_factor_cost(factor, order) for factor in closure_pieces(braid).factors)


def is_applicable(braid: Braid, order: int) -> bool:
    """Whether ``levine_tristram_signature`` answers for this braid at roots of this order."""
    return 2 <= order <= LARGEST_ORDER and estimated_cost(braid, order) <= _LARGEST_COST


def _factor_cost(braid: Braid, order: int) -> float:
    letters, strands = len(braid), braid.strands
    elimination = 1e-7 * strands * letters**2 * (1 + letters / 600)
    rank = 1e-9 * strands * letters**2 * totient(order)
    return 1.5e-5 * letters + elimination + rank


def _check_root(order: int, power: int) -> None:
    if not 2 <= order <= LARGEST_ORDER:
        raise InputError(f"root of unity of order {order}: expected 2 to {LARGEST_ORDER}")
    if not 1 <= power < order or gcd(order, power) != 1:
        raise InputError(
            f"power {power} of a root of unity of order {order}: "
            f"expected a number from 1 to {order - 1} without a common divisor"
        )


def nullity_at_root(braid: Braid, order: int) -> int:
    """The nullity at the primitive roots of unity of this order, the same at all of them.

    It is the dimension of the homology of the link's complement with coefficients twisted by
    omega. Fox calculus presents that, with one dimension more, by B(omega) - 1, where the Burau
    matrix B acts on the colours of the n strands (as in ``alexander_module``).

    The rank over the cyclotomic field is at least that modulo any prime. It is no greater once
    so many primes agree that their product exceeds the norm of any larger minor: such a minor
    of size k is one of size N + k of the matrix with a row x' - t x - (1 - t) y for each of the
    N letters, of length at most sqrt(6), and a row x' - x for each strand, of length at most
    sqrt(2), so by Hadamard's inequality it and its conjugates are at most 6^(N/2) 2^(k/2).
    """
    most = braid.strands - 1  # the colouring with one colour is always there
    rank, number, bits = 0, 0, 0.0
    while rank < most and bits <= (len(braid) * log2(6) + rank + 1) * totient(order) / 2:
        prime, root = root_modulo_prime(order, number)
        rank = max(rank, _rank_modulo_prime(_burau_less_one(braid, root, prime), prime))
        number += 1
        bits += log2(prime)
    return most - rank


def _burau_less_one(braid: Braid, root: int, prime: int) -> list[list[int]]:
    """The matrix B - 1 at t = root: a letter +i takes the colours (a, b) to (b, t a + (1-t) b)."""
    size = braid.strands
    colours = [[int(row == column) for column in range(size)] for row in range(size)]
    inverse = pow(root, -1, prime)
    for letter in braid.word:
        index = abs(letter)
        left, right = colours[index - 1], colours[index]
        unit, over, under = (root, right, left) if letter > 0 else (inverse, left, right)
        mixed = [(y + unit * (x - y)) % prime for x, y in zip(under, over, strict=True)]
        colours[index - 1 : index + 1] = [right, mixed] if letter > 0 else [mixed, left]
    for position, row in enumerate(colours):
        row[position] -= 1
    return colours


def _rank_modulo_prime(matrix: list[list[int]], prime: int) -> int:
    rest, rank = matrix, 0
    while rest:
        pivot_row = rest[-1]
        place = next((at for at, entry in enumerate(pivot_row) if entry % prime), None)
        rest = rest[:-1]
        if place is not None:
            rank += 1
            inverse = pow(pivot_row[place], -1, prime)
            rest = [_cleared(row, pivot_row, place, inverse, prime) for row in rest]
    return rank


def _cleared(
    row: list[int], pivot_row: list[int], place: int, inverse: int, prime: int
) -> list[int]:
    factor = row[place] * inverse % prime
    if not factor:
        return row
    return [(x - factor * y) % prime for x, y in zip(row, pivot_row, strict=True)]


def _signature_of_factor(braid: Braid, order: int, power: int, nullity: int) -> int:
    """Half of the signature of Kashaev's form less the writhe, for a connected diagram.

    The form has a variable for each of the N + 2 regions of the diagram. With omega = e^(2 i a)
    and x = cos a, a letter of sign e between the regions north, south, west and east adds

        e ((west + east + x (north + south))^2 - (1 - x^2) (north - south)^2)

    (Kashaev, On symmetric matrices associated with oriented link diagrams, 2018; that it gives
    the Levine-Tristram signature for all links: Liu, A proof of the Kashaev signature conjecture,
    2023). At x = 0 it is the sum of the Goeritz forms of both chessboard colourings, up to signs
    of variables. Its radical holds the y that depend on the column alone, with y_(i-1) + y_(i+1)
    + 2 x y_i = 0; y_0 and y_1 determine them, so setting one region of column 0 and one of
    column 1 to zero changes neither the signature nor what is left of the radical, which has
    dimension twice the nullity.
    """
    rank = len(braid) - 2 * nullity
    precision = _FIRST_BITS * (1 + len(braid) // 14)  # errors grow by some 4 bits a letter
    most = _MOST_GROWTH * precision
    while precision <= most:
        front = _kashaev_front(braid, (order, power), precision, nullity)
        if front.positive + front.negative == rank:
            return (front.positive - front.negative - braid.exponent_sum) // 2
        precision += (precision + 1) // 2
    raise CapacityError(
        f"the signs of pivots for {len(braid)} letters on {braid.strands} strands: "
        f"expected to be certain with {most} bits"
    )


def _kashaev_front(
    braid: Braid, root: tuple[int, int], precision: int, nullity: int
) -> IntervalFront:
    """The front after all letters, or after so many that precision is known to be too low.

    Column i lies between strand positions i and i + 1. Were all pivots found that there are, the
    form would vanish on the completed variables, and whatever of them is orthogonal to the less
    than 2 n others too would lie in the radical: so at most 2 n + 2 nullity are waiting.
    """
    front = IntervalFront(precision)
    order, power = root
    around = [-1, -1, *(front.add_vertex() for _ in range(2, braid.strands + 1))]
    weights = (
        1 << precision,
        fixed_point_cosine(power, 2 * order, precision),
        fixed_point_cosine(power, order, precision),
    )
    last = {abs(letter): place for place, letter in enumerate(braid.word)}
    current = list(around)
    for place, letter in enumerate(braid.word):
        column, north = abs(letter), current[abs(letter)]
        # The last region of a column is its first, around the closure.
        south = around[column] if place == last[column] else front.add_vertex()
        regions = (current[column - 1], current[column + 1], north, south)
        front.add_terms(_letter_terms(regions, weights, 1 if letter > 0 else -1))
        current[column] = south
        if north != around[column]:
            front.complete(north)
        if front.waiting > 2 * (braid.strands + nullity):
            return front
    for vertex in around[2:]:
        front.complete(vertex)
    return front


def _letter_terms(
    regions: tuple[int, int, int, int], weights: tuple[int, int, int], sign: int
) -> Iterator[tuple[int, int, int]]:
    """The entries that a letter adds, in units of the front; -1 stands for a region set to zero.

    ``regions`` are west, east, north and south; ``weights`` are 1, cos a and cos 2a.
    """
    for first, at in enumerate(regions):
        for second, other in enumerate(regions[first:], start=first):
            if at >= 0 and other >= 0:
                if first == second >= 2:
                    weight = weights[2]  # x^2 - (1 - x^2) = cos 2a
                else:
                    weight = weights[1] if first < 2 <= second else weights[0]
                yield at, other, sign * weight
