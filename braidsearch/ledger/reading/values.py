"""What is read of a catalogue: rows as they stand, entries with their braids, and mistakes."""

from __future__ import annotations

from dataclasses import dataclass, field

from braidsearch.words import Braid
from braidsearch.words.link_notation import PREFIXES, WORD

PROBLEMS_SHOWN = 20
"""So many mistakes of one file are kept and shown in full; the others are counted."""

_PREFIX_OF = {notation: prefix for prefix, notation in PREFIXES.items()}
_LONGEST_TEXT = 40


@dataclass(frozen=True, slots=True)
class Row:
    """One link of a file as it stands there, its text not yet looked at.

    ``line`` counts from 1 and is 0 where the link is the whole file; ``item`` counts the objects
    of a JSON file, which may share a line, and is 0 elsewhere. ``notation`` is that of a drawing,
    a value of PREFIXES, or WORD; ``text`` comes without a prefix. Polygons, and codes that stand
    in a file of their own, have been fetched from it: ``named_file`` is its name.
    """

    file: str
    line: int
    name: str
    source: str
    note: str
    notation: str
    text: str
    named_file: str = ""
    item: int = 0

    @property
    def given(self) -> str:
        """The link as one text with its notation in front; of polygons the name of the file."""
        if self.notation == WORD:
            return self.text
        body = self.named_file if self.notation == "polygon" else self.text
        return f"{_PREFIX_OF[self.notation]}: {body}"


@dataclass(frozen=True, slots=True)
class Problem:
    """A mistake in a file: ``message`` has the offending text and what was expected."""

    file: str
    line: int
    message: str
    item: int = 0

    def __str__(self) -> str:
        return f"{place_of(self)}: {self.message}"


@dataclass(frozen=True, slots=True)
class Entry:
    """One link of a catalogue, with the closed braid that stands for it.

    ``given`` is the link as the file has it, see ``Row.given``. ``remarks`` holds, for one that
    was woven from a drawing, what the notation leaves open and how the diagram was simplified.
    """

    name: str
    source: str
    note: str
    braid: Braid
    given: str
    remarks: tuple[str, ...] = ()
    file: str = field(default="", compare=False)
    line: int = field(default=0, compare=False)
    item: int = field(default=0, compare=False)


@dataclass(frozen=True, slots=True)
class Repeated:
    """An entry whose name, source, note and braid stand in an earlier place of the file too."""

    file: str
    line: int
    name: str
    item: int = 0


@dataclass(frozen=True, slots=True)
class Reading:
    """All that was read of a file.

    ``problems`` holds the first PROBLEMS_SHOWN mistakes, of ``problem_count`` in all; ``repeated``
    counts the lines that only say again what an earlier one says.
    """

    entries: tuple[Entry, ...]
    problems: tuple[Problem, ...] = ()
    problem_count: int = 0
    repeated: int = 0


def format_problems(reading: Reading) -> str:
    """The mistakes, a line each, and how many more there are; nothing where there are none."""
    lines = [str(problem) for problem in reading.problems]
    more = reading.problem_count - len(lines)
    return "\n".join(lines + [f"and {more} more"] * (more > 0))


def place_of(value: Row | Problem | Entry | Repeated) -> str:
    """Where something stands, in words: the file, and the line unless it is the whole file."""
    line = f", line {value.line}" * (value.line > 0)
    return f"{value.file}{line}{f', object {value.item}' * (value.item > 0)}"


def shown(text: str) -> str:
    """The text as quoted in a message: cut short, without line breaks."""
    return repr(text if len(text) <= _LONGEST_TEXT else text[: _LONGEST_TEXT - 3] + "...")
