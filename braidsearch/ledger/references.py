"""Entries by what a person writes for them: a name, a source with a name, or a number."""

from __future__ import annotations

from braidsearch.errors import InputError
from braidsearch.ledger.store import Store, StoredEntry

_MOST_NAMES = 20_000  # among which a near one is looked for
_MOST_TITLES = 5


def find_entry(store: Store, reference: str) -> StoredEntry:
    """The entry that is meant by ``name``, by ``source/name`` or by ``#number``.

    Raises InputError where there is none, or more than one.
    """
    found = _entries(store, reference)
    if not found:
        raise InputError(
            f"{_shown(reference)}: no such entry: expected a name, source/name, or # and a number"
            f"{_nearest(store, reference)}"
        )
    if len(found) > 1:
        titles = ", ".join(entry.title for entry in found[:_MOST_TITLES])
        raise InputError(f"{reference}: {len(found)} entries: expected one of {titles}")
    return found[0]


def _entries(store: Store, reference: str) -> list[StoredEntry]:
    if not _is_text(reference):
        return []
    found = store.entries("name = ?", [reference])
    if reference.startswith("#") and reference[1:].isdecimal():
        found = found or store.entries("entries.id = ?", [reference[1:]])
    return found or store.entries("source || '/' || name = ?", [reference])


def _is_text(reference: str) -> bool:
    """Whether it can be written in UTF-8: bytes on a command line that are none cannot."""
    return not any("\ud800" <= sign <= "\udfff" for sign in reference)


def _shown(reference: str) -> str:
    return reference if reference and reference.isprintable() else ascii(reference)


def _nearest(store: Store, reference: str) -> str:
    """A hint at a name that is written almost like this one, if there is one."""
    import difflib  # noqa: PLC0415 - only for this mistake

    rows = store.rows("SELECT name FROM entries ORDER BY id LIMIT ?", [_MOST_NAMES])
    close = difflib.get_close_matches(reference, [name for (name,) in rows], n=1)
    return f"; is {close[0]} meant?" if close else ""
