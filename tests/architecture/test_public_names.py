"""The names that scripts rely on, and the top level of the project."""

import fnmatch
import re
from pathlib import Path

import pytest

import braidsearch
from braidsearch import Braid, SearchLimits, compare, verify
from tests.architecture.source import PACKAGE
from tests.certificates.test_file_format import DIFFERENT, SAME, SAME_TEXT

PROJECT = Path(__file__).parents[2]
TOP_LEVEL = {"README.md", "DEVELOPERS.md", "pyproject.toml", "tests", "benchmarks", "scenarios"}


def test_the_documented_session(tmp_path: Path) -> None:
    """The example of the design: compare, look, save, verify."""
    left, right = Braid([1, -2, 1, -2]), Braid([-1, 2, -1, 2])
    verdict = compare(left, right, limits=SearchLimits(seconds=20))
    assert verdict.outcome == "same"
    assert verdict.certificate is not None
    verdict.certificate.save(tmp_path / "proof.json")
    assert verify(tmp_path / "proof.json").valid
    assert verify(str(tmp_path / "proof.json"), left=left, right=right).valid
    assert not verify(tmp_path / "proof.json", left=right).valid


@pytest.mark.parametrize("name", braidsearch.__all__)
def test_every_public_name_is_there(name: str) -> None:
    """Each name of __all__ can be fetched, is listed by dir, and has a docstring."""
    assert name in dir(braidsearch)
    value = getattr(braidsearch, name)
    assert isinstance(value, str) or value.__doc__


def test_unknown_names_are_attribute_errors() -> None:
    """A mistyped name fails as on any module."""
    with pytest.raises(AttributeError, match="no attribute 'compair'"):
        braidsearch.compair  # type: ignore[attr-defined]  # noqa: B018


def test_certificates_are_verified_as_values() -> None:
    """verify takes the value as well as the file, and binds it to words."""
    assert verify(SAME).valid
    assert verify(DIFFERENT).valid
    assert verify(SAME, right=Braid([1, 2, 1, 2])).valid
    assert verify(SAME, right=Braid([2, 1, 2, 1])).status == "rejected"


@pytest.mark.parametrize("content", [b"", b"{", b"\xff\x00", SAME_TEXT.encode()[:-4], b"[1, 2]"])
def test_bad_files_raise_nothing(tmp_path: Path, content: bytes) -> None:
    """The report of what is no certificate is not valid, and says why."""
    file = tmp_path / "proof.json"
    file.write_bytes(content)
    report = verify(file)
    assert not report.valid
    assert report.status == "unreadable"
    assert report.reason


def test_missing_files_and_folders_raise_nothing(tmp_path: Path) -> None:
    """The same for a path that leads to no file."""
    assert not verify(tmp_path).valid
    assert not verify(tmp_path / "none.json").valid
    assert not verify("a\0b").valid


def test_the_package_is_typed_and_carries_the_format() -> None:
    """What is installed tells type checkers that it has types, and sceptics what a file means."""
    assert (PACKAGE / "py.typed").is_file()
    assert (PACKAGE / "verifier" / "FORMAT.md").is_file()


def test_developers_find_every_benchmark() -> None:
    """Each script that can be run is named in DEVELOPERS.md, and each name there is a script."""
    scripts = {
        file.name
        for file in (PROJECT / "benchmarks").glob("*.py")
        if "__main__" in file.read_text(encoding="utf-8")
    }
    text = (PROJECT / "DEVELOPERS.md").read_text(encoding="utf-8")
    table = text.split("## Benchmarks")[1].split("\n## ")[0]
    assert set(re.findall(r"^\| `(\w+\.py)`", table, re.MULTILINE)) == scripts


def test_the_top_level_is_what_the_design_names() -> None:
    """Beside dot-files and what .gitignore names, nothing else lies at the top."""
    ignored = ["build", "dist", "*.egg-info", "__pycache__", ".*", "braidsearch"]
    entries = {
        entry.name
        for entry in PROJECT.iterdir()
        if not any(fnmatch.fnmatch(entry.name, pattern) for pattern in ignored)
    }
    assert entries == TOP_LEVEL
