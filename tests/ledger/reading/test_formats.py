"""Each format: what may stand in it, and what is made of it."""

import json
from pathlib import Path

import pytest

from braidsearch.invariants import jones_polynomial
from braidsearch.ledger.reading import Row, entry_of, is_certificate_file, iter_rows, read_entries
from braidsearch.words import format_word
from tests.certificates.test_file_format import SAME_TEXT
from tests.diagrams.published import dowker_thistlethwaite_text, planar_diagram_text
from tests.knot_tables import iter_knots
from tests.ledger.reading.catalogues import (
    TREFOIL_CODE,
    dump_lines,
    links,
    messages,
    read,
    write,
)

TREFOIL_ROWS = "1 5 2 4\n3 1 4 6\n5 3 6 2\n"
TRIANGLE = "0.0 0 0\n1 0 0\n0 1 0\n"


class TestTables:
    """Comma-separated values and their kin."""

    def test_columns_in_any_order_and_any_case(self, tmp_path: Path) -> None:
        """Titles are known by their letters alone; cells lose the blanks around them."""
        text = "Note, WORD ,Name\n seen , 1 1 1, ring \n"
        (entry,) = read(tmp_path / "a.csv", text).entries
        assert (entry.name, entry.note, entry.given) == ("ring", "seen", "1 1 1")

    @pytest.mark.parametrize("column", ["link", "braid", "word"])
    def test_words_and_drawings_in_one_column(self, tmp_path: Path, column: str) -> None:
        """A cell is read as an argument of the command line is."""
        rows = ["s1^3", '"[1, 1, 1]"', f'"pd: {TREFOIL_CODE}"', "dt: 4 6 2", "4: 1 2 3"]
        found = links(read(tmp_path / "a.csv", column + "\n" + "\n".join(rows) + "\n"))
        assert list(found.values()) == ["1 1 1"] * 4 + ["1 2 3"]
        assert list(found) == [f"a-{line}" for line in range(2, 7)]

    @pytest.mark.parametrize(
        ("column", "cell"),
        [("pd", TREFOIL_CODE), ("gauss", "O1+ U2+ O3+ U1+ O2+ U3+"), ("dt", "4 6 2")],
    )
    def test_columns_of_codes(self, tmp_path: Path, column: str, cell: str) -> None:
        """The column says the notation, which may stand in front as well; an entry keeps it."""
        text = f'name,{column}\na,"{cell}"\nb,"{column.upper()}: {cell}"\n'
        reading = read(tmp_path / "a.csv", text)
        assert links(reading) == {"a": "1 1 1", "b": "1 1 1"}
        assert {entry.given for entry in reading.entries} == {f"{column}: {cell}"}

    def test_a_column_of_strands(self, tmp_path: Path) -> None:
        """The strand count beside a word is never lost: it says what the closure is."""
        text = "strands,word\n2,1 1\n3,1 1\n,1 1\n4,\n"
        assert list(links(read(tmp_path / "a.csv", text)).values()) == [
            "1 1",
            "3: 1 1",
            "1 1",
            "4:",
        ]

    def test_sources(self, tmp_path: Path) -> None:
        """The column, else what the caller says, else the file's name."""
        text = "word,source\n1,gel\n1,\n"
        assert [e.source for e in read(tmp_path / "a.csv", text).entries] == ["gel", "a.csv"]
        told = read(tmp_path / "a.csv", text, source=" plates ").entries
        assert [e.source for e in told] == ["gel", "plates"]
        blank = read(tmp_path / "a.csv", text, source=" ").entries
        assert [e.source for e in blank] == ["gel", "a.csv"]

    def test_other_columns_are_left_out_on_demand(self, tmp_path: Path) -> None:
        """Refused at once and all together, or ignored."""
        text = "ring,word,steps\na,1 1 1,5\n"
        assert links(read(tmp_path / "a.csv", text, ignore_columns=True)) == {"a": "1 1 1"}

    def test_notes_of_several_lines(self, tmp_path: Path) -> None:
        """A cell in quotes may hold line ends and quotes; lines are counted where rows begin."""
        text = 'word,note\n1,"one\n""two"""\n\n2,\n'
        reading = read(tmp_path / "a.csv", text)
        assert [(e.note, e.line) for e in reading.entries] == [('one\n"two"', 2), ("", 5)]

    @pytest.mark.parametrize("end", ["\n", "\r\n", "\r"])
    def test_line_ends_of_every_system(self, tmp_path: Path, end: str) -> None:
        """Blank lines and rows of empty cells do not count."""
        text = end.join(["", "name,word", "a,1 1 1", "", ",", "b,1", ""])
        reading = read(tmp_path / "a.csv", text)
        assert links(reading) == {"a": "1 1 1", "b": "1"}
        assert [entry.line for entry in reading.entries] == [3, 6]

    def test_tabs(self, tmp_path: Path) -> None:
        """A .tsv file has tabs, and commas in its words."""
        assert links(read(tmp_path / "a.tsv", "name\tword\na\t1,1,1\n")) == {"a": "1 1 1"}


class TestJson:
    """One object a line, or a list of them."""

    def test_links_as_texts_lists_and_objects(self, tmp_path: Path) -> None:
        """A word may be a text, a list of letters, or letters with the strand count."""
        objects = [
            {"link": "1 1 1"},
            {"word": [1, -2, 1, -2]},
            {"braid": {"strands": 4, "word": [1]}},
            {"word": [1], "strands": 3},
            {"link": [], "strands": 2},
            {"braid": {"strands": 1, "word": []}, "note": None},
        ]
        expected = ["1 1 1", "1 -2 1 -2", "4: 1", "3: 1", "2:", "1:"]
        assert list(links(read(tmp_path / "a.jsonl", dump_lines(objects))).values()) == expected
        found = links(read(tmp_path / "a.json", json.dumps(objects)))
        assert found == {f"a-{n}": word for n, word in enumerate(expected, 1)}

    def test_codes_as_lists(self, tmp_path: Path) -> None:
        """Planar diagram codes as lists of lists, other codes as lists of either depth."""
        objects = [
            {"pd": json.loads(TREFOIL_CODE)},
            {"dt": [4, 6, 2]},
            {"gauss": [[1, -2, 3, -1, 2, -3]]},
            {"dt": [[4], [2]]},
        ]
        found = links(read(tmp_path / "a.jsonl", dump_lines(objects)))
        assert list(found.values()) == ["1 1 1", "1 1 1", "1 1 1", "1 1"]

    def test_one_object_alone_and_objects_in_a_row(self, tmp_path: Path) -> None:
        """A .json file need not be a list; a single link is named after the file."""
        assert links(read(tmp_path / "ring.json", '{\n "link": "1 1"\n}')) == {"ring": "1 1"}
        found = read(tmp_path / "ring.json", '{"link": "1 1"}\n\n{"link": "1"}\n')
        assert links(found) == {"ring-1": "1 1", "ring-2": "1"}
        assert [entry.line for entry in found.entries] == [1, 3]

    def test_certificates_are_left_to_the_caller(self, tmp_path: Path) -> None:
        """A certificate, whole or damaged, is told from a catalogue, and never read as one."""
        whole = write(tmp_path / "a.json", SAME_TEXT)
        assert is_certificate_file(whole)
        with pytest.raises(Exception, match="a certificate: expected a catalogue of links"):
            read_entries(whole)
        assert is_certificate_file(write(tmp_path / "b.json", SAME_TEXT[:60]))
        turned = dict(reversed(json.loads(SAME_TEXT).items()))
        assert is_certificate_file(write(tmp_path / "c.json", json.dumps(turned)))
        for content in (b"", b"[]", b'{"link": "1"}', b"\xff", b'{"format": 1}', b"[" * 10**5):
            assert not is_certificate_file(write(tmp_path / "d.json", content))
        assert not is_certificate_file(tmp_path)
        assert not is_certificate_file(tmp_path / "none.json")


class TestLines:
    """One link a line, as on the command line."""

    def test_comments_names_and_blank_lines(self, tmp_path: Path) -> None:
        """A number sign begins a comment, the first equals sign ends a name."""
        text = (
            f"# rings\n\ntrefoil = 1 1 1  # seen twice\n4: 1 2 3\na: b = pd: {TREFOIL_CODE}\n1:\n"
        )
        found = links(read(tmp_path / "a.braids", text))
        assert found == {"trefoil": "1 1 1", "a-4": "1 2 3", "a: b": "1 1 1", "a-6": "1:"}

    def test_a_file_name_may_have_an_equals_sign(self, tmp_path: Path) -> None:
        """Behind a notation there is no name."""
        write(tmp_path / "a=b.xyz", TRIANGLE)
        reading = read(tmp_path / "list.txt", "polygon: a=b.xyz\nc = polygon: a=b.xyz\n")
        assert links(reading) == {"list-1": "1:", "c": "1:"}
        assert {entry.given for entry in reading.entries} == {"polygon: a=b.xyz"}

    def test_one_link_has_the_name_of_the_file(self, tmp_path: Path) -> None:
        """With a second one, each has its line behind."""
        assert links(read(tmp_path / "ring.txt", "\n1 1 1\n")) == {"ring": "1 1 1"}
        assert links(read(tmp_path / "ring", "\n1 1 1\n1\n")) == {"ring-2": "1 1 1", "ring-3": "1"}

    def test_the_notation_of_all_lines(self, tmp_path: Path) -> None:
        """What the caller says of the file holds for what has no notation in front."""
        text = "a = 4 6 2\n4 6 2\n"
        assert set(links(read(tmp_path / "a.txt", text, notation="dt")).values()) == {"1 1 1"}
        table = "name,link\na,4 6 2\nb,gauss: O1+ U1+\n"
        assert links(read(tmp_path / "a.csv", table, notation="dt")) == {"a": "1 1 1", "b": "1:"}
        words = read(tmp_path / "a.pd", "1 1 1\n", notation="braid")
        assert links(words) == {"a": "1 1 1"}


class TestCodes:
    """Files of diagram codes."""

    @pytest.mark.parametrize(
        ("name", "text"),
        [
            ("ring.pd", TREFOIL_CODE),
            ("ring.pd", TREFOIL_CODE.replace(",[", ",\n  [")),
            ("ring.pd", TREFOIL_ROWS),
            ("ring.gauss", "O1+ U2+ O3+ U1+ O2+ U3+"),
            ("ring.dt", "# a comment\n4 6 2\n"),
        ],
    )
    def test_one_code(self, tmp_path: Path, name: str, text: str) -> None:
        """On one line or over many: one link, named after the file."""
        reading = read(tmp_path / name, text)
        assert links(reading) == {"ring": "1 1 1"}
        assert "\n" not in reading.entries[0].given
        assert links(read(tmp_path / "again.txt", reading.entries[0].given)) == {"again": "1 1 1"}

    @pytest.mark.parametrize(
        ("suffix", "code"),
        [("pd", TREFOIL_CODE), ("gauss", "O1+ U2+ O3+ U1+ O2+ U3+"), ("dt", "4 6 2")],
    )
    def test_one_code_a_line(self, tmp_path: Path, suffix: str, code: str) -> None:
        """Lines that are codes by themselves are links of their own, perhaps with names."""
        found = links(read(tmp_path / f"a.{suffix}", f"{code}\n\nb = {code}\n"))
        assert found == {"a-1": "1 1 1", "b": "1 1 1"}

    @pytest.mark.parametrize(("suffix", "text"), [("dt", "4\n2\n"), ("gauss", "1 -2\n-1 2\n")])
    def test_components_on_lines(self, tmp_path: Path, suffix: str, text: str) -> None:
        """Lines that make a code together are components of it: here the Hopf link. The second
        line of the Dowker-Thistlethwaite code would be one by itself, the first would not.
        """
        assert links(read(tmp_path / f"hopf.{suffix}", text)) == {"hopf": "1 1"}

    def test_what_a_code_leaves_open_is_kept(self, tmp_path: Path) -> None:
        """The entry says that the mirror image was forgotten, or how a drawing was simplified."""
        (entry,) = read(tmp_path / "a.dt", "4 6 2").entries
        assert "forgets the mirror image" in entry.remarks[0]
        (entry,) = read(tmp_path / "a.pd", "[[1,1,2,2]]").entries
        assert entry.remarks == ("the diagram was simplified from 1 crossings to 0",)

    def test_codes_in_files_of_their_own(self, tmp_path: Path) -> None:
        """``@FILE`` counts from the folder of the catalogue; the entry keeps the code itself."""
        (tmp_path / "inner").mkdir()
        write(tmp_path / "inner" / "trefoil.pd", TREFOIL_ROWS)
        reading = read(tmp_path / "inner" / "list.csv", "pd\n@trefoil.pd\n")
        assert links(reading) == {"list": "1 1 1"}
        assert reading.entries[0].given == "pd: 1 5 2 4; 3 1 4 6; 5 3 6 2"


class TestPolygons:
    """Files that are one link in space."""

    @pytest.mark.parametrize(
        ("name", "text"),
        [
            ("ring.xyz", TRIANGLE.replace("0.0", "0")),
            ("ring.polygon", TRIANGLE),
            ("ring.txt", TRIANGLE),
            ("ring.txt", "x y z\n" + TRIANGLE.replace("0.0", "0")),
            ("ring.csv", "x,y,z\n0,0,0\n1,0,0\n0,1,0\n"),
        ],
    )
    def test_the_whole_file(self, tmp_path: Path, name: str, text: str) -> None:
        """Known by the suffix, or by a first line that no braid word can be."""
        reading = read(tmp_path / name, text)
        assert links(reading) == {"ring": "1:"}
        assert reading.entries[0].given == f"polygon: {name}"

    def test_on_demand(self, tmp_path: Path) -> None:
        """Rows of integers are braid words unless the caller says otherwise."""
        text = "5 1 1\n1 2 3\n1 3 4\n"
        assert len(read(tmp_path / "a.txt", text).entries) == 3
        assert links(read(tmp_path / "a.txt", text, notation="polygon")) == {"a": "1:"}

    def test_named_in_a_table(self, tmp_path: Path) -> None:
        """A column of file names, which count from the table's folder."""
        write(tmp_path / "one.xyz", TRIANGLE)
        reading = read(tmp_path / "list.csv", "name,polygon\na,one.xyz\nb,polygon: one.xyz\n")
        assert links(reading) == {"a": "1:", "b": "1:"}
        assert {entry.given for entry in reading.entries} == {"polygon: one.xyz"}

    def test_the_entry_is_made_of_the_row_alone(self, tmp_path: Path) -> None:
        """Once a row has been read, the file of its polygons may go."""
        write(tmp_path / "one.xyz", TRIANGLE)
        (row,) = iter_rows(write(tmp_path / "list.csv", "polygon\none.xyz\n"))
        (tmp_path / "one.xyz").unlink()
        assert isinstance(row, Row)
        assert format_word(entry_of(row).braid) == "1:"


def test_the_published_table_as_a_catalogue(tmp_path: Path) -> None:
    """The knots to 7 crossings of the published table (Livingston, Moore, KnotInfo), each with its
    word, its planar diagram code and its Dowker-Thistlethwaite code: every entry has the Jones
    polynomial of its row, by the last code perhaps that of the mirror image.
    """
    rows = list(iter_knots(7))
    words = "".join(f'{row.name},"{row.columns["braid_notation"]}"\n' for row in rows)
    codes = dump_lines({"name": row.name, "pd": planar_diagram_text(row)} for row in rows)
    numbers = "".join(f"{row.name} = {dowker_thistlethwaite_text(row)}\n" for row in rows)
    readings = [
        read(tmp_path / "words.csv", "name,word\n" + words),
        read(tmp_path / "codes.jsonl", codes),
        read(tmp_path / "numbers.dt", numbers),
    ]
    assert [messages(reading) for reading in readings] == [[], [], []]
    for number, reading in enumerate(readings):
        for row, entry in zip(rows, reading.entries, strict=True):
            found = jones_polynomial(entry.braid)
            mirrored = sorted([-exponent, c] for exponent, c in row.jones)
            assert entry.name == row.name
            assert found == row.jones or (number == 2 and found == mirrored)
