"""A certificate file through every command that shows it: in words, in small steps, in pictures."""

from __future__ import annotations

import json
from collections.abc import Iterator
from pathlib import Path

from braidsearch import verify
from braidsearch.certificates import Certificate, read_certificate
from braidsearch.explaining import expand_certificate
from braidsearch.words import format_word
from tests.command_line.running import Outcome, Runner
from tests.drawing.player.test_page import Elements
from tests.drawing.svg_reader import read_picture
from tests.drawing.test_proof_sheets import check_layout
from tests.explaining.latex_checking import check_latex
from tests.explaining.reading import chains, check_steps, last_braid


def iter_certificate_files(folder: Path) -> Iterator[Path]:
    """The files below the folder that hold a JSON object which calls itself a certificate."""
    for file in sorted(folder.rglob("*.json")):
        try:
            value = json.loads(file.read_text(encoding="utf-8"))
        except (ValueError, RecursionError):
            continue  # what is no JSON, not even for a lenient reader
        if isinstance(value, dict) and str(value.get("format", "")).startswith("braidsearch"):
            yield file


def check_shown(run: Runner, file: Path, folder: Path) -> int:
    """Explain and draw the certificate by the commands, in every form; the number of its steps.

    The steps written out are accepted for the same words, and each is what it says.
    """
    certificate = read_certificate(file)
    words = _done(run("explain", str(file)))
    assert words.startswith("claim: ")
    check_latex(_done(run("explain", str(file), "--format", "latex")))
    _check_small_steps(run, certificate, file, folder / "small_steps.json")
    _check_sheet(certificate, _done(run("draw", str(file))))
    _check_page(certificate, _done(run("draw", str(file), "--page")))
    return _count_of_moves(certificate)


def _done(outcome: Outcome) -> str:
    assert (outcome.status, outcome.errors) == (0, "")
    return outcome.output


def _check_small_steps(run: Runner, certificate: Certificate, file: Path, written: Path) -> None:
    said = run("explain", str(file), "--steps", "elementary", "-o", str(written))
    assert _done(said).startswith("claim: ")
    expansion = expand_certificate(certificate)
    check_steps(expansion)
    assert read_certificate(written) == expansion.certificate
    left, right = certificate.left, certificate.right
    assert verify(written, left=left, right=right).valid
    for (start, moves), (same_start, steps) in zip(
        chains(certificate), chains(expansion.certificate), strict=True
    ):
        assert start == same_start
        assert last_braid(start, steps) == last_braid(start, moves)


def _check_sheet(certificate: Certificate, text: str) -> None:
    """Nothing on the sheet is cut off or overlaps; both words are in its description."""
    check_layout(read_picture(text, is_turned=True))
    for braid in (certificate.left, certificate.right):
        assert f"Word: {format_word(braid)}." in text


def _check_page(certificate: Certificate, text: str) -> None:
    """Elements are closed in order, and the list has an item for each move."""
    elements = Elements(text)
    assert elements.open == []
    steps = [each for tag, each in elements.found if tag == "li" and each.get("class") == "step"]
    assert len(steps) == _count_of_moves(certificate)


def _count_of_moves(certificate: Certificate) -> int:
    return sum(len(moves) for _, moves in chains(certificate))
