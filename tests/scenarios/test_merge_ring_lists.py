"""The scenario of the two lists of rings, run as its users run it."""

import json
from pathlib import Path
from typing import Any, NamedTuple

import pytest

from braidsearch import read_certificate, verify
from tests.scenarios.running import check_usage, run_scenario

RINGS_BY_TYPE = [
    {"gel-01", "gel-02", "plate-3a"},
    {"gel-03", "plate-5b"},
    {"gel-04", "plate-3b", "plate-5a"},
    {"gel-05"},
    {"gel-06", "plate-9"},
    {"gel-07"},
    {"gel-08", "plate-12"},
    {"gel-10", "plate-8"},
    {"gel-11"},
    {"plate-6"},
    {"plate-11"},
    {"plate-14"},
]
"""Which rings are one link: how the data were made, from nine knots and links and mirror images."""


class Merged(NamedTuple):
    """What the script left behind."""

    status: int
    report: str
    types: Any
    certificates: list[Path]


@pytest.fixture(scope="module")
def merged(tmp_path_factory: pytest.TempPathFactory) -> Merged:
    """The folder that the script writes."""
    folder = tmp_path_factory.mktemp("rings") / "merged"
    done = run_scenario("merge_ring_lists/merge.py", folder)
    types = json.loads((folder / "types.json").read_text(encoding="utf-8"))
    return Merged(*done, types, sorted((folder / "certificates").iterdir()))


def test_the_lists_are_merged_as_they_were_made(merged: Merged) -> None:
    """Renamed duplicates come together, everything else stays apart, and no pair stays open."""
    found = [set(link_type["rings"]) for link_type in merged.types["types"]]
    assert found == RINGS_BY_TYPE
    assert merged.types["open_pairs"] == []
    assert merged.status == 0


def test_mirror_images_stay_apart_and_are_named(merged: Merged) -> None:
    """The trefoils, the five-crossing torus knots, and the Hopf links with linking number 1, -1."""
    number = {ring: at for at, rings in enumerate(RINGS_BY_TYPE, 1) for ring in rings}
    expected = {("gel-03", "gel-01"), ("gel-11", "gel-05"), ("plate-14", "gel-07")}
    named = {tuple(pair) for pair in merged.types["mirror_pairs"]}
    assert named == {(f"type-{number[a]}", f"type-{number[b]}") for a, b in expected}


def test_the_damaged_row_is_reported_and_spoils_nothing(merged: Merged) -> None:
    """Its name and its offending token stand in the report."""
    assert len(merged.types["unreadable"]) == 1
    assert "not read: gel-09: '?': expected integers" in merged.report


def test_every_decision_has_a_certificate(merged: Merged) -> None:
    """One for each ring beyond the first of its type, for each two types, for each mirror pair."""
    kinds = len(RINGS_BY_TYPE)
    same = sum(len(rings) - 1 for rings in RINGS_BY_TYPE)
    names = [path.stem for path in merged.certificates]
    assert sum("-is-type-" in name for name in names) == same
    assert sum("-is-not-" in name for name in names) == kinds * (kinds - 1) // 2
    assert sum("-mirrors-" in name for name in names) == 3
    for path in merged.certificates:
        assert verify(path).valid
        claim = read_certificate(path)
        assert claim.verdict == ("different" if "-is-not-" in path.stem else "same")


def test_the_script_names_its_usage() -> None:
    """Without a folder nothing is written: exit status 2."""
    check_usage("merge_ring_lists/merge.py")
