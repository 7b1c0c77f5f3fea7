"""Classes and groups of a ledger, listed with the proofs that hold them together."""

from __future__ import annotations

from collections.abc import Sequence
from typing import TYPE_CHECKING

from braidsearch.certificates.display import show_value
from braidsearch.command_line.ledger.showing import MOST_LINES, plural, show_entry
from braidsearch.words import SYMMETRIES, format_word

if TYPE_CHECKING:
    from braidsearch.certificates import Certificate
    from braidsearch.ledger.ledger import Ledger
    from braidsearch.ledger.reporting import LinkClass
    from braidsearch.ledger.store import StoredEntry

MOST_ENTRIES = 6
"""So many entries of a class are shown among other classes."""


def list_classes(ledger: Ledger, classes: Sequence[LinkClass], *, is_whole: bool) -> list[str]:
    """The classes with more than one entry; with ``is_whole`` all of them, with all entries.

    Of a listing that will be cut the lines behind are empty: their proofs would take time.
    """
    shown = [one for one in classes if is_whole or len(one.entries) > 1]
    lines: list[str] = []
    for one in shown:
        entries = one.entries if is_whole else one.entries[:MOST_ENTRIES]
        more = len(one.entries) - len(entries)
        if not is_whole and len(lines) > MOST_LINES:
            lines += [""] * (1 + len(entries) + (more > 0))
            continue
        lines += [_headline(one), *_entry_lines(ledger, entries)]
        if more:
            lines.append(f"  ... {more} more (--class {one.number} lists them)")
    if len(shown) < len(classes):
        lines.append(f"classes with one entry: {len(classes) - len(shown)} (--all lists them)")
    return lines


def list_one_class(ledger: Ledger, one: LinkClass) -> list[str]:
    """A class with the values of its invariants and all entries."""
    from braidsearch.invariants import TITLES  # noqa: PLC0415 - help comes faster
    from braidsearch.ledger.fingerprints import FIELDS  # noqa: PLC0415 - the same

    marks = ledger.store.fingerprint_of_class(one.number)
    lines = [_headline(one)]
    for name in FIELDS:
        value = marks.value(name)
        shown = "not computed" if value is None else show_value(name, value)
        lines.append(f"  {TITLES[name]}: {shown}")
    return lines + _entry_lines(ledger, one.entries)


def list_groups(ledger: Ledger, groups: Sequence[Sequence[int]], *, is_whole: bool) -> list[str]:
    """Classes that are images of each other, and what each is of the first; as ``list_classes``."""
    shown = [group for group in groups if len(group) > 1]
    lines: list[str] = []
    for group in shown:
        if not is_whole and len(lines) > MOST_LINES:
            lines += [""] * (1 + len(group))
        else:
            lines += _group_lines(ledger, group)
    if len(shown) < len(groups):
        lines.append(f"classes in no group with others: {len(groups) - len(shown)}")
    return lines


def _headline(one: LinkClass) -> str:
    return f"class {one.number}: {plural(len(one.entries), 'entry')}, word {format_word(one.form)}"


def _entry_lines(ledger: Ledger, entries: Sequence[StoredEntry]) -> list[str]:
    """The entries of a class, the first of it first, and how each other one is joined to that."""
    lines = [f"  {show_entry(entry)}" for entry in entries[:1]]
    for entry in entries[1:]:
        certificate = ledger.joined(entry, entries[0])
        lines.append(f"  {show_entry(entry)}: {_moves(certificate)} to the first")
    return lines


def _group_lines(ledger: Ledger, group: Sequence[int]) -> list[str]:
    from braidsearch.ledger.reporting import first_entry  # noqa: PLC0415 - help comes faster

    first, *others = (first_entry(ledger.store, number) for number in group)
    lines = [f"group of {plural(len(group), 'class')}", f"  class {group[0]}, {show_entry(first)}"]
    for number, entry in zip(group[1:], others, strict=True):
        certificate = ledger.joined(entry, first, SYMMETRIES)
        image = "?" if certificate is None else certificate.symmetry
        said = f"{image} of the first, by {_moves(certificate)}"
        lines.append(f"  class {number}, {show_entry(entry)}: {said}")
    return lines


def _moves(certificate: Certificate | None) -> str:
    if certificate is None:
        return "NO PROOF (see braidsearch ledger check)"
    return plural(len(certificate.moves), "move") if certificate.moves else "no move"
