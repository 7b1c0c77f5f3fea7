"""braidsearch weave LINK: a closed braid for a drawing or a curve in space."""

from __future__ import annotations

import re
from argparse import Namespace
from collections.abc import Sequence
from dataclasses import replace
from typing import TYPE_CHECKING

from braidsearch.certificates import braid_to_json
from braidsearch.certificates.explanation import count_of
from braidsearch.command_line.answer import SUCCESS, Answer, json_answer
from braidsearch.command_line.arguments import CommandParser
from braidsearch.command_line.link_input import (
    INPUTS,
    read_drawing,
    read_undrawn_argument,
)
from braidsearch.errors import InputError
from braidsearch.words import format_word
from braidsearch.words.link_notation import PREFIXES

if TYPE_CHECKING:
    from braidsearch.diagrams import LinkDiagram
    from braidsearch.weaving import Woven
    from braidsearch.weaving.drawings import Drawing

_DESCRIPTION = f"""Print a closed braid for a link that is given as a drawing or as a curve in
space, by Vogel's moves on the diagram, with what was checked: invariants computed on the drawing
itself against those of the braid.

{INPUTS}

--reverse turns components around, which no braid word can say. They are numbered from 1 in the
order of the input: polygons as in the file; in a braid word by strands, from the left; in a planar
diagram code by their least labels; in codes those without crossings last. --code writes the diagram
of the closed braid in another notation."""

_EXAMPLES = """  braidsearch weave "pd: [[1,5,2,4],[3,1,4,6],[5,3,6,2]]"
  braidsearch weave "gauss: O1+ U2+ O3+ U1+ O2+ U3+" --code dt
  braidsearch weave "polygon: ring.xyz" --json
  braidsearch weave "1 1" --reverse 2"""

_LONGEST_NUMBER = 40
_CODES = tuple(prefix for prefix in PREFIXES if prefix != "polygon")


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for what is no drawing of a link."""
    given = _parser().read(arguments)
    if given.code is not None and given.code not in _CODES:
        raise InputError(f"--code: {given.code!r}: expected one of {', '.join(_CODES)}")
    drawing = _reversed(_read(given.link, _seed(given)), given.reverse or [])
    from braidsearch.weaving.drawings import weave_drawing  # noqa: PLC0415 - help comes faster

    woven = weave_drawing(drawing)
    code = None
    if given.code is not None:
        woven, code = _written(woven, given.code)
    if given.json:
        return json_answer(SUCCESS, _to_json(woven, given.code, code))
    return Answer(SUCCESS, _report(drawing, woven, given, code))


def _parser() -> CommandParser:
    parser = CommandParser("weave", _DESCRIPTION, _EXAMPLES)
    parser.add_word("link", "a drawing, or a braid word")
    parser.add_text(
        "--reverse",
        metavar="NUMBERS",
        explanation="components to turn around: 2 or 1,3",
        is_repeatable=True,
    )
    parser.add_text("--code", metavar="NAME", explanation="write it as pd, gauss or dt too")
    parser.add_number("--seed", int, "an integer", "for the projections of polygons that are tried")
    parser.add_json()
    return parser


def _seed(given: Namespace) -> int:
    seed = getattr(given, "seed", 0)
    if seed is None:  # none lifts the limits of other commands; here there is nothing to lift
        raise InputError("--seed: 'none': expected an integer")
    return int(seed)


def _read(text: str, seed: int) -> Drawing:
    """The drawing; a braid word is the drawing of its closure."""
    drawing = read_drawing("LINK", text, seed)
    if drawing is not None:
        return drawing
    braid = read_undrawn_argument("LINK", text)
    from braidsearch.weaving.drawings import draw_closed_braid  # noqa: PLC0415 - help comes faster

    return draw_closed_braid(braid)


def _reversed(drawing: Drawing, values: Sequence[str]) -> Drawing:
    """The drawing with the components named in the values turned around."""
    numbers = [_read_number(part, drawing.diagram) for value in values for part in value.split(",")]
    if not numbers:
        return drawing
    return drawing.reversed_components({number - 1 for number in numbers})


def _read_number(text: str, diagram: LinkDiagram) -> int:
    count = diagram.component_count
    plain = text.strip()
    if not re.fullmatch(r"[0-9]{1,9}", plain) or not 1 <= int(plain) <= count:
        shown = plain if len(plain) <= _LONGEST_NUMBER else plain[: _LONGEST_NUMBER - 3] + "..."
        raise InputError(f"--reverse: {shown!r}: expected the number of a component, 1 to {count}")
    return int(plain)


def _written(woven: Woven, prefix: str) -> tuple[Woven, str]:
    """The diagram of the closed braid in a notation, and a note on what that leaves open."""
    from braidsearch import diagrams  # noqa: PLC0415 - help comes faster

    write = {
        "pd": diagrams.format_planar_diagram_code,
        "gauss": diagrams.format_gauss_code,
        "dt": diagrams.format_dowker_thistlethwaite_code,
    }[prefix]
    code = write(diagrams.closed_braid_diagram(woven.braid))
    _, notes = diagrams.parse_code(PREFIXES[prefix], code)
    new = [note for note in notes if note not in woven.notes]
    return replace(woven, notes=(*woven.notes, *new)), code


def _to_json(woven: Woven, name: str | None, code: str | None) -> dict[str, object]:
    found: dict[str, object] = {"braid": braid_to_json(woven.braid), "checks": list(woven.checks)}
    found["notes"] = list(woven.notes)
    return found if name is None else found | {"code": {name: code}}


def _report(drawing: Drawing, woven: Woven, given: Namespace, code: str | None) -> str:
    braid = woven.braid
    lines = [
        f"woven: {format_word(braid)}",
        f"from: {drawing.title}",
        f"to: {count_of(braid.strands, 'strand')}, {count_of(len(braid), 'letter')}",
    ]
    lines += [f"checked: {check}" for check in woven.checks]
    lines += [f"note: {note}" for note in woven.notes]
    if code is not None:
        lines.append(f"{given.code}: {code}")
    return "\n".join(lines)
