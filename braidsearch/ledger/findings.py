"""What is asked of two links, and what came out: values that the tables keep."""

from __future__ import annotations

from dataclasses import dataclass

from braidsearch.search.limits import SearchLimits
from braidsearch.words import Braid


@dataclass(frozen=True, slots=True)
class Effort:
    """The limits of each question: conjugacy classes entered, and strands on the way.

    There is no limit in seconds, so that the same ledger comes out on every machine.
    """

    nodes: int = 1_000
    max_strands: int | None = None

    @property
    def limits(self) -> SearchLimits:
        """The same as limits of a search."""
        return SearchLimits(seconds=None, nodes=self.nodes, max_strands=self.max_strands)

    def check(self) -> None:
        """Raise InputError for limits that no search can keep."""
        _ = self.limits  # their constructor raises it

    def is_within(self, other: Effort) -> bool:
        """Whether everything that this effort tries is tried by the other as well."""
        strands, most = self.max_strands, other.max_strands
        is_narrower = strands == most or (None not in {strands, most} and strands <= most)  # type: ignore[operator]
        return self.nodes <= other.nodes and is_narrower


@dataclass(frozen=True, slots=True)
class Finding:
    """What came out for two forms: ``outcome`` is that of a verdict.

    ``certificate`` is the text of the proof, accepted by the verifier; None when undecided.
    ``reason`` says how in a few words.
    """

    left: Braid
    right: Braid
    symmetry: str
    outcome: str
    certificate: str | None
    reason: str
