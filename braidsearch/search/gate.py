"""The one gate through which a verdict leaves: the independent verifier must accept it."""

from __future__ import annotations

from functools import lru_cache
from typing import Any

from braidsearch.certificates import Certificate, format_certificate
from braidsearch.verifier import Report, recompute, verify_text
from braidsearch.words import Braid


@lru_cache(maxsize=16)
def judge(certificate: Certificate) -> Report:
    """The verifier's report on the certificate as it would stand in a file.

    A distinction is judged when it is found, and once more with its verdict: mostly that is the
    same certificate, whose report is remembered.
    """
    left, right = certificate.left, certificate.right
    return verify_text(
        format_certificate(certificate),
        left=(left.strands, left.word),
        right=(right.strands, right.word),
    )


def is_confirmed(invariant: str, braid: Braid, value: Any) -> bool | None:
    """Whether the verifier's own route gives the same value for the closure of the braid.

    None for a value that is too large for the verifier.
    """
    recomputed = recompute(invariant, braid.strands, braid.word)
    return None if recomputed is None else bool(recomputed == value)
