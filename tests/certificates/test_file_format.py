"""Certificate files: written the same way every time, read strictly."""

import copy
import json
import os
from pathlib import Path
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch.certificates import (
    Certificate,
    Distinction,
    certificate_to_json,
    format_certificate,
    parse_certificate,
    read_certificate,
    write_certificate,
)
from braidsearch.certificates.grammar import INVARIANTS as NAMES_OF_THE_FORMAT
from braidsearch.errors import InputError
from braidsearch.invariants import INVARIANTS
from braidsearch.invariants.finer import iter_finer
from braidsearch.moves import Conjugate, Stabilize
from braidsearch.verifier import verify_text
from braidsearch.verifier.verify import INVARIANTS as VERIFIED_INVARIANTS
from braidsearch.words import Braid
from tests.certificates.arbitrary import certificates

SAME = Certificate.same(
    Braid([1, 1, 1]),
    Braid([1, 2, 1, 2]),
    "identity",
    [Stabilize(1, 3, (1, 1, 1, 2)), Conjugate((1,), (1, 2, 1, 2))],
)
DIFFERENT = Certificate.different(
    Braid([1, 1, 1]),
    Braid([-1, -1, -1]),
    [
        Distinction(
            symmetry="identity",
            invariant="jones",
            parameters={},
            left_moves=[],
            right_moves=[],
            left=[[2, 1], [6, 1], [8, -1]],
            right=[[-8, -1], [-6, 1], [-2, 1]],
        )
    ],
)
SAME_TEXT = """{
  "format": "braidsearch certificate",
  "version": 1,
  "left": {"strands": 2, "word": [1, 1, 1]},
  "right": {"strands": 3, "word": [1, 2, 1, 2]},
  "verdict": "same",
  "symmetry": "identity",
  "moves": [
    {"move": "stabilize", "sign": 1, "strands": 3, "word": [1, 1, 1, 2]},
    {"move": "conjugate", "by": [1], "word": [1, 2, 1, 2]}
  ]
}
"""
DIFFERENT_TEXT = """{
  "format": "braidsearch certificate",
  "version": 1,
  "left": {"strands": 2, "word": [1, 1, 1]},
  "right": {"strands": 2, "word": [-1, -1, -1]},
  "verdict": "different",
  "distinctions": [
    {
      "symmetry": "identity",
      "invariant": "jones",
      "parameters": {},
      "left_moves": [],
      "right_moves": [],
      "left": [[2, 1], [6, 1], [8, -1]],
      "right": [[-8, -1], [-6, 1], [-2, 1]]
    }
  ]
}
"""


@given(certificates)
def test_files_round_trip(certificate: Certificate) -> None:
    """parse_certificate(format_certificate(c)) == c, and formatting again gives the same bytes."""
    text = format_certificate(certificate)
    again = parse_certificate(text)
    assert again == certificate
    assert format_certificate(again) == text
    assert json.loads(text) == certificate_to_json(certificate)


@pytest.mark.parametrize(("certificate", "text"), [(SAME, SAME_TEXT), (DIFFERENT, DIFFERENT_TEXT)])
def test_file_is_laid_out_line_by_line(certificate: Certificate, text: str) -> None:
    """The two examples of the format, byte for byte: one line for each move."""
    assert format_certificate(certificate) == text


def test_parameters_are_written_in_one_order() -> None:
    """The order in which parameters were given leaves no trace in the file."""
    one, other = ({"a": 1, "b": 2}, {"b": 2, "a": 1})
    texts = {
        format_certificate(
            Certificate.different(
                Braid([]), Braid([1, 1]), [Distinction("identity", "x", given, [], [], 1, 2)]
            )
        )
        for given in (one, other)
    }
    assert len(texts) == 1


def test_the_invariants_of_the_format_are_those_of_the_table() -> None:
    """What the search may rest a certificate on, a reader knows, and the verifier too."""
    plain = {invariant.name for invariant in INVARIANTS if invariant.certifies}
    with_parameters = {invariant.name for invariant in iter_finer(components=2)}
    known = plain | with_parameters | {"three-braid"}  # on 3 strands, by a classification
    assert set(NAMES_OF_THE_FORMAT) == known == set(VERIFIED_INVARIANTS)


@pytest.mark.parametrize("text", [SAME_TEXT, DIFFERENT_TEXT])
@given(data=st.data())
@settings(max_examples=300)
def test_both_readers_agree_on_what_is_a_certificate(text: str, data: st.DataObject) -> None:
    """Whatever is put in whichever place, parse_certificate reads it where the verifier does.

    The verifier's reader shares no code with it; a certificate read and written again gets the
    same answer.
    """
    path = data.draw(st.sampled_from(list(iter_places(json.loads(text)))))
    damaged_text = damaged(text, list(path), data.draw(ODDITIES))
    report = verify_text(damaged_text)
    try:
        certificate = parse_certificate(damaged_text)
    except InputError:
        assert report.status == "unreadable"
    else:
        assert report.status != "unreadable"
        assert verify_text(format_certificate(certificate)) == report


@pytest.mark.parametrize(
    ("path", "value", "said"),
    [
        (["format"], "other", "format"),
        (["version"], 2, "version: 2: expected 1"),
        (["version"], True, "version: true"),
        (["verdict"], "undecided", "verdict"),
        (["verdict"], None, "verdict"),
        (["verdict"], ["same"], "verdict"),
        (["symmetry"], "turn", "symmetry"),
        (["symmetry"], ["identity"], "symmetry"),
        (["left"], [1, 1, 1], "left"),
        (["left", "strands"], 1, "left: letter 1"),
        (["left", "strands"], "2", "left.strands"),
        (["left", "word"], "111", "left.word"),
        (["left", "word", 1], 0, "left.word[1]: 0"),
        (["left", "word", 1], True, "left.word[1]: true"),
        (["left", "word", 1], 1.0, "1.0"),
        (["left", "colour"], 1, 'unknown key "colour"'),
        (["colour"], 1, 'unknown key "colour"'),
        (["moves"], {}, "moves"),
        (["moves", 0], "stabilize", "moves[0]"),
        (["moves", 0, "move"], "flype", 'moves[0]: "flype": expected a move among rewrite'),
        (["moves", 0, "move"], {}, "moves[0]"),
        (["moves", 0, "sign"], 2, "moves[0].sign"),
        (["moves", 0, "strands"], 0, "moves[0].strands"),
        (["moves", 0, "strands"], 1001, "moves[0].strands"),
        (["moves", 0, "word", 0], 1000, "moves[0].word[0]"),
        (["moves", 0, "by"], [1], 'moves[0]: unknown key "by"'),
        (["moves", 1, "by"], 1, "moves[1].by"),
        (["moves", 1, "word", 0], None, "moves[1].word[0]: null"),
        (["distinctions"], [], 'unknown key "distinctions"'),
    ],
)
def test_damaged_files_of_sameness_are_named(path: list[Any], value: Any, said: str) -> None:
    """Unknown keys, unknown moves and wrong types are errors that name the place."""
    assert said in refusal(damaged(SAME_TEXT, path, value))


@pytest.mark.parametrize(
    ("path", "value", "said"),
    [
        (["distinctions"], [], "distinctions"),
        (["distinctions"], None, "distinctions"),
        (["distinctions", 0], 7, "distinctions[0]"),
        (["distinctions", 0, "symmetry"], "turn", "distinctions[0].symmetry"),
        (["distinctions", 0, "invariant"], 1, "distinctions[0].invariant"),
        (["distinctions", 0, "parameters"], [], "distinctions[0].parameters"),
        (["distinctions", 0, "invariant"], "colour", "expected one of components, linking"),
        (["distinctions", 0, "parameters"], {"a": 1}, 'unknown key "a": expected no key'),
        (["distinctions", 0, "left"], True, "distinctions[0].left: true: expected a list"),
        (["distinctions", 0, "left"], [1], "distinctions[0].left[0]: 1: expected a list"),
        (["distinctions", 0, "left"], [[1]], "distinctions[0].left[0]: [1]: expected 2 integers"),
        (["distinctions", 0, "right", 1, 0], 0.5, "integers only"),
        (["distinctions", 0, "left_moves"], [[]], "distinctions[0].left_moves[0]"),
        (["distinctions", 0, "note"], "x", 'distinctions[0]: unknown key "note"'),
        (["symmetry"], "identity", 'unknown key "symmetry"'),
        (["moves"], [], 'unknown key "moves"'),
    ],
)
def test_damaged_files_of_difference_are_named(path: list[Any], value: Any, said: str) -> None:
    """The same for certificates of difference."""
    assert said in refusal(damaged(DIFFERENT_TEXT, path, value))


@pytest.mark.parametrize("text", [SAME_TEXT, DIFFERENT_TEXT])
def test_every_key_is_needed(text: str) -> None:
    """Without any one of its keys a certificate is refused, and the key is named."""
    for path in list(iter_keys(json.loads(text))):
        data = json.loads(text)
        at(data, path[:-1]).pop(path[-1])
        message = refusal(json.dumps(data))
        assert str(path[-1]) in message or "move" in message


@pytest.mark.parametrize(
    ("text", "said"),
    [
        ("", "line 1, column 1"),
        ("null", "null: expected a JSON object"),
        ("[]", "expected a JSON object"),
        (SAME_TEXT[:-5], "expected JSON"),
        (SAME_TEXT + "x", "Extra data"),
        (SAME_TEXT.replace('"version": 1', '"version": 1, "version": 1'), "each key once"),
        (SAME_TEXT.replace('"version": 1', '"version": NaN'), "NaN"),
        (SAME_TEXT.replace('"version": 1', '"version": 1.0'), "integers only"),
        (SAME_TEXT.replace('"version": 1', f'"version": {"1" * 5000}'), "thousands of digits"),
        ("[" * 100_000, "nested too deeply"),
        (DIFFERENT_TEXT.replace("[[2, 1], ", "[" * 400 + "]" * 400 + ", ["), "JSON"),
        (DIFFERENT_TEXT.replace('"jones"', "[" * 900 + "]" * 900), "expected"),
    ],
)
def test_texts_that_are_no_certificate(text: str, said: str) -> None:
    """Truncation, doubled keys, numbers that are no integers, endless nesting: one line each."""
    assert said in refusal(text)


@given(st.text(max_size=40))
def test_any_text_is_refused_in_one_line(text: str) -> None:
    """A short text is never a certificate, and never raises anything but InputError."""
    assert "expected" in refusal(text)


def test_saving_and_reading(tmp_path: Path) -> None:
    """A saved certificate is read back; an existing file is replaced; nothing else is left."""
    file = tmp_path / "proof.json"
    DIFFERENT.save(file)
    SAME.save(str(file))
    assert read_certificate(file) == SAME
    assert file.read_bytes() == SAME_TEXT.encode()
    assert os.listdir(tmp_path) == ["proof.json"]


def test_a_link_to_a_file_stays_a_link(tmp_path: Path) -> None:
    """Writing through a symbolic link replaces the file that it points to."""
    target, link = tmp_path / "target.json", tmp_path / "link.json"
    target.write_text("old")
    link.symlink_to(target)
    SAME.save(link)
    assert link.is_symlink()
    assert read_certificate(target) == SAME


def test_a_device_stays_a_device() -> None:
    """Writing to a place that is no regular file writes into it and does not replace it."""
    SAME.save(os.devnull)
    assert not Path(os.devnull).is_file()


def test_places_that_cannot_be_written_are_named(tmp_path: Path) -> None:
    """A missing folder, a folder in the place of the file, a full device: one line each."""
    places = {tmp_path / "missing" / "p.json": "folder does not exist", tmp_path: "it is a folder"}
    if Path("/dev/full").exists():
        places[Path("/dev/full")] = "No space left"
    for path, said in places.items():
        with pytest.raises(InputError) as caught:
            write_certificate(SAME, path)
        assert said in str(caught.value)
        assert str(path) in str(caught.value)
    assert list(tmp_path.iterdir()) == []


def test_files_that_cannot_be_read_are_named(tmp_path: Path) -> None:
    """A missing file, a folder, bytes that are no text."""
    noise = tmp_path / "noise.json"
    noise.write_bytes(b"\xff\xfe{")
    for path in (tmp_path / "missing.json", tmp_path, noise):
        with pytest.raises(InputError) as caught:
            read_certificate(path)
        assert str(path) in str(caught.value)


NUMBERS = [0, 1, -1, 2, 3, 10**6, True, None, 1.0]
NAMES = ["", "1", "identity", "mirror", "same", "jones", "rewrite", "destabilize", "signature"]
LISTS = [[], [1], [0], [[]], [[1, 1]], [[1, 1, 1]]]
OBJECTS = [{}, {"strands": 2, "word": [1]}, {"move": "rewrite", "word": [1, 1, 1]}, {"a": 1}]
ODDITIES = st.sampled_from([*NUMBERS, *NAMES, *LISTS, *OBJECTS])


def refusal(text: str) -> str:
    """The one printable line with which the text is refused."""
    with pytest.raises(InputError) as caught:
        parse_certificate(text)
    message = str(caught.value)
    assert message.isprintable()
    assert len(message) < 300
    return message


def damaged(text: str, path: list[Any], value: Any) -> str:
    """The certificate with another value in one place."""
    data = copy.deepcopy(json.loads(text))
    at(data, path[:-1])[path[-1]] = value
    return json.dumps(data)


def at(data: Any, path: list[Any]) -> Any:
    """The part of the data to which the path leads."""
    for step in path:
        data = data[step]
    return data


def iter_places(data: Any, path: tuple[Any, ...] = ()) -> Any:
    """The paths of everything inside the data."""
    items = data.items() if isinstance(data, dict) else enumerate(data)
    for step, item in items:
        yield (*path, step)
        if isinstance(item, (dict, list)):
            yield from iter_places(item, (*path, step))


def iter_keys(data: Any, path: tuple[Any, ...] = ()) -> Any:
    """The paths of all keys in all objects."""
    if isinstance(data, dict):
        for key in data:
            yield (*path, key)
            yield from iter_keys(data[key], (*path, key))
    elif isinstance(data, list):
        for place, item in enumerate(data):
            yield from iter_keys(item, (*path, place))
