"""The Jones polynomial of a closed braid, from the cell modules of the Temperley-Lieb algebra."""

from collections.abc import Iterator
from dataclasses import dataclass
from functools import lru_cache
from math import comb

import numpy as np

from braidsearch.errors import CapacityError
from braidsearch.invariants.laurent import Polynomial, polynomial_from_coefficients
from braidsearch.invariants.laurent import product as polynomial_product
from braidsearch.invariants.link_states import LinkStates, link_states
from braidsearch.invariants.pieces import closure_pieces
from braidsearch.invariants.wide_integers import IntArray, WideRows
from braidsearch.words.braid import Braid

MAX_STRANDS = 12

_CIRCLE: Polynomial = [[-1, -1], [1, -1]]
"""A split unknot multiplies the polynomial by -(t^(1/2) + t^(-1/2))."""

_TABLE_ENTRIES = 1 << 16
_TRIM_PERIOD = 16
_LARGEST_COST = 3e5


def jones_polynomial(braid: Braid) -> Polynomial:
    """The Jones polynomial as sorted terms [e, c], the coefficient c of t^(e/2).

    t^-1 V(L+) - t V(L-) = (t^(1/2) - t^(-1/2)) V(L0) and V(unknot) = 1; sigma_i is a positive
    crossing, so the closure of 1 1 1 has t + t^3 - t^4, [[2, 1], [6, 1], [8, -1]]. Coefficients
    are exact whatever their size.

    Raises CapacityError for a factor of the closure (see ``closure_pieces``) on more than
    MAX_STRANDS strands, or one whose computation would take days.
    """
    pieces = closure_pieces(braid)
    factors = [_jones_of_factor(factor) for factor in pieces.factors]
    return polynomial_product([_CIRCLE] * pieces.splits + factors)


def estimated_cost(braid: Braid) -> float:
    """Seconds that ``jones_polynomial`` needs, to within a factor of a few."""
    return 2e-5 + sum(map(_factor_cost, closure_pieces(braid).factors))


def is_applicable(braid: Braid) -> bool:
    """Whether ``jones_polynomial`` answers for this braid."""
    return all(_is_within_capacity(factor) for factor in closure_pieces(braid).factors)


def _factor_cost(braid: Braid) -> float:
    letters = len(braid)
    diagrams = comb(2 * braid.strands, braid.strands) // (braid.strands + 1)
    limbs = 1 + letters / 400
    return 5e-5 + 1e-5 * letters + 8e-10 * limbs * diagrams * letters**2


def _is_within_capacity(braid: Braid) -> bool:
    return braid.strands <= MAX_STRANDS and _factor_cost(braid) <= _LARGEST_COST


def _jones_of_factor(braid: Braid) -> Polynomial:
    """The polynomial from the traces of the braid on the cell modules.

    The Kauffman bracket (Kauffman, State models and the Jones polynomial, 1987) takes sigma_i to
    A + A^-1 e_i in the Temperley-Lieb algebra, with loops worth d = -A^2 - A^-2 and t = A^-4. Let
    s = t^(1/2) = A^-2 and E_i = -s e_i; then sigma_i = A (1 - E_i), and its inverse is
    A^-1 (1 - t^-1 E_i). The closure of an algebra element is the sum over the cell modules, k
    through strands each, of its trace there times (-1)^k (s^k + s^(k-2) + ... + s^-k), the
    quantum dimension (Jones, Index for subfactors, 1983; Westbury, The representation theory of
    the Temperley-Lieb algebras, 1995). With writhe w the factor (-A^3)^-w of the bracket and
    the A^w above make (-1)^w s^w; one loop is divided out for V(unknot) = 1.
    """
    if not _is_within_capacity(braid):
        raise CapacityError(
            f"the Jones polynomial of {len(braid)} letters on {braid.strands} strands: "
            f"expected at most {MAX_STRANDS} strands, and fewer letters the more strands"
        )
    closed: dict[int, int] = {}
    for through, lowest, trace in _module_traces(braid):
        for weight in range(-through, through + 1, 2):
            for place, coefficient in enumerate(trace):
                exponent = weight + 2 * (lowest + place)
                closed[exponent] = closed.get(exponent, 0) + coefficient
    writhe = braid.exponent_sum
    sign = -1 if (writhe + braid.strands + 1) % 2 else 1
    return [[e + writhe, sign * c] for e, c in _divide_by_loop(closed)]


def _divide_by_loop(terms: dict[int, int]) -> Polynomial:
    """The quotient by s + s^-1 of a multiple of it; exponents are of s, of one parity."""
    lowest = min(terms)
    coefficients = [terms.get(exponent, 0) for exponent in range(lowest, max(terms) + 1, 2)]
    quotient: list[int] = []
    carried = 0
    for coefficient in coefficients[:-1]:
        carried = coefficient - carried
        quotient.append(carried)
    if carried != coefficients[-1]:
        raise ArithmeticError("the closure of a braid is not a multiple of one loop")
    doubled = polynomial_from_coefficients(quotient)
    return [[lowest + 1 + 2 * place, coefficient] for place, coefficient in doubled]


def _module_traces(braid: Braid) -> Iterator[tuple[int, int, list[int]]]:
    """Traces of the product of 1 - E_i and 1 - t^-1 E_i, in parts that add up to them.

    Each part is (through strands, lowest exponent of t, coefficients from there upwards).
    """
    states = link_states(braid.strands)
    rows_at_once = max(1, _TABLE_ENTRIES // (len(braid) + 1))
    for columns in _iter_column_blocks(states, rows_at_once):
        plan = _RowPlan.of(braid.strands, columns)
        rows = _apply_word(braid, plan)
        for through in sorted(set(plan.through.tolist())):
            start = plan.start[plan.through == through]
            yield through, rows.low - _negative_letters(braid), rows.totals(start)


def _iter_column_blocks(states: LinkStates, rows_at_once: int) -> Iterator[tuple[int, int]]:
    """Consecutive states, as ranges, whose modules have together about so many states."""
    block_start, rows = 0, 0
    for column, size in enumerate(states.size.tolist()):
        if rows and rows + size > rows_at_once:
            yield block_start, column
            block_start, rows = column, 0
        rows += size
    yield block_start, len(states.size)


@dataclass(frozen=True, eq=False)
class _GeneratorRows:
    """Rows of the table by what E_i does: ``still`` and ``moved`` read from their sources.

    The row vector r E_i has at a state x the entry of r at the target of x, times t for x of
    parity 1 (``moved``), times 1 for x of parity 0 (``still``), and times 1 + t where x is its
    own target (``joined``).
    """

    still: IntArray
    still_sources: IntArray
    moved: IntArray
    moved_sources: IntArray
    joined: IntArray


@dataclass(frozen=True, eq=False)
class _RowPlan:
    """A block of unit row vectors: one for each state of a range, each over its whole module."""

    rows: int
    start: IntArray
    through: IntArray
    generators: tuple[_GeneratorRows, ...]

    @staticmethod
    @lru_cache(maxsize=32)
    def of(strands: int, columns: tuple[int, int]) -> "_RowPlan":
        states = link_states(strands)
        block = np.arange(*columns)
        sizes = states.size[block]
        offsets = np.cumsum(sizes) - sizes
        rows = int(sizes.sum())
        state = np.arange(rows) + np.repeat(states.first[block] - offsets, sizes)
        generators = tuple(
            _generator_rows(state, states.target[index][state], states.parity[state])
            for index in range(strands - 1)
        )
        start = offsets + block - states.first[block]
        return _RowPlan(rows, start, states.through[block], generators)


def _generator_rows(state: IntArray, target: IntArray, parity: IntArray) -> _GeneratorRows:
    moves = (target >= 0) & (target != state)
    still = np.flatnonzero(moves & (parity == 0))
    moved = np.flatnonzero(moves & (parity == 1))
    step = target - state
    return _GeneratorRows(
        still, still + step[still], moved, moved + step[moved], np.flatnonzero(target == state)
    )


def _apply_word(braid: Braid, plan: _RowPlan) -> WideRows:
    """The block of row vectors times the whole word; column c holds t^(c - negative letters).

    Rescale a state by (-s)^parity: then E_i takes x to its target times t^parity, and a joined
    x to (1 + t) x. Every coefficient of the result is the sum of two old ones at most, so each
    letter reserves one doubling.
    """
    rows = WideRows(plan.rows, len(braid) + 1, low=_negative_letters(braid))
    rows.limbs[0][plan.start, rows.low] = 1
    for count, letter in enumerate(braid.word):
        if count % _TRIM_PERIOD == 0:
            rows.trim()
        rows.reserve(1)
        generator = plan.generators[abs(letter) - 1]
        low, high = rows.low, rows.high
        for limb in rows.limbs:
            _subtract_generator(limb, generator, low, high, letter > 0)
        rows.low, rows.high = (low, high + 1) if letter > 0 else (low - 1, high)
    return rows


def _subtract_generator(
    limb: IntArray, generator: _GeneratorRows, low: int, high: int, is_positive: bool
) -> None:
    """Multiply by 1 - E_i or by 1 - t^-1 E_i, in place."""
    shift = 0 if is_positive else -1
    window = limb[:, low:high]
    limb[generator.still, low + shift : high + shift] -= window[generator.still_sources]
    limb[generator.moved, low + shift + 1 : high + shift + 1] -= window[generator.moved_sources]
    # A joined state is multiplied by 1 - (1 + t) = -t, or by 1 - (1 + t)/t = -1/t.
    joined = -window[generator.joined]
    limb[generator.joined, low if is_positive else high - 1] = 0
    step = 1 if is_positive else -1
    limb[generator.joined, low + step : high + step] = joined


def _negative_letters(braid: Braid) -> int:
    return sum(1 for letter in braid.word if letter < 0)
