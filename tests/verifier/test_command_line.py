"""verify.py as a program: copied alone into an empty folder, and called in the same process."""

import json
import os
import shutil
import subprocess
import sys
from pathlib import Path

import pytest

from braidsearch.verifier import verify
from tests.verifier.cases import CASES, EXIT_STATUSES, path_of

TREFOIL = str(path_of("accepted", "same-trefoil-on-three-strands"))
NEGATIVE = str(path_of("accepted", "different-jones"))


@pytest.fixture(scope="module")
def folder(tmp_path_factory):
    """An empty folder that holds a copy of verify.py and nothing else."""
    folder = tmp_path_factory.mktemp("alone")
    shutil.copy(Path(verify.__file__), folder / "verify.py")
    return folder


def run(folder, *arguments, **options):
    return subprocess.run(
        [sys.executable, "-I", "verify.py", *arguments],
        cwd=folder,
        capture_output=True,
        text=True,
        check=False,
        timeout=60,
        **options,
    )


@pytest.mark.parametrize(("case_folder", "name"), CASES[::9])
def test_alone_in_an_empty_folder(folder, case_folder, name):
    """Every ninth case, by python -I: the exit status of its folder, and no traceback."""
    finished = run(folder, str(path_of(case_folder, name)))
    assert finished.returncode == EXIT_STATUSES[case_folder]
    assert "Traceback" not in finished.stderr
    if case_folder == "malformed":
        assert finished.stdout == ""
        assert finished.stderr.startswith("unreadable: ")
        assert finished.stderr.count("\n") == 1
    else:
        first, second = finished.stdout.splitlines()
        assert first.startswith("valid: " if case_folder == "accepted" else "rejected: ")
        assert second.startswith("claim: the closure of ")
        assert finished.stderr == ""


def test_the_folder_stays_empty(folder):
    """Nothing is written beside the file."""
    assert run(folder, TREFOIL).returncode == 0
    assert [path.name for path in folder.iterdir()] == ["verify.py"]


def test_importing_it_needs_nothing_else(folder):
    """Importable by its path from anywhere, and what it loads is the standard library."""
    program = (
        "import sys; sys.path.insert(0, '.'); sys.dont_write_bytecode = True; import verify; "
        "own = {name.partition('.')[0] for name in sys.modules}; "
        "print(own - set(sys.stdlib_module_names) - {'__main__', 'verify'})"
    )
    finished = subprocess.run(
        [sys.executable, "-I", "-S", "-c", program],
        cwd=folder,
        capture_output=True,
        text=True,
        check=True,
        timeout=60,
    )
    assert finished.stdout.strip() == "set()"


ACCEPTED = [
    [TREFOIL],
    [TREFOIL, "--left", "1 1 1"],
    [TREFOIL, "--left=1,1,1", "--right", "3: 1 2 1 2"],
    ["--right", " 1 , 2,1 2 ", "--json", TREFOIL],
    ["--left", "+1 +1 +1", TREFOIL],
    [NEGATIVE, "--right", "-1 -1 -1"],
    [NEGATIVE, "--right=-1 -1 -1"],
    [NEGATIVE, "--right", "-1,-1,-1"],
    [NEGATIVE, "--right=2:-1 -1 -1"],
]
REJECTED = [
    [TREFOIL, "--left", "1 1"],
    [TREFOIL, "--left", "3: 1 1 1"],
    [TREFOIL, "--right", "1 1 1"],
    [TREFOIL, "--left=-1"],
    [TREFOIL, "--left", "-1 2"],
    [TREFOIL, "--left", "1:"],
    [NEGATIVE, "--left", "-1 -1 -1"],
]
MISUSED = [
    [],
    [TREFOIL, TREFOIL],
    [TREFOIL, "--left"],
    [TREFOIL, "--left", ""],
    [TREFOIL, "--left", "  "],
    [TREFOIL, "--left="],
    [TREFOIL, "--left", "s1"],
    [TREFOIL, "--left", "1 0"],
    [TREFOIL, "--left", "1.0"],
    [TREFOIL, "--left", "1 2,"],
    [TREFOIL, "--left", "1 - 2"],
    [TREFOIL, "--left", "0: "],
    [TREFOIL, "--left", "2: 5"],
    [TREFOIL, "--left", "1001: 1"],
    [TREFOIL, "--left", "1234567890"],
    [TREFOIL, "--left", "\u0661"],
    [TREFOIL, "--left", "1 1 1", "--left", "1 1 1"],
    [TREFOIL, "--json", "--json"],
    [TREFOIL, "--json=yes"],
    [TREFOIL, "--JSON"],
    [TREFOIL, "-1"],
    ["--left", "1 1 1"],
]


@pytest.mark.parametrize(
    ("status", "arguments"),
    [
        (status, arguments)
        for status, group in enumerate([ACCEPTED, REJECTED, MISUSED])
        for arguments in group
    ],
)
def test_arguments(status, arguments, capsys):
    """0 when bound to the words of the claim, 1 to others, 2 with one line for a mistake."""
    assert verify.main(arguments) == status
    captured = capsys.readouterr()
    if status == 2:
        assert captured.out == ""
        assert captured.err.count("\n") == 1
        assert "usage: verify.py FILE" in captured.err


@pytest.mark.parametrize("name", ["--left", "--right"])
def test_a_word_with_a_leading_minus_on_a_real_command_line(folder, name):
    """The shell hands over "-1 2" as one argument, and it is read as a word."""
    assert run(folder, TREFOIL, name, "-1 2").returncode == 1
    assert run(folder, TREFOIL, f"{name}=-1").returncode == 1


def test_help(folder):
    """--help explains itself on standard output."""
    finished = run(folder, "--help")
    assert finished.returncode == 0
    assert finished.stdout.startswith("usage: verify.py FILE")


def test_json_answers(folder):
    """One JSON object on standard output and nothing else, whatever the answer."""
    malformed = str(path_of("malformed", "truncated"))
    false = str(path_of("rejected", "rewrite-not-equal"))
    for file, status in ((TREFOIL, 0), (false, 1), (malformed, 2), ("no such file", 2)):
        finished = run(folder, file, "--json")
        assert finished.returncode == status
        answer = json.loads(finished.stdout)
        assert answer.keys() == {"valid", "claim", "reason"}
        assert answer["valid"] is (status == 0)
        assert finished.stderr == ""


def test_files_that_cannot_be_read(folder, tmp_path, capsys):
    """A missing file, a folder and a name with a zero in it."""
    for name in ("no such file", str(tmp_path), "zero\0zero"):
        assert verify.main([name]) == 2
        error = capsys.readouterr().err
        assert error.startswith("unreadable: cannot read ")
        assert error.count("\n") == 1


def test_answers_that_cannot_be_written_are_no_success(folder):
    """When nobody can read the answer, the status is not that of a proof."""
    reading, writing = os.pipe()
    os.close(reading)
    finished = subprocess.run(
        [sys.executable, "-I", "verify.py", TREFOIL],
        cwd=folder,
        stdout=writing,
        stderr=subprocess.PIPE,
        text=True,
        check=False,
        timeout=60,
    )
    os.close(writing)
    assert finished.returncode == 2
    assert finished.stderr == ""


def test_an_interrupted_check_is_no_success(monkeypatch, capsys):
    """Control-C ends with status 2 and one line."""

    def interrupted(*_):
        raise KeyboardInterrupt

    monkeypatch.setattr(verify, "verify_file", interrupted)
    assert verify.main([TREFOIL]) == 2
    assert capsys.readouterr().err == "interrupted: nothing is shown\n"


def test_claims_in_words(capsys):
    """The claim names the braids, the symmetry, and cuts long words short."""
    verify.main([TREFOIL])
    claim = "the closure of (2: 1 1 1) is the same oriented link as the closure of (3: 1 2 1 2)"
    assert f"claim: {claim}\n" in capsys.readouterr().out
    long = verify.format_braid(verify.Braid(2, (1,) * 500))
    assert long.endswith(" ... 500 letters")
    assert len(long) < 80
