"""Every case of the folders gets the answer, and the reason, that its index states."""

import json

import pytest

from braidsearch.verifier import verify_file, verify_text
from braidsearch.verifier.verify import main
from tests.verifier.cases import CASES, EXIT_STATUSES, HERE, STATUSES, expected, path_of
from tests.verifier.judge import holds

TOO_LARGE_FOR_THE_JUDGE = {
    "same-morton-unknot.json",
    "different-homfly-too-large.json",
    "different-colouring-reverse-of-8-17.json",
    "colouring-group-too-large.json",
    "colouring-class-too-large.json",
    "three-braid-flype-is-the-same-link.json",
    "three-braid-one-class-left-out.json",
}
every_case = pytest.mark.parametrize(("folder", "name"), CASES)


@every_case
def test_cases(folder, name):
    """The status is the folder's, and the claim or the reason says what is expected."""
    report = verify_file(path_of(folder, name))
    assert report.status == STATUSES[folder], report
    assert report.valid is (folder == "accepted")
    said = report.reason if folder != "accepted" else f"{report.claim}; {report.reason}"
    assert expected(folder)[name] in said
    assert (report.claim == "") is (folder == "malformed")
    assert "\n" not in report.claim + report.reason


@every_case
def test_cases_on_the_command_line(folder, name, capsys):
    """The exit status and the JSON answer agree with the report."""
    report = verify_file(path_of(folder, name))
    assert main([str(path_of(folder, name)), "--json"]) == EXIT_STATUSES[folder]
    answer = json.loads(capsys.readouterr().out)
    expected_answer = {"valid": report.valid, "claim": report.claim, "reason": report.reason}
    assert answer == expected_answer


@pytest.mark.parametrize("name", [name for folder, name in CASES if folder != "malformed"])
def test_cases_against_the_second_verifier(name):
    """The judge, which uses other methods, accepts and rejects the same files."""
    folder = "accepted" if name in expected("accepted") else "rejected"
    if name not in TOO_LARGE_FOR_THE_JUDGE:
        assert holds(json.loads(path_of(folder, name).read_text())) is (folder == "accepted")


@pytest.mark.parametrize("folder", STATUSES)
def test_folders_and_indexes_agree(folder):
    """No case lies in a folder without an expectation, and each folder has its share."""
    files = {path.name for path in (HERE / folder).iterdir()} - {"expected.json"}
    assert files == set(expected(folder))
    assert len(files) >= 15
    assert all(expected(folder).values())


def test_the_layout_of_the_file_does_not_matter():
    """White space, the order of keys and escapes in names are free."""
    data = json.loads(path_of("accepted", "same-trefoil-on-three-strands").read_text())
    keys = reversed(data)
    layouts = [
        json.dumps(data, separators=(",", ":")),
        json.dumps(data, indent=3),
        json.dumps({key: data[key] for key in keys}),
        "\r\n\t " + json.dumps(data) + "\n\n ",
        json.dumps(data).replace("conjugate", "\\u0063onjugate"),
    ]
    for text in layouts:
        assert verify_text(text).valid
        assert verify_text(text.encode()).valid
