"""Reading a picture back: what an eye sees of the strands, from the path data of the SVG alone.

Nothing of the drawing code is used. Points are complex numbers x + i y, y downwards as in SVG.
"""

from __future__ import annotations

import cmath
import math
import re
from collections.abc import Iterator
from dataclasses import dataclass, field
from functools import cached_property
from itertools import count, pairwise
from xml.etree import ElementTree

from braidsearch.diagrams import Crossing, LinkDiagram
from braidsearch.words import Braid

SVG = "{http://www.w3.org/2000/svg}"
LONGEST_GAP = 14.0
STEPS = 25  # odd: no corner of the polygon in the middle of a curve

Cubic = tuple[complex, complex, complex, complex]
Look = tuple[str, str]


@dataclass
class Run:
    """A piece of a strand that is drawn in one go."""

    look: Look
    cubics: list[Cubic]
    is_closed: bool

    @property
    def start(self) -> complex:
        return self.cubics[0][0]

    @property
    def end(self) -> complex:
        return self.cubics[-1][3]

    @cached_property
    def points(self) -> list[complex]:
        """A polygon along the run."""
        return [self.start, *(at(c, k / STEPS) for c in self.cubics for k in range(1, STEPS + 1))]

    @cached_property
    def bounds(self) -> tuple[float, float, float, float]:
        """Left, top, right, bottom."""
        xs, ys = [p.real for p in self.points], [p.imag for p in self.points]
        return min(xs), min(ys), max(xs), max(ys)

    @cached_property
    def dense_points(self) -> list[complex]:
        """The corners of the polygon, and points between them no further than 4 apart."""
        dense = [self.start]
        for a, b in pairwise(self.points):
            parts = max(1, math.ceil(abs(b - a) / 4))
            dense += [a + (b - a) * k / parts for k in range(1, parts + 1)]
        return dense

    @property
    def direction_at_end(self) -> complex:
        return unit(self.points[-1] - self.points[-2])


@dataclass
class Seen:
    """A crossing as it is seen: runs by number, over the place along ``over``, unit directions."""

    centre: complex
    under_before: int
    under_after: int
    over: int
    place: float
    under_direction: complex
    over_direction: complex

    @property
    def sign(self) -> int:
        """1 where the over-strand is turned counterclockwise into the under-strand.

        With y downwards the cross product of such a pair is negative.
        """
        return 1 if cross(self.over_direction, self.under_direction) < 0 else -1


@dataclass
class Picture:
    """All that is drawn in one SVG."""

    root: ElementTree.Element
    runs: list[Run]
    is_turned: bool = False
    texts: list[tuple[str, complex, float, str]] = field(default_factory=list)

    @cached_property
    def next_run(self) -> dict[int, int]:
        """The run in which each run goes on behind the gap at its end."""
        starts = {number: run.start for number, run in enumerate(self.runs) if not run.is_closed}
        following: dict[int, int] = {}
        for number, run in enumerate(self.runs):
            ahead = [
                (abs(start - run.end), other)
                for other, start in starts.items()
                if abs(start - run.end) < LONGEST_GAP and is_ahead(run, start)
            ]
            if ahead and not run.is_closed:
                following[number] = min(ahead)[1]
        assert len(set(following.values())) == len(following), "two strands go on as one"
        return following

    @cached_property
    def crossings(self) -> list[Seen]:
        """What lies in each gap."""
        return [self._look_into_gap(before, after) for before, after in self.next_run.items()]

    def _look_into_gap(self, before: int, after: int) -> Seen:
        gap = self.runs[before].end, self.runs[after].start
        assert self.runs[before].look == self.runs[after].look
        found = [
            (number, place, point)
            for number, run in enumerate(self.runs)
            if is_near(run.bounds, gap[0])
            for place, point in iter_meetings(run.points, gap)
        ]
        assert len(found) == 1, f"expected one strand in the gap {gap}, found {len(found)}"
        (over, place, centre), points = found[0], self.runs[found[0][0]].points
        along = unit(points[int(place) + 1] - points[int(place)])
        return Seen(centre, before, after, over, place, unit(gap[1] - gap[0]), along)

    def braid_runs(self) -> list[list[int]]:
        """The runs at whose beginning no other ends: for each part of the picture, in order of its
        parts, from position 1.
        """
        loose = set(range(len(self.runs))) - set(self.next_run.values())
        loose -= {number for number, run in enumerate(self.runs) if run.is_closed}
        ordered = sorted(loose, key=lambda n: self._key(self.runs[n].start))
        parts: list[list[int]] = []
        for number in ordered:
            point = self._upright(self.runs[number].start)
            last = self._upright(self.runs[parts[-1][-1]].start) if parts else None
            if last is not None and abs(point.imag - last.imag) < 1 and point.real - last.real < 30:
                parts[-1].append(number)
            else:
                parts.append([number])
        pages = [min((p.imag, p.real) for p in map(self._start, part)) for part in parts]
        return [part for _, part in sorted(zip(pages, parts, strict=True))]

    def _start(self, number: int) -> complex:
        return self.runs[number].start

    def _key(self, point: complex) -> tuple[float, float]:
        turned = self._upright(point)
        return round(turned.imag), turned.real

    def _upright(self, point: complex) -> complex:
        """The point with strands downwards: a picture that runs to the right is turned back."""
        return point * 1j if self.is_turned else point

    def letters(self) -> list[list[int]]:
        """For each part of the picture its word, read from top to bottom and left to right."""
        parts = self.braid_runs()
        part_of = {}
        for part, runs in enumerate(parts):
            for first in runs:
                run: int | None = first
                while run is not None:
                    part_of[run] = part
                    run = self.next_run.get(run)
        seen: list[list[Seen]] = [[] for _ in parts]
        for each in self.crossings:
            seen[part_of[each.under_before]].append(each)
        words = []
        for found, starts in zip(seen, parts, strict=True):
            xs = [self._upright(self._start(run)).real for run in starts]
            words.append(self._word(found, xs))
        return words

    def closure_letters(self, spacing: float) -> list[int]:
        """The word of a closure, whose leftmost strand is at position 1."""
        left = min(self._upright(point).real for run in self.runs for point in run.points)
        return self._word(self.crossings, [left + spacing * k for k in range(60)])

    def _word(self, seen: list[Seen], xs: list[float]) -> list[int]:
        placed = [(self._upright(each.centre), each.sign) for each in seen]
        levels: list[list[tuple[float, int]]] = []
        height = None
        for point, sign in sorted(placed, key=lambda pair: pair[0].imag):
            if height is None or point.imag - height > 14:
                levels.append([])
                height = point.imag
            levels[-1].append((point.real, sign))
        return [
            sign * sum(x < place for x in xs) for level in levels for place, sign in sorted(level)
        ]

    def diagram(self) -> LinkDiagram:
        """The oriented link diagram of a closed picture."""
        places: dict[int, list[float]] = {number: [] for number in range(len(self.runs))}
        for each in self.crossings:
            places[each.over].append(each.place)
        arcs: dict[tuple[int, int], int] = {}
        numbers = count()
        circles = 0
        for number, run in enumerate(self.runs):
            passed = len(places[number])
            circles += run.is_closed and not passed
            # From one place to the next is an arc; a closed run ends in its first arc.
            for k in range(passed + (not run.is_closed)):
                arcs[number, k] = next(numbers)
            if run.is_closed and passed:
                arcs[number, passed] = arcs[number, 0]
        crossings = []
        for each in self.crossings:
            k = sorted(places[each.over]).index(each.place)
            u, o = each.under_direction, each.over_direction
            ends = [
                (-u, arcs[each.under_before, len(places[each.under_before])]),
                (u, arcs[each.under_after, 0]),
                (-o, arcs[each.over, k]),
                (o, arcs[each.over, k + 1]),
            ]
            crossings.append(Crossing(counterclockwise(ends), each.sign))
        return LinkDiagram(tuple(crossings), circles)


def read_picture(text: str, is_turned: bool = False) -> Picture:
    """The picture in an SVG text; ``is_turned`` where strands run to the right."""
    root = ElementTree.fromstring(text)
    runs: list[Run] = []
    texts = []
    for element, look in iter_elements(root, {}):
        if element.tag == f"{SVG}text":
            place = complex(float(look["x"]), float(look["y"]))
            anchor = look.get("text-anchor", "start")
            texts.append((element.text or "", place, float(look["font-size"]), anchor))
    strands = [pair for pair in iter_elements(root, {}) if is_strand(*pair)]
    for place, (element, look) in enumerate(strands):
        if "stroke-dasharray" in look or is_inlay(look):
            continue
        following = strands[place + 1][1] if place + 1 < len(strands) else {}
        dashes = following.get("stroke-dasharray", "none") if is_inlay(following) else ""
        for cubics, is_closed in iter_subpaths(element.attrib["d"]):
            runs.append(Run((look["stroke"], dashes), cubics, is_closed))
    return Picture(root, runs, is_turned, texts)


def iter_elements(
    element: ElementTree.Element, inherited: dict[str, str]
) -> Iterator[tuple[ElementTree.Element, dict[str, str]]]:
    """Every element with its attributes and those of the groups around it."""
    own = {**inherited, **element.attrib}
    yield element, own
    for child in element:
        yield from iter_elements(child, own)


def is_strand(element: ElementTree.Element, look: dict[str, str]) -> bool:
    """Whether it is the line of a strand: drawn, not filled, and no hairline."""
    is_path = element.tag == f"{SVG}path" and look.get("fill") == "none"
    return is_path and float(look["stroke-width"]) != 1


def is_inlay(look: dict[str, str]) -> bool:
    """Whether it is the light line inside a strand."""
    return float(look.get("stroke-width", 9)) < 2


def iter_subpaths(data: str) -> Iterator[tuple[list[Cubic], bool]]:
    """The curves of path data with absolute M, L, C and Z."""
    for text in re.findall(r"M[^M]+", data):
        cubics: list[Cubic] = []
        here = 0j
        for command, arguments in re.findall(r"([MLCZ])([^MLCZ]*)", text):
            numbers = [float(number) for number in arguments.split()]
            points = [complex(*pair) for pair in zip(numbers[::2], numbers[1::2], strict=True)]
            if command == "M":
                here = points[0]
            elif command == "L":
                cubics.append((here, here + (points[0] - here) / 3, points[0], points[0]))
            elif command == "C":
                cubics.append((here, points[0], points[1], points[2]))
            here = points[-1] if points else here
        yield cubics, text.rstrip().endswith("Z")


def at(cubic: Cubic, time: float) -> complex:
    """The point of a cubic curve."""
    a, b, c, d = cubic
    rest = 1 - time
    return a * rest**3 + 3 * b * rest**2 * time + 3 * c * rest * time**2 + d * time**3


def unit(vector: complex) -> complex:
    return vector / abs(vector)


def cross(one: complex, other: complex) -> float:
    return (one.conjugate() * other).imag


def is_ahead(run: Run, point: complex) -> bool:
    """Whether a point lies within the longest gap straight ahead of the end of a run."""
    way = point - run.end
    return abs(way) > 0 and (way.conjugate() * run.direction_at_end).real > 0.9 * abs(way)


def is_near(bounds: tuple[float, float, float, float], point: complex) -> bool:
    """Whether a point lies within the longest gap of a rectangle."""
    left, top, right, bottom = bounds
    return (
        left - LONGEST_GAP < point.real < right + LONGEST_GAP
        and top - LONGEST_GAP < point.imag < bottom + LONGEST_GAP
    )


def iter_meetings(
    points: list[complex], segment: tuple[complex, complex]
) -> Iterator[tuple[float, complex]]:
    """Where a polygon meets a segment: the place along the polygon, and the point."""
    start, end = segment
    way = end - start
    last = -1.0
    for number, (a, b) in enumerate(pairwise(points)):
        if min(abs(a - start), abs(b - start)) > 60:
            continue
        determinant = cross(b - a, way)
        if determinant == 0:
            continue
        s, t = cross(start - a, way) / determinant, cross(start - a, b - a) / determinant
        if 0 <= s < 1 and 0.05 < t < 0.95 and number + s > last + 1e-6:
            last = number + s
            yield last, a + s * (b - a)


def counterclockwise(ends: list[tuple[complex, int]]) -> tuple[int, int, int, int]:
    """The arcs at a crossing, counterclockwise on the page from the first."""
    first = ends[0][0]
    # With y downwards the phase grows clockwise.
    turns = [(-cmath.phase(way / first) % (2 * math.pi), arc) for way, arc in ends[1:]]
    return ends[0][1], *(arc for _, arc in sorted(turns))


def braid_of(words: list[list[int]], strands: int) -> Braid:
    """The braid of all parts of a picture."""
    return Braid([letter for word in words for letter in word], strands)
