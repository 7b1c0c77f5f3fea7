"""braidsearch ledger find and proof: which class, by what proof, and what it differs from."""

import json
import shutil
from pathlib import Path

import pytest

from braidsearch import verify
from braidsearch.ledger.ledger import Ledger
from braidsearch.words import Braid
from tests.command_line.running import Runner
from tests.ledger.ledgers import MUTANTS, TWINS, dump, entries_of, entry, make_ledger

KEYS = ["outcome", "class", "entries", "classes", "unsorted", "remaining", "compared"]


@pytest.fixture(scope="module")
def sorted_once(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """The invented ledger, sorted up to mirror images."""
    return make_ledger(tmp_path_factory.mktemp("answers") / "plants.ledger", up_to=("mirror",))


@pytest.fixture
def ledger(sorted_once: Path, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> str:
    """The name of a copy of it, in the folder of the test."""
    monkeypatch.chdir(tmp_path)
    shutil.copy(sorted_once, "plants.ledger")
    return "plants.ledger"


@pytest.fixture(scope="module")
def marsh(tmp_path_factory: pytest.TempPathFactory) -> str:
    """A ledger of one link, whose other braid no canonical form joins to it."""
    return str(make_ledger(tmp_path_factory.mktemp("marsh") / "marsh.ledger", TWINS[1:]))


def test_a_link_of_a_class(run: Runner, ledger: str) -> None:
    """The class, its entries, the proof that leads to the first of them; nothing is entered."""
    before = dump(Path(ledger))
    outcome = run("ledger", "find", ledger, "3: 1 2 1 2", "-o", "proof.json")
    lines = outcome.output.splitlines()
    assert (outcome.status, outcome.errors) == (0, "")
    assert lines[0] == "same link: class 1, of 2 entries"
    assert lines[1] == "entries: thistle (bench), burdock (bench)"
    assert "proof: LEFT is LINK, RIGHT is thistle (bench)" in lines
    assert lines[-2:] == ["certificate: proof.json", "check it: braidsearch verify proof.json"]
    assert verify("proof.json", left=Braid([1, 2, 1, 2]), right=Braid([1, 1, 1])).valid
    assert dump(Path(ledger)) == before


@pytest.mark.parametrize(
    ("word", "name"),
    [
        ("1 1 -2 1 -2 -2", "none"),
        ("-1 -2 -1 -2", "teasel"),
        ("4: -2 1 -2 1 3", "yarrow"),
        ("2 2 2 1 1 1", "dock"),
        ("pd: [[1,5,2,4],[3,1,4,6],[5,3,6,2]]", "thistle"),
    ],
)
def test_every_answer_has_its_certificate(run: Runner, ledger: str, word: str, name: str) -> None:
    """Whatever the answer, its certificate verifies and is about the link and that entry."""
    outcome = run("ledger", "find", ledger, word, "--json")
    found = outcome.json
    assert list(found) == KEYS
    assert outcome.status == {"same": 0, "different": 1}[found["outcome"]]
    assert (found["outcome"] == "different") == (name == "none")
    for one in found["compared"]:
        braid = one["entry"]["braid"]
        right = Braid(braid["word"], braid["strands"])
        Path("proof.json").write_text(json.dumps(one["certificate"]))
        assert verify("proof.json", right=right).valid
    if name != "none":
        assert name in [one["name"] for one in found["entries"]]
        assert found["compared"][0]["class"] == found["class"]


def test_a_new_link_is_told_from_all(run: Runner, ledger: str) -> None:
    """How many classes agree, invariant by invariant, and how the nearest differ."""
    outcome = run("ledger", "find", ledger, "1 1 1 1 1", "-o", "proof.json")
    lines = outcome.output.splitlines()
    assert outcome.status == 1
    assert lines[0] == "new link: different from all 5 classes of the ledger"
    assert lines[1:6] == [
        "classes that agree, of 5:",
        "  in the number of components: 4",
        "  and in the linking numbers: 4",
        "  and in the sums of linking numbers: 4",
        "  and in the Alexander polynomial: none",
    ]
    place = lines.index("not class 1, thistle (bench), by the Alexander polynomial:")
    assert lines[place + 1 : place + 3] == [
        "  LINK:  1 - t + t^2 - t^3 + t^4",
        "  class: 1 - t + t^2",
    ]
    assert verify("proof.json", left=Braid([1] * 5), right=Braid([1, 1, 1])).valid
    remaining = run("ledger", "find", ledger, "1 1 1 1 1", "--json").json["remaining"]
    assert remaining[0] == {"invariant": "components", "classes": 4}
    assert [one["classes"] for one in remaining] == [4, 4, 4, 0, 0, 0, 0]


def test_a_link_of_no_component_count(run: Runner, ledger: str) -> None:
    """Even where not one value agrees, some class is named from which it differs."""
    found = run("ledger", "find", ledger, "5:", "--json").json
    assert found["remaining"][0]["classes"] == 0
    assert found["compared"][0]["outcome"] == "different"


def test_the_certificate_can_be_printed(run: Runner, ledger: str) -> None:
    """-o - gives standard output to the certificate and standard error to the report."""
    outcome = run("ledger", "find", ledger, "1 1 1", "-o", "-")
    assert outcome.json["verdict"] == "same"
    assert outcome.errors.startswith("same link: class 1")


def test_entries_that_are_not_sorted_are_warned_of(run: Runner, ledger: str) -> None:
    """They were not asked, which standard error says, with what to do."""
    with Ledger(ledger) as opened:
        opened.add([entry("moss", "bench", "1 1 1 1 1")])
    outcome = run("ledger", "find", ledger, "1 1 1 1 1")
    assert outcome.status == 1
    assert outcome.output.startswith("new link: different from all 5 classes sorted so far")
    assert outcome.errors == (
        "braidsearch ledger find: warning: 1 entry is not sorted yet and not asked: "
        "braidsearch ledger sort plants.ledger\n"
    )
    assert run("ledger", "find", ledger, "1 1 1", "--json").json["unsorted"] == 1


def test_a_ledger_with_nothing_to_ask(run: Runner, tmp_path: Path) -> None:
    """Without entries, or with nothing sorted, there is no answer."""
    path = tmp_path / "a.ledger"
    Ledger(path, create=True).close()
    assert "no entries" in run.fail("ledger", "find", str(path), "1 1 1")
    with Ledger(path) as opened:
        opened.add(entries_of(TWINS))
    assert "nothing in it is sorted" in run.fail("ledger", "find", str(path), "1 1 1")


def test_undecided_says_how_to_go_on(run: Runner, marsh: str, tmp_path: Path) -> None:
    """Exit status 3, the class that it may be, and commands that try more."""
    proof = tmp_path / "proof.json"
    outcome = run("ledger", "find", marsh, TWINS[0][2], "--nodes", "0", "-o", str(proof))
    assert outcome.status == 3
    assert outcome.output.startswith("undecided: neither sameness with a class nor difference")
    assert "class 1, reed (marsh): " in outcome.output
    assert f"braidsearch ledger find {marsh} '4: 1 2 1 1 1 2' --nodes 1000" in outcome.output
    assert "braidsearch compare '4: 1 2 1 1 1 2' '3: 1 1 1 1 1'" in outcome.output
    assert "certificate: none" in outcome.output
    assert not proof.exists()
    found = run("ledger", "find", marsh, TWINS[0][2], "--nodes", "0", "--json").json
    assert (found["outcome"], found["class"]) == ("undecided", None)
    assert found["compared"][0]["certificate"] is None
    assert run("ledger", "find", marsh, TWINS[0][2], "--nodes", "500").status == 0


def test_a_link_of_equal_values_is_told_apart(run: Runner, tmp_path: Path) -> None:
    """A mutant has every value of its class, and differs by a dearer invariant, which is shown."""
    path = make_ledger(tmp_path / "wood.ledger", MUTANTS[:1])
    outcome = run("ledger", "find", str(path), MUTANTS[1][2])
    assert outcome.status == 1
    lines = outcome.output.splitlines()
    assert lines[8] == "  and in the signature: 1"
    assert lines[9].startswith("not class 1, ash (wood), by the ")


def test_proof_of_sameness(run: Runner, ledger: str) -> None:
    """The moves from one entry to the other, as compare shows them, and the file that verifies."""
    outcome = run("ledger", "proof", ledger, "bench/thistle", "burdock", "-o", "proof.json")
    lines = outcome.output.splitlines()
    assert outcome.status == 0
    assert lines[:2] == [
        "same link: LEFT and RIGHT close to the same oriented link",
        "LEFT is thistle (bench), RIGHT is burdock (bench)",
    ]
    assert "  which is RIGHT, letter by letter" in lines
    assert verify("proof.json", left=Braid([1, 1, 1]), right=Braid([1, 2, 1, 2])).valid


def test_proof_of_difference_and_up_to_symmetry(run: Runner, ledger: str) -> None:
    """Trefoils of both hands differ, and are mirror images; the statuses are those of compare."""
    apart = run("ledger", "proof", ledger, "bench/thistle", "teasel")
    assert apart.status == 1
    assert apart.output.startswith("different links: ")
    mirrored = run("ledger", "proof", ledger, "bench/thistle", "teasel", "--up-to", "any")
    assert mirrored.status == 0
    assert "is the mirror image of the closure of RIGHT" in mirrored.output


def test_json_of_proof(run: Runner, ledger: str) -> None:
    """The keys are those of compare; what was tried stands in place of what was explored."""
    found = run("ledger", "proof", ledger, "bench/thistle", "teasel", "--json").json
    assert list(found) == ["outcome", "symmetry", "reason", "certificate", "tried"]
    assert (found["outcome"], found["symmetry"], found["tried"]) == ("different", None, None)
    assert found["reason"] == "jones"
    assert found["certificate"]["verdict"] == "different"


def test_an_open_question_is_no_proof(run: Runner, tmp_path: Path) -> None:
    """Undecided entries: exit status 3, the limits tried, and the command that tries more."""
    path = str(make_ledger(tmp_path / "marsh.ledger", TWINS, nodes=0))
    outcome = run("ledger", "proof", path, "rush", "reed", "-o", str(tmp_path / "proof.json"))
    assert outcome.status == 3
    assert outcome.output.startswith("undecided: the ledger holds no proof")
    assert "tried with 0 nodes: " in outcome.output
    assert f"to go on: braidsearch ledger sort {path} --nodes 1000" in outcome.output
    found = run("ledger", "proof", path, "rush", "reed", "--json").json
    assert found["tried"] == {"nodes": 0, "max_strands": None}
    image = run("ledger", "proof", path, "rush", "#1", "--up-to", "any")
    assert image.status == 0
