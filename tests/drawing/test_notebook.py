"""What verdicts, certificates and distinctions show of themselves in a notebook."""

import re
from xml.etree import ElementTree

import pytest
from hypothesis import given

from braidsearch.certificates import Certificate, Distinction
from braidsearch.drawing.notebook import MOST_MOVES, polynomial_latex
from braidsearch.moves import MoveChain
from braidsearch.search.driver import compare
from braidsearch.search.limits import SearchLimits
from braidsearch.words import Braid
from tests.certificates.test_file_format import DIFFERENT, SAME
from tests.strategies import move_chains

TREFOIL = Braid([1, 1, 1])


def parse(shown: str) -> ElementTree.Element:
    """The HTML as a tree: it is well formed as XML too."""
    return ElementTree.fromstring(shown)


def texts(shown: str) -> str:
    return " ".join("".join(parse(shown).itertext()).split())


def test_sameness_shows_both_closures_and_the_moves() -> None:
    """Two pictures, the claim, and one item for each move."""
    shown = SAME._repr_html_()
    assert shown.count("<svg") == 2
    assert "The closure of LEFT = 1 1 1 is the closure of RIGHT = 1 2 1 2." in texts(shown)
    assert shown.count("<li>") == len(SAME.moves)
    assert "Add strand 3 with the letter 2: 1 1 1 2" in texts(shown)


def test_differences_show_both_values() -> None:
    """As polynomials with raised powers and long minus signs."""
    shown = DIFFERENT._repr_html_()
    assert "t + t<sup>3</sup> \N{MINUS SIGN} t<sup>4</sup>" in shown
    assert "is not the closure of RIGHT" in texts(shown)
    assert "by the Jones polynomial" in texts(shown)


def test_polynomials_are_latex_where_there_are_some() -> None:
    """The right-handed trefoil's, by hand; half powers keep their fraction."""
    (jones,) = DIFFERENT.distinctions
    latex = jones._repr_latex_()
    assert latex == r"$\displaystyle t + t^{3} - t^{4} \;\neq\; -t^{-4} + t^{-3} + t^{-1}$"
    assert polynomial_latex("jones", [[-5, -1], [-1, -1]]) == "-t^{-5/2} - t^{-1/2}"
    assert polynomial_latex("homfly", [[2, 0, 2], [2, 2, 1], [4, 0, -1]]) == (
        "2 v^{2} + v^{2} z^{2} - v^{4}"
    )
    assert Distinction("identity", "components", {}, [], [], 1, 2)._repr_latex_() is None


@given(move_chains())
def test_every_proof_is_well_formed(chain: MoveChain) -> None:
    """Any chain of moves gives HTML that is well formed, with an item for each of its moves."""
    proof = Certificate.same(chain.start, chain.current, "mirror", chain.moves)
    tree = parse(proof._repr_html_())
    assert len(tree.findall(".//li")) == min(len(chain), MOST_MOVES)


def test_long_proofs_leave_their_middle_out() -> None:
    """What is left out is counted, and the last moves keep their numbers."""
    chain = MoveChain(TREFOIL)
    for number in range(40):
        if number % 2 == 0:
            chain.stabilize(1)
        else:
            chain.destabilize()
    shown = Certificate.same(chain.start, chain.current, "identity", chain.moves)._repr_html_()
    parse(shown)
    assert f"{40 - MOST_MOVES} more moves stand in the certificate." in shown
    assert '<ol start="37"' in shown


def test_large_braids_are_words_alone() -> None:
    """More crossings than a notebook shows legibly are not drawn."""
    large = Braid([1, 2] * 40)
    shown = Certificate.same(large, large, "identity", [])._repr_html_()
    assert "<svg" not in shown
    assert "LEFT is RIGHT, letter by letter." in shown


@pytest.mark.parametrize(
    ("right", "outcome", "said"),
    [
        (Braid([1, 2, 1, 2]), "Same link", "letter by letter"),
        (Braid([-1, -1, -1]), "Different links", "Jones polynomial"),
    ],
)
def test_verdicts_show_what_proves_them(right: Braid, outcome: str, said: str) -> None:
    """The outcome first, then the reason, then the certificate as it shows itself."""
    shown = compare(TREFOIL, right)._repr_html_()
    assert texts(shown).startswith(outcome)
    assert said in texts(shown)
    assert shown.count("<svg") == 2


def test_undecided_says_what_to_do() -> None:
    """No picture proves anything here: the reason, and how to go on."""
    morton = Braid([3, 3, -2, 3, -2, -1, -1, -1, 2, -1, 2])
    verdict = compare(morton, Braid([], 1), limits=SearchLimits(nodes=0))
    shown = verdict._repr_html_()
    assert texts(shown).startswith("Undecided")
    assert len(parse(shown).findall(".//li")) == len(verdict.suggestions) > 0
    assert not re.search(r"<svg|proof", shown)
