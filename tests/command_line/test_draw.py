"""braidsearch draw: pictures on standard output and in files, and mistakes in one line."""

import io
import os
import subprocess
from collections.abc import Sequence
from pathlib import Path

import pytest

from braidsearch.certificates import format_certificate
from braidsearch.drawing import draw_braid, draw_closure, draw_proof
from braidsearch.words import Braid
from tests.certificates.test_file_format import DIFFERENT, SAME
from tests.command_line.running import Runner, command, environment, run_process
from tests.drawing.layout import is_inside, iter_rectangles, view_box
from tests.drawing.svg_reader import read_picture
from tests.verifier.cases import path_of

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


def test_a_certificate_is_not_replaced_by_its_picture(
    run: Runner, proof: Path, tmp_path: Path
) -> None:
    """-o with the file that is drawn, under whatever name, is refused; nothing is written."""
    before = proof.read_bytes()
    (tmp_path / "other").symlink_to(proof)
    for name in (str(proof), str(tmp_path / "other")):
        line = run.fail("draw", str(proof), "--page", "-o", name)
        assert line.endswith(f"-o {name}: expected another file than LINK, which it would replace")
    assert proof.read_bytes() == before


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


def test_json_says_what_was_drawn(run: Runner, tmp_path: Path) -> None:
    """One object: the braid and its numbers, the size that the picture has, and the picture, or the
    file that holds it.
    """
    picture = draw_closure(FIGURE_EIGHT)
    outcome = run("draw", "1 -2 1 -2", "--closure", "--json")
    assert (outcome.status, outcome.errors, outcome.output.count("\n")) == (0, "", 1)
    found = outcome.json
    root = read_picture(picture).root
    assert found == {
        "drawn": "closure",
        "braid": {"strands": 3, "word": [1, -2, 1, -2]},
        "letters": 4,
        "components": 1,
        "direction": "down",
        "width": float(root.attrib["width"]),
        "height": float(root.attrib["height"]),
        "format": "svg",
        "bytes": len(picture) + 1,
        "file": None,
        "picture": picture,
    }
    file = tmp_path / "closure.svg"
    written = run("draw", "1 -2 1 -2", "--closure", "--json", "-o", str(file))
    assert written.json == found | {"file": str(file), "picture": None}
    assert file.stat().st_size == found["bytes"]
    assert run("draw", "2: 1", "--json", "--direction", "right").json["drawn"] == "braid"


def test_json_says_which_proof_was_drawn(run: Runner, proof: Path, tmp_path: Path) -> None:
    """The claim and the number of steps; a page has neither a size nor a direction of its own."""
    claim = {
        "left": {"strands": 2, "word": [1, 1, 1]},
        "right": {"strands": 3, "word": [1, 2, 1, 2]},
        "verdict": "same",
        "symmetry": "identity",
        "valid": True,
        "steps": 2,
        "stages_left_out": 0,
    }
    sheet = run("draw", str(proof), "--json").json
    assert sheet.items() >= claim.items()
    assert (sheet["drawn"], sheet["direction"], sheet["picture"]) == (
        *("proof", "right"),
        draw_proof(SAME),
    )
    file = tmp_path / "proof.html"
    page = run("draw", str(proof), "--page", "--json", "-o", str(file)).json
    assert page.items() >= claim.items()
    assert (page["drawn"], page["format"], page["file"]) == ("page", "html", str(file))
    assert (page["width"], page["height"], page["direction"], page["picture"]) == (None,) * 4
    assert file.stat().st_size == page["bytes"]
    DIFFERENT.save(tmp_path / "different.json")
    found = run("draw", str(tmp_path / "different.json"), "--json").json
    assert (found["verdict"], found["symmetry"], found["steps"]) == ("different", None, 0)


def test_stages_left_out_are_counted(run: Runner, proof: Path, tmp_path: Path) -> None:
    """Standard error says how many of a long proof are not shown, and what shows them."""
    outcome = run("draw", str(proof), "--stages", "2", "-o", str(tmp_path / "proof.svg"))
    assert outcome.errors == (
        "braidsearch draw: 1 stage left out: --stages all draws every one, --page plays them\n"
    )
    assert run("draw", str(proof), "--stages", "2", "--json").json["stages_left_out"] == 1
    assert run("draw", str(proof), "--stages", "all").errors == ""
    shown = run("draw", str(proof), "--stages", "2").output
    assert "... 1 stage left out" in shown


@pytest.mark.parametrize("options", [(), ("--page",)])
def test_false_proofs_are_drawn_with_a_warning(run: Runner, options: Sequence[str]) -> None:
    """Whoever looks for the mistake sees it drawn; nobody takes the picture for a proof."""
    file = str(path_of("rejected", "same-stops-before-the-end"))
    outcome = run("draw", file, *options)
    assert outcome.status == 0
    assert outcome.errors.startswith("braidsearch draw: LINK: drawn as it stands, but rejected: ")
    assert outcome.errors.count("\n") == 1
    assert run("draw", file, "--json", *options).json["valid"] is False


def test_a_reader_that_leaves_is_no_mistake() -> None:
    """A pipe that is closed early ends in silence, and so does an output that is closed."""
    for shell in ('"$@" | true', '"$@" >&-', '"$@" --json >&-'):
        finished = subprocess.run(
            ["sh", "-c", shell, "sh", *command("draw", "1 -2 1 -2")],
            capture_output=True,
            check=False,
            env=environment(),
        )
        assert (finished.returncode, finished.stdout, finished.stderr) == (0, b"", b"")


@pytest.mark.parametrize(
    ("word", "strands", "letters"),
    [("", 1, 0), ("1:", 1, 0), ("3:", 3, 0), ("40: 1 39 -20", 40, 3), ("5 -1 2 " * 100, 6, 300)],
)
def test_unusual_words_are_drawn(run: Runner, word: str, strands: int, letters: int) -> None:
    """No letters, one strand, many strands, hundreds of letters: open, closed, with letters."""
    for options in ([], ["--closure"], ["--letters"], ["--direction", "right"]):
        found = run("draw", word, "--json", *options).json
        assert (found["braid"]["strands"], found["letters"]) == (strands, letters)
        picture = read_picture(found["picture"], is_turned=options == ["--direction", "right"])
        assert len(picture.crossings) == letters
        page = view_box(picture)
        assert all(is_inside(each, page) for each in iter_rectangles(picture))


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
        (["1", "--json", "-o", "-"], "-o -: expected a file, since --json prints the picture"),
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
