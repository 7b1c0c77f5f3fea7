"""Components as sequences of passages through crossings: what Gauss codes write down."""

from __future__ import annotations

from collections.abc import Sequence

from braidsearch.diagrams.link_diagram import Crossing, LinkDiagram
from braidsearch.errors import InputError

Passage = tuple[int, bool]
"""The number of a crossing, and whether the component passes over there."""


def diagram_from_passages(
    components: Sequence[Sequence[Passage]], signs: Sequence[int]
) -> LinkDiagram:
    """The diagram whose components pass these crossings, numbered from 0, with these signs.

    Every crossing is passed over once and under once. Arc k enters the k-th passage, counted
    along the components from 0. A component without passages has no crossings.
    """
    under: list[tuple[int, int]] = [(0, 0)] * len(signs)
    over: list[tuple[int, int]] = [(0, 0)] * len(signs)
    first = 0
    for component in components:
        for place, (crossing, is_over) in enumerate(component):
            arcs = (first + place, first + (place + 1) % len(component))
            (over if is_over else under)[crossing] = arcs
        first += len(component)
    crossings = []
    for sign, (enters, leaves), (over_enters, over_leaves) in zip(signs, under, over, strict=True):
        if sign > 0:
            crossings.append(Crossing((enters, over_leaves, leaves, over_enters), sign))
        else:
            crossings.append(Crossing((enters, over_enters, leaves, over_leaves), sign))
    return LinkDiagram(tuple(crossings), sum(not component for component in components))


def passages_of_diagram(diagram: LinkDiagram) -> list[list[Passage]]:
    """The passages of each component, from its least arc; circles come last, without any."""
    passage_of_arc: list[Passage] = [(0, False)] * diagram.arc_count
    for number, crossing in enumerate(diagram.crossings):
        (under, _), (over, _) = crossing.passages
        passage_of_arc[under], passage_of_arc[over] = (number, False), (number, True)
    found = [[passage_of_arc[arc] for arc in arcs] for arcs in diagram.components]
    return found + [[] for _ in range(diagram.circles)]


def planar_signs(components: Sequence[Sequence[Passage]], crossing_count: int) -> list[int]:
    """Signs that make the diagram planar; each connected piece begins with a positive crossing.

    A crossing becomes a wheel: a hub and four spokes, in the order under-strand in, over-strand
    in, under-strand out, over-strand out around the rim. A wheel has one embedding in the sphere
    up to reflection, so in a planar embedding of the whole the spokes leave every hub in this
    order or in the opposite one: this is the sign. Where the diagram is prime and connected, the
    embedding is unique up to reflection of the sphere, which is fixed by the first sign.

    Raises InputError where there is none.

    Source: Whitney, Congruent graphs and the connectivity of graphs, 1932; planarity as in
    networkx: Brandes, The left-right planarity test, 2009.
    """
    # Here, not above: networkx takes longer to load than most diagrams take.
    import networkx  # noqa: PLC0415

    graph = networkx.Graph()
    for crossing in range(crossing_count):
        rim = [(crossing, spoke) for spoke in range(4)]
        graph.add_edges_from((crossing, point) for point in rim)
        graph.add_edges_from(zip(rim, rim[1:] + rim[:1], strict=True))
    for component in components:
        for place, (crossing, is_over) in enumerate(component):
            following, is_next_over = component[(place + 1) % len(component)]
            graph.add_edge((crossing, 2 + is_over), (following, 0 + is_next_over))
    is_planar, embedding = networkx.check_planarity(graph)
    if not is_planar:
        plural = "s" * (crossing_count != 1)
        raise InputError(
            f"a code of {crossing_count} crossing{plural} that no planar diagram has: "
            "expected the code of a diagram in the plane"
        )
    signs = [_sign_at_hub(list(embedding.neighbors_cw_order(x))) for x in range(crossing_count)]
    for piece in networkx.connected_components(graph):
        hubs = sorted(node for node in piece if isinstance(node, int))
        if signs[hubs[0]] < 0:
            for hub in hubs:
                signs[hub] = -signs[hub]
    return signs


def _sign_at_hub(clockwise: list[tuple[int, int]]) -> int:
    """Positive where the over-strand's exit comes first, counterclockwise from the under-arc."""
    spokes = [spoke for _, spoke in clockwise]
    after = spokes[(spokes.index(0) + 1) % 4]
    return 1 if after == 1 else -1
