"""The scenario of the simulated melt, run as its users run it."""

import json
import subprocess
import sys
from itertools import combinations
from pathlib import Path
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
from braidsearch.invariants import homfly_polynomial, pair_linking_numbers
from tests.diagrams.polygons.curves import exact_determinant, gauss_linking_integral
from tests.knot_tables import TableRow, iter_knots, iter_links
from tests.scenarios.running import SCENARIOS, check_usage, run_scenario

SCENARIO = SCENARIOS / "classify_rings"

MADE = {
    "molecule-01": "unknot",
    "molecule-02": "right-handed trefoil",
    "molecule-03": "unknot",
    "molecule-04": "figure eight",
    "molecule-05": "left-handed trefoil",
    "molecule-06": "parallel clasp",
    "molecule-07": "right-handed 5_1",
    "molecule-08": "right-handed 5_2",
    "molecule-10": "opposed clasp",
    "molecule-11": "unknot",
    "molecule-12": "harbour square",
    "molecule-13": "necklace of three",
    "molecule-14": "none of the list",
    "molecule-15": "right-handed trefoil",
    "molecule-16": "free pair",
    "molecule-17": "none of the list",
}
"""What every molecule is, by the braid of which its coordinates were made."""

IN_THE_TABLES = {
    "right-handed trefoil": ("3_1", False),
    "left-handed trefoil": ("3_1", True),
    "figure eight": ("4_1", False),
    "right-handed 5_1": ("5_1", False),
    "right-handed 5_2": ("5_2", False),
    "left-handed 5_2": ("5_2", True),
    "parallel clasp": ("L2a1{1}", False),
    "opposed clasp": ("L2a1{0}", False),
}
"""The names of the known links in the published tables, and whether those show the mirror image."""


class Classified(NamedTuple):
    """What the script left behind."""

    status: int
    report: str
    types: Any
    folder: Path

    @property
    def molecules(self) -> dict[str, Any]:
        """What types.json says of each molecule."""
        return {molecule["name"]: molecule for molecule in self.types["molecules"]}


def classify(folder: Path) -> Classified:
    done = run_scenario("classify_rings/classify.py", folder)
    types = json.loads((folder / "types.json").read_text(encoding="utf-8"))
    return Classified(*done, types, folder)


@pytest.fixture(scope="module")
def classified(tmp_path_factory: pytest.TempPathFactory) -> Classified:
    """The folder that the script writes."""
    return classify(tmp_path_factory.mktemp("melt") / "classified")


def test_every_molecule_is_what_it_was_made_of(classified: Classified) -> None:
    """Known links are found, the two others are on no list, and nothing stays open."""
    assert {name: found["type"] for name, found in classified.molecules.items()} == MADE
    assert all(found["open"] == [] for found in classified.molecules.values())
    assert classified.status == 0


def test_the_mirror_image_of_a_known_link_is_no_known_link(classified: Classified) -> None:
    """A left-handed 5_1 is on no list that has the right-handed one; the report says whose mirror
    image it is, and proves it.
    """
    mirrors = {name: found["mirror_of"] for name, found in classified.molecules.items()}
    assert {name for name, known in mirrors.items() if known} == {"molecule-17"}
    assert mirrors["molecule-17"] == "right-handed 5_1"
    proof = classified.folder / "certificates" / "molecule-17-mirrors-right-handed-5_1.json"
    assert verify(proof).valid
    assert read_certificate(proof).symmetry == "mirror"


def test_every_decision_has_a_certificate(classified: Classified) -> None:
    """One proof of sameness for each known molecule, one of difference for each other and each
    known link; each holds for the word in types.json and the word in the list.
    """
    known = {name: parse_word(word) for name, word in classified.types["known_links"].items()}
    written = {path.name for path in (classified.folder / "certificates").iterdir()}
    for name, found in classified.molecules.items():
        is_known = found["type"] in known
        wanted = [found["type"]] if is_known else list(known)
        relation = "is" if is_known else "is-not"
        for link in wanted:
            file = f"{name}-{relation}-{link.replace(' ', '-')}.json"
            assert file in found["certificates"]
            path = classified.folder / "certificates" / file
            assert verify(path, left=parse_word(found["word"]), right=known[link]).valid
            claim = read_certificate(path)
            assert claim.verdict == ("same" if is_known else "different")
            assert is_known is (claim.symmetry == "identity")
            assert is_known or claim.distinctions[0].symmetry == "identity"
            written.remove(file)
    assert written == {"molecule-17-mirrors-right-handed-5_1.json"}


def test_a_damaged_certificate_is_rejected(classified: Classified) -> None:
    """A proof that one molecule is a link is no proof for another molecule or another link."""
    proof = classified.folder / "certificates" / "molecule-08-is-right-handed-5_2.json"
    other = parse_word(classified.molecules["molecule-07"]["word"])
    assert not verify(proof, left=other).valid
    assert not verify(proof, right=other).valid


def test_the_damaged_file_is_reported_and_spoils_nothing(classified: Classified) -> None:
    """Its row of two numbers stands in the report."""
    assert list(classified.types["unreadable"]) == ["molecule-09.txt"]
    assert "molecule-09.txt: line 23: '-2.278 1.881': expected three finite" in classified.report


def test_the_report_has_a_table_and_every_molecule(classified: Classified) -> None:
    """Each type that occurs with its molecules, then each molecule with word and proof."""
    table, *molecules = classified.report.split("\n\n")[1:]
    rows = {row[:24].strip(): row[29:].split(", ") for row in table.splitlines()[:-1]}
    assert rows == {
        link: [name for name, made in MADE.items() if made == link] for link in set(MADE.values())
    }
    assert [text.split(": ")[0] for text in molecules] == list(MADE)
    for text in molecules:
        assert "\n  woven: " in text
        assert "\n  checked: " in text
        assert "\n  proof" in text
    assert "3 rings, 260 vertices; crossings left: 4\n  woven: 1 2 2 1\n" in classified.report


def test_the_classification_repeats(classified: Classified, tmp_path: Path) -> None:
    """A second run writes the same files with the same bytes."""
    again = classify(tmp_path / "again").folder
    files = sorted(path.relative_to(again) for path in again.rglob("*") if path.is_file())
    first = classified.folder
    assert files == sorted(path.relative_to(first) for path in first.rglob("*") if path.is_file())
    assert len(files) == len(MADE) + 2 * 12 + 3
    for file in files:
        assert (again / file).read_bytes() == (first / file).read_bytes()


def test_the_script_names_its_usage() -> None:
    """Without a folder nothing is written: exit status 2."""
    check_usage("classify_rings/classify.py")


def test_the_coordinates_are_made_again(tmp_path: Path) -> None:
    """The generator writes the very files that lie in rings/."""
    subprocess.run([sys.executable, str(SCENARIO / "make_rings.py"), str(tmp_path)], check=True)
    stored = sorted((SCENARIO / "rings").iterdir())
    assert [path.name for path in stored] == sorted(path.name for path in tmp_path.iterdir())
    for path in stored:
        assert path.read_bytes() == (tmp_path / path.name).read_bytes()


def molecule_files() -> dict[str, list[Any]]:
    """The polygons of each molecule that can be read."""
    files = {path.stem: path for path in sorted((SCENARIO / "rings").iterdir())}
    return {name: read_polygons(files[name]) for name in MADE}


def test_determinants_of_the_coordinates(classified: Classified) -> None:
    """The determinant of every knot, by colourings of a projection of the test's own with
    fractions, is that of the type found (values from the published table: Livingston, Moore,
    KnotInfo; of a connected sum, the product; of what is on no list, 6_2 and 5_1).
    """
    table = {row.name: row.determinant for row in iter_knots(6)} | {"0_1": 1}
    names = {name: knot for name, (knot, _) in IN_THE_TABLES.items()} | {"unknot": "0_1"}
    wanted = {known: table[knot] for known, knot in names.items() if knot in table}
    wanted |= {"harbour square": table["3_1"] ** 2}
    others = {"molecule-14": table["6_2"], "molecule-17": table["5_1"]}
    for name, polygons in molecule_files().items():
        if len(polygons) == 1 and len(polygons[0]) <= 320:
            found = exact_determinant(polygons[0], (0.3125, -0.1875))
            assert found == others.get(name, wanted.get(classified.molecules[name]["type"])), name


def test_linking_numbers_of_the_coordinates(classified: Classified) -> None:
    """Gauss's integral over the two rings gives the linking numbers of the woven braid: 1, -1,
    0, and 0 1 1 for the chain.
    """
    for name, polygons in molecule_files().items():
        if len(polygons) > 1:
            integrals = [gauss_linking_integral(a, b) for a, b in combinations(polygons, 2)]
            rounded = sorted(map(round, integrals))
            assert np.allclose(sorted(integrals), rounded, atol=1e-6)
            braid = parse_word(classified.molecules[name]["word"])
            assert sorted(pair_linking_numbers(braid)) == rounded


def mirrored(polynomial: list[list[int]]) -> list[list[int]]:
    """The HOMFLY-PT polynomial of the mirror image: v and z give way to 1/v and -z."""
    return sorted([-v, z, c * (-1) ** z] for v, z, c in polynomial)


def test_the_list_says_what_the_tables_say() -> None:
    """Each word of the list that has a name in the tables has the HOMFLY-PT polynomial there
    (Livingston, Moore, KnotInfo and LinkInfo).
    """
    rows: dict[str, TableRow] = {row.name: row for row in [*iter_knots(5), *iter_links(2)]}
    words = json.loads((SCENARIO / "known_links.json").read_text(encoding="utf-8"))
    for known, (name, is_mirrored) in IN_THE_TABLES.items():
        published = rows[name].homfly
        wanted = mirrored(published) if is_mirrored else published
        assert homfly_polynomial(parse_word(words[known])) == wanted, known


def test_the_known_links_differ() -> None:
    """No link stands twice in the list: 78 pairs, each proven different."""
    words = json.loads((SCENARIO / "known_links.json").read_text(encoding="utf-8"))
    braids: list[Braid] = [parse_word(word) for word in words.values()]
    limits = SearchLimits(seconds=None, nodes=100)
    outcomes = [compare(a, b, limits=limits).outcome for a, b in combinations(braids, 2)]
    assert outcomes == ["different"] * 78
