"""The graph of conjugacy classes met: nodes are classes, edges the moves between them."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import pairwise

import networkx as nx

from braidsearch.moves import Move, MoveChain
from braidsearch.normal_form.conjugacy import ClassKey, ConjugacyClass
from braidsearch.words import Braid

SUMMIT_CAP = 200
"""Members of an ultra summit set that the search walks at most, for each class."""


class ClassGraph:
    """Conjugacy classes as nodes, each with its representative braid; edges hold drafts of moves.

    An edge drawn from a to b holds the moves from the representative of a to that of b, not yet
    checked. One graph serves both sides of a query and every proposer of edges.
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

    def add_edge(self, key: ClassKey, draft: MoveChain, found: ConjugacyClass) -> None:
        """Join a class to that of the draft's end; the draft starts at its representative."""
        if found.key == key or self.graph.has_edge(key, found.key):
            return
        draft.conjugate(found.conjugator, self.representative(found.key).word)
        moves = tuple(draft.moves)
        self.graph.add_edge(key, found.key, moves=moves, origin=key, weight=len(moves))

    def shortest_moves(self, left: ClassKey, right: ClassKey) -> list[Move]:
        """The moves along a shortest path, from representative to representative."""
        path: Sequence[ClassKey] = nx.shortest_path(self.graph, left, right, weight="weight")
        return [move for here, there in pairwise(path) for move in self._edge_moves(here, there)]

    def _edge_moves(self, here: ClassKey, there: ClassKey) -> list[Move]:
        data = self.graph.edges[here, there]
        if data["origin"] == here:
            return list(data["moves"])
        draft = MoveChain(self.representative(there), is_checked=False)
        draft.extend(data["moves"])
        return draft.reversed_moves()
