"""The ledger as scripts use it: one file, opened, asked and closed."""

from __future__ import annotations

import os
from collections.abc import Callable, Iterable, Sequence
from concurrent.futures import Executor
from dataclasses import dataclass
from types import TracebackType
from typing import TYPE_CHECKING

from braidsearch.certificates import Certificate
from braidsearch.errors import InputError
from braidsearch.ledger.findings import Effort
from braidsearch.ledger.proofs import Proofs
from braidsearch.ledger.references import find_entry
from braidsearch.ledger.reporting import LedgerReport, OpenQuestion, open_questions, report_ledger
from braidsearch.ledger.soundness import blaming_damage
from braidsearch.ledger.store import Store, StoredEntry
from braidsearch.search.gate import judge
from braidsearch.search.limits import SearchLimits
from braidsearch.words import SYMMETRIES, Braid

if TYPE_CHECKING:
    from braidsearch.ledger.checking import CheckReport
    from braidsearch.ledger.finding import Found
    from braidsearch.ledger.reading import Entry
    from braidsearch.ledger.sorting import Report, SortSummary

DEFAULT_NODES = 1_000


@dataclass(frozen=True, slots=True)
class AddSummary:
    """What ``add`` did: entries that are new, and entries that were there already.

    Of the new ones ``doubled`` have the name and the word that an entry of another source has, as
    when one file is entered twice under two names.
    """

    added: int
    known: int
    doubled: int = 0


@dataclass(frozen=True, slots=True)
class Proof:
    """What a ledger can say of two entries: ``outcome`` as of a verdict.

    ``certificate`` is about the braids of the two entries; None when undecided, and then
    ``question`` says what was tried, if anything was.
    """

    outcome: str
    symmetry: str | None
    certificate: Certificate | None
    question: OpenQuestion | None = None


class Ledger:
    """A catalogue of links in one file, with the evidence for every decision.

    ``create`` makes the file when there is none. Every method that changes the ledger keeps its
    change whole, or block by block; after an error, an interrupt or a crash the file holds all
    that was kept before. Raises InputError, in one line that names the file, for a file that is
    missing, damaged, no ledger, of a newer version, or written by another process meanwhile.

        with Ledger("rings.ledger", create=True) as ledger:
            ledger.add([Entry("ring 1", "simulation", "", Braid([1, 1, 1]), "1 1 1")])
            ledger.sort()
            ledger.find(Braid([1, 2, 1, 2])).outcome      # "same"
    """

    def __init__(self, path: str | os.PathLike[str], *, create: bool = False) -> None:
        self.store = Store(path, create=create)

    def __enter__(self) -> Ledger:
        return self

    def __exit__(
        self,
        kind: type[BaseException] | None,
        error: BaseException | None,
        traceback: TracebackType | None,
    ) -> None:
        self.close()

    def close(self) -> None:
        """Close the file."""
        self.store.close()

    def add(self, entries: Iterable[Entry]) -> AddSummary:
        """Enter links, all or none of them; those that are there already stay as they are.

        Raises InputError for a name and source that another link has in the ledger.
        """
        from braidsearch.ledger.reading.catalogue_file import check_label  # noqa: PLC0415 - for this

        added = known = doubled = 0
        with blaming_damage(self.store), self.store.writing():
            for entry in entries:
                if not entry.name:
                    raise InputError(
                        f"{entry.given or entry.braid!r}: expected an entry with a name"
                    )
                check_label(entry.name, "name")
                check_label(entry.source, "source")
                if self.store.add_entry(entry):
                    added += 1
                    doubled += self.store.is_doubled(entry)
                else:
                    known += 1
        return AddSummary(added, known, doubled)

    def conflicts(self, entries: Sequence[Entry]) -> list[tuple[Entry, str]]:
        """The entries that ``add`` would refuse, each with the reason in words."""
        return find_conflicts(entries, self.store)

    def sort(
        self,
        *,
        nodes: int = DEFAULT_NODES,
        max_strands: int | None = None,
        up_to: Sequence[str] = (),
        executor: Executor | None = None,
        progress: Report | None = None,
    ) -> SortSummary:
        """Put every entry into the class of its oriented link, with proofs for all that is said.

        Open questions that were tried with less are asked again first. ``nodes`` bounds the
        conjugacy classes that a search for one question enters, ``max_strands`` the strands on the
        way; no clock decides anything. ``up_to`` names symmetries: which classes are such images
        of one another is asked as well. ``executor`` is one of the concurrent.futures kind.
        """
        from braidsearch.ledger.executors import SerialExecutor  # noqa: PLC0415 - look-ups come faster
        from braidsearch.ledger.sorting import Sorter  # noqa: PLC0415 - the same

        effort = Effort(nodes, max_strands)
        effort.check()
        check_symmetries(up_to)
        with blaming_damage(self.store):
            return Sorter(self.store, effort, executor or SerialExecutor(), progress).sort(up_to)

    def find(self, braid: Braid, *, nodes: int = DEFAULT_NODES) -> Found:
        """The class of a link, with a certificate; else what it differs from and how."""
        from braidsearch.ledger.finding import Finder  # noqa: PLC0415 - not needed to add

        SearchLimits(seconds=None, nodes=nodes)  # raises where no search can keep them
        with blaming_damage(self.store), self.store.reading():
            return Finder(self.store, nodes).find(braid)

    def entry(self, reference: str) -> StoredEntry:
        """The entry that is meant by ``name``, by ``source/name`` or by ``#number``.

        Raises InputError where there is none, or more than one.
        """
        return find_entry(self.store, reference)

    def proof(
        self, left: str | StoredEntry, right: str | StoredEntry, *, up_to: Sequence[str] = ()
    ) -> Proof:
        """What the evidence in the ledger says of two entries, joined into one certificate.

        An entry may be given as ``entry`` takes it. Raises InputError for an entry that there is
        not, or that is not sorted yet.
        """
        check_symmetries(up_to)
        asked = tuple(dict.fromkeys(("identity", *up_to)))
        with blaming_damage(self.store), self.store.reading():
            one, other = self._sorted_entry(left), self._sorted_entry(right)
            proofs = Proofs(self.store)
            certificate = proofs.same(one.braid_number, other.braid_number, asked)
            if certificate is None:
                certificate = proofs.different(one.braid_number, other.braid_number, asked)
            if certificate is None:
                question = self._question_between(one, other)
                return Proof("undecided", None, None, question)
        report = judge(certificate)
        if not report.valid:
            raise InputError(
                f"{one.title}, {other.title}: the verifier rejects the stored evidence: "
                f"{report.reason}: expected an intact ledger; ledger check says what is wrong"
            )
        return Proof(certificate.verdict, certificate.symmetry, certificate)

    def joined(
        self, entry: StoredEntry, other: StoredEntry, up_to: Sequence[str] = ()
    ) -> Certificate | None:
        """The evidence that two sorted entries are one link, joined as it is stored.

        Unlike that of ``proof`` it was not verified again. None where nothing joins them.
        """
        asked = tuple(dict.fromkeys(("identity", *up_to)))
        with blaming_damage(self.store):
            return Proofs(self.store).same(entry.braid_number, other.braid_number, asked)

    def _sorted_entry(self, reference: str | StoredEntry) -> StoredEntry:
        entry = self.entry(reference) if isinstance(reference, str) else reference
        if entry.class_number is None:
            raise InputError(f"{entry.title}: not sorted yet: expected ledger sort before")
        return entry

    def _question_between(self, one: StoredEntry, other: StoredEntry) -> OpenQuestion | None:
        wanted = {one.class_number, other.class_number}
        for question in open_questions(self.store):
            if {question.left.class_number, question.right.class_number} == wanted:
                return question
        return None

    def record(self, certificate: Certificate) -> str:
        """Keep a proof found elsewhere about two links of the ledger, once the verifier accepts it.

        Returns what came of it in words: what it joins or holds apart, or what it contradicts.
        Raises InputError for a certificate that does not hold, and for braids that are not sorted.
        """
        from braidsearch.ledger.recording import record_certificate  # noqa: PLC0415 - look-ups come faster

        with blaming_damage(self.store):
            return record_certificate(self.store, certificate)

    def check_recordable(self, certificate: Certificate) -> None:
        """Raise InputError for a certificate that ``record`` would refuse."""
        from braidsearch.ledger.recording import check_certificate  # noqa: PLC0415 - as above

        check_certificate(self.store, certificate)

    def report(self, up_to: Sequence[str] = SYMMETRIES) -> LedgerReport:
        """All classes with their entries, groups up to symmetry, what is open or contradictory.

        ``up_to`` names the symmetries of which the groups are made.
        """
        check_symmetries(up_to)
        with blaming_damage(self.store), self.store.reading():
            return report_ledger(self.store, up_to)

    def check(
        self,
        *,
        executor: Executor | None = None,
        progress: Callable[[int, int], None] | None = None,
    ) -> CheckReport:
        """Verify everything that the ledger rests on, by the independent verifier."""
        from braidsearch.ledger.checking import check_ledger  # noqa: PLC0415 - look-ups come faster
        from braidsearch.ledger.executors import SerialExecutor  # noqa: PLC0415 - the same

        with self.store.reading():
            return check_ledger(self.store, executor or SerialExecutor(), progress)


def find_conflicts(entries: Sequence[Entry], store: Store | None = None) -> list[tuple[Entry, str]]:
    """The entries whose name another link of their source has, in the ledger or before them.

    Each with what is wrong in words; ``store`` is None for a ledger that there is not yet.
    """
    seen: dict[tuple[str, str], Entry] = {}
    found = []
    for entry in entries:
        other = seen.setdefault((entry.source, entry.name), entry)
        if store is not None and store.has_other(entry):
            found.append((entry, "in the ledger another link has this name"))
        elif other.braid != entry.braid:
            place = f"{other.file or 'before'}{f', line {other.line}' if other.line else ''}"
            found.append((entry, f"another link has this name: {place}"))
    expected = "expected another name or source"
    return [(entry, f"{entry.name!r}: {said}: {expected}") for entry, said in found]


def check_symmetries(up_to: Sequence[str]) -> None:
    """Raise InputError for a name that is no symmetry."""
    for symmetry in up_to:
        if symmetry not in SYMMETRIES:
            raise InputError(f"up to {symmetry!r}: expected {', '.join(SYMMETRIES[1:])}")
