"""Braid: a frozen value, its laws, its permutation and components."""

import pickle

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.errors import InputError
from braidsearch.words import MAX_LETTERS, MAX_STRANDS, Braid, cyclic_reduce, free_reduce
from tests.strategies import braids


@st.composite
def pairs_of_braids(draw: st.DrawFn) -> tuple[Braid, Braid]:
    """Two braids on the same number of strands."""
    left, right = draw(braids()), draw(braids())
    strands = max(left.strands, right.strands)
    return Braid(left.word, strands), Braid(right.word, strands)


@given(braids())
def test_repr_evaluates_to_an_equal_value(braid: Braid) -> None:
    """eval(repr(b)) == b, with an equal hash; a pickle comes back equal too."""
    again = eval(repr(braid))
    assert again == braid
    assert hash(again) == hash(braid)
    assert pickle.loads(pickle.dumps(braid)) == braid


@given(braids())
def test_strands_belong_to_the_value(braid: Braid) -> None:
    """The same word on another number of strands is another braid: its closure is another link."""
    wider = Braid(braid.word, braid.strands + 1)
    assert wider != braid
    assert wider.components == braid.components + 1


@pytest.mark.parametrize("name", ["word", "strands", "colour"])
def test_braid_is_frozen(name: str) -> None:
    """No attribute of a Braid can be set or deleted."""
    braid = Braid([1, 1, 1])
    with pytest.raises(AttributeError):
        setattr(braid, name, ())
    with pytest.raises(AttributeError):
        delattr(braid, name)
    assert braid == Braid([1, 1, 1], strands=2)


@given(pairs_of_braids())
def test_product_concatenates_and_adds_exponent_sums(pair: tuple[Braid, Braid]) -> None:
    """Words compose left to right, and the exponent sum is a homomorphism to the integers."""
    left, right = pair
    assert (left * right).word == left.word + right.word
    assert (left * right).exponent_sum == left.exponent_sum + right.exponent_sum


@given(pairs_of_braids())
def test_permutation_is_a_homomorphism(pair: tuple[Braid, Braid]) -> None:
    """A strand passes through the left factor first, then through the right one."""
    left, right = pair
    composed = tuple(right.permutation[end] for end in left.permutation)
    assert (left * right).permutation == composed


@given(braids())
def test_inverse_cancels_in_permutation_and_letters(braid: Braid) -> None:
    """b * b^-1 reduces freely to the empty word, and its permutation is the identity."""
    product = braid * braid.inverse()
    assert free_reduce(product).word == ()
    assert product.permutation == tuple(range(braid.strands))


@given(braids())
def test_components_are_the_cycles_of_the_permutation(braid: Braid) -> None:
    """The cycles partition the positions, and each follows the permutation round."""
    cycles = braid.component_cycles
    assert sorted(position for cycle in cycles for position in cycle) == list(range(braid.strands))
    for cycle in cycles:
        followed = [braid.permutation[position] for position in cycle]
        assert followed == [*cycle[1:], cycle[0]]
    assert braid.components == len(cycles)


@given(braids(), st.integers(0, 30))
def test_components_do_not_change_under_conjugation(braid: Braid, cut: int) -> None:
    """Moving letters from the front to the back turns the closed braid, and keeps the link."""
    place = min(cut, len(braid))
    turned = Braid(braid.word[place:] + braid.word[:place], braid.strands)
    assert turned.components == braid.components


@pytest.mark.parametrize(
    ("word", "strands", "components"),
    [([], 1, 1), ([], 3, 3), ([1, 1, 1], 2, 1), ([1, 1], 2, 2), ([1, 1], 3, 3), ([1, 2] * 3, 3, 3)],
)
def test_components_of_known_links(word: list[int], strands: int, components: int) -> None:
    """Unknot, unlink, trefoil, Hopf link, the same with a split circle, torus link T(3, 3)."""
    assert Braid(word, strands).components == components


@given(braids())
def test_free_reduction_is_idempotent_and_leaves_no_cancelling_pair(braid: Braid) -> None:
    """No letter stands beside its inverse afterwards; permutation and exponent sum stay."""
    reduced = free_reduce(braid)
    assert all(a != -b for a, b in zip(reduced.word, reduced.word[1:], strict=False))
    assert free_reduce(reduced) == reduced
    assert reduced.permutation == braid.permutation
    assert reduced.exponent_sum == braid.exponent_sum


@given(braids())
def test_cyclic_reduction_names_its_conjugator(braid: Braid) -> None:
    """by * core * by^-1 reduces freely to the word that the braid reduces to."""
    core, by = cyclic_reduce(braid)
    conjugator = Braid(by, braid.strands)
    assert free_reduce(conjugator * core * conjugator.inverse()) == free_reduce(braid)
    assert len(core) < 2 or core.word[0] != -core.word[-1]


@pytest.mark.parametrize(
    ("word", "strands", "said"),
    [
        ([0], None, "letter 0"),
        ([1, 3], 3, "letter 3: expected an index from 1 to 2 on 3 strands"),
        ([1], 1, "letter 1: expected the empty word"),
        ([True], None, "letter True"),
        ([1.0], None, "letter 1.0"),
        (["1"], None, "letter '1'"),
        (7, None, "7 as a braid word"),
        ([1], 0, "strand count 0"),
        ([1], True, "strand count True"),
        ([1], "2", "strand count '2'"),
        ([], MAX_STRANDS + 1, f"{MAX_STRANDS + 1} strands: expected at most {MAX_STRANDS}"),
        ([MAX_STRANDS], None, f"{MAX_STRANDS + 1} strands"),
    ],
)
def test_bad_values_are_named(word: object, strands: object, said: str) -> None:
    """Each mistake raises InputError with one line: the offending token, and what was expected."""
    with pytest.raises(InputError) as caught:
        Braid(word, strands)  # type: ignore[arg-type]
    assert said in str(caught.value)
    assert "expected" in str(caught.value)
    assert "\n" not in str(caught.value)


def test_endless_word_ends_in_an_error() -> None:
    """A generator that never stops is refused after MAX_LETTERS letters."""

    def endless():  # type: ignore[no-untyped-def]
        while True:
            yield 1

    with pytest.raises(InputError, match=f"at most {MAX_LETTERS} letters"):
        Braid(endless())


def test_factors_on_different_strands_are_refused() -> None:
    """A product in two different groups is no braid."""
    with pytest.raises(InputError, match="expected 2 strands"):
        Braid([1]) * Braid([1, 2])
