"""What stands on a page: curves, lines, boxes, texts, as values that can be moved and stacked."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator, Sequence
from dataclasses import dataclass, replace
from itertools import accumulate
from textwrap import wrap

from braidsearch.drawing.curves import Point
from braidsearch.drawing.geometry import Geometry
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
    """Things on a page of their own, whose top left corner is the origin.

    ``parts`` are further ones on it, each with how far it lies to the right and downwards.
    """

    width: float
    height: float
    geometries: tuple[Geometry, ...] = ()
    boxes: tuple[Box, ...] = ()
    lines: tuple[Line, ...] = ()
    texts: tuple[Text, ...] = ()
    parts: tuple[tuple[Part, float, float], ...] = ()

    def iter_placed(self, right: float = 0.0, down: float = 0.0) -> Iterator[Part]:
        """The part and those on it, each without further ones and moved to its place."""

        def place(point: Point) -> Point:
            return point[0] + right, point[1] + down

        yield Part(
            self.width,
            self.height,
            tuple(geometry.mapped(place) for geometry in self.geometries),
            tuple(replace(box, bounds=map_rectangle(box.bounds, place)) for box in self.boxes),
            tuple(Line(place(each.start), place(each.end), each.is_dashed) for each in self.lines),
            tuple(replace(text, place=place(text.place)) for text in self.texts),
        )
        for part, further_right, further_down in self.parts:
            yield from part.iter_placed(right + further_right, down + further_down)

    def flattened(self) -> Part:
        """The same page without parts on it."""
        placed = list(self.iter_placed())
        return Part(
            self.width,
            self.height,
            tuple(each for part in placed for each in part.geometries),
            tuple(each for part in placed for each in part.boxes),
            tuple(each for part in placed for each in part.lines),
            tuple(each for part in placed for each in part.texts),
        )


@dataclass(frozen=True)
class Sheet:
    """A whole picture: what is drawn, what it is called, and its description in words."""

    part: Part
    title: str
    description: str
    is_transparent: bool = False
    identifier: str = ""


def map_rectangle(bounds: Rectangle, place: Callable[[Point], Point]) -> Rectangle:
    """The rectangle between the images of two opposite corners."""
    (x0, y0), (x1, y1) = place((bounds[0], bounds[1])), place((bounds[2], bounds[3]))
    return min(x0, x1), min(y0, y1), max(x0, x1), max(y0, y1)


def overlay(placed: Iterable[tuple[Part, float, float]]) -> Part:
    """Parts on one page, each so far to the right and downwards."""
    parts = tuple(placed)
    width = max((right + part.width for part, right, _ in parts), default=0.0)
    height = max((down + part.height for part, _, down in parts), default=0.0)
    return Part(width, height, parts=parts)


def beside(parts: Sequence[Part]) -> Part:
    """The parts from left to right."""
    starts = accumulate((part.width for part in parts), initial=0.0)
    return overlay((part, start, 0.0) for part, start in zip(parts, starts, strict=False))


def below(parts: Sequence[Part], space: float = 0.0) -> Part:
    """The parts one under the other, with so much space between them."""
    starts = accumulate((part.height + space for part in parts), initial=0.0)
    return overlay((part, 0.0, start) for part, start in zip(parts, starts, strict=False))


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
