"""braidsearch compare: outcomes, exit statuses, reports, certificates and limits."""

import json
from collections.abc import Callable, Mapping
from pathlib import Path
from typing import Any

import pytest

from braidsearch.certificates import Certificate, read_certificate
from braidsearch.errors import CapacityError, InputError
from braidsearch.search import driver
from braidsearch.search.limits import SearchLimits
from braidsearch.search.verdict import Verdict
from braidsearch.verifier import verify_file, verify_text
from braidsearch.words import Braid
from tests.command_line.running import Runner

EXPLORED = {"nodes": 12, "seconds": 1.5, "ending": "node limit", "tried": ["this", "that"]}
KEYS = {"outcome", "symmetry", "reason", "certificate", "explored"}


def undecided(**changes: Any) -> Verdict:
    """A verdict without a proof."""
    fields: dict[str, Any] = {
        "outcome": "undecided",
        "symmetry": None,
        "reason": "nothing was found",
        "certificate": None,
        "explored": EXPLORED,
        "suggestions": ("allow more nodes",),
    }
    return Verdict(**{**fields, **changes})


@pytest.fixture
def searched(monkeypatch: pytest.MonkeyPatch) -> Callable[[Verdict], list[Mapping[str, Any]]]:
    """Puts a search in the place of the real one that gives a verdict and notes its arguments."""

    def install(verdict: Verdict) -> list[Mapping[str, Any]]:
        calls: list[Mapping[str, Any]] = []

        def compare(left: Braid, right: Braid, **arguments: Any) -> Verdict:
            calls.append({"left": left, "right": right, **arguments})
            return verdict

        monkeypatch.setattr(driver, "compare", compare)
        return calls

    return install


@pytest.mark.parametrize(
    ("left", "right", "status", "first_word", "said"),
    [
        ("1 1 1", "1 2 1 2", 0, "same", "lead from LEFT to RIGHT"),
        ("1 1 1", "-1 -1 -1", 1, "different", "Jones polynomial"),
        ("2: 1 1", "3: 1 1", 1, "different", "number of components"),
        ("1 -2 1 -2", "-1 2 -1 2", 0, "same", "lead"),
        ("3 3 -2 3 -2 -1 -1 -1 2 -1 2", "1:", 0, "same", "strand"),
    ],
    ids=["trefoil", "mirror trefoil", "split circle", "figure-eight and mirror", "Morton"],
)
def test_known_pairs(  # noqa: PLR0913, PLR0917 - the columns of the table above
    run: Runner, tmp_path: Path, left: str, right: str, status: int, first_word: str, said: str
) -> None:
    """Outcome, exit status and reason for links that are known, each with an accepted proof.

    Sources: the right-handed trefoil on two and three strands; its Jones polynomial differs from
    that of its mirror image (Jones 1985); a Hopf link has no split circle; the figure-eight knot
    is its own mirror image; Morton, An irreducible 4-string braid with unknotted closure, 1983
    (mirror form, the word from memory).
    """
    file = tmp_path / "proof.json"
    outcome = run("compare", left, right, "-o", str(file))
    assert (outcome.status, outcome.errors) == (status, "")
    assert outcome.output.startswith(f"{first_word} link")
    assert said in outcome.output
    assert verify_file(file).valid


def test_values_that_differ_are_shown_as_polynomials(run: Runner) -> None:
    """The report holds both Jones polynomials, the right-handed trefoil's as in the conventions."""
    output = run("compare", "1 1 1", "-1 -1 -1").output
    assert "LEFT:  t + t^3 - t^4" in output
    assert "RIGHT: -t^-4 + t^-3 + t^-1" in output


def test_report_says_where_the_proof_is_and_how_to_check_it(run: Runner, tmp_path: Path) -> None:
    """The last lines name the file and give the command that a sceptic can run as it stands."""
    file = tmp_path / "my proof.json"
    lines = run("compare", "1 1 1", "1 2 1 2", "-o", str(file)).output.splitlines()
    assert lines[-2] == f"certificate: '{file}'"
    expected = f'check it: braidsearch verify \'{file}\' --left "1 1 1" --right "1 2 1 2"'
    assert lines[-1] == expected
    assert "proof: 2 moves" in "\n".join(lines)


def test_mirror_images_need_to_be_asked_for(run: Runner) -> None:
    """The two trefoils differ, are the same up to mirror, and --up-to any finds that as well."""
    assert run("compare", "1 1 1", "-1 -1 -1").status == 1
    for symmetries in ("mirror", "reverse,mirror", " mirror , reverse", "any"):
        outcome = run("compare", "1 1 1", "-1 -1 -1", "--up-to", symmetries)
        assert outcome.status == 0
        assert "mirror image of the closure of RIGHT" in outcome.output.splitlines()[0]


def test_an_image_that_was_not_asked_for_is_offered(run: Runner) -> None:
    """The trefoils differ and are mirror images: the report says so, and --json has the proof."""
    report = run("compare", "1 1 1", "-1 -1 -1").output
    assert "RIGHT is the mirror image of LEFT" in report
    assert "--up-to mirror gives its certificate" in report
    image = run("compare", "1 1 1", "-1 -1 -1", "--json").json["explored"]["image"]
    assert (image["verdict"], image["symmetry"]) == ("same", "mirror")
    assert verify_text(json.dumps(image)).valid


def test_difference_up_to_every_symmetry_has_a_distinction_for_each(run: Runner) -> None:
    """The trefoil is no image of the five-crossing torus knot: four distinctions, four symmetries.

    The genus of T(2, 5) is 2 and that of T(2, 3) is 1, for mirror images and reverses too.
    """
    outcome = run("compare", "1 1 1", "1 1 1 1 1", "--up-to", "any", "--json")
    symmetries = [d["symmetry"] for d in outcome.json["certificate"]["distinctions"]]
    assert outcome.status == 1
    assert symmetries == ["identity", "mirror", "reverse", "mirror-reverse"]


@pytest.mark.parametrize("right", ["1 2 1 2", "-1 -1 -1"])
def test_json_is_one_object_with_the_certificate(run: Runner, tmp_path: Path, right: str) -> None:
    """--json prints the five keys; the certificate in it is the one that -o writes."""
    file = tmp_path / "proof.json"
    outcome = run("compare", "1 1 1", right, "--json", "-o", str(file))
    assert outcome.json.keys() == KEYS
    assert outcome.output.count("\n") == 1
    assert outcome.errors == ""
    assert outcome.json["certificate"] == json.loads(file.read_text())
    assert outcome.json["explored"].keys() >= {"nodes", "seconds", "ending", "tried"}


def test_certificate_on_standard_output(run: Runner) -> None:
    """-o - prints the certificate alone, byte for byte as in a file; the report steps aside."""
    outcome = run("compare", "1 1 1", "1 2 1 2", "-o", "-")
    assert outcome.status == 0
    assert json.loads(outcome.output)["verdict"] == "same"
    assert outcome.errors.startswith("same link")


def test_same_question_gives_the_same_certificate(run: Runner, tmp_path: Path) -> None:
    """Bounded by nodes, two runs write the same bytes."""
    files = [tmp_path / "one.json", tmp_path / "two.json"]
    for file in files:
        run("compare", "4: 1 -2 3 1 -2 3", "3 1 -2 3 1 -2", "--seconds", "none", "-o", str(file))
    assert files[0].read_bytes() == files[1].read_bytes() != b""


def test_undecided_says_what_was_tried_and_how_to_go_on(
    run: Runner, tmp_path: Path, searched: Callable[[Verdict], Any]
) -> None:
    """Exit status 3, no file, and the words "undecided is not different" on the first line."""
    searched(undecided())
    file = tmp_path / "proof.json"
    outcome = run("compare", "1", "2", "-o", str(file))
    assert outcome.status == 3
    assert not file.exists()
    assert outcome.output.splitlines() == [
        "undecided: neither sameness nor difference was proven (undecided is not different)",
        "reason: nothing was found",
        "explored: 12 conjugacy classes in 1.5 s, ending: node limit",
        "tried:",
        "  - this",
        "  - that",
        "to go on:",
        "  - allow more nodes",
        f"certificate: none, so {file} was not written",
    ]


def test_undecided_in_json_keeps_standard_output_to_one_object(
    run: Runner, searched: Callable[[Verdict], Any]
) -> None:
    """No certificate is null; that none was written is said on standard error."""
    searched(undecided())
    outcome = run("compare", "1", "2", "--json", "-o", "proof.json")
    assert outcome.status == 3
    assert outcome.json["outcome"] == "undecided"
    assert outcome.json["certificate"] is None
    assert "no certificate was written to proof.json" in outcome.errors
    nothing_to_print = run("compare", "1", "2", "-o", "-")
    assert (nothing_to_print.status, nothing_to_print.output) == (3, "")


def test_real_search_that_runs_out_is_undecided(run: Runner) -> None:
    """A braid for the unknot that no sequence of destabilizations undoes, and no nodes to search.

    Source: H. R. Morton, An irreducible 4-string braid with unknotted closure, 1983; the word
    from memory.
    """
    outcome = run("compare", "3 3 -2 3 -2 -1 -1 -1 2 -1 2", "1:", "--nodes", "0")
    assert outcome.status == 3
    assert "node limit" in outcome.output
    assert "to go on:" in outcome.output


def test_limits_and_symmetries_reach_the_search(
    run: Runner, searched: Callable[[Verdict], list[Mapping[str, Any]]]
) -> None:
    """Options become SearchLimits; ``none`` lifts a bound; what is not given keeps its default."""
    calls = searched(undecided())
    options = ["--seconds", "2.5", "--nodes", "none", "--max-strands", "7"]
    run("compare", "-1,2", "1 −2", *options, "--up-to", "reverse", "--up-to", "mirror")
    run("compare", "1", "1", "--seconds", "none")
    assert calls[0]["left"] == Braid([-1, 2])
    assert calls[0]["right"] == Braid([1, -2])
    assert calls[0]["limits"] == SearchLimits(seconds=2.5, nodes=None, max_strands=7)
    assert calls[0]["up_to"] == ("mirror", "reverse")
    assert calls[1]["limits"] == SearchLimits(seconds=None)
    assert calls[1]["up_to"] == ()


@pytest.mark.parametrize(
    ("arguments", "said"),
    [
        (["1"], "required: RIGHT"),
        ([], "required: LEFT, RIGHT"),
        (["1", "1 0"], "RIGHT: '0'"),
        (["3: 5", "1"], "LEFT: letter 5"),
        (["1", "1", "--up-to", "turn"], "--up-to: 'turn': expected any, or mirror, reverse"),
        (["1", "1", "--up-to", ""], "--up-to: ''"),
        (["1", "1", "--up-to"], "--up-to: expected one argument"),
        (["1", "1", "--seconds", "soon"], "--seconds: 'soon': expected seconds or none"),
        (["1", "1", "--seconds", "-1"], "--seconds: '-1': expected seconds"),
        (["1", "1", "--seconds", "nan"], "--seconds: 'nan'"),
        (["1", "1", "--nodes", "1.5"], "--nodes: '1.5': expected a count or none"),
        (["1", "1", "--nodes", "-3"], "nodes -3"),
        (["1", "1", "--max-strands", "0"], "max_strands 0"),
        (["1", "1", "-o", "/no/such/folder/p.json"], "'/no/such/folder/p.json' cannot be written"),
        (["1", "1", "-o", "/"], "it is a folder"),
        (["1", "1", "-o", "-", "--json"], "-o -: expected a file"),
        (["-", "-"], "RIGHT: -: expected a word"),
        (["1", "1", "--mirror"], "--mirror: expected only the options"),
    ],
)
def test_mistakes_get_one_line(run: Runner, arguments: list[str], said: str) -> None:
    """Each mistake is named in one line, with exit status 2, before any search."""
    assert said in run.fail("compare", *arguments)


@pytest.mark.parametrize(
    ("raised", "ending"),
    [
        (KeyboardInterrupt(), "interrupted"),
        (MemoryError(), "out of memory"),
        (CapacityError("too many"), "too many"),
        (InputError("a word that grew too long"), "a word that grew too long"),
    ],
)
def test_a_search_broken_off_is_undecided(
    run: Runner, monkeypatch: pytest.MonkeyPatch, raised: BaseException, ending: str
) -> None:
    """Ctrl-C, lack of memory and a bound met on the way never become a verdict: exit status 3."""

    def compare(*_: Any, **__: Any) -> Verdict:
        raise raised

    monkeypatch.setattr(driver, "compare", compare)
    outcome = run("compare", "1", "1", "--json")
    assert outcome.status == 3
    assert outcome.json["outcome"] == "undecided"
    assert outcome.json["explored"]["ending"] == ending


def test_long_proofs_are_shown_in_part(run: Runner, tmp_path: Path) -> None:
    """A chain of more than a dozen moves is cut in the report, and whole in the certificate."""
    file = tmp_path / "proof.json"
    word = " ".join(f"{index} {-index}" for index in range(1, 6)) + " 1 2 3 4 5 6 7 8 9"
    assert run("compare", word, "1:", "-o", str(file)).status == 0
    certificate = read_certificate(file)
    assert isinstance(certificate, Certificate)
    moves = certificate.moves
    report = run("compare", word, "1:").output
    assert len(report.splitlines()) <= 22
    assert f"proof: {len(moves)} moves" in report
