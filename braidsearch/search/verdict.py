"""The answer to a query."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Any

from braidsearch.certificates import Certificate


@dataclass(frozen=True)
class Verdict:
    """What ``compare`` found.

    ``outcome`` is "same", "different" or "undecided". ``symmetry`` names, for "same", the symmetry
    of the right link that gives the left one. ``reason`` is one line in words. ``certificate`` has
    been accepted by the verifier, and is None for "undecided". ``explored`` tells what was done:
    nodes, seconds, the name of the ending, and a list of what was tried. ``suggestions`` says, for
    "undecided", how to go on. ``image`` is, when the answer is not "same", a certificate for a
    symmetric image that was not asked for, if one was met.
    """

    outcome: str
    symmetry: str | None
    reason: str
    certificate: Certificate | None
    explored: Mapping[str, Any] = field(hash=False)
    suggestions: tuple[str, ...] = ()
    image: Certificate | None = None

    def _repr_html_(self) -> str:
        """The outcome with what proves it, for a notebook."""
        from braidsearch.drawing.notebook import (  # noqa: PLC0415 - upwards, see the test of imports
            verdict_html,
        )

        return verdict_html(self)
