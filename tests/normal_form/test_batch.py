"""A batch of normal forms is the list of the normal forms."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.errors import InputError
from braidsearch.normal_form import left_normal_form
from braidsearch.normal_form.batch import left_normal_forms, left_normal_forms_of
from braidsearch.words import Braid


@settings(max_examples=120)
@given(st.data(), st.sampled_from([1, 2, 3, 4, 5, 6, 8]))
def test_a_batch_agrees_with_the_words_one_by_one(data, strands):
    """On tables and on permutation arrays alike, for words of different lengths."""
    letters = [i for i in range(1 - strands, strands) if i]
    word = st.lists(st.sampled_from(letters), max_size=20) if letters else st.just([])
    braids = [Braid(w, strands) for w in data.draw(st.lists(word, min_size=1, max_size=8))]
    batch = left_normal_forms_of(braids)
    assert len(batch) == len(braids)
    assert [batch[i] for i in range(len(batch))] == [left_normal_form(braid) for braid in braids]


def test_a_whole_array_on_five_strands():
    """A thousand random words of 40 letters as one array of integers."""
    generator = np.random.default_rng(3)
    words = generator.integers(1, 5, (1000, 40)) * generator.choice([-1, 1], (1000, 40))
    batch = left_normal_forms(words, 5)
    for place in range(0, 1000, 7):
        assert batch[place] == left_normal_form(Braid(words[place].tolist(), 5))


def test_an_empty_batch():
    """No words give no normal forms."""
    assert len(left_normal_forms(np.zeros((0, 4), dtype=np.int64), 4)) == 0


def test_a_letter_outside_the_group_is_named():
    """The message names the letter and the range."""
    with pytest.raises(InputError, match="letter 5: expected an index from 1 to 4 on 5 strands"):
        left_normal_forms([[1, 5]], 5)
    with pytest.raises(InputError, match="3 axes"):
        left_normal_forms(np.zeros((1, 1, 1), dtype=np.int64), 5)
    with pytest.raises(InputError, match="one number of strands"):
        left_normal_forms_of([Braid([1]), Braid([2])])
