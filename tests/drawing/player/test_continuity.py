"""Strands never jump: from one moment of a movement to the next, what is drawn stays near."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import pairwise
from pathlib import Path

import numpy as np
import numpy.typing as npt
import pytest

from braidsearch.certificates import Certificate
from braidsearch.drawing.player import draw_proof_page
from braidsearch.drawing.player.scenes import page_scenes
from tests.drawing.browser import DrivenBrowser
from tests.drawing.player.played import PlayedPage
from tests.drawing.player.proofs import RELATIONS, accepted, random_proof
from tests.drawing.svg_reader import iter_subpaths

PROOFS = {
    "exchange": accepted("same-exchange-written-out"),
    "relations": RELATIONS,
    "random": random_proof(7, 6, 6),
}

COARSE, FINE = 16.0, 2.0
"""Milliseconds between two frames; the fine ones look into steps that seem too long."""

NEAR, SAME = 8, 4
"""How far a strand may be from where it was a coarse frame, and a fine frame, before, in units of
the page, in which positions of strands are 24 apart. A crossing that moves at 1500 units a second
goes 3 in a fine frame.
"""

_PLAY = """(() => {
  const look = () => [...document.querySelectorAll("#stage svg.braid")].map((svg) => {
    const box = svg.querySelector("g[clip-path]") && svg.querySelector("clipPath rect");
    const paths = svg.querySelectorAll("path[stroke-width='3.6']:not([display])");
    return [
      box && ["x", "y", "width", "height"].map((name) => Number(box.getAttribute(name))),
      [...paths].map((path) => [path.getAttribute("stroke"), path.getAttribute("d")]),
    ];
  })[0];
  const frames = [look()];
  for (let k = 0; k < %d && showNextFrame(%f); k += 1) frames.push(look());
  return frames;
})()"""

_ADVANCE = "for (const milliseconds of %s) showNextFrame(milliseconds);"
_MOST_AT_ONCE = 6
"""Coarse frames; the page takes no step of more than a tenth of a second."""

Drawn = tuple[list[float] | None, list[tuple[str, str]]]
"""The box outside of which nothing is seen, if there is one, and colour and path data."""

Frame = dict[str, npt.NDArray[np.int64]]
"""The squares of one unit that the strands of each colour run through, across and down."""


def play(page: PlayedPage, frames: int, milliseconds: float) -> list[Drawn]:
    """What is drawn now, and in each of so many further frames, fewer where the movement ends."""
    found: list[Drawn] = page.browser.run(_PLAY % (frames, milliseconds))
    return found


def advance(page: PlayedPage, stop: int, moment: int) -> None:
    """Begin the step after a stop anew, up to the coarse frame of this number."""
    page.slide(stop)
    page.browser.press("ArrowRight")
    if moment:
        times, rest = divmod(moment - 1, _MOST_AT_ONCE)  # the first frame starts the clock
        steps = [COARSE, *[_MOST_AT_ONCE * COARSE] * times, rest * COARSE]
        page.browser.run(_ADVANCE % steps)


def squares(drawn: Drawn) -> Frame:
    """What is seen, as squares."""
    box, strands = drawn
    points: dict[str, list[npt.NDArray[np.complex128]]] = {}
    for colour, data in strands:
        for cubics, _ in iter_subpaths(data):
            points.setdefault(colour, []).append(_points_of(np.array(cubics).T[:, :, None]))
    found = {}
    for colour, pieces in points.items():
        each = np.concatenate(pieces)
        places = np.array([each.real, each.imag])
        if box is not None:
            corner = np.array(box[:2])[:, None]
            inside = (places >= corner) & (places <= corner + np.array(box[2:])[:, None])
            places = places[:, inside.all(axis=0)]
        found[colour] = places.astype(np.int64)
    return found


def _points_of(controls: npt.NDArray[np.complex128]) -> npt.NDArray[np.complex128]:
    """Points on many cubics, the longest of which says how many on each; its rows are controls."""
    a, b, c, d = controls
    longest = (abs(b - a) + abs(c - b) + abs(d - c)).max()
    time = np.linspace(0.0, 1.0, int(longest) + 2)
    rest = 1.0 - time
    points = a * rest**3 + 3 * b * rest**2 * time + 3 * c * rest * time**2 + d * time**3
    return np.asarray(points.ravel(), dtype=np.complex128)


def stays_near(before: Frame, after: Frame, room: int) -> bool:
    """Whether whatever is drawn in one of two frames is within so many squares in the other.

    The beginning of a new strand, no longer than that, may be where nothing was.
    """
    assert set(before) == set(after)
    for colour in before:
        pair = (before[colour], after[colour])
        least = np.minimum(*(each.min(axis=1) for each in pair)) - room
        shape = np.maximum(*(each.max(axis=1) for each in pair)) - least + room + 1
        images = [np.zeros(shape, dtype=bool) for _ in pair]
        for image, each in zip(images, pair, strict=True):
            image[tuple(each - least[:, None])] = True
        for one, other in (images, reversed(images)):
            far = np.argwhere(one & ~_widened(other, room))
            if far.size and np.ptp(far, axis=0).max() > room:
                return False
    return True


def _widened(image: npt.NDArray[np.bool_], room: int) -> npt.NDArray[np.bool_]:
    """The squares within so many of one that is set, in both directions."""
    for _ in range(2):
        wide = image.copy()
        for step in range(1, room + 1):
            wide[step:] |= image[:-step]
            wide[:-step] |= image[step:]
        image = wide.T
    return image


def far_steps(frames: Sequence[Drawn], room: int) -> list[int]:
    """The numbers of the frames after which something is drawn far from before."""
    seen = [squares(frame) for frame in frames]
    pairs = enumerate(pairwise(seen))
    return [number for number, pair in pairs if not stays_near(*pair, room)]


def jumps(page: PlayedPage, stop: int) -> tuple[int, list[tuple[int, float]]]:
    """How many coarse frames the step after a stop has, and at which stop and millisecond of it
    strands jump.
    """
    advance(page, stop, 0)
    coarse = play(page, 1000, COARSE)
    far, found = far_steps(coarse, NEAR), []
    for moment in (each for each in far if each - 1 not in far):
        count = next(n for n in range(1, len(far) + 1) if moment + n not in far)
        advance(page, stop, moment)
        fine = play(page, int(count * COARSE / FINE) + 1, FINE)
        found += [(stop, COARSE * moment + FINE * each) for each in far_steps(fine, SAME)]
    return len(coarse) - 1, found


def kinds_of(proof: Certificate) -> list[tuple[object, ...]]:
    """What kind of movement leads to each stop, single relations being stops."""
    (scene,) = page_scenes(proof)
    found: list[tuple[object, ...]] = []
    for kind, *values in (part for step in scene["lanes"][0]["steps"] for part in step["parts"]):
        if kind == "relation":
            _, before, after = values
            is_mixed = len({letter > 0 for letter in before}) == 2
            found.append((kind, len(before), len(after), is_mixed))
        elif kind == "turn":
            found.append((kind, values[0] > 0))
        else:
            found.append((kind,))
    return found


def check_steps(proof: Certificate, page: PlayedPage, is_closed: bool, stops: list[int]) -> None:
    """No step from one of the stops to the next has a jump in it."""
    page.choose("closure", is_closed)
    page.choose("single", True)
    assert page.last_stop == len(kinds_of(proof))
    frames, found = 0, []
    for stop in stops:
        count, jumped = jumps(page, stop)
        frames += count
        found += jumped
    assert frames > 20 * len(stops)
    assert found == []
    assert page.browser.mistakes() == []


@pytest.mark.parametrize("is_closed", [True, False])
@pytest.mark.parametrize("name", PROOFS)
def test_no_kind_of_movement_jumps(
    name: str, is_closed: bool, browser: DrivenBrowser, tmp_path: Path
) -> None:
    """The first movement of each kind in a proof: of the exchange move, closed and open, among
    them, with its stabilization, turns, conjugations, and relations of all kinds.
    """
    proof = PROOFS[name]
    kinds = kinds_of(proof)
    page = PlayedPage(browser, draw_proof_page(proof), tmp_path)
    check_steps(proof, page, is_closed, sorted(map(kinds.index, set(kinds))))


@pytest.mark.slow
@pytest.mark.parametrize("is_closed", [True, False])
@pytest.mark.parametrize("name", PROOFS)
def test_no_movement_jumps(
    name: str, is_closed: bool, browser: DrivenBrowser, tmp_path: Path
) -> None:
    """All movements."""
    proof = PROOFS[name]
    page = PlayedPage(browser, draw_proof_page(proof), tmp_path)
    check_steps(proof, page, is_closed, list(range(len(kinds_of(proof)))))


def test_a_jump_would_be_seen() -> None:
    """A strand, or a crossing, that is elsewhere in the next frame is far; a slow one is near."""
    line: Drawn = (None, [("red", "M0 0L0 100")])
    for moved in ("M12 0L12 100", "M0 0L0 80", "M0 0C20 30 20 60 0 100"):
        assert far_steps([line, line, (None, [("red", moved)])], 8) == [1]
    assert far_steps([line, (None, [("red", "M3 1L3 101")])], 4) == []
    box = [-5.0, -5.0, 10.0, 80.0]
    assert far_steps([(box, line[1]), (box, [("red", "M0 0L0 80")])], 4) == []
