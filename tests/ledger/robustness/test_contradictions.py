"""Proofs that cannot all be true: both are kept, shown, and no class is changed."""

import itertools
from collections.abc import Iterator
from pathlib import Path

import pytest

from braidsearch.certificates import Certificate, Distinction, format_certificate
from braidsearch.command_line.ledger.showing import show_contradictions
from braidsearch.ledger import judgements, recording, sorting
from braidsearch.ledger.findings import Effort, Finding
from braidsearch.ledger.ledger import Ledger
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
    with unsettled_unknots(tmp_path / "ledger") as ledger:
        _, second, third = (form for (form,) in ledger.store.rows("SELECT braid FROM forms"))
        monkeypatch.setattr(sorting, "ask", liar("same", "different", "same"))
        ledger.sort(nodes=1)
        braids = [ledger.store.braid(form) for form in (second, third)]
        question = Finding(*braids, "identity", "undecided", None, "put back by hand")
        with ledger.store.writing():
            ledger.store.set_undecided(second, third, question, Effort(1))
        summary = ledger.sort(nodes=2)
        assert summary.contradictions == 1
        assert len(partition(ledger)) == 2
        assert len(ledger.report().contradictions) == 1
        faults = "\n".join(ledger.check().faults)
    assert "contradiction 1" in faults


@pytest.mark.parametrize("outcomes", [("same", "different"), ("different", "same")])
def test_what_follows_from_a_sameness_and_a_difference_is_open_no_more(
    outcomes: tuple[str, str], tmp_path: Path, monkeypatch: pytest.MonkeyPatch
):
    """From one is two and one is not three it follows that two is not three: nobody asks that."""
    with unsettled_unknots(tmp_path / "ledger") as ledger:
        assert ledger.store.count("undecided") == 3
        monkeypatch.setattr(sorting, "ask", liar(*outcomes))
        ledger.sort(nodes=1)
        assert ledger.report().open_questions == ()
        assert len(partition(ledger)) == 2
        assert ledger.report().contradictions == ()


def unsettled_unknots(path: Path) -> Ledger:
    """A ledger of three words for one link, of which none was found to be another yet."""
    ledger = Ledger(path, create=True)
    ledger.add([entry("morton", UNKNOTS[0]), entry("mirror", UNKNOTS[1])])
    ledger.add([entry("unknot", UNKNOT)])
    ledger.sort(nodes=0)
    assert len(partition(ledger)) == 3
    return ledger


@pytest.mark.usefixtures("deceived")
@pytest.mark.parametrize("strictness", [0, 1])
def test_values_of_which_no_certificate_is_accepted_contradict_all_the_same(
    strictness: int, ledger: Ledger, monkeypatch: pytest.MonkeyPatch
):
    """Where the verifier refuses a certificate of two values, they still hold classes apart.

    It may refuse every one of them, or the first and not the next.
    """
    refused = Report("malformed", "too large", "refused")
    kept = judgements.judge
    count = itertools.count()
    monkeypatch.setattr(
        judgements,
        "judge",
        lambda one: refused if not strictness or next(count) == 0 else kept(one),
    )
    before = partition(ledger)
    assert "contradicts" in ledger.record(same(TREFOIL, UNKNOT))
    assert partition(ledger) == before
    (contradiction,) = ledger.report().contradictions
    assert (contradiction.different is None) == (strictness == 0)
    assert show_contradictions([contradiction])[0].startswith("CONTRADICTION 1: by proof ")
    assert any(fault.startswith("contradiction 1: ") for fault in ledger.check().faults)


@pytest.mark.usefixtures("deceived")
@pytest.mark.parametrize("first", ["same", "different"])
def test_proofs_about_mirror_images_contradict_each_other_too(first: str, ledger: Ledger):
    """One proof says that a link is the mirror image of another, the other that it is not."""
    claims = {
        "same": Certificate.same(TREFOIL, UNKNOT, "mirror", ()),
        "different": Certificate.different(
            UNKNOT, TREFOIL, [Distinction("mirror", "signature", {}, (), (), 0, 2)]
        ),
    }
    assert "one more proof" in ledger.record(claims.pop(first))
    assert "contradicts" in ledger.record(*claims.values())
    assert len(ledger.report().contradictions) == 1


def liar(*said: str):
    """Gives these answers in turn, whatever is asked."""
    outcomes = iter(said)

    def ask(left: Braid, right: Braid, symmetry: str, effort: Effort) -> Finding:
        outcome = next(outcomes)
        forged = same(left, right) if outcome == "same" else different(left, right)
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
