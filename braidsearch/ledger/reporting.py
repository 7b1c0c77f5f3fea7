"""What a ledger holds, as values: classes with their entries, open questions, contradictions."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Collection
from dataclasses import dataclass

from braidsearch.ledger.findings import Effort
from braidsearch.ledger.groups import group_classes
from braidsearch.ledger.store import Store, StoredEntry
from braidsearch.words import Braid


@dataclass(frozen=True, slots=True)
class LinkClass:
    """All entries that are proven to be one oriented link; ``form`` is its handiest braid."""

    number: int
    form: Braid
    entries: tuple[StoredEntry, ...]


@dataclass(frozen=True, slots=True)
class OpenQuestion:
    """Two classes of which it is not known whether one is this image of the other.

    Each is named by its first entry; ``tried`` holds the limits up to which it was looked for.
    """

    left: StoredEntry
    right: StoredEntry
    symmetry: str
    tried: Effort
    reason: str


@dataclass(frozen=True, slots=True)
class Contradiction:
    """Two proofs that the verifier accepts and that cannot both be true, by their numbers.

    ``different`` is None where values of the two classes differ, each of them confirmed, of which
    the verifier takes no certificate: both together are too large for it. One of the two has met
    a defect of the verifier, or a theorem is applied wrongly: neither is believed any more, and
    the classes stay as they were.
    """

    number: int
    same: int
    different: int | None
    left: StoredEntry
    right: StoredEntry


@dataclass(frozen=True, slots=True)
class LedgerReport:
    """A ledger as a whole. ``groups`` holds the numbers of classes that are images of one another.

    ``unsorted`` counts entries without a class, ``proofs`` the stored evidence.
    """

    classes: tuple[LinkClass, ...]
    groups: tuple[tuple[int, ...], ...]
    unsorted: int
    proofs: int
    open_questions: tuple[OpenQuestion, ...]
    contradictions: tuple[Contradiction, ...]


def report_ledger(store: Store, up_to: Collection[str]) -> LedgerReport:
    """The report on all of the ledger; groups are made up to these symmetries."""
    members: defaultdict[int, list[StoredEntry]] = defaultdict(list)
    unsorted = 0
    for entry in store.entries():
        if entry.class_number is None:
            unsorted += 1
        else:
            members[entry.class_number].append(entry)
    classes = tuple(
        LinkClass(number, form, tuple(members[number])) for number, form, _ in store.all_classes()
    )
    groups = tuple(map(tuple, group_classes(store, up_to)))
    return LedgerReport(
        classes,
        groups,
        unsorted,
        store.count("evidence"),
        open_questions(store),
        _contradictions(store),
    )


def open_questions(store: Store) -> tuple[OpenQuestion, ...]:
    """The questions that were tried and left open."""
    return tuple(
        OpenQuestion(
            _entry_of_form(store, left), _entry_of_form(store, right), symmetry, tried, reason
        )
        for left, right, symmetry, tried, reason in store.undecided()
    )


def _contradictions(store: Store) -> tuple[Contradiction, ...]:
    rows = store.rows("SELECT id, same, different, left, right FROM contradictions ORDER BY id")
    return tuple(
        Contradiction(number, same, different, first_entry(store, left), first_entry(store, right))
        for number, same, different, left, right in rows
    )


def first_entry(store: Store, class_number: int) -> StoredEntry:
    """The entry of a class that was the first to be entered."""
    first = (
        "(SELECT min(one.id) FROM forms JOIN placed ON placed.form = forms.braid "
        "JOIN entries AS one ON one.braid = placed.braid WHERE forms.class = ?)"
    )  # not in the order of entry, for that goes through all before the first one
    return store.entries(f"entries.id = {first}", [class_number])[0]


def _entry_of_form(store: Store, form: int) -> StoredEntry:
    """The first entry with this form, else of its class."""
    own = store.entries("placed.form = ?", [form], most=1)
    return own[0] if own else first_entry(store, store.class_of_form(form) or 0)
