"""What follows from symmetric images: two classes that are one image of a third are one link."""

from __future__ import annotations

from braidsearch.certificates import format_certificate
from braidsearch.ledger.findings import Finding
from braidsearch.ledger.groups import group_classes
from braidsearch.ledger.judgements import Judgements
from braidsearch.ledger.proofs import Proofs
from braidsearch.ledger.store import Store
from braidsearch.search.gate import judge

_REASON = "follows from proofs about symmetric images"


def merge_what_follows(store: Store, judgements: Judgements) -> None:
    """Merge the classes that chains of proofs about images join, inside a transaction.

    Where a proof of difference stands against that, the contradiction is kept.
    """
    if not store.count("evidence", "symmetry IN ('mirror', 'reverse', 'mirror-reverse')"):
        return
    for kept, *others in group_classes(store, ()):
        for other in others:
            if store.proof_between(kept, other, "identity", "same") is None:
                _merge(store, judgements, kept, other)


def _merge(store: Store, judgements: Judgements, kept: int, other: int) -> None:
    left, right = store.form_of_class(kept), store.form_of_class(other)
    certificate = Proofs(store).same(left, right, ("identity",), through_images=True)
    if certificate is None or not judge(certificate).valid:
        raise ValueError(f"the proofs that join classes {kept} and {other} do not hold together")
    text = format_certificate(certificate)
    finding = Finding(certificate.left, certificate.right, "identity", "same", text, _REASON)
    judgements.take_proof(left, right, finding)
