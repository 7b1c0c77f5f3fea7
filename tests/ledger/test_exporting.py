"""What is written out: complete, the same every time, and good to be read again."""

import csv
import json
import os
from pathlib import Path

import pytest

from braidsearch.certificates import read_certificate
from braidsearch.errors import InputError
from braidsearch.ledger.exporting import (
    COLUMNS,
    INDEX,
    INDEX_COLUMNS,
    check_output,
    is_exported,
    iter_exported,
    iter_json_lines,
    iter_table_lines,
    write_lines,
    write_proofs,
)
from braidsearch.ledger.ledger import Ledger
from braidsearch.ledger.reading import Entry, read_entries
from braidsearch.words import Braid
from tests.ledger.ledgers import LINKS, dump, entry, partition

MAKERS = {"links.csv": iter_table_lines, "links.jsonl": iter_json_lines}


def export(path: Path, target: Path) -> Path:
    """The entries of a ledger written to a file, of the kind that its name says."""
    with Ledger(path) as ledger:
        write_lines(target, MAKERS[target.name](iter_exported(ledger.store)))
    return target


@pytest.mark.parametrize("name", MAKERS)
def test_what_is_exported_can_be_added(plants: Path, tmp_path: Path, name: str) -> None:
    """Added to a new ledger and sorted, an export gives the same entries and classes."""
    with Ledger(plants) as ledger:
        odd = Entry('quote " comma , x', "a;b", "two\nlines\tand = é", Braid([], 3), "3:")
        ledger.add([odd, entry("unsorted", "bench", "1 1 1 1")])
    file = export(plants, tmp_path / name)
    assert is_exported(file)
    reading = read_entries(file, ignore_columns=True)
    assert reading.problems == ()
    with Ledger(plants) as old, Ledger(tmp_path / "new.ledger", create=True) as new:
        new.add(reading.entries)
        old.sort()
        new.sort()
        for one, other in zip(old.store.entries(), new.store.entries(), strict=True):
            assert (one.name, one.source, one.note) == (other.name, other.source, other.note)
            assert one.braid == other.braid
    assert partition(plants) == partition(tmp_path / "new.ledger")


def test_columns_say_what_the_ledger_says(plants: Path, tmp_path: Path) -> None:
    """Class, its first name, its word, and the group; nothing of these before it is sorted."""
    with Ledger(plants) as ledger:
        ledger.add([entry("unsorted", "bench", "1 1 1 1")])
    with open(export(plants, tmp_path / "links.csv"), encoding="utf-8", newline="") as file:
        rows = list(csv.DictReader(file))
    assert tuple(rows[0]) == COLUMNS
    assert [row["name"] for row in rows[:-1]] == [name for name, _, _ in LINKS]
    by_title = {f"{row['source']}/{row['name']}": row for row in rows}
    first, second, mirrored = (
        by_title[f"bench/{name}"] for name in ("thistle", "burdock", "teasel")
    )
    assert second["class_name"] == first["class_name"] == "thistle"
    assert second["class_number"] == first["class_number"] != mirrored["class_number"]
    assert mirrored["group"] == first["group"] == first["class_number"]
    assert (second["form"], second["link"], second["given"]) == ("1 1 1", "1 2 1 2", "1 2 1 2")
    last = by_title["bench/unsorted"]
    assert last["class_number"] == last["class_name"] == last["form"] == last["group"] == ""
    lines = export(plants, tmp_path / "links.jsonl").read_text(encoding="utf-8").splitlines()
    objects = [json.loads(line) for line in lines]
    assert [
        {key: "" if value is None else str(value) for key, value in one.items()} for one in objects
    ] == rows


@pytest.mark.parametrize("name", MAKERS)
def test_exports_are_the_same_every_time(plants: Path, tmp_path: Path, name: str) -> None:
    """The same ledger gives the same bytes, and is not changed by it."""
    before = dump(plants)
    first = export(plants, tmp_path / name).read_bytes()
    assert export(plants, tmp_path / name).read_bytes() == first
    assert dump(plants) == before


@pytest.mark.parametrize(
    "content", ["", "{", "{}", "name,link\na,1 1 1\n", '{"name": "a", "link": "1"}\n', "\0\n"]
)
def test_other_files_are_no_exports(tmp_path: Path, content: str) -> None:
    """Columns of other files are never left out without a word."""
    file = tmp_path / "links.csv"
    file.write_text(content)
    assert not is_exported(file)
    assert not is_exported(tmp_path / "missing.csv")


def test_each_proof_is_a_file(plants: Path, tmp_path: Path) -> None:
    """All evidence as certificates that hold, and an index that names what each is about."""
    folder = tmp_path / "proofs"
    with Ledger(plants) as ledger:
        count = write_proofs(ledger.store, folder)
        stored = list(ledger.store.evidence())
    with open(folder / INDEX, encoding="utf-8", newline="") as file:
        rows = list(csv.DictReader(file))
    assert count == len(stored) == len(rows)
    assert tuple(rows[0]) == INDEX_COLUMNS
    assert {path.name for path in folder.iterdir()} == {INDEX, *(row["file"] for row in rows)}
    for row, proof in zip(rows, stored, strict=True):
        assert row["file"].endswith(f"-{proof.verdict}.json")
        certificate = read_certificate(folder / row["file"])
        assert row["symmetry"] == certificate.symmetry == proof.symmetry
        assert row["left"].split(": ")[-1] == " ".join(map(str, certificate.left.word))
        assert row["entries"]
        assert (folder / row["file"]).read_text(encoding="utf-8") == proof.certificate


def test_an_export_replaces_an_export_and_nothing_else(plants: Path, tmp_path: Path) -> None:
    """The folder of an earlier export is replaced as a whole; other folders and files stay."""
    folder, other = tmp_path / "proofs", tmp_path / "other"
    other.mkdir()
    (other / "thesis.tex").write_text("years of work")
    (tmp_path / "file").write_text("")
    with Ledger(plants) as ledger:
        write_proofs(ledger.store, folder)
        names = sorted(os.listdir(folder))
        (folder / "999-same.json").write_text("left over")
        write_proofs(ledger.store, folder)
        for wrong, said in ((other, "holds other files"), (tmp_path / "file", "it is a file")):
            with pytest.raises(InputError, match=said):
                write_proofs(ledger.store, wrong)
        with pytest.raises(InputError, match="folder does not exist"):
            write_proofs(ledger.store, tmp_path / "no" / "proofs")
    assert sorted(os.listdir(folder)) == names
    assert os.listdir(other) == ["thesis.tex"]
    assert sorted(os.listdir(tmp_path)) == ["file", "other", "plants.ledger", "proofs"]


def test_a_file_is_written_whole_or_not_at_all(tmp_path: Path) -> None:
    """An error in the middle leaves the file as it was, and nothing beside it."""
    target = tmp_path / "links.csv"
    target.write_text("as it was")

    def broken() -> object:
        yield "half\n"
        raise OSError(28, "No space left on device")

    with pytest.raises(InputError, match="No space left"):
        write_lines(target, broken())  # type: ignore[arg-type]
    assert target.read_text() == "as it was"
    assert os.listdir(tmp_path) == ["links.csv"]
    for wrong in (tmp_path, tmp_path / "no" / "links.csv"):
        with pytest.raises(InputError, match="cannot be written"):
            check_output(wrong)
