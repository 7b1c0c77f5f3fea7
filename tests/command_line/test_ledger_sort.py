"""braidsearch ledger sort and check: what was done, what is open, what is wrong."""

from collections.abc import Sequence
from pathlib import Path
from typing import Any

import pytest

from braidsearch.command_line.ledger import progress
from braidsearch.ledger.ledger import Ledger
from tests.command_line.running import Runner
from tests.ledger.ledgers import LINKS, TWINS, damage, dump, entries_of, make_ledger, partition

UP_TO_ANY = ("--up-to", "any", "--processes", "1")


@pytest.fixture
def unsorted(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """A ledger with entries that are not sorted."""
    monkeypatch.chdir(tmp_path)
    with Ledger("a.ledger", create=True) as ledger:
        ledger.add(entries_of(LINKS))
    return tmp_path / "a.ledger"


def test_the_summary_says_what_was_done(run: Runner, unsorted: Path) -> None:
    """Counts of what is in the ledger, and what to do next; a second run finds nothing to do."""
    outcome = run("ledger", "sort", "a.ledger")
    lines = outcome.output.splitlines()
    assert (outcome.status, outcome.errors) == (0, "")
    assert lines[0].startswith("sorted: 8 braids in ")
    assert lines[1:] == [
        "entries: 8",
        "classes: 5 oriented links",
        "open questions: none",
        "contradictions: none",
        "next: braidsearch ledger report a.ledger",
    ]
    before = dump(unsorted)
    assert run("ledger", "sort", "a.ledger").output.startswith("sorted: 0 braids in ")
    assert dump(unsorted) == before


def test_groups_are_counted_where_they_were_asked_for(run: Runner, unsorted: Path) -> None:
    """--up-to makes the sorting look for images; then the groups are counted too."""
    outcome = run("ledger", "sort", "a.ledger", "--up-to", "mirror,reverse", "--processes", "1")
    assert "groups: 4 up to mirror images and reverses" in outcome.output
    assert "groups: 4" in run("ledger", "sort", "a.ledger", *UP_TO_ANY).output


def test_json_has_all_counts(run: Runner, unsorted: Path) -> None:
    """One object; groups are null where nobody looked for them."""
    found = run("ledger", "sort", "a.ledger", "--json").json
    assert list(found) == [
        "placed",
        "retried",
        "settled",
        "seconds",
        "entries",
        "classes",
        "groups",
        "open_questions",
        "contradictions",
    ]
    assert (found["placed"], found["classes"], found["groups"]) == (8, 5, None)
    assert run("ledger", "sort", "a.ledger", *UP_TO_ANY, "--json").json["groups"] == 4


def test_open_questions_are_status_three(run: Runner, tmp_path: Path) -> None:
    """What the limits leave open is counted, and the command that goes on settles it."""
    path = tmp_path / "it's open.ledger"
    with Ledger(path, create=True) as ledger:
        ledger.add(entries_of(TWINS))
    outcome = run("ledger", "sort", str(path), "--nodes", "0")
    assert outcome.status == 3
    assert "open questions: 1" in outcome.output
    (line,) = [line for line in outcome.output.splitlines() if line.startswith("to go on: ")]
    assert "'\"'\"'s open.ledger'" in line  # as a shell takes it
    assert line.endswith("--nodes 1000")
    again = run("ledger", "sort", str(path), "--nodes", "500")
    assert again.status == 0
    assert "tried again: 1 question, 1 settled" in again.output
    assert partition(path) == (("marsh/reed", "marsh/rush"),)


def test_contradictions_are_status_one(run: Runner, tmp_path: Path) -> None:
    """A ledger with a contradiction is never sorted in silence."""
    path = make_ledger(tmp_path / "a.ledger")
    damage(path, "INSERT INTO contradictions VALUES (1, 1, 2, 1, 2)")
    outcome = run("ledger", "sort", str(path))
    assert outcome.status == 1
    assert "1 CONTRADICTION" in outcome.errors
    assert "contradictions: 1" in outcome.output


def test_an_interrupt_keeps_what_was_sorted(
    run: Runner, unsorted: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    """Ctrl-C: status 130, one line that says how much is kept; the next run goes on."""

    original = Ledger.sort

    def interrupted(ledger: Ledger, **options: Any) -> None:
        original(ledger, **options)
        ledger.add(entries_of(TWINS))
        raise KeyboardInterrupt

    monkeypatch.setattr(Ledger, "sort", interrupted)
    outcome = run("ledger", "sort", "a.ledger")
    assert outcome == (
        130,
        "",
        "braidsearch ledger sort: interrupted: 8 of 10 braids sorted, all kept: "
        "run the command again to go on\n",
    )
    monkeypatch.setattr(Ledger, "sort", original)
    assert run("ledger", "sort", "a.ledger").output.startswith("sorted: 2 braids")


def test_lines_of_progress_come_now_and_then(
    run: Runner, unsorted: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    """Where standard error is no terminal: plain lines, and none within the first half minute."""
    assert progress.BETWEEN_LINES == 30
    monkeypatch.setattr(progress, "BETWEEN_LINES", 0.0)
    errors = run("ledger", "sort", "a.ledger").errors.splitlines()
    assert errors[0] == "braidsearch ledger sort: sorting: 0 of 8, 0 classes, 0 open"
    assert errors[-1].startswith("braidsearch ledger sort: sorting: 8 of 8, ")
    assert errors[-1].endswith(" left, 5 classes, 0 open")


def test_times_are_said_as_people_say_them() -> None:
    """Seconds, then minutes, then hours."""
    shown = [progress.show_seconds(seconds) for seconds in (0.2, 59, 120, 5_000, 20_000)]
    assert shown == ["0 s", "59 s", "2 min", "83 min", "5.6 h"]


def test_check_says_what_it_looked_at(run: Runner, tmp_path: Path) -> None:
    """Exit status 0 with counts where everything holds; entries that are not sorted are named."""
    path = make_ledger(tmp_path / "a.ledger")
    with Ledger(path) as ledger:
        proofs = ledger.store.count("evidence")
    outcome = run("ledger", "check", str(path))
    assert outcome == (
        0,
        f"valid: everything holds\nchecked: {proofs} proofs, 35 values, 5 classes\n",
        "",
    )
    with Ledger(path) as ledger:
        ledger.add(entries_of(TWINS))
    assert "not sorted yet: 2 entries" in run("ledger", "check", str(path)).output


@pytest.mark.parametrize("options", [[], ["--processes", "2"]])
def test_check_lists_every_fault(run: Runner, tmp_path: Path, options: Sequence[str]) -> None:
    """Exit status 1 and a line for each fault; with --json they are a list."""
    path = make_ledger(tmp_path / "a.ledger")
    damage(path, "UPDATE evidence SET verdict = 'different' WHERE id = 1")
    damage(path, "UPDATE fingerprints SET signature = '7' WHERE id = 1")
    outcome = run("ledger", "check", str(path), *options)
    assert outcome.status == 1
    assert outcome.output.splitlines()[0].endswith(" FAULTS")
    assert "  proof 1: it claims something else" in outcome.output.splitlines()
    assert "  class 1: its signature is another one" in outcome.output.splitlines()
    found = run("ledger", "check", str(path), "--json", *options)
    assert found.status == 1
    assert list(found.json) == ["valid", "proofs", "values", "classes", "unsorted", "faults"]
    assert found.json["valid"] is False
    assert len(found.json["faults"]) == len(outcome.output.splitlines()) - 2
