"""Which classes are mirror images or reverses of a form: look-ups first, then questions."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from braidsearch.certificates import Certificate, format_certificate
from braidsearch.certificates.joining import apply_symmetry_to_moves
from braidsearch.ledger.findings import Effort, Finding
from braidsearch.ledger.fingerprints import Fingerprint, fingerprint
from braidsearch.ledger.placing import ask
from braidsearch.ledger.preparing import Prepared, prepare
from braidsearch.search.gate import judge
from braidsearch.words import Braid, apply_symmetry


@dataclass(frozen=True, slots=True)
class Image:
    """The symmetric image of a form: its canonical form, the proof, its fingerprint.

    ``finding`` says that the closure of the form is the image of that of its canonical form.
    """

    form: Braid
    symmetry: str
    finding: Finding
    fingerprint: Fingerprint


def images_of(form: Braid, symmetries: Sequence[str]) -> list[Image]:
    """The images of a form under the symmetries, each with its canonical form."""
    return [_image_of(form, symmetry) for symmetry in symmetries]


def _image_of(form: Braid, symmetry: str) -> Image:
    prepared = prepare(apply_symmetry(form, symmetry))
    certificate = _certificate(form, prepared, symmetry)
    finding = Finding(
        form,
        certificate.right,
        symmetry,
        "same",
        format_certificate(certificate),
        f"canonical form of the {symmetry}",
    )
    marks = prepared.fingerprint
    if certificate.right != prepared.form:
        marks = fingerprint(certificate.right)
    return Image(form, symmetry, finding, marks)


def _certificate(form: Braid, prepared: Prepared, symmetry: str) -> Certificate:
    """closure(form) is the image of closure(canonical form of the image)."""
    from braidsearch.certificates import parse_certificate  # noqa: PLC0415

    if prepared.certificate is not None:
        moves = parse_certificate(prepared.certificate).moves
        back = apply_symmetry_to_moves(prepared.braid, moves, symmetry)
        certificate = Certificate.same(form, prepared.form, symmetry, back)
        if judge(certificate).valid:
            return certificate
    return Certificate.same(form, prepared.braid, symmetry, ())


def ask_images(
    form: Braid, candidates: Sequence[tuple[Braid, str]], effort: Effort
) -> list[Finding]:
    """For each candidate and symmetry, whether closure(form) is that image of its closure.

    After one that is, the others are left out: they follow, or tell nothing new.
    """
    findings = []
    for candidate, symmetry in candidates:
        findings.append(ask(form, candidate, symmetry, effort))
        if findings[-1].outcome == "same":
            break
    return findings
