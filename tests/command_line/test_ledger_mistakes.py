"""Mistakes about a ledger: one line each, exit status 2, and nothing is changed."""

import shutil
import sqlite3
import subprocess
from collections.abc import Sequence
from pathlib import Path

import pytest

from braidsearch.command_line.ledger import ACTIONS
from tests.command_line.running import Runner, command, environment
from tests.ledger.ledgers import damage, dump, make_ledger


@pytest.fixture(scope="module")
def sorted_once(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """The invented ledger."""
    return make_ledger(tmp_path_factory.mktemp("mistakes") / "plants.ledger")


@pytest.fixture(autouse=True)
def folder(sorted_once: Path, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """A folder with a ledger, a text, a database of another kind, an empty file and a newer one."""
    monkeypatch.chdir(tmp_path)
    shutil.copy(sorted_once, "a.ledger")
    shutil.copy(sorted_once, "newer.ledger")
    damage(Path("newer.ledger"), "INSERT INTO braids VALUES (1000, 3, '2 2')")
    connection = sqlite3.connect("newer.ledger")
    connection.execute("PRAGMA user_version = 99")
    connection.close()
    Path("text.csv").write_text("name,link\nfern,1 1\n")
    Path("empty").write_text("")
    connection = sqlite3.connect("other.sqlite")
    connection.execute("CREATE TABLE t (x)")
    connection.close()
    return tmp_path


def test_help_of_every_action(run: Runner) -> None:
    """Each action explains itself with examples that begin with it, and is listed."""
    listed = run("ledger", "--help").output
    for action in ACTIONS:
        outcome = run("ledger", action, "--help")
        examples = outcome.output.split("examples:\n")[1].split("\n\n")[0].splitlines()
        assert outcome.status == 0
        assert len(examples) >= 2
        assert all(line.startswith(f"  braidsearch ledger {action} ") for line in examples)
        assert f"\n  {action} " in listed
        assert f"braidsearch ledger {action} " in listed


def test_no_action_is_the_help_as_an_error(run: Runner) -> None:
    """Without an action there is nothing to do: exit status 2."""
    outcome = run("ledger")
    assert (outcome.status, outcome.output) == (2, "")
    assert "actions:" in outcome.errors


@pytest.mark.parametrize(
    ("arguments", "said"),
    [
        (["sorted", "a.ledger"], "'sorted': expected an action, one of add, sort, find"),
        (["sorted", "a.ledger"], "did you mean sort?"),
        (["a.ledger"], "'a.ledger': expected an action"),
        (["sort"], "required: LEDGER"),
        (["add", "a.ledger"], "required: FILE"),
        (["find", "a.ledger"], "required: LINK"),
        (["proof", "a.ledger", "teasel"], "required: B"),
        (["sort", "a.ledger", "--colour"], "--colour: expected only the options"),
        (["sort", "a.ledger", "--nodes", "many"], "'many': expected a count"),
        (["sort", "a.ledger", "--nodes", "-1"], "nodes -1: expected an integer from 0"),
        (["sort", "a.ledger", "--nodes", "none"], "expected a count, so that every question ends"),
        (["sort", "a.ledger", "--max-strands", "0"], "max_strands 0: expected"),
        (["sort", "a.ledger", "--up-to", "sideways"], "--up-to: 'sideways': expected any, or"),
        (["sort", "a.ledger", "--processes", "0"], "--processes: 0: expected a count from 1"),
        (["sort", "a.ledger", "--processes", "x"], "'x': expected a count"),
        (
            ["check", "a.ledger", "--processes", "2", "--scheduler", "tcp://x:1"],
            "--processes: expected no --scheduler beside it",
        ),
        (["sort", "missing.ledger"], "missing.ledger: no such ledger: expected one made by ledger"),
        (["find", "missing.ledger", "1 1"], "missing.ledger: no such ledger"),
        (["report", "text.csv"], "text.csv: no ledger"),
        (["check", "other.sqlite"], "other.sqlite: an SQLite file, but no ledger"),
        (["sort", "empty"], "empty: an SQLite file, but no ledger"),
        (["sort", "newer.ledger"], "newer.ledger: a ledger of version 99"),
        (["sort", "."], ".: it is a folder: expected a ledger"),
        (["add", "text.csv", "text.csv"], "text.csv: no ledger"),
        (["add", "newer.ledger", "text.csv"], "made by a newer braidsearch"),
        (["add", "no/such/a.ledger", "text.csv"], "its folder does not exist"),
        (["add", ".", "text.csv"], "it is a folder"),
        (["find", "a.ledger", "1 x"], "LINK: 'x': expected integers"),
        (["find", "a.ledger", "gauss: O1+"], "LINK: "),
        (["find", "a.ledger", "1 1", "-o", "-", "--json"], "-o -: expected a file"),
        (["find", "a.ledger", "1 1", "-o", "no/such/proof.json"], "its folder does not exist"),
        (["find", "a.ledger", "1 1", "1 1"], "unrecognized arguments"),
        (["find", "a.ledger", "1 1", "--nodes", "-1"], "nodes -1: expected an integer"),
        (["proof", "a.ledger", "teasel", "moss"], "moss: no such entry"),
        (["proof", "a.ledger", "thistle", "teasel"], "thistle: 2 entries: expected one of"),
        (["proof", "a.ledger", "teasel", "dock", "-o", "."], "it is a folder"),
        (["report", "a.ledger", "--class", "0"], "--class: 0: no such entry"),
        (["export", "a.ledger"], "nothing to write"),
        (["export", "a.ledger", "--csv", "."], "'.' cannot be written"),
        (["sort", "a.ledger\n\x1b[31m"], "no such ledger"),
        (["sort", "\udcff.ledger"], "no such ledger"),
    ],
)
def test_mistakes_get_one_line(run: Runner, arguments: Sequence[str], said: str) -> None:
    """Each names the offending text and what was expected; the ledger stays as it was."""
    before = dump(Path("a.ledger"))
    line = run.fail("ledger", *arguments)
    action = f" {arguments[0]}" * (arguments[0] in ACTIONS)
    assert line.startswith(f"braidsearch ledger{action}: ")
    assert said in line
    assert dump(Path("a.ledger")) == before


@pytest.mark.parametrize(
    "statement",
    [
        "UPDATE braids SET word = '1 x' WHERE id = 2",
        "UPDATE evidence SET certificate = '{'",
        "DELETE FROM evidence",
        "UPDATE entries SET remarks = '['",
        "UPDATE fingerprints SET alexander = '['",
        "DELETE FROM forms",
    ],
)
def test_damage_is_said_to_be_damage(run: Runner, statement: str) -> None:
    """Whatever the action, a ledger with forged rows ends in a line or an answer, no defect."""
    damage(Path("a.ledger"), statement)
    for arguments in (
        ["sort", "a.ledger"],
        ["find", "a.ledger", "1 2 1 2"],
        ["find", "a.ledger", "1 1 1 1 1"],
        ["proof", "a.ledger", "teasel", "dock"],
        ["proof", "a.ledger", "burdock", "bench/thistle"],
        ["report", "a.ledger", "--all"],
        ["report", "a.ledger", "--class", "burdock"],
        ["export", "a.ledger", "--csv", "all.csv", "--certificates", "proofs"],
        ["check", "a.ledger"],
    ):
        outcome = run("ledger", *arguments)
        assert "internal error" not in outcome.errors, arguments
        assert outcome.status != 2 or outcome.errors.count("\n") == 1
    assert outcome.status == 1


def test_entries_of_odd_names(run: Runner) -> None:
    """Names with blanks, quotes and other letters are found as they stand."""
    outcome = run("ledger", "proof", "a.ledger", 'Mädesüß "high"', "sorrel, common")
    assert outcome.status == 1
    assert 'LEFT is Mädesüß "high" (field)' in outcome.output


def test_names_that_a_terminal_cannot_show_are_escaped() -> None:
    """In a plain ASCII locale the report comes out with escapes."""
    finished = subprocess.run(
        command("ledger", "report", "a.ledger", "--all"),
        capture_output=True,
        check=False,
        text=True,
        env={**environment(), "PYTHONIOENCODING": "ascii"},
    )
    assert (finished.returncode, finished.stderr) == (0, "")
    assert 'M\\xe4des\\xfc\\xdf "high" (field)' in finished.stdout
