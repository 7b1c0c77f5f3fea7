"""Coordinates as text and as arrays: what is read, what is refused and in which words."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch import InputError
from braidsearch.diagrams.polygons import (
    MAX_VERTICES,
    check_polygons,
    format_polygons,
    parse_polygons,
    polygon_diagram,
    read_polygons,
)

SQUARE = "0 0 0\n1 0 0\n1 1 0\n0 1 0\n"
finite = st.floats(allow_nan=False, allow_infinity=False)
distinct_rows = st.lists(st.tuples(finite, finite, finite), min_size=3, max_size=8, unique=True)


@settings(max_examples=60)
@given(polygons=st.lists(distinct_rows, min_size=1, max_size=3))
def test_reading_undoes_writing(polygons):
    """The same doubles come back, to the last bit."""
    expected = check_polygons(polygons)
    found = parse_polygons(format_polygons(polygons))
    assert [polygon.tolist() for polygon in found] == [polygon.tolist() for polygon in expected]


@pytest.mark.parametrize(
    "text",
    [
        SQUARE,
        "x,y,z\n0,0,0\n1,0,0\n1,1,0\n0,1,0",
        '"x";"y";"z"\n0;0;0\n1;0;0\n1;1;0\n0;1;0',
        "# a square\n\n 0\t0\t0 # the corner\n1. .0 0e5\n\n".replace("\n\n", "\n")
        + "1 1 0\n# in between\n+0 1 -0\n\n\n",
        SQUARE + "0 0 0\n",
        "\n\n" + SQUARE.replace("\n", "\r\n"),
        SQUARE.replace("1 0 0", "1 −0 0"),
    ],
)
def test_notations(text, tmp_path):
    """Blanks, commas, titles, comments, a repeated first row: all are the same square."""
    expected = [[0, 0, 0], [1, 0, 0], [1, 1, 0], [0, 1, 0]]
    assert [polygon.tolist() for polygon in read_polygons(text)] == [expected]
    file = tmp_path / "square.csv"
    file.write_text(text, encoding="utf-8-sig", newline="")
    for path in (file, str(file)):
        assert [polygon.tolist() for polygon in read_polygons(path)] == [expected]


def test_blank_lines_part_components():
    """Several blank lines are one; rows of separators are blank."""
    text = (
        SQUARE + "\n\n" + SQUARE.replace(" 0\n", " 5\n") + ",,\n" + SQUARE.replace(" 0\n", " 9\n")
    )
    assert [polygon[:, 2].tolist() for polygon in read_polygons(text)] == [
        [0] * 4,
        [5] * 4,
        [9] * 4,
    ]
    assert not read_polygons(text)[0].flags.writeable


@pytest.mark.parametrize(
    ("text", "message"),
    [
        (SQUARE + "2 2\n", "line 5: '2 2': expected three finite numbers x y z"),
        (SQUARE + "\n1 2 3 4\n", "line 6: '1 2 3 4': expected three finite numbers x y z"),
        (SQUARE + "a b c\n", "line 5: 'a b c': expected three finite numbers x y z"),
        (SQUARE + "nan 0 1\n", "line 5: 'nan 0 1': expected three finite numbers x y z"),
        (SQUARE + "1e999 0 1\n", "line 5: '1e999 0 1': expected three finite numbers x y z"),
        (SQUARE + "1_0 0 1\n", "line 5: '1_0 0 1': expected three finite numbers x y z"),
        (SQUARE + "x y z\n", "line 5: 'x y z': expected three finite numbers x y z"),
        ("0 0 0\n1 1 1\n", "component from line 1: 2 points: expected at least three"),
        (SQUARE + "\n\n1 1 1\n", "component from line 7: 1 point: expected at least three"),
        ("0 0 0\n1 1 1\n0 0 0\n", "component from line 1: 2 points: expected at least three"),
        (
            SQUARE + "0 1 0\n",
            "component 1, row 5: the same point as the row before: "
            "expected polygons that do not meet themselves",
        ),
        ("\n# nothing\n", "no polygon: expected rows x y z, a blank line between polygons"),
    ],
)
def test_what_is_refused_as_text(text, message):
    """One line that names the line of the file, or the component."""
    with pytest.raises(InputError) as caught:
        read_polygons(text)
    assert str(caught.value) == message


def test_long_rows_are_cut_short():
    """A message stays one short line whatever the row holds."""
    with pytest.raises(InputError) as caught:
        read_polygons(SQUARE + "7 " * 5000 + "\n")
    assert len(str(caught.value)) < 120


def test_files_that_cannot_be_read(tmp_path):
    """A missing file, a folder, bytes that are no text: one line each."""
    (tmp_path / "bytes").write_bytes(b"\xff\xfe\x00")
    for path, words in (("missing", "No such file"), (".", "directory"), ("bytes", "UTF-8")):
        with pytest.raises(InputError, match=words):
            read_polygons(tmp_path / path)
    with pytest.raises(InputError, match="'0 0 0'"):
        read_polygons("0 0 0")  # one line is the name of a file
    with pytest.raises(InputError):
        read_polygons("a\0b")


@pytest.mark.parametrize(
    ("polygons", "message"),
    [
        ([], "no polygon"),
        ([np.zeros((4, 2))], r"component 1, an array of shape \(4, 2\): expected n rows x y z"),
        ([[[0, 0, 0], [1, 0, 0], [1, 1]]], r"component 1: row 3: \[1, 1\]: expected three finite"),
        ([[[0, 0, 0], [1, 0, 0], [1, 1, "a"]]], "component 1: row 3"),
        ([np.array([[0, 0, 0], [1, 0, np.nan], [1, 1, 1]])], "component 1, row 2: 1.0 0.0 nan"),
        ([np.eye(3), np.eye(3)[:2]], "component 2: 2 points: expected at least three"),
        ([np.array([[2**60 + 1, 0, 0], [1, 0, 0], [0, 1, 0]])], "component 1, row 1: .* exactly"),
        ([np.eye(3, dtype=complex)], "component 1: expected an array of n rows x y z"),
        ([5], "component 1"),
        (5, "int: expected a list of arrays"),
        (np.zeros(3), "component 1, an array of shape"),
        ([np.zeros((0, 3))], "component 1: 0 points"),
        ([np.random.default_rng(1).normal(size=(MAX_VERTICES + 1, 3))], "at most 100000"),
    ],
)
def test_what_is_refused_as_arrays(polygons, message):
    """One line that names component and row."""
    with pytest.raises(InputError, match=message) as caught:
        polygon_diagram(polygons)
    assert "\n" not in str(caught.value)


def test_one_array_is_one_polygon():
    """An array of n x 3 needs no list around it."""
    assert [polygon.tolist() for polygon in check_polygons(np.eye(3))] == [np.eye(3).tolist()]
    assert polygon_diagram(np.eye(3)).circles == 1


def test_sizes_too_far_apart():
    """Coordinates whose differences doubles cannot hold are refused, any common scale is not."""
    rows = np.array([[0, 0, 0], [1, 0, 0], [1, 1, 1e-200], [0, 1, 0]])
    with pytest.raises(InputError, match="coordinates 1e-200 and"):
        polygon_diagram([rows])
    rows[2, 2] = 0.5
    for scale in (2.0**1000, 2.0**-1040, 1.0):
        assert polygon_diagram([rows * scale]).circles == 1
