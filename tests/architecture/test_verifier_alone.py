"""verify.py, copied alone into an empty folder, is all that a sceptic needs."""

import json
import shutil
import subprocess
import sys
from pathlib import Path

import pytest

from tests.architecture.source import PACKAGE
from tests.certificates.test_file_format import DIFFERENT, SAME


@pytest.fixture
def folder(tmp_path: Path) -> Path:
    """An empty folder with a copy of the verifier and two certificates."""
    shutil.copy(PACKAGE / "verifier" / "verify.py", tmp_path)
    SAME.save(tmp_path / "same.json")
    DIFFERENT.save(tmp_path / "different.json")
    return tmp_path


def verify_alone(folder: Path, *arguments: str) -> subprocess.CompletedProcess[str]:
    """``python -I -S verify.py ARGUMENTS``: no installed package can be imported."""
    return subprocess.run(
        [sys.executable, "-I", "-S", "verify.py", *arguments],
        cwd=folder,
        capture_output=True,
        text=True,
        check=False,
        timeout=60,
        env={},
    )


@pytest.mark.parametrize("name", ["same.json", "different.json"])
def test_valid_certificates_are_accepted(folder: Path, name: str) -> None:
    """Exit status 0, alone as well as bound to the words of the claim."""
    assert verify_alone(folder, name).returncode == 0
    assert verify_alone(folder, name, "--left", "1 1 1").returncode == 0


def test_false_certificates_are_rejected(folder: Path) -> None:
    """Exit status 1 for one changed letter, and for a claim about other words."""
    text = (folder / "same.json").read_text()
    (folder / "false.json").write_text(text.replace('"by": [1]', '"by": [2]'))
    assert verify_alone(folder, "false.json").returncode == 1
    assert verify_alone(folder, "same.json", "--left", "-1 -1 -1").returncode == 1


def test_unreadable_certificates_and_mistakes(folder: Path) -> None:
    """Exit status 2, without a traceback, for what is no certificate and for no argument."""
    (folder / "broken.json").write_text("{")
    for arguments in (["broken.json"], ["missing.json"], [], ["same.json", "--colour"]):
        finished = verify_alone(folder, *arguments)
        assert finished.returncode == 2
        assert "Traceback" not in finished.stderr


def test_json_answer(folder: Path) -> None:
    """--json prints {valid, claim, reason}, as the command does."""
    answer = json.loads(verify_alone(folder, "same.json", "--json").stdout)
    assert answer.keys() == {"valid", "claim", "reason"}
    assert answer["valid"] is True
