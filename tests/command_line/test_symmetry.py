"""braidsearch symmetry: three answers, each with its own certificate."""

from pathlib import Path

from braidsearch import verify
from braidsearch.certificates import read_certificate
from braidsearch.words import parse_word
from tests.command_line.running import Runner

FIGURE_EIGHT, TREFOIL = "1 -2 1 -2", "1 1 1"


def test_the_first_line_names_the_type(run: Runner) -> None:
    """The figure eight knot is all its images, the trefoil its reverse alone."""
    assert run("symmetry", FIGURE_EIGHT).output.startswith("symmetry: fully amphicheiral")
    assert run("symmetry", TREFOIL).output.startswith("symmetry: chiral and invertible")


def test_each_answer_is_written_to_a_file_of_its_own(run: Runner, tmp_path: Path) -> None:
    """Three files, each about the word on both sides, and each accepted by the verifier."""
    path = tmp_path / "trefoil.json"
    outcome = run("symmetry", TREFOIL, "-o", str(path))
    assert outcome.status == 0
    word = parse_word(TREFOIL)
    for symmetry, verdict in (
        ("mirror", "different"),
        ("reverse", "same"),
        ("mirror-reverse", "different"),
    ):
        written = tmp_path / f"trefoil.{symmetry}.json"
        certificate = read_certificate(written)
        assert (certificate.left, certificate.right) == (word, word)
        assert certificate.verdict == verdict
        claimed = certificate.symmetry or certificate.distinctions[0].symmetry
        assert claimed == symmetry
        assert verify(written).valid
        assert str(written) in outcome.output


def test_json_has_a_verdict_for_each_symmetry(run: Runner) -> None:
    """The keys are the symmetries, and below each stands what compare prints."""
    found = run("symmetry", TREFOIL, "--json").json
    assert list(found) == ["mirror", "reverse", "mirror-reverse"]
    for verdict in found.values():
        assert list(verdict) == ["outcome", "symmetry", "reason", "certificate", "explored"]


def test_undecided_is_said_and_ends_with_status_three(run: Runner) -> None:
    """Without time nothing is decided, nothing is written, and the report says how to go on."""
    outcome = run("symmetry", "1 1 2 -1 -3 2 2 -3 -2 -1 3 2 2 1", "--seconds", "0", "--nodes", "0")
    assert outcome.status == 3
    assert outcome.output.startswith("symmetry: not decided in full")
    assert "undecided (which is not different)" in outcome.output
    assert "to go on: allow more seconds" in outcome.output


def test_mistakes_are_one_line(run: Runner) -> None:
    """A letter outside the group, an unwritable place and no word at all."""
    for arguments in (["2: 5"], ["1 1 1", "-o", "no/such/folder/file.json"], []):
        run.fail("symmetry", *arguments)
