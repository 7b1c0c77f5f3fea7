"""Writing a sheet as SVG: the same sheet gives the same text, byte for byte."""

from __future__ import annotations

import hashlib
from collections.abc import Iterable, Iterator, Sequence
from html import escape

from braidsearch.drawing.curves import Cubic, Point
from braidsearch.drawing.geometry import ARROW_LENGTH, STROKE, Arrow, Curve, visible_runs
from braidsearch.drawing.palette import BAND, FRAME, HAIRLINE, PAPER, look_of
from braidsearch.drawing.sheet import Box, Line, Sheet, Text

FONT = "ui-monospace, 'DejaVu Sans Mono', Menlo, Consolas, monospace"

_INLAY = 1.3
_ARROW_WIDTH, _ARROW_NOTCH = 10.0, 2.8


def write_svg(sheet: Sheet) -> str:
    """The sheet as one SVG element, which may stand in a file or within a page.

    Lengths are rounded to hundredths. There are no styles that could reach other parts of a page,
    and the ids, which join the picture to its title and description, begin with a digest of the
    content where the sheet names no ``identifier``.
    """
    body = "\n".join(_iter_lines(sheet))
    width, height = format_number(sheet.part.width), format_number(sheet.part.height)
    prefix = sheet.identifier or _digest(sheet, body)
    title, description = f"{_escaped(prefix)}-title", f"{_escaped(prefix)}-description"
    return "\n".join(
        [
            f'<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 {width} {height}" '
            f'width="{width}" height="{height}" style="max-width:100%;height:auto" '
            f'role="img" aria-labelledby="{title} {description}">',
            f'<title id="{title}">{_escaped(sheet.title)}</title>',
            f'<desc id="{description}">{_escaped(sheet.description)}</desc>',
            body,
            "</svg>",
        ]
    )


def format_number(value: float) -> str:
    """The number rounded to hundredths, without needless zeros."""
    text = f"{value:.2f}".rstrip("0").rstrip(".")
    return "0" if text == "-0" else text


def format_path(runs: Iterable[Sequence[Cubic]], is_closed: bool = False) -> str:
    """Path data of runs of curves; straight pieces that continue each other are one line."""
    return " ".join(_format_run(run, is_closed) for run in runs)


def _digest(sheet: Sheet, body: str) -> str:
    content = "\n".join([sheet.title, sheet.description, body])
    return "braid-" + hashlib.sha256(content.encode()).hexdigest()[:10]


def _iter_lines(sheet: Sheet) -> Iterator[str]:
    part = sheet.part.flattened()
    curves = [curve for geometry in part.geometries for curve in geometry.curves]
    if not sheet.is_transparent:
        yield f'<rect width="100%" height="100%" fill="{PAPER}"/>'
    yield from map(_format_box, part.boxes)
    if part.lines:
        yield f'<g fill="none" stroke="{HAIRLINE}" stroke-width="1">'
        yield from map(_format_line, part.lines)
        yield "</g>"
    if curves:
        yield f'<g fill="none" stroke-width="{format_number(STROKE)}" stroke-linejoin="round">'
        yield from _iter_strands(curves)
        yield "</g>"
        yield '<g stroke="none">'
        for geometry in part.geometries:
            yield from map(_format_arrow, geometry.arrows)
        yield "</g>"
    if part.texts:
        yield f'<g font-family="{FONT}">'
        yield from map(_format_text, part.texts)
        yield "</g>"


def _iter_strands(curves: Sequence[Curve]) -> Iterator[str]:
    """One group for each component: its strands, and the light line inside them."""
    paths: dict[int, list[str]] = {}
    for curve in curves:
        runs = visible_runs(curve)
        is_whole = curve.is_closed and all(segment.is_over for segment in curve.segments)
        paths.setdefault(curve.component, []).append(format_path(runs, is_whole))
    for component in sorted(paths):
        look, data = look_of(component), " ".join(paths[component])
        yield f'<g stroke="{look.colour}">'
        yield f'<path d="{data}"/>'
        if look.dashes:
            dashes = f' stroke-dasharray="{look.dashes}"'
            yield f'<path stroke="{PAPER}" stroke-width="{_INLAY}"{dashes} d="{data}"/>'
        yield "</g>"


def _format_run(run: Sequence[Cubic], is_closed: bool) -> str:
    pieces = [f"M{_format_point(run[0].start)}"]
    for place, cubic in enumerate(run):
        if not cubic.is_straight:
            controls = map(_format_point, cubic.points[1:])
            pieces.append("C" + " ".join(controls))
        elif place + 1 == len(run) or not _continues(cubic, run[place + 1]):
            pieces.append(f"L{_format_point(cubic.end)}")
    return "".join(pieces) + ("Z" if is_closed else "")


def _continues(cubic: Cubic, following: Cubic) -> bool:
    """Whether both are straight in the same direction; strands never turn back."""
    return following.is_straight and any(
        cubic.start[axis] == cubic.end[axis] == following.end[axis] for axis in (0, 1)
    )


def _format_point(point: Point) -> str:
    return f"{format_number(point[0])} {format_number(point[1])}"


def _format_box(box: Box) -> str:
    left, top, right, bottom = box.bounds
    look = (
        f'fill="none" stroke="{FRAME}" stroke-width="1.2" stroke-dasharray="3 3"'
        if box.is_frame
        else f'fill="{BAND}"'
    )
    return (
        f'<rect x="{format_number(left)}" y="{format_number(top)}" '
        f'width="{format_number(right - left)}" height="{format_number(bottom - top)}" '
        f'rx="7" {look}/>'
    )


def _format_line(line: Line) -> str:
    dashes = ' stroke-dasharray="2 3"' if line.is_dashed else ""
    return f'<path d="M{_format_point(line.start)}L{_format_point(line.end)}"{dashes}/>'


def _format_arrow(arrow: Arrow) -> str:
    """A head with a notch, its middle on the strand."""
    (x, y), (dx, dy) = arrow.centre, arrow.direction
    corners = (
        (ARROW_LENGTH / 2, 0.0),
        (-ARROW_LENGTH / 2, _ARROW_WIDTH / 2),
        (_ARROW_NOTCH - ARROW_LENGTH / 2, 0.0),
        (-ARROW_LENGTH / 2, -_ARROW_WIDTH / 2),
    )
    points = [
        _format_point((x + along * dx - across * dy, y + along * dy + across * dx))
        for along, across in corners
    ]
    return f'<path fill="{look_of(arrow.component).colour}" d="M{"L".join(points)}Z"/>'


def _format_text(text: Text) -> str:
    anchor = "" if text.anchor == "start" else f' text-anchor="{text.anchor}"'
    x, y, size = map(format_number, (*text.place, text.size))
    return (
        f'<text x="{x}" y="{y}" font-size="{size}" fill="{text.colour}"{anchor}>'
        f"{_escaped(text.content)}</text>"
    )


def _escaped(text: str) -> str:
    """The text within XML, in ASCII; characters that XML cannot hold become question marks."""
    allowed = "".join(
        character if character.isprintable() or character == "\n" else "?" for character in text
    )
    return escape(allowed).encode("ascii", "xmlcharrefreplace").decode("ascii")
