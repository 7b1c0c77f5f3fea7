"""braidsearch draw --page: the page as a file, and mistakes in one line."""

from collections.abc import Sequence
from pathlib import Path

import pytest

from braidsearch.drawing.player import draw_proof_page
from tests.certificates.test_file_format import SAME
from tests.command_line.conftest import run as run  # noqa: PLC0414 - the fixture, for this folder
from tests.command_line.running import Runner


@pytest.fixture
def proof(tmp_path: Path) -> Path:
    """A certificate file."""
    path = tmp_path / "trefoils.json"
    SAME.save(path)
    return path


def test_the_page_is_written(run: Runner, proof: Path, tmp_path: Path) -> None:
    """-o writes what the function gives, and says where; without it standard output has it."""
    file = tmp_path / "proof.html"
    assert run("draw", str(proof), "--page", "-o", str(file)) == (0, f"page: {file}\n", "")
    assert file.read_text(encoding="ascii") == draw_proof_page(SAME)
    assert run("draw", "--proof", str(proof), "--page") == (0, draw_proof_page(SAME), "")


@pytest.mark.parametrize(
    ("options", "said"),
    [
        (["--closure"], "--closure: expected no --page beside it"),
        (["--letters"], "--letters: expected no --page beside it"),
        (["--transparent"], "--transparent: expected no --page beside it"),
        (["--direction", "down"], "--direction: expected no --page beside it"),
        (["--stages", "3"], "--stages: expected no --page beside it"),
    ],
)
def test_a_page_has_choices_of_its_own(
    run: Runner, proof: Path, options: Sequence[str], said: str
) -> None:
    """Options for still pictures are refused by name."""
    assert run.fail("draw", str(proof), "--page", *options).endswith(said)


def test_a_braid_alone_has_no_page(run: Runner) -> None:
    """A page plays a proof."""
    assert run.fail("draw", "1 2", "--page").endswith(
        "--page: expected a certificate, since it plays a proof"
    )


def test_a_certificate_without_stages_gets_one_line(run: Runner, proof: Path) -> None:
    """A move that states letters outside the group is named by its number."""
    text = proof.read_text(encoding="utf-8").replace('"word": [1, 2, 1, 2]}\n', '"word": [1, 9]}\n')
    proof.write_text(text, encoding="utf-8")
    assert "LINK: move 2 of the proof: letter 9" in run.fail("draw", str(proof), "--page")
