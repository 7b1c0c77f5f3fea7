"""Looking one link up in a ledger: its class with the proof, or what it differs from and how."""

from __future__ import annotations

from dataclasses import dataclass

from braidsearch.certificates import Certificate, parse_certificate
from braidsearch.certificates.joining import join_chain, join_different
from braidsearch.errors import CapacityError
from braidsearch.ledger.findings import Effort, Finding
from braidsearch.ledger.fingerprints import FIELDS, Fingerprint, fingerprint
from braidsearch.ledger.judgements import fingerprint_certificate
from braidsearch.ledger.preparing import form_certificate, same_certificate
from braidsearch.ledger.proofs import Proofs
from braidsearch.ledger.reporting import first_entry
from braidsearch.ledger.store import Store, StoredEntry
from braidsearch.search.canonical_form import visible_route
from braidsearch.search.gate import judge
from braidsearch.words import Braid

_MOST_COMPARED = 5


@dataclass(frozen=True, slots=True)
class Comparison:
    """What was found about the link asked for and one class.

    ``outcome`` is that of a verdict; ``certificate`` proves it for the braid asked for and the
    braid of ``entry``, and is None when undecided.
    """

    class_number: int
    entry: StoredEntry
    outcome: str
    reason: str
    certificate: Certificate | None


@dataclass(frozen=True, slots=True)
class Found:
    """The answer to a question to a ledger.

    ``outcome`` is "same" (``comparisons`` then has one, for its class), "different" from every
    class, or "undecided". ``comparisons`` holds the classes of equal fingerprint, and where there
    are none a few that agree longest. ``remaining`` counts, invariant by invariant, the classes
    that are left when all values up to this one must agree. ``unsorted`` entries were not asked.
    """

    outcome: str
    comparisons: tuple[Comparison, ...]
    classes: int
    remaining: tuple[tuple[str, int], ...]
    unsorted: int


class Finder:
    """Looks up one braid, and keeps nothing of it; ``nodes`` bounds each search."""

    def __init__(self, store: Store, nodes: int) -> None:
        self.store, self.nodes = store, nodes
        self.proofs = Proofs(store)
        self.classes = store.count("classes")
        self.unsorted = store.count_unsorted()

    def find(self, braid: Braid) -> Found:
        """A look at the word, at the fingerprint, at the canonical form; a search at the last."""
        number = self.store.braid_number(braid)
        if number is not None and self.store.is_placed(number):
            return self._of_known(number, None)
        visible = visible_route(braid)
        marks = fingerprint(visible.current)
        if not self.store.agreeing_classes(marks):
            before = same_certificate(visible, visible.current)
            if before is not None:
                return self._of_new(before, marks)
        return self._by_form(braid)

    def _by_form(self, braid: Braid) -> Found:
        try:
            before = form_certificate(braid)
        except CapacityError:
            before = None
        form = braid if before is None else before.right
        number = self.store.braid_number(form)
        if number is not None and self.store.class_of_form(number) is not None:
            return self._of_known(number, before)
        start = before or Certificate.same(braid, braid, "identity", ())
        marks = fingerprint(form)
        candidates = self.store.agreeing_classes(marks)
        if not candidates:
            return self._of_new(start, marks)
        findings = self._place(form, [candidate for _, candidate, _ in candidates])
        numbers = {candidate: number for number, candidate, _ in candidates}
        if findings[-1].outcome == "same":
            findings = findings[-1:]
        compared = tuple(
            self._compared(start, finding, numbers[finding.right]) for finding in findings
        )
        outcomes = {one.outcome for one in compared}
        outcome = next(name for name in ("same", "undecided", "different") if name in outcomes)
        return Found(outcome, compared, self.classes, self._remaining(marks), self.unsorted)

    def _place(self, form: Braid, candidates: list[Braid]) -> tuple[Finding, ...]:
        from braidsearch.ledger.placing import place  # noqa: PLC0415 - loads the search, which look-ups do without

        return place(form, candidates, Effort(self.nodes))

    def _of_known(self, number: int, before: Certificate | None) -> Found:
        """The class of a braid that is in the ledger, or whose form is."""
        class_number = self.proofs.class_of(number)
        entry = first_entry(self.store, class_number)
        certificate = self.proofs.same(number, entry.braid_number, ("identity",))
        if certificate is None:
            raise ValueError(f"class {class_number} is not held together by its proofs")
        if before is not None:
            certificate = join_chain([before, certificate])
        one = Comparison(class_number, entry, "same", "canonical form", _accepted(certificate))
        return Found("same", (one,), self.classes, (), self.unsorted)

    def _compared(self, start: Certificate, finding: Finding, class_number: int) -> Comparison:
        entry = first_entry(self.store, class_number)
        certificate = None
        if finding.certificate is not None:
            middle = parse_certificate(finding.certificate)
            certificate = self._extended(start, middle, entry)
        return Comparison(class_number, entry, finding.outcome, finding.reason, certificate)

    def _extended(self, start: Certificate, middle: Certificate, entry: StoredEntry) -> Certificate:
        """A certificate about the braid asked for and an entry, through two forms."""
        form = self.store.braid_number(middle.right)
        assert form is not None
        after = self.proofs.same(form, entry.braid_number, ("identity",))
        if middle.verdict == "same":
            chain = [start, middle] if after is None else [start, middle, after]
            return _accepted(join_chain(chain))
        return _accepted(join_different(start, middle, after))

    def _of_new(self, start: Certificate, marks: Fingerprint) -> Found:
        """What a link of a new fingerprint differs from: the classes that agree longest first."""
        compared = []
        for number, form, theirs in self.store.nearest_classes(marks, _MOST_COMPARED):
            middle = fingerprint_certificate(start.right, marks, form, theirs)
            if middle is None:
                continue
            entry = first_entry(self.store, number)
            certificate = self._extended(start, middle, entry)
            name = middle.distinctions[0].invariant
            compared.append(Comparison(number, entry, "different", name, certificate))
        return Found(
            "different", tuple(compared), self.classes, self._remaining(marks), self.unsorted
        )

    def _remaining(self, marks: Fingerprint) -> tuple[tuple[str, int], ...]:
        return tuple(zip(FIELDS, self.store.count_agreeing(marks), strict=True))


def _accepted(certificate: Certificate) -> Certificate:
    """The certificate, once the verifier has accepted it.

    Raises ValueError where it does not: a mistake of this program, never of the user.
    """
    report = judge(certificate)
    if not report.valid:
        raise ValueError(f"the verifier did not accept a joined proof: {report.reason}")
    return certificate
