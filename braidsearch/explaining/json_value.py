"""An explanation as one JSON object, for programs that show proofs in their own way."""

from __future__ import annotations

from typing import Any

from braidsearch.certificates import braid_to_json
from braidsearch.explaining.outline import (
    ExplainedChain,
    ExplainedDistinction,
    Explanation,
    MarkedBraid,
)
from braidsearch.explaining.polynomial_text import format_power
from braidsearch.explaining.text import claim_text, text_of
from braidsearch.explaining.theorems import Theorem
from braidsearch.explaining.values import Comparison, Polynomials


def explanation_to_json(explanation: Explanation) -> dict[str, Any]:
    """The claim, the steps of all chains one after the other, the values, the theorems.

    Each step names the image of RIGHT that it speaks of (``symmetry``) and the word from which its
    chain ``starts``. Marks are pairs of letter positions, first and last, counted from 1; a place
    between letters has a last position one less than the first.
    """
    certificate = explanation.certificate
    steps: list[dict[str, Any]] = []
    if explanation.chain is not None:
        steps += _steps_to_json(explanation.chain, str(certificate.symmetry))
    for distinction in explanation.distinctions:
        for chain in distinction.chains:
            steps += _steps_to_json(chain, distinction.symmetry)
    return {
        "claim": claim_text(explanation),
        "verdict": certificate.verdict,
        "left": braid_to_json(certificate.left),
        "right": braid_to_json(certificate.right),
        "elementary": explanation.is_elementary,
        "steps": steps,
        "distinctions": [_distinction_to_json(d) for d in explanation.distinctions],
        "theorems": [_theorem_to_json(theorem) for theorem in explanation.theorems],
    }


def _steps_to_json(chain: ExplainedChain, symmetry: str) -> list[dict[str, Any]]:
    return [
        {
            "symmetry": symmetry,
            "starts": chain.start,
            "number": step.number,
            "kind": step.title,
            "detail": text_of(step.detail),
            "before": _marked_to_json(step.before),
            "after": _marked_to_json(step.after),
            "reason": text_of(step.reason),
            "theorem": [publication.tag for publication in step.theorem.publications],
            "move": step.move or step.number,
        }
        for step in chain.steps
    ]


def _distinction_to_json(distinction: ExplainedDistinction) -> dict[str, Any]:
    return {
        "symmetry": distinction.symmetry,
        "invariant": distinction.title,
        "sides": ["LEFT", distinction.right_name],
        "entries": _entries_to_json(distinction.comparison),
    }


def _entries_to_json(comparison: Comparison) -> list[dict[str, Any]]:
    """A polynomial's entries are its coefficients, labelled by the powers that they stand at."""
    if isinstance(comparison, Polynomials):
        rows = [
            (format_power(comparison, exponents) or "1", str(left), str(right))
            for exponents, left, right in comparison.terms
        ]
    else:
        rows = [(entry.label, entry.left, entry.right) for entry in comparison.entries]
    return [
        {"label": label, "left": left, "right": right, "differs": left != right}
        for label, left, right in rows
    ]


def _marked_to_json(marked: MarkedBraid) -> dict[str, Any]:
    marks = [[start + 1, end] for start, end in marked.marks]
    return braid_to_json(marked.braid) | {"marks": marks}


def _theorem_to_json(theorem: Theorem) -> dict[str, Any]:
    published = [
        {"tag": p.tag, "author": p.author, "title": p.title, "year": p.year}
        for p in theorem.publications
    ]
    return {"statement": theorem.statement, "publications": published}
