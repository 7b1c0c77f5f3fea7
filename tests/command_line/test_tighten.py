"""braidsearch tighten: the word found, the bound it is held against, and its certificate."""

from pathlib import Path

from braidsearch.certificates import read_certificate
from braidsearch.words import Braid, parse_word
from tests.command_line.running import Runner


def test_the_report_says_minimal_where_the_bound_is_met(run: Runner) -> None:
    """A stabilized trefoil comes down to two strands, which the bound shows minimal."""
    outcome = run("tighten", "1 1 1 2 -3")
    lines = outcome.output.splitlines()
    assert outcome.status == 0
    assert lines[0] == "tightened: 1 1 1"
    assert "strands: minimal, by the Morton-Franks-Williams inequality" in lines


def test_the_certificate_leads_from_the_word_to_the_result(run: Runner, tmp_path: Path) -> None:
    """The file written is accepted when it is bound to both words."""
    path = tmp_path / "tight.json"
    outcome = run("tighten", "-1 -1 -1 -2 -2 3", "--json", "-o", str(path))
    found = Braid(outcome.json["braid"]["word"], outcome.json["braid"]["strands"])
    certificate = read_certificate(path)
    assert (certificate.left, certificate.right) == (parse_word("-1 -1 -1 -2 -2 3"), found)
    assert outcome.json["minimal"] is True
    verified = run("verify", str(path), "--left", "-1 -1 -1 -2 -2 3")
    assert verified.status == 0


def test_an_exception_of_the_bound_is_not_shown_minimal(run: Runner) -> None:
    """9_42 (word from KnotInfo) needs four strands, where the polynomial allows three."""
    outcome = run("tighten", "1 1 1 -2 -1 -1 3 -2 3", "--nodes", "200")
    assert "strands: not shown minimal: at least 3" in outcome.output


def test_mistakes_are_one_line(run: Runner) -> None:
    """A letter outside the group and an unwritable place end with status 2 and one line."""
    for arguments in (["2: 5"], ["1 1 1", "-o", "no/such/folder/file.json"], []):
        outcome = run("tighten", *arguments)
        assert outcome.status == 2
        assert outcome.errors.count("\n") == 1
