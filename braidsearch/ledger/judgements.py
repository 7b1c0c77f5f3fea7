"""What findings do to a ledger: forms join classes, classes merge, contradictions are kept."""

from __future__ import annotations

import json
from collections.abc import Sequence
from typing import TYPE_CHECKING

from braidsearch.certificates import Certificate, Distinction, format_certificate
from braidsearch.ledger.fingerprints import FIELDS, Fingerprint
from braidsearch.ledger.store import Store
from braidsearch.search.gate import judge
from braidsearch.words import Braid

if TYPE_CHECKING:
    from braidsearch.ledger.placing import Effort, Finding
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
        from braidsearch.ledger.placing import Finding  # noqa: PLC0415 - loads the search, which look-ups do without

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
        if finding.symmetry != "identity":
            return
        one, other = self._class_number(left), self._class_number(right)
        if finding.outcome == "same" and one != other:
            against = self._evidence_between(one, other)
            if against is None:
                self._merge(*sorted((one, other)))
            else:
                self.store.add_contradiction(number, against, one, other)
        elif finding.outcome == "different" and one == other:
            same = self._evidence_within(one)
            self.store.add_contradiction(same, number, one, one)

    def _class_number(self, form: int) -> int:
        number = self.store.class_of_form(form)
        if number is None:
            raise ValueError(f"form {form} is in no class")
        return number

    def _merge(self, kept: int, merged: int) -> None:
        self.store.merge_classes(kept, merged)
        inside = "(SELECT braid FROM forms WHERE class = ?)"
        self.store.execute(
            f"DELETE FROM undecided WHERE symmetry = 'identity' "
            f"AND left IN {inside} AND right IN {inside}",
            [kept, kept],
        )

    def _evidence_between(self, one: int, other: int) -> int | None:
        """A proof that two classes differ, by a stored one or by their fingerprints."""
        from braidsearch.ledger.placing import Finding  # noqa: PLC0415 - loads the search, which look-ups do without

        inside = "(SELECT braid FROM forms WHERE class = ?)"
        number: int | None = self.store.one(
            "SELECT id FROM evidence WHERE verdict = 'different' AND symmetry = 'identity' AND "
            f"(left IN {inside} AND right IN {inside} OR left IN {inside} AND right IN {inside}) "
            "ORDER BY id LIMIT 1",
            [one, other, other, one],
        )
        if number is not None:
            return number
        left, right = self.store.form_of_class(one), self.store.form_of_class(other)
        marks, theirs = (self.store.fingerprint_of_class(key) for key in (one, other))
        certificate = fingerprint_certificate(
            self.store.braid(left), marks, self.store.braid(right), theirs
        )
        if certificate is None:
            return None
        text = format_certificate(certificate)
        finding = Finding(
            certificate.left, certificate.right, "identity", "different", text, "fingerprint"
        )
        return self.store.add_evidence(left, right, finding)

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
        from braidsearch.ledger.placing import Finding  # noqa: PLC0415 - loads the search, which look-ups do without

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

    None as well where the verifier does not accept it.
    """
    name = marks.first_difference(theirs)
    if name is None:
        return None
    values = [json.loads(one.values[FIELDS.index(name)] or "null") for one in (marks, theirs)]
    distinction = Distinction("identity", name, {}, (), (), *values)
    certificate = Certificate.different(left, right, [distinction])
    return certificate if judge(certificate).valid else None
