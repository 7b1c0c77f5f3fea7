"""braidsearch ledger report and export: what a ledger holds, for people and for programs."""

import csv
import io
import json
import shutil
from pathlib import Path

import pytest

from braidsearch import verify
from braidsearch.command_line.ledger import listing, showing
from braidsearch.ledger.ledger import Ledger
from tests.command_line.running import Runner
from tests.ledger.ledgers import TWINS, damage, entry, make_ledger, partition

KEYS = ["entries", "unsorted", "proofs", "classes", "groups", "open_questions", "contradictions"]


@pytest.fixture(scope="module")
def sorted_once(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """The invented ledger, sorted up to all symmetries."""
    return make_ledger(
        tmp_path_factory.mktemp("report") / "plants.ledger",
        up_to=("mirror", "reverse", "mirror-reverse"),
    )


@pytest.fixture
def ledger(sorted_once: Path, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> str:
    """The name of a copy of it, in the folder of the test."""
    monkeypatch.chdir(tmp_path)
    shutil.copy(sorted_once, "plants.ledger")
    return "plants.ledger"


def test_the_report_lists_what_was_merged(run: Runner, ledger: str) -> None:
    """Totals, the classes with several entries, how each is joined, and the groups."""
    outcome = run("ledger", "report", ledger)
    lines = outcome.output.splitlines()
    assert (outcome.status, outcome.errors) == (0, "")
    assert lines[:3] == [
        "entries: 8",
        "classes: 5 oriented links, 2 with more than one entry",
        "groups: 4 up to mirror images and reverses",
    ]
    assert "open questions: none" in lines
    assert "contradictions: none" in lines
    place = lines.index("class 1: 2 entries, word 1 1 1")
    assert lines[place + 1 : place + 3] == [
        "  thistle (bench)",
        "  burdock (bench): 2 moves to the first",
    ]
    assert "classes with one entry: 3 (--all lists them)" in lines
    place = lines.index("group of 2 classes")
    assert lines[place + 1 : place + 3] == [
        "  class 1, thistle (bench)",
        "  class 2, teasel (bench): mirror of the first, by no move",
    ]


def test_groups_are_only_so_far_where_not_all_was_asked(run: Runner, tmp_path: Path) -> None:
    """Classes that nobody has asked for images are counted, with the command that asks."""
    path = str(make_ledger(tmp_path / "plants.ledger"))
    command = f"braidsearch ledger sort {path} --up-to"
    said = f"up to mirror images and reverses, so far; 5 classes not asked for all: {command} any"
    assert f"groups: 5 {said}" in run("ledger", "report", path).output
    with Ledger(path) as ledger:
        ledger.sort(up_to=("mirror",))
    mirrored = run("ledger", "report", path, "--up-to", "mirror").output
    assert "groups: 4 up to mirror\n" in mirrored
    both = run("ledger", "report", path, "--up-to", "mirror,reverse").output
    assert f"so far; 5 classes not asked for all: {command} mirror,reverse" in both


def test_single_entries_are_listed_when_asked(run: Runner, ledger: str) -> None:
    """--all leaves nothing out."""
    output = run("ledger", "report", ledger, "--all").output
    assert "class 4: 1 entry" in output
    assert "--all" not in output
    assert 'Mädesüß "high" (field)' in output


def test_long_listings_are_cut(run: Runner, ledger: str, monkeypatch: pytest.MonkeyPatch) -> None:
    """Only so many lines, then how many more there are; --all shows them all."""
    whole = run("ledger", "report", ledger, "--all").output.splitlines()
    monkeypatch.setattr(showing, "MOST_LINES", 3)
    cut = run("ledger", "report", ledger).output.splitlines()
    assert "  ... 5 more lines (--all shows them)" in cut
    monkeypatch.setattr(listing, "MOST_ENTRIES", 2)
    lines = run("ledger", "report", ledger, "--up-to", "any").output.splitlines()
    assert lines[-1] == "  ... 1 more line (--all shows them)"
    monkeypatch.setattr(showing, "MOST_LINES", 30)
    assert "  ... 1 more (--class 3 lists them)" in run("ledger", "report", ledger).output
    assert run("ledger", "report", ledger, "--all").output.splitlines() == whole


def test_the_view_up_to_symmetry(run: Runner, ledger: str) -> None:
    """--up-to shows groups in place of classes, and only those that these symmetries make."""
    mirrored = run("ledger", "report", ledger, "--up-to", "mirror").output
    assert "groups: 4 up to mirror" in mirrored
    assert "class 1: " not in mirrored
    assert "group of 2 classes" in mirrored
    reverse = run("ledger", "report", ledger, "--up-to", "reverse").output
    assert "groups: 5 up to reverse" in reverse
    assert "classes in no group with others: 5" in reverse


@pytest.mark.parametrize("reference", ["1", "burdock", "bench/thistle", "#2"])
def test_one_class(run: Runner, ledger: str, reference: str) -> None:
    """A class by its number or by an entry, with its invariants."""
    output = run("ledger", "report", ledger, "--class", reference).output
    assert output.startswith("class 1: 2 entries, word 1 1 1\n  number of components: 1\n")
    assert "  Jones polynomial: t + t^3 - t^4" in output
    assert "  burdock (bench): 2 moves to the first" in output
    assert "class 3" not in output
    assert "group of 2 classes" in output


def test_a_class_that_there_is_not(run: Runner, ledger: str) -> None:
    """One line that names what was asked for."""
    assert "--class: 99: no such entry" in run.fail("ledger", "report", ledger, "--class", "99")
    assert "2 entries: expected one of" in run.fail(
        "ledger", "report", ledger, "--class", "thistle"
    )
    with Ledger(ledger) as opened:
        opened.add([entry("moss", "bench", "1 1 1 1")])
    assert "not sorted yet" in run.fail("ledger", "report", ledger, "--class", "moss")
    assert "not sorted yet: 1: braidsearch ledger sort" in run("ledger", "report", ledger).output


def test_json_of_the_report(run: Runner, ledger: str) -> None:
    """All classes with all entries, whatever their number."""
    found = run("ledger", "report", ledger, "--json").json
    assert list(found) == KEYS
    assert [len(one["entries"]) for one in found["classes"]] == [2, 1, 3, 1, 1]
    assert found["classes"][0]["form"] == {"strands": 2, "word": [1, 1, 1]}
    assert sorted(map(len, found["groups"])) == [1, 1, 1, 2]
    assert (found["open_questions"], found["contradictions"]) == ([], [])
    one = run("ledger", "report", ledger, "--json", "--class", "teasel").json
    assert [each["number"] for each in one["classes"]] == [2]


def test_open_questions_are_listed(run: Runner, tmp_path: Path) -> None:
    """Both entries, the limits tried, and the command that tries them again."""
    path = str(make_ledger(tmp_path / "marsh.ledger", TWINS, nodes=0))
    outcome = run("ledger", "report", path)
    assert outcome.status == 0
    assert "open questions: 1" in outcome.output
    assert "  reed (marsh) and rush (marsh): tried with 0 nodes: " in outcome.output
    assert f"to try them again: braidsearch ledger sort {path} --nodes 1000" in outcome.output
    (question,) = run("ledger", "report", path, "--json").json["open_questions"]
    assert question["tried"] == {"nodes": 0, "max_strands": None}
    assert question["symmetry"] == "identity"


def test_contradictions_come_first(run: Runner, ledger: str) -> None:
    """The first line, in capitals, with both proofs; exit status 1; also on standard error."""
    damage(Path(ledger), "INSERT INTO contradictions VALUES (1, 1, 2, 1, 2)")
    outcome = run("ledger", "report", ledger)
    assert outcome.status == 1
    assert outcome.output.startswith(
        "CONTRADICTION 1: by proof 1 thistle (bench) and teasel (bench) are one link, by proof 2 "
    )
    assert "contradictions: 1" in outcome.output
    assert outcome.errors == "braidsearch ledger report: 1 CONTRADICTION\n"
    found = run("ledger", "report", ledger, "--json")
    assert found.status == 1
    assert found.json["contradictions"][0]["same"] == 1


def test_an_empty_ledger_is_reported(run: Runner, tmp_path: Path) -> None:
    """Nothing in it, and nothing wrong with it."""
    Ledger(tmp_path / "a.ledger", create=True).close()
    outcome = run("ledger", "report", str(tmp_path / "a.ledger"))
    assert outcome.status == 0
    assert outcome.output.startswith("entries: 0\nclasses: 0 oriented links")
    assert run("ledger", "check", str(tmp_path / "a.ledger")).status == 0


# export


def test_export_to_standard_output(run: Runner, ledger: str) -> None:
    """A table or JSON lines, with the same rows."""
    table = run("ledger", "export", ledger, "--csv", "-")
    lines = run("ledger", "export", ledger, "--json-lines", "-")
    rows = list(csv.DictReader(io.StringIO(table.output)))
    objects = [json.loads(line) for line in lines.output.splitlines()]
    assert (table.status, lines.status) == (0, 0)
    assert [row["name"] for row in rows] == [one["name"] for one in objects]
    assert len(rows) == 8


def test_export_to_files(run: Runner, ledger: str) -> None:
    """What was written where is said; all proofs in the folder verify."""
    outcome = run(
        "ledger", "export", ledger, "--csv", "a b.csv", "--json-lines", "a.jsonl",
        "--certificates", "proofs",
    )  # fmt: skip
    count = len(list(Path("proofs").glob("*.json")))
    assert outcome == (
        0,
        f"'a b.csv': 8 entries\na.jsonl: 8 entries\nproofs: {count} proofs\n",
        "",
    )
    assert count > 0
    assert all(verify(file).valid for file in Path("proofs").glob("*.json"))


def test_an_export_makes_the_same_ledger(run: Runner, ledger: str) -> None:
    """Exported, added and sorted again: the same classes, by names and by numbers."""
    run("ledger", "export", ledger, "--csv", "first.csv")
    run("ledger", "add", "new.ledger", "first.csv")
    run("ledger", "sort", "new.ledger", "--up-to", "any", "--processes", "1")
    run("ledger", "export", "new.ledger", "--csv", "second.csv")
    assert partition(Path("new.ledger")) == partition(Path(ledger))
    assert Path("first.csv").read_text() == Path("second.csv").read_text()


def test_export_says_what_cannot_be(run: Runner, ledger: str) -> None:
    """Nothing to write, twice standard output, folders for files and files for folders."""
    Path("folder").mkdir()
    Path("folder/mine.txt").write_text("")
    for arguments, said in (
        ([], "nothing to write: expected --csv"),
        (["--csv", "-", "--json-lines", "-"], "--csv prints already"),
        (["--certificates", "-"], "expected the name of a folder"),
        (["--csv", "folder"], "it is a folder"),
        (["--csv", "no/such/file.csv"], "its folder does not exist"),
        (["--certificates", "folder"], "it holds other files"),
        (["--certificates", ledger], "it is a file"),
    ):
        assert said in run.fail("ledger", "export", ledger, *arguments)
