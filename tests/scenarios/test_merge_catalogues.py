"""The scenario of the two catalogues that a ledger merges, run as its users run it."""

import csv
import importlib.util
import json
import subprocess
import sys
from collections.abc import Iterator
from itertools import combinations
from pathlib import Path
from types import ModuleType
from typing import Any, NamedTuple

import numpy as np
import pytest

from braidsearch import (
    Braid,
    SearchLimits,
    compare,
    parse_word,
    read_certificate,
    read_polygons,
    verify,
)
from braidsearch.invariants import homfly_polynomial
from braidsearch.verifier import verify as verifier
from braidsearch.words import apply_symmetry
from tests.command_line.readme_examples import commands_of, console_blocks, run_blocks
from tests.command_line.running import Runner
from tests.diagrams.polygons.curves import exact_determinant, gauss_linking_integral
from tests.knot_tables import TableRow, iter_knots
from tests.scenarios.running import SCENARIOS, check_usage, run_scenario

SCENARIO = SCENARIOS / "merge_catalogues"
README = (SCENARIO / "README.md").read_text(encoding="utf-8")
LIMITS = SearchLimits(seconds=None, nodes=2_000)

KEEPS = {
    "reversible": {"identity", "reverse"},
    "negative amphicheiral": {"identity", "mirror-reverse"},
    "fully amphicheiral": {"identity", "mirror", "reverse", "mirror-reverse"},
    "chiral": {"identity"},
}
"""The symmetries of a knot by its type in the published table."""


def load(name: str) -> ModuleType:
    """A file of the scenario as a module."""
    specification = importlib.util.spec_from_file_location(name, SCENARIO / f"{name}.py")
    assert specification is not None
    assert specification.loader is not None
    module = sys.modules[name] = importlib.util.module_from_spec(specification)
    specification.loader.exec_module(module)
    return module


RECIPES = load("recipes")
MADE = {recipe.name: recipe for recipe in (*RECIPES.REGISTER, *RECIPES.FIELD_LIST)}
"""What every entry was made of; the script never sees it."""
SOURCES = {"Register": RECIPES.REGISTER, "Saltmarsh": RECIPES.FIELD_LIST}


class Merged(NamedTuple):
    """What the script left behind."""

    status: int
    report: str
    found: Any
    folder: Path

    @property
    def entries(self) -> dict[str, Any]:
        """The entries by name."""
        return {entry["name"]: entry for one in self.found["classes"] for entry in one}


def merge(folder: Path) -> Merged:
    done = run_scenario("merge_catalogues/merge.py", folder)
    found = json.loads((folder / "merged.json").read_text(encoding="utf-8"))
    return Merged(*done, found, folder)


@pytest.fixture(scope="module")
def merged(tmp_path_factory: pytest.TempPathFactory) -> Merged:
    """The folder that the script writes."""
    return merge(tmp_path_factory.mktemp("catalogues") / "merged")


def names_of(pairs: list[dict[str, Any]]) -> set[tuple[str, str]]:
    """The names of the two entries of each finding."""
    return {(one["left"]["name"], one["right"]["name"]) for one in pairs}


def made_kinds() -> dict[tuple[str, str], list[str]]:
    """The names of the entries by what they were made of."""
    kinds: dict[tuple[str, str], list[str]] = {}
    for recipe in MADE.values():
        kinds.setdefault(recipe.kind, []).append(recipe.name)
    return kinds


# what comes out


def test_the_classes_are_the_links_that_were_drawn_up(merged: Merged) -> None:
    """Two entries are in one class if and only if they were made of one image of one link."""
    found = [sorted(entry["name"] for entry in one) for one in merged.found["classes"]]
    assert sorted(found) == sorted(map(sorted, made_kinds().values()))
    assert len(merged.entries) == len(MADE)
    assert merged.status == 0
    assert merged.found["open_questions"] == []
    assert merged.found["faults"] == []


def test_the_catalogues_are_as_the_task_has_them() -> None:
    """30 and 25 links; of the shorter list most are in the longer one under other names."""
    assert [len(recipes) for recipes in SOURCES.values()] == [30, 25]
    known = {recipe.kind for recipe in RECIPES.REGISTER}
    assert sum(recipe.kind in known for recipe in RECIPES.FIELD_LIST) == 17
    assert {recipe.image for recipe in RECIPES.FIELD_LIST} == {"identity", "mirror", "reverse"}


def test_every_merge_is_explained(merged: Merged) -> None:
    """Each pair of the key has its names, its catalogues, its moves and a certificate."""
    merges = merged.found["merges"]
    kinds = made_kinds().values()
    assert names_of(merges) == {(first, other) for first, *others in kinds for other in others}
    assert len(merges) == 18
    for one in merges:
        assert (one["outcome"], one["symmetry"]) == ("same", "identity")
        count = len(read_certificate(merged.folder / one["certificate"]).moves)
        assert count == sum(one["evidence"].values())
        left, right = (f"{one[side]['name']} ({one[side]['source']})" for side in ("left", "right"))
        moves = f"{count} moves: " if count else "letter by letter"
        assert f"  {left} is {right}\n    {moves}" in merged.report
        assert f"    proof: {one['certificate']}\n" in merged.report


def test_a_duplicate_inside_one_catalogue(merged: Merged) -> None:
    """Q-07 and Q-26 are one knot; no other two entries of one catalogue are one link."""
    for recipes in SOURCES.values():
        kinds = [recipe.kind for recipe in recipes]
        assert len(set(kinds)) == len(kinds) - (recipes is RECIPES.REGISTER)
    inside = [
        one for one in merged.found["merges"] if one["left"]["source"] == one["right"]["source"]
    ]
    assert names_of(inside) == {("Q-07", "Q-26")}
    assert "1 of them inside one catalogue" in merged.report


def test_images_are_grouped_and_yet_told_apart(merged: Merged) -> None:
    """Entries of two images of one link have a proof of that, and one that they are two links."""
    firsts = [names[0] for names in made_kinds().values()]
    wanted = {
        pair for pair in combinations(firsts, 2) if len({MADE[one].link for one in pair}) == 1
    }
    assert names_of(merged.found["images"]) == wanted
    assert names_of(merged.found["refusals"]) == wanted
    types = {row.name: row.columns["symmetry_type"].strip() for row in iter_knots(9)}
    for image in merged.found["images"]:
        left, right = (MADE[image[side]["name"]] for side in ("left", "right"))
        # Links and sums of reversible knots that occur here are reversible.
        kept = KEEPS[types.get(left.link, "reversible")]
        assert image["symmetry"] in {composed(composed(left.image, right.image), s) for s in kept}
    found = {
        (one["left"]["name"], one["right"]["name"]): list(one["evidence"])
        for one in merged.found["refusals"]
    }
    assert all(one["outcome"] == "different" for one in merged.found["refusals"])
    assert found["Q-22", "Q-23"] == ["linking-numbers"]
    assert found["Q-02", "Q-03"] == ["jones"]
    assert found["Q-14", "godwit"] == ["three-braid"]
    assert found["Q-18", "knot"] == ["colouring"]


def composed(one: str, other: str) -> str:
    """The symmetry that is one after the other."""
    parts = {"identity": (0, 0), "mirror": (1, 0), "reverse": (0, 1), "mirror-reverse": (1, 1)}
    wanted = tuple((a + b) % 2 for a, b in zip(parts[one], parts[other], strict=True))
    return next(name for name, value in parts.items() if value == wanted)


def test_the_wrong_note_is_refuted(merged: Merged) -> None:
    """Five notes are right; mutants with one HOMFLY-PT polynomial are told apart by colourings."""
    claims = merged.found["claims"]
    wrong = {name for name, one in claims.items() if one["outcome"] == "different"}
    assert wrong == {RECIPES.WRONG_CLAIM[0]} == {"ruff"}
    assert {one["outcome"] for name, one in claims.items() if name != "ruff"} == {"same"}
    assert set(claims) == {recipe.name for recipe in MADE.values() if "same as" in recipe.note}
    refuted = claims["ruff"]
    assert list(refuted["evidence"]) == ["colouring"]
    assert 'ruff notes "same as Q-12: all polynomials agree": REFUTED' in merged.report
    left, right = (parse_word(refuted[side]["word"]) for side in ("left", "right"))
    assert verify(merged.folder / refuted["certificate"], left=left, right=right).valid
    assert homfly_polynomial(left) == homfly_polynomial(right)


def test_the_damaged_row_is_left_out_alone(merged: Merged) -> None:
    """Its line and the smudged letter stand in the report; all other entries are there."""
    (problem,) = merged.found["left_out"]
    assert problem.startswith("register.csv, line 18: '?': expected ")
    assert problem in merged.report
    name, *_ = RECIPES.SMUDGED
    assert name not in merged.entries
    assert (SCENARIO / "register.csv").read_text().splitlines()[17].startswith(f"{name},")


# the certificates


def iter_written(merged: Merged) -> Iterator[tuple[Path, Braid, Braid]]:
    """The certificates about pairs of the report, with the words of the entries."""
    findings = [one for key in ("merges", "images", "refusals") for one in merged.found[key]]
    for one in [*findings, *merged.found["claims"].values()]:
        words = (parse_word(one[side]["word"]) for side in ("left", "right"))
        yield merged.folder / one["certificate"], *words


def test_every_certificate_was_verified(merged: Merged) -> None:
    """All files of proofs and evidence are counted, and hold when they are verified again here."""
    proofs = {path for path, _, _ in iter_written(merged)}
    assert proofs == set((merged.folder / "proofs").iterdir())
    evidence = set((merged.folder / "evidence").glob("*.json"))
    assert merged.found["verified"] == len(proofs) + len(evidence) > 100
    for path, left, right in iter_written(merged):
        assert verify(path, left=left, right=right).valid, path.name
    for path in evidence:
        assert verify(path).valid, path.name


def test_the_words_are_those_of_the_register(merged: Merged) -> None:
    """What the certificates are about is what was printed, letter by letter."""
    with open(SCENARIO / "register.csv", encoding="utf-8", newline="") as file:
        rows = {row["name"]: f"{row['strands']}: {row['word']}" for row in csv.DictReader(file)}
    assert len(rows) == 31
    for recipe in RECIPES.REGISTER:
        assert parse_word(merged.entries[recipe.name]["word"]) == parse_word(rows[recipe.name])


def test_a_certificate_that_does_not_hold_is_a_fault(merged: Merged, tmp_path: Path) -> None:
    """The script's own verification sees other words, another symmetry and a lost move."""
    script = load("merge")
    alone = Path(verifier.__file__)
    one = next(one for one in merged.found["merges"] if one["right"]["name"] == "osprey")
    file, left, right = (
        merged.folder / one["certificate"],
        one["left"]["word"],
        one["right"]["word"],
    )
    assert script.fault_of(alone, (file, left, right)) == ""
    assert "rejected" in script.fault_of(alone, (file, right, left))
    content = json.loads(file.read_text(encoding="utf-8"))
    lost = content | {"moves": content["moves"][:-1]}
    for number, damaged in enumerate((content | {"symmetry": "mirror"}, lost)):
        path = tmp_path / f"{number}.json"
        path.write_text(json.dumps(damaged), encoding="utf-8")
        assert path.name in script.fault_of(alone, (path, left, right))


# the data


def test_the_catalogues_are_made_again(tmp_path: Path) -> None:
    """The generator writes the very files that lie in the scenario."""
    subprocess.run(
        [sys.executable, str(SCENARIO / "make_catalogues.py"), str(tmp_path)], check=True
    )
    made = [path.relative_to(tmp_path) for path in tmp_path.rglob("*") if path.is_file()]
    assert len(made) == 2 + sum(recipe.form == "polygon" for recipe in MADE.values())
    assert len(list((SCENARIO / "curves").iterdir())) == len(made) - 2
    for path in made:
        assert (SCENARIO / path).read_bytes() == (tmp_path / path).read_bytes()


def table_rows() -> dict[str, TableRow]:
    """The rows of the knots that were drawn up (C. Livingston, A. H. Moore, KnotInfo)."""
    return {row.name: row for row in iter_knots(11) if row.name in RECIPES.LINKS}


def test_the_recipes_are_the_published_knots() -> None:
    """Each word is proven to be the knot of its name, up to a symmetry; the images that occur of
    one knot are two oriented knots by the table's symmetry type.
    """
    rows = table_rows()
    assert len(rows) == 16
    for name, row in rows.items():
        strands, word = RECIPES.LINKS[name]
        up_to = ["mirror", "reverse", "mirror-reverse"]
        verdict = compare(Braid(word, strands=strands), row.braid, up_to=up_to, limits=LIMITS)
        assert verdict.outcome == "same", name
        images = {recipe.image for recipe in MADE.values() if recipe.link == name}
        kept = KEEPS[row.columns["symmetry_type"].strip()]
        assert not any(composed(a, b) in kept for a, b in combinations(images, 2)), name


def test_every_entry_has_the_polynomial_of_its_recipe(merged: Merged) -> None:
    """The HOMFLY-PT polynomial of what was read, word, code or curve, is that of what was made."""
    for name, recipe in MADE.items():
        if recipe.link.endswith("one component reversed"):
            continue
        strands, word = RECIPES.LINKS[recipe.link]
        wanted = homfly_polynomial(apply_symmetry(Braid(word, strands=strands), recipe.image))
        assert homfly_polynomial(parse_word(merged.entries[name]["word"])) == wanted, name


def test_determinants_of_codes_and_curves() -> None:
    """The determinant of every code and of the shorter curves, by matrices of the test's own, is
    that of the published table.
    """
    rows, compared = table_rows(), 0
    for line in (SCENARIO / "field_list.jsonl").read_text(encoding="utf-8").splitlines():
        entry = json.loads(line)
        recipe = MADE[entry["name"]]
        if recipe.link not in rows:
            continue
        wanted = rows[recipe.link].determinant
        if "pd" in entry:
            assert determinant_of_code(entry["pd"]) == wanted, recipe.name
        else:
            (polygon,) = read_polygons(SCENARIO / entry["polygon"])
            assert exact_determinant(polygon, (0.3125, -0.1875)) == wanted, recipe.name
        compared += 1
    assert compared == 14


def determinant_of_code(code: list[list[int]]) -> int:
    """A minor of the colouring matrix (Fox, 1962): an arc passes over until it passes under."""
    whole = {label: label for crossing in code for label in crossing}
    for _, one, _, other in code:
        kept, gone = sorted((whole[one], whole[other]))
        whole = {label: kept if arc == gone else arc for label, arc in whole.items()}
    places = {arc: place for place, arc in enumerate(sorted(set(whole.values())))}
    matrix = np.zeros((len(code), len(places)))
    for row, (under, over, further, _) in enumerate(code):
        for label, value in ((over, 2), (under, -1), (further, -1)):
            matrix[row, places[whole[label]]] += value
    return abs(round(float(np.linalg.det(matrix[1:, 1:]))))


def test_linking_numbers_of_the_curves() -> None:
    """Gauss's integral: -1 for the left-handed clasp, none in the Borromean rings, 1 beside a free
    ring.
    """
    wanted = {"redshank": [-1], "snipe": [0, 0, 0], "turnstone": [0, 0, 1]}
    for name, numbers in wanted.items():
        polygons = read_polygons(SCENARIO / "curves" / f"{name}.xyz")
        integrals = sorted(gauss_linking_integral(a, b) for a, b in combinations(polygons, 2))
        assert np.allclose(integrals, numbers, atol=1e-6), name


# the README


def test_the_readme_shows_what_the_commands_print(merged: Merged) -> None:
    """Every console block, in the folder where the script has made ``merged``."""
    blocks = console_blocks(README)
    assert sum(len(commands_of(block)) for block in blocks) >= 7
    assert run_blocks(blocks, merged.folder.parent) == blocks


def test_the_readme_lists_what_the_script_runs(merged: Merged) -> None:
    """The commands in short are among those that were run, but for the form of the answer."""
    listing = README.split("```sh\n")[1].split("```")[0].splitlines()
    run = (merged.folder / "commands.txt").read_text(encoding="utf-8").splitlines()
    assert len(listing) >= 7
    assert set(listing) <= {line.removesuffix(" --json") for line in run}


def test_the_name_of_an_entry_is_no_link(
    merged: Merged, capsys: pytest.CaptureFixture[str]
) -> None:
    """Whoever looks for an entry by its name is told how; other mistakes are told as ever."""
    run, ledger = Runner(capsys), str(merged.folder / "links.ledger")
    said = run.fail("ledger", "find", ledger, "osprey")
    assert "LINK: 'osprey': an entry of the ledger: expected a braid word or a drawing" in said
    assert run("ledger", "report", ledger, "--class", "osprey").status == 0
    assert "an entry of the ledger" not in run.fail("ledger", "find", ledger, "ospreys")


def test_the_script_names_its_usage() -> None:
    """Without a folder nothing is written: exit status 2."""
    check_usage("merge_catalogues/merge.py")


@pytest.mark.slow
def test_the_merge_repeats(merged: Merged, tmp_path: Path) -> None:
    """A run in another folder, and one that goes on with its ledger, write the same files."""
    for _ in range(2):
        again = merge(tmp_path / "again").folder
        files = sorted(path.relative_to(again) for path in again.rglob("*") if path.is_file())
        assert len(files) > 100
        for file in files:
            if file.name != "links.ledger":
                assert (again / file).read_bytes() == (merged.folder / file).read_bytes(), file
