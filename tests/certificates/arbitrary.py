"""Strategies for certificates of any well-formed content, true or not."""

from hypothesis import strategies as st

from braidsearch.certificates import Certificate, Distinction
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
names = st.text(max_size=12)
values = st.recursive(
    st.integers() | st.integers(-(2**400), 2**400) | names,
    lambda inner: st.lists(inner, max_size=4),
    max_leaves=8,
)
symmetries = st.sampled_from(SYMMETRIES)
distinctions = st.builds(
    Distinction,
    symmetries,
    names,
    st.dictionaries(names, values, max_size=2),
    move_lists,
    move_lists,
    values,
    values,
)
certificates = st.one_of(
    st.builds(Certificate.same, braids(), braids(), symmetries, move_lists),
    st.builds(
        Certificate.different, braids(), braids(), st.lists(distinctions, min_size=1, max_size=3)
    ),
)
