"""What stands in front of a link in a text: nothing before a braid word, else the notation."""

from __future__ import annotations

import os
import re

from braidsearch.errors import InputError

PREFIXES: dict[str, str] = {
    "pd": "planar-diagram",
    "gauss": "gauss",
    "dt": "dowker-thistlethwaite",
    "polygon": "polygon",
}
"""What stands in front of a drawing, and the notation that follows it."""

WORD = "braid"
"""The notation of a braid word, which has nothing in front."""

MAX_FILE = 100_000_000
"""So many characters are read of a file that a drawing names."""

_PREFIX = re.compile(rf"\s*({'|'.join(PREFIXES)})\s*:(.*)", re.DOTALL | re.IGNORECASE)
_OTHER_NAME = re.compile(r"\s*([^\W\d][^:\n]{0,39}?)\s*:")
_DRAWN = re.compile(r"\[\s*\[|\bX\s*\[|\b[OU][0-9]+[+-]")
_LONGEST_PATH = 100


def split_notation(text: str) -> tuple[str, str]:
    """The notation of the link that the text holds, WORD or a value of PREFIXES, and the rest.

    Raises InputError for a name before a colon that is no notation.
    """
    if ":" not in text:
        return WORD, text
    match = _PREFIX.match(text)
    if match is not None:
        return PREFIXES[match[1].lower()], match[2].strip()
    other = _OTHER_NAME.match(text)
    if other is not None:
        expected = f"a strand count, or a notation: {', '.join(PREFIXES)}"
        raise InputError(f"{other[1]!r} before the colon: expected {expected}")
    return WORD, text


def named_file(notation: str, body: str) -> str | None:
    """The file that a drawing names in place of its code, None where the code itself stands there.

    Polygons always stand in a file, ``polygon: FILE``; a code does behind an @, ``pd: @FILE``.
    Raises InputError where the name is missing.
    """
    if notation == "polygon" and body in ("", "@"):
        raise InputError("polygon: expected the name of a file with rows x y z, or -")
    if not body.startswith("@"):
        return body if notation == "polygon" else None
    path = body[1:].strip()
    if not path:
        raise InputError("'@': expected the name of a file behind it")
    return path


def read_named_file(path: str | os.PathLike[str]) -> str:
    """The text of a file that a drawing names. Raises InputError where it has none in UTF-8."""
    shown = _shown_path(os.fspath(path))
    try:
        with open(path, encoding="utf-8-sig") as file:
            text = file.read(MAX_FILE + 1)
    except OSError as error:
        raise InputError(f"{shown}: {error.strerror}: expected a file") from None
    except (UnicodeDecodeError, ValueError):
        raise InputError(f"{shown}: expected a file of text in UTF-8") from None
    if len(text) > MAX_FILE:
        raise InputError(f"{shown}: expected at most {MAX_FILE} characters")
    return text


def hint_at_notations(text: str) -> str:
    """What to say besides of a text that is no braid word and looks like a drawing, or a file."""
    if os.path.isfile(text):
        return '; a file has its notation in front: "polygon: FILE", "pd: @FILE"'
    if _DRAWN.search(text):
        return '; a drawing has its notation in front: "pd: [[1,5,2,4],...]", "gauss: O1+ U2+ ..."'
    return ""


def _shown_path(path: str) -> str:
    """The path as quoted in a message: of a long one the end, which tells most."""
    return repr(path if len(path) <= _LONGEST_PATH else "..." + path[3 - _LONGEST_PATH :])
