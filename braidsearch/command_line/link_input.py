"""Reading a link from an argument: a braid word, the code of a diagram, or polygons in space."""

from __future__ import annotations

from typing import TYPE_CHECKING

from braidsearch.command_line.answer import print_error
from braidsearch.command_line.arguments import read_standard_input, read_word_argument
from braidsearch.errors import InputError
from braidsearch.words import Braid, format_word
from braidsearch.words.link_notation import (
    WORD,
    hint_at_notations,
    named_file,
    read_named_file,
    split_notation,
)

if TYPE_CHECKING:
    from braidsearch.weaving.drawings import Drawing

INPUTS = """A link is a braid word, or a drawing with its notation in front:
"pd: [[1,5,2,4],...]" (planar diagram code), "gauss: O1+ U2+ ...", "dt: 4 6 2", "polygon: FILE"
(rows x y z, a blank line between components). A code may stand in a file, "pd: @FILE"; a lone -
reads standard input, as in "pd: -"."""

WORD_OR_DRAWING = 'a braid word, or a drawing: "pd: ...", "gauss: ...", "dt: ...", "polygon: FILE"'
"""What the help of a command says of an argument that holds a link."""

_LONGEST_INPUT = 100_000_000


def read_link_argument(name: str, text: str) -> Braid:
    """The braid that an argument holds; a drawing is woven first, which standard error says.

    Raises InputError, which names the argument, the offending text and what was expected.
    """
    drawing = read_drawing(name, text)
    if drawing is None:
        return read_undrawn_argument(name, text)
    from braidsearch.weaving.drawings import weave_drawing  # noqa: PLC0415 - words come faster

    woven = weave_drawing(drawing)
    print_error(f"{name}: woven from its {drawing.title}: {format_word(woven.braid)}")
    for note in woven.notes:
        print_error(f"{name}: note: {note}")
    return woven.braid


def read_undrawn_argument(name: str, text: str) -> Braid:
    """The braid that an argument without a notation in front holds, as ``read_word_argument``.

    Raises InputError; for a text that looks like a drawing it says how to write one.
    """
    try:
        return read_word_argument(name, text)
    except InputError as error:
        raise InputError(f"{error}{hint_at_notations(text)}") from None


def is_standard_input(text: str) -> bool:
    """Whether an argument is read from standard input: a lone -, or one behind a notation."""
    try:
        notation, body = split_notation(text)
    except InputError:  # a name before a colon that is no notation
        return False
    return (text if notation == WORD else body) == "-"


def read_drawing(name: str, text: str, seed: int = 0) -> Drawing | None:
    """The drawing that an argument holds, None where no notation of one stands in front.

    Raises InputError as ``read_link_argument`` does.
    """
    try:
        notation, body = split_notation(text)
        if notation == WORD:
            return None
        from braidsearch.weaving.drawings import parse_drawing  # noqa: PLC0415 - words come faster

        return parse_drawing(notation, _text_of(notation, body), seed)
    except InputError as error:
        raise InputError(f"{name}: {error}") from None


def _text_of(notation: str, body: str) -> str:
    """The code itself, the text of the file that the argument names, or standard input."""
    if body == "-":
        return read_standard_input(_LONGEST_INPUT)
    path = named_file(notation, body)
    return body if path is None else read_named_file(path)
