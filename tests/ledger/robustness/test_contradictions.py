"""Proofs that cannot all be true: both are kept, shown, and no class is changed."""

from collections.abc import Iterator
from pathlib import Path

import pytest

from braidsearch.certificates import Certificate, Distinction
from braidsearch.ledger import recording, sorting
from braidsearch.ledger.ledger import Ledger
from braidsearch.ledger.placing import Effort, Finding
from braidsearch.verifier import Report
from braidsearch.words import Braid
from tests.ledger.robustness.ledgers import ENOUGH_NODES, entry, partition
from tests.unknots import MORTON

TREFOIL, UNKNOT = Braid([1, 1, 1]), Braid([], strands=1)
UNKNOTS = (MORTON, MORTON.mirror())


@pytest.fixture
def ledger(tmp_path: Path) -> Iterator[Ledger]:
    """Two classes that differ, and one link under two words."""
    with Ledger(tmp_path / "ledger", create=True) as made:
        made.add([entry("trefoil", TREFOIL), entry("unknot", UNKNOT)])
        made.add([entry("trefoil again", Braid([1, 2, 1, 2]))])
        made.sort()
        yield made


@pytest.fixture
def deceived(monkeypatch: pytest.MonkeyPatch) -> None:
    """A verifier that accepts whatever is to be recorded."""
    monkeypatch.setattr(recording, "judge", lambda certificate: Report("valid", "", "deceived"))


def same(left: Braid, right: Braid) -> Certificate:
    """A certificate of sameness without a proof."""
    return Certificate.same(left, right, "identity", ())


def different(left: Braid, right: Braid) -> Certificate:
    """A certificate of difference with values that are none."""
    return Certificate.different(
        left, right, [Distinction("identity", "signature", {}, (), (), 0, 2)]
    )


@pytest.mark.usefixtures("deceived")
def test_a_forged_proof_of_sameness_merges_nothing_and_is_reported(ledger: Ledger):
    """Classes that a value tells apart stay apart, whatever a later certificate claims."""
    before = partition(ledger)
    assert "contradicts" in ledger.record(same(TREFOIL, UNKNOT))
    assert partition(ledger) == before
    (contradiction,) = ledger.report().contradictions
    assert {contradiction.left.name, contradiction.right.name} == {"trefoil", "unknot"}
    faults = ledger.check().faults
    assert any("contradiction 1" in fault for fault in faults)
    assert any(f"proof {contradiction.same}:" in fault for fault in faults)


@pytest.mark.usefixtures("deceived")
@pytest.mark.parametrize("left", [TREFOIL, Braid([1, 2, 1, 2])])
def test_a_forged_proof_of_difference_parts_nothing_and_is_reported(left: Braid, ledger: Ledger):
    """A class stays together, whatever a later certificate claims, even of one braid and itself."""
    before = partition(ledger)
    assert "contradicts" in ledger.record(different(left, Braid([1, 2, 1, 2])))
    assert partition(ledger) == before
    assert len(ledger.report().contradictions) == 1
    assert not ledger.check().valid


def test_without_deceit_a_forged_proof_is_refused(ledger: Ledger):
    """The verifier lets none of the forged certificates in."""
    for forged in (same(TREFOIL, UNKNOT), different(TREFOIL, Braid([1, 2, 1, 2]))):
        with pytest.raises(ValueError, match="does not hold"):
            ledger.record(forged)
    assert ledger.check().valid


def test_an_answer_against_stored_proofs_is_counted_and_kept_by_a_sort(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
):
    """A search that claims what stored proofs deny changes no class; the sort says so at once."""
    with Ledger(tmp_path / "ledger", create=True) as ledger:
        ledger.add([entry("morton", UNKNOTS[0]), entry("mirror", UNKNOTS[1])])
        ledger.add([entry("unknot", UNKNOT)])
        ledger.sort(nodes=0)
        assert len(partition(ledger)) == 3
        monkeypatch.setattr(sorting, "ask", liar())
        summary = ledger.sort(nodes=1)
        assert summary.contradictions == 1
        assert len(partition(ledger)) == 2
        assert len(ledger.report().contradictions) == 1
        faults = "\n".join(ledger.check().faults)
    assert "contradiction 1" in faults


def liar():
    """Answers that say one and two, two and three same, but one and three different."""
    outcomes = iter(("same", "different", "same"))

    def ask(left: Braid, right: Braid, symmetry: str, effort: Effort) -> Finding:
        outcome = next(outcomes)
        forged = same(left, right) if outcome == "same" else different(left, right)
        from braidsearch.certificates import format_certificate  # noqa: PLC0415

        return Finding(left, right, symmetry, outcome, format_certificate(forged), "a lie")

    return ask


def test_a_contradiction_is_found_even_where_it_was_entered_by_hand(ledger: Ledger):
    """A class joined by hand to one that differs from it is found by the check."""
    with ledger.store.writing():
        one, other = (number for number, _, _ in ledger.store.all_classes())
        ledger.store.merge_classes(one, other)
    report = ledger.check(), len(ledger.report().classes)
    assert report[1] == 1
    assert any("parts" in fault for fault in report[0].faults)


def test_enough_nodes_find_what_the_liar_denies(tmp_path: Path):
    """The three words are one link: the contradiction above was the liar's alone."""
    with Ledger(tmp_path / "ledger", create=True) as ledger:
        ledger.add([entry("morton", UNKNOTS[0]), entry("mirror", UNKNOTS[1])])
        ledger.add([entry("unknot", UNKNOT)])
        ledger.sort(nodes=ENOUGH_NODES)
        assert len(partition(ledger)) == 1
