"""A ledger of which bytes are overwritten or lost: it says so, and answers nothing wrong unseen."""

import random
import sqlite3
from collections.abc import Callable
from contextlib import closing
from pathlib import Path
from typing import Any

import pytest

from braidsearch.errors import InputError
from braidsearch.ledger.ledger import Ledger
from braidsearch.words import Braid
from tests.ledger.robustness.ledgers import IMAGES, entry, sample_entries, whole_file
from tests.ledger.robustness.processes import message_of, run
from tests.unknots import MORTON

Answers = dict[str, Any]


@pytest.fixture(scope="module")
def sound(tmp_path_factory: pytest.TempPathFactory) -> bytes:
    """A small ledger with all kinds of rows: proofs, images, open questions, notes."""
    path = tmp_path_factory.mktemp("sound") / "ledger"
    links = [entry(f"link {at}", one.braid, note="seen twice") for at, one in enumerate(few())]
    with Ledger(path, create=True) as ledger:
        ledger.add(links)
        ledger.sort(nodes=0, up_to=IMAGES)
        assert ledger.report().open_questions
        assert ledger.check().valid
    return whole_file(path)


def few() -> list[Any]:
    sample = sample_entries()
    return [*sample[:5], *sample[30:33]]


NEW = Braid([1, 1, 1, 2, -1, 2, 2, 2])
"""A link that is not in the ledger."""


def ask_all(path: Path) -> Answers:
    """What the ledger answers to every question; in place of an answer the message of an error."""
    questions: dict[str, Callable[[Ledger], Any]] = {
        "report": lambda ledger: ledger.report(),
        "find a member": lambda ledger: ledger.find(few()[3].braid, nodes=0),
        "find a new link": lambda ledger: ledger.find(NEW, nodes=0),
        "proof of sameness": lambda ledger: ledger.proof("link 5", "link 5"),
        "proof of difference": lambda ledger: ledger.proof("link 2", "link 4"),
        "check": lambda ledger: ledger.check(),
    }
    return {name: answer_of(path, question) for name, question in questions.items()}


def answer_of(path: Path, question: Callable[[Ledger], Any]) -> Any:
    try:
        with Ledger(path) as ledger:
            return question(ledger)
    except InputError as error:
        return line_of(error)


def line_of(error: InputError) -> str:
    """The message, which is one line."""
    assert str(error).isprintable(), str(error)
    return str(error)


def sort_more(path: Path) -> Any:
    """Enter a link, and sort with more nodes; True, or the message of an error."""
    try:
        with Ledger(path) as ledger:
            ledger.add([entry("one more", MORTON), entry("new", NEW)])
            ledger.sort(nodes=1)
    except InputError as error:
        return line_of(error)
    return True


def check_damage(content: bytes, sound_answers: Answers, path: Path, where: str) -> str:
    """Hold a damaged ledger to what is promised; what became of it in a word."""
    remove(path)
    path.write_bytes(content)
    answers = ask_all(path)
    check = answers["check"]
    is_told = isinstance(check, str) or not check.valid
    if not is_told:
        wrong = [name for name, answer in answers.items() if answer != sound_answers[name]]
        assert wrong == [], f"{where}: the check finds nothing"
    sort_more(path)
    return "told" if is_told else "harmless"


def remove(path: Path) -> None:
    for ending in ("", "-wal", "-shm"):
        path.with_name(path.name + ending).unlink(missing_ok=True)


def overwritten(content: bytes, generator: random.Random) -> tuple[bytes, str]:
    """The content with some bytes overwritten: few or many, at random or by others of the file."""
    size = generator.choice([1, 1, 1, 2, 8, 100, 4096])
    place = generator.randrange(100, len(content) - size)
    kind = generator.choice(["random", "moved", "digit", "zero"])
    if kind == "random":
        new = generator.randbytes(size)
    elif kind == "moved":
        start = generator.randrange(len(content) - size)
        new = content[start : start + size]
    elif kind == "digit":
        new = bytes(generator.choice(b"0123456789 -") for _ in range(size))
    else:
        new = bytes(size)
    where = f"{size} bytes from {place}: {kind}"
    return content[:place] + new + content[place + size :], where


def check_many(sound: bytes, path: Path, seeds: range) -> dict[str, int]:
    path.write_bytes(sound)
    sound_answers = ask_all(path)
    assert sound_answers["check"].valid
    results = {"told": 0, "harmless": 0}
    for seed in seeds:
        content, where = overwritten(sound, random.Random(seed))
        results[check_damage(content, sound_answers, path, f"seed {seed}, {where}")] += 1
    return results


def test_overwritten_bytes_are_told_or_harmless(sound: bytes, tmp_path: Path):
    """Every answer of a ledger with damaged bytes is a line, or the right answer, or the check
    finds the damage."""
    results = check_many(sound, tmp_path / "ledger", range(12))
    assert results["told"] > 2


def test_damaged_names_of_tables_are_told(sound: bytes, tmp_path: Path):
    """A byte that is no text, in any of the statements that made the tables, is told at once."""
    path = tmp_path / "ledger"
    places = [at for at in range(len(sound)) if sound.startswith(b"CREATE ", at)]
    assert len(places) > 10
    for at in (place + shift for place in places for shift in (0, 8, 15, 25)):
        remove(path)
        path.write_bytes(sound[:at] + b"\xeb" + sound[at + 1 :])
        assert "damaged" in answer_of(path, lambda ledger: ledger.report()), at


def test_a_row_that_lost_a_value_is_told(sound: bytes, tmp_path: Path):
    """Places at which a damaged row once ended in an error of the program."""
    path = tmp_path / "ledger"
    path.write_bytes(sound)
    with closing(sqlite3.connect(path)) as connection:
        connection.execute("PRAGMA writable_schema = ON")
        connection.execute(
            "UPDATE sqlite_master SET sql = replace(sql, 'word TEXT NOT NULL', 'word TEXT') "
            "WHERE name = 'braids'"
        )
        connection.commit()
    with closing(sqlite3.connect(path)) as connection:
        connection.execute("UPDATE braids SET word = NULL WHERE id = 3")
        connection.execute("PRAGMA writable_schema = ON")
        connection.execute(
            "UPDATE sqlite_master SET sql = replace(sql, 'word TEXT', 'word TEXT NOT NULL') "
            "WHERE name = 'braids'"
        )
        connection.commit()
    answers = ask_all(path)
    assert not answers["check"].valid
    assert "damaged" in answers["report"]


@pytest.mark.slow
def test_bytes_overwritten_at_a_thousand_places_are_told_or_harmless(sound: bytes, tmp_path: Path):
    """The same at a thousand places: 269 are told, the others hold nothing that is asked."""
    results = check_many(sound, tmp_path / "ledger", range(1000, 2000))
    assert results["told"] > 200


@pytest.mark.parametrize("share", [0.03, 0.3, 0.6, 0.97, 0.999])
def test_a_truncated_ledger_is_told(share: float, sound: bytes, tmp_path: Path):
    """A ledger of which the end is missing is never taken for a whole one."""
    path = tmp_path / "ledger"
    path.write_bytes(sound[: int(share * len(sound))])
    check = ask_all(path)["check"]
    assert isinstance(check, str) or not check.valid
    assert sort_more(path) is not True


def test_the_command_tells_damage_in_one_line(sound: bytes, tmp_path: Path):
    """A damaged ledger ends a command with status 2 and one line that says what to do."""
    path = tmp_path / "ledger"
    path.write_bytes(sound[:8192] + bytes(len(sound) - 8192))
    outcome = run("report", str(path))
    assert outcome.status == 2
    message = message_of(outcome)
    assert str(path) in message
    assert "damaged" in message


@pytest.mark.parametrize(
    ("old", "new"),
    [
        (b"seen twice", b"seen twine"),  # a note
        (b"canonical form of the mirror", b"canonical farm of the mirror"),  # how a proof was found
        (b"node limit", b"note limit"),  # why a question is open
        (b"drawn", b"drown"),  # a source
    ],
)
def test_a_changed_text_that_no_proof_holds_is_found(
    old: bytes, new: bytes, sound: bytes, tmp_path: Path
):
    """Each single text in the file, changed in one place to another of the same length, is told."""
    path = tmp_path / "ledger"
    places = [at for at in range(len(sound)) if sound.startswith(old, at)]
    assert len(places) > 1  # in its table, and in an index
    for at in (places[0], places[-1]):
        remove(path)
        path.write_bytes(sound[:at] + new + sound[at + len(old) :])
        check = answer_of(path, lambda ledger: ledger.check())
        assert isinstance(check, str) or not check.valid, at


def test_what_the_file_check_says_in_many_lines_are_many_faults(sound: bytes, tmp_path: Path):
    """SQLite tells of a damaged page in one text of several lines: each becomes one fault."""
    path = tmp_path / "ledger"
    path.write_bytes(sound)
    with closing(sqlite3.connect(path)) as connection:
        page_size = connection.execute("PRAGMA page_size").fetchone()[0]
        root = connection.execute(
            "SELECT rootpage FROM sqlite_master WHERE name = 'entries'"
        ).fetchone()[0]
    begin = (root - 1) * page_size
    swapped = sound[begin + 12 : begin + 14] + sound[begin + 8 : begin + 12]  # places of rows
    path.write_bytes(sound[: begin + 8] + swapped + sound[begin + 14 :])
    with Ledger(path) as ledger:
        faults = ledger.check().faults
    assert len(faults) > 1
    assert all(fault.isprintable() for fault in faults)
