"""Stored proofs joined into one: a path of evidence from one braid of the ledger to another."""

from __future__ import annotations

from collections.abc import Collection, Sequence
from dataclasses import replace

from braidsearch.certificates import Certificate, parse_certificate
from braidsearch.certificates.joining import (
    compose_symmetries,
    join_chain,
    join_different,
    reverse_certificate,
)
from braidsearch.ledger.fingerprints import Fingerprint, fingerprint
from braidsearch.ledger.judgements import fingerprint_certificate
from braidsearch.ledger.store import Store
from braidsearch.words import Braid, apply_symmetry

Edge = tuple[int, int, int, str]
"""The number of a proof, its left and its right braid, and its symmetry."""

Stage = tuple[int, str]
"""A form, and the symmetry under which its closure is that of the first one."""


class Proofs:
    """Answers from the evidence in a ledger alone; nothing is searched for."""

    def __init__(self, store: Store) -> None:
        self.store = store

    def same(
        self, left: int, right: int, asked: Collection[str], *, through_images: bool = False
    ) -> Certificate | None:
        """One certificate that closure(left) is s(closure(right)), for one of the symmetries asked.

        ``left`` and ``right`` are numbers of placed braids. None where no chain of evidence joins
        them. The first symmetry in the order asked that is joined is taken. Within a class proofs
        about images are passed by, unless ``through_images`` says otherwise.
        """
        only_identity = set(asked) == {"identity"} and not through_images
        path = self._path(self.form(left), self.form(right), asked, only_identity)
        if path is None:
            return None
        first, last = self._to_form(left), self._to_form(right)
        chain = [*first, *path, *(reverse_certificate(one) for one in reversed(last))]
        if not chain:
            braid = self.store.braid(left)
            return Certificate.same(braid, braid, "identity", ())
        return join_chain(chain)

    def different(self, left: int, right: int, asked: Sequence[str]) -> Certificate | None:
        """One certificate that closure(left) is none of the images asked of closure(right)."""
        parts = [self._difference(left, right, symmetry) for symmetry in asked]
        found = [part for part in parts if part is not None]
        if len(found) < len(parts):
            return None
        distinctions = tuple(item for part in found for item in part.distinctions)
        return replace(found[0], distinctions=distinctions)

    def form(self, braid: int) -> int:
        """The canonical form of a placed braid."""
        return int(self.store.one("SELECT form FROM placed WHERE braid = ?", [braid]))

    def class_of(self, braid: int) -> int:
        """The class of a placed braid."""
        return int(self.store.class_of_form(self.form(braid)) or 0)

    def _to_form(self, braid: int) -> list[Certificate]:
        form = self.form(braid)
        if form == braid:
            return []
        return [self._certificate(self._evidence_number(braid, form))]

    def _evidence_number(self, left: int, right: int) -> int:
        return int(
            self.store.one(
                "SELECT id FROM evidence WHERE left = ? AND right = ? AND verdict = 'same' "
                "AND symmetry = 'identity' ORDER BY id LIMIT 1",
                [left, right],
            )
        )

    def _certificate(self, number: int) -> Certificate:
        text = self.store.one("SELECT certificate FROM evidence WHERE id = ?", [number])
        return parse_certificate(text)

    def _path(
        self, start: int, end: int, asked: Collection[str], only_identity: bool
    ) -> list[Certificate] | None:
        """Certificates along a shortest way from form to form, breadth first."""
        came: dict[Stage, tuple[Stage, Edge] | None] = {(start, "identity"): None}
        layer: list[Stage] = [(start, "identity")]
        while layer:
            for symmetry in asked:
                if (end, symmetry) in came:
                    return self._walk_back((end, symmetry), came)
            following: list[Stage] = []
            for stage in layer:
                for edge, there in self._steps(stage, only_identity):
                    if there not in came:
                        came[there] = stage, edge
                        following.append(there)
            layer = following
        return None

    def _steps(self, stage: Stage, only_identity: bool) -> list[tuple[Edge, Stage]]:
        form, so_far = stage
        condition = "AND symmetry = 'identity'" if only_identity else ""
        rows: list[Edge] = self.store.rows(
            "SELECT id, left, right, symmetry FROM evidence WHERE verdict = 'same' "
            f"{condition} AND (left = ? OR right = ?) AND left IN (SELECT braid FROM forms) "
            "AND right IN (SELECT braid FROM forms) ORDER BY id",
            [form, form],
        )
        return [
            (edge, (edge[1] + edge[2] - form, compose_symmetries(so_far, edge[3]))) for edge in rows
        ]

    def _walk_back(
        self, stage: Stage, came: dict[Stage, tuple[Stage, Edge] | None]
    ) -> list[Certificate]:
        chain: list[Certificate] = []
        while (step := came[stage]) is not None:
            before, (number, left, _, _) = step
            certificate = self._certificate(number)
            chain.append(certificate if left == before[0] else reverse_certificate(certificate))
            stage = before
        return chain[::-1]

    def _difference(self, left: int, right: int, symmetry: str) -> Certificate | None:
        """A certificate for one symmetry: by stored evidence between the classes, or by values."""
        found = self._stored_difference(self.class_of(left), self.class_of(right), symmetry)
        if found is None:
            return self._difference_of_values(left, right, symmetry)
        near, certificate, far = found
        before = self.same(left, near, ("identity",))
        after = self.same(far, right, ("identity",))
        return join_different(before, certificate, after)

    def _stored_difference(
        self, one: int, other: int, symmetry: str
    ) -> tuple[int, Certificate, int] | None:
        number = self.store.proof_between(one, other, symmetry, "different")
        if number is None:
            return None
        ((left, right),) = self.store.rows(
            "SELECT left, right FROM evidence WHERE id = ?", [number]
        )
        certificate = self._certificate(number)
        if self.class_of(left) == one:
            return left, certificate, right
        return right, reverse_certificate(certificate), left

    def _difference_of_values(self, left: int, right: int, symmetry: str) -> Certificate | None:
        near, far = (self.store.braid(self.form(braid)) for braid in (left, right))
        certificate = image_difference(near, fingerprint(near), far, symmetry)
        if certificate is None:
            return None
        before = self.same(left, self.form(left), ("identity",))
        after = self.same(self.form(right), right, ("identity",))
        return join_different(before, certificate, after)


def image_difference(
    left: Braid, marks: Fingerprint, right: Braid, symmetry: str
) -> Certificate | None:
    """The certificate that closure(left) is not symmetry(closure(right)), by the fingerprints.

    None where these agree, or where the verifier does not accept it.
    """
    image = apply_symmetry(right, symmetry)
    certificate = fingerprint_certificate(left, marks, image, fingerprint(image))
    if certificate is None or symmetry == "identity":
        return certificate
    (item,) = certificate.distinctions
    return Certificate.different(left, right, [replace(item, symmetry=symmetry)])
