"""Values of the Alexander polynomial modulo primes, of diagrams and of closed braids."""

from __future__ import annotations

import heapq

import numpy as np

from braidsearch.diagrams.link_diagram import LinkDiagram
from braidsearch.invariants.wide_integers import IntArray
from braidsearch.words import Braid

SparseRow = dict[int, int]


def diagram_alexander_value(diagram: LinkDiagram, point: int, prime: int) -> int:
    """The Alexander polynomial of the diagram's link at t = ``point``, modulo the prime.

    It is defined up to sign and powers of t. The prime is below 2^31.

    Colour the stretches of the diagram from one under-passage to the next so that behind an
    under-passage the colour is x + t (y - x), at a negative crossing x + (y - x) / t, with x the
    colour above and y that before. A first minor of these equations is the polynomial (Alexander,
    Topological invariants of knots and links, 1928); there are fewer equations than stretches
    exactly where a component passes over everywhere, which then splits off and makes it zero.
    """
    if diagram.component_count == 1 and not diagram.crossings:
        return 1
    stretch_of_arc, has_stretch_over_all = _stretches(diagram)
    if has_stretch_over_all or diagram.circles:
        return 0
    inverse = pow(point, -1, prime)
    rows: list[SparseRow] = []
    for crossing in diagram.crossings:
        unit = point if crossing.sign > 0 else inverse
        (enters, leaves), (over, _) = crossing.passages
        row: SparseRow = {}
        for arc, entry in ((leaves, -1), (over, 1 - unit), (enters, unit)):
            stretch = stretch_of_arc[arc]
            row[stretch] = (row.get(stretch, 0) + entry) % prime
        rows.append({stretch: entry for stretch, entry in row.items() if entry and stretch})
    return sparse_determinant(rows[1:], prime)


def _stretches(diagram: LinkDiagram) -> tuple[list[int], bool]:
    """For each arc the number of its stretch, and whether one of them is a whole component."""
    is_behind_under = [False] * diagram.arc_count
    for crossing in diagram.crossings:
        is_behind_under[crossing.arcs[2]] = True
    stretch_of_arc = [0] * diagram.arc_count
    count = 0
    for arcs in diagram.components:
        first = next((place for place, arc in enumerate(arcs) if is_behind_under[arc]), None)
        if first is None:
            return stretch_of_arc, True
        for arc in arcs[first:] + arcs[:first]:
            count += is_behind_under[arc]
            stretch_of_arc[arc] = count - 1
    return stretch_of_arc, False


def sparse_determinant(rows: list[SparseRow], prime: int) -> int:
    """The determinant modulo the prime, up to sign, of a square matrix given by its rows.

    Rows hold their non-zero residues by column. The pivot is an entry of a shortest row, in the
    column of fewest entries (Markowitz, The elimination form of the inverse and its application
    to linear programming, 1957). The rows are used up.
    """
    rows_of_column: dict[int, set[int]] = {}
    for number, row in enumerate(rows):
        for column in row:
            rows_of_column.setdefault(column, set()).add(number)
    waiting = [(len(row), number) for number, row in enumerate(rows)]
    heapq.heapify(waiting)
    left = set(range(len(rows)))
    result = 1
    while left:
        length, number = heapq.heappop(waiting)
        if number not in left or length != len(rows[number]):
            continue
        if not length:
            return 0
        left.remove(number)
        pivot_row = rows[number]
        pivot_column = min(pivot_row, key=lambda column: (len(rows_of_column[column]), column))
        result = result * pivot_row[pivot_column] % prime
        for changed in _eliminate(rows, rows_of_column, number, pivot_column, prime):
            heapq.heappush(waiting, (len(rows[changed]), changed))
    return result


def _eliminate(
    rows: list[SparseRow],
    rows_of_column: dict[int, set[int]],
    number: int,
    pivot_column: int,
    prime: int,
) -> list[int]:
    """Subtract multiples of a row from all others with an entry in the column; return these."""
    pivot_row = rows[number]
    for column in pivot_row:
        rows_of_column[column].discard(number)
    inverse = pow(pivot_row[pivot_column], -1, prime)
    changed = sorted(rows_of_column.pop(pivot_column))
    for other in changed:
        row = rows[other]
        factor = row[pivot_column] * inverse % prime
        for column, entry in pivot_row.items():
            value = (row.get(column, 0) - factor * entry) % prime
            if value:
                row[column] = value
                if column != pivot_column:
                    rows_of_column[column].add(other)
            elif column in row:
                del row[column]
                if column != pivot_column:
                    rows_of_column[column].discard(other)
    return changed


def braid_alexander_value(braid: Braid, point: int, prime: int) -> int:
    """The Alexander polynomial of the closed braid at t = ``point``, modulo the prime.

    It is defined up to sign and powers of t. The value is a first minor of the unreduced Burau
    matrix less 1 (Burau, Ueber Zopfgruppen und gleichsinnig verdrillte Verkettungen, 1936).
    """
    inverse = pow(point, -1, prime)
    colours: list[IntArray] = list(np.eye(braid.strands, dtype=np.int64)[:, 1:])
    for letter in braid.word:
        index = abs(letter)
        left, right = colours[index - 1], colours[index]
        if letter > 0:
            colours[index - 1 : index + 1] = [(left + point * (right - left)) % prime, left]
        else:
            colours[index - 1 : index + 1] = [right, (right + inverse * (left - right)) % prime]
    if braid.strands == 1:
        return 1
    matrix = np.stack(colours[1:]) - np.eye(braid.strands - 1, dtype=np.int64)
    return _dense_determinant(matrix % prime, prime)


def _dense_determinant(matrix: IntArray, prime: int) -> int:
    """The determinant up to sign, column by column."""
    rest = matrix
    result = 1
    while len(rest):
        places = np.flatnonzero(rest[:, 0])
        if not len(places):
            return 0
        pivot_row = rest[places[0]].copy()
        others = rest.copy()
        others[places[0]] = others[0]
        result = result * int(pivot_row[0]) % prime
        factors = others[1:, :1] * pow(int(pivot_row[0]), -1, prime) % prime
        rest = (others[1:, 1:] - factors * pivot_row[1:]) % prime
    return result


def is_equal_up_to_units(left: int, right: int, point: int, prime: int) -> bool:
    """Whether two residues differ by a sign and a power of ``point``, a root of unity."""
    unit = 1
    while True:
        if (left - unit * right) % prime == 0 or (left + unit * right) % prime == 0:
            return True
        unit = unit * point % prime
        if unit == 1:
            return False
