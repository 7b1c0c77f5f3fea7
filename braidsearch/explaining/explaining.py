"""From a certificate to its explanation, step by step."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from braidsearch.certificates import Certificate, Distinction
from braidsearch.certificates.explanation import describe_invariant
from braidsearch.explaining.expansion import expand_certificate
from braidsearch.explaining.outline import (
    ExplainedChain,
    ExplainedDistinction,
    ExplainedStep,
    Explanation,
)
from braidsearch.explaining.reasons import explain_move, explain_step
from braidsearch.explaining.theorems import invariance_of
from braidsearch.explaining.values import compare_values
from braidsearch.moves import Move
from braidsearch.moves.elementary_steps import ElementaryStep
from braidsearch.moves.markov import stated_result
from braidsearch.words import Braid

RIGHT_NAMES: dict[str, str] = {
    "identity": "RIGHT",
    "mirror": "mirror of RIGHT",
    "reverse": "reverse of RIGHT",
    "mirror-reverse": "mirror-reverse of RIGHT",
}
"""What each symmetry makes of the right word, as a name."""


def explain_proof(certificate: Certificate, is_elementary: bool = False) -> Explanation:
    """The proof that a certificate holds, step by step; the caller has verified it.

    With ``is_elementary`` every step is an insertion, a cancellation, a far commutation, a braid
    relation, a conjugation by one letter, a stabilization or a destabilization. Raises
    CapacityError where these are more than a certificate can hold.
    """
    steps: Iterator[ElementaryStep] | None = None
    if is_elementary:
        certificate, elementary = expand_certificate(certificate)
        steps = iter(elementary)
    if certificate.verdict == "same":
        goal = RIGHT_NAMES[str(certificate.symmetry)]
        chain = _explain_chain("LEFT", goal, certificate.left, certificate.moves, steps)
        return Explanation(certificate, is_elementary, chain, ())
    distinctions = tuple(
        _explain_distinction(certificate, distinction, steps)
        for distinction in certificate.distinctions
    )
    return Explanation(certificate, is_elementary, None, distinctions)


def _explain_chain(
    start: str,
    goal: str,
    braid: Braid,
    moves: Sequence[Move],
    steps: Iterator[ElementaryStep] | None,
) -> ExplainedChain:
    explained: list[ExplainedStep] = []
    for number, move in enumerate(moves, 1):
        after = stated_result(braid, move)
        if steps is None:
            explained.append(explain_move(number, braid, move, after))
        else:
            explained.append(explain_step(number, braid, next(steps), after))
        braid = after
    return ExplainedChain(start, goal, tuple(explained))


def _explain_distinction(
    certificate: Certificate, distinction: Distinction, steps: Iterator[ElementaryStep] | None
) -> ExplainedDistinction:
    sides = (
        ("LEFT", certificate.left, distinction.left_moves),
        ("RIGHT", certificate.right, distinction.right_moves),
    )
    parameters = dict(distinction.parameters)
    return ExplainedDistinction(
        distinction.symmetry,
        describe_invariant(distinction),
        tuple(_explain_chain(name, "", braid, moves, steps) for name, braid, moves in sides),
        RIGHT_NAMES[distinction.symmetry],
        compare_values(distinction.invariant, distinction.left, distinction.right, parameters),
        invariance_of(distinction.invariant, dict(parameters)),
    )
