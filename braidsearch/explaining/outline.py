"""What an explanation says, before it is set as text or as LaTeX: frozen values."""

from __future__ import annotations

from dataclasses import dataclass

from braidsearch.certificates import Certificate
from braidsearch.explaining.theorems import Theorem
from braidsearch.explaining.values import Comparison
from braidsearch.words import Braid

Letters = tuple[int, ...]

Phrase = tuple[str | Letters, ...]
"""A sentence or a part of one: words, and between them braid words, which are set by themselves."""

Span = tuple[int, int]
"""Letters from the first index up to the second, counted from 0."""


@dataclass(frozen=True, slots=True)
class MarkedBraid:
    """A braid word in which the letters that a step acts on are marked."""

    braid: Braid
    marks: tuple[Span, ...]


@dataclass(frozen=True, slots=True)
class ExplainedStep:
    """One step of a chain: ``title`` names the kind of move, ``detail`` says what it does here.

    ``reason`` says why it is allowed; ``theorem`` is what that rests on. ``move`` is the number of
    the certificate's move that an elementary step is part of, 0 where the step is that move.
    """

    number: int
    title: str
    detail: Phrase
    before: MarkedBraid
    after: MarkedBraid
    reason: Phrase
    theorem: Theorem
    move: int = 0


@dataclass(frozen=True, slots=True)
class ExplainedChain:
    """A chain of steps from ``start`` (LEFT or RIGHT); ``goal`` names what it ends at, if named."""

    start: str
    goal: str
    steps: tuple[ExplainedStep, ...]


@dataclass(frozen=True, slots=True)
class ExplainedDistinction:
    """Why one image of RIGHT is not LEFT: chains to handier braids, then the values."""

    symmetry: str
    title: str
    chains: tuple[ExplainedChain, ...]
    right_name: str
    comparison: Comparison
    theorems: tuple[Theorem, ...]


@dataclass(frozen=True, slots=True)
class Explanation:
    """A certificate explained: ``chain`` for sameness, ``distinctions`` for difference.

    ``certificate`` is the one whose moves are the steps: the given one, or its expansion.
    """

    certificate: Certificate
    is_elementary: bool
    chain: ExplainedChain | None
    distinctions: tuple[ExplainedDistinction, ...]

    @property
    def theorems(self) -> tuple[Theorem, ...]:
        """All theorems relied on, each once, in the order in which they are first used."""
        chains = [self.chain] if self.chain is not None else []
        found: list[Theorem] = []
        for distinction in self.distinctions:
            chains += distinction.chains
        for chain in chains:
            found += [step.theorem for step in chain.steps]
        for distinction in self.distinctions:
            found += distinction.theorems
        return tuple(dict.fromkeys(found))
