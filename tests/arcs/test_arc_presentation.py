"""Arc presentations as values, and their way to braid words and back."""

import pytest
from hypothesis import given

from braidsearch.diagrams import ArcPresentation, arcs_from_word, word_from_arcs
from braidsearch.errors import InputError
from braidsearch.words import Braid
from tests.arcs.oracle import jones
from tests.strategies import braids


@given(braids(max_strands=7, max_letters=40))
def test_word_survives_the_way_through_arcs(braid: Braid) -> None:
    """Word -> arcs -> word is the identity, letter by letter, strands without letters included."""
    arcs = arcs_from_word(braid)
    assert arcs.size == len(braid) + 2 * braid.strands
    assert word_from_arcs(arcs) == braid


@given(braids(max_strands=4, max_letters=10))
def test_repr_evaluates_to_the_value(braid: Braid) -> None:
    """The repr of a presentation evaluates to an equal value with an equal hash."""
    arcs = arcs_from_word(braid)
    again = eval(repr(arcs))
    assert again == arcs
    assert hash(again) == hash(arcs)


def test_smallest_presentation_is_the_unknot_on_one_strand() -> None:
    """Two columns and two rows are a circle that runs round once: the braid on one strand."""
    arcs = ArcPresentation((0, 1), (1, 0))
    assert arcs.active_rows == (0,)
    assert word_from_arcs(arcs) == Braid([], strands=1)


def test_five_columns_hold_a_right_handed_trefoil() -> None:
    """The (2,3) torus knot has arc number 5 (Etnyre, Honda, 2001, from memory): rows c -> c + 2."""
    arcs = ArcPresentation((0, 1, 2, 3, 4), (2, 3, 4, 0, 1))
    mirror = ArcPresentation((4, 3, 2, 1, 0), (2, 1, 0, 4, 3))
    right_handed = ((2, 1), (6, 1), (8, -1))
    left_handed = ((-8, -1), (-6, 1), (-2, 1))
    found = {jones(word_from_arcs(arcs)), jones(word_from_arcs(mirror))}
    assert found == {right_handed, left_handed}


@pytest.mark.parametrize(
    ("starts", "ends"),
    [
        ((), ()),
        ((0, 1), (1,)),
        ((0, 0), (1, 0)),
        ((0, 1), (0, 1)),
        ((0, 2), (1, 0)),
        ((0, 1, 2), (1, 0, 2)),
    ],
)
def test_malformed_presentations_are_refused(
    starts: tuple[int, ...], ends: tuple[int, ...]
) -> None:
    """Rows left or entered twice, unequal lengths, and a column within one row are input errors."""
    with pytest.raises(InputError):
        ArcPresentation(starts, ends)
