"""What a report needs to know of the terminal, and how text is set to its width.

Loaded on a terminal only: in a pipe or a file an answer is printed plain and complete. Lines are
counted in columns, and colour is put on after they are set, so that no escape code is ever counted
or broken.
"""

from __future__ import annotations

import os
import re
import shlex
import shutil
import sys
from collections.abc import Iterator, Sequence
from dataclasses import dataclass

NARROWEST = 40
"""Columns below which a report is not squeezed any further."""

WIDEST_TEXT = 100
"""Columns after which a sentence goes to the next line, however wide the terminal is."""

_BLUE, _YELLOW, _REVERSED, _BOLD = "97;44", "30;103", "7", "1"
# Codes of Select Graphic Rendition (ECMA-48). Blue and yellow are told apart in every common form
# of colour blindness, and both set the colour of letters too, so that they are read on dark and on
# light terminals alike. Colour never stands alone: a mark and words say the same.

VERDICTS: dict[str, tuple[str, str, str]] = {
    "same": (_BLUE, "=", "="),
    "different": (_YELLOW, "≠", "!="),
    "undecided": (_REVERSED, "?", "?"),
    "valid": (_BLUE, "✓", "+"),
    "rejected": (_YELLOW, "✗", "x"),
}
"""For each verdict its colour, its mark, and the mark where the encoding does not have that."""

_WORD_OF_INTEGERS = re.compile(r"[0-9 ,:\[\]+-]+")
_MOST_COMMAND_LINES = 6
_DOTS = "..."


@dataclass(frozen=True)
class Terminal:
    """A terminal: the columns that a line may fill, whether it takes colour, and its encoding."""

    columns: int
    is_coloured: bool = False
    encoding: str = "utf-8"

    @property
    def text_columns(self) -> int:
        """The columns that a line of a sentence may fill."""
        return min(self.columns, WIDEST_TEXT)

    def paint(self, code: str, text: str) -> str:
        """The text in a colour, unchanged where there is none."""
        return f"\x1b[{code}m{text}\x1b[0m" if self.is_coloured and text else text

    def headline(self, verdict: str, title: str, sentence: str) -> list[str]:
        """A mark and a title in the colour of the verdict, and the sentence behind them."""
        colour, mark, plain_mark = VERDICTS[verdict]
        mark = mark if _is_encodable(mark, self.encoding) else plain_mark
        label = f" {mark} {title} " if self.is_coloured else f"{mark} {title}:"
        first, *rest = wrap_text(sentence, self.text_columns, " " * (len(label) + 1), "  ")
        return [self.paint(colour, label) + first[len(label) :], *rest]

    def item(self, name: str, text: str, indent: str = "  ") -> list[str]:
        """A name with what it stands for; a long word without blanks is broken to fit."""
        text = shown_text(text, self.encoding)
        return wrap_text(f"{name}: {text}", self.text_columns, indent, indent + "  ")

    def command(self, name: str, arguments: Sequence[str], otherwise: str) -> list[str]:
        """A name and the command to type, below it where it is long; else ``otherwise``.

        A shell reads the lines as they stand: each but the last ends with a backslash. A command
        that cannot be shown so, or is too long to be worth it, is told in other words.
        """
        lines = wrap_command(arguments, self.columns - 4, self.encoding)
        if lines is None:
            return self.item(name, otherwise)
        painted = [self.paint(_BOLD, line) for line in lines]
        if len(lines) == 1 and len(name) + 4 + column_count(lines[0]) <= self.columns:
            return [f"  {name}: {painted[0]}"]
        return [f"  {name}:", *(f"    {line}" for line in painted)]


def read_terminal() -> Terminal:
    """The terminal that standard output is.

    NO_COLOR, when it is not empty, takes the colour away (the convention of many programs). Without
    TERM nothing is known of a terminal, so it gets none either.
    """
    # Some terminals go to a new line by themselves when the last column is filled.
    columns = max(shutil.get_terminal_size().columns, NARROWEST) - 1
    is_coloured = bool(os.environ.get("TERM")) and not os.environ.get("NO_COLOR")
    return Terminal(columns, is_coloured, sys.stdout.encoding or "utf-8")


def column_count(text: str) -> int:
    """The columns that a text fills: two for a wide character, none for a combining one."""
    if text.isascii():
        return len(text)
    import unicodedata  # noqa: PLC0415 - most reports are plain ASCII

    def columns_of(character: str) -> int:
        if unicodedata.category(character) in ("Mn", "Me", "Cf"):
            return 0
        return 2 if unicodedata.east_asian_width(character) in "WF" else 1

    return sum(map(columns_of, text))


def shown_text(text: str, encoding: str = "utf-8") -> str:
    """The text with escapes for what does not print, and for what the encoding does not have."""
    printable = "".join(
        character if character.isprintable() else character.encode("unicode_escape").decode()
        for character in text
    )
    return printable.encode(encoding, "backslashreplace").decode(encoding)


def cut_text(text: str, columns: int) -> str:
    """The text, or as many of its words as fit with dots behind them."""
    return cut_pieces(text.split(" "), columns)


def cut_pieces(pieces: Sequence[str], columns: int, start: int = 0) -> str:
    """The pieces from ``start`` on that fit, blanks between; dots where something is left out."""
    head = f"{_DOTS} " if start else ""
    whole = (head + " ".join(pieces[start:])).rstrip()
    if column_count(whole) <= columns:
        return whole
    room = columns - len(_DOTS)
    shown = head
    for piece in pieces[start:]:
        if column_count(shown + piece) + 1 > room:
            break
        shown += piece + " "
    if shown == head and start < len(pieces):  # not even one: a part of it says more than none
        shown += next(_iter_chopped(pieces[start], room - len(head)))
    return shown + _DOTS


def wrap_text(text: str, columns: int, first: str = "", rest: str = "") -> list[str]:
    """Lines of at most so many columns; ``first`` and ``rest`` stand before the first and others.

    Words stay whole where they fit a line. At least one line is returned.
    """
    lines, line, is_bare = [], first, True
    for word in _iter_words(text, columns - len(rest)):
        longer = line + word if is_bare else f"{line} {word}"
        if column_count(longer) > columns and not (is_bare and line == rest):
            lines.append(line.rstrip())
            longer = rest + word
        line, is_bare = longer, False
    return [*lines, line.rstrip()]


def _iter_words(text: str, columns: int) -> Iterator[str]:
    """The words of a text, those wider than the columns in parts that fill a line each."""
    for word in text.split(" "):  # two blanks in the name of a file are two
        yield from _iter_chopped(word, columns)


def _iter_chopped(word: str, columns: int) -> Iterator[str]:
    part = ""
    for character in word:
        if part and column_count(part + character) > columns:
            yield part
            part = ""
        part += character
    yield part


def wrap_command(
    arguments: Sequence[str], columns: int, encoding: str = "utf-8"
) -> list[str] | None:
    """The command in lines that a shell reads as one; None where it cannot be shown so.

    A line ends with a backslash where the command goes on. A word of integers may be broken at its
    blanks, since its quotes are double ones: the backslash joins the lines there too, and to
    such a word blanks more or fewer are nothing. Every other argument stays whole.
    """
    if any(shown_text(argument, encoding) != argument for argument in arguments):
        return None
    lines = [""]
    for part in _iter_command_parts(arguments):
        is_wide = 2 + column_count(part) + 2 > columns
        pieces = part.split(" ") if is_wide and part.endswith('"') else [part]
        for piece in pieces:
            longer = f"{lines[-1]} {piece}" if lines[-1] else piece
            if lines[-1] and column_count(longer) + 2 > columns:
                lines[-1] += " \\"
                lines.append(f"  {piece}")
            else:
                lines[-1] = longer
    is_too_wide = any(column_count(line) > columns for line in lines)
    return None if is_too_wide or len(lines) > _MOST_COMMAND_LINES else lines


def _iter_command_parts(arguments: Sequence[str]) -> Iterator[str]:
    """The arguments quoted, each option together with its value."""
    option = ""
    for argument in arguments:
        if re.match("-[a-z-]", argument) and not option:
            option = argument
        else:
            yield f"{option} {quote_argument(argument)}".lstrip()
            option = ""
    if option:
        yield option


def quote_argument(argument: str) -> str:
    """The argument as a shell reads it; a word of integers with blanks in double quotes."""
    if " " in argument and _WORD_OF_INTEGERS.fullmatch(argument):
        return f'"{argument}"'
    return shlex.quote(argument)


def _is_encodable(text: str, encoding: str) -> bool:
    try:
        text.encode(encoding)
    except (UnicodeEncodeError, LookupError):
        return False
    return True
