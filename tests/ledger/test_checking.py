"""check finds whatever is done to a ledger: each kind of damage has its line."""

import json
import shutil
from concurrent.futures import ThreadPoolExecutor
from pathlib import Path

import pytest

from braidsearch.errors import InputError
from braidsearch.ledger.ledger import Ledger
from tests.ledger.ledgers import TWINS, ask, damage, make_ledger


def faults(path: Path) -> str:
    """The faults that a check finds, a line each; none where all is proven."""
    with Ledger(path) as ledger:
        report = ledger.check()
    assert report.valid == (not report.faults)
    return "\n".join(report.faults)


def faults_or_error(path: Path) -> str:
    """The faults, or the line of the error that nothing can be said of the file."""
    try:
        return faults(path)
    except InputError as error:
        return str(error) if str(error).count("\n") == 0 else ""


def test_an_intact_ledger_has_no_fault(sorted_once: Path) -> None:
    """Everything is looked at: all proofs, all values of all classes."""
    with Ledger(sorted_once) as ledger:
        report = ledger.check()
        assert report.valid
        assert report.proofs == ledger.store.count("evidence")
        assert (report.classes, report.values) == (5, 5 * 7)


def test_progress_reaches_the_total(sorted_once: Path) -> None:
    """What is told ends with all of all, and never falls; an executor changes nothing."""
    told: list[tuple[int, int]] = []
    with Ledger(sorted_once) as ledger, ThreadPoolExecutor(2) as executor:
        report = ledger.check(executor=executor, progress=lambda *pair: told.append(pair))
        assert report == ledger.check()
    assert told[-1] == (report.proofs + report.classes,) * 2
    assert told == sorted(told)


@pytest.mark.parametrize(
    ("statement", "said"),
    [
        ("UPDATE evidence SET certificate = '{}' WHERE id = 1", "proof 1: "),
        ("UPDATE evidence SET certificate = 'no' WHERE id = 1", "proof 1: "),
        ("UPDATE evidence SET verdict = 'different' WHERE id = 1", "proof 1: it claims somethi"),
        ("UPDATE evidence SET symmetry = 'mirror' WHERE id = 1", "proof 1: it claims something"),
        ("UPDATE evidence SET left = 3 WHERE id = 1", "proof 1: it is about other braids"),
        ("UPDATE evidence SET right = 3 WHERE id = 1", "proof 1: it is about other braids"),
        ("UPDATE evidence SET right = 999 WHERE id = 1", "refers to what is not there"),
        ("DELETE FROM evidence WHERE id = 1", "no proof leads to its canonical form"),
        ("UPDATE braids SET word = '1 1 1 1 1' WHERE word = '1 1 1'", "other braids"),
        ("UPDATE braids SET word = '1 x' WHERE id = 2", "braid 2: "),
        ("UPDATE braids SET word = '1 0' WHERE id = 2", "braid 2: "),
        ("UPDATE braids SET word = '7' WHERE id = 2", "braid 2: "),
        ("UPDATE braids SET word = '1  2 1 2' WHERE id = 2", "braid 2: "),
        ("UPDATE braids SET strands = 0 WHERE id = 2", "braid 2: "),
        ("UPDATE entries SET remarks = '[' WHERE id = 1", "entry 1: its remarks are damaged"),
        ("UPDATE entries SET remarks = '{}' WHERE id = 1", "entry 1: its remarks are damaged"),
        ("UPDATE classes SET form = 999 WHERE id = 1", "refers to what is not there"),
        ("UPDATE fingerprints SET jones = '[[2,1]]' WHERE id = 1", "its jones is another one"),
        ("UPDATE fingerprints SET jones = '[[' WHERE id = 1", "its jones is another one"),
        ("UPDATE fingerprints SET jones = NULL WHERE id = 1", "looked up under other values"),
        ("UPDATE fingerprints SET key = 'x' WHERE id = 1", "looked up under other values"),
        ("UPDATE fingerprints SET base = 'x' WHERE id = 1", "looked up under other values"),
        ("UPDATE fingerprints SET is_complete = 0 WHERE id = 1", "looked up under other values"),
        ("UPDATE classes SET fingerprint = 2 WHERE id = 1", "class 1: its jones is another one"),
        (
            "UPDATE forms SET class = 2 WHERE braid = (SELECT form FROM classes WHERE id = 1)",
            "class 2: its proofs leave it in 2 parts",
        ),
        (
            "UPDATE forms SET class = 2 WHERE braid = (SELECT form FROM classes WHERE id = 1)",
            "class 1: the form that represents it is none of its own",
        ),
    ],
)
def test_damage_has_a_line(plants: Path, statement: str, said: str) -> None:
    """What is changed behind the back of the ledger is found, and named by its number."""
    damage(plants, statement)
    assert said in faults(plants)


def test_a_false_proof_is_rejected(plants: Path) -> None:
    """A certificate that is well formed and false is found by the verifier, with its reason."""
    (text,) = ask(plants, "SELECT certificate FROM evidence WHERE id = 1")[0]
    value = json.loads(text)
    value["moves"][0]["word"] = [*value["moves"][0]["word"], 1, 1]
    damage(plants, "UPDATE evidence SET certificate = ? WHERE id = 1", [json.dumps(value)])
    assert faults(plants).startswith("proof 1: ")


def test_a_class_torn_apart_is_noticed(tmp_path: Path) -> None:
    """Without the proof between two forms their class has two parts."""
    path = make_ledger(tmp_path / "marsh.ledger", TWINS)
    assert faults(path) == ""
    damage(path, "DELETE FROM evidence WHERE left IN (SELECT braid FROM forms)")
    assert "class 1: its proofs leave it in 2 parts" in faults(path)


def test_classes_that_nothing_tells_apart_are_noticed(wood: Path, tmp_path: Path) -> None:
    """Mutants without the proof between them, and twins without their question."""
    damage(wood, "DELETE FROM evidence WHERE verdict = 'different'")
    assert faults(wood) == "classes 1 and 2: nothing tells them apart, and no question is open"
    marsh = make_ledger(tmp_path / "marsh.ledger", TWINS, nodes=0)
    damage(marsh, "DELETE FROM undecided")
    assert faults(marsh) == "classes 1 and 2: nothing tells them apart, and no question is open"


def test_proofs_that_the_classes_deny_are_noticed(wood: Path, tmp_path: Path) -> None:
    """A proof between classes that are kept apart, one of difference inside a class."""
    apart = tmp_path / "marsh.ledger"
    make_ledger(apart, TWINS, nodes=500)
    damage(
        apart,
        "INSERT INTO fingerprints SELECT 2, 'x', base, is_complete, components, "
        "linking_numbers, linking_sums, alexander, jones, homfly, signature FROM fingerprints",
    )
    damage(
        apart,
        "INSERT INTO classes SELECT 2, braid, 2 FROM forms "
        "WHERE braid NOT IN (SELECT form FROM classes)",
    )
    damage(
        apart, "UPDATE forms SET class = 2 WHERE braid = (SELECT form FROM classes WHERE id = 2)"
    )
    assert "it joins classes 1 and 2, which are kept apart" in faults(apart)
    damage(wood, "UPDATE forms SET class = 1")
    assert "it tells braids apart that are both in class 1" in faults(wood)


def test_known_contradictions_are_faults(plants: Path) -> None:
    """A contradiction in the list is never a valid ledger."""
    damage(plants, "INSERT INTO contradictions VALUES (1, 1, 2, 1, 2)")
    assert faults(plants) == "contradiction 1: proof 1 and proof 2"


def test_broken_pages_are_faults_or_an_error(plants: Path, tmp_path: Path) -> None:
    """Bytes overwritten in the file: a fault, or one line that says that it is damaged."""
    content = bytearray(plants.read_bytes())
    for start in range(4096, len(content), 4096 * 3):
        broken = bytearray(content)
        broken[start : start + 600] = b"\xff" * 600
        path = tmp_path / f"{start}.ledger"
        path.write_bytes(broken)
        said = faults_or_error(path)
        assert said
    assert faults(Path(shutil.copy(plants, tmp_path / "again.ledger"))) == ""
