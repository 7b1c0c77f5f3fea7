"""A link as it was drawn, in any notation: read from text, turned around in parts, woven."""

from __future__ import annotations

from collections.abc import Collection, Sequence
from dataclasses import dataclass, field, replace
from itertools import count

from braidsearch.diagrams import LinkDiagram, closed_braid_diagram, parse_code
from braidsearch.diagrams.polygons.arrays import Polygon
from braidsearch.weaving.weave import Woven, weave
from braidsearch.words import Braid

TITLES: dict[str, str] = {
    "planar-diagram": "planar diagram code",
    "gauss": "Gauss code",
    "dowker-thistlethwaite": "Dowker-Thistlethwaite code",
    "polygon": "polygons in space",
    "braid": "closed braid",
}
"""Each notation of a drawing in words."""


@dataclass(frozen=True)
class Drawing:
    """A link as it was drawn: its notation, its diagram, and what the notation leaves open.

    ``order`` has the number in the diagram, from 0, of every component as the input numbers them,
    and is empty where these are the same. Polygons are kept beside the diagram, which forgets the
    place in the file of one that has no crossings; ``seed`` is the one they were drawn with.
    """

    notation: str
    diagram: LinkDiagram
    notes: tuple[str, ...] = ()
    order: tuple[int, ...] = ()
    polygons: tuple[Polygon, ...] = field(default=(), compare=False, repr=False)
    seed: int = 0

    @property
    def title(self) -> str:
        """The notation in words, with the size of the diagram."""
        crossings = len(self.diagram.crossings)
        return f"{TITLES[self.notation]}, {crossings} crossing{'s' * (crossings != 1)}"

    def reversed_components(self, components: Collection[int]) -> Drawing:
        """The drawing with some components turned around, which are numbered from 0.

        Polygons count as they stand in the file; components of a braid word by their strands from
        the left; those of a code in its order, of a planar diagram code by their least labels, and
        then those without crossings.
        """
        if not self.polygons:
            chosen = [self.order[k] if self.order else k for k in components]
            return replace(self, diagram=self.diagram.reversed_components(chosen))
        turned = [p[::-1] if k in components else p for k, p in enumerate(self.polygons)]
        return draw_polygons(turned, self.seed)


def parse_drawing(notation: str, text: str, seed: int = 0) -> Drawing:
    """The drawing that a text holds in a notation: a name among TITLES but that of a closed braid.

    ``seed`` chooses the projections of polygons that are tried. Raises InputError for a text that
    is not of the notation.
    """
    if notation == "polygon":
        from braidsearch.diagrams.polygons import parse_polygons  # noqa: PLC0415 - codes come faster

        return draw_polygons(parse_polygons(text), seed)
    return Drawing(notation, *parse_code(notation, text))


def draw_closed_braid(braid: Braid) -> Drawing:
    """The drawing of a closed braid."""
    diagram = closed_braid_diagram(braid)
    arcs: dict[int, int] = {}  # the last one at each place from the left: the closure takes it up
    for number, letter in enumerate(braid.word):
        arcs |= {abs(letter) - 1: 2 * number, abs(letter): 2 * number + 1}
    circles = count(len(diagram.components))
    order = (
        diagram.component_of_arc[arcs[place]] if place in arcs else next(circles)
        for place in range(braid.strands)
    )
    return Drawing("braid", diagram, order=tuple(dict.fromkeys(order)))


def draw_polygons(polygons: Sequence[Polygon], seed: int = 0) -> Drawing:
    """The drawing of closed polygons in space, from a direction that ``seed`` chooses."""
    from braidsearch.diagrams.polygons import polygon_diagram  # noqa: PLC0415 - codes come faster

    diagram = polygon_diagram(polygons, seed)
    return Drawing("polygon", diagram, polygons=tuple(polygons), seed=seed)


def weave_drawing(drawing: Drawing) -> Woven:
    """The closed braid of a drawing, with what was checked and what its notation leaves open."""
    return weave(drawing.diagram, drawing.notes)
