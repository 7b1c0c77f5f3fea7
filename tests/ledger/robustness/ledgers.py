"""Small ledgers for tests of what may befall one, and their contents as text."""

import csv
import random
import shutil
import sqlite3
from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from pathlib import Path

from braidsearch.ledger.ledger import Ledger
from braidsearch.ledger.reading import Entry
from braidsearch.words import Braid, format_word
from tests.scrambles import scramble
from tests.unknots import MORTON

IMAGES = ("mirror", "reverse", "mirror-reverse")
ENOUGH_NODES = 2_000


def random_braid(generator: random.Random, strands: tuple[int, int], letters: tuple[int, int]):
    """A braid of so many strands and letters, at least and at most, drawn at random."""
    count = generator.randint(*strands)
    size = generator.randint(*letters)
    word = [generator.choice([-1, 1]) * generator.randint(1, count - 1) for _ in range(size)]
    return Braid(word, strands=count)


def entry(name: str, braid: Braid, source: str = "drawn", note: str = "") -> Entry:
    """An entry with its word as it would stand in a file."""
    return Entry(name, source, note, braid, format_word(braid))


def sample_entries() -> list[Entry]:
    """Links of which many are one, and unknots that no search of few nodes finds to be unknots.

    Morton's braid and its mirror image are such unknots (Morton, An irreducible 4-string braid with
    unknotted closure, 1983).
    """
    generator = random.Random(3)
    braids = [random_braid(generator, (3, 4), (5, 9)) for _ in range(30)]
    braids += [Braid([], strands=1), MORTON, MORTON.mirror()]
    braids += [scramble(MORTON, generator, moves, 5) for moves in (30, 60)]
    return [entry(f"link {place}", braid) for place, braid in enumerate(braids)]


@dataclass(frozen=True)
class Stage:
    """One step in the life of a ledger, which may be begun again after it was broken off."""

    name: str
    carry_out: Callable[[Ledger], object]
    command: tuple[str, ...] = ()


STAGES: tuple[Stage, ...] = (
    Stage("add", lambda ledger: ledger.add(sample_entries())),
    Stage("sort", lambda ledger: ledger.sort(nodes=0), ("--nodes", "0")),
    Stage(
        "sort up to symmetry",
        lambda ledger: ledger.sort(nodes=0, up_to=IMAGES),
        ("--nodes", "0", "--up-to", "any"),
    ),
    Stage(
        "retry",
        lambda ledger: ledger.sort(nodes=ENOUGH_NODES, up_to=IMAGES),
        ("--nodes", str(ENOUGH_NODES), "--up-to", "any"),
    ),
)


@dataclass(frozen=True)
class Life:
    """The files of an undisturbed ledger before each stage, and what is in it after each."""

    before: Mapping[str, Path | None]
    text_after: Mapping[str, str]

    def copy_before(self, stage: Stage, path: Path) -> Path:
        """The ledger as it is before a stage, to be spoilt."""
        file = self.before[stage.name]
        if file is not None:
            shutil.copyfile(file, path)
        return path


def live(folder: Path) -> Life:
    """Lead a ledger through all stages, undisturbed."""
    path = folder / "undisturbed"
    before: dict[str, Path | None] = {}
    text_after = {}
    for number, stage in enumerate(STAGES):
        before[stage.name] = None
        if path.exists():
            before[stage.name] = Path(shutil.copyfile(path, folder / f"before {number}"))
        with Ledger(path, create=True) as ledger:
            stage.carry_out(ledger)
        text_after[stage.name] = ledger_text(path)
    return Life(before, text_after)


def ledger_text(path: Path) -> str:
    """All that is in a ledger: every row of every table, with its number, as SQL."""
    connection = sqlite3.connect(path)
    try:
        lines = list(connection.iterdump())
        for field in ("application_id", "user_version"):
            lines.append(f"{field} {connection.execute(f'PRAGMA {field}').fetchone()[0]}")
        for (table,) in connection.execute("SELECT name FROM sqlite_master WHERE type = 'table'"):
            numbers = connection.execute(f"SELECT rowid FROM {table} ORDER BY rowid").fetchall()
            lines.append(f"{table} {numbers}")
        return "\n".join(lines)
    finally:
        connection.close()


def is_intact(path: Path) -> bool:
    """Whether SQLite finds the file in order."""
    connection = sqlite3.connect(path)
    try:
        return connection.execute("PRAGMA integrity_check").fetchall() == [("ok",)]
    finally:
        connection.close()


def partition(ledger: Ledger) -> set[frozenset[str]]:
    """The names of the entries, class by class."""
    return {frozenset(one.name for one in link.entries) for link in ledger.report().classes}


def whole_file(path: Path) -> bytes:
    """The bytes of a ledger that nobody has open."""
    assert not path.with_name(path.name + "-wal").exists()
    return path.read_bytes()


def write_table(path: Path, entries: Sequence[Entry]) -> Path:
    """A file with these entries, as ``ledger add`` reads it."""
    with path.open("w", encoding="utf-8", newline="") as file:
        table = csv.writer(file, lineterminator="\n")
        table.writerow(("name", "source", "note", "link"))
        table.writerows((one.name, one.source, one.note, one.given) for one in entries)
    return path


def count_rows(path: Path, table: str) -> int:
    """How many rows a table of a ledger has, while others may write in it."""
    connection = sqlite3.connect(path)
    try:
        return int(connection.execute(f"SELECT count(*) FROM {table}").fetchone()[0])
    finally:
        connection.close()
