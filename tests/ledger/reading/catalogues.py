"""Files of links for the tests of reading: written by the standard library, or by hand."""

import csv
import io
import json
from collections.abc import Iterable
from pathlib import Path
from typing import Any

from hypothesis import strategies as st

from braidsearch.ledger.reading import Entry, Reading, read_entries
from braidsearch.words import format_word
from tests.strategies import braids

TREFOIL_CODE = "[[1,5,2,4],[3,1,4,6],[5,3,6,2]]"
COLUMNS = ("name", "source", "note", "link")

printable = st.characters(exclude_categories=("Cc", "Cf", "Cs", "Zl", "Zp"))
labels = st.text(printable, min_size=1, max_size=20).map(str.strip).filter(bool)


@st.composite
def entries(draw: st.DrawFn) -> Entry:
    """An entry with a braid word, and any name, source and note that a file can hold."""
    braid = draw(braids())
    note = draw(st.text(printable | st.just("\n"), max_size=20)).strip()
    return Entry(draw(labels), draw(labels), note, braid, format_word(braid))


catalogues = st.lists(entries(), min_size=1, max_size=8, unique_by=lambda e: (e.name, e.source))


def table_text(found: Iterable[Entry], delimiter: str = ",") -> str:
    """The entries as a table that the standard library writes."""
    file = io.StringIO(newline="")
    writer = csv.writer(file, delimiter=delimiter)
    writer.writerow(COLUMNS)
    writer.writerows((e.name, e.source, e.note, e.given) for e in found)
    return file.getvalue()


def json_objects(found: Iterable[Entry]) -> list[dict[str, Any]]:
    """The entries as objects, their words as lists of letters with the strand count."""
    return [
        {
            "name": e.name,
            "source": e.source,
            "note": e.note,
            "braid": {"strands": e.braid.strands, "word": list(e.braid.word)},
        }
        for e in found
    ]


def write(path: Path, content: str | bytes) -> Path:
    """The file with this content; text goes out in UTF-8, line ends as they are."""
    path.write_bytes(content.encode() if isinstance(content, str) else content)
    return path


def read(path: Path, content: str | bytes, **options: Any) -> Reading:
    """What is read of a file with this content."""
    return read_entries(write(path, content), **options)


def links(reading: Reading) -> dict[str, str]:
    """The words of the entries by their names; of a reading without a mistake."""
    assert reading.problem_count == 0, reading.problems
    return {entry.name: format_word(entry.braid) for entry in reading.entries}


def messages(reading: Reading) -> list[str]:
    """The mistakes without the name of the file."""
    return [str(problem).removeprefix(problem.file).lstrip(",: ") for problem in reading.problems]


def dump_lines(objects: Iterable[Any]) -> str:
    """One JSON object a line."""
    return "".join(json.dumps(value, ensure_ascii=False) + "\n" for value in objects)
