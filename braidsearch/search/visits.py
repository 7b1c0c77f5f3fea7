"""Stages of a chain of moves, named so that two visits of one conjugacy class are seen."""

from __future__ import annotations

from collections.abc import Hashable
from dataclasses import dataclass

from braidsearch.normal_form.conjugacy import conjugacy_class
from braidsearch.search.effort import summit_cap
from braidsearch.words import Braid


@dataclass(frozen=True)
class Visit:
    """A stage: its braid, the name of its class, and what conjugates it to that name's braid.

    For a large braid no class is looked for: the stage is then named by its own word.
    """

    braid: Braid
    key: Hashable
    conjugator: tuple[int, ...] = ()

    def conjugator_to(self, other: Visit) -> tuple[int, ...]:
        """What conjugates this braid to that of another visit with the same name."""
        return self.conjugator + tuple(-letter for letter in reversed(other.conjugator))


def visit(braid: Braid) -> Visit:
    """The visit of a braid."""
    cap = summit_cap(braid)
    if not cap:
        return Visit(braid, braid)
    found = conjugacy_class(braid, cap)
    return Visit(braid, found.key, found.conjugator)
