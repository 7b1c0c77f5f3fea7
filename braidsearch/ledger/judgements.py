"""What findings do to a ledger: forms join classes, classes merge, contradictions are kept."""

from __future__ import annotations

from collections.abc import Sequence
from typing import TYPE_CHECKING

from braidsearch.certificates import Certificate, Distinction, format_certificate
from braidsearch.ledger.findings import Effort, Finding
from braidsearch.ledger.fingerprints import Fingerprint
from braidsearch.ledger.store import Store
from braidsearch.search.gate import judge
from braidsearch.words import Braid

if TYPE_CHECKING:
    from braidsearch.ledger.preparing import Prepared


class Judgements:
    """Takes findings into the ledger, inside a transaction of the caller."""

    def __init__(self, store: Store, effort: Effort) -> None:
        self.store, self.effort = store, effort

    def class_of(self, form: Braid) -> int | None:
        """The class of a form, None for a new one."""
        number = self.store.braid_number(form)
        return None if number is None else self.store.class_of_form(number)

    def take_form(self, number: int, prepared: Prepared, findings: Sequence[Finding]) -> None:
        """Place a braid of an entry at its form; a new form joins a class or becomes one."""
        store = self.store
        if store.is_placed(number):
            return
        form = store.add_braid(prepared.form)
        if store.class_of_form(form) is None:
            self._take_new_form(form, prepared.fingerprint, findings)
        if prepared.certificate is not None:
            finding = Finding(
                prepared.braid,
                prepared.form,
                "identity",
                "same",
                prepared.certificate,
                "canonical form",
            )
            store.add_evidence(number, form, finding)
        store.place(number, form)
        store.place(form, form)

    def _take_new_form(self, form: int, marks: Fingerprint, findings: Sequence[Finding]) -> None:
        store = self.store
        if findings and findings[-1].outcome == "same":
            other = self._number(findings[-1].right)
            joined = store.class_of_form(other)
            assert joined is not None
            store.add_form(form, joined)
            store.add_evidence(form, other, findings[-1])
            return
        store.add_class(form, marks)
        for finding in findings:
            other = self._number(finding.right)
            if finding.outcome == "different":
                store.add_evidence(form, other, finding)
            else:
                store.set_undecided(form, other, finding, self.effort)

    def _number(self, braid: Braid) -> int:
        number = self.store.braid_number(braid)
        if number is None:
            raise ValueError(f"{braid!r} is not in the ledger")
        return number

    def take_answer(self, left: int, right: int, finding: Finding) -> None:
        """Take the answer to an open question about two forms."""
        if finding.outcome == "undecided":
            self.store.set_undecided(left, right, finding, self.effort)
            return
        self.store.settle(left, right, finding.symmetry)
        self.take_proof(left, right, finding)

    def take_proof(self, left: int, right: int, finding: Finding) -> None:
        """Keep a proof about two forms: classes merge where it says so and nothing contradicts."""
        number = self.store.add_evidence(left, right, finding)
        between = self._class_number(left), self._class_number(right), finding.symmetry
        if finding.outcome == "same":
            self._take_sameness(number, *between)
        else:
            self._take_difference(number, *between)

    def _take_sameness(self, number: int, one: int, other: int, symmetry: str) -> None:
        is_identity = symmetry == "identity"
        if is_identity and one == other:
            return
        against = self.store.proof_between(one, other, symmetry, "different")
        is_against = against is not None
        if is_identity and against is None:
            is_against, against = self._difference_of_values(one, other)
        if is_against:
            self.store.add_contradiction(number, against, one, other)
        elif is_identity:
            self._merge(*sorted((one, other)))
        else:
            self._drop_answered(one)

    def _take_difference(self, number: int, one: int, other: int, symmetry: str) -> None:
        if symmetry == "identity" and one == other:
            against: int | None = self._evidence_within(one)
        else:
            against = self.store.proof_between(one, other, symmetry, "same")
        if against is None:
            self._drop_answered(one)
        else:
            self.store.add_contradiction(against, number, one, other)

    def _class_number(self, form: int) -> int:
        number = self.store.class_of_form(form)
        if number is None:
            raise ValueError(f"form {form} is in no class")
        return number

    def _merge(self, kept: int, merged: int) -> None:
        self.store.merge_classes(kept, merged)
        self._drop_answered(kept)

    def _drop_answered(self, number: int) -> None:
        """Settle the open questions about a class to which other proofs have the answer now."""
        store = self.store
        for left, right, symmetry in store.undecided_about(number):
            one, other = self._class_number(left), self._class_number(right)
            is_one = symmetry == "identity" and one == other
            if is_one or any(
                store.proof_between(one, other, symmetry, verdict) is not None
                for verdict in ("same", "different")
            ):
                store.settle(left, right, symmetry)

    def _difference_of_values(self, one: int, other: int) -> tuple[bool, int | None]:
        """Whether the fingerprints of two classes differ, and the number of a proof of that.

        Each value was confirmed by the verifier alone; a certificate of two of them may yet be
        more than it takes at once, and then there is no number.
        """
        left, right = self.store.form_of_class(one), self.store.form_of_class(other)
        marks, theirs = (self.store.fingerprint_of_class(key) for key in (one, other))
        certificate = fingerprint_certificate(
            self.store.braid(left), marks, self.store.braid(right), theirs
        )
        if certificate is None:
            return marks.first_difference(theirs) is not None, None
        text = format_certificate(certificate)
        finding = Finding(
            certificate.left, certificate.right, "identity", "different", text, "fingerprint"
        )
        return True, self.store.add_evidence(left, right, finding)

    def _evidence_within(self, number: int) -> int:
        """A proof of sameness by which a class holds together."""
        inside = "(SELECT braid FROM forms WHERE class = ?)"
        found = self.store.one(
            "SELECT max(id) FROM evidence WHERE verdict = 'same' AND symmetry = 'identity' "
            f"AND left IN {inside} AND right IN {inside}",
            [number, number],
        )
        return self._evidence_of_itself(number) if found is None else int(found)

    def _evidence_of_itself(self, number: int) -> int:
        """The proof that a form is the link that it is, kept where a class has no other form."""
        form = self.store.form_of_class(number)
        braid = self.store.braid(form)
        text = format_certificate(Certificate.same(braid, braid, "identity", ()))
        return self.store.add_evidence(
            form, form, Finding(braid, braid, "identity", "same", text, "the same braid")
        )


def fingerprint_certificate(
    left: Braid, marks: Fingerprint, right: Braid, theirs: Fingerprint
) -> Certificate | None:
    """The certificate that two forms differ by their fingerprints; None where these agree.

    The first of the values that differ of which the verifier takes a certificate; None as well
    where it takes none.
    """
    for name in marks.differences(theirs):
        distinction = Distinction(
            "identity", name, {}, (), (), marks.value(name), theirs.value(name)
        )
        certificate = Certificate.different(left, right, [distinction])
        if judge(certificate).valid:
            return certificate
    return None
