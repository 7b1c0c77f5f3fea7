"""A drawing woven into a closed braid."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

from braidsearch.diagrams.link_diagram import LinkDiagram
from braidsearch.diagrams.simplification import simplify_diagram
from braidsearch.diagrams.vogel import braid_from_diagram
from braidsearch.weaving.cross_checks import check_same_invariants
from braidsearch.words import Braid, cyclic_reduce


@dataclass(frozen=True)
class Woven:
    """A braid whose closure is the oriented link of a drawing.

    ``checks`` says, one sentence each, which invariants of the drawing, computed on it, were
    found to be those of the closed braid. ``notes`` says what a reader should know besides:
    what the notation of the drawing leaves open, and how far the diagram was simplified.
    """

    braid: Braid
    checks: tuple[str, ...]
    notes: tuple[str, ...] = ()


def weave(diagram: LinkDiagram, notes: Iterable[str] = ()) -> Woven:
    """A closed braid with the oriented link of the diagram, and what was checked.

    The diagram is simplified first, see ``simplify_diagram``, unless that makes more Seifert
    circles; then there is a strand for each of them, and the word is cyclically reduced. ``notes``
    are put in front of those of the weaving, see ``parse_code``.

    Raises CapacityError where the braid would have too many strands or letters, and WeavingError
    where a cross-check fails, so that no wrong braid leaves.
    """
    simplified = simplify_diagram(diagram)
    chosen = min((simplified, diagram), key=lambda drawn: drawn.seifert_circle_count)
    braid = cyclic_reduce(braid_from_diagram(chosen))[0]
    checks = check_same_invariants(diagram, simplified, braid)
    return Woven(braid, checks, (*notes, *_notes_on(diagram, chosen)))


def _notes_on(diagram: LinkDiagram, chosen: LinkDiagram) -> list[str]:
    before, after = len(diagram.crossings), len(chosen.crossings)
    notes = []
    if after < before:
        notes.append(f"the diagram was simplified from {before} crossings to {after}")
    parts = len(chosen.pieces) + chosen.circles
    if parts > 1:
        notes.append(
            f"the diagram falls into {parts} parts, which lie beside each other as a split union"
        )
    return notes
