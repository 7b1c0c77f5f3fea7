"""Proofs that people can read: certificates in words, step by step, in text and in LaTeX."""

from braidsearch.explaining.expansion import Expansion, expand_certificate
from braidsearch.explaining.explaining import explain_proof
from braidsearch.explaining.json_value import explanation_to_json
from braidsearch.explaining.latex import format_latex
from braidsearch.explaining.outline import Explanation
from braidsearch.explaining.text import format_text

__all__ = [
    "Expansion",
    "Explanation",
    "expand_certificate",
    "explain_proof",
    "explanation_to_json",
    "format_latex",
    "format_text",
]
