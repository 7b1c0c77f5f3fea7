"""find_symmetries: the symmetric images of a closed braid, held against itself."""

import pytest

from braidsearch import Braid, InputError, SearchLimits, find_symmetries, verify
from braidsearch.words import apply_symmetry

LIMITS = SearchLimits(seconds=None, nodes=2_000)


@pytest.mark.parametrize(
    ("word", "expected"),
    [
        ([1, -2, 1, -2], ("same", "same", "same")),
        ([1, 1, 1], ("different", "same", "different")),
        ([-1, -1, 2, -1, 2, -1, 2, 2], ("different", "different", "same")),  # 8_17
    ],
)
def test_small_knots(word: list[int], expected: tuple[str, str, str]) -> None:
    """The figure eight knot, the trefoil, and 8_17, which is its mirror image only when reversed.

    Source: H. Trotter, Non-invertible knots exist, 1963; 8_17 from memory.
    """
    braid = Braid(word)
    verdicts = find_symmetries(braid, limits=LIMITS)
    assert tuple(verdict.outcome for verdict in verdicts.values()) == expected
    for symmetry, verdict in verdicts.items():
        assert verdict.certificate is not None
        assert (verdict.certificate.left, verdict.certificate.right) == (braid, braid)
        assert verify(verdict.certificate).valid
        if verdict.outcome == "same":
            assert verdict.symmetry == symmetry
            assert verdict.certificate.symmetry == symmetry
        else:
            assert [item.symmetry for item in verdict.certificate.distinctions] == [symmetry]


def test_the_word_that_is_its_own_image_needs_no_moves() -> None:
    """A palindrome is its own reverse, letter by letter."""
    braid = Braid([1, 1, 2, 1, 1])
    assert apply_symmetry(braid, "reverse") == braid
    found = find_symmetries(braid, symmetries=["reverse"])["reverse"]
    assert found.certificate is not None
    assert found.certificate.moves == ()
    assert found.reason == "the reverse of the word is the word itself"


def test_an_unknown_symmetry_is_named() -> None:
    """The identity is no question, nor is a name outside the four."""
    for name in ("identity", "sideways"):
        with pytest.raises(InputError, match=f"'{name}': expected mirror, reverse, mirror-rev"):
            find_symmetries(Braid([1]), symmetries=[name])
