"""Lists of entries as text: brackets of any kind, commas or blanks, or one list a line."""

from __future__ import annotations

import operator
import re
from collections.abc import Callable, Iterable, Iterator

from braidsearch.errors import InputError

MAX_CROSSINGS = 50_000

_BRACKETS = {"[": "]", "(": ")", "{": "}"}
_TOKEN = re.compile(r"[\[({]|[\])}]|[^\s,\[\](){}]+|\s*\n\s*")
_MINUS_SIGNS = dict.fromkeys(map(ord, "−‒–﹣－"), "-")
_LONGEST_TOKEN = 40


def split_groups(text: str, expected: str) -> list[list[str]]:
    """The innermost bracketed lists of the text, each as its entries.

    Without brackets every line, and every part of a line between semicolons, is a list. An empty
    pair of brackets is a list without entries. ``expected`` says what the lists are, for errors.

    Raises InputError for brackets that do not match, for entries beside brackets, and for a text
    without any list.
    """
    plain = text.translate(_MINUS_SIGNS).replace(";", "\n").strip()
    if not plain:
        raise InputError(f"an empty text: expected {expected}")
    tokens = _TOKEN.findall(plain)
    return _bracketed(tokens, expected) if set(plain) & set("[](){}") else _lines(tokens)


def _lines(tokens: Iterable[str]) -> list[list[str]]:
    groups: list[list[str]] = [[]]
    for token in tokens:
        if token.isspace():
            groups.append([])
        else:
            groups[-1].append(token)
    return [group for group in groups if group]


def _bracketed(tokens: Iterable[str], expected: str) -> list[list[str]]:
    """A stack of open brackets, each with its entries, or None once it holds brackets."""
    groups: list[list[str]] = []
    open_brackets: list[str] = []
    entries: list[list[str] | None] = [None]
    for token in tokens:
        if token.isspace():
            continue
        if token in _BRACKETS:
            if entries[-1]:
                raise InputError(f"{shown(entries[-1][-1])} before a bracket: expected {expected}")
            entries[-1] = None
            open_brackets.append(token)
            entries.append([])
        elif token in _BRACKETS.values():
            if not open_brackets or _BRACKETS[open_brackets.pop()] != token:
                raise InputError(f"{token!r} without its partner: expected {expected}")
            closed = entries.pop()
            if closed is not None:
                groups.append(closed)
        else:
            inner = entries[-1]
            if inner is None:
                raise InputError(f"{shown(token)} beside brackets: expected {expected}")
            inner.append(token)
    if open_brackets:
        raise InputError(f"{open_brackets[-1]!r} without its partner: expected {expected}")
    return groups


def read_integer(token: str, expected: str) -> int:
    """The integer that a token writes; raises InputError for any other token."""
    if not re.fullmatch(r"[+-]?[0-9]{1,12}", token):
        raise InputError(f"{shown(token)}: expected {expected}")
    return int(token)


def parse_integer_groups(text: str, expected: str) -> list[list[int]]:
    """``split_groups`` for lists of integers."""
    groups = split_groups(text, expected)
    return [[read_integer(token, expected) for token in group] for group in groups]


def checked_groups(groups: object, expected: str, entries_per_crossing: int) -> list[list[int]]:
    """Lists of integers from any iterables of them.

    Raises InputError for anything else, and for more than MAX_CROSSINGS crossings.
    """
    checked: list[list[int]] = []
    for group in _iterate(groups, expected):
        checked.append([_checked_integer(item, expected) for item in _iterate(group, expected)])
    entries = sum(map(len, checked))
    if entries > entries_per_crossing * MAX_CROSSINGS:
        raise InputError(f"{entries} entries: expected at most {MAX_CROSSINGS} crossings")
    return checked


def _iterate(items: object, expected: str) -> Iterator[object]:
    if isinstance(items, (str, bytes)) or not isinstance(items, Iterable):
        raise InputError(f"{shown(repr(items))}: expected {expected}")
    return iter(items)


def _checked_integer(item: object, expected: str) -> int:
    index: Callable[[object], int] = operator.index  # type: ignore[assignment]
    try:
        number = index(item)
    except TypeError:
        raise InputError(f"{shown(repr(item))}: expected {expected}") from None
    if isinstance(item, bool):
        raise InputError(f"{item!r}: expected {expected}")
    return number


def shown(token: str) -> str:
    """The token as quoted in a message: cut short, without line breaks."""
    short = token if len(token) <= _LONGEST_TOKEN else token[: _LONGEST_TOKEN - 3] + "..."
    return repr(short)
