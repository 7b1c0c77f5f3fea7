"""Two classes that are one image of a third are one class, by a proof that is joined."""

from pathlib import Path

import pytest

from braidsearch.certificates import Certificate
from braidsearch.ledger.ledger import Ledger
from braidsearch.search.driver import compare
from braidsearch.words import Braid
from tests.ledger.ledgers import braid_entries
from tests.unknots import MORTON

# Three words of the unknot (Morton, An irreducible 4-string braid with unknotted closure, 1983),
# of which a sort that may try nothing makes three classes.
UNKNOTS = (Braid([], strands=1), MORTON, MORTON.mirror())


@pytest.fixture
def ledger(tmp_path: Path) -> Ledger:
    """Three classes, with all questions about them open."""
    made = Ledger(tmp_path / "ledger", create=True)
    made.add(braid_entries(UNKNOTS))
    made.sort(nodes=0)
    assert made.store.count("classes") == 3
    assert made.store.count("undecided") == 3
    return made


def test_two_mirror_images_of_one_link_are_one_link(ledger: Ledger) -> None:
    """The proof leads from one to its mirror image, and from there to the other."""
    first, second, third = UNKNOTS
    ledger.record(mirrored(first, second))
    assert ledger.store.count("classes") == 3
    assert "joins two classes" in ledger.record(mirrored(first, third))
    assert ledger.store.count("classes") == 2
    found = ledger.proof("b1", "b2")
    assert (found.outcome, found.symmetry) == ("same", "identity")
    assert ledger.check().valid
    # what was asked of either is asked of both
    assert ledger.store.count("undecided") == 2


def mirrored(left: Braid, right: Braid) -> Certificate:
    """The certificate that left is the mirror image of right."""
    found = compare(left, right.mirror()).certificate
    assert found is not None
    return Certificate.same(left, right, "mirror", found.moves)


def test_without_proofs_about_images_nothing_follows(ledger: Ledger) -> None:
    """One sameness joins two classes, and the third waits."""
    first, second, _ = UNKNOTS
    certificate = compare(first, second).certificate
    assert certificate is not None
    ledger.record(certificate)
    assert ledger.store.count("classes") == 2
