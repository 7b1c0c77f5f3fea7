"""Eleven thousand damaged certificates: none is accepted that does not hold, and none raises."""

import json
import random
from collections import Counter

import pytest

from braidsearch.verifier import verify_text
from tests.verifier.damage import WAYS, as_text, damaged, damaged_text, iter_paths
from tests.verifier.finer_oracles import TooLargeError
from tests.verifier.judge import holds
from tests.verifier.makers import (
    FINER,
    INVARIANTS,
    make_different,
    make_finely_different,
    make_same,
)

BASES = 90
DAMAGES = 9_000
TEXT_DAMAGES = 2_000


@pytest.fixture(scope="module")
def certificates():
    """Valid certificates of both kinds, with every move, symmetry and invariant among them."""
    generator = random.Random(20240)
    makers = (make_same, make_different, make_finely_different)
    made = [make(generator) for _ in range(BASES // 3) for make in makers]
    text = json.dumps(made)
    for name in (
        *INVARIANTS,
        *dict(FINER),
        "mirror-reverse",
        "rewrite",
        "conjugate",
        "destabilize",
    ):
        assert f'"{name}"' in text
    return made


def test_undamaged_certificates_are_accepted(certificates):
    """Both verifiers accept what was made by valid moves and from true values."""
    for certificate in certificates:
        report = verify_text(as_text(certificate))
        assert report.valid, (report, certificate)
        assert holds(certificate)


def check(text, data):
    """Hold the verifier's answer against the judge's, and return the status."""
    report = verify_text(text)
    assert report.status in ("valid", "rejected", "unreadable")
    assert "\n" not in report.reason
    assert report.reason
    assert "defect" not in report.reason, (report, text)
    try:
        if "too large" not in report.reason:
            assert report.valid == holds(data), (report, text)
    except TooLargeError:
        return "not judged"
    return report.status


def test_every_field_damaged_in_every_way(certificates):
    """9,000 certificates with one field changed: accepted exactly if they still hold."""
    generator = random.Random(20241)
    plan = [
        (certificate, path, way)
        for certificate in certificates
        for path in iter_paths(certificate)
        for way in WAYS
    ]
    generator.shuffle(plan)
    fields, seen = set(), Counter()
    for certificate, path, way in plan:
        data = damaged(certificate, path, way, generator)
        if as_text(data) != as_text(certificate):  # 1 == 1.0 == True, but not as they are written
            fields.add(next((step for step in reversed(path) if isinstance(step, str)), ""))
            seen[check(as_text(data), data)] += 1
        if seen.total() == DAMAGES:
            break
    assert seen.total() == DAMAGES
    assert seen.pop("not judged", 0) < DAMAGES // 100
    assert min(seen.values()) > 20, seen  # each answer occurs, so each is tested
    assert fields >= {
        *("", "format", "version", "left", "right", "verdict", "symmetry", "moves", "strands"),
        *("word", "move", "by", "sign", "distinctions", "invariant", "parameters"),
        *("left_moves", "right_moves", "generators", "meridians", "order", "power", "prime"),
        "components",
    }


def test_damaged_text(certificates):
    """2,000 texts with a stretch cut out, doubled or replaced: read strictly or not at all."""
    generator = random.Random(20242)
    seen = Counter()
    while seen.total() < TEXT_DAMAGES:
        original = as_text(generator.choice(certificates))
        text = damaged_text(original, generator)
        if text != original:
            seen[check(text, strictly_read(text))] += 1
    assert min(seen.values()) > 20, seen


def strictly_read(text):
    """The JSON value; None where a key stands twice or it is no JSON."""

    def pairs(items):
        if len({key for key, _ in items}) < len(items):
            raise ValueError("a key stands twice")
        return dict(items)

    try:
        return json.loads(text, object_pairs_hook=pairs)
    except ValueError:
        return None
