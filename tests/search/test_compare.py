"""``compare`` proves sameness by moves and difference by invariants, and says when it cannot."""

import random

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.certificates import format_certificate
from braidsearch.errors import InputError
from braidsearch.search.driver import compare
from braidsearch.search.limits import Progress, SearchLimits
from braidsearch.verifier import verify_text
from braidsearch.words import SYMMETRIES, Braid, apply_symmetry, parse_word
from tests.knot_tables import iter_knots
from tests.scrambles import scramble
from tests.strategies import braids

REPEATABLE = SearchLimits(seconds=None, nodes=400)

# Morton, An irreducible 4-string braid with unknotted closure, 1983, in mirror form; the word is
# from memory, and that its closure is the unknot is what the test finds out.
MORTON = "3 3 -2 3 -2 -1 -1 -1 2 -1 2"


def is_accepted(verdict, left, right) -> bool:
    report = verify_text(
        format_certificate(verdict.certificate),
        left=(left.strands, left.word),
        right=(right.strands, right.word),
    )
    return report.valid


@pytest.mark.parametrize(
    ("left", "right"),
    [
        ("1 1 1", "1 2 1 2"),  # the right-handed trefoil on two and three strands
        ("1 -2 1 -2", "-1 2 -1 2"),  # the figure-eight knot is its own mirror image
        (MORTON, "1:"),
        ("1: ", "2: 1"),
        ("4: 1 2 3", "1:"),
        ("3: 1 1", "3: 2 2"),
        ("1 1 1 -2", "1 1 1 2"),
    ],
)
def test_the_same_link(left, right):
    """Two words for one link are joined by moves that the verifier accepts."""
    left, right = parse_word(left), parse_word(right)
    verdict = compare(left, right)
    assert (verdict.outcome, verdict.symmetry) == ("same", "identity")
    assert is_accepted(verdict, left, right)


@pytest.mark.parametrize(
    ("left", "right", "invariant"),
    [
        ("1 1 1", "-1 -1 -1", "jones"),  # the two trefoils are mirror images of each other
        ("2: 1 1", "3: 1 1", "components"),  # a Hopf link, and one with a split circle
        ("1 1", "-1 -1", "linking-numbers"),  # the Hopf link with its two orientations
        ("1 1 1", "1 -2 1 -2", "alexander"),  # trefoil and figure-eight knot
    ],
)
def test_different_links(left, right, invariant):
    """The invariant that is named first tells the links apart, and the verifier agrees."""
    left, right = parse_word(left), parse_word(right)
    verdict = compare(left, right)
    assert verdict.outcome == "different"
    assert verdict.certificate.distinctions[0].invariant == invariant
    assert is_accepted(verdict, left, right)


def test_the_mirror_image_counts_when_asked_for():
    """Up to the mirror image both trefoils are one knot; the certificate names the symmetry."""
    left, right = Braid([1, 1, 1]), Braid([-1, -1, -1])
    verdict = compare(left, right, up_to=["mirror"])
    assert (verdict.outcome, verdict.symmetry) == ("same", "mirror")
    assert is_accepted(verdict, left, right)


def test_difference_up_to_symmetries_excludes_each_of_them():
    """Trefoil and figure-eight knot differ under all four symmetries."""
    left, right = Braid([1, 1, 1]), Braid([1, -2, 1, -2])
    verdict = compare(left, right, up_to=SYMMETRIES[1:])
    assert verdict.outcome == "different"
    assert {d.symmetry for d in verdict.certificate.distinctions} == set(SYMMETRIES)
    assert is_accepted(verdict, left, right)


def test_invariants_of_simplified_braids_carry_the_moves_along():
    """Words too large for the invariants are simplified first; the certificate holds the moves."""
    generator = random.Random(4)
    left = scramble(Braid([1] * 7), generator, 120, 7)
    right = scramble(Braid([1] * 5 + [2, -1, 2]), generator, 120, 7)
    verdict = compare(left, right)
    assert verdict.outcome == "different"
    assert is_accepted(verdict, left, right)


def test_mutants_are_told_apart():
    """The Kinoshita-Terasaka and Conway knots, 11n_42 and 11n_34, share every polynomial here.

    They are different (Riley, Homomorphisms of knot groups on finite groups, 1971): colourings
    with their longitudes see it, up to all symmetries.
    """
    rows = {row.name: row for row in iter_knots(11) if row.name in ("11n_34", "11n_42")}
    left, right = rows["11n_34"].braid, rows["11n_42"].braid
    verdict = compare(left, right, up_to=SYMMETRIES[1:], limits=REPEATABLE)
    assert verdict.outcome == "different"
    names = {item.symmetry: item.invariant for item in verdict.certificate.distinctions}
    assert names["identity"] == names["reverse"] == "colouring"
    assert is_accepted(verdict, left, right)


@pytest.mark.parametrize("limits", [SearchLimits(nodes=0), SearchLimits(seconds=0)])
def test_limits_end_in_undecided(limits):
    """With no room to search, two words for one link stay undecided, with reasons."""
    verdict = compare(parse_word(MORTON), Braid([]), limits=limits)
    assert verdict.outcome == "undecided"
    assert verdict.certificate is None
    assert verdict.explored["ending"] in ("node limit", "time limit")
    assert verdict.suggestions


def test_an_unknown_symmetry_is_named():
    """The message names the word and the four that are known."""
    with pytest.raises(InputError, match="'sideways': expected mirror, reverse, mirror-reverse"):
        compare(Braid([1]), Braid([1]), up_to=["sideways"])


def test_the_same_query_gives_the_same_certificate():
    """Counted in nodes, two runs give one certificate, byte for byte."""
    texts = {
        format_certificate(compare(parse_word(MORTON), Braid([]), limits=REPEATABLE).certificate)
        for _ in range(2)
    }
    assert len(texts) == 1


def test_progress_is_told():
    """A listener hears what is being done, with nodes that never decrease."""
    heard: list[Progress] = []
    compare(parse_word(MORTON), Braid([]), progress=heard.append)
    assert [p.nodes for p in heard] == sorted(p.nodes for p in heard)
    assert any("search" in p.doing for p in heard)


def test_an_interruption_is_an_answer():
    """Ctrl-C during the search gives an undecided verdict that says so."""

    def interrupt(progress: Progress) -> None:
        if progress.nodes > 5:
            raise KeyboardInterrupt

    verdict = compare(parse_word(MORTON), Braid([]), progress=interrupt)
    assert (verdict.outcome, verdict.explored["ending"]) == ("undecided", "interrupted")


@settings(max_examples=40)
@given(braids(max_strands=4, max_letters=9), st.randoms(use_true_random=False))
def test_a_scramble_is_the_same_link(braid, generator):
    """Random Markov moves never make a different link, and mostly the way back is found."""
    verdict = compare(braid, scramble(braid, generator, 12, 1), limits=REPEATABLE)
    assert verdict.outcome != "different"


@settings(max_examples=60)
@given(braids(max_strands=4, max_letters=8), st.sampled_from(SYMMETRIES[1:]))
def test_no_answer_depends_on_the_side(braid, symmetry):
    """Comparing with a symmetric image gives the same outcome either way round."""
    image = apply_symmetry(braid, symmetry)
    one = compare(braid, image, limits=REPEATABLE).outcome
    other = compare(image, braid, limits=REPEATABLE).outcome
    assert {one, other} != {"same", "different"}
    assert compare(braid, image, up_to=[symmetry], limits=REPEATABLE).outcome == "same"
