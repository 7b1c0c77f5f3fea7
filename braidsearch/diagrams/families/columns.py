"""Two-bridge links and pretzel links, drawn as columns of twists."""

from __future__ import annotations

import operator
from collections.abc import Iterable

from braidsearch.diagrams.families.sketch import Sketch
from braidsearch.diagrams.link_diagram import LinkDiagram
from braidsearch.errors import InputError

_MOST_CROSSINGS = 100_000


def two_bridge_link(terms: Iterable[int]) -> LinkDiagram:
    """The two-bridge link of p/q = c1 + 1/(c2 + 1/(c3 + ...)), drawn on four strands.

    ``terms`` are the integers c1, c2, ...; those with odd number twist the middle strands, to the
    right above 0, the others twist the left strands, the other way. The determinant of the link
    is |p|; [3] is the right-handed trefoil, [2] the Hopf link of linking number 1, [2, 2] the
    figure-eight knot, and p = 0 is the unlink of two components.

    Schubert (Knoten mit zwei Brücken, 1956): with p > 0, two of them are the same unoriented link
    when p' = p and q' is q or its inverse modulo p; oriented as they are here, with odd q, when
    q' is q or its inverse modulo 2 p. Raises InputError for no terms.
    """
    twists = _checked_twists(terms, "two-bridge link")
    sketch = Sketch()
    sketch.add_maximum(1, is_right_down=True)
    sketch.add_maximum(3)
    for number, count in enumerate(twists):
        if number % 2 == 0:
            sketch.add_twists(2, count)
        else:
            sketch.add_twists(1, -count)
    if len(twists) % 2 == 0:
        sketch.add_minimum(2)
    else:
        sketch.add_minimum(3)
    sketch.add_minimum(1)
    return sketch.diagram()


def continued_fraction(p: int, q: int) -> tuple[int, ...]:
    """Terms for ``two_bridge_link`` with p/q = c1 + 1/(c2 + ...), all of one sign for |q| < |p|.

    Raises InputError for numbers with a common divisor, and for q = 0.
    """
    if q < 0:
        p, q = -p, -q
    sign = -1 if p < 0 else 1
    numerator, denominator = abs(p), q
    terms = []
    while denominator:
        terms.append(sign * (numerator // denominator))
        numerator, denominator = denominator, numerator % denominator
    if numerator != 1 or not terms:
        raise InputError(f"fraction {p}/{q}: expected coprime numbers and a denominator not 0")
    return tuple(terms)


def pretzel_link(*columns: int) -> LinkDiagram:
    """The pretzel link with so many crossings in each of its columns, side by side.

    A column has two strands that twist to the right for numbers above 0: its crossings are
    positive where both strands run the same way. ``pretzel_link(-2, 3, 7)`` has only positive
    crossings, ``pretzel_link(1, 1, 1)`` is the left-handed trefoil. Columns may be moved
    cyclically, and their order reversed; two columns a, b are the torus link T(2, a + b), up to
    orientation, and one column is the unknot. The outermost strand runs down the left of the
    first column; every other component runs down the right of the first column where it is met.

    Raises InputError for no columns.
    """
    twists = _checked_twists(columns, "pretzel link")
    sketch = Sketch()
    sketch.add_maximum(1)
    for number in range(1, len(twists)):
        sketch.add_maximum(2 * number)
    for number, count in enumerate(twists):
        sketch.add_twists(2 * number + 1, count)
    for number in range(len(twists) - 1, 0, -1):
        sketch.add_minimum(2 * number)
    sketch.add_minimum(1)
    return sketch.diagram()


def _checked_twists(terms: Iterable[int], name: str) -> list[int]:
    twists = []
    for term in terms:
        try:
            twists.append(operator.index(term))
        except TypeError:
            raise InputError(f"{name}: {term!r}: expected integers") from None
    if not twists:
        raise InputError(f"{name} without twists: expected at least one integer")
    if sum(map(abs, twists)) > _MOST_CROSSINGS:
        raise InputError(f"{name}: expected at most {_MOST_CROSSINGS} crossings")
    return twists
