"""A braid or its closure laid out on a page: numbers, letters, bands, parts beside each other."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from itertools import pairwise

from braidsearch.drawing.curves import Point
from braidsearch.drawing.geometry import LEAD, LEVEL_HEIGHT, STRAND_SPACING, Geometry
from braidsearch.drawing.levels import Level, arrange_levels
from braidsearch.drawing.palette import QUIET
from braidsearch.drawing.sheet import (
    COMFORTABLE_WIDTH,
    MARGIN,
    Box,
    Line,
    Part,
    Rectangle,
    Text,
    below,
    in_lines,
    map_rectangle,
    overlay,
)
from braidsearch.drawing.strand_paths import (
    braid_geometry,
    closing_reach,
    closure_geometry,
    components_at_levels,
    components_of_positions,
    length_of,
)
from braidsearch.errors import InputError
from braidsearch.words import Braid

DIRECTIONS = ("down", "right")

_NUMBER_ROOM = 22.0
_LETTER_ROOM = 22.0
_LETTER_MARGIN = 3.5
"""Between a letter and the edge of the mark around it."""

_OVERHANG = 8.0
_LEVELS_DOWNWARDS = 22
"""How many levels a picture that runs downwards has before it goes on beside."""


@dataclass(frozen=True, slots=True)
class Mark:
    """Letters to be marked, from number ``first`` up to but without number ``last``, from 0.

    A soft band lies behind them; with ``is_frame`` a dashed outline runs around them instead.
    """

    first: int
    last: int
    is_frame: bool = False


@dataclass(frozen=True, slots=True)
class Options:
    """How a braid is to be drawn.

    ``direction`` is "down", or "right" for the same picture turned a quarter counterclockwise:
    strands run to the right, strand 1 at the bottom. ``has_letters`` writes each letter beside its
    crossing. Raises InputError for another direction.
    """

    direction: str = "down"
    has_letters: bool = False
    marks: tuple[Mark, ...] = ()

    def __post_init__(self) -> None:
        if self.direction not in DIRECTIONS:
            expected = " or ".join(DIRECTIONS)
            raise InputError(f"direction {self.direction!r}: expected {expected}")

    @property
    def is_downwards(self) -> bool:
        """Whether strands run downwards."""
        return self.direction == "down"


def braid_part(braid: Braid, options: Options, components: Sequence[int] = ()) -> Part:
    """The braid on a page of its own, in as many parts as it takes.

    ``components`` are those of the start positions, as ``Braid.component_cycles`` has them where
    none are given.
    """
    levels = arrange_levels(braid.word, _edges(options.marks))
    starts = components or components_of_positions(braid)
    above = list(components_at_levels(braid, levels, starts))
    cuts = _cuts(len(levels), braid.strands, options)
    pieces = [
        _piece_part(braid, levels[first:last], above[first], options, (number, len(cuts)))
        for number, (first, last) in enumerate(cuts)
    ]
    return in_lines(pieces) if options.is_downwards else below(pieces)


def closure_part(braid: Braid, options: Options) -> Part:
    """The closure on a page of its own."""
    levels = arrange_levels(braid.word, _edges(options.marks))
    geometry = closure_geometry(braid, levels)
    reach, rise = closing_reach(0, braid.strands)
    last = (braid.strands - 1) * STRAND_SPACING
    frame = (-_NUMBER_ROOM, -rise - MARGIN, last + reach + MARGIN, length_of(levels) + rise)
    frame = (*frame[:3], frame[3] + MARGIN)
    width, height, place = _placement(frame, options)
    placed = geometry.mapped(place)
    letters = _letters(placed, options)
    texts = (*_number_beside(placed, options), *letters.values())
    boxes = tuple(_boxes(geometry, options, place, letters))
    return Part(width, height, (placed,), boxes, texts=texts)


def _edges(marks: Sequence[Mark]) -> set[int]:
    return {edge for mark in marks for edge in (mark.first, mark.last)}


def _cuts(count: int, strands: int, options: Options) -> list[tuple[int, int]]:
    """The levels of each part, as first and one behind the last; parts of about equal length."""
    width = (strands - 1) * STRAND_SPACING + 2 * MARGIN + _LETTER_ROOM
    if not options.is_downwards:
        room = COMFORTABLE_WIDTH - 2 * (MARGIN + LEAD) - _NUMBER_ROOM
        most = int(room / LEVEL_HEIGHT)
    elif 2 * width <= COMFORTABLE_WIDTH:
        most = _LEVELS_DOWNWARDS
    else:
        most = count  # no second part would fit beside the first
    parts = max(1, -(-count // max(1, most)))
    beside = max(1, int(COMFORTABLE_WIDTH / width)) if options.is_downwards else 1
    if parts > beside:
        parts = min(count, -(-parts // beside) * beside)  # the last line is as full as the others
    edges = [count * part // parts for part in range(parts + 1)]
    return list(pairwise(edges))


def _piece_part(
    braid: Braid,
    levels: Sequence[Level],
    components: Sequence[int],
    options: Options,
    numbering: tuple[int, int],
) -> Part:
    """Some levels of the braid, with its hairlines and numbers, as one of several parts."""
    number, count = numbering
    geometry = braid_geometry(braid, levels, components, is_end=number == count - 1)
    last = (braid.strands - 1) * STRAND_SPACING
    right = max(MARGIN, _LETTER_ROOM if options.has_letters else 0.0)
    frame = (-MARGIN, -_NUMBER_ROOM, last + right, length_of(levels) + MARGIN)
    width, height, place = _placement(frame, options)
    placed = geometry.mapped(place)
    ends = ((placed.tops, number > 0), (placed.bottoms, number < count - 1))
    lines = tuple(_hairline(points, is_cut, options) for points, is_cut in ends)
    letters = _letters(placed, options)
    texts = (*_number_in_front(placed, options), *letters.values())
    boxes = tuple(_boxes(geometry, options, place, letters))
    part = Part(width, height, (placed,), boxes, lines, texts)
    return part if count == 1 else _headed(part, f"part {number + 1} of {count}")


def _headed(part: Part, heading: str) -> Part:
    text = Text((MARGIN / 2, 13.0), heading, 10.0, colour=QUIET)
    return overlay([(Part(text.width + MARGIN, 18.0, texts=(text,)), 0.0, 0.0), (part, 0.0, 14.0)])


def _placement(frame: Rectangle, options: Options) -> tuple[float, float, Callable[[Point], Point]]:
    """Width and height of a page for the frame, and the map of its points to that page."""
    left, top, right, bottom = frame
    if options.is_downwards:
        return right - left, bottom - top, lambda point: (point[0] - left, point[1] - top)
    return bottom - top, right - left, lambda point: (point[1] - top, right - point[0])


def _hairline(points: Sequence[Point], is_cut: bool, options: Options) -> Line:
    (x0, y0), (x1, y1) = points[0], points[-1]
    if options.is_downwards:
        return Line((x0 - _OVERHANG, y0), (x1 + _OVERHANG, y1), is_cut)
    return Line((x0, y0 + _OVERHANG), (x1, y1 - _OVERHANG), is_cut)


def _number_in_front(placed: Geometry, options: Options) -> list[Text]:
    """The number of each position before the beginning of its strand."""
    if options.is_downwards:
        places = [((x, y - 7.0), "middle") for x, y in placed.tops]
    else:
        places = [((x - 7.0, y + 3.7), "end") for x, y in placed.tops]
    return [
        Text(place, str(number), 10.5, anchor)
        for number, (place, anchor) in enumerate(places, start=1)
    ]


def _number_beside(placed: Geometry, options: Options) -> list[Text]:
    """The number of each position beside the beginning of its strand, which leads on there."""
    if options.is_downwards:
        places = [((x - 5.0, y + 4.0), "end") for x, y in placed.tops]
    else:
        places = [((x, y - 5.0), "middle") for x, y in placed.tops]
    return [
        Text(place, str(number), 10.5, anchor)
        for number, (place, anchor) in enumerate(places, start=1)
    ]


def _letters(placed: Geometry, options: Options) -> dict[int, Text]:
    """By its number each letter, in the wedge of its crossing on the side of higher positions."""
    if not options.has_letters:
        return {}
    texts = {}
    for crossing in placed.crossings:
        x, y = crossing.meeting
        content = str(crossing.letter).replace("-", "\N{MINUS SIGN}")
        if options.is_downwards:
            texts[crossing.number] = Text((x + 9.5, y + 3.4), content, 9.5)
        else:
            place = (x, y - STRAND_SPACING / 2 - 4.5)
            texts[crossing.number] = Text(place, content, 9.5, "middle")
    return texts


def _boxes(
    geometry: Geometry,
    options: Options,
    place: Callable[[Point], Point],
    letters: Mapping[int, Text],
) -> list[Box]:
    """The bands and frames of the marks, as far as their letters stand in this geometry."""
    boxes = []
    side, end = STRAND_SPACING / 2 + 7.0, LEVEL_HEIGHT / 2 - 1.5
    for mark in options.marks:
        marked = [each for each in geometry.crossings if mark.first <= each.number < mark.last]
        around = [_grown((*each.centre, *each.centre), side, end) for each in marked]
        labels = [letters[each.number].bounds for each in marked if each.number in letters]
        rectangles = [map_rectangle(each, place) for each in around]
        rectangles += [_grown(each, _LETTER_MARGIN, _LETTER_MARGIN) for each in labels]
        if rectangles:
            boxes.append(Box(_hull(rectangles), mark.is_frame))
    return boxes


def _grown(bounds: Rectangle, across: float, along: float) -> Rectangle:
    left, top, right, bottom = bounds
    return left - across, top - along, right + across, bottom + along


def _hull(rectangles: Sequence[Rectangle]) -> Rectangle:
    """The least rectangle around all of them."""
    lefts, tops, rights, bottoms = zip(*rectangles, strict=True)
    return min(lefts), min(tops), max(rights), max(bottoms)
