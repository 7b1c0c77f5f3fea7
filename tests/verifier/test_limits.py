"""Every bound is met with an answer in words, and no file takes more than its share of work."""

import json
import random
import time

import pytest

from braidsearch.verifier import verify, verify_file, verify_text
from tests.verifier.closures import NAMES
from tests.verifier.makers import random_word

HEADER = {"format": "braidsearch certificate", "version": 1}


def same(left, right, moves=()):
    return json.dumps(
        {
            **HEADER,
            "left": {"strands": left[0], "word": list(left[1])},
            "right": {"strands": right[0], "word": list(right[1])},
            "verdict": "same",
            "symmetry": "identity",
            "moves": list(moves),
        }
    )


def different(braid, invariant):
    item = {"symmetry": "identity", "invariant": invariant, "parameters": {}}
    value = 0 if invariant in ("components", "signature") else []
    item |= {"left_moves": [], "right_moves": [], "left": value, "right": value}
    left = {"strands": braid[0], "word": list(braid[1])}
    claim = {**HEADER, "left": left, "right": left, "verdict": "different", "distinctions": [item]}
    return json.dumps(claim)


def test_the_largest_words_are_read():
    """1,000 strands and 100,000 letters are within the bounds; one more of either is not."""
    word = [999, -999] * 50_000
    assert verify_text(same((1000, word), (1000, word))).valid
    report = verify_text(same((1000, [*word, 1]), (1000, word)))
    assert report.status == "unreadable"
    assert "100001 entries: expected 0 to 100000" in report.reason
    assert verify_text(same((1001, []), (1001, []))).status == "unreadable"


def test_the_thousandth_strand_is_the_last():
    """A stabilization beyond 1,000 strands cannot be stated."""
    step = {"move": "stabilize", "sign": 1, "strands": 1001, "word": [1000]}
    assert verify_text(same((1000, []), (1000, []), [step])).status == "unreadable"


def test_long_words_are_rewritten():
    """A word of 100,000 letters is rewritten, and a false rewriting seen, in some seconds."""
    word = random_word(random.Random(5), 20, 99_994)
    long = [*word, 1, 2, 1, -2, -1, -2]
    step = {"move": "rewrite", "word": word}
    assert verify_text(same((20, long), (20, word), [step])).valid
    step = {"move": "rewrite", "word": [*word, 1]}
    report = verify_text(same((20, long), (20, [*word, 1]), [step]))
    assert report.status == "rejected"


def test_a_word_of_ten_million_letters(tmp_path):
    """An answer in words, at once: the file is larger than any certificate."""
    path = tmp_path / "long.json"
    path.write_text('{"left": {"word": [' + "1," * 10_000_000 + "1]}}")
    report = verify_file(path)
    assert report.status == "unreadable"
    assert "too large" in report.reason
    assert verify_text(path.read_text()).status == "unreadable"


def test_files_without_an_end():
    """A device that never ends is read up to the bound and no further."""
    report = verify_file("/dev/zero")
    assert report.status == "unreadable"


@pytest.mark.parametrize("depth", [100, 10_000, 1_000_000])
@pytest.mark.parametrize("brackets", ["[]", '{"a":}', '{"moves":[}'])
def test_nesting(depth, brackets):
    """Lists and objects nested too deeply are unreadable."""
    text = brackets[:-1] * depth
    assert verify_text(text).status == "unreadable"
    assert verify_text(text + brackets[-1] * depth).status == "unreadable"


@pytest.mark.parametrize("digits", [4_000, 4_001, 5_000, 1_000_000])
def test_huge_integers(digits):
    """Reading an integer costs no more for having a million digits."""
    text = different((1, []), "signature").replace('"left": 0', '"left": -' + "7" * (digits - 1))
    report = verify_text(text)
    assert report.status == ("rejected" if digits <= 4_000 else "unreadable")


def test_too_many_moves():
    """100,000 moves are replayed; one more is unreadable."""
    step = {"move": "rewrite", "word": []}
    assert verify_text(same((1, []), (1, []), [step] * 100_000)).valid
    report = verify_text(same((1, []), (1, []), [step] * 100_001))
    assert report.status == "unreadable"
    assert "100001 entries" in report.reason


@pytest.mark.parametrize("invariant", NAMES)
def test_every_invariant_pays_for_its_work(invariant):
    """With less work left than the value takes, it is refused, not computed."""
    braid = verify.Braid(4, tuple(random_word(random.Random(6), 4, 30)))
    compute = verify.INVARIANTS[invariant].compute
    work = verify.Work()
    compute(braid, work)
    spent = verify.MAX_WORK - work.left
    assert spent > 0
    compute(braid, verify.Work(spent))
    with pytest.raises(verify.RejectedError, match="too large for this verifier"):
        compute(braid, verify.Work(spent - 1))


def test_equality_pays_for_its_work():
    """So do the comparison of words and the moves themselves."""
    with pytest.raises(verify.RejectedError, match="too large for this verifier"):
        verify.is_equal(3, (1, 2) * 50, (), verify.Work(500))
    with pytest.raises(verify.RejectedError, match="too large for this verifier"):
        verify.apply_move(verify.Braid(2, ()), verify.Move("rewrite", ()), verify.Work(5))


@pytest.mark.parametrize(
    ("invariant", "strands", "letters"),
    [
        ("homfly", 10, 30),
        ("homfly", 1000, 0),
        ("homfly", 4, 20_000),
        ("alexander", 3, 20_000),
        ("jones", 24, 1_000),
    ],
)
def test_what_is_too_large_is_refused(invariant, strands, letters):
    """Beyond the bounds of an invariant the answer is rejected, too large, and comes soon."""
    word = random_word(random.Random(7), strands, letters)
    began = time.perf_counter()
    report = verify_text(different((strands, word), invariant))
    assert time.perf_counter() - began < 60
    assert report.status == "rejected"
    assert "too large for this verifier" in report.reason


@pytest.mark.parametrize(
    ("invariant", "strands", "letters"),
    [
        ("homfly", 4, 30),
        ("homfly", 3, 40),
        ("jones", 12, 60),
        ("jones", 4, 300),
        ("alexander", 8, 80),
        ("signature", 10, 300),
        ("linking-numbers", 1000, 100_000),
        ("components", 1000, 100_000),
    ],
)
def test_what_is_not_too_large_is_answered(invariant, strands, letters):
    """Values of the sizes that FORMAT.md promises: within a fifth of the work that there is."""
    word = random_word(random.Random(8), strands, letters)
    braid = verify.cyclically_reduced(verify.Braid(strands, tuple(word)))
    work = verify.Work()
    verify.INVARIANTS[invariant].compute(braid, work)
    assert work.left > verify.MAX_WORK * 4 // 5
