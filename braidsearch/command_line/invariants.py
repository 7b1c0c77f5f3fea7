"""braidsearch invariants WORD: the exact invariants of the closure of a braid."""

from __future__ import annotations

import math
from collections.abc import Sequence
from typing import Any

from braidsearch.certificates.display import show_value
from braidsearch.command_line.answer import SUCCESS, Answer, json_answer
from braidsearch.command_line.arguments import CommandParser, read_seconds
from braidsearch.command_line.link_input import WORD_OR_DRAWING, read_link_argument
from braidsearch.words import Braid

_SECONDS = 60.0

_DESCRIPTION = """Print the invariants of the closure of a braid, all exact.

Conventions: the right-handed trefoil, the closure of "1 1 1", has Jones polynomial t + t^3 - t^4,
HOMFLY-PT polynomial 2 v^2 + v^2 z^2 - v^4 and signature -2. With --json the values stand as in a
certificate: polynomials as lists [exponents..., coefficient], Jones exponents in half powers."""

_EXAMPLES = """  braidsearch invariants "1 1 1"
  braidsearch invariants "-1,2,-1,2" --json"""


def answer(arguments: Sequence[str]) -> Answer:
    """Carry out the command. Raises InputError for a word that cannot be read."""
    parser = CommandParser("invariants", _DESCRIPTION, _EXAMPLES)
    parser.add_word("word", WORD_OR_DRAWING)
    parser.add_json()
    parser.add_number(
        "--seconds", read_seconds, "seconds or none", "leave out what would take longer each (60)"
    )
    given = parser.read(arguments)
    braid = read_link_argument("WORD", given.word)
    seconds = getattr(given, "seconds", _SECONDS)
    values, left_out = _compute(braid, math.inf if seconds is None else seconds)
    hint = f"braidsearch invariants: left out: {', '.join(left_out)}" if left_out else ""
    return (
        json_answer(SUCCESS, values, hint) if given.json else Answer(SUCCESS, _report(values), hint)
    )


def _compute(braid: Braid, seconds: float) -> tuple[dict[str, Any], list[str]]:
    """The values by name, and for each invariant that is left out the reason, in words."""
    from braidsearch.invariants import INVARIANTS  # noqa: PLC0415 - help and mistakes come faster

    values: dict[str, Any] = {}
    left_out = []
    for invariant in INVARIANTS:
        cost = invariant.estimated_cost(braid)
        if not invariant.is_applicable(braid):
            left_out.append(f"{invariant.title} (too large)")
        elif cost > seconds:
            left_out.append(f"{invariant.title} (about {cost:.0f} s: allow more --seconds)")
        else:
            values[invariant.name] = invariant.compute(braid)
    return values, left_out


def _report(values: dict[str, Any]) -> str:
    from braidsearch.invariants import INVARIANTS  # noqa: PLC0415 - help and mistakes come faster

    width = max(len(invariant.title) for invariant in INVARIANTS) + 1
    return "\n".join(
        f"{invariant.title + ':':<{width}} {show_value(invariant.name, values[invariant.name])}"
        for invariant in INVARIANTS
        if invariant.name in values
    )
