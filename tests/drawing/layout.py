"""Where things lie in a picture: rectangles of all that is drawn, from the SVG alone."""

from __future__ import annotations

import re
from collections.abc import Iterator

from tests.drawing.svg_reader import SVG, Picture, iter_elements

Rectangle = tuple[float, float, float, float]

CHARACTER = 0.602
"""The width of a character of DejaVu Sans Mono, in units of its size (its font file: 1233/2048)."""


def view_box(picture: Picture) -> Rectangle:
    """Left, top, right, bottom of the picture."""
    left, top, width, height = map(float, picture.root.attrib["viewBox"].split())
    return left, top, left + width, top + height


def text_rectangles(picture: Picture) -> list[tuple[str, Rectangle]]:
    """Each text with the room of its characters, digits and capitals being 0.73 high."""
    found = []
    for content, place, size, anchor in picture.texts:
        width = CHARACTER * size * len(content)
        left = place.real - width * {"start": 0, "middle": 0.5, "end": 1}[anchor]
        is_number = re.fullmatch(r"[−0-9]+", content)
        bottom = place.imag + (0 if is_number else 0.21 * size)
        found.append((content, (left, place.imag - 0.73 * size, left + width, bottom)))
    return found


def iter_rectangles(picture: Picture) -> Iterator[Rectangle]:
    """Of all that is drawn a rectangle that holds it, half the width of lines included."""
    for element, look in iter_elements(picture.root, {}):
        if element.tag == f"{SVG}path":
            numbers = [float(number) for number in re.findall(r"-?[0-9.]+", element.attrib["d"])]
            xs, ys = numbers[::2], numbers[1::2]
            half = 0.0 if look.get("stroke") == "none" else float(look["stroke-width"]) / 2
            yield min(xs) - half, min(ys) - half, max(xs) + half, max(ys) + half
        elif element.tag == f"{SVG}rect" and "x" in element.attrib:
            x, y = float(element.attrib["x"]), float(element.attrib["y"])
            right, bottom = x + float(look["width"]), y + float(look["height"])
            yield x, y, right, bottom
    for _, rectangle in text_rectangles(picture):
        yield rectangle


def do_overlap(one: Rectangle, other: Rectangle, room: float = 0.0) -> bool:
    """Whether two rectangles have a point in common, or less than the room between them."""
    return all(
        one[axis] < other[axis + 2] + room and other[axis] < one[axis + 2] + room for axis in (0, 1)
    )


def is_inside(one: Rectangle, other: Rectangle) -> bool:
    """Whether the first rectangle lies in the second."""
    return all(one[k] >= other[k] and one[k + 2] <= other[k + 2] for k in (0, 1))


def distance_to_strands(picture: Picture, rectangle: Rectangle) -> float:
    """From the rectangle to the middle line of the nearest strand; 0 where one runs through it."""
    left, top, right, bottom = rectangle
    return min(
        abs(
            complex(
                max(left - point.real, 0.0, point.real - right),
                max(top - point.imag, 0.0, point.imag - bottom),
            )
        )
        for run in picture.runs
        for point in run.dense_points
    )
