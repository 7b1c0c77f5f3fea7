"""What moves on the page is the same link at every moment, read from what is drawn."""

from pathlib import Path

import pytest

from braidsearch.certificates import Certificate
from braidsearch.drawing.player import draw_proof_page
from braidsearch.errors import InputError
from braidsearch.invariants.diagram_bracket import diagram_jones_polynomial
from braidsearch.invariants.jones import jones_polynomial
from braidsearch.moves import Conjugate, Rewrite
from braidsearch.normal_form import are_equal
from braidsearch.words import Braid
from tests.drawing.browser import DrivenBrowser
from tests.drawing.player.played import PlayedPage, Strands, picture_of
from tests.drawing.player.proofs import RELATIONS, accepted, random_proof
from tests.drawing.svg_reader import Picture

PROOFS = {
    "relations": RELATIONS,
    "exchange": accepted("same-exchange-written-out"),
    "figure eight": accepted("same-figure-eight-mirror"),
    "to one strand": accepted("same-unknot-down-to-one-strand"),
    "from one strand": accepted("same-unknot-up-from-one-strand"),
    "random": random_proof(7, 6, 6),
}


def iter_frames(page: PlayedPage, key: str) -> list[Strands]:
    """All frames on the way to the next stop."""
    page.browser.press(key)
    frames = []
    while page.next_frame(90):
        frames.append(page.strands()[0])
    return frames


def read_polynomial(picture: Picture) -> str:
    """The Jones polynomial of what is seen; empty where three strands meet, or a loop is a dot."""
    try:
        return str(diagram_jones_polynomial(picture.diagram()))
    except (AssertionError, IndexError, InputError):
        return ""


@pytest.mark.parametrize("name", PROOFS)
def test_every_frame_is_a_diagram_of_the_link(
    name: str, browser: DrivenBrowser, tmp_path: Path
) -> None:
    """Frames of all movements of the closure, read back as planar diagrams, have the link's Jones
    polynomial: over and under are right in between. The few in which three strands, or the ends of
    a gap, meet cannot be read.
    """
    proof = PROOFS[name]
    page = PlayedPage(browser, draw_proof_page(proof), tmp_path)
    page.choose("closure", True)
    page.choose("single", True)
    page.select("speed", "2")
    page.slide(0)
    expected = str(jones_polynomial(proof.left))
    found = []
    for _ in range(min(page.last_stop, 14)):
        found += [read_polynomial(picture_of(frame)) for frame in iter_frames(page, "ArrowRight")]
    assert set(found) <= {expected, ""}
    assert len(found) > 10
    assert found.count("") <= 0.1 * len(found)
    assert browser.mistakes() == []


def test_open_braids_stay_the_same_element(browser: DrivenBrowser, tmp_path: Path) -> None:
    """Between two words for one braid, each frame is a word for it, by the normal form.

    Read from path data level by level; frames in which crossings pass each other side by side, or
    three strands meet, may be read as no word at all, and are few.
    """
    page = PlayedPage(browser, draw_proof_page(RELATIONS), tmp_path)
    page.slide(0)
    words = []
    for move in RELATIONS.moves:
        assert isinstance(move, Rewrite)
        for frame in iter_frames(page, "ArrowRight"):
            try:
                words += picture_of(frame).letters()
            except (AssertionError, IndexError):
                words.append([])
    equal = [are_equal(Braid(word, 4), RELATIONS.left) for word in words]
    assert len(words) > 30
    assert sum(equal) >= 0.9 * len(words)
    assert len({tuple(word) for word in words}) >= len(RELATIONS.moves)


def test_steps_back_run_through_the_same_frames(browser: DrivenBrowser, tmp_path: Path) -> None:
    """A step back is the step forward in reverse."""
    proof = PROOFS["exchange"]
    page = PlayedPage(browser, draw_proof_page(proof), tmp_path)
    for number in range(4):
        page.slide(number)
        start = page.strands()
        forward = iter_frames(page, "ArrowRight")
        assert page.strands() != start
        back = iter_frames(page, "ArrowLeft")
        assert page.strands() == start
        assert len(back) == len(forward)
        assert forward[2] != forward[3]
        middle = [frame for frame in forward if frame in back]
        assert len(middle) >= 1


_PLAY_ALL = """(() => {
  const broken = [];
  let frames = 0;
  while (showNextFrame(100) && frames < 20000) {
    frames += 1;
    for (const path of document.querySelectorAll("#stage svg path[d], #stage svg")) {
      const text = `${path.getAttribute("d")} ${path.getAttribute("viewBox")}`;
      if (/NaN|undefined|Infinity/.test(text)) broken.push(text.slice(0, 80));
    }
  }
  return [frames, broken, document.getElementById("place").textContent];
})()"""


@pytest.mark.parametrize("seed", range(4))
def test_playing_to_the_end_breaks_nothing(
    seed: int, browser: DrivenBrowser, tmp_path: Path
) -> None:
    """Random proofs, played to their end, open and closed: every path and every frame of every
    picture consists of numbers, and playing stops at the last step.
    """
    proof = random_proof(seed, 10, 3 * seed)
    page = PlayedPage(browser, draw_proof_page(proof), tmp_path)
    page.select("speed", "4")
    page.choose("sideways", seed % 2 == 0)
    for is_closed in (False, True):
        page.choose("closure", is_closed)
        page.slide(0)
        browser.press(" ")
        frames, broken, place = browser.run(_PLAY_ALL)
        assert frames > 20
        assert broken == []
        assert place == f"{len(proof.moves)} / {len(proof.moves)}"
        assert page.text("reason").endswith("This is RIGHT, letter by letter.")
    assert browser.mistakes() == []


def test_large_changes_fade_and_say_so(browser: DrivenBrowser, tmp_path: Path) -> None:
    """A step that takes too many relations to be shown is a change from one picture to another,
    named as such; both pictures are there while it lasts.
    """
    word = (1, 2, 3) * 40
    twist = Braid(word, 4)
    proof = Certificate.same(
        twist, Braid((3, 2, 1) * 40, 4), "identity", [Rewrite((3, 2, 1) * 40), Conjugate((), word)]
    )
    page = PlayedPage(browser, draw_proof_page(proof), tmp_path)
    page.slide(0)
    before = len(page.strands()[0])
    frames = iter_frames(page, "ArrowRight")
    assert max(map(len, frames)) == 2 * before
    page.browser.press("ArrowLeft")
    page.next_frame()
    page.next_frame(300)
    note = page.browser.run("document.querySelector('.note').textContent")
    assert "rewritten by braid relations" in note
