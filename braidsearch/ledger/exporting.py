"""A ledger written out: entries with their classes as a table or JSON lines, proofs as files."""

from __future__ import annotations

import csv
import json
import os
import shutil
from collections.abc import Iterable, Iterator
from contextlib import contextmanager
from dataclasses import astuple, dataclass, fields
from io import StringIO
from pathlib import Path

from braidsearch.errors import InputError
from braidsearch.ledger.groups import group_classes
from braidsearch.ledger.store import Evidence, Store, StoredEntry
from braidsearch.words import format_word

INDEX = "index.csv"
INDEX_COLUMNS = (
    "number",
    "file",
    "verdict",
    "symmetry",
    "left",
    "right",
    "reason",
    "entries",
)
_MOST_TITLES = 3


@dataclass(frozen=True, slots=True)
class ExportedEntry:
    """An entry with what the ledger says of it; the names of the fields are the columns.

    ``link`` is its braid word, ``given`` the link as it was entered. ``class_number`` and what
    stands behind it are None for an entry that is not sorted: ``class_name`` is the name of the
    first entry of its class, ``form`` the word that represents it, ``group`` the number of the
    oldest class that is known to be its image under a symmetry.
    """

    name: str
    source: str
    note: str
    link: str
    given: str
    class_number: int | None
    class_name: str | None
    form: str | None
    group: int | None


COLUMNS: tuple[str, ...] = tuple(field.name for field in fields(ExportedEntry))


def iter_exported(store: Store) -> Iterator[ExportedEntry]:
    """All entries in the order in which they were entered."""
    forms = {number: format_word(form) for number, form, _ in store.all_classes()}
    groups = {number: group[0] for group in group_classes(store) for number in group}
    names: dict[int, str] = {}
    for entry in store.entries():
        own = entry.name, entry.source, entry.note, format_word(entry.braid), entry.given
        number = entry.class_number
        if number is None:
            yield ExportedEntry(*own, None, None, None, None)
        else:
            name = names.setdefault(number, entry.name)
            yield ExportedEntry(*own, number, name, forms[number], groups[number])


def iter_table_lines(entries: Iterable[ExportedEntry]) -> Iterator[str]:
    """The lines of a table of comma-separated values, titles first, with their ends."""
    yield _table_line(COLUMNS)
    for entry in entries:
        yield _table_line(["" if cell is None else cell for cell in astuple(entry)])


def iter_json_lines(entries: Iterable[ExportedEntry]) -> Iterator[str]:
    """One JSON object a line, with the same keys as the table has columns."""
    for entry in entries:
        values = dict(zip(COLUMNS, astuple(entry), strict=True))
        yield json.dumps(values, ensure_ascii=False) + "\n"


def is_exported(path: str | os.PathLike[str]) -> bool:
    """Whether a file begins as an export does, so that its columns are known to be ours."""
    try:
        with open(path, encoding="utf-8", errors="replace", newline="") as file:
            first = file.readline(1_000_000)
    except (OSError, ValueError):
        return False
    if first == _table_line(COLUMNS):
        return True
    try:
        value = json.loads(first) if first.startswith("{") else None
    except (ValueError, RecursionError):
        return False
    return isinstance(value, dict) and tuple(value) == COLUMNS


def _table_line(cells: Iterable[object]) -> str:
    line = StringIO()
    csv.writer(line, lineterminator="\n").writerow(cells)
    return line.getvalue()


# files


def check_output(path: str | os.PathLike[str]) -> None:
    """Raise InputError when no file can be written to the path, before work is put in it."""
    target = os.path.realpath(path)
    folder = os.path.dirname(target)
    if os.path.isdir(target):
        raise _unwritable(path, "it is a folder: expected the name of a file")
    _check_folder(path, folder)


def _check_folder(path: str | os.PathLike[str], folder: str) -> None:
    if not os.path.isdir(folder):
        raise _unwritable(path, "its folder does not exist: expected an existing one")
    if not os.access(folder, os.W_OK):
        raise _unwritable(path, "no permission: expected a place that can be written")


def write_lines(path: str | os.PathLike[str], lines: Iterable[str]) -> None:
    """Write a file whole or not at all. Raises InputError when it cannot be written."""
    check_output(path)
    target = os.path.realpath(path)
    with _writing(path):
        if os.path.exists(target) and not os.path.isfile(target):
            with open(target, "w", encoding="utf-8", newline="") as file:  # a pipe stays one
                file.writelines(lines)
            return
        partial = f"{target}.{os.getpid()}.partial"
        try:
            with open(partial, "w", encoding="utf-8", newline="") as file:
                file.writelines(lines)
            os.replace(partial, target)
        finally:
            if os.path.exists(partial):
                os.unlink(partial)


def check_proofs_folder(path: str | os.PathLike[str]) -> None:
    """Raise InputError when the proofs cannot be written to a folder of this name.

    It may be new, empty, or an earlier export, which is then replaced.
    """
    target = os.path.realpath(path)
    _check_folder(path, os.path.dirname(target))
    if not os.path.exists(target):
        return
    if not os.path.isdir(target):
        raise _unwritable(path, "it is a file: expected a folder")
    names = os.listdir(target)
    if names and INDEX not in names:
        raise _unwritable(path, "it holds other files: expected a new or empty folder")


def write_proofs(store: Store, path: str | os.PathLike[str]) -> int:
    """Write each proof to a file of its own, beside an index; the number of proofs.

    The folder appears whole, in place of an earlier export if there is one. Raises InputError
    when it cannot be written.
    """
    check_proofs_folder(path)
    target = os.path.realpath(path)
    partial, old = (f"{target}.{os.getpid()}.{state}" for state in ("partial", "old"))
    with _writing(path):
        try:
            os.mkdir(partial)
            count = _write_all(store, Path(partial))
            if os.path.exists(target):
                os.rename(target, old)
            os.rename(partial, target)
        finally:
            shutil.rmtree(partial, ignore_errors=True)
            shutil.rmtree(old, ignore_errors=True)
    return count


def _write_all(store: Store, folder: Path) -> int:
    width = len(str(store.one("SELECT max(id) FROM evidence") or 0))
    count = 0
    with open(folder / INDEX, "w", encoding="utf-8", newline="") as index:
        index.write(_table_line(INDEX_COLUMNS))
        for proof in store.evidence():
            file = f"{proof.number:0{width}}-{proof.verdict}.json"
            (folder / file).write_text(proof.certificate, encoding="utf-8", newline="")
            index.write(_table_line(_index_cells(store, proof, file)))
            count += 1
    return count


def _index_cells(store: Store, proof: Evidence, file: str) -> list[object]:
    left, right = (format_word(store.braid(braid)) for braid in (proof.left, proof.right))
    titles = _titles(store, proof)
    return [proof.number, file, proof.verdict, proof.symmetry, left, right, proof.reason, titles]


def _titles(store: Store, proof: Evidence) -> str:
    """The first entries that the proof is about: those with its braids, else with its forms."""
    found: dict[int, StoredEntry] = {}
    for braid in (proof.left, proof.right):
        most = _MOST_TITLES + 1
        entries = store.entries("entries.braid = ?", [braid], most)
        entries = entries or store.entries("placed.form = ?", [braid], most)
        found |= {entry.number: entry for entry in entries}
    titles = [entry.title for entry in found.values()]
    return "; ".join(titles[:_MOST_TITLES] + ["..."] * (len(titles) > _MOST_TITLES))


@contextmanager
def _writing(path: str | os.PathLike[str]) -> Iterator[None]:
    try:
        yield
    except OSError as error:
        raise _unwritable(path, error.strerror or str(error)) from None


def _unwritable(path: str | os.PathLike[str], why: str) -> InputError:
    return InputError(f"{os.fspath(path)!r} cannot be written: {why}")
