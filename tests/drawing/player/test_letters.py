"""Letters of narrow pages, which are written larger: they are read, and touch no strand."""

import itertools
from pathlib import Path
from typing import Any

import pytest

from braidsearch.drawing.player import draw_proof_page
from tests.drawing.browser import DrivenBrowser
from tests.drawing.layout import CHARACTER, distance_to_strands, do_overlap
from tests.drawing.player.played import PlayedPage, picture_of
from tests.drawing.player.proofs import accepted, random_proof

STROKE = 3.6
LETTERS = """[...document.querySelectorAll("#stage svg.braid text[transform]:not([display])")]
.map((text) => [text.textContent, ...text.getAttribute("transform").match(/-?[\\d.]+/g).map(Number),
  parseFloat(getComputedStyle(text).fontSize), text.getAttribute("text-anchor") === "middle"])"""


def rectangle_of(letter: list[Any]) -> tuple[float, float, float, float]:
    """The room of a letter's characters, digits being 0.73 high."""
    content, x, y, size, is_middle = letter
    width = len(content) * size * CHARACTER
    left = x - width / 2 if is_middle else x
    return left, y - 0.73 * size, left + width, y


@pytest.mark.parametrize("width", [360, 1280])
def test_letters_keep_clear(width: int, browser: DrivenBrowser, tmp_path: Path) -> None:
    """At every stage, open and closed, downwards and sideways: no two letters overlap, and none is
    touched by a strand, however narrow the window is.
    """
    sizes = set()
    for number, proof in enumerate((accepted("same-exchange-written-out"), random_proof(5, 8))):
        folder = tmp_path / str(number)
        folder.mkdir()
        page = PlayedPage(browser, draw_proof_page(proof), folder)
        browser.resize(width, 800)
        browser.run("new Promise((done) => setTimeout(done, 100))")
        for is_closed, is_right in itertools.product((False, True), repeat=2):
            page.choose("closure", is_closed)
            page.choose("sideways", is_right)
            for stop in range(page.last_stop + 1):
                page.slide(stop)
                letters = browser.run(LETTERS)
                picture = picture_of(page.strands()[0])
                sizes |= {letter[3] for letter in letters}
                rectangles = [rectangle_of(letter) for letter in letters]
                for one, other in itertools.combinations(rectangles, 2):
                    assert not do_overlap(one, other)
                for rectangle in rectangles:
                    assert distance_to_strands(picture, rectangle) > STROKE / 2
    assert min(sizes) == 9.5 or width == 360
    assert max(sizes) > 12  # what was looked at was small enough
    assert browser.mistakes() == []
