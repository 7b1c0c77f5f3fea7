"""braidsearch draw: pictures on standard output and in files, and mistakes in one line."""

import io
import os
from collections.abc import Sequence
from pathlib import Path

import pytest

from braidsearch.certificates import format_certificate
from braidsearch.drawing import draw_braid, draw_closure, draw_proof
from braidsearch.words import Braid
from tests.certificates.test_file_format import DIFFERENT, SAME
from tests.command_line.running import Runner, run_process
from tests.drawing.svg_reader import read_picture

FIGURE_EIGHT = Braid([1, -2, 1, -2])


@pytest.fixture
def proof(tmp_path: Path) -> Path:
    """A certificate file under a name that says nothing of its content."""
    path = tmp_path / "trefoils"
    SAME.save(path)
    return path


@pytest.mark.parametrize(
    ("options", "expected"),
    [
        ([], draw_braid(FIGURE_EIGHT)),
        (["--letters"], draw_braid(FIGURE_EIGHT, has_letters=True)),
        (["--direction", "right"], draw_braid(FIGURE_EIGHT, direction="right")),
        (["--direction=down", "-o", "-"], draw_braid(FIGURE_EIGHT)),
        (["--closure"], draw_closure(FIGURE_EIGHT)),
        (["--closure", "--transparent"], draw_closure(FIGURE_EIGHT, is_transparent=True)),
    ],
)
def test_pictures_go_to_standard_output(run: Runner, options: Sequence[str], expected: str) -> None:
    """What the function of the library gives, and nothing else."""
    assert run("draw", "1 -2 1 -2", *options) == (0, expected + "\n", "")


def test_words_may_begin_with_a_minus(run: Runner) -> None:
    """A word is never taken for an option."""
    assert run("draw", "-1 2").output == draw_braid(Braid([-1, 2])) + "\n"


def test_files_are_written_whole(run: Runner, tmp_path: Path) -> None:
    """-o writes the picture, says where, and leaves nothing else behind."""
    file = tmp_path / "closure.svg"
    file.write_text("old")
    outcome = run("draw", "1 -2 1 -2", "--closure", "-o", str(file))
    assert outcome == (0, f"picture: {file}\n", "")
    assert file.read_text() == draw_closure(FIGURE_EIGHT) + "\n"
    assert os.listdir(tmp_path) == ["closure.svg"]


def test_devices_stay_devices(run: Runner) -> None:
    """A picture may be written to what is no file."""
    assert run("draw", "1", "-o", os.devnull).status == 0
    assert not os.path.isfile(os.devnull)


def test_drawings_are_woven_first(run: Runner) -> None:
    """A planar diagram code is drawn as the closed braid that standard error names."""
    outcome = run("draw", "pd: [[4,1,5,2],[6,3,1,4],[2,5,3,6]]", "--closure")
    assert "woven from its planar diagram code, 3 crossings: -1 -1 -1" in outcome.errors
    assert outcome.output == draw_closure(Braid([-1, -1, -1])) + "\n"


def test_certificates_are_known_by_their_content(run: Runner, proof: Path, tmp_path: Path) -> None:
    """A file that holds a JSON object is a proof, whatever its name; --proof says so outright."""
    expected = draw_proof(SAME) + "\n"
    assert run("draw", str(proof)) == (0, expected, "")
    assert run("draw", "--proof", str(proof)) == (0, expected, "")
    assert run("draw", str(proof), "--stages", "2").output == draw_proof(SAME, most_stages=2) + "\n"
    whole = draw_proof(SAME, most_stages=None, direction="down") + "\n"
    assert run("draw", str(proof), "--stages", "all", "--direction", "down").output == whole
    DIFFERENT.save(tmp_path / "different.json")
    assert run("draw", str(tmp_path / "different.json")).output == draw_proof(DIFFERENT) + "\n"


def test_certificates_come_from_standard_input(
    run: Runner, monkeypatch: pytest.MonkeyPatch
) -> None:
    """With --proof a lone - is a certificate, without it a word."""
    monkeypatch.setattr("sys.stdin", io.StringIO(format_certificate(SAME)))
    assert run("draw", "--proof", "-").output == draw_proof(SAME) + "\n"
    monkeypatch.setattr("sys.stdin", io.StringIO("1 -2 1 -2"))
    assert run("draw", "-").output == draw_braid(FIGURE_EIGHT) + "\n"


def test_pictures_pass_through_any_encoding() -> None:
    """In a process whose output knows ASCII alone the picture is the same, minus signs included."""
    outcome = run_process("draw", "1 -2", "--letters", "--closure")
    assert outcome.output == draw_closure(Braid([1, -2]), has_letters=True) + "\n"
    assert "−2" in {text for text, *_ in read_picture(outcome.output).texts}
    assert outcome.output.isascii()


@pytest.mark.parametrize(
    ("arguments", "said"),
    [
        ([], "required: LINK"),
        (["1 x"], "LINK: 'x': expected integers"),
        (["61: 1"], "LINK: a picture of 61 strands: expected at most 60"),
        (["1 " * 2001], "LINK: a picture of 2001 crossings: expected at most 2000"),
        (["1", "--direction", "up"], "--direction: 'up': expected down or right"),
        (["1", "--closure", "--proof"], "--closure: expected no --proof beside it"),
        (["1", "--stages", "3"], "--stages: expected a certificate"),
        (["1", "--stages", "one"], "--stages: 'one': expected an integer from 2 upwards, or all"),
        (["1", "--stages", "1"], "--stages: '1': expected an integer from 2 upwards"),
        (["1", "--stages", "9" * 500], "expected an integer from 2 upwards"),
        (["1", "--colour"], "--colour: expected only the options"),
        (["missing.json"], "LINK: 'missing.json': expected an existing file"),
        (["--proof", "1 1"], "LINK: '1 1': No such file or directory: expected a file"),
        (["--proof", "a\0b"], "LINK: 'a\\x00b'"),
        (["--proof", "."], "LINK: '.': Is a directory: expected a file"),
        (["1", "-o", "."], "picture '.' cannot be written: it is a folder"),
        (["1", "-o", "none/x.svg"], "picture 'none/x.svg' cannot be written: its folder"),
        (["\udcff"], "udcff"),
    ],
)
def test_mistakes_get_one_line(run: Runner, arguments: Sequence[str], said: str) -> None:
    """Exit status 2, nothing on standard output, one line that names the mistake."""
    line = run.fail("draw", *arguments)
    assert line.startswith("braidsearch draw: ")
    assert said in line


@pytest.mark.parametrize(
    ("content", "said"),
    [
        (b"{", "LINK: certificate: line 1, column 2: expected JSON"),
        (b"{}", "LINK: verdict: null"),
        (b"\xff\xfe{", "expected a file of text in UTF-8"),
        (b"1 2 1", "expected integers"),
        (b"", "expected integers"),
    ],
)
def test_broken_files_get_one_line(run: Runner, tmp_path: Path, content: bytes, said: str) -> None:
    """A file that holds no certificate is refused as such, or as a word."""
    (tmp_path / "broken").write_bytes(content)
    assert said in run.fail("draw", str(tmp_path / "broken"))


def test_closures_are_drawn_of_braids_alone(run: Runner, proof: Path) -> None:
    """A proof has many stages: which closure is meant cannot be known."""
    line = run.fail("draw", str(proof), "--closure")
    assert line.endswith("--closure: expected a braid, since LINK is a certificate")
