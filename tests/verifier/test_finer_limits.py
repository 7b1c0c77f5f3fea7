"""The finer invariants pay for their work, and large groups, classes and words are refused soon."""

import json
import random
import time

import pytest

from braidsearch.verifier import verify, verify_text
from tests.verifier.finer_samples import SAMPLES
from tests.verifier.makers import random_word
from tests.verifier.permutation_groups import ELEVEN, MATHIEU, S3, cycles, symmetric

THREE_BRAID = {"three-braid": ("three-braid", {})}


def rejected(strands, word, invariant, parameters):
    """The reason for which a certificate with such a value is rejected, within the time allowed."""
    braid = {"strands": strands, "word": list(word)}
    value = [0, 0] if invariant == "levine-tristram" else []
    item = {"symmetry": "identity", "invariant": invariant, "parameters": parameters}
    item |= {"left_moves": [], "right_moves": [], "left": value, "right": value}
    header = {"format": "braidsearch certificate", "version": 1, "verdict": "different"}
    text = json.dumps(header | {"left": braid, "right": braid, "distinctions": [item]})
    began = time.process_time()
    report = verify_text(text)
    assert time.process_time() - began < 120
    assert report.status == "rejected"
    return report.reason


@pytest.mark.parametrize("sample", [*SAMPLES, *THREE_BRAID])
def test_every_invariant_pays_for_its_work(sample):
    """With less work left than the value takes, it is refused, not computed."""
    name, parameters = (SAMPLES | THREE_BRAID)[sample]
    compute = verify.INVARIANTS[name].compute
    braid = verify.Braid(3, tuple(random_word(random.Random(6), 3, 14)))
    work = verify.Work()
    compute(braid, work, **parameters)
    spent = verify.MAX_WORK - work.left
    assert spent > 0
    compute(braid, verify.Work(spent), **parameters)
    with pytest.raises(verify.RejectedError, match="too large for this verifier"):
        compute(braid, verify.Work(spent - 1), **parameters)


TOO_LARGE = [
    ("colouring", {"generators": symmetric(30), "meridians": [cycles(30, (1, 2))]}, 2, 3),
    ("colouring", {"generators": symmetric(200), "meridians": [cycles(200, (1, 2))]}, 2, 3),
    ("colouring", {"generators": symmetric(8), "meridians": [symmetric(8)[1]]}, 2, 3),
    ("colouring", {"generators": MATHIEU, "meridians": [ELEVEN]}, 10, 8),
    ("colouring", {"generators": MATHIEU, "meridians": [ELEVEN]}, 1000, 0),
    ("colouring", {"generators": MATHIEU * 500, "meridians": [ELEVEN] * 1000}, 3, 10),
    ("colouring", S3, 30, 3_000),
    ("colouring", S3, 1000, 100_000),
    ("levine-tristram", {"order": 60, "power": 1}, 5, 400),
    ("levine-tristram", {"order": 60, "power": 1}, 100, 20_000),
    ("levine-tristram", {"order": 2, "power": 1}, 3, 100_000),
    ("alexander-module", {"prime": 997}, 8, 1_000),
    ("alexander-module", {"prime": 2}, 50, 5_000),
    ("three-braid", {}, 3, 100_000),
    ("sublinks", {"components": 500, "invariant": "components"}, 1000, 0),
    ("sublinks", {"components": 3, "invariant": "homfly"}, 1000, 1_000),
]


every_large_value = pytest.mark.parametrize(
    ("invariant", "parameters", "strands", "letters"), TOO_LARGE
)


@every_large_value
def test_a_step_is_a_step(invariant, parameters, strands, letters):
    """A huge group, class, word or number of sublinks: refused, with 0.4 microseconds a step."""
    word = random_word(random.Random(7), strands, letters)
    braid = verify.cyclically_reduced(verify.Braid(strands, tuple(word)))
    began = time.process_time()
    with pytest.raises(verify.RejectedError, match=r"too large for this verifier|conjugate to"):
        verify.INVARIANTS[invariant].compute(braid, verify.Work(10_000_000), **parameters)
    assert time.process_time() - began < 4


@pytest.mark.slow
@every_large_value
def test_what_is_too_large_is_refused(invariant, parameters, strands, letters):
    """The same with all the work that one file may cost: an answer in words, within two minutes.

    What can be afforded after all is recomputed, and the made-up value is not it.
    """
    word = random_word(random.Random(7), strands, letters)
    reason = rejected(strands, word, invariant, parameters)
    answers = ("too large for this verifier", "conjugate", "is not the recomputed one")
    assert any(answer in reason for answer in answers), reason


@pytest.mark.parametrize(
    ("invariant", "parameters", "strands", "letters"),
    [
        ("levine-tristram", {"order": 60, "power": 1}, 3, 60),
        ("levine-tristram", {"order": 3, "power": 1}, 4, 100),
        ("alexander-module", {"prime": 5}, 4, 60),
        ("colouring", S3, 4, 300),
        ("colouring", {"generators": MATHIEU, "meridians": [ELEVEN]}, 3, 30),
        ("three-braid", {}, 3, 10_000),
        ("sublinks", {"components": 2, "invariant": "jones"}, 8, 100),
        ("sublinks", {"components": 3, "invariant": "colouring", **S3}, 8, 100),
    ],
)
def test_what_is_not_too_large_is_answered(invariant, parameters, strands, letters):
    """Values of the sizes that FORMAT.md promises: within a fifth of the work that there is."""
    word = random_word(random.Random(8), strands, letters)
    braid = verify.cyclically_reduced(verify.Braid(strands, tuple(word)))
    work = verify.Work()
    verify.INVARIANTS[invariant].compute(braid, work, **parameters)
    assert work.left > verify.MAX_WORK * 4 // 5
