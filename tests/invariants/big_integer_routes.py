"""Independent routes for long words: one evaluation at a power of two, in Python's integers.

Two polynomials whose coefficients are below 2^(bits - 1) in absolute value and which agree at
2^bits (or at its inverse) are equal: the value's digits are the coefficients. The callers choose
``bits`` by a bound on the coefficients that needs no computation.
"""

from __future__ import annotations

from fractions import Fraction

from braidsearch.words import Braid

Matching = tuple[int, ...]


def jones_value(braid: Braid, bits: int) -> Fraction:
    """V at t^(1/2) = 2^(-2 bits), by the Kauffman bracket gathered by planar matchings.

    With A = 2^bits every letter is multiplied by A^3 to stay integral: A^4 + A^2 e for a
    positive letter, A^2 + A^4 e for a negative one, a loop worth -A^2 - A^-2.
    """
    strands = braid.strands
    identity = (*range(strands, 2 * strands), *range(strands))
    states: dict[Matching, int] = {identity: 1}
    for letter in braid.word:
        along, across = (4, 2) if letter > 0 else (2, 4)
        following: dict[Matching, int] = {}
        for matching, value in states.items():
            following[matching] = following.get(matching, 0) + (value << along * bits)
            hooked, has_loop = _hook(matching, strands, abs(letter) - 1)
            turned = value << across * bits
            if has_loop:  # times -A^2 - A^-2
                turned = -(turned << 2 * bits) - (turned >> 2 * bits)
            following[hooked] = following.get(hooked, 0) + turned
        states = following
    base = Fraction(1 << bits)
    loop = -(base**2) - base**-2
    bracket = Fraction(0)
    for matching, value in states.items():
        bracket += value * loop ** (_closed_loops(matching, strands) - 1)
    return bracket / base ** (3 * len(braid)) * (-(base**3)) ** -braid.exponent_sum


def _hook(matching: Matching, strands: int, point: int) -> tuple[Matching, bool]:
    """The planar matching with cup and cap at two bottom points; tops are the first half."""
    left, right = strands + point, strands + point + 1
    if matching[left] == right:
        return matching, True
    result = list(matching)
    first, second = matching[left], matching[right]
    result[first], result[second] = second, first
    result[left], result[right] = right, left
    return tuple(result), False


def _closed_loops(matching: Matching, strands: int) -> int:
    """Loops when top and bottom points are joined around the closure."""
    left, loops = set(range(2 * strands)), 0
    while left:
        point, loops = min(left), loops + 1
        while point in left:
            partner = matching[point]
            left -= {point, partner}
            point = (partner + strands) % (2 * strands)
    return loops


def alexander_value(braid: Braid, bits: int) -> Fraction:
    """Plus or minus a power of t times Delta at t = 2^bits, by the reduced Burau matrix.

    det(1 - B) (1 - t) / (1 - t^n) (Burau 1936). Negative letters are multiplied by t.
    """
    size = braid.strands - 1
    rows = [[int(i == j) for j in range(size)] for i in range(size)]
    negatives = 0
    for letter in braid.word:
        place = abs(letter) - 1
        negatives += letter < 0
        for row in rows:
            _times_burau(row, place, letter > 0, bits)
    scale = 1 << bits * negatives
    matrix = [[scale * int(i == j) - rows[i][j] for j in range(size)] for i in range(size)]
    base = 1 << bits
    return Fraction(_determinant(matrix) * (1 - base), scale**size * (1 - base**braid.strands))


def _times_burau(row: list[int], place: int, is_positive: bool, bits: int) -> None:
    """The row times the matrix of sigma_i, or times t and the matrix of its inverse.

    sigma_i changes the matrix's row i alone: to t, -t, 1 in columns i-1, i, i+1; its inverse to
    1, -1/t, 1/t.
    """
    here = row[place]
    if is_positive:
        left, middle, right = here << bits, -(here << bits), here
    else:
        row[:] = [entry << bits for entry in row]
        left, middle, right = here << bits, -here, here
    row[place] = middle
    if place > 0:
        row[place - 1] += left
    if place + 1 < len(row):
        row[place + 1] += right


def _determinant(matrix: list[list[int]]) -> int:
    """By expansion along the first row; for the few rows of a braid on few strands."""
    if not matrix:
        return 1
    total = 0
    for column, entry in enumerate(matrix[0]):
        if entry:
            minor = [row[:column] + row[column + 1 :] for row in matrix[1:]]
            total += (-1) ** column * entry * _determinant(minor)
    return total


def homfly_values_on_three_strands(braid: Braid, bits: int) -> dict[int, Fraction]:
    """For each exponent of v the coefficient, a polynomial in z, at z = 2^bits.

    In the Hecke algebra of S_3 with T_i - 1/T_i = z, the basis in words: 1, T1, T2, T1 T2, T2 T1,
    T1 T2 T1. With one strand more worth c = (1/v - v)/z and a stabilization 1/v, the traces are
    c^2, c/v, c/v, 1/v^2, 1/v^2, and 1/v (c + z/v) since T1 T1 = 1 + z T1.
    """
    z = 1 << bits
    after = {1: {"": "1", "2": "21", "12": "121"}, 2: {"": "2", "1": "12", "21": "121"}}
    element = dict.fromkeys(["", "1", "2", "12", "21", "121"], 0) | {"": 1}
    for letter in braid.word:
        longer = after[abs(letter)]
        following = dict.fromkeys(element, 0)
        for shorter_word, longer_word in longer.items():
            low, high = element[shorter_word], element[longer_word]
            following[shorter_word] = high if letter > 0 else high - z * low
            following[longer_word] = low + z * high if letter > 0 else low
        element = following
    inverse_z = Fraction(1, z)
    one_circle = element["1"] + element["2"] + element["121"]
    rest = element["12"] + element["21"] + z * element["121"]
    # c^2 = (v^-2 - 2 + v^2)/z^2 and c/v = (v^-2 - 1)/z
    parts = {
        -2: element[""] * inverse_z**2 + one_circle * inverse_z + rest,
        0: -2 * element[""] * inverse_z**2 - one_circle * inverse_z,
        2: element[""] * inverse_z**2,
    }
    return {v + braid.exponent_sum: value for v, value in parts.items() if value}
