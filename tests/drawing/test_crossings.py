"""The over- and undercrossings of a picture, read back from its path data."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.diagrams import closed_braid_diagram
from braidsearch.drawing import DIRECTIONS, draw_braid, draw_closure
from braidsearch.drawing.geometry import STRAND_SPACING
from braidsearch.invariants.diagram_bracket import diagram_jones_polynomial
from braidsearch.invariants.diagram_linking import diagram_linking_numbers
from braidsearch.invariants.jones import jones_polynomial
from braidsearch.words import Braid
from tests.drawing.svg_reader import Picture, braid_of, cross, read_picture
from tests.knot_tables import iter_knots, iter_links
from tests.strategies import braids

directions = st.sampled_from(DIRECTIONS)


def read(text: str, direction: str) -> Picture:
    return read_picture(text, is_turned=direction == "right")


def test_a_positive_letter_is_a_right_handed_crossing() -> None:
    """In the picture of sigma_1 the strand from the right passes over, one of its inverse below.

    By hand: the over-strand runs to the lower left, the under-strand to the lower right.
    """
    (seen,) = read_picture(draw_braid(Braid([1]))).crossings
    assert seen.over_direction.real < 0 < seen.over_direction.imag
    assert seen.under_direction.real > 0
    assert seen.under_direction.imag > 0
    assert seen.sign == 1
    (seen,) = read_picture(draw_braid(Braid([-1]))).crossings
    assert seen.over_direction.real > 0
    assert seen.sign == -1


@given(braids(max_strands=7, max_letters=40), directions, st.booleans())
def test_the_word_can_be_read_from_a_braid(braid: Braid, direction: str, is_labelled: bool) -> None:
    """Strands, letters and their order are those of the word, in as many parts as there are."""
    picture = read(draw_braid(braid, direction=direction, has_letters=is_labelled), direction)
    assert {len(part) for part in picture.braid_runs()} == {braid.strands}
    assert braid_of(picture.letters(), braid.strands) == braid


@given(braids(max_strands=6, max_letters=20), directions)
def test_the_word_can_be_read_from_a_closure(braid: Braid, direction: str) -> None:
    """The same for the closure, where no strand begins or ends."""
    picture = read(draw_closure(braid, direction=direction), direction)
    assert not picture.braid_runs()
    assert picture.closure_letters(STRAND_SPACING) == list(braid.word)


@given(braids(max_strands=5, max_letters=14), directions)
def test_a_closure_is_the_diagram_of_the_closed_braid(braid: Braid, direction: str) -> None:
    """Followed along its strands, the picture is a planar diagram with the braid's polynomial.

    The diagram's Jones polynomial is a state sum over what was seen, the braid's is computed from
    its word; the orientation of components is held by the linking numbers.
    """
    diagram = read(draw_closure(braid, direction=direction), direction).diagram()
    reference = closed_braid_diagram(braid)
    assert diagram.component_count == braid.components
    assert (diagram.writhe, diagram.circles) == (braid.exponent_sum, reference.circles)
    assert diagram_linking_numbers(diagram) == diagram_linking_numbers(reference)
    assert diagram_jones_polynomial(diagram) == jones_polynomial(braid)


def test_pictures_have_the_polynomials_of_the_tables() -> None:
    """Closures of the tables' words, read from their pictures, have the tables' Jones polynomials.

    Source: KnotInfo and LinkInfo (C. Livingston, A. H. Moore), package database-knotinfo.
    """
    rows = [*list(iter_knots(8))[::2], *list(iter_links(7))[::3]]
    assert len(rows) > 20
    for place, row in enumerate(rows):
        direction = DIRECTIONS[place % 2]
        diagram = read(draw_closure(row.braid, direction=direction), direction).diagram()
        assert diagram_jones_polynomial(diagram) == row.jones, row.name


@given(braids(max_strands=6, max_letters=24), st.booleans())
def test_gaps_are_wide_enough_to_be_seen(braid: Braid, is_closed: bool) -> None:
    """Every letter has one gap; its ends keep off the over-strand, which crosses it steeply."""
    picture = read_picture((draw_closure if is_closed else draw_braid)(braid))
    assert len(picture.crossings) == len(braid)
    for seen in picture.crossings:
        before, after = picture.runs[seen.under_before], picture.runs[seen.under_after]
        middle = int(seen.place)
        over = picture.runs[seen.over].points[max(0, middle - 15) : middle + 15]
        for end in (before.end, after.start):
            assert min(abs(point - end) for point in over) > 3.2  # beyond half the width of both
        assert (
            abs(cross(seen.over_direction, seen.under_direction)) > 0.6
        )  # steeper than 37 degrees


@given(braids(max_strands=4, max_letters=10), st.booleans())
def test_visible_strands_never_meet(braid: Braid, is_closed: bool) -> None:
    """What passes under is truly cut, so that pictures need no paper behind the strands."""
    picture = read_picture((draw_closure if is_closed else draw_braid)(braid))
    starts, ends = (
        np.array([point for run in picture.runs for point in run.points[place]])
        for place in (slice(None, -1), slice(1, None))
    )
    ways = ends - starts

    def sides(points: np.ndarray) -> np.ndarray:
        """On which side of each way (row) each point (column) lies."""
        return (ways.conj()[:, None] * (points[None, :] - starts[:, None])).imag

    is_split = sides(starts) * sides(ends) < -1e-9
    assert not (is_split & is_split.T).any()


@pytest.mark.parametrize("direction", DIRECTIONS)
def test_a_damaged_picture_is_read_as_damaged(direction: str) -> None:
    """The reader looks at paths alone: with over and under exchanged it reads the mirror image."""
    braid = Braid([1, -2, 3, 3, -1, 2])
    text = draw_braid(braid, direction=direction)
    changed = draw_braid(braid.mirror(), direction=direction)
    exchanged = "\n".join(
        other if line.startswith(("<path d=", '<path stroke="')) else line
        for line, other in zip(text.splitlines(), changed.splitlines(), strict=True)
    )
    assert braid_of(read(exchanged, direction).letters(), 4) == braid.mirror()
