"""Braids that are too large for the methods of a ledger are kept all the same."""

import random

import pytest

from braidsearch.ledger import fingerprints
from braidsearch.ledger.fingerprints import BASE, FIELDS, fingerprint
from braidsearch.ledger.preparing import prepare
from braidsearch.words import Braid


def random_braid(strands: int, letters: int) -> Braid:
    generator = random.Random(strands)
    word = [generator.choice((1, -1)) * generator.randrange(1, strands) for _ in range(letters)]
    return Braid(word, strands)


def test_values_beyond_the_verifier_are_left_out(monkeypatch: pytest.MonkeyPatch) -> None:
    """A value that the verifier cannot recompute is missing, and no defect."""
    monkeypatch.setattr(
        fingerprints,
        "is_confirmed",
        lambda name, *_: None if name in FIELDS[BASE:] else True,
    )
    fingerprint.cache_clear()
    try:
        marks = fingerprint(Braid([1, 1, 1, 1, 1, 1, 1]))
    finally:
        fingerprint.cache_clear()
    assert marks.values[BASE:] == (None,) * (len(FIELDS) - BASE)
    assert None not in marks.base
    assert not marks.is_complete


def test_a_braid_beyond_all_summits_has_a_form() -> None:
    """A random braid on 20 strands keeps a short form, with its proof and a fingerprint."""
    prepared = prepare(random_braid(20, 300))
    assert len(prepared.form) <= 300
    assert None not in prepared.fingerprint.base
