"""The proof of a walk: its legs, without the loops between members of one conjugacy class."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from itertools import pairwise

import networkx as nx

from braidsearch.diagrams import ArcMove, arcs_from_word, word_from_arcs
from braidsearch.moves import Move, MoveChain
from braidsearch.moves.arcs import (
    Conjugation,
    Exchange,
    Leg,
    legs_from_arc_moves,
    write_legs,
)
from braidsearch.search.visits import Visit, visit
from braidsearch.words import Braid

_MOST_STRANDS = 7  # up to which classes are found fast enough to look for loops
_EXCHANGE_COST = 7


def walk_moves(start: Braid, arc_moves: Iterable[ArcMove]) -> list[Move]:
    """The moves of a walk that begins at the arc presentation of ``start``, each one checked."""
    arcs = arcs_from_word(start)
    legs = without_class_loops(legs_from_arc_moves(arcs, arc_moves))
    chain = MoveChain(start)
    chain.rewrite(word_from_arcs(arcs).word)
    write_legs(chain, legs)
    return chain.moves


def without_class_loops(legs: Sequence[Leg]) -> list[Leg]:
    """Legs with the same ends, along a shortest path through the conjugacy classes on the way.

    A walk returns to the same few classes all the time; two visits of one class are joined by a
    conjugation, and all between them is left out.
    """
    if not legs:
        return []
    visits = _class_visits(legs)
    graph = nx.DiGraph()
    graph.add_nodes_from(visit.key for visit in visits.values())
    for (here, one), (there, other) in pairwise(visits.items()):
        weight = 1 + sum(_cost(leg) for leg in legs[here:there])
        known = graph.get_edge_data(one.key, other.key)
        if known is None or weight < known["weight"]:
            graph.add_edge(one.key, other.key, weight=weight, span=(here, there))
    last = max(visits)
    path = nx.shortest_path(graph, visits[0].key, visits[last].key, weight="weight")
    shortened: list[Leg] = []
    current = visits[0]
    for one, other in pairwise(path):
        here, there = graph.edges[one, other]["span"]
        shortened += [*_conjugation(current, visits[here]), *legs[here:there]]
        current = visits[there]
    return [*shortened, *_conjugation(current, visits[last]), *legs[last:]]


def _class_visits(legs: Sequence[Leg]) -> dict[int, Visit]:
    """The visit before leg number i, for the stages at which the class may be a new one."""
    visits = {0: visit(legs[0].source)}
    for place, leg in enumerate(legs, 1):
        if not isinstance(leg, Conjugation) and leg.target.strands <= _MOST_STRANDS:
            visits[place] = visit(leg.target)
    return visits


def _cost(leg: Leg) -> int:
    return _EXCHANGE_COST if isinstance(leg, Exchange) else 1


def _conjugation(here: Visit, there: Visit) -> list[Leg]:
    """The conjugation from one member of a class to another, through the representative."""
    if here.braid == there.braid:
        return []
    return [Conjugation(here.braid, there.braid, here.conjugator_to(there))]
