"""Drawings and curves in space, wherever a command takes a braid; and what is no drawing."""

import io
from pathlib import Path
from typing import Any

import numpy as np
import pytest

from braidsearch import parse_word
from braidsearch.invariants import jones_polynomial
from tests.command_line.running import Runner, run_process
from tests.diagrams.published import dowker_thistlethwaite_text, planar_diagram_text
from tests.knot_tables import TableRow, iter_knots

NOTATIONS = ("pd", "gauss", "dt", "polygon")
TITLES = {
    "pd": "planar diagram code, 4 crossings",
    "gauss": "Gauss code, 4 crossings",
    "dt": "Dowker-Thistlethwaite code, 4 crossings",
    "polygon": "polygons in space, ",
}
FORGETFUL = {
    "gauss": "note: a Gauss code without crossing signs forgets the mirror image",
    "dt": "note: a Dowker-Thistlethwaite code forgets the mirror image",
}
COMMANDS = ("compare", "invariants", "tighten", "symmetry", "normalise", "weave")
NAMES = {"compare": "LEFT", "weave": "LINK"}


def figure_eight_curve(count: int) -> str:
    """The figure eight knot as a curve on a torus that is turned twice as it closes."""
    t = 2 * np.pi * np.arange(count) / count
    radius = 2 + np.cos(2 * t)
    rows = np.stack([radius * np.cos(3 * t), radius * np.sin(3 * t), np.sin(4 * t)], axis=1)
    return "\n".join(" ".join(map(str, row)) for row in rows.tolist()) + "\n"


@pytest.fixture(scope="module")
def figure_eight() -> TableRow:
    """The row of the figure eight knot, which is its mirror image, so that no code errs on it."""
    return next(row for row in iter_knots(4) if row.name == "4_1")


@pytest.fixture
def texts(figure_eight: TableRow, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Any:
    """The figure eight knot in every notation: three codes of the published table
    (Livingston, Moore, KnotInfo), and a file of coordinates in the current folder.
    """
    monkeypatch.chdir(tmp_path)
    Path("ring.csv").write_text(figure_eight_curve(60), encoding="utf-8")
    return {
        "pd": f"pd: {planar_diagram_text(figure_eight)}",
        "gauss": f"gauss: {figure_eight.columns['gauss_notation']}",
        "dt": f"dt: {dowker_thistlethwaite_text(figure_eight)}",
        "polygon": "polygon: ring.csv",
    }


class TestEveryNotationInEveryCommand:
    """What a command says of the drawing is what it says of the table's braid word."""

    @pytest.mark.parametrize("notation", NOTATIONS)
    def test_compare(self, run: Runner, texts: Any, notation: str, figure_eight: TableRow) -> None:
        """A drawing on either side is proven to be the table's closed braid."""
        word = " ".join(map(str, figure_eight.braid.word))
        for arguments in ((texts[notation], word), (word, texts[notation])):
            outcome = run("compare", *arguments, "--json")
            assert (outcome.status, outcome.json["outcome"]) == (0, "same")
        assert run("compare", texts[notation], "1 1 1").status == 1

    @pytest.mark.parametrize("notation", NOTATIONS)
    def test_invariants(
        self, run: Runner, texts: Any, notation: str, figure_eight: TableRow
    ) -> None:
        """Jones and HOMFLY-PT polynomials and the signature of the table."""
        found = run("invariants", texts[notation], "--json").json
        assert found["jones"] == figure_eight.jones
        assert found["homfly"] == figure_eight.homfly
        assert found["signature"] == figure_eight.signature

    @pytest.mark.parametrize("notation", NOTATIONS)
    def test_tighten(self, run: Runner, texts: Any, notation: str, figure_eight: TableRow) -> None:
        """Three strands, the braid index of the table, and four letters."""
        found = run("tighten", texts[notation], "--json").json
        assert found["braid"]["strands"] == int(figure_eight.columns["braid_index"])
        assert len(found["braid"]["word"]) == figure_eight.crossings

    @pytest.mark.parametrize("notation", NOTATIONS)
    def test_symmetry(self, run: Runner, texts: Any, notation: str, figure_eight: TableRow) -> None:
        """Fully amphicheiral, as the table says."""
        assert figure_eight.columns["symmetry_type"].strip() == "fully amphicheiral"
        outcome = run("symmetry", texts[notation])
        assert outcome.output.startswith("symmetry: fully amphicheiral")

    @pytest.mark.parametrize("notation", NOTATIONS)
    def test_normalise(self, run: Runner, texts: Any, notation: str) -> None:
        """The woven word, which standard error says, is the word that is normalised."""
        outcome = run("normalise", texts[notation], "--json")
        word = outcome.errors.splitlines()[0].rsplit(": ", 1)[1]
        assert outcome.json == run("normalise", word, "--json").json

    @pytest.mark.parametrize("notation", NOTATIONS)
    def test_weave(self, run: Runner, texts: Any, notation: str, figure_eight: TableRow) -> None:
        """The woven word has the Jones polynomial of the table."""
        first, second = run("weave", texts[notation]).output.splitlines()[:2]
        assert second.startswith(f"from: {TITLES[notation]}")
        assert jones_polynomial(parse_word(first.removeprefix("woven: "))) == figure_eight.jones


@pytest.mark.parametrize("notation", NOTATIONS)
def test_the_word_and_the_notes_stand_on_standard_error(
    run: Runner, texts: Any, notation: str
) -> None:
    """The argument by name, its notation, the word; and what a code forgets, where it does."""
    outcome = run("compare", "1 1 1", texts[notation], "--json")
    woven, *notes = outcome.errors.splitlines()
    assert woven.startswith(f"RIGHT: woven from its {TITLES[notation]}")
    wanted = [f"RIGHT: {FORGETFUL[notation]}"] if notation in FORGETFUL else []
    assert [note[: len(wanted[0])] for note in notes if "forgets" in note] == wanted
    assert outcome.json["certificate"]["right"]["strands"] == 3


@pytest.mark.parametrize("notation", NOTATIONS)
def test_prefixes_in_capitals_and_without_blanks(run: Runner, texts: Any, notation: str) -> None:
    """``PD:...`` is ``pd: ...``."""
    prefix, text = texts[notation].split(": ")
    assert run("weave", f" {prefix.upper()} :{text} ") == run("weave", texts[notation])


@pytest.mark.parametrize("notation", NOTATIONS)
@pytest.mark.parametrize("command", COMMANDS)
def test_files_and_standard_input(
    run: Runner, texts: Any, monkeypatch: pytest.MonkeyPatch, command: str, notation: str
) -> None:
    """``@FILE`` and ``-`` say the same as the text itself; a polygon's file may have the @ too."""
    prefix, text = texts[notation].split(": ")
    if notation == "polygon":
        text = Path(text).read_text(encoding="utf-8")
    Path("code.txt").write_text(f"\ufeff{text}\n", encoding="utf-8")
    behind = ["1 1 1"] if command == "compare" else []
    given = run(command, texts[notation], *behind)
    assert given.status in (0, 1)
    monkeypatch.setattr("sys.stdin", io.StringIO(text))
    for source in ("@code.txt", "@ code.txt", "-"):
        assert run(command, f"{prefix}: {source}", *behind) == given


def test_standard_input_of_a_process(texts: Any) -> None:
    """A pipe with a planar diagram code, as a shell makes it."""
    text = texts["pd"].removeprefix("pd: ")
    outcome = run_process("compare", "pd: -", "1 -2 1 -2", input=text)
    assert outcome.status == 0
    assert outcome.errors.startswith("LEFT: woven from its planar diagram code, 4 crossings: ")


def test_standard_input_is_read_once(run: Runner) -> None:
    """Both sides from standard input are refused, with a notation in front or without."""
    for left, right in (("pd: -", "dt:-"), ("-", "polygon: -"), ("gauss: -", "-")):
        line = run.fail("compare", left, right)
        assert f"RIGHT: {right}: expected a word, since LEFT reads standard input already" in line


FILES = {
    "empty.txt": b"",
    "binary.txt": b"\xff\xfe\x00",
    "two.txt": b"0 0 0\n1 0 0\n",
    "closed.txt": b"0 0 0\n1 0 0\n0 0 0\n",
    "short.txt": b"0 0 0\n1 0\n0 1 0\n",
    "word.txt": b"x,y,z\n0 0 0\n1 0 zero\n0 1 0\n",
    "infinite.txt": b"0 0 0\n1 0 inf\n0 1 0\n",
    "meets.txt": b"0 0 0\n2 2 0\n2 0 0\n0 2 0\n",
    "touch.txt": b"0 0 0\n4 0 0\n0 4 0\n\n2 0 0\n5 0 5\n2 0 5\n",
    "twice.txt": b"0 0 0\n1 0 0\n1 0 0\n0 1 0\n",
    "code.txt": b"[[1,5,2,4],[3,1,4,6],[5,3,6,2]]",
}

FOUR_LABELS = "expected four arc labels for each crossing"
NOT_DRAWN = "expected integers such as 1 -2 or sigma notation"
BAD_INPUTS = [
    ("pd: [[1,5,2,4],[3,1,4,6],[5,3,6,7]]", "arc label 2 used once: expected every label at two"),
    ("pd: [[1,5,2,4],[3,1,4,6],[5,3,6]]", f"[5, 3, 6] as a crossing: {FOUR_LABELS}"),
    ("pd: [[1,2,1,2]]", "1 crossing in all: expected a planar diagram"),
    ("pd: [[1,4,2,5],[3,1,4,6],[5,3,6,2]]", "3 crossings in all: expected a planar diagram"),
    ("pd: [[2,5,1,4],[3,1,4,6],[5,3,6,2]]", "arcs 2 and 4 of one component: expected every under"),
    ("pd: [[1,5,2,4],[3,1,4,6],[5,3,6,2]", f"'[' without its partner: {FOUR_LABELS}"),
    ("pd: four", f"'four': {FOUR_LABELS}"),
    ("pd:", f"an empty text: {FOUR_LABELS}"),
    ("pd: @empty.txt", f"an empty text: {FOUR_LABELS}"),
    ("pd: @binary.txt", "'binary.txt': expected a file of text in UTF-8"),
    ("pd: @nowhere.txt", "'nowhere.txt': No such file or directory: expected a file"),
    ("pd: @.", "'.': Is a directory: expected a file"),
    ("pd: @", "'@': expected the name of a file behind it"),
    ("gauss: O1+ U2+ O3+ U1+ O2+", "crossing 3 passed over only: expected every crossing once"),
    ("gauss: 1 -2 -1 2", "a code of 2 crossings that no planar diagram has: expected the code of"),
    ("gauss: O1+ U1-", "'U1-': expected the same sign at both passages of 1"),
    ("gauss: ", "an empty text: expected passages such as O1+ U2+"),
    ("dt: 4 5 2", "5: expected even numbers such as 4 6 2"),
    ("dt: 4 6 8 10 2", "a code of 5 crossings that no planar diagram has: expected the code of"),
    ("dt: 4 4 2", "4: expected every even number once, found 4 twice"),
    ("dt: \n", "an empty text: expected even numbers such as 4 6 2"),
    ("polygon: two.txt", "component from line 1: 2 points: expected at least three"),
    ("polygon: closed.txt", "component from line 1: 2 points: expected at least three"),
    ("polygon: short.txt", "line 2: '1 0': expected three finite numbers x y z"),
    ("polygon: word.txt", "line 3: '1 0 zero': expected three finite numbers x y z"),
    ("polygon: infinite.txt", "line 2: '1 0 inf': expected three finite numbers x y z"),
    (
        "polygon: meets.txt",
        "the edge from row 1 of component 1 meets the one from row 3 of component 1: expected "
        "polygons that meet neither themselves nor each other",
    ),
    (
        "polygon: touch.txt",
        "the edge from row 1 of component 1 meets the one from row 1 of component 2: expected",
    ),
    ("polygon: twice.txt", "component 1, row 3: the same point as the row before: expected"),
    ("polygon: empty.txt", "no polygon: expected rows x y z, a blank line between polygons"),
    ("polygon: nowhere.txt", "'nowhere.txt': No such file or directory: expected a file"),
    ("polygon: binary.txt", "'binary.txt': expected a file of text in UTF-8"),
    ("polygon: ", "polygon: expected the name of a file with rows x y z, or -"),
    ("polygon: a\0b", "expected a file"),
    ("polygon: " + "long/" * 2_000, "long/': File name too long: expected a file"),
    ("knot: 4 6 2", "'knot' before the colon: expected a strand count, or a notation: pd, gauss"),
    ("pdcode: [[1,5]]", "'pdcode' before the colon: expected a strand count, or a notation: pd"),
    ("[[1,5,2,4],[3,1,4,6],[5,3,6,2]]", f"'[1': {NOT_DRAWN} such as s1 s2^-1; a drawing has"),
    ("O1+ U2+ O3+ U1+ O2+ U3+", f"'O1+': {NOT_DRAWN} such as s1 s2^-1; a drawing has its notation"),
    ("code.txt", f"'code.txt': {NOT_DRAWN} such as s1 s2^-1; a file has its notation in front"),
]


@pytest.fixture
def files(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """The files that are no polygons, in the current folder."""
    monkeypatch.chdir(tmp_path)
    for name, content in FILES.items():
        Path(name).write_bytes(content)


@pytest.mark.usefixtures("files")
@pytest.mark.parametrize("command", COMMANDS)
def test_what_is_no_drawing_gets_one_line(run: Runner, command: str) -> None:
    """The argument by name, the offending text, what was expected; one line, exit status 2."""
    for text, said in BAD_INPUTS:
        behind = ["1"] if command == "compare" else []
        line = run.fail(command, text, *behind)
        assert line.startswith(f"braidsearch {command}: {NAMES.get(command, 'WORD')}: ")
        assert said in line, text
        assert "expected" in line
        assert "internal error" not in line
        if command == "compare":
            assert run.fail(command, "1", text) == line.replace("LEFT: ", "RIGHT: ", 1)


def test_bad_words_are_no_drawings(run: Runner) -> None:
    """A mistyped word is told what a word is, without a hint at drawings."""
    line = run.fail("weave", "1 -2 x")
    assert line == f"braidsearch weave: LINK: 'x': {NOT_DRAWN} such as s1 s2^-1"
