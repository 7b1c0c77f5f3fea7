"""braidsearch weave: the report, the JSON object, components turned around, and other codes."""

import json
from pathlib import Path

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from braidsearch import Braid, format_word, parse_word
from braidsearch.command_line import weave
from braidsearch.invariants import (
    homfly_polynomial,
    link_determinant,
    pair_linking_numbers,
)
from tests.command_line.running import Runner
from tests.diagrams.polygons.curves import gauss_linking_integral
from tests.diagrams.published import planar_diagram_text
from tests.knot_tables import iter_knots, iter_links
from tests.strategies import braids

FORGETS = "a Dowker-Thistlethwaite code forgets the mirror image"


def woven(run: Runner, *arguments: str) -> Braid:
    """The braid that ``weave --json`` answers with."""
    answer = run("weave", *arguments, "--json").json["braid"]
    return Braid(answer["word"], answer["strands"])


def test_the_report(run: Runner) -> None:
    """The word, what it comes from, its size, each check and each note on a line."""
    outcome = run("weave", "dt: 4 6 2")
    assert (outcome.status, outcome.errors) == (0, "")
    *lines, note = outcome.output.splitlines()
    assert lines == [
        "woven: 1 1 1",
        "from: Dowker-Thistlethwaite code, 3 crossings",
        "to: 2 strands, 3 letters",
        "checked: number of components: 1, in the diagram and in the braid",
        "checked: Jones polynomial: equal, by a state sum over the diagram",
    ]
    assert note.startswith(f"note: {FORGETS}: the link meant is this one or its mirror image")


def test_json_has_three_keys(run: Runner) -> None:
    """{braid: {strands, word}, checks, notes}, and the code where one is asked for."""
    outcome = run("weave", "pd: [[1,5,2,4],[3,1,4,6],[5,3,6,2]]", "--json")
    assert outcome.errors == ""
    assert list(outcome.json) == ["braid", "checks", "notes"]
    assert outcome.json["braid"] == {"strands": 2, "word": [1, 1, 1]}
    assert len(outcome.json["checks"]) == 2
    assert outcome.json["notes"] == []
    with_code = run("weave", "1 1", "--json", "--code", "gauss").json
    assert list(with_code) == ["braid", "checks", "notes", "code"]
    assert list(with_code["code"]) == ["gauss"]


@pytest.mark.parametrize("number", range(0, 249, 25))
def test_codes_of_published_knots(run: Runner, number: int) -> None:
    """The woven braid has the table's HOMFLY-PT polynomial (Livingston, Moore, KnotInfo)."""
    row = list(iter_knots(10))[number]
    assert homfly_polynomial(woven(run, f"pd: {planar_diagram_text(row)}")) == row.homfly


@pytest.mark.parametrize("number", range(0, 140, 14))
def test_codes_of_published_links(run: Runner, number: int) -> None:
    """The same, and the linking numbers add up to those of its braid word (LinkInfo)."""
    row = list(iter_links(8))[number]
    braid = woven(run, f"pd: {planar_diagram_text(row)}")
    assert homfly_polynomial(braid) == row.homfly
    assert sum(pair_linking_numbers(braid)) == sum(pair_linking_numbers(row.braid))


@pytest.mark.parametrize("name", ["1", "2", "1,2", "2,1", "1 --reverse 2", "2,2", " 2 "])
def test_a_hopf_link_with_components_turned(run: Runner, name: str) -> None:
    """One component turned negates the linking number, both turned leave it."""
    (before,) = pair_linking_numbers(parse_word("1 1"))
    turned = {part.strip() for part in name.replace("--reverse", ",").split(",")}
    values = name.split(" --reverse ")
    arguments = [part for value in values for part in ("--reverse", value)]
    for text in ("1 1", "pd: [[4,2,3,1],[2,4,1,3]]", "gauss: [O1+ U2+] [U1+ O2+]"):
        (after,) = pair_linking_numbers(woven(run, text, *arguments))
        assert after == (before if len(turned) == 2 else -before)


@pytest.mark.parametrize(
    ("name", "unturned"), [("L2a1{0}", "L2a1{1}"), ("L4a1{0}", "L4a1{1}"), ("L5a1{0}", "L5a1{1}")]
)
def test_orientations_of_published_links(run: Runner, name: str, unturned: str) -> None:
    """The table names orientations by bits for the components behind the first (LinkInfo)."""
    rows = {row.name: row for row in iter_links(5)}
    text = f"pd: {planar_diagram_text(rows[name])}"
    assert homfly_polynomial(woven(run, text, "--reverse", "2")) == rows[unturned].homfly
    assert homfly_polynomial(woven(run, text, "--reverse", "1,2")) == rows[name].homfly


def strands_of_component(braid: Braid, strand: int) -> list[int]:
    """The strands, from 0 on the left, through which the closure leads from the given one."""
    found = [strand]
    while (following := braid.permutation[found[-1]]) != strand:
        found.append(following)
    return found


@settings(max_examples=40, deadline=None)
@given(braids(max_strands=4, max_letters=8), st.data())
def test_components_of_a_word_count_by_strands(braid: Braid, data: st.DataObject) -> None:
    """Turning the component at a strand negates the letters between it and others, so the sum of
    linking numbers falls by those: counted on the word, with the strands followed down.
    """
    at = [min(strands_of_component(braid, strand)) for strand in range(braid.strands)]
    firsts = sorted(set(at))
    chosen = data.draw(st.integers(1, len(firsts)))
    total = 0
    for letter in braid.word:
        left, right = at[abs(letter) - 1 : abs(letter) + 1]
        if left != right:
            is_turned = firsts[chosen - 1] in (left, right)
            total += (1 if letter > 0 else -1) * (-1 if is_turned else 1)
        at[abs(letter) - 1 : abs(letter) + 1] = right, left
    answer = weave.answer([format_word(braid), "--reverse", str(chosen), "--json"])
    found = json.loads(answer.text)["braid"]
    turned = Braid(found["word"], found["strands"])
    assert 2 * sum(pair_linking_numbers(turned)) == total


def circle(centre: float, is_upright: bool) -> np.ndarray:
    """Thirteen points on a circle of radius 1, which lies in the plane or stands on it."""
    t = 2 * np.pi * np.arange(13) / 13
    across = 0.01 * np.ones(13)
    y, z = (across, np.sin(t)) if is_upright else (np.sin(t), across)
    return np.stack([np.cos(t) + centre, y, z], axis=1)


@pytest.mark.parametrize("turned", [[], [1], [2], [3], [4], [3, 4], [1, 2, 3, 4]])
def test_polygons_count_as_in_the_file(run: Runner, tmp_path: Path, turned: list[int]) -> None:
    """A ring beside a chain of three, first in the file: Gauss's integral over the rows, turned
    where asked, gives the linking numbers.
    """
    rings = [circle(9, False), circle(0, False), circle(1.5, True), circle(3, False)]
    file = tmp_path / "chain.txt"
    blocks = ["\n".join(" ".join(map(str, row)) for row in ring.tolist()) for ring in rings]
    file.write_text("\n\n".join(blocks), encoding="utf-8")
    arguments = ["--reverse", ",".join(map(str, turned))] if turned else []
    braid = woven(run, f"polygon: {file}", *arguments)
    turned_rings = [ring[::-1] if k in turned else ring for k, ring in enumerate(rings, 1)]
    integrals = [
        round(gauss_linking_integral(turned_rings[a], turned_rings[b]))
        for a in range(4)
        for b in range(a)
    ]
    assert sorted(map(abs, integrals)) == [0, 0, 0, 0, 1, 1]
    assert sorted(pair_linking_numbers(braid)) == sorted(integrals)


@pytest.mark.parametrize(
    ("values", "shown"),
    [
        (["3"], "3"),
        (["0"], "0"),
        (["-1"], "-1"),
        (["1,3"], "3"),
        (["1", "--reverse", "4"], "4"),
        (["two"], "two"),
        (["1.0"], "1.0"),
        (["1,"], ""),
        ([""], ""),
        (["²"], "²"),
        (["9" * 5_000], "9" * 37 + "..."),
    ],
)
def test_numbers_of_no_component(run: Runner, values: list[str], shown: str) -> None:
    """The number is named, with the range that there is."""
    line = run.fail("weave", "1 1", "--reverse", *values)
    wanted = f"--reverse: {shown!r}: expected the number of a component, 1 to 2"
    assert line == f"braidsearch weave: {wanted}"


@settings(max_examples=40, deadline=None)
@given(braids(max_strands=4, max_letters=8), st.sampled_from(["pd", "gauss"]))
def test_codes_are_read_again(braid: Braid, name: str) -> None:
    """What --code writes is woven again into the same link: HOMFLY-PT polynomial, components."""
    answer = weave.answer([format_word(braid), "--code", name])
    code = answer.text.splitlines()[-1]
    assert code.startswith(f"{name}: ")
    again = json.loads(weave.answer([code, "--json"]).text)
    assert not any("forgets" in note for note in again["notes"])
    second = Braid(again["braid"]["word"], again["braid"]["strands"])
    assert homfly_polynomial(second) == homfly_polynomial(braid)
    assert second.components == braid.components


@settings(max_examples=40, deadline=None)
@given(braids(max_strands=4, max_letters=8))
def test_a_code_that_forgets_says_so(braid: Braid) -> None:
    """A Dowker-Thistlethwaite code carries its note in report and JSON; read again it has the
    determinant and the components, which mirror images of summands and parts keep.
    """
    word = format_word(braid)
    *_, note, code = weave.answer([word, "--code", "dt"]).text.splitlines()
    assert note.startswith(f"note: {FORGETS}")
    found = json.loads(weave.answer([word, "--code", "dt", "--json"]).text)
    assert f"dt: {found['code']['dt']}" == code
    assert found["notes"][-1].startswith(FORGETS)
    again = json.loads(weave.answer([code, "--code", "dt", "--json"]).text)
    assert sum(note.startswith(FORGETS) for note in again["notes"]) == 1
    second = Braid(again["braid"]["word"], again["braid"]["strands"])
    assert link_determinant(second) == link_determinant(braid)
    assert second.components == braid.components


def test_other_codes(run: Runner) -> None:
    """A name that is no code is refused; polygons cannot be written."""
    for name in ("PD", "polygon", "knot", ""):
        line = run.fail("weave", "1 1 1", "--code", name)
        assert line == f"braidsearch weave: --code: {name!r}: expected one of pd, gauss, dt"
    assert "--code: expected one argument" in run.fail("weave", "1 1 1", "--code")


def test_seeds(run: Runner, tmp_path: Path) -> None:
    """The same seed gives the same words; every seed the same knot; what is none is refused."""
    t = 2 * np.pi * np.arange(40) / 40
    radius = 2 + np.cos(3 * t)
    rows = np.stack([radius * np.cos(2 * t), radius * np.sin(2 * t), -np.sin(3 * t)], axis=1)
    file = tmp_path / "trefoil.txt"
    file.write_text("\n".join(" ".join(map(str, row)) for row in rows.tolist()), encoding="utf-8")
    trefoil = homfly_polynomial(parse_word("1 1 1"))
    for seed in ("0", "7", "-3", "1" + "0" * 30):
        first = run("weave", f"polygon: {file}", "--seed", seed, "--code", "pd")
        assert first == run("weave", f"polygon: {file}", "--seed", seed, "--code", "pd")
        word = first.output.splitlines()[0].removeprefix("woven: ")
        assert homfly_polynomial(parse_word(word)) == trefoil
    for seed in ("x", "1.5", "none", ""):
        line = run.fail("weave", f"polygon: {file}", "--seed", seed)
        assert line == f"braidsearch weave: --seed: {seed!r}: expected an integer"


def test_notes_on_the_diagram(run: Runner) -> None:
    """Crossings that were simplified away and parts that fall apart are said."""
    notes = run("weave", "3: 1 -1 1 1", "--json").json["notes"]
    assert notes == [
        "the diagram was simplified from 4 crossings to 2",
        "the diagram falls into 2 parts, which lie beside each other as a split union",
    ]


def test_mistakes_are_one_line(run: Runner) -> None:
    """No link, two links, an option that there is not."""
    assert "required: LINK" in run.fail("weave")
    assert "expected each word as one argument" in run.fail("weave", "1", "1")
    assert "--mirror: expected only the options" in run.fail("weave", "1", "--mirror")
    assert "LINK: letter 3: expected an index from 1 to 2" in run.fail("weave", "3: 3")
