"""Pictures as people see them: looks, labels, margins; and as programs read them."""

import itertools
import re
from xml.etree import ElementTree

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.drawing import DIRECTIONS, Mark, draw_braid, draw_closure
from braidsearch.drawing.levels import arrange_levels
from braidsearch.drawing.palette import COLOURS, DASHES, PAPER, look_of
from braidsearch.drawing.sheet import Part, Sheet, Text
from braidsearch.drawing.svg import format_number, write_svg
from braidsearch.errors import CapacityError, InputError
from braidsearch.words import Braid, format_word, parse_word
from tests.drawing.layout import (
    distance_to_strands,
    do_overlap,
    is_inside,
    iter_rectangles,
    text_rectangles,
    view_box,
)
from tests.drawing.svg_reader import SVG, iter_elements, read_picture
from tests.strategies import braids

EXAMPLE = Braid([1, -2, 3, -2, 1, -2, 3, 3, -1, 2, -3, 2])
directions = st.sampled_from(DIRECTIONS)
drawers = st.sampled_from([draw_braid, draw_closure])
STROKE = 3.6


@given(braids(max_strands=6, max_letters=30), drawers, directions)
def test_labels_keep_clear(braid: Braid, draw, direction: str) -> None:  # type: ignore[no-untyped-def]
    """No two texts overlap, and none is touched by a strand."""
    picture = read_picture(draw(braid, direction=direction, has_letters=True))
    texts = text_rectangles(picture)
    assert len(texts) >= braid.strands + len(braid)
    for (_, one), (_, other) in itertools.combinations(texts, 2):
        assert not do_overlap(one, other, 1.0)
    for content, rectangle in texts:
        assert distance_to_strands(picture, rectangle) > STROKE / 2 + 0.4, content


@given(braids(max_strands=12, max_letters=40), drawers, directions, st.booleans())
def test_nothing_is_cut_off(braid: Braid, draw, direction: str, is_labelled: bool) -> None:  # type: ignore[no-untyped-def]
    """All that is drawn lies within the view box, marks and labels included."""
    marks = [Mark(0, len(braid)), Mark(0, 3, is_frame=True), Mark(len(braid) - 2, len(braid) + 5)]
    picture = read_picture(draw(braid, direction=direction, has_letters=is_labelled, marks=marks))
    page = view_box(picture)
    assert all(is_inside(rectangle, page) for rectangle in iter_rectangles(picture))
    assert (page[0], page[1]) == (0, 0)
    assert [picture.root.attrib[name] for name in ("width", "height")] == [
        format_number(page[2]),
        format_number(page[3]),
    ]


@given(braids(max_strands=9, max_letters=20), drawers)
def test_components_have_looks_of_their_own(braid: Braid, draw) -> None:  # type: ignore[no-untyped-def]
    """As many colours with dash patterns as components, and every strand keeps its own.

    That a strand has one look on both sides of a gap, the reader makes sure.
    """
    picture = read_picture(draw(braid))
    assert len({run.look for run in picture.runs}) == braid.components
    assert len(picture.crossings) == len(braid)


def test_looks_differ_in_colour_and_in_pattern() -> None:
    """63 components look different; the first seven by their patterns alone, without colour."""
    looks = [look_of(component) for component in range(63)]
    assert len(set(looks)) == 63
    assert len({look.dashes for look in looks[:7]}) == len(DASHES) == 7
    assert len({look.colour for look in looks[:9]}) == len(COLOURS) == 9


@pytest.mark.parametrize("colour", COLOURS)
def test_colours_stand_out_from_paper(colour: str) -> None:
    """A contrast of 3 or more, as the Web Content Accessibility Guidelines 2.1 ask of graphics.

    The formula of relative luminance is theirs, from memory.
    """

    def luminance(code: str) -> float:
        parts = [int(code[k : k + 2], 16) / 255 for k in (1, 3, 5)]
        linear = [c / 12.92 if c <= 0.03928 else ((c + 0.055) / 1.055) ** 2.4 for c in parts]
        return 0.2126 * linear[0] + 0.7152 * linear[1] + 0.0722 * linear[2]

    assert (luminance(PAPER) + 0.05) / (luminance(colour) + 0.05) >= 3


@given(braids(max_strands=6, max_letters=40), drawers, directions)
def test_arrows_point_along_the_strands(braid: Braid, draw, direction: str) -> None:  # type: ignore[no-untyped-def]
    """One head for each strand, on a strand of its colour, in the direction of its path."""
    picture = read_picture(draw(braid, direction=direction))
    heads = [
        (
            look["fill"],
            [complex(*map(float, p.split())) for p in element.attrib["d"][1:-1].split("L")],
        )
        for element, look in iter_elements(picture.root, {})
        if element.tag == f"{SVG}path" and look.get("stroke") == "none"
    ]
    assert len(heads) == braid.strands
    for colour, corners in heads:
        middle = sum(corners) / len(corners)
        tip = max(corners, key=lambda corner: abs(corner - middle))
        back = min(corners, key=lambda corner: abs(corner - middle))
        runs = [run for run in picture.runs if run.look[0] == colour]
        place, along = min(
            (
                (point, (after - point) / abs(after - point))
                for run in runs
                for point, after in itertools.pairwise(run.dense_points)
            ),
            key=lambda pair: abs(pair[0] - back),
        )
        assert abs(place - back) < 4
        assert abs((tip - back) / abs(tip - back) - along) < 1e-6


@given(braids(max_strands=6, max_letters=60), drawers, directions)
def test_pictures_carry_their_word(braid: Braid, draw, direction: str) -> None:  # type: ignore[no-untyped-def]
    """Well-formed XML with a role, a title and a description, in which the word can be read."""
    root = ElementTree.fromstring(draw(braid, direction=direction))
    title, description = root.find(f"{SVG}title"), root.find(f"{SVG}desc")
    assert root.tag == f"{SVG}svg"
    assert root.attrib["role"] == "img"
    assert root.attrib["aria-labelledby"].split() == [title.attrib["id"], description.attrib["id"]]
    word = re.match(r"Word: (.*?)\. Strands run", description.text)[1]
    assert word == format_word(braid)
    assert parse_word(word) == braid
    assert f"{braid.strands} strand" in title.text


@given(braids(max_strands=5, max_letters=20), drawers, directions)
def test_pictures_repeat_byte_for_byte(braid: Braid, draw, direction: str) -> None:  # type: ignore[no-untyped-def]
    """The same braid gives the same ASCII text, with no number of more than two decimals."""
    text = draw(braid, direction=direction, has_letters=True)
    assert text == draw(Braid(braid.word, braid.strands), direction=direction, has_letters=True)
    assert text.isascii()
    assert not re.search(r"[0-9]\.[0-9]{3}", text.split("</desc>")[1])
    assert "nan" not in text.split("</desc>")[1]
    assert "-0 " not in text


def test_ids_of_two_pictures_differ() -> None:
    """Two pictures may stand in one page: their ids begin with a digest, or as one wishes."""
    pictures = [
        draw(braid, direction=direction, is_transparent=transparent)
        for draw in (draw_braid, draw_closure)
        for braid in (EXAMPLE, EXAMPLE.mirror())
        for direction in DIRECTIONS
        for transparent in (False, True)
    ]
    ids = [name for text in pictures for name in re.findall(r' id="([^"]*)"', text)]
    assert len(ids) == len(set(ids)) == 2 * len(pictures)
    named = draw_braid(EXAMPLE, identifier="left")
    assert re.findall(r' id="([^"]*)"', named) == ["left-title", "left-description"]


def test_nothing_reaches_beyond_the_picture() -> None:
    """No styles for other elements, no scripts, nothing that is fetched."""
    text = draw_closure(EXAMPLE, has_letters=True, marks=[Mark(2, 5)])
    assert {element.tag for element in ElementTree.fromstring(text).iter()} == {
        f"{SVG}{name}" for name in ("svg", "title", "desc", "rect", "g", "path", "text")
    }
    assert text.count("http") == 1
    assert "url(" not in text


def test_transparent_pictures_have_no_paper() -> None:
    """The only difference is the white rectangle."""
    opaque = draw_braid(EXAMPLE, identifier="x").splitlines()
    transparent = draw_braid(EXAMPLE, is_transparent=True, identifier="x").splitlines()
    (paper,) = set(opaque) - set(transparent)
    assert paper.startswith("<rect")
    assert [line for line in opaque if line != paper] == transparent


@given(st.text())
def test_any_text_is_escaped(content: str) -> None:
    """Whatever is written on a sheet, the file is well-formed and holds that text."""
    sheet = Sheet(Part(9, 9, texts=(Text((0, 9), content),)), content, content, identifier=content)
    root = ElementTree.fromstring(write_svg(sheet))
    expected = "".join(c if c.isprintable() or c == "\n" else "?" for c in content)
    assert {root.find(f"{SVG}title").text or "", next(root.iter(f"{SVG}text")).text or ""} == {
        expected
    }


@given(st.floats(-1e6, 1e6))
def test_numbers_are_rounded_to_hundredths(value: float) -> None:
    """What is written is a plain decimal, no further from the number than half a hundredth."""
    text = format_number(value)
    assert re.fullmatch(r"-?[0-9]+(\.[0-9]?[1-9])?", text)
    assert text != "-0"
    assert abs(float(text) - value) <= 0.005 + 1e-9


@given(braids(max_strands=8, max_letters=30), st.sets(st.integers(0, 30)))
def test_levels_hold_the_word(braid: Braid, breaks: set[int]) -> None:
    """Levels read one after the other are the word; their crossings share no strand; a level
    begins at every break.
    """
    levels = arrange_levels(braid.word, breaks)
    assert [number for level in levels for number in level] == list(range(len(braid)))
    for level in levels:
        indices = [abs(braid.word[number]) for number in level]
        assert all(b - a >= 2 for a, b in itertools.pairwise(indices))
        assert not breaks & set(level[1:])


@given(braids(max_strands=5, max_letters=20), st.data())
def test_marks_hold_their_letters_alone(braid: Braid, data: st.DataObject) -> None:
    """The bands lie around the crossings of the marked letters and around no others."""
    first, last = sorted(data.draw(st.tuples(*[st.integers(0, len(braid))] * 2)))
    picture = read_picture(draw_closure(braid, marks=[Mark(first, last)]))
    rectangles = [
        [float(element.attrib[name]) for name in ("x", "y", "width", "height")]
        for element in picture.root.iter(f"{SVG}rect")
        if "x" in element.attrib
    ]
    assert len(rectangles) == (first < last)
    held = [
        seen
        for seen in picture.crossings
        for x, y, width, height in rectangles
        if x < seen.centre.real < x + width and y < seen.centre.imag < y + height
    ]
    assert len(held) == last - first
    if held:
        signs = sorted(seen.sign for seen in held)
        assert signs == sorted(1 if letter > 0 else -1 for letter in braid.word[first:last])


def test_the_largest_pictures() -> None:
    """2,000 crossings on 60 strands are drawn; one more of either is refused in one line."""
    word = [(1 if k % 3 else -1) * (k * 7 % 59 + 1) for k in range(2000)]
    picture = draw_braid(Braid(word, 60), has_letters=True)
    assert picture.count("<text") == 2060
    assert draw_closure(Braid(word, 60)).count("<path") > 60
    for draw in (draw_braid, draw_closure):
        with pytest.raises(CapacityError, match="a picture of 2001 crossings: expected at most"):
            draw(Braid([*word, 1], 60))
        with pytest.raises(CapacityError, match="a picture of 61 strands: expected at most 60"):
            draw(Braid([], 61))


@pytest.mark.parametrize("braid", [Braid([]), Braid([], 4), Braid([1]), Braid([59], 60)])
@pytest.mark.parametrize("draw", [draw_braid, draw_closure])
def test_the_smallest_pictures(braid: Braid, draw) -> None:  # type: ignore[no-untyped-def]
    """Braids without crossings and with one; each strand is numbered at its top."""
    picture = read_picture(draw(braid))
    assert [text for text, *_ in picture.texts] == [str(k) for k in range(1, braid.strands + 1)]
    assert len(picture.crossings) == len(braid)


def test_unknown_directions_are_refused() -> None:
    """The line says which there are."""
    with pytest.raises(InputError, match="direction 'up': expected down or right"):
        draw_braid(EXAMPLE, direction="up")


def test_notebooks_draw_braids() -> None:
    """A braid shows its picture, one that is too large its repr."""
    assert EXAMPLE._repr_svg_() == draw_braid(EXAMPLE)
    assert Braid([], 61)._repr_svg_() is None
