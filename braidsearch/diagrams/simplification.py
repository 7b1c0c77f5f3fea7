"""Simplification of diagrams by moves that never add a crossing."""

from __future__ import annotations

from braidsearch.diagrams.diagram_ends import DiagramEnds
from braidsearch.diagrams.link_diagram import LinkDiagram
from braidsearch.diagrams.passes import shorten_passes
from braidsearch.diagrams.reidemeister import remove_loops_and_clasps, remove_nugatory_crossings


def simplify_diagram(diagram: LinkDiagram) -> LinkDiagram:
    """A diagram of the same oriented link, with fewer crossings where that is plain to see.

    Loops and clasps that come apart (Reidemeister's first and second moves) go first, then
    nugatory crossings, then strands over or under several crossings are laid along shorter ways,
    until none of these saves a crossing. A diagram with nothing to save is returned as it is;
    otherwise the arcs are numbered anew, in order along each component.
    """
    ends = DiagramEnds(diagram)
    remove_loops_and_clasps(ends, list(range(len(diagram.crossings))))
    while remove_nugatory_crossings(ends) or shorten_passes(ends):
        pass
    if all(ends.is_left):
        return diagram
    return ends.to_diagram()
