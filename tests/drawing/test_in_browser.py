"""Pictures in a real browser: what it measures of texts and of the page."""

import itertools
import random
from pathlib import Path
from typing import Any

import pytest

from braidsearch.drawing import draw_braid, draw_closure, draw_proof
from braidsearch.words import Braid
from tests.certificates.test_file_format import DIFFERENT, SAME
from tests.drawing.browser import DrivenBrowser
from tests.drawing.layout import do_overlap, is_inside

EXAMPLE = Braid([1, -2, 3, -2, 1, -2, 3, 3, -1, 2, -3, 2])
GENERATOR = random.Random(1)
LONG = Braid([GENERATOR.choice([-3, -2, -1, 1, 2, 3]) for _ in range(200)])

PICTURES = [
    draw_closure(EXAMPLE, has_letters=True),
    draw_braid(EXAMPLE, has_letters=True, direction="right"),
    draw_braid(LONG, has_letters=True),
    draw_proof(SAME),
    draw_proof(DIFFERENT, direction="down"),
]

MEASURE = """({
  room: visualViewport.width,
  wide: document.documentElement.scrollWidth,
  pictures: [...document.querySelectorAll("svg")].map((svg) => ({
    shown: svg.getBoundingClientRect().toJSON(),
    width: svg.viewBox.baseVal.width,
    height: svg.viewBox.baseVal.height,
    texts: [...svg.querySelectorAll("text")].map((text) => text.getBoundingClientRect().toJSON()),
  })),
})"""
WIDTHS = (360, 1200)
SCROLL_BAR = 15


def measure(browser: DrivenBrowser, page: str, width: int, folder: Path) -> Any:
    """What the browser measures of a page, HTML or SVG, in a window of this width."""
    file = folder / f"page.{'svg' if page.startswith('<svg') else 'html'}"
    file.write_text(page, encoding="utf-8")
    browser.open(file, width)
    return browser.run(MEASURE)


@pytest.mark.parametrize("width", WIDTHS)
def test_pictures_fit_their_page(browser: DrivenBrowser, tmp_path: Path, width: int) -> None:
    """Five pictures in one page: none is cut off or distorted, no two texts of one overlap, and
    none of the texts sticks out, as the browser's own fonts are measured.
    """
    page = f'<!doctype html><meta charset="utf-8"><body>{"".join(PICTURES)}</body>'
    found = measure(browser, page, width, tmp_path)
    assert width - SCROLL_BAR <= found["room"] <= width
    assert found["wide"] <= found["room"]
    assert len(found["pictures"]) == len(PICTURES)
    for picture in found["pictures"]:
        shown = picture["shown"]
        assert shown["right"] <= found["room"]
        scale = shown["width"] / picture["width"]
        assert abs(shown["height"] / picture["height"] - scale) < 0.01
        texts = [(t["left"], t["top"], t["right"], t["bottom"]) for t in picture["texts"]]
        frame = (shown["left"], shown["top"] - 1, shown["right"], shown["bottom"] + 1)
        assert texts
        assert all(is_inside(text, frame) for text in texts)
        for one, other in itertools.combinations(texts, 2):
            assert not do_overlap(one, other, -1.5)  # lines of type hold room above and below


@pytest.mark.parametrize("width", WIDTHS)
def test_a_file_fits_its_window(browser: DrivenBrowser, tmp_path: Path, width: int) -> None:
    """A picture that is opened as a file of its own is scaled to a narrow window, and not beyond
    its own size in a wide one.
    """
    found = measure(browser, draw_braid(LONG, has_letters=True), width, tmp_path)
    (picture,) = found["pictures"]
    assert width - SCROLL_BAR <= found["room"] <= width
    assert picture["width"] > 400
    assert picture["shown"]["width"] == pytest.approx(min(found["room"], picture["width"]), abs=0.1)
    assert picture["shown"]["height"] > 900  # the rest is reached by scrolling
