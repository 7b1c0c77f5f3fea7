"""The one gate through which a verdict leaves: the independent verifier must accept it."""

from __future__ import annotations

from braidsearch.certificates import Certificate, format_certificate
from braidsearch.verifier import Report, verify_text


def judge(certificate: Certificate) -> Report:
    """The verifier's report on the certificate as it would stand in a file."""
    left, right = certificate.left, certificate.right
    return verify_text(
        format_certificate(certificate),
        left=(left.strands, left.word),
        right=(right.strands, right.word),
    )
