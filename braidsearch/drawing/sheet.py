"""What stands on a page: curves, lines, boxes, texts, as values that can be moved and stacked."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass, field, replace
from textwrap import wrap

from braidsearch.drawing.curves import Point
from braidsearch.drawing.geometry import Arrow, Curve, Geometry
from braidsearch.drawing.palette import INK

CHARACTER_WIDTH = 0.62
"""Of a monospaced font, in units of its size; the usual ones have 0.55 to 0.61."""

CAPITAL_HEIGHT = 0.74
DESCENT = 0.22

MARGIN = 12.0
COMFORTABLE_WIDTH = 520.0
"""A picture is broken into lines about so wide: on a screen of 360 pixels letters stay readable."""

Rectangle = tuple[float, float, float, float]
"""Left, top, right, bottom."""


@dataclass(frozen=True, slots=True)
class Text:
    """A line of text; ``place`` is on its base line, at its start, middle or end."""

    place: Point
    content: str
    size: float = 11.0
    anchor: str = "start"
    colour: str = INK

    @property
    def width(self) -> float:
        """The room that it takes at most, in a monospaced font."""
        return len(self.content) * self.size * CHARACTER_WIDTH

    @property
    def bounds(self) -> Rectangle:
        """The rectangle that it fills."""
        x, y = self.place
        left = x - self.width * {"start": 0.0, "middle": 0.5, "end": 1.0}[self.anchor]
        return left, y - CAPITAL_HEIGHT * self.size, left + self.width, y + DESCENT * self.size


@dataclass(frozen=True, slots=True)
class Line:
    """A hairline; a dashed one says that the picture goes on elsewhere."""

    start: Point
    end: Point
    is_dashed: bool = False


@dataclass(frozen=True, slots=True)
class Box:
    """A soft band behind what a move acts on, or, as a frame, around what it has made."""

    bounds: Rectangle
    is_frame: bool = False


@dataclass(frozen=True)
class Part:
    """Things on a page of their own, whose top left corner is the origin."""

    width: float
    height: float
    geometries: tuple[Geometry, ...] = ()
    boxes: tuple[Box, ...] = ()
    lines: tuple[Line, ...] = ()
    texts: tuple[Text, ...] = ()

    @property
    def curves(self) -> tuple[Curve, ...]:
        """All strands."""
        return tuple(curve for geometry in self.geometries for curve in geometry.curves)

    @property
    def arrows(self) -> tuple[Arrow, ...]:
        """All heads of arrows."""
        return tuple(arrow for geometry in self.geometries for arrow in geometry.arrows)

    def moved(self, right: float, down: float) -> Part:
        """The same things on a page that is larger by so much on the left and at the top."""

        def place(point: Point) -> Point:
            return point[0] + right, point[1] + down

        return Part(
            self.width + right,
            self.height + down,
            tuple(geometry.mapped(place) for geometry in self.geometries),
            tuple(replace(box, bounds=map_rectangle(box.bounds, place)) for box in self.boxes),
            tuple(Line(place(each.start), place(each.end), each.is_dashed) for each in self.lines),
            tuple(replace(text, place=place(text.place)) for text in self.texts),
        )


@dataclass(frozen=True)
class Sheet:
    """A whole picture: what is drawn, what it is called, and its description in words."""

    part: Part
    title: str
    description: str
    is_transparent: bool = False
    identifier: str = field(default="")


def map_rectangle(bounds: Rectangle, place: Callable[[Point], Point]) -> Rectangle:
    """The rectangle between the images of two opposite corners."""
    (x0, y0), (x1, y1) = place((bounds[0], bounds[1])), place((bounds[2], bounds[3]))
    return min(x0, x1), min(y0, y1), max(x0, x1), max(y0, y1)


def overlay(parts: Sequence[Part]) -> Part:
    """All parts on one page."""
    return Part(
        max((part.width for part in parts), default=0.0),
        max((part.height for part in parts), default=0.0),
        tuple(each for part in parts for each in part.geometries),
        tuple(each for part in parts for each in part.boxes),
        tuple(each for part in parts for each in part.lines),
        tuple(each for part in parts for each in part.texts),
    )


def beside(parts: Sequence[Part]) -> Part:
    """The parts from left to right."""
    placed, at = [], 0.0
    for part in parts:
        placed.append(part.moved(at, 0.0))
        at += part.width
    return overlay(placed)


def below(parts: Sequence[Part], space: float = 0.0) -> Part:
    """The parts one under the other, with so much space between them."""
    placed, at = [], 0.0
    for part in parts:
        placed.append(part.moved(0.0, at))
        at += part.height + space
    return overlay(placed)


def in_lines(parts: Sequence[Part], width: float = COMFORTABLE_WIDTH) -> Part:
    """The parts from left to right in lines of at most this width, or of one part each."""
    lines: list[list[Part]] = []
    for part in parts:
        if lines and sum(each.width for each in lines[-1]) + part.width <= width:
            lines[-1].append(part)
        else:
            lines.append([part])
    return below([beside(line) for line in lines])


def paragraph(
    content: str, width: float = COMFORTABLE_WIDTH, size: float = 11.0, colour: str = INK
) -> Part:
    """The text broken into lines between margins."""
    columns = int((width - 2 * MARGIN) / (size * CHARACTER_WIDTH))
    step = 1.4 * size
    lines = wrap(content, columns) or [""]
    texts = tuple(
        Text((MARGIN, step * (row + 1) - 0.3 * size), line, size, colour=colour)
        for row, line in enumerate(lines)
    )
    longest = max(text.width for text in texts)
    return Part(longest + 2 * MARGIN, step * len(lines), texts=texts)
