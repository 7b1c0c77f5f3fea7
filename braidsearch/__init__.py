"""Decide whether two closed braids are the same link, with evidence that anyone can check.

    from braidsearch import Braid, SearchLimits, compare, verify
    verdict = compare(Braid([1, 1, 1]), Braid([1, 2, 1, 2]), limits=SearchLimits(seconds=20))

The names below are loaded when they are first used, so that the import costs nothing.
"""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from os import PathLike

    from braidsearch.certificates import (
        Certificate,
        Distinction,
        explain_certificate,
        format_certificate,
        parse_certificate,
        read_certificate,
        write_certificate,
    )
    from braidsearch.certificates.joining import join_chain, reverse_certificate
    from braidsearch.diagrams import LinkDiagram
    from braidsearch.diagrams.polygons import polygon_diagram, read_polygons
    from braidsearch.drawing import draw_braid, draw_closure, draw_proof
    from braidsearch.drawing.player import draw_proof_page
    from braidsearch.errors import BraidsearchError, CapacityError, InputError
    from braidsearch.explaining import expand_certificate, explain_proof
    from braidsearch.ledger.ledger import Ledger
    from braidsearch.ledger.reading import Entry, Reading, read_entries
    from braidsearch.search.driver import compare
    from braidsearch.search.limits import Progress, SearchLimits
    from braidsearch.search.symmetries import find_symmetries
    from braidsearch.search.tighten import Tightening, tighten
    from braidsearch.search.verdict import Verdict
    from braidsearch.verifier import Report
    from braidsearch.weaving import Woven, weave
    from braidsearch.words import Braid, format_word, parse_word

__version__ = "0.1.0"

_HOMES: dict[str, str] = {
    "Braid": "words",
    "BraidsearchError": "errors",
    "CapacityError": "errors",
    "Certificate": "certificates",
    "Distinction": "certificates",
    "Entry": "ledger.reading",
    "InputError": "errors",
    "Ledger": "ledger.ledger",
    "LinkDiagram": "diagrams",
    "Progress": "search.limits",
    "Reading": "ledger.reading",
    "Report": "verifier",
    "SearchLimits": "search.limits",
    "Tightening": "search.tighten",
    "Verdict": "search.verdict",
    "Woven": "weaving",
    "compare": "search.driver",
    "draw_braid": "drawing",
    "draw_closure": "drawing",
    "draw_proof": "drawing",
    "draw_proof_page": "drawing.player",
    "expand_certificate": "explaining",
    "explain_certificate": "certificates",
    "explain_proof": "explaining",
    "find_symmetries": "search.symmetries",
    "format_certificate": "certificates",
    "format_word": "words",
    "join_chain": "certificates.joining",
    "parse_certificate": "certificates",
    "parse_word": "words",
    "polygon_diagram": "diagrams.polygons",
    "read_certificate": "certificates",
    "read_entries": "ledger.reading",
    "read_polygons": "diagrams.polygons",
    "reverse_certificate": "certificates.joining",
    "tighten": "search.tighten",
    "weave": "weaving",
    "write_certificate": "certificates",
}

__all__ = [
    "Braid",
    "BraidsearchError",
    "CapacityError",
    "Certificate",
    "Distinction",
    "Entry",
    "InputError",
    "Ledger",
    "LinkDiagram",
    "Progress",
    "Reading",
    "Report",
    "SearchLimits",
    "Tightening",
    "Verdict",
    "Woven",
    "__version__",
    "compare",
    "draw_braid",
    "draw_closure",
    "draw_proof",
    "draw_proof_page",
    "expand_certificate",
    "explain_certificate",
    "explain_proof",
    "find_symmetries",
    "format_certificate",
    "format_word",
    "join_chain",
    "parse_certificate",
    "parse_word",
    "polygon_diagram",
    "read_certificate",
    "read_entries",
    "read_polygons",
    "reverse_certificate",
    "tighten",
    "verify",
    "weave",
    "write_certificate",
]


def verify(
    certificate: str | PathLike[str] | Certificate,
    *,
    left: Braid | None = None,
    right: Braid | None = None,
) -> Report:
    """Replay a certificate, given as a path or as a value, with the independent verifier.

    ``left`` and ``right`` bind the claim: a certificate about other braids is rejected. Raises
    nothing for a bad file: its report is not valid, and says why.
    """
    from braidsearch.certificates import Certificate, format_certificate  # noqa: PLC0415 - lazy
    from braidsearch.verifier import verify_file, verify_text  # noqa: PLC0415 - lazy

    bound_left = None if left is None else (left.strands, left.word)
    bound_right = None if right is None else (right.strands, right.word)
    if isinstance(certificate, Certificate):
        return verify_text(format_certificate(certificate), bound_left, bound_right)
    return verify_file(certificate, bound_left, bound_right)


def __getattr__(name: str) -> Any:
    if name not in _HOMES:
        raise AttributeError(f"module 'braidsearch' has no attribute {name!r}")
    value = getattr(import_module(f"braidsearch.{_HOMES[name]}"), name)
    globals()[name] = value
    return value


def __dir__() -> list[str]:
    return sorted({*globals(), *__all__})
