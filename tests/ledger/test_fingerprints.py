"""Fingerprints: what is equal for one link, what tells two apart, and what is left out."""

import json
from collections.abc import Callable, Iterator
from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.invariants.table import invariant_named
from braidsearch.ledger import fingerprints
from braidsearch.ledger.fingerprints import BASE, FIELDS, Fingerprint, fingerprint
from braidsearch.ledger.ledger import Ledger
from braidsearch.moves import MoveChain
from braidsearch.words import Braid
from tests.ledger.ledgers import TREFOIL, TWINS, entries_of, partition
from tests.strategies import braids, move_chains

values = st.none() | st.sampled_from(["0", "1", "[[0,1]]"])
marks = st.tuples(*[values] * len(FIELDS)).map(Fingerprint)


@given(move_chains(max_moves=5))
def test_moves_keep_the_fingerprint(chain: MoveChain) -> None:
    """Braids with one closure have one fingerprint, in every value that both have."""
    assert fingerprint(chain.start).first_difference(fingerprint(chain.current)) is None


@given(braids(max_strands=4, max_letters=8))
def test_values_are_those_of_the_invariants(braid: Braid) -> None:
    """Each value is that of its invariant, as a certificate states it."""
    found = fingerprint(braid)
    assert found.is_complete
    for name in FIELDS:
        stated = json.loads(json.dumps(invariant_named(name).compute(braid)))
        assert found.value(name) == stated


@given(marks, marks)
def test_first_difference(one: Fingerprint, other: Fingerprint) -> None:
    """It is the same from both sides, and the first field whose values are there and differ."""
    pairs = zip(FIELDS, one.values, other.values, strict=True)
    differing = [name for name, a, b in pairs if None not in (a, b) and a != b]
    assert one.first_difference(other) == other.first_difference(one)
    assert one.first_difference(other) == (differing[0] if differing else None)
    assert one.first_difference(one) is None


@given(marks)
def test_parts_of_a_fingerprint(one: Fingerprint) -> None:
    """It is complete when no value is missing; the base holds the first ones."""
    assert one.is_complete == (None not in one.values)
    assert one.base == one.values[:BASE]
    for name, text in zip(FIELDS, one.values, strict=True):
        assert one.value(name) == (None if text is None else json.loads(text))


@pytest.fixture
def spend(monkeypatch: pytest.MonkeyPatch) -> Iterator[Callable[[float], None]]:
    """Says how many seconds a value of a fingerprint may cost, from now on."""

    def spend_at_most(seconds: float) -> None:
        monkeypatch.setattr(fingerprints, "_DEAREST_SECONDS", seconds)
        fingerprint.cache_clear()

    yield spend_at_most
    fingerprint.cache_clear()


def test_dear_values_are_left_out(spend: Callable[[float], None]) -> None:
    """Where nothing may be spent, the base alone is computed, for every braid."""
    spend(0.0)
    bare = fingerprint(Braid([1, 1, 1]))
    assert bare.values[BASE:] == (None,) * (len(FIELDS) - BASE)
    assert None not in bare.base


@pytest.mark.parametrize("costs", [(0.0, 2.0), (2.0, 0.0), (0.0, 0.0)])
def test_incomplete_fingerprints_meet(
    tmp_path: Path, spend: Callable[[float], None], costs: tuple[float, float]
) -> None:
    """Forms whose values are missing on one side or both come into one class all the same.

    The links that their fingerprints do not tell apart are told apart by proofs then.
    """
    path = tmp_path / "marsh.ledger"
    trefoil = ("reed mace", "marsh", TREFOIL)
    for seconds, links in zip(costs, ([*TWINS[:1], trefoil], TWINS[1:]), strict=True):
        spend(seconds)
        with Ledger(path, create=True) as ledger:
            ledger.add(entries_of(links))
            ledger.sort(nodes=500)
    assert partition(path) == (("marsh/reed", "marsh/rush"), ("marsh/reed mace",))
    with Ledger(path) as ledger:
        incomplete = ledger.store.count("fingerprints", "is_complete = 0")
        assert incomplete == (2 if costs[0] == 0.0 else 0)  # those of the forms that came first
        assert ledger.check().valid
        spend(2.0)
        found = ledger.find(Braid([1, 2, 1, 2]))
        assert found.outcome == "same"
        assert found.comparisons[0].class_number == ledger.entry("reed mace").class_number


def test_routes_that_disagree_are_a_defect(monkeypatch: pytest.MonkeyPatch) -> None:
    """A value that the verifier does not confirm is never kept."""
    monkeypatch.setattr(fingerprints, "is_confirmed", lambda *_: False)
    with pytest.raises(ArithmeticError, match="the searcher and the verifier disagree"):
        fingerprint.__wrapped__(Braid([1, 1]))
