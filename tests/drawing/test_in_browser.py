"""Pictures in a real browser: what it measures of texts and of the page."""

import itertools
import random
from pathlib import Path

import pytest

from braidsearch.drawing import draw_braid, draw_closure, draw_proof
from braidsearch.words import Braid
from tests.certificates.test_file_format import DIFFERENT, SAME
from tests.drawing.browser import measure_in_browser, needs_chromium
from tests.drawing.layout import do_overlap, is_inside

EXAMPLE = Braid([1, -2, 3, -2, 1, -2, 3, 3, -1, 2, -3, 2])
LONG = Braid([random.Random(1).choice([1, -1]) * (1 + k * k % 3) for k in range(200)])

PICTURES = [
    draw_closure(EXAMPLE, has_letters=True),
    draw_braid(EXAMPLE, has_letters=True, direction="right"),
    draw_braid(LONG, has_letters=True),
    draw_proof(SAME),
    draw_proof(DIFFERENT, direction="down"),
]

MEASURE = """
return {
  wide: inner.documentElement.scrollWidth,
  room: inner.documentElement.clientWidth,
  pictures: [...inner.querySelectorAll("svg")].map(svg => ({
    shown: svg.getBoundingClientRect().toJSON(),
    page: svg.viewBox.baseVal.width / svg.viewBox.baseVal.height,
    texts: [...svg.querySelectorAll("text")].map(text => text.getBoundingClientRect().toJSON()),
  })),
}
"""


@needs_chromium
@pytest.mark.parametrize("width", [360, 1200])
def test_pictures_fit_their_page(width: int, tmp_path: Path) -> None:
    """Five pictures in one page: none is cut off or distorted, no two texts of one overlap, and
    none of the texts sticks out, as the browser's own fonts are measured.
    """
    page = f'<!doctype html><meta charset="utf-8"><body>{"".join(PICTURES)}</body>'
    found = measure_in_browser(page, MEASURE, tmp_path, width)
    assert found["room"] == width
    assert found["wide"] <= found["room"]
    assert len(found["pictures"]) == len(PICTURES)
    for picture in found["pictures"]:
        shown = picture["shown"]
        assert shown["right"] <= width
        assert abs(shown["width"] / shown["height"] - picture["page"]) < 0.01 * picture["page"]
        texts = [(t["left"], t["top"], t["right"], t["bottom"]) for t in picture["texts"]]
        frame = (shown["left"], shown["top"] - 1, shown["right"], shown["bottom"] + 1)
        assert texts
        assert all(is_inside(text, frame) for text in texts)
        for one, other in itertools.combinations(texts, 2):
            assert not do_overlap(one, other, -1.5)  # lines of type hold room above and below


@needs_chromium
@pytest.mark.parametrize("width", [360, 1200])
def test_a_file_fits_its_window(width: int, tmp_path: Path) -> None:
    """A picture that is opened as a file of its own is scaled to a narrow window, and not beyond
    its own size in a wide one.
    """
    script = """
    const shown = inner.documentElement.getBoundingClientRect();
    const full = inner.documentElement.viewBox.baseVal.width;
    return [inner.defaultView.innerWidth, shown.width, shown.height, full];
    """
    text = draw_braid(LONG, has_letters=True)
    window, shown, height, full = measure_in_browser(text, script, tmp_path, width)
    assert window == width
    assert full > 400
    assert shown == pytest.approx(min(width, full), abs=0.1)
    assert height > 900  # the rest is reached by scrolling
