"""braidsearch ledger add: files of any kind, all or nothing, again and again."""

import json
from pathlib import Path

import pytest

from braidsearch.command_line.ledger import add
from braidsearch.ledger.ledger import Ledger
from braidsearch.search.driver import compare
from braidsearch.words import Braid, parse_word
from tests.command_line.running import Runner
from tests.ledger.ledgers import TWINS, damage, dump, make_ledger

TABLE = 'name,link,note\nrush,1 1 1,"wet, ""half"" shade"\nreed,1 2 1 2,\nsedge,-1 -1 -1,\n'
CODES = "iris = pd: [[1,5,2,4],[3,1,4,6],[5,3,6,2]]\nrush = 1 -2 1 -2\n"


@pytest.fixture
def folder(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """The folder of the test, with two good files, one bad one and one for the ledger."""
    monkeypatch.chdir(tmp_path)
    (tmp_path / "marsh.csv").write_text(TABLE, encoding="utf-8")
    (tmp_path / "pond.txt").write_text(CODES, encoding="utf-8")
    (tmp_path / "bad.csv").write_text("name,link\nok,1 1\nhalf,1 x\ntwice,1 0\n", encoding="utf-8")
    return tmp_path


def titles(path: str) -> list[str]:
    """The entries of a ledger."""
    with Ledger(path) as ledger:
        return [entry.title for entry in ledger.store.entries()]


def test_a_ledger_is_made_and_grows(run: Runner, folder: Path) -> None:
    """The first add says that the ledger is new; the second finds all entries there already."""
    first = run("ledger", "add", "a.ledger", "marsh.csv", "pond.txt")
    assert first == (
        0,
        "new ledger: a.ledger\n5 new, 0 there already\nnext: braidsearch ledger sort a.ledger\n",
        "",
    )
    again = run("ledger", "add", "a.ledger", "marsh.csv", "pond.txt")
    assert again == (0, "0 new, 5 there already\n", "")
    assert titles("a.ledger") == [
        "marsh.csv/rush",
        "marsh.csv/reed",
        "marsh.csv/sedge",
        "pond.txt/iris",
        "pond.txt/rush",
    ]
    with Ledger("a.ledger") as ledger:
        assert ledger.entry("marsh.csv/rush").note == 'wet, "half" shade'
        assert ledger.entry("iris").given.startswith("pd: ")


def test_a_file_that_is_entered_under_another_source_is_noticed(run: Runner, folder: Path) -> None:
    """Nothing is refused: two sources may list one link under one name; but it is said."""
    run("ledger", "add", "a.ledger", "marsh.csv", "pond.txt")
    again = run("ledger", "add", "a.ledger", "marsh.csv", "--source", "copy")
    assert again.status == 0
    assert (
        "3 new, 0 there already\n3 of the new ones: same name, same word in anoth" in again.output
    )
    assert run("ledger", "add", "a.ledger", "marsh.csv", "--source", "copy").output == (
        "0 new, 3 there already\n"
    )


def test_json_counts_what_was_done(run: Runner, folder: Path) -> None:
    """One object with the same keys, whether anything was entered or not."""
    good = run("ledger", "add", "a.ledger", "marsh.csv", "--json").json
    bad = run("ledger", "add", "a.ledger", "bad.csv", "--json").json
    assert list(good) == list(bad)
    assert list(good) == [
        *("added", "known", "doubled", "repeated", "mistakes", "problems", "recorded")
    ]
    assert (good["added"], bad["added"], bad["mistakes"]) == (3, 0, 2)


def test_mistakes_are_all_listed_and_nothing_is_entered(run: Runner, folder: Path) -> None:
    """Every mistake of every file has its line; not even the ledger is made."""
    outcome = run("ledger", "add", "a.ledger", "bad.csv", "marsh.csv", "missing.csv")
    lines = outcome.errors.splitlines()
    assert (outcome.status, outcome.output) == (2, "")
    assert lines[0].startswith("bad.csv, line 3: 'x': expected integers")
    assert lines[1].startswith("bad.csv, line 4: '0': expected")
    assert lines[2].startswith("missing.csv: No such file")
    assert lines[3].startswith("braidsearch ledger add: 3 mistakes: nothing was entered")
    assert "--keep-good enters the other 4 links" in lines[3]
    assert not Path("a.ledger").exists()


def test_good_rows_may_be_kept(run: Runner, folder: Path) -> None:
    """With --keep-good the others are listed and left out, and exit status 1 says so."""
    outcome = run("ledger", "add", "a.ledger", "bad.csv", "marsh.csv", "--keep-good")
    assert outcome.status == 1
    assert "4 new" in outcome.output
    assert outcome.errors.splitlines()[-1] == "braidsearch ledger add: 2 mistakes left out"
    assert len(titles("a.ledger")) == 4


def test_names_of_other_links_are_mistakes(run: Runner, folder: Path) -> None:
    """A name of the same source that another link has: in the ledger, or in another file."""
    run("ledger", "add", "a.ledger", "marsh.csv", "--source", "list")
    (folder / "more.csv").write_text("name,link\nfern,1 1\nrush,1 1 1 1\n")
    (folder / "rest.csv").write_text("name,link\nfern,1 1 1 1 1\n")
    before = dump(folder / "a.ledger")
    outcome = run("ledger", "add", "a.ledger", "more.csv", "rest.csv", "--source", "list")
    lines = outcome.errors.splitlines()
    assert outcome.status == 2
    assert lines[0].startswith("more.csv, line 3: 'rush': in the ledger another link has this name")
    assert lines[1].startswith("rest.csv, line 2: 'fern': another link has this name: more.csv, li")
    assert dump(folder / "a.ledger") == before
    kept = run("ledger", "add", "a.ledger", "more.csv", "rest.csv", "--source", "list", "--keep-g")
    assert kept.status == 2
    kept = run(
        "ledger", "add", "a.ledger", "more.csv", "rest.csv", "--source", "list", "--keep-good"
    )
    assert kept.status == 1
    assert titles("a.ledger")[-1] == "list/fern"


def test_options_of_reading(run: Runner, folder: Path) -> None:
    """Source, notation and columns that are none are passed on."""
    (folder / "codes").write_text("4 6 2\n")
    assert (
        run("ledger", "add", "a.ledger", "codes", "--notation", "dt", "--source", "Ä B").status == 0
    )
    assert titles("a.ledger") == ["Ä B/codes"]
    (folder / "wide.csv").write_text("name,link,colour\nfern,1 1,green\n")
    assert "--ignore-columns" in run("ledger", "add", "a.ledger", "wide.csv").errors
    assert run("ledger", "add", "a.ledger", "wide.csv", "--ignore-columns").status == 0
    assert (
        "notation 'runes': expected"
        in run("ledger", "add", "a.ledger", "codes", "--notation", "runes").errors
    )


def test_rows_that_say_the_same_twice(run: Runner, folder: Path) -> None:
    """A row repeated to the letter is counted, and entered once."""
    (folder / "twice.csv").write_text("name,link\nfern,1 1\nfern,1 1\n")
    assert run("ledger", "add", "a.ledger", "twice.csv").output.splitlines()[1:3] == [
        "1 new, 0 there already",
        "1 row repeated in the files",
    ]


def test_many_drawings_are_woven_in_order(
    run: Runner, folder: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    """Chunks of rows, in other processes too, come out in the order of the file."""
    monkeypatch.setattr(add, "_CHUNK", 3)
    monkeypatch.setattr(add, "_AHEAD", 2)
    monkeypatch.setattr(add, "_MANY_DRAWINGS", 5)
    rows = [f"fern-{n} = dt: 4 6 2" if n % 2 else f"fern-{n} = 1 {'1 ' * n}" for n in range(20)]
    (folder / "rows.txt").write_text("\n".join(rows))
    for name, options in (("a.ledger", []), ("b.ledger", ["--processes", "2"])):
        assert run("ledger", "add", name, "rows.txt", *options).status == 0
        assert titles(name) == [f"rows.txt/fern-{n}" for n in range(20)]
    assert dump(folder / "a.ledger") == dump(folder / "b.ledger")


def test_a_certificate_is_kept_as_evidence(run: Runner, folder: Path) -> None:
    """It joins classes, once; without its links in the ledger it is refused."""
    make_ledger(folder / "a.ledger", TWINS, nodes=0)
    left, right = (parse_word(word) for _, _, word in TWINS)
    proof = compare(left, right).certificate
    assert proof is not None
    proof.save("proof.json")
    outcome = run("ledger", "add", "a.ledger", "proof.json")
    assert outcome == (0, "proof.json: it joins two classes\n", "")
    again = run("ledger", "add", "a.ledger", "proof.json", "marsh.csv")
    assert "proof.json: it is there already" in again.output
    assert "3 new" in again.output
    assert "proof.json: a certificate" in run.fail("ledger", "add", "b.ledger", "proof.json")
    run("ledger", "add", "c.ledger", "marsh.csv")
    before = dump(folder / "c.ledger")
    line = run.fail("ledger", "add", "c.ledger", "pond.txt", "proof.json")
    assert "proof.json: 4: 1 2 1 1 1 2: expected the braid of an entry that is sorted" in line
    assert dump(folder / "c.ledger") == before


def test_a_damaged_certificate_is_refused(run: Runner, folder: Path) -> None:
    """One that does not hold, and one that cannot be read: a line each, and nothing is entered."""
    make_ledger(folder / "a.ledger")
    proof = compare(Braid([1, 1, 1]), Braid([1, 2, 1, 2])).certificate
    assert proof is not None
    proof.save("proof.json")
    value = json.loads(Path("proof.json").read_text())
    value["moves"][-1]["word"] = [1, 2, 1, 2, 1, -1]
    Path("false.json").write_text(json.dumps(value))
    Path("half.json").write_text(Path("proof.json").read_text()[:-20])
    before = dump(folder / "a.ledger")
    assert "the certificate does not hold" in run.fail("ledger", "add", "a.ledger", "false.json")
    outcome = run("ledger", "add", "a.ledger", "half.json", "marsh.csv")
    assert outcome.status == 2
    assert "nothing was entered" in outcome.errors
    assert dump(folder / "a.ledger") == before


def test_a_certificate_that_contradicts_is_loud(run: Runner, folder: Path) -> None:
    """Both proofs are kept, exit status 1, and the word is in capitals."""
    make_ledger(folder / "a.ledger")
    proof = compare(Braid([1, 1, 1]), Braid([-1, -1, -1])).certificate
    assert proof is not None
    proof.save("proof.json")
    damage(folder / "a.ledger", "UPDATE forms SET class = 1 WHERE class = 2")
    damage(
        folder / "a.ledger", "INSERT INTO evidence SELECT 1000, 1, 3, 'identity', 'same', '', ''"
    )
    outcome = run("ledger", "add", "a.ledger", "proof.json")
    assert outcome.status == 1
    assert "it contradicts proofs that the ledger has" in outcome.output
    assert "CONTRADICTION" in outcome.errors


def test_an_export_is_added_without_options(run: Runner, folder: Path) -> None:
    """The columns of an export are known to be ours."""
    run("ledger", "add", "a.ledger", "marsh.csv", "pond.txt")
    run("ledger", "sort", "a.ledger")
    for name in ("all.csv", "all.jsonl"):
        option = "--csv" if name.endswith("csv") else "--json-lines"
        assert run("ledger", "export", "a.ledger", option, name).status == 0
        assert run("ledger", "add", f"{name}.ledger", name).status == 0
        assert titles(f"{name}.ledger") == titles("a.ledger")
