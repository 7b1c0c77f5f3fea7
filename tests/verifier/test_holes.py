"""The holes that checkers of proofs have had elsewhere, one by one."""

import ast
import json
import subprocess
import sys
from pathlib import Path

import pytest

from braidsearch.verifier import verify, verify_file, verify_text
from tests.verifier.cases import CASES, expected, path_of

VERIFIER = Path(verify.__file__)


def status_of(folder, name):
    return verify_file(path_of(folder, name)).status


def test_1_unknown_rules_are_not_accepted():
    """Unknown moves, invariants, symmetries, verdicts, versions, parameters: unreadable."""
    for name in (
        *("move-unknown", "move-exchange", "invariant-unknown", "symmetry-unknown"),
        *("verdict-undecided", "version-2", "colouring-with-another-key"),
        *("distinction-with-a-parameter", "format-of-another-program"),
    ):
        assert status_of("malformed", name) == "unreadable"


def test_2_what_stands_around_the_changed_place_is_compared():
    """A letter changed far from where the move acts is seen."""
    for name in (
        *("rewrite-false-far-from-the-change", "stabilize-changes-another-letter"),
        *("destabilize-loses-another-letter", "conjugate-loses-a-letter"),
        *("stabilize-equal-but-not-literal", "stabilize-in-front"),
    ):
        assert status_of("rejected", name) == "rejected"


def test_3_start_and_end_are_compared_with_the_claim():
    """A chain between other braids proves nothing about these."""
    for name in (
        *("same-starts-at-another-left", "same-stops-before-the-end", "same-moves-backwards"),
        *("same-ends-at-a-conjugate-only", "same-ends-at-an-equal-word-only"),
        *("same-ends-on-other-strands", "same-symmetry-not-applied"),
        *("same-left-and-right-exchanged", "different-symmetry-not-applied"),
        "different-value-of-the-braid-before-the-moves",
    ):
        assert status_of("rejected", name) == "rejected"


def test_3_the_braids_asked_for_are_not_ignored():
    """A valid certificate about other braids than those asked for is rejected."""
    path = path_of("accepted", "same-trefoil-on-three-strands")
    trefoil, other = (2, (1, 1, 1)), (3, (1, 2, 1, 2))
    assert verify_file(path, trefoil, other).valid
    assert verify_file(path, left=[2, [1, 1, 1]]).valid
    for left, right in (
        *((other, None), (None, trefoil), (other, trefoil), ((3, (1, 1, 1)), None)),
        *(((2, ()), None), ((2, (1, 1, 1, 1)), other), (trefoil, (3, (2, 1, 2, 1)))),
    ):
        report = verify_file(path, left, right)
        assert report.status == "rejected"
        assert "another" in report.reason


def test_4_checking_nothing_is_no_success():
    """No moves between different words, no distinctions, no file, no arguments."""
    assert status_of("rejected", "same-nothing-shown") == "rejected"
    assert status_of("malformed", "distinctions-empty") == "unreadable"
    assert status_of("malformed", "empty-file") == "unreadable"
    assert verify.main([]) == 2
    assert verify.main(["no such file"]) == 2
    braid = verify.Braid(1, ())
    empty = verify.Claim("braidsearch certificate", 1, braid, braid, "different")
    with pytest.raises(verify.RejectedError, match="nothing is shown to differ"):
        verify.check_claim(empty, verify.Work())


def test_5_an_early_failure_is_not_forgotten():
    """A false step before true ones, a false distinction before or after a true one."""
    for name in (
        *("false-move-then-true-moves", "second-move-false"),
        *("different-first-distinction-false", "different-second-distinction-false"),
    ):
        assert status_of("rejected", name) == "rejected"


@pytest.mark.parametrize("text", [None, 5, [], {}, object(), bytearray(b"{}")])
def test_6_no_input_raises(text):
    """What is no text at all is unreadable too."""
    assert verify_text(text).status == "unreadable"
    assert verify_file(text).status == "unreadable"


@pytest.mark.parametrize("bound", [5, "12", (), (1,), (1, 2, 3), (1, 5), {}, (2, None)])
def test_6_no_binding_raises(bound):
    """A braid asked for that is none is said to be none, and does not bind loosely."""
    text = path_of("accepted", "same-trefoil-on-three-strands").read_text()
    assert not verify_text(text, left=bound).valid
    assert not verify_text(text, right=bound).valid


def test_6_numbers_of_the_file_are_no_unchecked_indices():
    """Letters outside the group, strands that a braid cannot have, huge integers."""
    for name in ("letter-outside-the-group", "letter-zero", "letter-huge", "strands-negative"):
        assert status_of("malformed", name) == "unreadable"
    for name in (
        *("rewrite-letter-outside-the-group", "conjugate-by-outside-the-group"),
        *("conjugate-word-outside-the-group", "destabilize-last-strand"),
    ):
        assert status_of("rejected", name) == "rejected"


def test_7_no_check_is_an_assert():
    """There is no assert in the file, and python -O rejects as python does."""
    tree = ast.parse(VERIFIER.read_text(encoding="utf-8"))
    assert not any(isinstance(node, ast.Assert) for node in ast.walk(tree))
    rejected = [str(path_of("rejected", name)) for name in expected("rejected")]
    program = (
        "import sys, importlib.util as u\n"
        "spec = u.spec_from_file_location('verify', sys.argv[1])\n"
        "module = sys.modules['verify'] = u.module_from_spec(spec)\n"
        "spec.loader.exec_module(module)\n"
        "print([module.verify_file(name).status for name in sys.argv[2:]])\n"
    )
    finished = subprocess.run(
        [sys.executable, "-O", "-I", "-c", program, str(VERIFIER), *rejected],
        capture_output=True,
        text=True,
        check=True,
        timeout=60,
    )
    assert finished.stdout.strip() == str(["rejected"] * len(rejected))


def test_8_reading_is_strict():
    """Keys twice, unknown keys, booleans for integers, NaN, fractions, trailing text."""
    for name in (
        *("key-twice", "key-twice-in-a-move", "key-unknown", "key-missing", "version-true"),
        *("braid-with-unknown-key", "move-with-a-key-of-another", "distinction-with-unknown-key"),
        *("letter-true", "sign-true", "strands-true", "value-with-true", "value-true-for-a-number"),
        *("letter-nan", "letter-infinity", "letter-1.0", "letter-with-exponent", "version-1.0"),
        *("text-after-the-object", "two-objects", "byte-order-mark", "not-utf-8", "comment"),
    ):
        assert status_of("malformed", name) == "unreadable"


def test_9_the_cases_are_not_all_valid():
    """A checker that always says yes, or always no, fails in two folders of three."""
    counts = {folder: len(expected(folder)) for folder, _ in CASES}
    assert counts["rejected"] >= counts["accepted"] >= 15
    assert counts["malformed"] >= counts["accepted"]


def test_a_defect_does_not_pass_for_a_proof(monkeypatch):
    """An error of the verifier's own is reported as rejected, and named as a defect."""

    def broken(*_):
        raise LookupError

    monkeypatch.setattr(verify, "apply_move", broken)
    report = verify_file(path_of("accepted", "same-trefoil-on-three-strands"))
    assert report.status == "rejected"
    assert "defect" in report.reason


def test_the_values_compared_are_those_of_the_symmetric_image():
    """Each symmetry acts on the right braid: of sixteen claims the true ones are accepted."""
    header = {"format": "braidsearch certificate", "version": 1, "verdict": "same", "moves": []}
    word = [1, 1, 2, -1, 2]
    images = {
        "identity": word,
        "mirror": [-letter for letter in word],
        "reverse": word[::-1],
        "mirror-reverse": [-letter for letter in word[::-1]],
    }
    for symmetry in images:
        for other, image in images.items():
            claim = {
                **header,
                "left": {"strands": 3, "word": image},
                "right": {"strands": 3, "word": word},
                "symmetry": symmetry,
            }
            assert verify_text(json.dumps(claim)).valid is (symmetry == other)
