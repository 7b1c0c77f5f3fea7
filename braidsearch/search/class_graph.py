"""The graph of conjugacy classes met: nodes are classes, edges the moves between them."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import pairwise

import networkx as nx

from braidsearch.moves import Conjugate, Move, MoveChain
from braidsearch.normal_form.conjugacy import ClassKey, ConjugacyClass
from braidsearch.search.route import Stretch
from braidsearch.words import Braid


class ClassGraph:
    """Conjugacy classes as nodes, each with its representative braid; edges are stretches.

    An edge drawn from a to b leads from the representative of a to a braid in b, and from there
    by a conjugation to the representative of b; its moves are made when they are asked for. One
    graph serves both sides of a query and every proposer of edges.
    """

    def __init__(self) -> None:
        self.graph = nx.Graph()

    def __len__(self) -> int:
        return int(self.graph.number_of_nodes())

    def add_class(self, found: ConjugacyClass) -> None:
        """Enter the class as a node, if it is new."""
        if found.key not in self.graph:
            self.graph.add_node(found.key, representative=found.representative)

    def representative(self, key: ClassKey) -> Braid:
        """The braid that stands for the class."""
        braid: Braid = self.graph.nodes[key]["representative"]
        return braid

    def add_edge(self, key: ClassKey, stretch: Stretch, found: ConjugacyClass, cost: int) -> None:
        """Join a class to that in which the stretch ends; ``cost`` is a guess at its moves."""
        self.add_class(found)
        if found.key == key or self.graph.has_edge(key, found.key):
            return
        self.graph.add_edge(
            key, found.key, stretch=stretch, by=found.conjugator, origin=key, weight=cost
        )

    def shortest_moves(self, left: ClassKey, right: ClassKey) -> list[Move]:
        """The moves along a shortest path, from representative to representative."""
        path: Sequence[ClassKey] = nx.shortest_path(self.graph, left, right, weight="weight")
        return [move for here, there in pairwise(path) for move in self._edge_moves(here, there)]

    def _edge_moves(self, here: ClassKey, there: ClassKey) -> list[Move]:
        data = self.graph.edges[here, there]
        end = there if data["origin"] == here else here
        draft = MoveChain(self.representative(data["origin"]), is_checked=False)
        draft.extend(data["stretch"].moves)
        draft.append(Conjugate(data["by"], self.representative(end).word))
        return draft.moves if data["origin"] == here else draft.reversed_moves()
