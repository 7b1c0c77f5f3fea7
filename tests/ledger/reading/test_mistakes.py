"""What is wrong with a file, in one line each: the place, the offending text, what was expected."""

import csv
import json
import os
from pathlib import Path
from typing import Any

import pytest

from braidsearch.errors import InputError
from braidsearch.ledger.reading import (
    Problem,
    Row,
    entry_of,
    format_problems,
    iter_outcomes,
    iter_rows,
    outcome_of,
    read_entries,
)
from tests.ledger.reading.catalogues import dump_lines, messages, read, write

WHOLE_FILES: list[tuple[str, bytes, str]] = [
    ("a.csv", b"", "a.csv: no links: expected at least one"),
    ("a.csv", b"\n \n", "a.csv: no links: expected at least one"),
    ("a.csv", b"name,word\n", "a.csv: no links: expected at least one"),
    ("a.json", b"", "a.json: no links: expected at least one"),
    ("a.json", b"[]", "a.json: no links: expected at least one"),
    ("a.jsonl", b"\n", "a.jsonl: no links: expected at least one"),
    ("a.txt", b"# nothing\n", "a.txt: no links: expected at least one"),
    ("a.pd", b"", "a.pd: no links: expected at least one"),
    ("a.txt", b"1 1 1\n1 \xe9\n", "a.txt, line 2: byte 0xe9: expected a file of text in UTF-8"),
    ("a.csv", "name,word\n\u00e9,1\n".encode("utf-16"), "a.csv, line 1: byte 0xff: expected a"),
    ("a.json", b'[{"link": "1"},\n\xff]', "a.json, line 2: byte 0xff: expected a file of text in"),
    ("a.csv", b"word\n1\n1\0\n", "a.csv, line 3: byte 0x00: expected a file of text in UTF-8"),
    ("a.jsonl", b'{"link": "1\0"}', "a.jsonl, line 1: byte 0x00: expected a file of text in UTF-8"),
    ("a.xyz", b"0 0 0\n1 0 \xff\n", "a.xyz, line 2: byte 0xff: expected a file of text in UTF-8"),
    (
        "a.csv",
        b"trefoil,1 1 1\n",
        "a.csv, line 1: columns 'trefoil', '1 1 1': expected one column for the link (link, braid, "
        "word, pd, gauss, dt, polygon) and, as you like, name, source, note, strands",
    ),
    ("a.csv", b"name,note\na,b\n", "line 1: columns 'name', 'note': expected one column for the"),
    ("a.csv", b"word,pd\n1,\n", "line 1: columns 'word', 'pd': expected one column for the link"),
    ("a.csv", b"\nword,Word\n1,1\n", "a.csv, line 2: two columns 'word': expected each once"),
    (
        "a.csv",
        b"ring,word,steps\na,1,2\n",
        "line 1: columns 'ring', 'steps': expected one column for the link (link, braid, word, pd, "
        "gauss, dt, polygon) and, as you like, name, source, note, strands; "
        "--ignore-columns leaves others out",
    ),
    ("a.csv", b'word,"note\n1,\n', "a.csv, line 1: a quote that is left open: expected a closing"),
    (
        "a.csv",
        b"x" * 10_000_001,
        "a.csv, line 1: a cell of more than 10000000 characters: expected",
    ),
    ("a.txt", b"1 " * 10_000_001, "a.txt, line 1: expected lines of fewer than 20000000"),
    (
        "a.csv",
        b"c" + b",c" * 40,
        "columns 'c', 'c', 'c', 'c', 'c', 'c', 'c', 'c', 33 more: expected",
    ),
]


@pytest.mark.parametrize(("name", "content", "said"), WHOLE_FILES)
def test_what_makes_a_whole_file_unreadable(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, name: str, content: bytes, said: str
) -> None:
    """An error that names the file, and the line where there is one."""
    monkeypatch.chdir(tmp_path)
    with pytest.raises(InputError) as caught:
        read(Path(name), content)
    assert said in str(caught.value)
    assert str(caught.value).isprintable()


def test_files_that_are_none(tmp_path: Path) -> None:
    """A folder, a file that is not there, one that may not be read, a name that none can have."""
    for path, said in [
        (tmp_path, "Is a directory: expected a file"),
        (tmp_path / "none.csv", "No such file or directory: expected a file"),
        (tmp_path / "a\0b" / "c.txt", "embedded null byte: expected a file"),
    ]:
        with pytest.raises(InputError, match=said):
            read_entries(path)
    if os.geteuid():
        write(tmp_path / "a.csv", "word\n1\n").chmod(0)
        with pytest.raises(InputError, match="Permission denied: expected a file"):
            read_entries(tmp_path / "a.csv")


@pytest.mark.parametrize(
    ("options", "said"),
    [
        ({"notation": "knot"}, "notation 'knot': expected one of braid, pd, gauss, dt, polygon"),
        ({"source": "a\tb"}, r"source 'a\tb': expected no control characters"),
        ({"source": "a" * 201}, "source 'aaa"),
    ],
)
def test_what_the_caller_may_not_say(tmp_path: Path, options: dict[str, Any], said: str) -> None:
    """Refused before the file is opened."""
    with pytest.raises(InputError) as caught:
        read_entries(tmp_path / "none.csv", **options)
    assert said in str(caught.value)


TABLE_ROWS = [
    ("a,1 ? 1,", "line 2: '?': expected integers such as 1 -2 or sigma notation"),
    ("a,1", "line 2: 'a,1': 2 cells: expected 3, as in the first line"),
    (
        "a,1,1,1",
        "line 2: 'a,1,1,1': 4 cells: expected 3, as in the first line; one with ',' in it stands "
        "in quotes",
    ),
    ("a,,", 'line 2: no link: expected a braid word such as "1 -2 1" (an empty one with its '),
    ("a,5: 7,", "line 2: letter 7: expected an index from 1 to 4 on 5 strands"),
    ("a,0,", "line 2: '0': expected a non-zero index, since there is no sigma_0"),
    ("a,-,", "line 2: '-': expected integers such as 1 -2"),
    ("a,pd: -,", "line 2: '-': expected a code or the name of a file, not standard input"),
    ("a,pd:,", 'line 2: no link: expected a braid word such as "1 -2 1"'),
    ("a,knot: 1,", "line 2: 'knot' before the colon: expected a strand count, or a notation: pd"),
    ("a,dt: 4 5 2,", "line 2: 5: expected even numbers such as 4 6 2"),
    ("a,pd: @none,", "none': No such file or directory: expected a file"),
    ("a,polygon: none.xyz,", "none.xyz': No such file or directory: expected a file"),
    (
        "a,polygon: two.xyz,",
        "line 2: 'two.xyz': component from line 1: 2 points: expected at least",
    ),
    (
        "a,O1+ U1+,",
        "'O1+': expected integers such as 1 -2 or sigma notation such as s1 s2^-1; a dr",
    ),
    (f"{'a' * 201},1,", f"line 2: name '{'a' * 37}...': expected at most 200 characters"),
    ("a\x07,1,", r"line 2: name 'a\x07': expected no control characters"),
    ("a\u202eb,1,", r"line 2: name 'a\u202eb': expected no control characters"),
    ('"a\nb",1,', r"line 2: name 'a\nb': expected no control characters"),
    ("a,1,\x1b[0m", r"line 2: note '\x1b[0m': expected no control characters"),
    (f"a,1,{'n' * 10_001}", f"line 2: note '{'n' * 37}...': expected at most 10000 characters"),
    ('"a"b,1,', "line 2: text behind a closing quote: expected a delimiter"),
    ('a,"1,\nb,1,\n', "line 2: a quote that is left open: expected a closing one before the end"),
]


@pytest.mark.parametrize(("row", "said"), TABLE_ROWS)
def test_rows_of_a_table(tmp_path: Path, row: str, said: str) -> None:
    """One problem, and the rows around it are read, unless an open quote has swallowed them."""
    write(tmp_path / "two.xyz", "0 0 0\n1 0 0\n")
    reading = read(tmp_path / "a.csv", f"name,word,note\n{row}\nlast,1 1 1,\n")
    (message,) = messages(reading)
    assert said in message
    assert message.isprintable()
    assert [entry.name for entry in reading.entries] == ["last"] * (row.count('"') % 2 == 0)


STRANDS = [
    ("x,1", "'x' strands: expected an integer of at least 1"),
    ("0,1", "'0' before the colon: expected a strand count of at least 1"),
    ("2,3: 1", "'3: 1' beside '2' strands: expected a plain word"),
    ("2,dt: 4 6 2", "'4 6 2' beside '2' strands: expected a plain word"),
    ("2,1 2", "letter 2: expected an index from 1 to 1 on 2 strands"),
]


@pytest.mark.parametrize(("row", "said"), STRANDS)
def test_strand_counts(tmp_path: Path, row: str, said: str) -> None:
    """A strand count belongs to a plain word that it fits."""
    (message,) = messages(read(tmp_path / "a.csv", f"strands,word\n{row}\n"))
    assert message == f"line 2: {said}"


OBJECTS = [
    ("1", '1: expected an object such as {"name": "trefoil", "link": "1 1 1"}'),
    ('["1 1 1"]', '["1 1 1"]: expected an object such as'),
    ("{}", "columns none: expected one column for the link"),
    ('{"link": "1", "link": "2"}', "key 'link' twice: expected each key once"),
    ('{"link": "1", "Link": "2"}', "two columns 'link': expected each once"),
    ('{"link": "1", "word": "2"}', "columns 'link', 'word': expected one column for the link"),
    ('{"link": "1", "steps": 5}', "column 'steps': expected one column for the link"),
    ('{"link": NaN}', "NaN: expected JSON, which has no such number"),
    ('{"link": -Infinity}', "-Infinity: expected JSON, which has no such number"),
    ('{"link": 1}', "link 1: expected a text, a list of letters, or"),
    ('{"link": null}', "link null: expected a text, a list of letters, or"),
    ('{"word": [1, true]}', "word: true: expected integers as letters"),
    ('{"word": [1, 1.0]}', "word: 1.0: expected integers as letters"),
    ('{"word": ["1"]}', "word: '1': expected integers as letters"),
    ('{"word": []}', "no link: expected a braid word"),
    ('{"word": [0]}', "'0': expected a non-zero index, since there is no sigma_0"),
    ('{"braid": {"word": [1]}}', 'braid {"word": [1]}: expected a text, a list of letters, or'),
    ('{"braid": {"strands": 1.5, "word": [1]}}', "strands 1.5: expected an integer of at least 1"),
    ('{"braid": {"strands": 0, "word": []}}', "strands 0: expected an integer of at least 1"),
    ('{"braid": {"strands": 2, "word": [1]}, "strands": 2}', "2 strands and 2 strands: expected"),
    ('{"word": "1", "strands": "2"}', "strands '2': expected an integer of at least 1"),
    ('{"pd": [[1, 5, 2, 4.0]]}', "pd [[1, 5, 2, 4.0]]: expected a text, or lists of integers"),
    ('{"pd": [[[1]]]}', "pd [[[1]]]: expected a text, or lists of integers"),
    ('{"polygon": [[0, 0, 0]]}', "polygon [[0, 0, 0]]: expected the name of a file"),
    ('{"link": "1", "name": 5}', "name 5: expected a text"),
    ('{"link": "1", "name": "\\ud800"}', r"name '\ud800': expected no control characters"),
    ('{"link": "\\ud800"}', r"'\ud800': expected integers such as 1 -2"),
    ('{"link": ' + "9" * 5000 + "}", "an integer of thousands of digits: expected less"),
    ('{"link": ' + "[" * 100_000 + "}", "lists nested too deeply: expected a few levels"),
]


@pytest.mark.parametrize(("text", "said"), OBJECTS)
def test_objects(tmp_path: Path, text: str, said: str) -> None:
    """A problem with its line; in a list with the number of the object too, as often it is one
    line; the objects around it are read, if the syntax lets their beginning be found.
    """
    around = json.dumps({"name": "ring", "link": "1 1 1"})
    lines = read(tmp_path / "a.jsonl", f"{text}\n{around}\n")
    (message,) = messages(lines)
    assert message.startswith(f"line 1: {said}")
    assert message.isprintable()
    assert [entry.name for entry in lines.entries] == ["ring"]
    (message,) = messages(read(tmp_path / "a.json", f"[{around},\n{text}, {around}]"))
    assert message.removeprefix("line 2").removeprefix(", object 2").startswith(f": {said}")


SYNTAX = [
    ('[{"link": "1"}', "line 1: 'the end' in column 15: expected JSON (',' is missing)"),
    ('[{"link": "1"} {"link": "2"}]', 'line 1: \'{"link": "2"}]\' in column 16: expected JSON'),
    ('[{"link": "1"},]', "line 1: ']' in column 16: expected JSON (an object is missing)"),
    ('[{"link": "1"}] 7', "line 1: '7': expected a list, and nothing behind it"),
    ('[\n{"link": "1"},\n{"link" "1"}]', "line 3: '\"1\"}]' in column 9: expected JSON"),
    ('{"link": "1"} nonsense', "line 1: 'nonsense' in column 15: expected JSON"),
]


@pytest.mark.parametrize(("text", "said"), SYNTAX)
def test_syntax_of_json_files(tmp_path: Path, text: str, said: str) -> None:
    """The place and the text where the syntax is broken, so that nothing is left out unsaid."""
    (message,) = messages(read(tmp_path / "a.json", text))
    assert message.startswith(said)


def test_syntax_of_json_lines(tmp_path: Path) -> None:
    """A broken line is one problem, and the next line is read."""
    reading = read(tmp_path / "a.jsonl", '{"link": "1"\n{"link": "1 1"}\n')
    assert messages(reading) == [
        "line 1: 'the end' in column 13: expected JSON (Expecting ',' delimiter)"
    ]
    assert len(reading.entries) == 1


def test_lines_and_codes(tmp_path: Path) -> None:
    """Lines without a name before the equals sign or a link behind it, and codes that are none."""
    found = messages(read(tmp_path / "a.txt", "= 1\nb =\nc = pd: [[1,2]]\nd = e = 1\n"))
    assert found[0] == "line 1: '= 1': expected a name before the equals sign"
    assert found[1].startswith("line 2: no link: expected a braid word")
    assert found[2].startswith("line 3: [1, 2] as a crossing: expected four arc labels")
    assert found[3].startswith("line 4: 'e': expected integers such as 1 -2")
    (message,) = messages(read(tmp_path / "a.dt", "4 6 2\n4 5 2\n"))
    assert message.startswith("line 2: 5: expected even numbers such as 4 6 2")
    (message,) = messages(read(tmp_path / "a.xyz", "0 0 0\n1 0\n0 1 0\n"))
    assert message == "line 2: '1 0': expected three finite numbers x y z"


class TestNamesThatStandTwice:
    """Two rows with the same name and source."""

    def test_the_same_link_is_kept_once(self, tmp_path: Path) -> None:
        """However the word is written; the second row is counted."""
        reading = read(tmp_path / "a.csv", 'name,word\na,1 1\nb,1\na,"[1,1]"\na,1 1\n')
        assert [entry.name for entry in reading.entries] == ["a", "b"]
        assert (reading.repeated, reading.problem_count) == (2, 0)

    @pytest.mark.parametrize("second", ["a,1 -1,", "a,3: 1 1,", "a,1 1,other", "a,-1 -1,"])
    def test_another_link_or_note_is_a_problem(self, tmp_path: Path, second: str) -> None:
        """Another letter, strand count or note, also one whose hash is the same in Python."""
        reading = read(tmp_path / "a.csv", f"name,word,note\na,1 1,\n{second}\n")
        expected = "line 3: 'a': expected another name, or the braid and the note of line 2"
        assert messages(reading) == [expected]
        assert [len(entry.braid) for entry in reading.entries] == [2]

    def test_letters_with_equal_hashes(self, tmp_path: Path) -> None:
        """hash(-1) is hash(-2), so that hashes alone would take two words for one."""
        assert hash(-1) == hash(-2)
        reading = read(tmp_path / "a.txt", "a = 3: -1\na = 3: -2\n")
        assert reading.problem_count == 1

    def test_other_sources_have_names_of_their_own(self, tmp_path: Path) -> None:
        """The same name from two sources is two entries."""
        reading = read(tmp_path / "a.csv", "name,source,word\na,x,1\na,y,1 1\n")
        assert (len(reading.entries), reading.problem_count) == (2, 0)

    def test_objects_are_counted(self, tmp_path: Path) -> None:
        """In a JSON file the first place is told by its number."""
        text = '[{"name": "a", "link": "1"}, {"name": "a", "link": "2"}]'
        assert messages(read(tmp_path / "a.json", text)) == [
            "line 1, object 2: 'a': expected another name, or the braid and the note of object 1"
        ]


def test_twenty_problems_are_shown(tmp_path: Path) -> None:
    """The others are counted."""
    reading = read(tmp_path / "a.csv", "word\n" + "?\n" * 25 + "1\n")
    lines = format_problems(reading).split("\n")
    assert (len(lines), reading.problem_count, len(reading.entries)) == (21, 25, 1)
    assert lines[0].endswith(
        "a.csv, line 2: '?': expected integers such as 1 -2 or sigma notation such as s1 s2^-1"
    )
    assert lines[-1] == "and 5 more"
    assert format_problems(read(tmp_path / "a.csv", "word\n1\n")) == ""


def test_problems_as_errors_and_as_values(tmp_path: Path) -> None:
    """``entry_of`` raises the line that ``outcome_of`` gives as a value; a problem stays itself."""
    bad, short, good = iter_rows(write(tmp_path / "a.csv", "name,word\na,1 x\nb\nc,1\n"))
    assert isinstance(bad, Row)
    assert isinstance(good, Row)
    assert isinstance(short, Problem)
    with pytest.raises(InputError) as caught:
        entry_of(bad)
    assert str(caught.value) == str(outcome_of(bad))
    assert outcome_of(short) is short
    assert outcome_of(good) == entry_of(good)


def test_long_paths_are_cut_and_odd_ones_quoted(tmp_path: Path) -> None:
    """A message stays one short line."""
    folder = tmp_path / ("f" * 150)
    folder.mkdir()
    (problem,) = read(folder / "a.txt", "x\n").problems
    assert problem.file == "..." + os.fspath(folder / "a.txt")[-97:]
    (problem,) = read(tmp_path / "a\n.txt", "b = x\n", source="gel").problems
    assert problem.file.endswith(r"a\n.txt'")


def test_the_source_must_be_a_label(tmp_path: Path) -> None:
    """A file whose name cannot be a source needs one from the caller, and names of its own."""
    odd = write(tmp_path / "a\tb.csv", "name,word\na,1\n,1 1\n")
    with pytest.raises(InputError, match=r"source 'a\\tb.csv': expected no control characters"):
        read_entries(odd)
    reading = read_entries(odd, source="gel")
    assert [entry.source for entry in reading.entries] == ["gel"]
    assert messages(reading) == [r"line 3: name 'a\tb-3': expected no control characters"]


def test_cells_of_millions_of_letters(tmp_path: Path) -> None:
    """A long cell is no problem of the table, only too long a word; the limit is never lowered."""
    before = csv.field_size_limit()
    (message,) = messages(read(tmp_path / "a.csv", f"word\n{'1 ' * 1_000_000}\n"))
    assert message.endswith("as letter number 100001: expected at most 100000 letters")
    assert csv.field_size_limit() >= max(before, 10_000_000)


def test_files_that_are_read_as_a_whole_are_bounded(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    """A list in JSON is; the same objects on lines of their own are not."""
    monkeypatch.setattr("braidsearch.ledger.reading.catalogue_file.MAX_TEXT", 20)
    text = '{"link": "1"}\n' * 3
    with pytest.raises(InputError, match=r"more than 20 characters: .* or one object a line"):
        read(tmp_path / "a.json", text)
    assert len(read(tmp_path / "a.jsonl", text.replace("}\n", ', "name": "a"}\n')).entries) == 1


def test_progress_counts_bytes(tmp_path: Path) -> None:
    """It rises to all there are, for every format that holds many links."""
    texts = {
        "a.csv": "word\n" + "1 1 1\n" * 5000,
        "a.txt": "1 1 1\n" * 5000,
        "a.jsonl": dump_lines([{"link": "1 1 1"}] * 5000),
        "a.json": json.dumps([{"link": "1 1 1"}] * 5000),
    }
    for name, text in texts.items():
        seen: list[tuple[int, int]] = []
        write(tmp_path / name, text)
        outcomes = iter_outcomes(tmp_path / name, progress=lambda *now, seen=seen: seen.append(now))
        assert sum(1 for _ in outcomes) == 5000
        assert seen == sorted(seen)
        assert len({done for done, _ in seen}) > 2
        assert seen[-1] == (len(text), len(text))
