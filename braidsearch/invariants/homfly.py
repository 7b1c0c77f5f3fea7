"""The HOMFLY-PT polynomial of a closed braid, from the Hecke algebra and its Ocneanu trace."""

from math import comb, factorial

import numpy as np

from braidsearch.errors import CapacityError
from braidsearch.invariants.laurent import Polynomial, polynomial_from_terms, product
from braidsearch.invariants.permutation_tables import (
    ascents,
    parities,
    permutations,
    row_count,
    row_numbers,
)
from braidsearch.invariants.pieces import closure_pieces
from braidsearch.invariants.wide_integers import IntArray, WideRows
from braidsearch.words.braid import Braid

MAX_STRANDS = 8

_CIRCLE: Polynomial = [[-1, -1, 1], [1, -1, -1]]
"""A split unknot multiplies the polynomial by (v^-1 - v) / z."""

_TRIM_PERIOD = 16
_LARGEST_COST = 3e3


def homfly_polynomial(braid: Braid) -> Polynomial:
    """The HOMFLY-PT polynomial as sorted terms [v exponent, z exponent, coefficient].

    v^-1 P(L+) - v P(L-) = z P(L0) and P(unknot) = 1; sigma_i is a positive crossing, so the
    closure of 1 1 1 has 2 v^2 - v^4 + v^2 z^2, [[2, 0, 2], [2, 2, 1], [4, 0, -1]]. Coefficients
    are exact whatever their size.

    Raises CapacityError for a factor of the closure (see ``closure_pieces``) on more than
    MAX_STRANDS strands, or one whose computation would take hours.
    """
    pieces = closure_pieces(braid)
    factors = [_homfly_of_factor(factor) for factor in pieces.factors]
    return product([_CIRCLE] * pieces.splits + factors, variables=2)


def estimated_cost(braid: Braid) -> float:
    """Seconds that ``homfly_polynomial`` needs, to within a factor of a few."""
    return 2e-5 + sum(map(_factor_cost, closure_pieces(braid).factors))


def is_applicable(braid: Braid) -> bool:
    """Whether ``homfly_polynomial`` answers for this braid."""
    return all(map(_is_within_capacity, closure_pieces(braid).factors))


def _factor_cost(braid: Braid) -> float:
    letters = len(braid)
    limbs = 1 + letters / 400
    entries = factorial(min(braid.strands, 2 * MAX_STRANDS)) * (4 + letters / 2) * limbs
    return 1e-4 + 1e-5 * letters + 1e-9 * (letters + 40) * entries


def _is_within_capacity(braid: Braid) -> bool:
    return braid.strands <= MAX_STRANDS and _factor_cost(braid) <= _LARGEST_COST


def _homfly_of_factor(braid: Braid) -> Polynomial:
    """The polynomial from the Ocneanu trace of the braid in the Hecke algebra.

    The algebra has T_i - T_i^-1 = z and the basis T_w, w a permutation (Jones, Hecke algebra
    representations of braid groups and link polynomials, 1987). The trace of the closed diagram
    is invariant up to a factor v^-1 for each positive stabilization, and one more strand closed
    apart from the rest multiplies it by (v^-1 - v) / z; so with n strands, writhe w and, in
    column a, the trace's part where a strands came apart, P is the sum of
    v^w ((v^-1 - v) / z)^a v^-(n - 1 - a) times column a.
    """
    if not _is_within_capacity(braid):
        raise CapacityError(
            f"the HOMFLY-PT polynomial of {len(braid)} letters on {braid.strands} strands: "
            f"expected at most {MAX_STRANDS} strands, and fewer letters the more strands"
        )
    terms: dict[tuple[int, ...], int] = {}
    for circles, coefficients in enumerate(trace_of(_hecke_element(braid), braid.strands)):
        lowest_v = braid.exponent_sum - braid.strands + 1 + circles
        for z_exponent, coefficient in enumerate(coefficients):
            for place in range(circles + 1 if coefficient else 0):
                exponents = (lowest_v - circles + 2 * place, z_exponent - circles)
                share = coefficient * comb(circles, place) * (-1) ** place
                terms[exponents] = terms.get(exponents, 0) + share
    return polynomial_from_terms(terms)


def _hecke_element(braid: Braid) -> WideRows:
    """The braid in the basis T_w: rows in the order of ``permutations``, column j holds z^j.

    While the word is read, row u stands for T_w with w = u p, p the permutation so far: then the
    letter sigma_i leaves T_w to T_(w s_i) in place, and only adds z T_w to that T_w whose partner
    went up to it in length. The exponents of z in row u are congruent to the parity of u, so
    column c stands for z^(2c + parity).
    """
    size, columns = row_count(braid.strands), len(braid) // 2 + 2
    table = WideRows(size, columns)
    table.limbs[0][size - 1, 0] = 1  # the identity comes last
    strands = list(range(braid.strands))
    for count, letter in enumerate(braid.word):
        if count % _TRIM_PERIOD == 0:
            table.trim()
        index = abs(letter)
        left, right = strands[index - 1], strands[index]
        table.reserve(1)
        _add_descents(table, braid.strands, (left, right), letter > 0)
        strands[index - 1], strands[index] = right, left
    return _in_order_of_products(table, strands)


def _add_descents(table: WideRows, size: int, pair: tuple[int, int], is_positive: bool) -> None:
    """One letter: T_i adds z times the longer to the shorter, T_i^-1 takes away the reverse.

    With u(a) < u(b) for the strands a to the left and b to the right, w = u p is shorter than
    w s_i. T_w T_i = T_(w s_i), T_(w s_i) T_i = T_w + z T_(w s_i), and T_i^-1 = T_i - z.
    """
    exchange = ascents(size, min(pair), max(pair))
    low_to_high = (pair[0] < pair[1]) != is_positive
    low, high = table.low, table.high
    for limb in table.limbs:
        window = limb[:, low:high]
        if low_to_high:
            to_odd, from_even = exchange.odd_partners, exchange.even
            to_even, from_odd = exchange.even_partners, exchange.odd
        else:
            to_odd, from_even = exchange.odd, exchange.even_partners
            to_even, from_odd = exchange.even, exchange.odd_partners
        even, odd = window[from_even], window[from_odd]
        if is_positive:
            limb[to_odd, low:high] += even
            limb[to_even, low + 1 : high + 1] += odd
        else:
            limb[to_odd, low:high] -= even
            limb[to_even, low + 1 : high + 1] -= odd
    table.high = min(high + 1, table.limbs[0].shape[1] - 1)


def _in_order_of_products(table: WideRows, strands: list[int]) -> WideRows:
    """Rows renumbered from u to w = u p, and columns spread out to one for each power of z.

    There is room for the powers that the trace adds: one for each product with a generator.
    """
    size = len(strands)
    table.trim()
    numbers = row_numbers(permutations(size)[:, strands])
    is_odd = parities(size) == 1
    room = (size - 1) * (size - 2) // 2
    spread = []
    for limb in table.limbs:
        wide = np.zeros((len(limb), 2 * table.high + room + 1), dtype=np.int64)
        window = limb[:, : table.high]
        wide[numbers[~is_odd], 0 : 2 * table.high : 2] = window[~is_odd]
        wide[numbers[is_odd], 1 : 2 * table.high + 1 : 2] = window[is_odd]
        spread.append(wide)
    table.limbs = spread
    table.low, table.high = 0, spread[0].shape[1]
    return table


def trace_of(table: WideRows, size: int) -> list[list[int]]:
    """The Ocneanu trace of an element on ``size`` strands, by how many strands came apart.

    Rows of ``table``, which is used up, are coefficients of T_w in the order of ``permutations``,
    columns are powers of z; the last (size - 1) (size - 2) / 2 columns must be zero. The result
    has for each number, 0 to size - 1, the coefficients of z.
    """
    for strands in range(size, 1, -1):
        table.reserve(strands)
        table.limbs = [_close_last_strand(limb, strands) for limb in table.limbs]
    return [table.totals(np.array([circles])) for circles in range(size)]


def _close_last_strand(limb: IntArray, size: int) -> IntArray:
    """The trace to one strand less; the rows are blocks by the number of circles, one more now.

    With w(last) = k, counted from 1, T_w = T_k T_(k+1) ... T_(size-1) T_u, u on one strand less.
    For k = size the last strand comes apart; otherwise the trace is v^-1 times that of
    T_u T_k ... T_(size-2), gathered over k from 1 upwards. Each product doubles the largest
    coefficient at most, so all of it multiplies by less than 2^size.
    """
    shorter = row_count(size - 1)
    blocks = limb.reshape(-1, size, shorter, limb.shape[1])
    gathered = np.zeros_like(blocks[:, 0])
    for last in range(size - 2):
        gathered = _times_generator(gathered + blocks[:, last], size - 1, last)
    gathered += blocks[:, size - 2]
    result = np.zeros((len(blocks) + 1, shorter, limb.shape[1]), dtype=np.int64)
    result[:-1] = gathered
    result[1:] += blocks[:, size - 1]
    return result.reshape(-1, limb.shape[1])


def _times_generator(elements: IntArray, size: int, position: int) -> IntArray:
    """Products with T_i on the right, i - 1 = ``position``; elements: (count, size!, columns)."""
    exchange = ascents(size, position, position + 1)
    shorter = np.concatenate([exchange.even, exchange.odd])
    longer = np.concatenate([exchange.odd_partners, exchange.even_partners])
    result = np.empty_like(elements)
    result[:, shorter] = elements[:, longer]
    result[:, longer] = elements[:, shorter]
    result[:, longer, 1:] += elements[:, longer, :-1]
    return result
