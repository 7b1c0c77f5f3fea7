"""Second, slow implementations of the invariants, by other routes than the package's.

They share nothing with the package but the Braid value. Polynomials come out in the form that
certificates use.
"""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator
from functools import cache
from itertools import pairwise, product

import networkx
import sympy

from braidsearch.words import Braid

Polynomial = list[list[int]]


def strand_paths(braid: Braid) -> list[list[tuple[int, bool]]]:
    """For each component the crossings it meets in order, as (letter's place, is it over).

    The strand from the left position of a positive letter goes over; of a negative, under.
    """
    passages: dict[int, list[tuple[int, bool]]] = {}
    strands = list(range(braid.strands))
    for place, letter in enumerate(braid.word):
        index = abs(letter)
        left, right = strands[index - 1], strands[index]
        passages.setdefault(left, []).append((place, letter > 0))
        passages.setdefault(right, []).append((place, letter < 0))
        strands[index - 1], strands[index] = right, left
    following = {start: end for end, start in enumerate(strands)}
    paths = []
    while following:
        start = min(following)
        path: list[tuple[int, bool]] = []
        while start in following:
            path += passages.get(start, [])
            start = following.pop(start)
        paths.append(path)
    return paths


def component_count(braid: Braid) -> int:
    """Connected components of the graph of strand segments."""
    graph = networkx.Graph()
    level = list(range(braid.strands))
    graph.add_nodes_from(("start", position) for position in level)
    current = [("start", position) for position in level]
    for place, letter in enumerate(braid.word):
        index = abs(letter)
        left, right = (place, "left"), (place, "right")
        graph.add_edge(current[index - 1], right)
        graph.add_edge(current[index], left)
        current[index - 1], current[index] = left, right
    for position in level:
        graph.add_edge(current[position], ("start", position))
    return networkx.number_connected_components(graph)


def linking_numbers(braid: Braid) -> list[int]:
    """For each pair, the signs of the crossings where the first goes over the second, added."""
    owner_over: dict[int, int] = {}
    owner_under: dict[int, int] = {}
    paths = strand_paths(braid)
    for number, path in enumerate(paths):
        for place, is_over in path:
            (owner_over if is_over else owner_under)[place] = number
    numbers = []
    for second in range(len(paths)):
        for first in range(second):
            numbers.append(
                sum(
                    1 if letter > 0 else -1
                    for place, letter in enumerate(braid.word)
                    if owner_over[place] == first and owner_under[place] == second
                )
            )
    return sorted(numbers)


def linking_sums(braid: Braid) -> list[int]:
    """For each component, the signs of the crossings where it goes over another one, added."""
    paths = strand_paths(braid)
    owner_under = {
        place: number for number, path in enumerate(paths) for place, over in path if not over
    }
    signs = [1 if letter > 0 else -1 for letter in braid.word]
    return sorted(
        sum(signs[place] for place, over in path if over and owner_under[place] != number)
        for number, path in enumerate(paths)
    )


def jones_by_states(braid: Braid) -> Polynomial:
    """The Kauffman bracket as a sum over all 2^N smoothings (Kauffman, 1987), loops counted."""
    bracket: Counter[int] = Counter()
    for smoothings in product((1, -1), repeat=len(braid)):
        loops = _loops(braid, smoothings)
        for exponent, coefficient in _loop_power(loops - 1).items():
            bracket[exponent + sum(smoothings)] += coefficient
    writhe = braid.exponent_sum
    sign = -1 if writhe % 2 else 1
    # V = (-A^3)^-writhe <D> with t = A^-4, so t^(e/2) is A^(-2 e).
    terms = [[-(e - 3 * writhe) // 2, sign * c] for e, c in bracket.items() if c]
    assert all((e - 3 * writhe) % 2 == 0 for e, c in bracket.items() if c)
    return sorted(terms)


def _loops(braid: Braid, smoothings: tuple[int, ...]) -> int:
    """Circles left when each crossing is smoothed along the braid (A^sign) or across it."""
    parents: dict[object, object] = {}

    def root(item: object) -> object:
        parents.setdefault(item, item)
        while parents[item] != item:
            item = parents[item]
        return item

    current: list[object] = [("start", position) for position in range(braid.strands)]
    for item in current:
        root(item)
    for place, letter in enumerate(braid.word):
        index = abs(letter)
        is_along = smoothings[place] == (1 if letter > 0 else -1)
        if not is_along:
            parents[root(current[index - 1])] = root(current[index])
            root((place, "cup"))
            current[index - 1 : index + 1] = [(place, "cup"), (place, "cup")]
    for position in range(braid.strands):
        parents[root(current[position])] = root(("start", position))
    return len({root(item) for item in list(parents)})


@cache
def _loop_power(power: int) -> Counter[int]:
    """(-A^2 - A^-2)^power."""
    if power == 0:
        return Counter({0: 1})
    result: Counter[int] = Counter()
    for exponent, coefficient in _loop_power(power - 1).items():
        result[exponent + 2] -= coefficient
        result[exponent - 2] -= coefficient
    return result


@cache
def homfly_by_skein(braid: Braid) -> tuple[tuple[int, int, int], ...]:
    """The HOMFLY-PT polynomial by changing crossings until the diagram is descending.

    A diagram in which every crossing is first met going over, the components taken in order,
    is an unlink: P = ((v^-1 - v) / z)^(components - 1). At the first crossing met going under,
    P(L+) = v^2 P(L-) + v z P(L0) and P(L-) = v^-2 P(L+) - v^-1 z P(L0).
    """
    paths = strand_paths(braid)
    place = _first_under(paths)
    if place is None:
        return tuple(sorted(_unlink(len(paths) - 1)))
    letter = braid.word[place]
    before, after = braid.word[:place], braid.word[place + 1 :]
    changed = homfly_by_skein(Braid([*before, -letter, *after], braid.strands))
    smoothed = homfly_by_skein(Braid([*before, *after], braid.strands))
    sign = 1 if letter > 0 else -1
    terms: Counter[tuple[int, int]] = Counter()
    for v, z, c in changed:
        terms[v + 2 * sign, z] += c
    for v, z, c in smoothed:
        terms[v + sign, z + 1] += sign * c
    return tuple(sorted((v, z, c) for (v, z), c in terms.items() if c))


def _first_under(paths: list[list[tuple[int, bool]]]) -> int | None:
    met = set()
    for path in paths:
        for place, is_over in path:
            if place not in met and not is_over:
                return place
            met.add(place)
    return None


def _unlink(circles: int) -> Iterator[tuple[int, int, int]]:
    for place in range(circles + 1):
        yield (2 * place - circles, -circles, int(sympy.binomial(circles, place)) * (-1) ** place)


def seifert_matrix(braid: Braid) -> sympy.Matrix:
    """A Seifert matrix of the surface of discs and bands that the closed braid bounds.

    The homology classes are the pairs of neighbouring letters of one generator (Collins, An
    algorithm for computing the Seifert matrix of a link from a braid representation, 2016). All
    generators must occur, so that the surface is connected.
    """
    loops = []
    for index in range(1, braid.strands):
        places = [place for place, letter in enumerate(braid.word) if abs(letter) == index]
        assert places
        loops += [(first, second, index) for first, second in pairwise(places)]
    matrix = sympy.zeros(len(loops), len(loops))
    signs = [1 if letter > 0 else -1 for letter in braid.word]
    for row, (top, bottom, index) in enumerate(loops):
        matrix[row, row] = -(signs[top] + signs[bottom]) // 2
        for column, (other_top, other_bottom, other_index) in enumerate(loops):
            if other_index == index and other_top == bottom:
                # They share the band at `bottom`; which entry it gives depends on its sign.
                matrix[(column, row) if signs[bottom] < 0 else (row, column)] += signs[bottom]
            elif other_index == index + 1:
                if top < other_top < bottom < other_bottom:
                    matrix[row, column] += 1
                elif other_top < top < other_bottom < bottom:
                    matrix[row, column] -= 1
    return matrix


def alexander_by_seifert(braid: Braid) -> Polynomial:
    """det(V - t V^T) with lowest exponent 0 and positive lowest coefficient; 0 when split."""
    if set(map(abs, braid.word)) != set(range(1, braid.strands)):
        return []
    t = sympy.Symbol("t")
    matrix = seifert_matrix(braid)
    determinant = sympy.Poly((matrix - t * matrix.T).det(method="berkowitz"), t)
    terms = sorted([exponent, int(c)] for (exponent,), c in determinant.terms() if c)
    if not terms:
        return []
    lowest, sign = terms[0][0], 1 if terms[0][1] > 0 else -1
    return [[exponent - lowest, sign * c] for exponent, c in terms]


def signature_by_seifert(braid: Braid) -> int:
    """The signature of V + V^T, counted by Descartes' rule, exact when all roots are real.

    A split braid is cut where a generator is missing; the signature adds up.
    """
    parts = _connected_parts(braid)
    total = 0
    for part in parts:
        matrix = seifert_matrix(part)
        if matrix.rows:
            coefficients = (matrix + matrix.T).charpoly().all_coeffs()
            total += _sign_changes(coefficients)
            total -= _sign_changes([c * (-1) ** place for place, c in enumerate(coefficients)])
    return total


def determinant_by_seifert(braid: Braid) -> int:
    """|det(V + V^T)|; 0 when split."""
    if len(_connected_parts(braid)) > 1:
        return 0
    matrix = seifert_matrix(braid)
    return abs(int((matrix + matrix.T).det(method="bareiss"))) if matrix.rows else 1


def _sign_changes(coefficients: list[int]) -> int:
    signs = [c > 0 for c in coefficients if c]
    return sum(1 for first, second in pairwise(signs) if first != second)


def _connected_parts(braid: Braid) -> list[Braid]:
    used = set(map(abs, braid.word))
    parts, first = [], 0
    for index in range(1, braid.strands + 1):
        if index not in used:
            letters = [
                letter - first if letter > 0 else letter + first
                for letter in braid.word
                if first < abs(letter) < index
            ]
            parts.append(Braid(letters, strands=index - first))
            first = index
    return parts
