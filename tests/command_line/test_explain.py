"""braidsearch explain: what it prints, what it writes, and what it refuses."""

import io
import json
import sys
from pathlib import Path

import pytest

from braidsearch.certificates import read_certificate
from braidsearch.moves import elementary_relations
from tests.command_line.running import Runner
from tests.explaining.latex_checking import check_latex
from tests.verifier.cases import expected, path_of

EXCHANGE = str(path_of("accepted", "same-exchange-written-out"))
JONES = str(path_of("accepted", "different-jones"))


def test_a_proof_is_explained(run: Runner) -> None:
    """The claim comes first, then the steps, then the theorems; the status is 0."""
    outcome = run("explain", EXCHANGE)
    lines = outcome.output.splitlines()
    assert (outcome.status, outcome.errors) == (0, "")
    assert lines[0] == "claim: the closure of LEFT is the closure of RIGHT"
    assert lines[4] == "proof: 7 steps lead from LEFT to RIGHT"
    assert "  2. stabilization: the letter 4 behind the word on 4 strands adds one strand" in lines
    assert lines[-1].strip().startswith("Birman 1974: J. S. Birman, Braids")
    assert max(map(len, lines)) <= 100
    assert run("explain", EXCHANGE, "--steps", "moves") == outcome


def test_a_difference_is_seen(run: Runner) -> None:
    """Both polynomials stand one under the other with marks below."""
    lines = run("explain", JONES).output.splitlines()
    assert lines[6:9] == [
        "    LEFT:       .      .      . + t + t^3 - t^4",
        "    RIGHT: - t^-4 + t^-3 + t^-1   .     .     .",
        "           ^^^^^^ ^^^^^^ ^^^^^^ ^^^ ^^^^^ ^^^^^",
    ]


def test_elementary_steps_are_written_as_a_certificate(run: Runner, tmp_path: Path) -> None:
    """The file holds one move for each step shown, and is accepted for the same two words."""
    path = tmp_path / "elementary.json"
    outcome = run("explain", EXCHANGE, "--steps", "elementary", "--json", "-o", str(path))
    written, given = read_certificate(path), read_certificate(EXCHANGE)
    assert outcome.status == 0
    assert (written.left, written.right, written.symmetry) == (
        given.left,
        given.right,
        given.symmetry,
    )
    assert len(outcome.json["steps"]) == len(written.moves) > len(given.moves)
    for step, move in zip(outcome.json["steps"], written.moves, strict=True):
        assert step["after"]["word"] == list(move.word)
        assert 1 <= step["move"] <= len(given.moves)
    assert run("verify", str(path)).status == 0


def test_the_certificate_may_take_standard_output(run: Runner) -> None:
    """Then the explanation goes to standard error, as compare does it."""
    outcome = run("explain", EXCHANGE, "--steps", "elementary", "-o", "-")
    assert json.loads(outcome.output)["verdict"] == "same"
    assert outcome.errors.startswith("claim: ")


def test_latex_is_a_fragment(run: Runner) -> None:
    """It begins with the claim, and a plain article can hold it."""
    for file in (EXCHANGE, JONES):
        outcome = run("explain", file, "--format", "latex")
        check_latex(outcome.output)
        assert outcome.output.startswith(r"\begin{trivlist}")


def test_json_is_one_object(run: Runner) -> None:
    """Claim, steps and values are there under their names, for both verdicts."""
    same, different = run("explain", EXCHANGE, "--json").json, run("explain", JONES, "--json").json
    assert list(same) == list(different)
    assert [step["number"] for step in same["steps"]] == [1, 2, 3, 4, 5, 6, 7]
    assert different["steps"] == []
    (distinction,) = different["distinctions"]
    assert [entry["label"] for entry in distinction["entries"]] == [
        *("t^-4", "t^-3", "t^-1", "t", "t^3", "t^4")
    ]
    assert all(entry["differs"] for entry in distinction["entries"])


@pytest.mark.parametrize("name", [*expected("rejected")])
def test_nothing_false_is_explained(run: Runner, name: str) -> None:
    """What the verifier rejects ends with status 1 and one line, whatever is asked."""
    file = str(path_of("rejected", name))
    for options in ([], ["--steps", "elementary"], ["--format", "latex"]):
        outcome = run("explain", file, *options)
        assert (outcome.status, outcome.output) == (1, "")
        assert "rejected: " in outcome.errors
        assert outcome.errors.count("\n") == 1
    outcome = run("explain", file, "--json")
    assert outcome.status == 1
    assert outcome.json["valid"] is False


@pytest.mark.parametrize("name", [*expected("malformed")])
def test_what_is_no_certificate_is_unreadable(run: Runner, name: str) -> None:
    """One line on standard error and status 2, for every file that is unreadable."""
    assert run.fail("explain", str(path_of("malformed", name))).startswith("braidsearch explain: ")


@pytest.mark.parametrize(
    ("arguments", "message"),
    [
        (["no/such/file.json"], "no/such/file.json: No such file or directory"),
        ([EXCHANGE, "--steps", "tiny"], "--steps: 'tiny': expected moves or elementary"),
        ([EXCHANGE, "--format", "pdf"], "--format: 'pdf': expected text or latex"),
        ([EXCHANGE, "-o", "x.json"], "-o x.json: expected --steps elementary with it"),
        ([EXCHANGE, "--format", "latex", "--json"], "--format latex with --json"),
        (
            [EXCHANGE, "--steps", "elementary", "--json", "-o", "-"],
            "-o -: expected a file, since --json prints the explanation there",
        ),
        (
            [EXCHANGE, "--steps", "elementary", "-o", "no/such/folder/x.json"],
            "'no/such/folder/x.json' cannot be written",
        ),
        ([], "expected"),
    ],
)
def test_mistakes_are_one_line(run: Runner, arguments: list[str], message: str) -> None:
    """The offending text and what was expected."""
    assert message in run.fail("explain", *arguments) or not arguments


def test_too_many_elementary_steps_are_refused(
    run: Runner, monkeypatch: pytest.MonkeyPatch
) -> None:
    """What no certificate can hold ends with one line; the moves are explained all the same."""
    monkeypatch.setattr(elementary_relations, "MAX_RELATIONS", 30)
    message = run.fail("explain", EXCHANGE, "--steps", "elementary")
    assert "more than 30 elementary steps" in message
    assert run("explain", EXCHANGE).status == 0


def test_standard_input_is_read(run: Runner, monkeypatch: pytest.MonkeyPatch) -> None:
    """A lone minus sign takes the certificate from there."""
    data = Path(JONES).read_bytes()
    monkeypatch.setattr(sys, "stdin", io.TextIOWrapper(io.BytesIO(data)))
    assert run("explain", "-").output == run("explain", JONES).output


def test_standard_input_is_named(run: Runner, monkeypatch: pytest.MonkeyPatch) -> None:
    """What is wrong with it is said of standard input, not of a minus sign."""
    monkeypatch.setattr(sys, "stdin", io.TextIOWrapper(io.BytesIO(b"{")))
    assert run.fail("explain", "-").startswith("braidsearch explain: standard input: certificate: ")
    monkeypatch.setattr(sys, "stdin", None)
    assert run.fail("explain", "-").endswith("standard input: it is closed: expected a certificate")


def test_lines_follow_the_width_of_a_terminal(run: Runner, monkeypatch: pytest.MonkeyPatch) -> None:
    """On a terminal of 60 columns no line is longer, and no letter is cut."""
    monkeypatch.setattr(type(sys.stdout), "isatty", lambda _: True, raising=False)
    monkeypatch.setenv("COLUMNS", "60")
    lines = run("explain", EXCHANGE).output.splitlines()
    assert max(map(len, lines)) <= 60
    assert any(len(line) > 50 for line in lines)
