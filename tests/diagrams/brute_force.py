"""The Kauffman bracket by all 2^c states of a diagram: a second route that shares no code."""

from __future__ import annotations

from itertools import product

import networkx

from braidsearch.diagrams import LinkDiagram

Polynomial = list[list[int]]


def loop_count(diagram: LinkDiagram, choices: tuple[int, ...]) -> int:
    """The loops of one state: connected components of its arcs, and the circles."""
    graph = networkx.Graph()
    graph.add_nodes_from(range(diagram.arc_count))
    for crossing, choice in zip(diagram.crossings, choices, strict=True):
        a, b, c, d = crossing.arcs
        graph.add_edges_from([(a, b), (c, d)] if choice > 0 else [(b, c), (d, a)])
    return int(networkx.number_connected_components(graph)) + diagram.circles


def brute_force_jones(diagram: LinkDiagram) -> Polynomial:
    """The Jones polynomial as terms [e, c] for c t^(e/2), by the definition of the bracket.

    Kauffman, State models and the Jones polynomial, 1987: the bracket is the sum of A^(a - b)
    (-A^2 - A^-2)^(loops - 1); times (-A^3)^(-writhe), at A = t^(-1/4).
    """
    bracket: dict[int, int] = {}
    for choices in product((1, -1), repeat=len(diagram.crossings)):
        terms = {sum(choices): 1}
        for _ in range(loop_count(diagram, choices) - 1):
            longer: dict[int, int] = {}
            for exponent, coefficient in terms.items():
                for step in (2, -2):
                    longer[exponent + step] = longer.get(exponent + step, 0) - coefficient
            terms = longer
        for exponent, coefficient in terms.items():
            bracket[exponent] = bracket.get(exponent, 0) + coefficient
    writhe = sum(crossing.sign for crossing in diagram.crossings)
    sign = -1 if writhe % 2 else 1
    result = []
    for exponent, coefficient in bracket.items():
        doubled, rest = divmod(exponent - 3 * writhe, -2)
        assert rest == 0
        if coefficient:
            result.append([doubled, sign * coefficient])
    return sorted(result)
