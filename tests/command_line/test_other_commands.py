"""braidsearch verify, normalise and invariants: output, exit statuses, mistakes."""

import io
import json
from pathlib import Path

import pytest

from braidsearch.certificates import format_certificate
from braidsearch.normal_form import are_equal
from braidsearch.words import Braid
from tests.certificates.test_file_format import DIFFERENT, SAME
from tests.command_line.running import Runner


@pytest.fixture
def proof(tmp_path: Path) -> Path:
    """A certificate file: the trefoil on two strands and on three."""
    path = tmp_path / "proof.json"
    SAME.save(path)
    return path


class StandardInput(io.StringIO):
    """Text that can be read as bytes as well, as standard input can."""

    @property
    def buffer(self) -> io.BytesIO:
        """The same text as bytes."""
        return io.BytesIO(self.getvalue().encode())


def test_valid_certificates_exit_0(run: Runner, proof: Path) -> None:
    """The report names the claim, so that valid is never valid for something else."""
    outcome = run("verify", str(proof))
    first, claim, reason = outcome.output.splitlines()
    assert (outcome.status, outcome.errors, first) == (0, "", "valid")
    assert "(2: 1 1 1) is the same oriented link as the closure of (3: 1 2 1 2)" in claim
    assert "all 2 moves hold" in reason


def test_rejected_certificates_exit_1(run: Runner, proof: Path) -> None:
    """One letter changed: the move that does not hold is named."""
    proof.write_text(proof.read_text().replace("[1, 1, 1, 2]", "[1, 1, 1, -2]"))
    outcome = run("verify", str(proof))
    assert outcome.status == 1
    assert outcome.output.startswith("rejected\n")
    assert "move 1" in outcome.output


@pytest.mark.parametrize(
    ("options", "status"),
    [
        (["--left", "1 1 1", "--right", "1 2 1 2"], 0),
        (["--left", "[1,1,1]"], 0),
        (["--right", "s1 s2 s1 s2"], 0),
        (["--left", "-1 -1 -1"], 1),
        (["--left", "-1,-1,-1"], 1),
        (["--left", "3: 1 1 1"], 1),
        (["--right", "2 1 2 1"], 1),
    ],
)
def test_the_claim_can_be_bound(run: Runner, proof: Path, options: list[str], status: int) -> None:
    """A true proof about other words than those asked for is rejected."""
    assert run("verify", str(proof), *options).status == status
    assert run("verify", *options, str(proof), "--json").json["valid"] is (status == 0)


def test_json_has_three_keys(run: Runner, proof: Path) -> None:
    """{valid, claim, reason}, whether valid or not."""
    good = run("verify", str(proof), "--json")
    proof.write_text("{}")
    bad = run("verify", str(proof), "--json")
    assert good.json.keys() == bad.json.keys() == {"valid", "claim", "reason"}
    assert (good.status, good.json["valid"]) == (0, True)
    assert (bad.status, bad.json["valid"]) == (2, False)


@pytest.mark.parametrize("text", ["", "x", "[]", "{}", format_certificate(SAME)[:-9], "\0"])
def test_unreadable_files_exit_2(run: Runner, proof: Path, text: str) -> None:
    """What is no certificate is answered by one line that names the file."""
    proof.write_text(text)
    assert proof.name in run.fail("verify", str(proof))


def test_missing_files_and_folders_exit_2(run: Runner, tmp_path: Path) -> None:
    """A path that is no file is named, once."""
    assert run.fail("verify", str(tmp_path / "none.json")).count("none.json") == 1
    assert tmp_path.name in run.fail("verify", str(tmp_path))
    assert "required: FILE" in run.fail("verify")
    assert "--left: 'x'" in run.fail("verify", str(tmp_path), "--left", "x")


def test_standard_input_is_a_file(run: Runner, monkeypatch: pytest.MonkeyPatch) -> None:
    """``verify -`` reads the certificate from standard input."""
    for certificate in (SAME, DIFFERENT):
        monkeypatch.setattr("sys.stdin", StandardInput(format_certificate(certificate)))
        assert run("verify", "-").status == 0


def test_words_from_standard_input(run: Runner, monkeypatch: pytest.MonkeyPatch) -> None:
    """``-`` in the place of a word reads it from standard input, however long."""
    monkeypatch.setattr("sys.stdin", StandardInput("1 -1 " * 20_000))
    assert run("normalise", "-", "--json").json["reduced"] == {"strands": 2, "word": []}
    monkeypatch.setattr("sys.stdin", StandardInput("1 " * 2_000_000))
    assert "WORD: standard input: expected at most" in run.fail("normalise", "-")


def test_normalise_tells_the_forms(run: Runner) -> None:
    """The report of a word that reduces to sigma_1^3, the half twist and more by hand."""
    outcome = run("normalise", "1 2 -2 1 1 2 1 2")
    lines = dict(line.split(":", 1) for line in outcome.output.splitlines())
    assert outcome.status == 0
    assert lines["size"].strip() == "3 strands, 8 letters"
    assert lines["freely reduced"].strip() == "1 1 1 2 1 2"
    assert lines["left normal form"].strip() == "delta^1 | 2 | 2 | 2"


def test_normalise_json_is_true(run: Runner) -> None:
    """Factors multiply to the braid, and the conjugator carries it to the representative."""
    answer = run("normalise", "-1 2 2 -2 3 -1", "--json").json
    braid = Braid(answer["braid"]["word"], answer["braid"]["strands"])
    half_twist = Braid([1, 2, 3, 1, 2, 1], 4)
    power = half_twist if answer["normal_form"]["infimum"] > 0 else half_twist.inverse()
    product = Braid([], 4)
    for _ in range(abs(answer["normal_form"]["infimum"])):
        product = product * power
    for factor in answer["normal_form"]["factors"]:
        product = product * Braid(factor, 4)
    by = Braid(answer["summit"]["conjugator"], 4)
    representative = Braid(answer["summit"]["representative"]["word"], 4)
    assert answer.keys() == {"braid", "reduced", "normal_form", "summit"}
    assert are_equal(product, braid)
    assert are_equal(by * representative, braid * by)
    assert answer["summit"]["complete"] is True


def test_conjugate_braids_have_one_representative(run: Runner) -> None:
    """Words for conjugate braids are given the same representative."""
    answers = [run("normalise", word, "--json").json for word in ("1 2 -3 1", "3: ", "2 -3 1 1")]
    first, other, turned = (answer["summit"]["representative"] for answer in answers)
    assert first == turned != other


def test_invariants_of_the_trefoil(run: Runner) -> None:
    """The conventions of the project, at the right-handed trefoil."""
    outcome = run("invariants", "1 1 1")
    lines = dict(line.split(":", 1) for line in outcome.output.splitlines())
    values = {name: value.strip() for name, value in lines.items()}
    assert outcome.status == 0
    assert values["number of components"] == "1"
    assert values["determinant"] == "3"
    assert values["signature"] == "-2"
    assert values["Alexander polynomial"] == "1 - t + t^2"
    assert values["Jones polynomial"] == "t + t^3 - t^4"
    assert values["HOMFLY-PT polynomial"] == "2 v^2 + v^2 z^2 - v^4"


def test_invariants_as_json_stand_as_in_a_certificate(run: Runner) -> None:
    """{name: value}, the Jones exponents in half powers of t."""
    values = run("invariants", "-1 -1 -1", "--json").json
    assert values["jones"] == [[-8, -1], [-6, 1], [-2, 1]]
    assert values["signature"] == 2
    assert values["components"] == 1


def test_invariants_that_are_too_dear_are_named(run: Runner) -> None:
    """What is too large is left out, and said to be; so is what would take too long."""
    word = " ".join(str(index) for index in [*range(1, 40), *range(1, 40)])
    outcome = run("invariants", word, "--json")
    assert outcome.status == 0
    assert "homfly" not in outcome.json
    assert "HOMFLY-PT polynomial (too large)" in outcome.errors
    assert json.loads(outcome.output)["components"] >= 1
    hurried = run("invariants", "1 2 1 2", "--seconds", "0", "--json")
    assert hurried.json == {}
    assert "Jones polynomial (about 0 s: allow more --seconds)" in hurried.errors


def test_invariants_with_a_bad_bound(run: Runner) -> None:
    """A bound that is no number is named; none lifts it."""
    assert "--seconds: 'soon'" in run.fail("invariants", "1", "--seconds", "soon")
    assert run("invariants", "1 1", "--seconds", "none").status == 0
