"""Reading a link from an argument: a braid word, the code of a diagram, or polygons in space."""

from __future__ import annotations

import os
import re
from collections.abc import Collection, Sequence
from dataclasses import dataclass, field, replace
from itertools import count
from pathlib import Path
from typing import TYPE_CHECKING

from braidsearch.certificates.explanation import count_of
from braidsearch.command_line.answer import print_error
from braidsearch.command_line.arguments import read_standard_input, read_word_argument
from braidsearch.errors import InputError
from braidsearch.words import Braid, format_word

if TYPE_CHECKING:
    from braidsearch.diagrams import LinkDiagram
    from braidsearch.diagrams.polygons import Polygon
    from braidsearch.weaving import Woven

PREFIXES: dict[str, str] = {
    "pd": "planar-diagram",
    "gauss": "gauss",
    "dt": "dowker-thistlethwaite",
    "polygon": "polygon",
}
"""What stands in front of a drawing, and the notation that follows it."""

TITLES: dict[str, str] = {
    "planar-diagram": "planar diagram code",
    "gauss": "Gauss code",
    "dowker-thistlethwaite": "Dowker-Thistlethwaite code",
    "polygon": "polygons in space",
    "braid": "closed braid",
}

INPUTS = """A link is a braid word, or a drawing with its notation in front:
"pd: [[1,5,2,4],...]" (planar diagram code), "gauss: O1+ U2+ ...", "dt: 4 6 2", "polygon: FILE"
(rows x y z, a blank line between components). A code may stand in a file, "pd: @FILE"; a lone -
reads standard input, as in "pd: -"."""

WORD_OR_DRAWING = 'a braid word, or a drawing: "pd: ...", "gauss: ...", "dt: ...", "polygon: FILE"'
"""What the help of a command says of an argument that holds a link."""

_PREFIX = re.compile(rf"\s*({'|'.join(PREFIXES)})\s*:(.*)", re.DOTALL | re.IGNORECASE)
_OTHER_NAME = re.compile(r"\s*([^\W\d][^:\n]{0,39}?)\s*:")
_DRAWN = re.compile(r"\[\s*\[|\bX\s*\[|\b[OU][0-9]+[+-]")
_LONGEST_INPUT = 100_000_000
_LONGEST_PATH = 100


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
        return f"{TITLES[self.notation]}, {count_of(len(self.diagram.crossings), 'crossing')}"

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
        return _draw_polygons(turned, self.seed)


def read_link_argument(name: str, text: str) -> Braid:
    """The braid that an argument holds; a drawing is woven first, which standard error says.

    Raises InputError, which names the argument, the offending text and what was expected.
    """
    drawing = read_drawing(name, text)
    if drawing is None:
        return read_undrawn_argument(name, text)
    woven = weave_drawing(drawing)
    print_error(f"{name}: woven from its {drawing.title}: {format_word(woven.braid)}")
    for note in woven.notes:
        print_error(f"{name}: note: {note}")
    return woven.braid


def read_undrawn_argument(name: str, text: str) -> Braid:
    """The braid that an argument without a notation in front holds, as ``read_word_argument``.

    Raises InputError; for a text that looks like a drawing it says how to write one.
    """
    try:
        return read_word_argument(name, text)
    except InputError as error:
        raise InputError(f"{error}{_hint_at_notations(text)}") from None


def is_standard_input(text: str) -> bool:
    """Whether an argument is read from standard input: a lone -, or one behind a notation."""
    match = _PREFIX.match(text)
    return (text if match is None else match[2].strip()) == "-"


def read_drawing(name: str, text: str, seed: int = 0) -> Drawing | None:
    """The drawing that an argument holds, None where no notation of one stands in front.

    Raises InputError as ``read_link_argument`` does.
    """
    match = _PREFIX.match(text)
    if match is None:
        other = _OTHER_NAME.match(text)
        if other is not None:
            expected = f"a strand count, or a notation: {', '.join(PREFIXES)}"
            raise InputError(f"{name}: {other[1]!r} before the colon: expected {expected}")
        return None
    notation = PREFIXES[match[1].lower()]
    try:
        if notation == "polygon":
            return _draw_polygons(_read_polygons(match[2].strip()), seed)
        from braidsearch.diagrams.codes import parse_code  # noqa: PLC0415 - words come faster

        return Drawing(notation, *parse_code(notation, _text_of(match[2].strip())))
    except InputError as error:
        raise InputError(f"{name}: {error}") from None


def draw_closed_braid(braid: Braid) -> Drawing:
    """The drawing of a closed braid."""
    from braidsearch.diagrams import closed_braid_diagram  # noqa: PLC0415 - words come faster

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


def weave_drawing(drawing: Drawing) -> Woven:
    """The closed braid of a drawing, with what was checked."""
    from braidsearch.weaving import weave  # noqa: PLC0415 - words come faster

    return weave(drawing.diagram, drawing.notes)


def _hint_at_notations(text: str) -> str:
    if os.path.isfile(text):
        return '; a file has its notation in front: "polygon: FILE", "pd: @FILE"'
    if _DRAWN.search(text):
        return '; a drawing has its notation in front: "pd: [[1,5,2,4],...]", "gauss: O1+ U2+ ..."'
    return ""


def _read_polygons(source: str) -> list[Polygon]:
    from braidsearch.diagrams.polygons import parse_polygons  # noqa: PLC0415 - words come faster

    if source in ("", "@"):
        raise InputError("polygon: expected the name of a file with rows x y z, or -")
    is_named = source == "-" or source.startswith("@")
    return parse_polygons(_text_of(source if is_named else f"@{source}"))


def _draw_polygons(polygons: Sequence[Polygon], seed: int) -> Drawing:
    from braidsearch.diagrams.polygons import polygon_diagram  # noqa: PLC0415 - words come faster

    diagram = polygon_diagram(polygons, seed)
    return Drawing("polygon", diagram, polygons=tuple(polygons), seed=seed)


def _text_of(source: str) -> str:
    """The text itself, that of the file named behind @, or standard input for a lone -."""
    if source == "-":
        return read_standard_input(_LONGEST_INPUT)
    if not source.startswith("@"):
        return source
    path = source[1:].strip()
    if not path:
        raise InputError("'@': expected the name of a file behind it")
    try:
        return Path(path).read_text(encoding="utf-8-sig")
    except OSError as error:
        raise InputError(f"{_shown(path)}: {error.strerror}: expected a file") from None
    except (UnicodeDecodeError, ValueError):
        raise InputError(f"{_shown(path)}: expected a file of text in UTF-8") from None


def _shown(path: str) -> str:
    """The path as quoted in a message: of a long one the end, which tells most."""
    return repr(path if len(path) <= _LONGEST_PATH else "..." + path[3 - _LONGEST_PATH :])
