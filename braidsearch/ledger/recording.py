"""A proof found elsewhere taken into a ledger."""

from __future__ import annotations

from braidsearch.certificates import Certificate, format_certificate
from braidsearch.certificates.joining import join_chain
from braidsearch.errors import InputError
from braidsearch.ledger.findings import Effort, Finding
from braidsearch.ledger.following import merge_what_follows
from braidsearch.ledger.judgements import Judgements
from braidsearch.ledger.proofs import Proofs
from braidsearch.ledger.store import Store
from braidsearch.search.gate import judge
from braidsearch.words import Braid, format_word

ALREADY = "it is there already"


def record_certificate(store: Store, certificate: Certificate) -> str:
    """Keep a proof about two braids of the ledger; what came of it, in words.

    Raises InputError for a proof that the verifier does not accept, for one of several symmetries
    at once, and for braids that are not in the ledger.
    """
    check_certificate(store, certificate)
    symmetries = [item.symmetry for item in certificate.distinctions]
    if certificate.symmetry is not None:
        symmetries.append(certificate.symmetry)
    with store.writing():
        proofs = store.count("evidence")
        before = store.count("classes"), store.count("contradictions")
        for symmetry in symmetries:
            _record(store, _for_symmetry(certificate, symmetry), symmetry)
        merge_what_follows(store, Judgements(store, Effort()))
        after = store.count("classes"), store.count("contradictions")
    if after[1] > before[1]:
        return "it contradicts proofs that the ledger has: both are kept, and no class is changed"
    if after[0] < before[0]:
        return "it joins two classes"
    return ALREADY if store.count("evidence") == proofs else "it is kept as one more proof"


def check_certificate(store: Store, certificate: Certificate) -> None:
    """Raise InputError for a certificate that ``record_certificate`` would refuse."""
    report = judge(certificate)
    if not report.valid:
        raise InputError(f"the certificate does not hold: {report.reason}")
    for braid in (certificate.left, certificate.right):
        _number_of(store, braid)


def _for_symmetry(certificate: Certificate, symmetry: str) -> Certificate:
    if certificate.verdict == "same":
        return certificate
    items = [item for item in certificate.distinctions if item.symmetry == symmetry]
    return Certificate.different(certificate.left, certificate.right, items)


def _record(store: Store, certificate: Certificate, symmetry: str) -> None:
    left, right = (_number_of(store, braid) for braid in (certificate.left, certificate.right))
    proofs = Proofs(store)
    near, far = proofs.form(left), proofs.form(right)
    before = proofs.same(near, left, ("identity",))
    after = proofs.same(right, far, ("identity",))
    joined = join_chain([part for part in (before, certificate, after) if part is not None])
    text = format_certificate(joined)
    if store.one(
        "SELECT 1 FROM evidence WHERE left = ? AND right = ? AND certificate = ?",
        [near, far, text],
    ):
        return
    if not judge(joined).valid:
        raise ValueError("the verifier did not accept a joined proof")
    finding = Finding(
        joined.left,
        joined.right,
        symmetry,
        joined.verdict,
        text,
        "recorded from a certificate",
    )
    judgements = Judgements(store, Effort())
    store.settle(near, far, symmetry)
    store.settle(far, near, symmetry)
    judgements.take_proof(near, far, finding)


def _number_of(store: Store, braid: Braid) -> int:
    number = store.braid_number(braid)
    if number is None or not store.is_placed(number):
        raise InputError(f"{format_word(braid)}: expected the braid of an entry that is sorted")
    return number
