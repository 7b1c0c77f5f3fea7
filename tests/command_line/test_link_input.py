"""Links as texts: what stands in front of them, and which file they name."""

import io
from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from braidsearch.command_line.link_input import (
    is_standard_input,
    read_drawing,
    read_link_argument,
    read_undrawn_argument,
)
from braidsearch.diagrams import (
    format_dowker_thistlethwaite_code,
    format_gauss_code,
    format_planar_diagram_code,
)
from braidsearch.diagrams.link_diagram import LinkDiagram
from braidsearch.errors import InputError
from braidsearch.weaving.drawings import TITLES, draw_closed_braid, parse_drawing, weave_drawing
from braidsearch.words import Braid, format_sigma, format_word
from braidsearch.words.link_notation import (
    PREFIXES,
    WORD,
    named_file,
    read_named_file,
    split_notation,
)
from tests.strategies import braids, link_diagrams

FORMATS = {
    "pd": format_planar_diagram_code,
    "gauss": format_gauss_code,
    "dt": format_dowker_thistlethwaite_code,
}


@given(braids())
def test_words_have_no_notation(braid: Braid) -> None:
    """Every way to write a word down is a braid word, and no drawing."""
    for text in (format_word(braid), format_sigma(braid), f"{braid.strands}:{list(braid.word)}"):
        assert split_notation(text) == (WORD, text)
        assert read_drawing("LINK", text) is None
        assert read_link_argument("LINK", text or "1:") == braid


@given(link_diagrams(), st.sampled_from(sorted(FORMATS)), st.sampled_from(["", " ", "\n "]))
def test_drawings_have_theirs_in_front(diagram: LinkDiagram, prefix: str, blanks: str) -> None:
    """The notation is found in small letters and capitals, and the code is left as it was."""
    code = FORMATS[prefix](diagram)
    for shown in (prefix, prefix.upper(), f" {prefix.title()} "):
        text = f"{shown}:{blanks}{code}{blanks}"
        assert split_notation(text) == (PREFIXES[prefix], code)
        drawing = read_drawing("LINK", text)
        assert drawing is not None
        assert drawing == parse_drawing(PREFIXES[prefix], code)
        assert drawing.title.startswith(TITLES[PREFIXES[prefix]])


@given(braids(max_strands=4, max_letters=8))
def test_a_closed_braid_is_a_drawing_of_itself(braid: Braid) -> None:
    """Its components are those of the braid, in their order; woven, it has as many."""
    drawing = draw_closed_braid(braid)
    assert sorted(drawing.order) == list(range(braid.components))
    assert len(drawing.diagram.crossings) == len(braid)
    assert weave_drawing(drawing).braid.components == braid.components


@pytest.mark.parametrize(
    ("notation", "body", "path"),
    [
        ("polygon", "a b.xyz", "a b.xyz"),
        ("polygon", "@ a.xyz", "a.xyz"),
        ("gauss", "@a.txt", "a.txt"),
        ("gauss", "O1+ U1+", None),
        ("planar-diagram", "[[1,1,2,2]]", None),
    ],
)
def test_named_files(notation: str, body: str, path: str | None) -> None:
    """Polygons always stand in a file, codes behind an @."""
    assert named_file(notation, body) == path


def test_a_file_needs_a_name() -> None:
    """An @ alone names none, and polygons without a file are none."""
    for notation, body in (("gauss", "@"), ("polygon", "@"), ("polygon", ""), ("polygon", "@ ")):
        with pytest.raises(InputError, match="expected the name of a file"):
            named_file(notation, body)


def test_named_files_are_bounded(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """A file without an end is not read to its end."""
    monkeypatch.setattr("braidsearch.words.link_notation.MAX_FILE", 5)
    (tmp_path / "a.txt").write_text("\ufeff12345", encoding="utf-8")
    assert read_named_file(tmp_path / "a.txt") == "12345"
    (tmp_path / "a.txt").write_text("123456", encoding="utf-8")
    with pytest.raises(InputError, match="expected at most 5 characters"):
        read_named_file(tmp_path / "a.txt")


def test_standard_input(monkeypatch: pytest.MonkeyPatch) -> None:
    """A lone -, or one behind a notation; a name that is no notation reads nothing."""
    assert all(map(is_standard_input, ("-", "pd: -", "Polygon:-")))
    assert not any(map(is_standard_input, ("-1", "pd: -1", "knot: -", "", "4: -")))
    monkeypatch.setattr("sys.stdin", io.StringIO("1 1 1"))
    assert read_undrawn_argument("LEFT", "-") == Braid([1, 1, 1])


def test_mistakes_name_the_argument() -> None:
    """The argument stands in front of every message."""
    for text in ("x", "knot: 1", "pd: [[1,2]]", "polygon: ", "dt: 3", "gauss: @"):
        with pytest.raises(InputError, match=r"^LEFT: .*expected"):
            read_link_argument("LEFT", text)
