"""The page draws each stage as the pictures of the package do: its path data beside theirs."""

import itertools
import re
from pathlib import Path

import pytest

from braidsearch.certificates import Certificate
from braidsearch.drawing.changes import changed_letters
from braidsearch.drawing.geometry import Curve, Geometry, visible_runs
from braidsearch.drawing.levels import arrange_levels
from braidsearch.drawing.palette import look_of
from braidsearch.drawing.player import draw_proof_page
from braidsearch.drawing.strand_paths import (
    braid_geometry,
    closure_geometry,
    components_of_positions,
)
from braidsearch.drawing.svg import format_path
from braidsearch.moves.markov import stated_result
from braidsearch.words import Braid
from tests.drawing.browser import DrivenBrowser
from tests.drawing.player.played import PlayedPage, Strands
from tests.drawing.player.proofs import RELATIONS, accepted, random_proof

PROOFS = {
    "relations": RELATIONS,
    "exchange": accepted("same-exchange-written-out"),
    "random": random_proof(4, 14),
}
HALF_A_HUNDREDTH = 0.0101
"""Both round to hundredths, one to the even neighbour where two are equally near."""


def stage_levels(proof: Certificate) -> list[tuple[Braid, tuple[tuple[int, ...], ...]]]:
    """Each stage of a proof of sameness, its levels broken at what is marked in it."""
    braids = [proof.left]
    for move in proof.moves:
        braids.append(stated_result(braids[-1], move))
    edges: list[set[int]] = [set() for _ in braids]
    for place, move in enumerate(proof.moves):
        acted, made = changed_letters(braids[place].word, move)
        edges[place] |= set(acted)
        edges[place + 1] |= set(made)
    pairs = zip(braids, edges, strict=True)
    return [(braid, arrange_levels(braid.word, breaks)) for braid, breaks in pairs]


def expected_paths(geometry: Geometry, is_right: bool) -> list[str]:
    """The path data of each component, whatever its number."""
    if is_right:
        geometry = geometry.mapped(lambda point: (point[1], -point[0]))
    paths: dict[int, list[str]] = {}
    for curve in geometry.curves:
        paths.setdefault(curve.component, []).append(path_of(curve))
    return sorted((" ".join(each) for each in paths.values()), key=shape)


def path_of(curve: Curve) -> str:
    is_whole = curve.is_closed and all(segment.is_over for segment in curve.segments)
    return format_path(visible_runs(curve), is_whole)


def shape(data: str) -> tuple[float, ...]:
    """By what paths are sorted: where they begin, coarsely."""
    return tuple(round(float(number)) for number in re.findall(r"-?[\d.]+", data)[:8])


def check_paths(drawn: Strands, expected: list[str]) -> None:
    """The same commands with the same numbers."""
    found = sorted((data for _, data in drawn), key=shape)
    assert len(found) == len(expected)
    for data, reference in zip(found, expected, strict=True):
        assert re.sub(r"[-\d. ]+", " ", data) == re.sub(r"[-\d. ]+", " ", reference)
        ours, theirs = (re.findall(r"-?[\d.]+", text) for text in (data, reference))
        assert len(ours) == len(theirs)
        for one, other in zip(ours, theirs, strict=True):
            assert float(one) == pytest.approx(float(other), abs=HALF_A_HUNDREDTH)


@pytest.mark.parametrize("name", PROOFS)
def test_stages_are_drawn_as_everywhere(name: str, browser: DrivenBrowser, tmp_path: Path) -> None:
    """At every stage, open and closed, downwards and to the right, the curves of the page are those
    of the package's pictures, number for number.
    """
    proof = PROOFS[name]
    page = PlayedPage(browser, draw_proof_page(proof), tmp_path)
    stages = stage_levels(proof)
    assert page.last_stop == len(proof.moves)
    for is_closed, is_right in itertools.product((False, True), repeat=2):
        page.choose("closure", is_closed)
        page.choose("sideways", is_right)
        for number, (braid, levels) in enumerate(stages):
            page.slide(number)
            if is_closed:
                geometry = closure_geometry(braid, levels)
            else:
                geometry = braid_geometry(braid, levels, components_of_positions(braid))
            check_paths(page.strands()[0], expected_paths(geometry, is_right))
    assert browser.mistakes() == []


def test_components_keep_their_colours(browser: DrivenBrowser, tmp_path: Path) -> None:
    """Along a whole proof there are as many colours as components, those of their numbers."""
    proof = PROOFS["random"]
    page = PlayedPage(browser, draw_proof_page(proof), tmp_path)
    expected = {look_of(number).colour for number in range(proof.left.components)}
    for stop in range(page.last_stop + 1):
        page.slide(stop)
        assert {colour for colour, _ in page.strands()[0]} == expected


def test_the_comparison_would_notice_another_picture() -> None:
    """A crossing changed, or a strand moved by a fiftieth of a unit, is seen."""
    braids = [Braid([1, 2, 1]), Braid([1, -2, 1])]
    geometries = [
        braid_geometry(braid, arrange_levels(braid.word), components_of_positions(braid))
        for braid in braids
    ]
    moved = geometries[0].mapped(lambda point: (point[0] + 0.02, point[1]))
    drawn = [("", data) for data in expected_paths(geometries[0], False)]
    check_paths(drawn, expected_paths(geometries[0], False))
    for other in (geometries[1], moved):
        with pytest.raises(AssertionError):
            check_paths(drawn, expected_paths(other, False))
