"""Two proofs that cannot both be true: loudly reported, never resolved."""

from pathlib import Path

import pytest

from braidsearch.certificates import Certificate
from braidsearch.ledger import recording
from braidsearch.ledger.ledger import Ledger
from braidsearch.search.driver import compare
from braidsearch.search.gate import judge
from braidsearch.verifier import Report
from braidsearch.words import Braid
from tests.ledger.ledgers import MIRRORED, TREFOIL, damage, partition

FALSE = Certificate.same(Braid([1, 1, 1]), Braid([-1, -1, -1]), "identity", ())
BELIEVED = Report("valid", "believed", "believed")


def believe(monkeypatch: pytest.MonkeyPatch) -> None:
    """Let the ledger believe the one false certificate, as a defective verifier would."""
    monkeypatch.setattr(
        recording, "judge", lambda one: BELIEVED if one.verdict == "same" else judge(one)
    )


def test_a_false_proof_of_sameness_merges_nothing(
    plants: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    """Trefoils of both hands claimed to be one: both proofs are kept, the classes stay."""
    before = partition(plants)
    believe(monkeypatch)
    with Ledger(plants) as ledger:
        assert ledger.record(FALSE).startswith("it contradicts proofs that the ledger has")
        (found,) = ledger.report().contradictions
        assert {found.left.braid.word, found.right.braid.word} == {
            tuple(map(int, word.split())) for word in (TREFOIL, MIRRORED)
        }
        text = ledger.store.one("SELECT verdict FROM evidence WHERE id = ?", [found.different])
        assert text == "different"
        assert ledger.record(FALSE) == "it is there already"
        assert len(ledger.report().contradictions) == 1
        faults = ledger.check().faults
    assert partition(plants) == before
    assert f"contradiction 1: proof {found.same} and proof {found.different}" in faults
    assert any(fault.startswith(f"proof {found.same}: ") for fault in faults)


def test_a_proof_of_difference_inside_a_class_is_a_contradiction(plants: Path) -> None:
    """Braids that were merged by a forged row, then told apart by a proof that holds."""
    damage(plants, "UPDATE forms SET class = 1 WHERE class = 2")
    with Ledger(plants) as ledger:
        one, other = ledger.entry("bench/thistle"), ledger.entry("teasel")
        damage(
            plants,
            "INSERT INTO evidence SELECT 1000, ?, ?, 'identity', 'same', 'forged', '{}'",
            [one.braid_number, other.braid_number],
        )
        certificate = compare(one.braid, other.braid).certificate
        assert certificate is not None
        assert certificate.verdict == "different"
        assert ledger.record(certificate).startswith("it contradicts")
        (found,) = ledger.report().contradictions
        assert found.same == 1000
