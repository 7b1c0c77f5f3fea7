"""Strategies for certificates of any well-formed content, true or not."""

from hypothesis import strategies as st

from braidsearch.certificates import Certificate, Distinction
from braidsearch.certificates.grammar import VALUE_WIDTHS
from braidsearch.moves import Conjugate, Destabilize, Rewrite, Stabilize
from braidsearch.words import SYMMETRIES
from tests.strategies import braids

letters = st.integers(-9, 9).filter(bool)
words = st.lists(letters, max_size=8).map(tuple)
signs = st.sampled_from([1, -1])
strand_counts = st.integers(1, 12)
moves = st.one_of(
    st.builds(Rewrite, words),
    st.builds(Conjugate, words, words),
    st.builds(Stabilize, signs, strand_counts, words),
    st.builds(Destabilize, signs, strand_counts, words),
)
move_lists = st.lists(moves, max_size=5)
integers = st.integers(-9, 9) | st.integers(-(2**400), 2**400)


def values_of(invariant: str) -> st.SearchStrategy[object]:
    """Values of the shape that the invariant has."""
    width = VALUE_WIDTHS[invariant]
    if width == 0:
        return integers
    if width == 1:
        return st.lists(integers, max_size=4)
    return st.lists(st.lists(integers, min_size=width, max_size=width), max_size=4)


symmetries = st.sampled_from(SYMMETRIES)


@st.composite
def distinctions(draw: st.DrawFn, symmetry: str) -> Distinction:
    """A distinction for the symmetry, by any invariant."""
    invariant = draw(st.sampled_from(sorted(VALUE_WIDTHS)))
    return Distinction(
        symmetry=symmetry,
        invariant=invariant,
        parameters={},
        left_moves=draw(move_lists),
        right_moves=draw(move_lists),
        left=draw(values_of(invariant)),
        right=draw(values_of(invariant)),
    )


differences = st.lists(symmetries, min_size=1, max_size=4, unique=True).flatmap(
    lambda names: st.tuples(*map(distinctions, names))
)
certificates = st.one_of(
    st.builds(Certificate.same, braids(), braids(), symmetries, move_lists),
    st.builds(Certificate.different, braids(), braids(), differences),
)
